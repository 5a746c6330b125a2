// What is kept of the wear filter at the end of each day, so that the days can be looked back on later without their
// summaries: wear, drift and disturbance with their covariance, and how well the baseline was known.
#pragma once

#include "analytics/life_prior.hpp"
#include "analytics/section_spec.hpp"

namespace slipledger::analytics {

// Threads: a value, share freely.
struct DayState {
    double wear = unknown;         // x, ln of the leakage ratio
    double drift = unknown;        // v, per running day
    double disturbance = unknown;  // u
    double wear_variance = unknown;
    double wear_drift_covariance = unknown;
    double drift_variance = unknown;
    double wear_disturbance_covariance = unknown;
    double drift_disturbance_covariance = unknown;
    double disturbance_variance = unknown;
    LawWeights laws{};            // of the wear laws, by the days alone; all 0 while the baseline is learned
    bool let_go = false;          // a jump was suspected on this day and wear was let go
};

}  // namespace slipledger::analytics
