"""Reference values for analytics/stats/quantile.hpp, by NumPy's default method.

    python3 quantile.py      writes quantile.csv: share, quantile, sample...
"""
import pathlib

import numpy as np


def main():
    rng = np.random.default_rng(2)
    with open(pathlib.Path(__file__).parent / "quantile.csv", "w") as out:
        out.write("share,quantile,sample\n")
        for n in (1, 2, 3, 4, 5, 8, 20, 101):
            sample = np.round(rng.normal(0, 10, n), 3)
            for share in (0.0, 0.05, 0.1, 0.5, 0.9, 1.0):
                value = float(np.quantile(sample, share))
                values = ",".join(repr(float(v)) for v in sample)
                out.write(f"{share},{value!r},{values}\n")


if __name__ == "__main__":
    main()
