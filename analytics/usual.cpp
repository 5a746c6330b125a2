#include "analytics/usual.hpp"

#include <algorithm>
#include <cmath>
#include <cstddef>
#include <vector>

#include "analytics/stats/quantile.hpp"

namespace slipledger::analytics {
namespace {

constexpr double hold_in_intervals = 1.5;        // one late row is forgiven, a missing one is not
constexpr Milliseconds shortest_hold{1500};      // at one reading a second, as above
constexpr double plateau_search_fraction = 0.1;  // a setting further off than this is not the plant file's any more
constexpr double plateau_least_share = 0.05;
constexpr std::size_t plateau_least_count = 10;

struct Slice {
    std::size_t begin;
    std::size_t end;
};

Slice slice_of(const Series& series, Instant begin, Instant end) {
    const auto first = std::lower_bound(series.times.begin(), series.times.end(), begin);
    const auto last = std::lower_bound(first, series.times.end(), end);
    return {.begin = static_cast<std::size_t>(first - series.times.begin()),
            .end = static_cast<std::size_t>(last - series.times.begin())};
}

double median_spacing_s(const Series& series, Slice slice) {
    if (slice.end < slice.begin + 3) return 0.0;
    std::vector<double> spacings;
    spacings.reserve(slice.end - slice.begin - 1);
    for (std::size_t i = slice.begin + 1; i < slice.end; ++i)
        spacings.push_back(static_cast<double>((series.times[i] - series.times[i - 1]).count()) / 1000.0);
    return stats::median(std::move(spacings));
}

bool near_setting(double pressure_bar, const SectionSpec& spec) {
    return std::abs(pressure_bar - spec.compensator_bar) <= plateau_search_fraction * spec.compensator_bar;
}

// Where a plateau stands, pressures lie densest: slide a band of the plateau's width over them.
double plateau_bar(const Series& pressure, Slice slice, const SectionSpec& spec) {
    std::vector<double> near;
    for (std::size_t i = slice.begin; i < slice.end; ++i)
        if (near_setting(pressure.values[i], spec)) near.push_back(pressure.values[i]);
    std::sort(near.begin(), near.end());
    std::size_t densest_first = 0;
    std::size_t densest_count = 0;
    for (std::size_t first = 0, last = 0; first < near.size(); ++first) {
        while (last < near.size() && near[last] <= near[first] * (1.0 + 2.0 * spec.plateau_fraction)) ++last;
        if (last - first < densest_count) continue;  // of equal bands the highest: a plateau has nothing above it
        densest_first = first;
        densest_count = last - first;
    }
    const double readings = static_cast<double>(slice.end - slice.begin);
    if (densest_count < plateau_least_count || static_cast<double>(densest_count) < plateau_least_share * readings)
        return 0.0;
    const auto begin = near.begin() + static_cast<std::ptrdiff_t>(densest_first);
    return stats::median({begin, begin + static_cast<std::ptrdiff_t>(densest_count)});
}

Milliseconds usual_hold(std::span<const DayFacts> days, std::size_t quantity) {
    std::vector<double> intervals;
    for (const DayFacts& day : days)
        if (day.interval_s[quantity] > 0.0) intervals.push_back(day.interval_s[quantity]);
    if (intervals.empty()) return first_hold;
    const double hold_ms = hold_in_intervals * 1000.0 * stats::median(std::move(intervals));
    return std::clamp(Milliseconds{std::llround(hold_ms)}, shortest_hold, longest_hold);
}

}  // namespace

DayFacts day_facts(const SectionReadings& readings, const SectionSpec& spec, Instant begin, Instant end) {
    DayFacts facts;
    for (std::size_t i = 0; i < quantity_count; ++i)
        facts.interval_s[i] = median_spacing_s(readings[i], slice_of(readings[i], begin, end));
    const Series& pressure = readings[index_of(Quantity::outlet_pressure)];
    if (spec.control == Control::pressure_compensated)
        facts.plateau_bar = plateau_bar(pressure, slice_of(pressure, begin, end), spec);
    return facts;
}

Usual usual_from(std::span<const DayFacts> days, const SectionSpec& spec,
                 const std::array<Milliseconds, quantity_count>& given_hold) {
    Usual usual;
    for (std::size_t i = 0; i < quantity_count; ++i)
        usual.hold[i] = given_hold[i] > Milliseconds{0} ? std::min(given_hold[i], longest_hold) : usual_hold(days, i);
    std::vector<double> plateaus;
    for (const DayFacts& day : days)
        if (day.plateau_bar > 0.0 && near_setting(day.plateau_bar, spec)) plateaus.push_back(day.plateau_bar);
    if (!plateaus.empty()) usual.plateau_bar = stats::median(std::move(plateaus));
    return usual;
}

}  // namespace slipledger::analytics
