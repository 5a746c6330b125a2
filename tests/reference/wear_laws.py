"""Reference values for analytics/wear_laws.hpp: interacting multiple models written
out once more in NumPy with plain Kalman updates (not Joseph's form), apart from
the project's code, on a wearing section whose days hang together.

    python3 wear_laws.py    writes wear_laws.csv
"""
import pathlib

import numpy as np

POWERS = [-0.6, 0.0, 0.6, 1.2]
WALK = [4e-5, 1e-3]
FREE, SETTLE = 1 / 1000, 1 / 20
JITTER, NOISE, SPREAD, TAU = 0.002, 0.012, 0.03, 10.0
DAYS = 240


def days(rng):
    u, ln_w = 0.0, 0.02
    for day in range(1, DAYS + 1):
        d, c = 0.6 + 0.1 * (day % 3), 1.0 + (day % 7 == 0)
        ln_w += d * (0.0 if day < 60 else 0.006 * np.exp(-0.4 * ln_w))
        keep = np.exp(-c / TAU)
        u = keep * u + 0.025 * np.sqrt(1 - keep * keep) * rng.normal()
        yield d, c, ln_w + u + 0.01 * rng.normal()


def mix(runs, d):
    chance = np.array([[np.exp(-FREE * d), 1 - np.exp(-FREE * d)],
                       [1 - np.exp(-SETTLE * d), np.exp(-SETTLE * d)]])
    prior = np.array([w for _, _, w in runs])
    mixed = []
    for to in range(2):
        share = prior * chance[:, to]
        total = share.sum()
        share = share / total
        mean = sum(s * m for s, (m, _, _) in zip(share, runs))
        cov = sum(s * (p + np.outer(m - mean, m - mean))
                  for s, (m, p, _) in zip(share, runs))
        mixed.append((mean, cov, total))
    return mixed


def step(run, power, walk, d, c, y):
    mean, cov, weight = run
    x, r, u = mean
    speed = np.exp((power - 1) * x)
    keep = np.exp(-c / TAU)
    f = np.array([[1 + d * r * (power - 1) * speed, d * speed, 0],
                  [0, 1, 0], [0, 0, keep]])
    q = np.diag([JITTER ** 2 * d, walk ** 2 * d,
                 SPREAD ** 2 * (1 - keep * keep)])
    mean = np.array([x + d * r * speed, r, keep * u])
    cov = f @ cov @ f.T + q
    h = np.array([1.0, 0.0, 1.0])
    s = h @ cov @ h + NOISE ** 2
    z = abs(y - h @ mean) / np.sqrt(s)
    var = NOISE ** 2 + (s * (z / 2.5 - 1) if z > 2.5 else 0.0)
    gain = cov @ h / (h @ cov @ h + var)
    mean = mean + gain * (y - h @ mean)
    cov = cov - np.outer(gain, h @ cov)
    return mean, cov, weight * np.exp(-0.5 * min(z, 3.0) ** 2) / np.sqrt(s)


def main():
    start = (np.array([0.02, 0.0, 0.0]),
             np.diag([0.03 ** 2, 0.01 ** 2, SPREAD ** 2]))
    laws = [[(*start, 0.9), (*start, 0.1)] for _ in POWERS]
    ln_weight = np.zeros(4)
    path = pathlib.Path(__file__).parent / "wear_laws.csv"
    with open(path, "w") as out:
        out.write("running_days,calendar_days,ln_ratio,drift,sd,positive,"
                  "w1,x1,r1,var_x1,cov1,var_r1,...\n")
        for d, c, y in days(np.random.default_rng(5)):
            for i, power in enumerate(POWERS):
                runs = [step(run, power, walk, d, c, y) for run, walk in
                        zip(mix(laws[i], d), WALK)]
                total = sum(w for _, _, w in runs)
                laws[i] = [(m, p, w / total) for m, p, w in runs]
                ln_weight[i] = 0.998 * ln_weight[i] + np.log(total)
            ln_weight -= ln_weight.max()
            weight = np.exp(ln_weight) / np.exp(ln_weight).sum()
            row = summary(laws, weight)
            out.write(",".join(repr(float(v)) for v in [d, c, y, *row]) + "\n")


def summary(laws, weight):
    from math import erfc, sqrt
    cells, first, second, positive = [], 0.0, 0.0, 0.0
    for w, power, runs in zip(weight, POWERS, laws):
        mean = sum(s * m for m, _, s in runs)
        cov = sum(s * (p + np.outer(m - mean, m - mean)) for m, p, s in runs)
        speed = np.exp((power - 1) * mean[0])
        first += w * speed * mean[1]
        second += w * speed ** 2 * (mean[1] ** 2 + cov[1, 1])
        positive += w * sum(s * 0.5 * erfc(-m[1] / sqrt(2 * p[1, 1]))
                            for m, p, s in runs)
        cells += [w, mean[0], mean[1], cov[0, 0], cov[0, 1], cov[1, 1]]
    return [first, np.sqrt(second - first ** 2), positive, *cells]


if __name__ == "__main__":
    main()
