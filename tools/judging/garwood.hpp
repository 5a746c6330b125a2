// Exact bounds of a rate from a count of rare events (Garwood 1936).
#pragma once

namespace slipledger::judging {

// What the mean of a Poisson count may be:
//
//   low = chi2(a / 2; 2 k) / 2,   high = chi2(1 - a / 2; 2 k + 2) / 2,   a = 1 - confidence
//
// chi2(p; f) being the quantile of the chi-squared distribution with f degrees of freedom; low is 0 at k = 0.
// Example: 0 events, 90 % between two bounds (95 % above one): 0 to 2.996.
struct CountBounds {
    double low = 0.0;
    double high = 0.0;
};
CountBounds garwood(int count, double confidence);

}  // namespace slipledger::judging
