#include "daemon/ledger/hour_cells.hpp"

#include <algorithm>
#include <cmath>

namespace slipledger::ledger {
namespace {

using analytics::quantity_count;

constexpr double empty_cell = std::numeric_limits<double>::quiet_NaN();

// Spreads a column over its new places; `place[i]` is where the old i-th cell goes.
template <typename Value>
void spread(std::vector<Value>& cells, std::span<const std::size_t> place, std::size_t size, Value filler) {
    if (cells.empty()) return;
    std::vector<Value> wider(size, filler);
    for (std::size_t i = 0; i < place.size(); ++i) wider[place[i]] = cells[i];
    cells = std::move(wider);
}

}  // namespace

Change enter(Cell& cell, const DisputedValue& told, const AddDisputed& add) {
    if (cell.disputed) return add(told) ? Change::added : Change::none;
    if (std::isnan(cell.value)) {
        cell = {.value = told.value, .feed = told.feed, .disputed = false};
        return Change::added;
    }
    if (cell.value == told.value) {
        if (told.feed >= cell.feed) return Change::none;
        cell.feed = told.feed;
        return Change::feed_only;
    }
    add({.time = told.time, .quantity = told.quantity, .value = cell.value, .feed = cell.feed});
    add(told);
    cell = {.value = empty_cell, .feed = 0, .disputed = true};
    return Change::added;
}

std::uint64_t HourCells::readings() const {
    std::uint64_t count = disputed();
    for (const Column& column : columns_)
        count += static_cast<std::uint64_t>(
            std::ranges::count_if(column.values, [](double value) { return !std::isnan(value); }));
    return count;
}

std::uint64_t HourCells::disputed() const {
    std::uint64_t count = 0;
    for (const Column& column : columns_)
        count += static_cast<std::uint64_t>(std::ranges::count(column.disputed, std::uint8_t{1}));
    return count;
}

HourCells::Column& HourCells::grown(std::size_t quantity) {
    Column& column = columns_[quantity];
    column.values.resize(offsets_.size(), empty_cell);
    column.feeds.resize(offsets_.size(), 0);
    return column;
}

// Adds the instants that are not there yet; `offsets` ascend, repeats allowed.
void HourCells::make_room(std::span<const std::int32_t> offsets) {
    std::vector<std::int32_t> all;
    all.reserve(offsets_.size() + offsets.size());
    std::ranges::set_union(offsets_, offsets, std::back_inserter(all));
    all.erase(std::unique(all.begin(), all.end()), all.end());
    if (all.size() == offsets_.size()) return;
    std::vector<std::size_t> place(offsets_.size());
    for (std::size_t i = 0, at = 0; i < offsets_.size(); ++i) {
        while (all[at] != offsets_[i]) ++at;
        place[i] = at;
    }
    for (Column& column : columns_) {
        spread(column.values, place, all.size(), empty_cell);
        spread(column.feeds, place, all.size(), std::uint16_t{0});
        spread(column.disputed, place, all.size(), std::uint8_t{0});
    }
    offsets_ = std::move(all);
}

Change HourCells::enter_at(std::size_t at, const DisputedValue& told, const AddDisputed& add) {
    Column& column = columns_[told.quantity].values.empty() ? grown(told.quantity) : columns_[told.quantity];
    Cell cell{.value = column.values[at],
              .feed = column.feeds[at],
              .disputed = !column.disputed.empty() && column.disputed[at] != 0};
    const Change change = enter(cell, told, add);
    column.values[at] = cell.value;
    column.feeds[at] = cell.feed;
    if (cell.disputed) {
        column.disputed.resize(offsets_.size(), 0);
        column.disputed[at] = 1;
    }
    return change;
}

Change HourCells::merge(std::span<const Row* const> rows, std::span<Change> changes, const AddDisputed& add) {
    std::vector<std::int32_t> offsets;
    offsets.reserve(rows.size());
    for (const Row* row : rows)
        offsets.push_back(static_cast<std::int32_t>(row->time.time_since_epoch().count() - hour_));
    if (!std::ranges::is_sorted(offsets)) {
        std::vector<std::int32_t> sorted = offsets;
        std::ranges::sort(sorted);
        make_room(sorted);
    } else {
        make_room(offsets);
    }
    Change greatest = Change::none;
    std::size_t at = 0;
    for (std::size_t i = 0; i < rows.size(); ++i) {
        if (at >= offsets_.size() || offsets_[at] != offsets[i]) {  // the next one, where rows come in order
            const auto found = std::ranges::lower_bound(offsets_, offsets[i]);
            at = static_cast<std::size_t>(found - offsets_.begin());
        }
        Change change = Change::none;
        for (std::size_t q = 0; q < quantity_count; ++q) {
            if ((rows[i]->present >> q & 1U) == 0 || !std::isfinite(rows[i]->value[q])) continue;
            const DisputedValue told{.time = hour_ + offsets[i],
                                     .quantity = q,
                                     .value = rows[i]->value[q] + 0.0,  // no negative zero: it would be another text
                                     .feed = static_cast<std::uint16_t>(rows[i]->feed)};
            change = std::max(change, enter_at(at, told, add));
        }
        changes[i] = change;
        greatest = std::max(greatest, change);
        ++at;
    }
    return greatest;
}

void HourCells::append(std::int32_t offset, std::span<const Cell> cells) {
    offsets_.push_back(offset);
    for (std::size_t q = 0; q < quantity_count; ++q) {
        Column& column = columns_[q];
        if (column.values.empty() && std::isnan(cells[q].value) && !cells[q].disputed) continue;
        grown(q);
        column.values.back() = cells[q].value;
        column.feeds.back() = cells[q].feed;
        if (column.disputed.empty() && !cells[q].disputed) continue;
        column.disputed.resize(offsets_.size(), 0);
        column.disputed.back() = cells[q].disputed ? 1 : 0;
    }
}

void HourCells::merge(const HourCells& other, const AddDisputed& add) {
    make_room(other.offsets_);
    for (std::size_t q = 0; q < quantity_count; ++q) {
        const Column& theirs = other.columns_[q];
        for (std::size_t i = 0, at = 0; i < theirs.values.size(); ++i) {
            while (offsets_[at] != other.offsets_[i]) ++at;
            if (!std::isnan(theirs.values[i])) {
                enter_at(at, {hour_ + offsets_[at], q, theirs.values[i], theirs.feeds[i]}, add);
            } else if (!theirs.disputed.empty() && theirs.disputed[i] != 0) {  // its set is in the table already
                Column& mine = grown(q);
                if (!std::isnan(mine.values[at])) add({hour_ + offsets_[at], q, mine.values[at], mine.feeds[at]});
                mine.values[at] = empty_cell;
                mine.feeds[at] = 0;
                mine.disputed.resize(offsets_.size(), 0);
                mine.disputed[at] = 1;
            }
        }
    }
}

void HourCells::clear(std::int64_t hour) {
    hour_ = hour;
    offsets_.clear();
    for (Column& column : columns_) {
        column.values.clear();
        column.feeds.clear();
        column.disputed.clear();
    }
}

}  // namespace slipledger::ledger
