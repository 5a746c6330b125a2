#!/usr/bin/python3
"""What happens to a pump besides wear, told by the command: oil, samples, settings, instruments, tests with a bucket,
replacements, settled disputes. What is told late counts as if told in time, through the daemon as without it.

   lives_test.py FOLDER_OF_PROGRAMS"""
import csv
import json
import sys
from datetime import datetime, timedelta
from pathlib import Path

sys.path.insert(0, str(Path(__file__).resolve().parent))
from proving_ground import Site, drop_feed, free_port, mill, plantsim, run_test, say, tcp_feed, want  # noqa: E402

FROM = datetime.fromisoformat("2025-07-20T00:00:00+00:00")
DAYS = 24
HALF = f"{FROM + timedelta(days=12):%Y-%m-%dT%H:%M:%SZ}"
END_OF_WRONG = f"{FROM + timedelta(days=14):%Y-%m-%dT%H:%M:%SZ}"
PUMPS = ("press-1", "loader-1")
VIEWS = (("health", "press-1"), ("history", "press-1"), ("history", "press-1", "--by", "summary"), ("lives",),
         ("lives", "press-1"), ("lives", "--model", "axial 140"))


def plant_of(folder):
    """Two feeds, so that one can contradict the other."""
    feeds = [{**drop_feed(folder / name), "id": name} for name in ("logger", "laptop")]
    return {**mill(PUMPS), "alerts": {}, "feeds": [{**feed, "format": "csv"} for feed in feeds]}


def make_readings(programs, folder):
    file = folder / "mill.csv"
    plantsim(programs, "--csv", file, "--pumps", ",".join(PUMPS), "--from", f"{FROM:%Y-%m-%d}", "--days", DAYS)
    return file


def judged(site):
    """History without the events that stand in it."""
    rows = site.json_of("history", "press-1")
    return [{key: value for key, value in row.items() if key != "events"} for row in rows]


def loaded(programs, folder, readings):
    site = Site(programs, folder, plant_of(folder))
    site.command("load", "--feed", "logger", readings)
    return site


def tells_of_oil(programs, folder, readings):
    """An oil that nobody filled in must show as another ratio from its time on, and as none before."""
    site = loaded(programs, folder / "late", readings)
    before = judged(site)
    change = ("oil-changed", "hpu-1", "--at", HALF, "--by", "fitter", "--grade", "68", "--index", "100")
    said = site.json_of(*change)
    want(said["kind"] == "oil-changed" and said["pump"] is None, f"oil-changed says {said}")
    after = judged(site)
    want(after[:11] == before[:11], "days before the oil change are judged otherwise")
    want(after[-1] != before[-1], "the days after the oil change are judged as before")
    events = [event for row in site.json_of("history", "press-1") for event in row.get("events", [])]
    want([(event["at"], event["text"]) for event in events] == [(HALF, "VG 68, VI 100, in hpu-1")], f"history draws {events}")
    life = site.json_of("health", "press-1")["life"]
    want([event["kind"] for event in life["events"]] == ["oil-changed"], f"life.events are {life['events']}")
    want(site.json_of("health", "loader-1")["life"]["events"] == [], "an oil change is told of a pump of another reservoir")

    first = Site(programs, folder / "first", plant_of(folder / "first"))
    first.command(*change)
    first.command("load", "--feed", "logger", readings)
    want(judged(first) == after, "an oil change told before the readings counts otherwise than one told after them")
    say("oil-changed: the same told first or last, from its time on, drawn by history and health")


