"""Reference values for analytics/prognosis.hpp, by plain simulation in NumPy.

For each law, x and rate are drawn from their joint normal distribution and
weighted by the lognormal density of rates that a life beforehand gives; on the
way to the limit ln rate wanders as a Brownian motion over ln ratio, walked in
steps. Each draw has one time of passage; quantiles are of the weighted draws.
Fixed seed, 400,000 draws a law: good to about 0.5 %.

    python3 first_passage.py    writes first_passage.csv
"""
import pathlib

import numpy as np

POWERS = np.array([-0.6, 0.0, 0.6, 1.2])
DRAWS = 400_000
STEPS = 64
# x, drift now, sd x, sd of drift, correlation, limit, median life h, sd of ln
# life, wander, weights of the laws
CASES = [
    (0.0, 0.004, 0.03, 0.0006, 0.3, 3.0, 10000.0, 0.9, 0.5, (1, 1, 1, 1)),
    (0.4, 0.003, 0.05, 0.0010, 0.5, 3.0, 10000.0, 0.9, 0.5, (1, 2, 1, 0)),
    (0.7, 0.002, 0.04, 0.0015, 0.4, 2.6, 6000.0, 0.6, 0.5, (1, 1, 1, 1)),
    (0.1, 0.0005, 0.04, 0.0015, 0.2, 3.0, 10000.0, 0.9, 0.5, (0, 0, 1, 1)),
    (0.1, -0.0005, 0.04, 0.0005, 0.2, 3.0, 20000.0, 0.5, 0.0, (1, 1, 1, 1)),
]


def life_rate(power, life_h):
    q = 1.0 - power
    return 24.0 * (3.0 ** q - 1.0) / q / life_h


def passages(rng, case, power):
    x0, v, sx, sv, rho, limit, life, ln_sd, wander, _ = case
    speed = np.exp((power - 1.0) * x0)  # of x over the rate at ratio 1
    r0, sr = v / speed, sv / speed
    cov = [[sx * sx, rho * sx * sr], [rho * sx * sr, sr * sr]]
    x, r = rng.multivariate_normal([x0, r0], cov, DRAWS).T
    with np.errstate(invalid="ignore", divide="ignore"):
        ln_r = np.log(r)
        weight = np.where(r > 0.0, np.exp(-0.5 * ((
            ln_r - np.log(life_rate(power, life))) / ln_sd) ** 2) / r, 0.0)
    step = np.maximum(np.log(limit) - x, 0.0) / STEPS
    hours = np.zeros(DRAWS)
    walked = np.zeros(DRAWS)
    for i in range(STEPS):
        move = wander * np.sqrt(step) * rng.normal(size=DRAWS)
        middle = walked + 0.5 * move
        at = x + (i + 0.5) * step
        hours += 24.0 * np.exp((1.0 - power) * at - middle) * step
        walked += move
    with np.errstate(divide="ignore", invalid="ignore"):
        return hours / np.where(r > 0.0, r, np.nan), weight / weight.sum()


def main():
    rng = np.random.default_rng(3)
    with open(pathlib.Path(__file__).parent / "first_passage.csv", "w") as out:
        out.write("x,v,sd_x,sd_v,correlation,limit,life_h,ln_sd,wander,w1,w2,"
                  "w3,w4,low_h,mid_h,high_h\n")
        for case in CASES:
            laws = np.array(case[9], float) / sum(case[9])
            pairs = [passages(rng, case, k) for k in POWERS]
            hours = np.concatenate([h for h, _ in pairs])
            weight = np.concatenate([w * p for (_, w), p in zip(pairs, laws)])
            order = np.argsort(hours)
            share = np.cumsum(weight[order])
            q = [hours[order][np.searchsorted(share, s)]
                 for s in (0.1, 0.5, 0.9)]
            row = (*case[:9], *laws, *q)
            out.write(",".join(repr(float(f)) for f in row) + "\n")


if __name__ == "__main__":
    main()
