"""Reference values for analytics/stats/kalman.hpp, by statsmodels' state space module.

A local linear trend and a regression with fixed coefficients are put through
statsmodels' Kalman filter with a known start; beside each input stand the
filtered mean and covariance after it, and for the trend the smoothed ones.
Needs Python with NumPy and statsmodels:

    python3 kalman.py        writes kalman_trend.csv, kalman_smoothed.csv,
                             kalman_regression.csv
"""
import pathlib

import numpy as np
from statsmodels.tsa.statespace.kalman_smoother import KalmanSmoother

HERE = pathlib.Path(__file__).parent
ROWS = 40


def filtered(y, design, transition, state_cov, obs_var, start_sd):
    k = transition.shape[0]
    kf = KalmanSmoother(k_endog=1, k_states=k)
    kf.bind(np.asarray(y, dtype=float))
    kf["design"] = design
    kf["transition"] = transition
    kf["selection"] = np.eye(k)
    kf["state_cov"] = state_cov
    kf["obs_cov"] = np.array([[obs_var]])
    kf.initialize_known(np.zeros(k), np.diag(np.square(start_sd)))
    return kf.smooth()


def write(name, header, columns):
    with open(HERE / name, "w") as out:
        out.write(header + "\n")
        for row in zip(*columns):
            out.write(",".join(repr(float(v)) for v in row) + "\n")


def main():
    rng = np.random.default_rng(1)
    t = np.arange(ROWS)
    y = 2.0 + 0.05 * t + 0.3 * np.sin(0.4 * t) + rng.normal(0, 0.2, ROWS)
    result = filtered(y, np.array([[1.0, 0.0]]),
                      np.array([[1.0, 1.0], [0.0, 1.0]]),
                      np.diag([0.01, 0.0004]), 0.04, [10.0, 1.0])
    mean, cov = result.filtered_state, result.filtered_state_cov
    write("kalman_trend.csv", "y,level,slope,var_level,cov,var_slope",
          [y, mean[0], mean[1], cov[0, 0], cov[0, 1], cov[1, 1]])
    mean, cov = result.smoothed_state, result.smoothed_state_cov
    write("kalman_smoothed.csv", "y,level,slope,var_level,cov,var_slope",
          [y, mean[0], mean[1], cov[0, 0], cov[0, 1], cov[1, 1]])

    x1 = 1.0 + 0.3 * np.cos(0.7 * t)
    x2 = rng.uniform(0.5, 1.5, ROWS)
    y = 0.4 + 2.0 * x1 + 0.3 * x2 + rng.normal(0, 0.1, ROWS)
    design = np.vstack([np.ones(ROWS), x1, x2])[np.newaxis]
    result = filtered(y, design, np.eye(3), np.zeros((3, 3)), 0.01,
                      [5.0, 5.0, 5.0])
    mean, cov = result.filtered_state, result.filtered_state_cov
    write("kalman_regression.csv", "x1,x2,y,b0,b1,b2,var0,var1,var2",
          [x1, x2, y, mean[0], mean[1], mean[2], cov[0, 0], cov[1, 1],
           cov[2, 2]])


if __name__ == "__main__":
    main()