def settles_a_dispute(programs, folder, readings):
    clean = loaded(programs, folder / "clean", readings)
    with open(readings, encoding="utf-8", newline="") as lines:
        rows = [row for row in csv.DictReader(lines) if row["pump"] == "press-1" and HALF <= row["time"] < END_OF_WRONG]
    wrong = folder / "wrong.csv"
    with open(wrong, "w", encoding="utf-8", newline="") as out:
        writer = csv.DictWriter(out, ("time", "pump", "case_drain_flow"), extrasaction="ignore", lineterminator="\n")
        writer.writeheader()
        writer.writerows({**row, "case_drain_flow": f"{float(row['case_drain_flow']) * 1.5 + 0.1:.3f}"} for row in rows
                         if row["case_drain_flow"])
    settle = ("settle", "press-1", "--from", HALF, "--to", END_OF_WRONG, "--quantity",
              "case_drain_flow", "--believe", "logger", "--by", "engineer")

    site = loaded(programs, folder / "late", readings)
    site.command("load", "--feed", "laptop", wrong)
    disputed = site.json_of("health", "press-1")["data"]["disputed"]
    want(disputed > 100 and judged(site) != judged(clean), f"{disputed} cells are disputed, which changes nothing")
    site.command(*settle)
    want(site.json_of("health", "press-1")["data"]["disputed"] == 0, "settled cells are still counted as disputed")
    want(judged(site) == judged(clean), "a settled dispute is judged otherwise than readings nobody disputed")
    want(site.command("export", "press-1") == clean.command("export", "press-1"), "export has other values")

    first = Site(programs, folder / "first", plant_of(folder / "first"))
    first.command(*settle)
    first.command("load", "--feed", "laptop", wrong)
    first.command("load", "--feed", "logger", readings)
    want(judged(first) == judged(clean), "settled before the readings came it is judged otherwise")
    say(f"settle: {disputed} disputed cells judged as if the wrong feed had never told, settled first or last")


def compares_lives(programs, folder, readings):
    site = loaded(programs, folder, readings)
    site.command("reference-test", "press-1", "--at", HALF, "--by", "fitter", "--flow", "4.2", "--pressure", "180", "--speed",
                 "1480", "--temperature", "48", "--note", "bucket of 10 L")
    site.command("instrument-changed", "press-1", "--at", HALF, "--by", "fitter", "--quantity", "case_drain_flow")
    site.command("oil-sample", "press-1", "--at", HALF, "--by", "laboratory", "--viscosity-40", "44.1", "--viscosity-100",
                 "7.2", "--water", "120", "--particles", "18/16/13")
    replaced = f"{FROM + timedelta(days=14):%Y-%m-%dT%H:%M:%SZ}"
    site.command("replaced", "press-1", "--at", replaced, "--by", "fitter", "--found", "good", "--maker-test", "leakage=3.1",
                 "pressure=210", "speed=1480", "viscosity=32", "--note", "from stock")
    models = {model["model"]: model for model in site.json_of("lives")["models"]}
    old, new = models["axial 140"]["lives"]
    want((old["found"], old["to"], new["from"], new["to"]) == ("good", replaced, replaced, None), f"lives are {old} {new}")
    want(old["verdict_was"] in ("right", None) and old["level"] in ("sound", "watch", "unjudged"), f"the old life is {old}")
    want(old["running_hours"] > 100, f"the old life ran {old['running_hours']} h")
    life = site.json_of("health", "press-1")["life"]
    want((life["number"], life["baseline"]) == (2, "maker-test"), f"the new life is {life}")
    kinds = [event["kind"] for event in site.json_of("health", "press-1")["events"]]
    want(kinds == ["replaced", "oil-sample", "instrument-changed", "reference-test"], f"events are {kinds}")
    for view in VIEWS:
        lines = site.command(*view).decode().splitlines()
        want(lines and all(len(line) <= 80 for line in lines), f"slipledger {' '.join(view)} is wider than 80 columns")
        json.loads(site.command(*view, "--json"))
    say(f"lives: {old['running_hours']:.0f} h, found {old['found']}, verdict {old['verdict_was']}; the new one rests on its "
        f"{life['baseline']}")


