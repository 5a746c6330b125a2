#!/usr/bin/python3
"""Pumps that cannot be judged are not judged: one with no baseline yet, one without a thermometer, one gone
silent. Each is made to leak four times what it did, so that whoever trusts the readings alone would cry wolf.

   unjudged_test.py FOLDER_OF_PROGRAMS"""
import csv
import sys
from datetime import datetime, timedelta
from pathlib import Path

sys.path.insert(0, str(Path(__file__).resolve().parent))
from proving_ground import Site, mill, plantsim, run_test, say, want  # noqa: E402

FROM = datetime.fromisoformat("2025-07-20T00:00:00+00:00")
DAYS = 40
NEW_DAYS = 3     # of the pump too new for a baseline: far below baseline.min_h of running
SILENT_DAYS = 3  # more than the day after which a pump counts as silent
WORN_DAYS = 14
TIMES = 4.0


def make_readings(programs, folder, pump):
    file = folder / "mill.csv"
    plantsim(programs, "--csv", file, "--pumps", pump, "--from", f"{FROM:%Y-%m-%d}", "--days", DAYS)
    with open(file, encoding="utf-8", newline="") as lines:
        return list(csv.DictReader(lines))


def told_of(programs, folder, name, rows, others, unfitted=()):
    """The fleet's row of press-2, whose plant file names no `unfitted` sensors, after its `rows` and those of a healthy neighbour
    went in."""
    folder.mkdir()
    file = folder / f"{name}.csv"
    with open(file, "w", encoding="utf-8", newline="") as out:
        writer = csv.DictWriter(out, {**rows[0], **others[0]}.keys(), lineterminator="\n")
        writer.writeheader()
        writer.writerows([*others, *rows])
    plant = {**mill(("press-2", "trimmer-1")), "alerts": {}}
    for quantity in unfitted:
        next(pump for pump in plant["pumps"] if pump["id"] == "press-2")["sensors"].pop(quantity)
    site = Site(programs, folder, plant)
    site.command("load", file)
    told = {row["pump"]: row for row in site.json_of("fleet")}
    want(told["trimmer-1"]["level"] == "sound",
         f"the healthy neighbour is {told['trimmer-1']['level']} ({told['trimmer-1']['reason']}); wanted sound")
    row = told["press-2"]
    say(f"{name}: {row['level']}, {row['reason']}: {row['sentence']}")
    return row, site.command("health", "press-2").decode()


def worn(rows, since):
    """The same, leaking four times as much from a day on."""
    return [{**row, "case_drain_flow": f"{float(row['case_drain_flow']) * TIMES:.2f}"}
            if row["case_drain_flow"] and row["time"] >= f"{since:%Y-%m-%d}" else row for row in rows]


def want_modest(row, levels, words):
    want(row["level"] in levels, f"it is {row['level']}; wanted {' or '.join(levels)}")
    told = " ".join([row["reason"] or "", row["sentence"], *row["notes"]]).lower()
    want(any(word in told for word in words), f"nothing tells why ({' or '.join(words)}): {told}")
    if row["level"] == "unjudged":
        want(row["reason"], "it is unjudged without a reason")


def test(programs, folder):
    press = make_readings(programs, folder, "press-2")
    others = make_readings(programs, folder, "trimmer-1")
    end = FROM + timedelta(days=DAYS)
    last_weeks = end - timedelta(days=WORN_DAYS)

    # Proof that four times the leakage is seen where it can be judged; without it the rest would show nothing.
    row, _ = told_of(programs, folder / "judged", "judged", worn(press, last_weeks), others)
    want(row["level"] in ("plan", "act"), f"four times the leakage came to {row['level']}; wanted plan or act")

    new = [r for r in press if r["time"] >= f"{end - timedelta(days=NEW_DAYS):%Y-%m-%d}"]
    row, _ = told_of(programs, folder / "new", "no baseline yet", worn(new, end - timedelta(days=1)), others)
    want_modest(row, ("unjudged", "watch"), ("learning",))

    blind = [{**r, "fluid_temperature": ""} for r in worn(press, last_weeks)]
    row, text = told_of(programs, folder / "blind", "without temperature", blind, others,
                        ("fluid_temperature",))
    want_modest(row, ("unjudged", "watch"), ("temperature",))
    if row["level"] == "unjudged":
        want(row["reason"] == "no-temperature", f"the reason given is {row['reason']}; wanted no-temperature")
    want("emperature" in text, "the health report does not say that no temperature is measured")

    fallen = [r for r in worn(press, last_weeks) if r["time"] < f"{end - timedelta(days=SILENT_DAYS):%Y-%m-%d}"]
    row, _ = told_of(programs, folder / "silent", "silent", fallen, others)
    want_modest(row, ("unjudged",), ("silent",))


if __name__ == "__main__":
    run_test(test, 120)
