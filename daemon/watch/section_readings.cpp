#include "daemon/watch/section_readings.hpp"

#include <algorithm>
#include <cmath>

#include "daemon/watch/section_spec.hpp"

namespace slipledger::watch {
namespace {

using analytics::Instant;
using analytics::Quantity;
using analytics::Series;
using ledger::PointRows;

// Read at once: enough that the lead-in costs little, few enough that a reading a second stays under 40 MB.
constexpr std::chrono::hours read_at_once{48};

constexpr std::uint16_t bit(Quantity quantity) { return static_cast<std::uint16_t>(1U << index_of(quantity)); }
constexpr std::uint16_t every_quantity = (1U << analytics::quantity_count) - 1U;
constexpr std::uint16_t flows = bit(Quantity::case_drain_flow) | bit(Quantity::delivery_flow);
constexpr std::uint16_t all_but_flows = every_quantity & static_cast<std::uint16_t>(~flows);
constexpr std::uint16_t all_but_delivery = every_quantity & static_cast<std::uint16_t>(~bit(Quantity::delivery_flow));

Series series_of(const PointRows& rows, std::size_t quantity) {
    Series series;
    const std::vector<double>& column = rows.columns[quantity];
    series.times.reserve(column.size());
    series.values.reserve(column.size());
    for (std::size_t i = 0; i < column.size(); ++i) {
        if (std::isnan(column[i])) continue;
        series.times.push_back(rows.times[i]);
        series.values.push_back(column[i]);
    }
    return series;
}

std::optional<Instant> first_reading(const PointRows& rows, Quantity quantity) {
    const Series series = series_of(rows, index_of(quantity));
    return series.times.empty() ? std::nullopt : std::optional(series.times.front());
}

void add(std::vector<Source>& sources, const Source& source) {
    if (std::ranges::find(sources, source.point, &Source::point) == sources.end()) sources.push_back(source);
}

}  // namespace

std::vector<Source> sources_of(const ledger::Directory& directory, const config::Plant& plant, const config::Pump& pump,
                               const config::Section& section) {
    std::vector<Source> sources;
    const auto own = directory.point(pump.id, section.id);
    const auto shaft = directory.point(pump.id, "");
    if (own) add(sources, {*own, every_quantity, false});
    if (shaft && pump.sections.size() == 1) add(sources, {*shaft, every_quantity, false});
    if (shaft) add(sources, {*shaft, all_but_flows, true});
    if (const auto group = directory.drain_groups.find(section.drain_group); group != directory.drain_groups.end()) {
        const bool shared = drains_with_others(plant, section);
        add(sources, {group->second, shared ? all_but_flows : all_but_delivery, shared});
    }
    if (const auto tank = directory.reservoirs.find(pump.reservoir); tank != directory.reservoirs.end())
        add(sources, {tank->second, all_but_flows, false});
    return sources;
}

void fill_from(Series& nearer, const Series& farther) {
    if (farther.times.empty()) return;
    Series merged;
    std::size_t next = 0;  // of nearer
    for (std::size_t i = 0; i < farther.times.size(); ++i) {
        const Instant at = farther.times[i];
        for (; next < nearer.times.size() && nearer.times[next] <= at; ++next) {
            merged.times.push_back(nearer.times[next]);
            merged.values.push_back(nearer.values[next]);
        }
        if (next > 0 && nearer.times[next - 1] > at - outranked_for) continue;
        merged.times.push_back(at);
        merged.values.push_back(farther.values[i]);
    }
    const auto rest = static_cast<std::ptrdiff_t>(next);
    merged.times.insert(merged.times.end(), nearer.times.begin() + rest, nearer.times.end());
    merged.values.insert(merged.values.end(), nearer.values.begin() + rest, nearer.values.end());
    nearer = std::move(merged);
}

SectionReadings::SectionReadings(const ledger::Reader& reader, std::vector<Source> sources, Instant end)
    : reader_(reader), sources_(std::move(sources)), end_(end) {}

const analytics::SectionReadings& SectionReadings::covering(Instant from, Instant to) {
    const Instant begin = from - reach;
    if (begin < from_ || to > to_) load(begin, std::max(to, std::min(end_, from + read_at_once)));
    return readings_;
}

void SectionReadings::load(Instant from, Instant to) {
    readings_ = {};
    for (const Source& source : sources_) {
        const PointRows rows = reader_.rows(source.point, from, to);
        for (std::size_t quantity = 0; quantity < analytics::quantity_count; ++quantity) {
            if ((source.quantities >> quantity & 1U) == 0 || rows.columns[quantity].empty()) continue;
            Series series = series_of(rows, quantity);
            if (readings_[quantity].times.empty()) readings_[quantity] = std::move(series);
            else fill_from(readings_[quantity], series);
        }
        if (!source.shared_drain) continue;
        const auto shared = first_reading(rows, Quantity::case_drain_flow);
        if (shared && (!first_shared_drain_ || *shared < *first_shared_drain_)) first_shared_drain_ = shared;
    }
    from_ = from;
    to_ = to;
}

}  // namespace slipledger::watch
