// Second witnesses of wear: plain statistics on the days' own ratios, which know nothing of the filter's states. They
// are shown beside the verdict and never decide it.
#pragma once

#include <cstdint>
#include <optional>
#include <span>

#include "analytics/course.hpp"
#include "analytics/stats/single_change.hpp"

namespace slipledger::analytics {

struct Witnesses {
    int days = 0;                              // judged days looked at
    Ranged slope_per_1000_h;                   // Theil-Sen, 80 %, widened as the next for autocorrelation
    double rank_z = unknown;                   // Mann-Kendall corrected for autocorrelation
    double rank_p = unknown;                   // two-sided
    double cumulative_sum = unknown;           // of daily ln ratio, in ln-ratio-days
    std::optional<std::int32_t> sum_passed;    // first date of the present run beyond `sum_limit`
    Ranged weighted_mean;                      // the ratio, days weighted the less the older they are
    stats::Shape shape = stats::Shape::level;  // of the course of the days, by BIC
    std::optional<std::int32_t> changed;       // date of the step's first day, or of the last before the rise
};

inline constexpr double sum_slack = 0.18;  // in ln ratio: what a day may be off without counting
inline constexpr double sum_limit = 0.25;  // in ln-ratio-days

// Of the newest 180 judged days of one life, ascending. Slope and ranks: only days from `since` on (days since 1970),
// so that a trend is not thinned by the time before it began; the rest: all of them.
//
//   day's ratio   r = leakage / (leakage - excess),   its ln lowered by the baseline's standard error for the sum
//
// NaN where fewer than five days were judged. Source: method.md, 5; the functions of analytics/stats.
Witnesses witnesses_of(std::span<const DayVerdict> days, std::int32_t since);

}  // namespace slipledger::analytics
