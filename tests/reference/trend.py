"""Reference values for theil_sen and mann_kendall (analytics/stats/), by SciPy.

Series of many sizes, some with ties, some that hang together as an
autoregression. Theil-Sen's slope and interval are scipy.stats.theilslopes';
S and p of Mann-Kendall follow from scipy.stats.kendalltau against time (tau-b
and the number of tied pairs give S; its asymptotic p value has no correction
for continuity, so p is worked out here from S). Hamed and Rao's factor is
worked out apart from the project's code, with scipy.stats.rankdata and
statsmodels' acf.

    python3 trend.py    writes trend.csv
"""
import pathlib

import numpy as np
from scipy import stats
from statsmodels.tsa.stattools import acf

SHARE = 0.8
SIZES = [4, 5, 8, 13, 20, 40, 64, 90, 180]


def mann_kendall(y):
    n = len(y)
    iu = np.triu_indices(n, 1)
    signs = np.sign(np.subtract.outer(y, y).T[iu])
    s = signs.sum()
    tau = stats.kendalltau(np.arange(n), y).statistic
    pairs, tied = n * (n - 1) / 2, (signs == 0).sum()
    assert abs(tau * np.sqrt(pairs * (pairs - tied)) - s) < 1e-6 * pairs
    _, groups = np.unique(y, return_counts=True)
    ties = sum(t * (t - 1) * (2 * t + 5) for t in groups)
    return s, (n * (n - 1) * (2 * n + 5) - ties) / 18.0


def hamed_rao(y):
    n = len(y)
    at = np.arange(n)
    detrended = y - stats.theilslopes(y, at)[0] * at
    rho = acf(stats.rankdata(detrended), nlags=n - 1, fft=False)[1:]
    lag = np.arange(1, n)
    counts = np.abs(rho) > stats.norm.ppf(0.975) / np.sqrt(n)
    terms = (n - lag) * (n - lag - 1.0) * (n - lag - 2.0) * rho
    factor = 1.0 + 2.0 / (n * (n - 1.0) * (n - 2.0)) * terms[counts].sum()
    return max(factor, 1.0)


def p_of(s, variance):
    z = (s - np.sign(s)) / np.sqrt(variance)
    return 2.0 * stats.norm.sf(abs(z))


def series(rng, n, hangs_together, rounded):
    noise = np.zeros(n)
    for i in range(n):
        kept = hangs_together * noise[i - 1] if i else 0.0
        noise[i] = kept + rng.normal(0.0, 0.05)
    y = 1.0 + rng.uniform(-0.002, 0.006) * np.arange(n) + noise
    return np.round(y, 2) if rounded else y


def main():
    rng = np.random.default_rng(7)
    with open(pathlib.Path(__file__).parent / "trend.csv", "w") as out:
        out.write("n,slope,low,high,slope_wide,low_wide,high_wide,s,variance,"
                  "p,factor,p_corrected,values...\n")
        for n in SIZES:
            for hangs_together in (0.0, 0.7, 0.9):
                for rounded in (False, True):
                    y = series(rng, n, hangs_together, rounded)
                    at = np.arange(n)
                    slope = stats.theilslopes(y, at, alpha=SHARE)
                    wide = stats.theilslopes(y, at, alpha=0.95)
                    s, variance = mann_kendall(y)
                    factor = hamed_rao(y)
                    row = [n, slope[0], slope[2], slope[3], wide[0], wide[2],
                           wide[3], s, variance, p_of(s, variance), factor,
                           p_of(s, variance * factor), *y]
                    out.write(",".join(repr(float(f)) for f in row) + "\n")


if __name__ == "__main__":
    main()
