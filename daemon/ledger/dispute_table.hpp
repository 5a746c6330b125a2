// The sets of values of disputed cells, each value with the feed that told it. A cell that is in here is marked disputed
// where it stands and has no value there.
#pragma once

#include <SQLiteCpp/SQLiteCpp.h>

#include "daemon/ledger/hour_cells.hpp"

namespace slipledger::ledger {

// Threads: one at a time, within the caller's transaction.
class DisputeTable {
public:
    explicit DisputeTable(SQLite::Database& database);

    // What HourCells and RecentTable want for one point. Valid as long as the table.
    AddDisputed adder(PointId point);

private:
    bool add(PointId point, const DisputedValue& told);

    SQLite::Statement find_;
    SQLite::Statement insert_;
    SQLite::Statement lower_feed_;
};

}  // namespace slipledger::ledger
