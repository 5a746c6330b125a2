"""Reference values for analytics/prognosis.hpp, by plain simulation in NumPy.

Wear x and drift v are drawn from their joint normal distribution, the wear law
from four powers; each draw has one time of passage. Fixed seed, 4 million
draws: quantiles are good to about 0.2 %.

    python3 first_passage.py    writes first_passage.csv
"""
import pathlib

import numpy as np

CASES = [  # x, v per day, sd x, sd v, correlation, limit ratio
    (0.0, 0.004, 0.03, 0.0006, 0.3, 3.0),
    (0.4, 0.003, 0.05, 0.0010, 0.5, 3.0),
    (0.7, 0.002, 0.04, 0.0015, 0.4, 2.6),
    (0.1, 0.0005, 0.04, 0.0015, 0.2, 3.0),
]
POWERS = np.array([-0.6, 0.0, 0.6, 1.2])
DRAWS = 4_000_000


def main():
    rng = np.random.default_rng(3)
    with open(pathlib.Path(__file__).parent / "first_passage.csv", "w") as out:
        out.write("x,v,sd_x,sd_v,correlation,limit,low_h,mid_h,high_h\n")
        for x, v, sx, sv, rho, limit in CASES:
            cov = [[sx * sx, rho * sx * sv], [rho * sx * sv, sv * sv]]
            xs, vs = rng.multivariate_normal([x, v], cov, DRAWS).T
            k = 1.0 - rng.choice(POWERS, DRAWS)
            with np.errstate(divide="ignore", invalid="ignore"):
                hours = 24.0 * ((limit / np.exp(xs)) ** k - 1.0) / (k * vs)
            hours = np.where(xs >= np.log(limit), 0.0,
                             np.where(vs > 0.0, hours, np.inf))
            q = np.quantile(hours, [0.1, 0.5, 0.9], method="inverted_cdf")
            q = [float(h) if h < 1.0e6 else float("inf") for h in q]
            row = (x, v, sx, sv, rho, limit, *q)
            out.write(",".join(repr(f) for f in row) + "\n")


if __name__ == "__main__":
    main()
