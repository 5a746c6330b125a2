"""Reference values for analytics/stats/garwood.hpp, by SciPy: the means at which
the count seen, or one further out, has exactly the probability asked for,
found by root search on the Poisson distribution itself.

    python3 poisson_bounds.py    writes poisson_bounds.csv
"""
import pathlib

from scipy.optimize import brentq
from scipy.stats import poisson

COUNTS = [0, 1, 2, 3, 5, 10, 27, 100, 1000]
TAILS = [0.025, 0.05, 0.1]


def main():
    with open(pathlib.Path(__file__).parent / "poisson_bounds.csv", "w") as out:
        out.write("count,tail,low,high\n")
        for n in COUNTS:
            for tail in TAILS:
                low = 0.0 if n == 0 else brentq(
                    lambda m: poisson.sf(n - 1, m) - tail, 1e-9, n + 1.0,
                    xtol=1e-12, rtol=1e-14)
                high = brentq(lambda m: poisson.cdf(n, m) - tail, n * 0.5,
                              2.0 * n + 20.0, xtol=1e-12, rtol=1e-14)
                out.write(f"{n},{tail!r},{low!r},{high!r}\n")


if __name__ == "__main__":
    main()
