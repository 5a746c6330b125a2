"""Reference values for analytics/stats/normal_mixture.hpp, by SciPy: root search on
the weighted sum of scipy.stats.norm.cdf.

    python3 normal_mixture.py    writes normal_mixture.csv
"""
import pathlib

import numpy as np
from scipy.optimize import brentq
from scipy.stats import norm

SHARES = [0.001, 0.1, 0.37, 0.5, 0.9, 0.999]


def main():
    rng = np.random.default_rng(11)
    path = pathlib.Path(__file__).parent / "normal_mixture.csv"
    with open(path, "w") as out:
        out.write("share,value,weight mean sd...\n")
        for parts in (1, 2, 5, 28):
            for _ in range(3):
                w = rng.uniform(0.01, 1.0, parts)
                m = rng.normal(8.0, 1.5, parts)
                s = np.exp(rng.uniform(-6.0, 1.0, parts))
                for share in SHARES:
                    at = brentq(lambda x: w @ norm.cdf((x - m) / s) / w.sum()
                                - share, -100.0, 100.0, xtol=1e-13)
                    row = [share, at, *np.column_stack([w, m, s]).ravel()]
                    out.write(",".join(repr(float(v)) for v in row) + "\n")


if __name__ == "__main__":
    main()
