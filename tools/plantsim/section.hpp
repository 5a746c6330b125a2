// One section as it works: its gaps under strain, what reaches the drain and what the outlet, and how far it is worn.
#pragma once

#include "tools/plantsim/drawing.hpp"

namespace slipledger::plantsim {

// Leakage of one section in L/min. Threads: a value, share freely.
struct Leakage {
    double to_drain_lpm = 0.0;
    double inside_lpm = 0.0;  // back to the inlet, unseen by a drain meter
};

Leakage leakage(const Life& life, const Oil& oil, const Strain& strain, double rated_bar);

// Flow at the outlet in L/min, the oil as dense as at the inlet; `stroke` is the share of full displacement.
double delivered_lpm(const Life& life, const Oil& oil, const Strain& strain, double rated_bar, double stroke);

// 75 % of rated pressure, rated speed and temperature: where leakage ratios are quoted.
Strain reference_point(const Duty& rated);
Strain rated_point(const Duty& rated);

Seen seen_by(const Fitted& fitted);  // the drain's, where that is metered

// Leakage at the reference point at this growth / when healthy, as far as it is seen. New oil, no constant flows: the
// truth the judging side is held against.
double true_ratio(const Life& life, Seen seen, const Oil& oil, const Duty& rated, double growth);

// Volumetric efficiency at this point, a fraction: what a meter at the outlet or in the drain would make of it if it
// and the displacement were known exactly. New oil, no constant flows.
double true_efficiency(const Life& life, Seen seen, const Oil& oil, Strain point, double rated_bar, double growth);

// The growth at which true_ratio() is `ratio` (>= 1).
double growth_for(const Life& life, Seen seen, const Oil& oil, const Duty& rated, double ratio);

}  // namespace slipledger::plantsim
