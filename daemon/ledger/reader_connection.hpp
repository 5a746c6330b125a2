// What a Reader holds: its connection, its statements, kept prepared, and what it needs to decode blocks. Its questions are
// answered in reader_readings.cpp, reader_judgement.cpp and reader_notices.cpp.
#pragma once

#include <SQLiteCpp/SQLiteCpp.h>

#include <string>
#include <unordered_map>

#include "daemon/ledger/block_table.hpp"
#include "daemon/ledger/ledger.hpp"
#include "daemon/ledger/reader.hpp"
#include "daemon/ledger/settlement.hpp"
#include "daemon/ledger/statement.hpp"

namespace slipledger::ledger {

// Threads: one at a time.
struct Reader::Connection {
    explicit Connection(const std::string& path);

    // Ready to bind; stays prepared for the next time.
    SQLite::Statement& prepared(const std::string& sql);

    // Calls `read` for each row of a statement with these values bound.
    template <typename... Values, typename Read>
    void each(const std::string& sql, Read&& read, const Values&... values) try {
        SQLite::Statement& statement = prepared(sql);
        const Resetting reset(statement);
        Binder binder(statement);
        static_cast<void>((binder << ... << values));
        while (statement.executeStep()) read(statement);
    } catch (const SQLite::Exception& fault) {
        throw LedgerFailure(std::string("cannot read the ledger: ") + fault.what());
    }

    SQLite::Database database;
    std::unordered_map<std::string, SQLite::Statement> statements;
    BlockScan blocks;
};

}  // namespace slipledger::ledger
