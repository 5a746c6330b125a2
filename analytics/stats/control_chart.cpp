#include "analytics/stats/control_chart.hpp"

#include <cmath>

namespace slipledger::analytics::stats {

CumulativeSum cumulative_sum(const CumulativeSum& before, double departure, double slack) {
    if (!std::isfinite(departure)) return before;
    return {.high = std::fmax(0.0, before.high + departure - slack),
            .low = std::fmax(0.0, before.low - departure - slack)};
}

double weighted_mean(double before, double value, double weight) {
    return std::isfinite(value) ? weight * value + (1.0 - weight) * before : before;
}

double weighted_mean_sd(double sd, double weight) {
    return sd * std::sqrt(weight / (2.0 - weight));
}

}  // namespace slipledger::analytics::stats
