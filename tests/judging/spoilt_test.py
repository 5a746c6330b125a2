#!/usr/bin/python3
"""The short judge falls through its floors when the viscosity correction is taken away.

    spoilt_test.py JUDGE-BENCH"""
import subprocess
import sys

FELL = 1


def main():
    run = subprocess.run([sys.argv[1], "--short", "--spoil", "no-viscosity-correction"], check=False, text=True,
                         capture_output=True)
    fallen = [line for line in run.stderr.splitlines() if "; wanted " in line]
    print("\n".join(fallen))
    if run.returncode != FELL or not fallen:
        sys.exit(f"ended {run.returncode} with {len(fallen)} figures through their floors; wanted 1 and at least one")


if __name__ == "__main__":
    main()
