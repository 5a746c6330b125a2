"""Checks that the certified coefficients of NIST StRD Longley, quoted from
memory in longley.csv, solve the normal equations, in exact fractions.

The data are those statsmodels carries. Writes longley_data.csv.

    python3 longley.py
"""
import csv
import pathlib
from fractions import Fraction

from statsmodels.datasets import longley

HERE = pathlib.Path(__file__).parent


def solve(matrix, right):
    n = len(right)
    rows = [matrix[i] + [right[i]] for i in range(n)]
    for i in range(n):
        pivot = next(r for r in range(i, n) if rows[r][i] != 0)
        rows[i], rows[pivot] = rows[pivot], rows[i]
        rows[i] = [v / rows[i][i] for v in rows[i]]
        for r in range(n):
            if r != i:
                rows[r] = [a - rows[r][i] * b for a, b in zip(rows[r], rows[i])]
    return [row[n] for row in rows]


def main():
    data = longley.load_pandas().data
    names = ["GNPDEFL", "GNP", "UNEMP", "ARMED", "POP", "YEAR"]
    with open(HERE / "longley_data.csv", "w") as out:
        out.write("employed,deflator,gnp,unemployed,armed,population,year\n")
        for _, row in data.iterrows():
            out.write(",".join(f"{row[k]:g}" if k == "GNPDEFL" else str(int(row[k]))
                               for k in ["TOTEMP"] + names) + "\n")
    x = [[Fraction(1)] + [Fraction(str(row[k])) for k in names]
         for _, row in data.iterrows()]
    y = [Fraction(str(v)) for v in data["TOTEMP"]]
    k = len(x[0])
    normal = [[sum(r[i] * r[j] for r in x) for j in range(k)] for i in range(k)]
    right = [sum(r[i] * v for r, v in zip(x, y)) for i in range(k)]
    exact = [float(v) for v in solve(normal, right)]
    with open(HERE / "longley.csv") as f:
        certified = [float(r["coefficient"]) for r in csv.DictReader(f)]
    for a, b in zip(exact, certified):
        print(f"{a:24.12e} {b:24.12e} {abs(a / b - 1):.1e}")
        assert abs(a / b - 1) < 1e-13


if __name__ == "__main__":
    main()
