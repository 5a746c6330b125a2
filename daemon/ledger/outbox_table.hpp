// Notices, each told once for ever by its id, and a row for each place it must be delivered to: the alert log and every
// webhook of the plant, in the order of commit.
#pragma once

#include <SQLiteCpp/SQLiteCpp.h>

#include <span>
#include <string>
#include <vector>

#include "daemon/ledger/records.hpp"

namespace slipledger::ledger {

// Threads: one at a time, within the caller's transaction.
class OutboxTable {
public:
    OutboxTable(SQLite::Database& database, std::vector<std::string> targets);

    // Ids already told are passed over.
    void tell(std::span<const Notice> notices);
    void update(const DeliveryUpdate& update);

private:
    SQLite::Database& database_;
    std::vector<std::string> targets_;
    SQLite::Statement notice_;
    SQLite::Statement row_;
    SQLite::Statement update_;
};

}  // namespace slipledger::ledger
