"""Reference values for tools/judging/garwood.hpp: exact bounds of a Poisson mean, by SciPy's chi-squared distribution.

    python3 garwood.py      writes garwood.csv: count, confidence, low, high
"""
import pathlib

from scipy.stats import chi2


def main():
    with open(pathlib.Path(__file__).parent / "garwood.csv", "w") as out:
        out.write("count,confidence,low,high\n")
        for confidence in (0.8, 0.9, 0.95):
            outside = (1.0 - confidence) / 2.0
            for count in (0, 1, 2, 3, 5, 10, 30, 200):
                low = float(chi2.ppf(outside, 2 * count)) / 2.0 if count else 0.0
                high = float(chi2.ppf(1.0 - outside, 2 * count + 2)) / 2.0
                out.write(f"{count},{confidence!r},{low!r},{high!r}\n")


if __name__ == "__main__":
    main()
