#include "daemon/ledger/point_rows.hpp"

#include <algorithm>
#include <cmath>

#include "daemon/ledger/statement.hpp"

namespace slipledger::ledger {
namespace {

constexpr std::size_t most_reserved = 200'000;  // 1.6 MB a column
constexpr double no_value = std::numeric_limits<double>::quiet_NaN();

}  // namespace

std::vector<double>& PointRowsBuilder::column(std::size_t quantity) {
    std::vector<double>& values = rows_.columns[quantity];
    values.resize(rows_.times.size(), no_value);
    return values;
}

void PointRowsBuilder::add(const HourCells& cells) {
    const auto& offsets = cells.offsets();
    const auto place = [&](std::int64_t time) {
        const std::int64_t offset = std::clamp<std::int64_t>(time - cells.hour(), 0, hour_ms);
        return std::ranges::lower_bound(offsets, static_cast<std::int32_t>(offset)) - offsets.begin();
    };
    const auto first = place(from_);
    const auto last = place(to_);
    if (first >= last) return;
    const std::size_t before = rows_.times.size();
    const std::size_t expected = std::min(hours_ * offsets.size(), most_reserved);
    if (before == 0) rows_.times.reserve(expected);
    for (auto i = first; i < last; ++i)
        rows_.times.push_back(instant_of(cells.hour() + offsets[static_cast<std::size_t>(i)]));
    for (std::size_t q = 0; q < analytics::quantity_count; ++q) {
        const auto& values = cells.column(q).values;
        if (values.empty()) continue;
        std::vector<double>& into = rows_.columns[q];
        if (into.empty()) into.reserve(expected);
        into.resize(before, no_value);
        into.insert(into.end(), values.begin() + first, values.begin() + last);
    }
}

void PointRowsBuilder::add(const RecentRow& row) {
    rows_.times.push_back(instant_of(row.time));
    for (std::size_t q = 0; q < analytics::quantity_count; ++q)
        if (!std::isnan(row.cells[q].value)) column(q).back() = row.cells[q].value;
}

void PointRowsBuilder::settle(std::int64_t time, std::size_t quantity, double value) {
    const auto found = std::ranges::lower_bound(rows_.times, instant_of(time));
    if (found == rows_.times.end() || *found != instant_of(time)) return;
    column(quantity)[static_cast<std::size_t>(found - rows_.times.begin())] = value;
}

PointRows PointRowsBuilder::finish() {
    for (std::vector<double>& values : rows_.columns) {
        if (values.empty()) continue;
        values.resize(rows_.times.size(), no_value);
        if (std::ranges::all_of(values, [](double value) { return std::isnan(value); })) values.clear();
    }
    return std::move(rows_);
}

}  // namespace slipledger::ledger
