// Quantiles of a sample, as NumPy's default makes them, so that a figure can be checked with the tool at hand.
#pragma once

#include <vector>

namespace slipledger::analytics::stats {

// The value below which a share of the sample lies, straight between the two nearest ordered values.
//
//   h = (n - 1) p,   Q = x[floor h] + (h - floor h) (x[floor h + 1] - x[floor h])
//
//   x   sample   any unit   at least one value, no NaN; order does not matter
//   p   share    -          0..1
//
// Returns the unit of the sample; NaN for an empty sample or a share outside 0..1.
// Example: {1, 2, 4, 8} at 0.5 -> 3; at 0.9 -> 6.8.
// Source: R. J. Hyndman and Y. Fan, Sample quantiles in statistical packages (1996), type 7 (from memory); NumPy's
// default.
double quantile(std::vector<double> sample, double share);

// Quantile at one half.
// Returns the unit of the sample; NaN for an empty sample. Example: {3, 1, 2} -> 2.
// Source: as quantile.
double median(std::vector<double> sample);

}  // namespace slipledger::analytics::stats
