// Volumetric efficiency that days can be compared by: not what a pump happened to do, but what the filter says it would
// do at its rated point, or where that is outside what it has been seen to do, at its reference point.
#pragma once

#include "analytics/course.hpp"
#include "analytics/wear_filter.hpp"

namespace slipledger::analytics {

struct RatedEfficiency {
    Ranged now;                         // fraction
    double healthy = unknown;           // fraction, at ratio 1
    Ranged points_lost;                 // percent of theoretical flow
    double points_per_ratio = unknown;  // points lost per unit of ratio: 100 q0 / q_th
    bool at_rated = true;
};

// Points of efficiency lost at a ratio: lost = 100 (w - 1) (1 - eta0), with its range from the ratio's.
//
//   eta0   healthy_efficiency   fraction   volumetric, at ratio 1
//   w      leakage_ratio        -
//
// In percent of theoretical flow. Example: 0.97 at ratio 2 (1.8 to 2.2) -> 3 (2.4 to 3.6).
// Source: ISO 4409 definition.
Ranged points_lost(double healthy_efficiency, const Ranged& leakage_ratio);

// From healthy leakage q0, ratio w and theoretical flow q_th at the point:
//
//   eta = 1 - w q0 / q_th,   healthy = 1 - q0 / q_th,   lost = 100 (w - 1) q0 / q_th
//
// By drain an upper bound, since leakage that returns inside is not seen. The rated point counts as seen when it is
// within 0.1 in ln dp and ln viscosity of what was fed. NaN before the first feed. Example: q_th 100, q0 3, w 2 ->
// 0.94, healthy 0.97, lost 3. Source: ISO 4409 definition; method.md, 1 and 3.
RatedEfficiency rated_efficiency(const WearFilter& filter, const SectionSpec& spec, Basis basis);

}  // namespace slipledger::analytics