WRONG = (
    ("oil-changed", "hpu-9", "--grade", "46"), ("oil-changed", "hpu-1", "--grade", "47"),
    ("oil-changed", "hpu-1", "--fluid", "HLP 47"), ("oil-changed", "hpu-1", "--index", "120"),
    ("oil-changed", "hpu-1", "--grade", "46", "--fluid", "HLP 46"), ("oil-sample", "hpu-1"),
    ("oil-sample", "hpu-1", "--viscosity-100", "7"), ("oil-sample", "hpu-1", "--viscosity-40", "7", "--viscosity-100", "8"),
    ("compensator-set", "press-1", "--bar", "4000"), ("compensator-set", "press-1", "--bar", "nan"),
    ("instrument-changed", "press-1", "--quantity", "flow"),
    ("reference-test", "press-1", "--flow", "3", "--pressure", "200", "--speed", "1480"),
    ("reference-test", "press-1", "--flow", "3000", "--pressure", "200", "--speed", "1480", "--temperature", "50"),
    ("reference-test", "press-1", "--flow", "3", "--of", "bucket", "--pressure", "200", "--speed", "1480", "--temperature", "50"),
    ("replaced", "press-1", "--maker-test", "leakage=1.2", "pressure=210", "speed=1480"),
    ("replaced", "press-1", "--maker-test", "leakage=1.2", "pressure=high", "speed=1480", "viscosity=32"),
    ("replaced", "press-1", "--maker-test", "leakage=190", "pressure=210", "speed=1480", "viscosity=32"),
    ("replaced", "press-1", "--maker-test", "size=71"),
    ("settle", "press-1", "--from", HALF, "--to", "2025-07-01", "--believe", "logger"),
    ("settle", "press-1", "--from", HALF, "--to", HALF, "--believe", "loger"),
    ("settle", "press-1", "--from", HALF, "--to", HALF, "--believe", "logger", "--quantity", "pressure"),
)


def refuses_what_makes_no_sense(programs, folder, readings):
    site = loaded(programs, folder, readings)
    for wrong in WRONG:
        done = site.command_done(*wrong, "--by", "reader")
        want(done.returncode == 2, f"slipledger {' '.join(wrong)} ended with {done.returncode}; wanted 2")
        want(done.stderr.strip(), f"slipledger {' '.join(wrong)} does not say what is wrong")
    want(site.json_of("health", "press-1")["events"] == [], "something that was refused was kept all the same")
    want(site.command_done("lives", "--model", "none such").returncode == 2, "lives of an unknown model is no wrong use")
    say(f"{len(WRONG)} acts that make no sense are refused, each with a reason")


def tells_the_daemon(programs, folder, readings):
    """The same through the socket; what the daemon does not know it refuses."""
    port = free_port()
    site = Site(programs, folder, {**mill(PUMPS), "alerts": {}, "feeds": [tcp_feed(port)]})
    site.command("load", readings)
    site.start()
    site.command("oil-sample", "hpu-1", "--at", HALF, "--by", "laboratory", "--viscosity-40", "40", "--viscosity-100", "6.8")
    site.command("instrument-changed", "press-1", "--at", HALF, "--by", "fitter", "--quantity", "fluid_temperature")
    site.wait_until_done()
    through_daemon = judged(site)
    site.stop()

    other = Site(programs, folder / "other", {**mill(PUMPS), "alerts": {}, "feeds": [tcp_feed(port)]})
    other.command("instrument-changed", "press-1", "--at", HALF, "--by", "fitter", "--quantity", "fluid_temperature")
    other.command("oil-sample", "press-1", "--at", HALF, "--by", "laboratory", "--viscosity-40", "40", "--viscosity-100", "6.8")
    other.command("load", readings)
    want(judged(other) == through_daemon, "told to the daemon it counts otherwise than without one")
    say("told to a running daemon the same comes of it")


PARTS = (tells_of_oil, settles_a_dispute, compares_lives, refuses_what_makes_no_sense, tells_the_daemon)


def test(programs, folder):
    readings = make_readings(programs, folder)
    for part in PARTS:
        (folder / part.__name__).mkdir()
        part(programs, folder / part.__name__, readings)


if __name__ == "__main__":
    run_test(test, 120)
