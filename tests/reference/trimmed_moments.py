"""Makes trimmed_moments_points.csv and trimmed_moments_expected.csv: hour samples
and their trimmed moments as NumPy and SciPy make them, for
tests/analytics/trimmed_moments_test.cpp. Seeded; needs python3-numpy and
python3-scipy.

   python3 trimmed_moments.py        writes both files beside itself
"""
import csv
from pathlib import Path

import numpy as np
from scipy.stats import mstats

HERE = Path(__file__).resolve().parent
SEED = 20260301
COLUMNS = ("sample", "leakage", "laminar", "orifice", "speed", "dp",
           "temperature")


def samples(random):
    """Name -> array of (leakage, f1, f2, f3, dp, temperature)."""
    for name, n, spread, outliers, correlated in (
            ("short", 12, 0.1, 0, False), ("barely", 20, 0.1, 1, False),
            ("hour", 60, 0.2, 3, False), ("swinging", 360, 0.3, 20, False),
            ("drifting", 120, 0.2, 4, True), ("steady", 60, 0.0, 2, False)):
        dp = 200.0 * (1.0 + spread * random.standard_normal(n)).clip(0.1)
        temperature = 50.0 + 3.0 * spread * random.standard_normal(n)
        laminar = dp / 210.0 * np.exp(0.03 * (temperature - 50.0))
        orifice = np.sqrt(dp / 210.0)
        speed = 1.0 - 0.01 * dp / 210.0
        noise = 0.05 * random.standard_normal(n)
        if correlated:
            for i in range(1, n):
                noise[i] += 0.7 * noise[i - 1]
        leakage = 2.0 * laminar + 0.3 * orifice + 0.1 * speed + noise
        wild = random.choice(n, outliers, replace=False)
        leakage[wild] += random.choice([-3.0, 3.0], outliers)
        yield name, np.column_stack(
            (leakage, laminar, orifice, speed, dp, temperature))


def expected(rows):
    n = len(rows)
    y, f = rows[:, 0], rows[:, 1]
    if np.ptp(f) > 1e-9:
        residual = y - np.polyval(np.polyfit(f, y, 1), f)
    else:
        residual = y - y.mean()
    k = int(0.05 * n) if n >= 20 else 0
    order = np.argsort(residual, kind="stable")
    kept = np.sort(order[k:n - k])
    means = rows[kept].mean(axis=0)
    covariance = np.cov(rows[kept][:, :4].T, bias=True)
    dp_temperature = np.cov(rows[kept][:, 4:].T, bias=True)
    # SciPy's error of a trimmed mean has n - 1 degrees of freedom, a line's
    # residuals have n - 2.
    limits = (k / n, k / n)
    assert int(k / n * n) == k
    white = (mstats.trimmed_stde(residual, limits=limits) if k
             else residual.std(ddof=1) / np.sqrt(n))
    white *= np.sqrt((n - 1) / (n - 2))
    winsorised = np.asarray(mstats.winsorize(residual, limits=limits))
    centred = winsorised - winsorised.mean()
    phi = (centred[1:] @ centred[:-1]) / (centred @ centred)
    phi = min(max(phi, 0.0), 0.95)
    error = white * np.sqrt((1 + phi) / (1 - phi))
    lower = [covariance[r, c] for r in range(4) for c in range(r + 1)]
    return [len(kept), *means, *lower, dp_temperature[0, 0],
            dp_temperature[0, 1], dp_temperature[1, 1], error]


def main():
    random = np.random.default_rng(SEED)
    with open(HERE / "trimmed_moments_points.csv", "w", newline="") as points, \
            open(HERE / "trimmed_moments_expected.csv", "w",
                 newline="") as wanted:
        out = csv.writer(points, lineterminator="\n")
        out.writerow(COLUMNS)
        want = csv.writer(wanted, lineterminator="\n")
        want.writerow(("sample", "count", *COLUMNS[1:], "yy", "1y", "11", "2y",
                       "21", "22", "3y", "31", "32", "33", "dp_dp",
                       "dp_temperature", "temperature_temperature",
                       "standard_error"))
        for name, rows in samples(random):
            rows = np.array([[float(f"{x:.9g}") for x in row] for row in rows])
            out.writerows((name, *(f"{x:.9g}" for x in row)) for row in rows)
            want.writerow((name, *(f"{x:.12g}" for x in expected(rows))))


if __name__ == "__main__":
    main()
