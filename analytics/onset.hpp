// Since when a section has been worn: days that have been judged are looked back on with what was seen later. What was
// said of each day stays said; only the day on which it began is quoted from here.
#pragma once

#include <cstdint>
#include <optional>
#include <span>

#include "analytics/course.hpp"

namespace slipledger::analytics {

inline constexpr std::size_t looked_back_days = 180;  // judged days at most

// Dates as days since 1970.
struct Onset {
    std::int32_t date = 0;
    std::int32_t low = 0;  // as likely as not to have begun by `date`; one time in ten by `low`, nine in ten by `high`
    std::int32_t high = 0;
    bool earlier = false;  // it was there on the first day looked at: `low` is not known
};

// From the newest `looked_back_days` judged days of one life, ascending: wear x of each day is smoothed, and the onset
// is the first day of the last unbroken run of days on which it was more likely than not beyond 5 %:
//
//   P(x_t > ln 1.05 | all days) >= 0.5   (0.1 for low, 0.9 for high)
//
// nullopt where the last day is not beyond it, or nothing was judged. A day on which wear was let go moves more.
// Example: a step to 1.5 on day 40 of 60 -> date 40, low and high within a day or two.
// Source: H. E. Rauch, F. Tung and C. T. Striebel, AIAA Journal 3 (1965) (from memory); method.md, 5.
std::optional<Onset> onset_of(std::span<const DayVerdict> days, Basis basis);

}  // namespace slipledger::analytics
