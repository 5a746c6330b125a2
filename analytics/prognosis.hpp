// Running hours in hand: when the leakage ratio first reaches its limit, from what each wear law knows of wear and its
// rate, over all laws. By quadrature, without random numbers. That the rate will not stay what it is counts too: else
// the ranges come out too narrow.
#pragma once

#include <array>

#include "analytics/life_prior.hpp"
#include "analytics/section_spec.hpp"
#include "analytics/wear_laws.hpp"

namespace slipledger::analytics {

// How far a rate wanders while wear goes on, as ln of a factor, per root of ln ratio: by the time the ratio has grown
// e-fold the rate may be 1.65 times what it was, or 1 / 1.65. Settled on simulated sections, so that ranges hold.
inline constexpr double rate_wander = 0.5;

// What the laws say, how long such sections last, and where it ends.
struct WearOutlook {
    std::array<LawBelief, wear_laws> laws{};
    LifePrior prior{};
    double ln_limit = unknown;  // ln of the ratio not to be reached
    double wander = rate_wander;
    double jitter = wear_jitter;
};

// Running hours until then; infinity where never.
struct PassageQuantiles {
    double low_h = unknown;   // 10 %
    double mid_h = unknown;   // 50 %
    double high_h = unknown;  // 90 %
};

// Rate at ratio 1, per running day, at which a law takes a life of that many hours from new to a ratio of 3:
//
//   r = 24 (3^(1-k) - 1) / ((1 - k) hours)
//
//   k      power      -   any; at 1 the limit 24 ln 3 / hours
//   hours  life_h     h   > 0
//
// Returns 1/running day. Example: k = 0, 4800 h -> 0.01. Source: method.md, 6 (dw/dt = rate w^k, integrated).
double rate_of_life(double power, double life_h);

// Share of the outlook in which the limit is reached within `hours`. For each law, with c = (L^(1-k) - w^(1-k)) /
// (1-k):
//
//   T = 24 c / r,   p(r) ~ lognormal(r; prior) normal(r; what the days say),   x given r
//   ln T  normal about that, variance  wander^2 (ln L - x) / 3 + var(x) (dc/dx / c)^2 + ln(1 + jitter^2 / (v (ln L -
//   x)))
//
// the first for a rate that wanders on the way (the mean of a Brownian motion over its path), the last that of an
// inverse Gaussian. Seven points over ln r. Returns a share 0..1; NaN where something is not known. Example: x = 0, k =
// 0, r = 0.01 exactly, L = 3, no wander -> T = 4800 h. Source: method.md, 6 (first passage; wear laws after Whitmore
// and Schenkelberg 1997; Folks and Chhikara 1978).
double passage_share(const WearOutlook& outlook, double hours);

// Quantiles of the same: low, mid, high at 10, 50, 90 %; 0 where under an hour, infinity beyond 10^6 h.
// Source: method.md, 6.
PassageQuantiles passage_quantiles(const WearOutlook& outlook);

}  // namespace slipledger::analytics
