// Two charts that see a small lasting shift before any single value shows it: a running sum of departures, and a mean
// that forgets. One step each; the caller keeps what was before.
#pragma once

namespace slipledger::analytics::stats {

// Both sums of a tabular cumulative sum chart, each 0 or more.
struct CumulativeSum {
    double high = 0.0;
    double low = 0.0;
};

// One value added:
//
//   high' = max(0, high + d - k),   low' = max(0, low - d - k)
//
//   d   departure   any unit        of the value from its target; NaN adds nothing
//   k   slack       the same, >= 0  departures that small are forgiven each time
//
// A shift is told once a sum passes a limit h. Returns the unit of the departure.
// Example: k = 0.3175, departures 3.325 and 2.25 from sums of 0 -> high 3.0075, then 4.94.
// Source: E. S. Page, Continuous inspection schemes, Biometrika 41 (1954); NIST/SEMATECH e-Handbook 6.3.2.3.
CumulativeSum cumulative_sum(const CumulativeSum& before, double departure, double slack);

// One value taken into an exponentially weighted mean: m' = w y + (1 - w) m.
//
//   m   before   any unit     y   value   the same; NaN changes nothing     w   weight   -   0 < w <= 1
//
// Returns the unit of the value. Example: 50, then 52 at weight 0.3 -> 50.6.
// Source: S. W. Roberts, Control chart tests based on geometric moving averages, Technometrics 1 (1959); NIST/SEMATECH
// e-Handbook 6.3.2.4.
double weighted_mean(double before, double value, double weight);

// How far such a mean of independent values strays by chance: sd sqrt(w / (2 - w)).
//
//   sd   sd   any unit   of one value   w   weight   -   0 < w <= 1
//
// Returns one standard deviation, the unit of sd; charts draw their limits at three.
// Example: sd 2.0539, weight 0.3 -> 0.8628: limits of 50 at 47.41 and 52.59.
// Source: Roberts 1959; NIST/SEMATECH e-Handbook 6.3.2.4.
double weighted_mean_sd(double sd, double weight);

}  // namespace slipledger::analytics::stats
