"""Reference values for analytics/stats/first_passage.hpp, by SciPy: first passage of
a Wiener process with constant drift is scipy.stats.invgauss with mean c / v and
shape (c / s)^2.

    python3 inverse_gaussian.py    writes inverse_gaussian.csv
"""
import pathlib

from scipy.stats import invgauss

CASES = [  # distance, drift per day, jitter per root day
    (1.0, 0.01, 0.05), (1.0986, 0.003, 0.004), (0.5, 0.001, 0.02),
    (0.1, 0.02, 0.2), (2.0, 0.004, 0.0006),
]


def main():
    path = pathlib.Path(__file__).parent / "inverse_gaussian.csv"
    with open(path, "w") as out:
        out.write("distance,drift,jitter,share,time\n")
        for c, v, s in CASES:
            shape = (c / s) ** 2
            for share in (0.01, 0.1, 0.5, 0.9, 0.99):
                time = invgauss.ppf(share, (c / v) / shape, scale=shape)
                out.write(f"{c!r},{v!r},{s!r},{share!r},{float(time)!r}\n")


if __name__ == "__main__":
    main()
