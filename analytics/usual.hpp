// What is usual for a section: sampling interval of each quantity and the pressure plateau of a compensated pump. Fixed
// for each day from the seven days before it, so that a late row can change a known span and no more.
#pragma once

#include <array>
#include <cstdint>
#include <optional>
#include <span>

#include "analytics/instant.hpp"
#include "analytics/quantity.hpp"

namespace slipledger::analytics {

// What one day contributes. Plain values: stored as they are.
struct DayFacts {
    std::array<double, quantity_count> interval_s{};  // median spacing of the day's readings; 0: fewer than three
    double plateau_bar = 0.0;                         // where compensated pressure stood; 0: none seen
    friend bool operator==(const DayFacts&, const DayFacts&) = default;
};

inline constexpr int usual_days = 7;

struct Usual {
    std::array<Milliseconds, quantity_count> hold{};  // 1.5 usual intervals, or the plant file's; 15 min while unknown
    double plateau_bar = 0.0;                         // 0: by the plant file's setting alone
    friend bool operator==(const Usual&, const Usual&) = default;
};

}  // namespace slipledger::analytics
