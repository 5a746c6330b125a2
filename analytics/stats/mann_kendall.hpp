// Whether a series rises or falls at all, by how often a later value is the larger one; also where successive values
// hang together, as daily figures of a pump do: there the plain test finds a trend in anything.
#pragma once

#include <span>

namespace slipledger::analytics::stats {

struct MannKendall {
    double s = 0.0;                // later values above earlier ones, less those below
    double variance = 0.0;         // of s, had the series no trend
    double variance_factor = 1.0;  // by which it was enlarged for autocorrelation
    double z = 0.0;                // s moved by one towards zero, over its standard deviation; positive: rising
    double p = 1.0;                // two-sided
};

// Sum over the groups of t equal values of t (t-1) (2t+5): what ties take from the variance of Kendall's S, times 18.
// Returns a pure number. Example: {1, 1, 2, 2, 2} -> 2 * 1 * 9 + 3 * 2 * 11 = 84.
// Source: M. G. Kendall, Rank Correlation Methods (1975) (from memory).
double tie_sum(std::span<const double> values);

// For independent values:
//
//   S = sum over i < j of sign(y_j - y_i),   var S = [n (n-1) (2n+5) - ties] / 18,   z = (S -+ 1) / sqrt(var S)
//
//   y   values   any unit, in time order, at least 3
//
// NaN for z and p under 3 values; 0 and 1 where all are equal. Example: 1, 2, 3, 4 -> S = 6, var 8.667, z = 1.698.
// Source: H. B. Mann, Nonparametric tests against trend, Econometrica 13 (1945); Kendall 1975 (from memory).
MannKendall mann_kendall(std::span<const double> values);

// The same with the variance enlarged for autocorrelation:
//
//   n / n* = 1 + 2 / (n (n-1) (n-2)) sum over lags k of (n-k) (n-k-1) (n-k-2) r_k
//
//   r_k   autocorrelation at lag k of the ranks of the series less its Theil-Sen line; only those beyond 1.96 / sqrt(n)
//
// The factor is held at 1 or more: a witness must not become surer because its neighbours disagree. NaN under 4 values.
// Example: 20 rising values with noise that hangs together at 0.7 -> factor about 3, z smaller by its root.
// Source: K. H. Hamed and A. R. Rao, A modified Mann-Kendall trend test for autocorrelated data, J. Hydrology 204
// (1998) (from memory).
MannKendall mann_kendall_autocorrelated(std::span<const double> values);

}  // namespace slipledger::analytics::stats
