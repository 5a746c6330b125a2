// Writes what the analyst found: for each track everything from an instant on is replaced, so that a recomputation leaves
// nothing of the former one behind.
#pragma once

#include <SQLiteCpp/SQLiteCpp.h>

#include "daemon/ledger/records.hpp"

namespace slipledger::ledger {

// Threads: one at a time, within the caller's transaction.
class JudgementStore {
public:
    explicit JudgementStore(SQLite::Database& database);

    void store(const TrackResult& result);
    void store(PumpId pump, const DayFactsRecord& record);

private:
    void remove_from(const TrackResult& result);
    void keep_few_checkpoints(TrackId track);

    SQLite::Statement delete_summaries_;
    SQLite::Statement delete_days_;
    SQLite::Statement delete_checkpoints_;
    SQLite::Statement delete_changes_;
    SQLite::Statement delete_priors_;
    SQLite::Statement summary_;
    SQLite::Statement moments_;
    SQLite::Statement day_;
    SQLite::Statement day_facts_;
    SQLite::Statement change_;
    SQLite::Statement prior_;
    SQLite::Statement checkpoint_;
    SQLite::Statement checkpoint_dates_;
    SQLite::Statement delete_checkpoint_;
};

}  // namespace slipledger::ledger
