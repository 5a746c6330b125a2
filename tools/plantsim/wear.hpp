// How far a life is worn after so many running hours, by the law its drawing gives.
#pragma once

#include <utility>
#include <vector>

#include "tools/plantsim/section.hpp"

namespace slipledger::plantsim {

// Prepared once, then asked. With s the share of the wearing hours that is over, w the leakage ratio and g the growth
// of the fastest gap, from (w0, g0) at the beginning to (w1, g1) at the span's end:
//
//   gap_power           g = g0 + (g1 - g0) s^bend
//   ratio_power         w = w0 + (w1 - w0) s^bend
//   ratio_rate          w = (w0^(1-bend) + s (w1^(1-bend) - w0^(1-bend)))^(1/(1-bend));   bend 1: w0 (w1 / w0)^s
//   ratio_exponential   w = w0 + (w1 - w0) (exp(bend s) - 1) / (exp(bend) - 1)
//
// Beyond the span s goes on above 1; growth ends at eight times the healthy gap. Threads: immutable, share freely.
class WearCourse {
public:
    // `span_hours` are the running hours of the life at the end of the simulated span.
    WearCourse(const Life& life, const Fitted& fitted, const Oil& oil, const Duty& rated, double span_hours);

    // Growth after `hours` in service, at `time`.
    double growth(double hours, Millis time) const;

private:
    double ratio_at(double share) const;
    double growth_of_ratio(double ratio) const;

    Wear wear_;
    double span_hours_;
    double first_growth_;
    double end_growth_;
    double step_growth_;
    std::vector<std::pair<double, double>> ratio_of_growth_{};  // (ratio, growth), ascending; empty: not needed
};

}  // namespace slipledger::plantsim
