// What is usual for a section: sampling interval of each quantity and the pressure plateau of a compensated pump. Fixed
// for each day from the seven days before it, so that a late row can change a known span and no more.
#pragma once

#include <algorithm>
#include <array>
#include <cstdint>
#include <span>

#include "analytics/instant.hpp"
#include "analytics/quantity.hpp"
#include "analytics/readings.hpp"
#include "analytics/section_spec.hpp"

namespace slipledger::analytics {

// What one day contributes. Plain values: stored as they are.
struct DayFacts {
    std::array<double, quantity_count> interval_s{};  // median spacing of the day's readings; 0: fewer than three
    double plateau_bar = 0.0;                         // where compensated pressure stood; 0: none seen
    friend bool operator==(const DayFacts&, const DayFacts&) = default;
};

inline constexpr int usual_days = 7;

// How long a reading stands while nothing is usual yet.
inline constexpr Milliseconds first_hold = std::chrono::minutes(15);

// No reading stands longer than this, whatever is usual or given: what a point depends on must be bounded, so that a
// summary can be made from a known span of readings.
inline constexpr Milliseconds longest_hold = std::chrono::hours(1);

struct Usual {
    std::array<Milliseconds, quantity_count> hold{};  // 1.5 usual intervals, or the plant file's; 15 min while unknown
    double plateau_bar = 0.0;                         // 0: by the plant file's setting alone
    friend bool operator==(const Usual&, const Usual&) = default;
};

// How long a reading of that quantity stands.
// Not computed: a look-up.
inline Milliseconds hold_of(const Usual& usual, Quantity quantity) {
    const Milliseconds hold = usual.hold[index_of(quantity)];
    return hold > Milliseconds{0} ? std::min(hold, longest_hold) : first_hold;
}

// Facts of one day, from its readings in [begin, end). Spacing is the median, so that gaps and stops do not count. The
// plateau is the median of the densest band of pressure within 10 % of the compensator's setting, where at least a
// twentieth of the day's readings (and ten of them) lie in it.
// Source: common practice, no source.
DayFacts day_facts(const SectionReadings& readings, const SectionSpec& spec, Instant begin, Instant end);

// What is usual on a day, from the facts of up to `usual_days` days before it, in any order: hold is 1.5 times the
// median of their spacings, at least 1.5 s, at most `longest_hold`. The plateau is the median of theirs, those more
// than 10 % off the compensator's present setting left out: they belong to another setting. `given_hold` is the plant
// file's: it outranks, 0 stands for none given. Source: common practice, no source.
Usual usual_from(std::span<const DayFacts> days, const SectionSpec& spec,
                 const std::array<Milliseconds, quantity_count>& given_hold);

}  // namespace slipledger::analytics
