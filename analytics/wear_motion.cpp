#include "analytics/wear_motion.hpp"

#include <algorithm>
#include <cmath>

#include "analytics/wear_prior.hpp"

namespace slipledger::analytics {

namespace {

constexpr double wear_walk = 0.004;        // per running day^0.5
constexpr double drift_walk = 0.0006;      // per running day^1.5
constexpr double disturbance_days = 10.0;  // calendar days

double square(double v) {
    return v * v;
}

}  // namespace

WearMotion wear_motion(double running_days, double calendar_days, Basis basis) {
    const double d = std::max(running_days, 0.0);
    const double phi = std::exp(-std::max(calendar_days, 0.0) / disturbance_days);
    WearMotion wear;
    wear.motion(0, 1) = d;
    wear.motion(2, 2) = phi;
    wear.noise(0, 0) = square(wear_walk) * d + square(drift_walk) * d * d * d / 3.0;
    wear.noise(0, 1) = wear.noise(1, 0) = square(drift_walk) * d * d / 2.0;
    wear.noise(1, 1) = square(drift_walk) * d;
    wear.noise(2, 2) = square(disturbance_spread(basis)) * (1.0 - phi * phi);
    return wear;
}

}  // namespace slipledger::analytics
