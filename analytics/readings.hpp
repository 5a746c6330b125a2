// Readings as analysis takes them: a column of values over time for each quantity of one section, whatever the store or
// the feed looked like.
#pragma once

#include <array>
#include <vector>

#include "analytics/instant.hpp"
#include "analytics/quantity.hpp"

namespace slipledger::analytics {

// One quantity over time: ascending, no equal times, no NaN. Disputed and missing cells are simply not in it.
struct Series {
    std::vector<Instant> times;
    std::vector<double> values;
};

using SectionReadings = std::array<Series, quantity_count>;  // pump- and reservoir-level quantities already merged in

}  // namespace slipledger::analytics
