#include "analytics/rated_efficiency.hpp"

#include <cmath>

#include "analytics/flow.hpp"
#include "analytics/verdict.hpp"

namespace slipledger::analytics {

namespace {
constexpr double nearly_seen = 0.1;  // in ln dp, ln viscosity: a tenth beyond what was seen is no extrapolation
}

Ranged points_lost(double healthy_efficiency, const Ranged& leakage_ratio) {
    const double points = 100.0 * (1.0 - healthy_efficiency);
    return {.value = points * (leakage_ratio.value - 1.0),
            .low = points * (leakage_ratio.low - 1.0),
            .high = points * (leakage_ratio.high - 1.0)};
}

RatedEfficiency rated_efficiency(const WearFilter& filter, const SectionSpec& spec, Basis basis) {
    RatedEfficiency efficiency;
    efficiency.at_rated = filter.distance_from_seen(spec.rated) <= nearly_seen;
    const DutyPoint& at = efficiency.at_rated ? spec.rated : spec.reference;
    const double off = basis == Basis::delivery ? filter.belief().mean(displacement) : 0.0;
    const double flow = theoretical_flow_lpm(spec.displacement_cm3 - off, at.speed_rpm, spec.max_stroke_fraction);
    const Ranged leakage = quoted(filter.worn_leakage(at));
    const double healthy = std::exp(filter.healthy_leakage(at).ln);
    efficiency.now = {
        .value = 1.0 - leakage.value / flow, .low = 1.0 - leakage.high / flow, .high = 1.0 - leakage.low / flow};
    efficiency.healthy = 1.0 - healthy / flow;
    efficiency.points_per_ratio = 100.0 * healthy / flow;
    efficiency.points_lost = points_lost(efficiency.healthy, quoted(filter.wear()));
    return efficiency;
}

}  // namespace slipledger::analytics
