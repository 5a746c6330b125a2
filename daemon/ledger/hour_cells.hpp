// The readings of one point in one hour as a table of cells, and the rule by which a value enters a cell. A cell is a set
// of values: the first fills it, a repeat changes nothing, a second, different one makes it disputed and the set moves to the
// table `dispute`. Of several feeds that told the same value the lowest id is kept. So order and repeats cannot matter.
#pragma once

#include <array>
#include <cstddef>
#include <cstdint>
#include <functional>
#include <limits>
#include <span>
#include <vector>

#include "analytics/quantity.hpp"
#include "daemon/ledger/records.hpp"

namespace slipledger::ledger {

inline constexpr std::int64_t hour_ms = 3'600'000;

constexpr std::int64_t floor_to(std::int64_t ms, std::int64_t step) {
    const std::int64_t rest = ms % step;
    return ms - (rest < 0 ? rest + step : rest);
}

// One value of a disputed cell. Threads: a value, share freely.
struct DisputedValue {
    std::int64_t time = 0;
    std::size_t quantity = 0;
    double value = 0.0;
    std::uint16_t feed = 0;
};

// Puts a value into the set of a disputed cell; true: it was not in it.
using AddDisputed = std::function<bool(const DisputedValue&)>;

enum class Change : std::uint8_t { none, feed_only, added };

// Threads: a value, share freely.
struct Cell {
    double value = std::numeric_limits<double>::quiet_NaN();
    std::uint16_t feed = 0;
    bool disputed = false;
};

Change enter(Cell& cell, const DisputedValue& told, const AddDisputed& add);

// Threads: one at a time.
class HourCells {
public:
    // Cells of one quantity, as long as `offsets()`; all empty vectors where the quantity does not occur.
    struct Column {
        std::vector<double> values;          // NaN: empty or disputed
        std::vector<std::uint16_t> feeds;    // 0 where the value is NaN
        std::vector<std::uint8_t> disputed;  // empty vector: none is
    };

    explicit HourCells(std::int64_t hour) : hour_(hour) {}

    std::int64_t hour() const { return hour_; }
    bool empty() const { return offsets_.empty(); }
    const std::vector<std::int32_t>& offsets() const { return offsets_; }  // ms into the hour, ascending
    const Column& column(std::size_t quantity) const { return columns_[quantity]; }
    std::uint64_t readings() const;  // cells with a value, disputed ones included
    std::uint64_t disputed() const;

    // Rows of this hour and point in any order; earlier in the span counts as told earlier. `changes`, one per row, tells
    // what each did. Returns the greatest of them.
    Change merge(std::span<const Row* const> rows, std::span<Change> changes, const AddDisputed& add);

    // A cell as it stood in `recent` (or in another block): a whole row at once. Times must ascend.
    void append(std::int32_t offset, std::span<const Cell> cells);
    // Cells of the same point and hour from elsewhere.
    void merge(const HourCells& other, const AddDisputed& add);

    void clear(std::int64_t hour);

    // For the decoder, which fills them in place: a reader goes through tens of thousands of hours.
    struct Parts {
        std::vector<std::int32_t>& offsets;
        std::array<Column, analytics::quantity_count>& columns;
    };
    Parts parts() { return {offsets_, columns_}; }

private:
    void make_room(std::span<const std::int32_t> offsets);
    Column& grown(std::size_t quantity);
    Change enter_at(std::size_t at, const DisputedValue& told, const AddDisputed& add);

    std::int64_t hour_;
    std::vector<std::int32_t> offsets_;
    std::array<Column, analytics::quantity_count> columns_;
};

}  // namespace slipledger::ledger
