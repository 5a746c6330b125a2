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

// Leakage at the reference point at this growth / when healthy, of the part a meter of this kind sees. New oil, no
// constant flows: the truth the judging side is held against.
double true_ratio(const Life& life, const Fitted& fitted, const Oil& oil, const Duty& rated, double growth);

// The growth at which true_ratio() is `ratio` (>= 1).
double growth_for(const Life& life, const Fitted& fitted, const Oil& oil, const Duty& rated, double ratio);

// How a life's gaps have grown: prepared once, then asked. Threads: immutable, share freely.
class WearCourse {
public:
    // `year_hours` are the running hours of the life at the year's end.
    WearCourse(const Life& life, const Fitted& fitted, const Oil& oil, const Duty& rated, double year_hours);

    // Growth after `hours` in service, at `time`.
    double growth(double hours, Millis time) const;

private:
    Wear wear_;
    double year_hours_;
    double end_growth_;
    double step_growth_;
};

}  // namespace slipledger::plantsim
