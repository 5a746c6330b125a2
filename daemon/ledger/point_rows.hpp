// Puts blocks and recent rows of one point together as columns. What a reader gets must not tell where a row lay.
#pragma once

#include "daemon/ledger/hour_cells.hpp"
#include "daemon/ledger/reader.hpp"
#include "daemon/ledger/recent_table.hpp"

namespace slipledger::ledger {

// Rows come in ascending order of time. Threads: one at a time.
class PointRowsBuilder {
public:
    // `hours`: how many blocks will come, so that room is made once.
    PointRowsBuilder(std::int64_t from, std::int64_t to, std::size_t hours) : from_(from), to_(to), hours_(hours) {}

    void add(const HourCells& cells);
    void add(const RecentRow& row);
    // A disputed cell of which one value was found to hold.
    void settle(std::int64_t time, std::size_t quantity, double value);
    PointRows finish();

private:
    std::vector<double>& column(std::size_t quantity);

    std::int64_t from_;
    std::int64_t to_;
    std::size_t hours_;
    PointRows rows_;
};

}  // namespace slipledger::ledger
