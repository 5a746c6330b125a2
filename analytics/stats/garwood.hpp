// Exact bounds for a count that came about by chance: how often alarms, failures or faults really happen, when only so
// many were seen. For rates divide both by the exposure (section-years, hours).
#pragma once

#include <cstdint>

namespace slipledger::analytics::stats {

// Expected counts that would give the count seen, or one further out, with the probability asked for.
struct CountBounds {
    double low = 0.0;
    double high = 0.0;
};

// Garwood's bounds on the mean of a Poisson count.
//
//   low = chi2(tail; 2 n) / 2,   high = chi2(1 - tail; 2 n + 2) / 2
//
//   n      count   -   0, 1, 2 ...
//   tail   tail    -   0 < tail < 0.5: probability left out on each side; 0.05 for one-sided 95 %, two-sided 90 %
//
// Returns expected counts, low 0 for a count of 0; NaN where the tail is out of range. Never too narrow, whatever n.
// Example: 0 alarms, one-sided 95 % -> high 2.996: 150 section-years without any show a rate under 0.02.
// Source: F. Garwood, Fiducial limits for the Poisson distribution, Biometrika 28 (1936) (from memory).
CountBounds garwood_bounds(std::uint64_t count, double tail);

}  // namespace slipledger::analytics::stats
