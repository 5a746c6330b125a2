// How wear, its drift and the slow disturbance move by themselves from one look to the next: the part of the wear
// filter that its smoother, which looks back over stored days, must know as well.
#pragma once

#include "analytics/section_spec.hpp"
#include "analytics/stats/kalman.hpp"

namespace slipledger::analytics {

// Order of the three: x, v, u as in WearState.
inline constexpr int moving_states = 3;

// What is added to the variance of x where a jump is suspected: method.md, 5.
inline constexpr double jump_variance = 0.35 * 0.35;

struct WearMotion {
    stats::StateMatrix<moving_states> motion = stats::StateMatrix<moving_states>::Identity();
    stats::StateMatrix<moving_states> noise = stats::StateMatrix<moving_states>::Zero();
};

// Motion of wear, drift and disturbance:
//
//   x' = x + v d,   v' = v,   u' = phi u,   phi = exp(-c / 10)
//
//   d  running_days    24 running hours   >= 0
//   c  calendar_days   days               >= 0
//
// with variance 0.004^2 d + 0.0006^2 d^3/3 on x, 0.0006^2 d on v, 0.0006^2 d^2/2 between them, s^2 (1 - phi^2) on u,
// s = disturbance_spread. Negative spans count as none. Example: v = 0.001, 10 running days -> x grows by 0.01.
// Source: method.md, 5 (integrated random walk: Durbin and Koopman 2012).
WearMotion wear_motion(double running_days, double calendar_days, Basis basis);

}  // namespace slipledger::analytics
