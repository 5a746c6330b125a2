// Readings of hours that still fill, one row an instant, in order of time so that a commit writes the end of the table and
// nothing else. What has been moved into a block stays here as a ghost until whole stretches can be deleted; the point's
// `moved_until` tells them apart.
#pragma once

#include <SQLiteCpp/SQLiteCpp.h>

#include <array>
#include <functional>
#include <optional>

#include "daemon/ledger/hour_cells.hpp"
#include "daemon/ledger/records.hpp"

namespace slipledger::ledger {

// One row of the table. Threads: a value, share freely.
struct RecentRow {
    std::int64_t time = 0;
    PointId point{};
    std::array<Cell, analytics::quantity_count> cells;
};

// Columns of `recent` in the order read_recent_row() wants them.
const std::string& recent_columns();
void read_recent_row(SQLite::Statement& statement, RecentRow& row);

// Threads: one at a time, within the caller's transaction.
class RecentTable {
public:
    explicit RecentTable(SQLite::Database& database);

    Change enter(const Row& row, const AddDisputed& add);

    // Rows of [from, to) whose point `wanted` accepts, ascending by time.
    void scan(std::int64_t from, std::int64_t to, const std::function<bool(PointId)>& wanted,
              const std::function<void(const RecentRow&)>& each);

    // Deletes ghosts of [from, to), looking at about `most` rows; returns up to where.
    std::int64_t delete_ghosts(std::int64_t from, std::int64_t to, std::size_t most);

    struct Extent {
        PointId point{};
        std::int64_t first = 0;
        std::int64_t last = 0;
        std::size_t rows = 0;
    };
    std::vector<Extent> extents();  // of rows that are no ghosts; reads the whole table

private:
    Change merge(const Row& row, const AddDisputed& add);

    SQLite::Database& database_;
    SQLite::Statement insert_;
    SQLite::Statement find_;
    SQLite::Statement update_;
    SQLite::Statement scan_;
    SQLite::Statement chunk_end_;
    SQLite::Statement delete_;
};

}  // namespace slipledger::ledger
