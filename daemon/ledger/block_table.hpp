// Closed hours, one compressed row each. Readers and the writer get at a block's cells through here only.
#pragma once

#include <SQLiteCpp/SQLiteCpp.h>

#include <functional>

#include "daemon/ledger/block_format.hpp"

namespace slipledger::ledger {

// A block as it stands in the table; id 0: it does not. Threads: a value, share freely.
struct BlockAt {
    std::int64_t id = 0;
    std::uint64_t readings = 0;
    std::uint64_t disputed = 0;
};

// Threads: one at a time, within the caller's transaction.
class BlockTable {
public:
    explicit BlockTable(SQLite::Database& database);

    // Fills `cells`, whose hour tells which.
    BlockAt load(PointId point, HourCells& cells);
    // `before` as load() gave it. Keeps the point's totals.
    void save(PointId point, const BlockAt& before, const HourCells& cells);

private:
    BlockCodec codec_;
    SQLite::Statement find_;
    SQLite::Statement insert_;
    SQLite::Statement update_;
    SQLite::Statement totals_;
};

// Blocks of hours that overlap [from, to), ascending. Threads: one at a time.
class BlockScan {
public:
    explicit BlockScan(SQLite::Database& database);
    std::size_t count(PointId point, std::int64_t from, std::int64_t to);
    void each(PointId point, std::int64_t from, std::int64_t to, const std::function<void(const HourCells&)>& visit);

private:
    BlockCodec codec_;
    SQLite::Statement count_;
    SQLite::Statement rows_;
};

}  // namespace slipledger::ledger
