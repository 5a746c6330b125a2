// Running hours in hand: when the leakage ratio first reaches its limit, from what the filter knows of wear and its
// drift, over several wear laws, since which one a pump follows is not known. Simplest form: by quadrature, without
// random numbers; what the drift may still do on its own is not in it.
#pragma once

#include "analytics/section_spec.hpp"

namespace slipledger::analytics {

// Wear and drift as the filter holds them, and where it ends.
struct WearOutlook {
    double ln_ratio = unknown;        // x
    double drift_per_day = unknown;   // v, per running day
    double ratio_variance = unknown;  // of x
    double drift_variance = unknown;  // of v
    double covariance = 0.0;
    double ln_limit = unknown;  // ln of the ratio not to be reached
};

// Running hours until then; infinity where never.
struct PassageQuantiles {
    double low_h = unknown;   // 10 %
    double mid_h = unknown;   // 50 %
    double high_h = unknown;  // 90 %
};

// Share of the outlook in which the limit is reached within `hours`. Under dw/dt = rate w^k, with k at -0.6, 0, 0.6
// and 1.2 equally likely:
//
//   T = 24 [(L/w)^(1-k) - 1] / ((1 - k) v),   P(T <= t) = mean over k and x of Phi((E[v|x] - c / t) / sd[v|x])
//
// Returns a share 0..1; 1 where the limit is behind; NaN where something is not known.
// Example: x = 0, v = 0.01 exactly, L = 3 at k = 0 -> T = 4800 h; 110 h of it at ln law.
// Source: method.md, 6 (first passage; wear laws after Whitmore and Schenkelberg 1997).
double passage_share(const WearOutlook& outlook, double hours);

// Quantiles of the same, by bisection between a tenth of an hour and 10^6 h. Low, mid, high at 10, 50, 90 %.
// Source: method.md, 6.
PassageQuantiles passage_quantiles(const WearOutlook& outlook);

}  // namespace slipledger::analytics
