// A slope that a few wild days cannot bend, with its interval: the median of the slopes of all pairs.
#pragma once

#include <span>

namespace slipledger::analytics::stats {

struct SlopeRange {
    double value = 0.0;
    double low = 0.0;
    double high = 0.0;
};

// Median of the slopes of all pairs with unlike x, and between which of the ordered slopes the true one lies:
//
//   var S = factor [n (n-1) (2n+5) - ties of x and of y] / 18,   ranks (N -+ z sqrt(var S)) / 2
//
//   x, y     xs, ys             any unit   as many of one as of the other
//   z        of share           -          0 < share < 1: two-sided, of the standard normal
//   factor   variance_factor    -          1: days independent; else how much more Kendall's S varies
//   (mann_kendall.hpp) N                           -          slopes
//
// Returns unit of y over unit of x; NaN where no two x differ. Breaks down only once 29 % of the values are wild.
// Example: y = 1, 2, 3, 10 at x = 0, 1, 2, 3 -> slopes 1, 1, 1, 3, 4, 7 -> 2.
// Source: P. K. Sen, Estimates of the regression coefficient based on Kendall's tau, JASA 63 (1968) (from memory).
SlopeRange theil_sen(std::span<const double> xs, std::span<const double> ys, double share,
                     double variance_factor = 1.0);

}  // namespace slipledger::analytics::stats
