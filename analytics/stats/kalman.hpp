// One step of a Kalman filter and of its smoother, for any small fixed number of states: what the wear filter is built
// on, and what is checked against other people's software on its own (tests/reference/kalman.py). The covariance is
// updated in Joseph's form, which stays symmetric and positive for any gain: also for one that was bounded, or in which
// states are only considered. Header only: it is a template. Source: B. D. O. Anderson and J. B. Moore, Optimal
// Filtering (1979); J. Durbin and S. J. Koopman, Time Series Analysis by State Space Methods (2012) (from memory).
#pragma once

#include <Eigen/Cholesky>
#include <Eigen/Core>

namespace slipledger::analytics::stats {

template <int N>
using StateVector = Eigen::Matrix<double, N, 1>;
template <int N>
using StateMatrix = Eigen::Matrix<double, N, N>;

// What is believed of N states: mean and covariance.
template <int N>
struct Belief {
    StateVector<N> mean = StateVector<N>::Zero();
    StateMatrix<N> covariance = StateMatrix<N>::Zero();
};

// One number seen, linear in the states: seen = design . state + noise of this variance.
template <int N>
struct Sighting {
    StateVector<N> design = StateVector<N>::Zero();
    double innovation = 0.0;  // seen less what was expected
    double variance = 0.0;    // of the noise; > 0
};

// Carries a belief over a step of time: mean' = F mean, covariance' = F P F' + Q.
//
//   F   motion   N x N
//   Q   noise    N x N, symmetric, positive or zero
//
// Example: level 1 and slope 2 with F = [1 1; 0 1] -> level 3, slope 2.
// Source: Anderson and Moore 1979.
template <int N>
void carry(Belief<N>& belief, const StateMatrix<N>& motion, const StateMatrix<N>& noise) {
    belief.mean = motion * belief.mean;
    const StateMatrix<N> moved = motion * belief.covariance;
    belief.covariance.noalias() = moved * motion.transpose();
    belief.covariance += noise;
}

// Variance of an innovation: h' P h + R.
// Returns the square of the unit of what is seen. Source: Anderson and Moore 1979.
template <int N>
double innovation_variance(const Belief<N>& belief, const Sighting<N>& seen) {
    return seen.design.dot(belief.covariance * seen.design) + seen.variance;
}

// The gain that makes the variance least: P h / (h' P h + R). Source: Anderson and Moore 1979.
template <int N>
StateVector<N> best_gain(const Belief<N>& belief, const Sighting<N>& seen) {
    const StateVector<N> spread = belief.covariance * seen.design;
    return spread / (seen.design.dot(spread) + seen.variance);
}

// Takes a sighting in with any gain: mean' = mean + K innovation, P' = (I - K h') P (I - K h')' + K R K'. An entry of K
// set to zero leaves its state where it is and still counts what is not known of it (Schmidt's consider filter).
// Example: one state 0 +- 1, seen 1 with variance 1, K = 1/2 -> 0.5, variance 0.5.
// Source: Anderson and Moore 1979 (Joseph's form).
template <int N>
void take_in(Belief<N>& belief, const Sighting<N>& seen, const StateVector<N>& gain) {
    belief.mean += gain * seen.innovation;
    const StateVector<N> spread = belief.covariance * seen.design;
    const StateMatrix<N> left = belief.covariance - gain * spread.transpose();
    const StateVector<N> left_spread = left * seen.design;
    StateMatrix<N> both = left - left_spread * gain.transpose();
    both += (gain * seen.variance) * gain.transpose();
    belief.covariance = 0.5 * (both + both.transpose());
}

// Looks back: what later sightings say of the belief at t, once the belief at t + 1 has been smoothed.
//
//   G = P F' (P-)^-1,   mean^s = mean + G (mean^s' - mean-),   P^s = P + G (P^s' - P-) G'
//
//   mean, P     filtered    at t, after what was seen there
//   mean-, P-   expected    at t + 1, before what was seen there: `filtered` carried on; P- must be positive
//   mean^s', P^s'   later   at t + 1, smoothed; at the end of the series the filtered one
//   F           motion      from t to t + 1
//
// Example: one state that never moves: 0 +- 1 filtered, later 0.5 +- 0.7071 -> the same 0.5 +- 0.7071 before.
// Source: H. E. Rauch, F. Tung and C. T. Striebel, Maximum likelihood estimates of linear dynamic systems, AIAA Journal
// 3 (1965) (from memory).
template <int N>
Belief<N> smooth(const Belief<N>& filtered, const StateMatrix<N>& motion, const Belief<N>& expected,
                 const Belief<N>& later) {
    const StateMatrix<N> moved = motion * filtered.covariance;
    const StateMatrix<N> gain = expected.covariance.ldlt().solve(moved).transpose();
    Belief<N> smoothed;
    smoothed.mean = filtered.mean + gain * (later.mean - expected.mean);
    const StateMatrix<N> both =
        filtered.covariance + gain * (later.covariance - expected.covariance) * gain.transpose();
    smoothed.covariance = 0.5 * (both + both.transpose());
    return smoothed;
}

}  // namespace slipledger::analytics::stats
