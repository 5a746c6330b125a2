// What lies ahead of a section, from the filter as it stands: how fast its ratio grows, which limit comes first, and
// the running hours until then.
#pragma once

#include <optional>
#include <string_view>

#include "analytics/course.hpp"
#include "analytics/rated_efficiency.hpp"
#include "analytics/wear_filter.hpp"
#include "analytics/wear_laws.hpp"

namespace slipledger::analytics {

// An act limit as the leakage ratio at which it is reached, and whose it is; NaN and empty where there is none.
struct RatioLimit {
    double ratio = unknown;
    std::string_view rule;
};

// The earliest of the act limits on ratio, efficiency and, by drain, drain share at the reference point:
//
//   L_ratio = act,   L_eff = 1 + act points / (100 q0 / q_th),   L_share = act percent / (100 q0 / q_th)
//
//   q0   healthy leakage, of efficiency at the point it is quoted at   q_th   theoretical flow there
//
// Example: act at 3 and 10 points, 4 % healthy slip -> 3; 6 % -> 2.667, by efficiency.
// Source: method.md, 6.
RatioLimit first_limit(const WearFilter& filter, const SectionSpec& spec, Basis basis,
                       const RatedEfficiency& efficiency);

// Running hours to a limit by the wear laws: low is always filled, mid and high once a drift is established or the
// limit is behind. NaN where never reached. Source: method.md, 6.
HoursInHand hours_to(const WearLaws& laws, const LifePrior& prior, const RatioLimit& limit, bool drift_established);

// Change of the ratio itself per 1000 running hours: w v 1000 / 24, low and high by what is not known of v over all
// laws. NaN before the baseline is learned. Example: w = 1.2, v = 0.001 a day -> 0.05. Source: definition.
Ranged growth_per_1000_h(double ratio, const DriftEstimate& drift);

// The instant that many running hours lie ahead of `from` at a duty in running hours a calendar day. nullopt where
// either is no number, nothing runs, or it is more than 50 years off. Example: 160 h at 16 h a day -> ten days later.
// Source: definition.
std::optional<Instant> instant_ahead(Instant from, double hours, double duty_h_per_day);

}  // namespace slipledger::analytics
