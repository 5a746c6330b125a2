#!/usr/bin/python3
"""`slipledger explain` shows the working behind a verdict so that it can be checked with a pocket calculator: here it is.
One pump of each type; every printed formula gives its printed number; two pages are worked out again from the raw
readings by formulas of this test's own, down to the level and the money; a page goes as far as it can and says why it
ends.

   explain_test.py FOLDER_OF_PROGRAMS"""
import csv
import io
import json
import sqlite3
import sys
from datetime import datetime, timedelta
from pathlib import Path

sys.path.insert(0, str(Path(__file__).resolve().parent))
import hand_worked  # noqa: E402
from pocket_calculator import check_page  # noqa: E402
from proving_ground import Site, example as without_comments, mill, plantsim, run_test, say, want  # noqa: E402

FROM, DAYS = "2025-07-25", 48
PAGES = {  # a pump of each type, and what its page must come to
    "axial piston": ("press-1", "A"),
    "vane": ("lathe-1", "A"),
    "external gear": ("loader-1", "A"),
    "internal gear": ("trimmer-1", "A"),
    "radial piston": ("barker-1", "A"),
}
# The last worked page must hold these, whatever else.
WANTED = {"q", "p", "n", "t", "dp", "q_th", "q_s", "A", "B", "nu", "rho", "mu", "f1", "f2", "f3", "a", "b", "c", "z", "x",
          "h", "q_w", "w_own", "w", "w_low", "w_high", "eta_0", "eta", "e", "P_w"}


def the_mill():
    plant = mill({pump for pump, _ in PAGES.values()} | {"clipper-1"})
    plant["economics"] = {"energy_price_per_kwh": 0.11, "currency": "EUR", "motor_efficiency": 0.93,
                          "downtime_cost_per_h": 300}
    for pump in plant["pumps"]:
        if pump["id"] in ("press-1", "barker-1"):
            pump["replacement"] = {"part_cost": 900, "work_cost": 250, "downtime_h": 2}
        if pump["id"] == "barker-1":
            pump["makes_up_by"] = "time"
    return plant


def explain(site, pump, section, *more):
    page = site.json_of("explain", pump, "--section", section, *more)
    text = site.command("explain", pump, "--section", section, *more).decode()
    check_text(text, page)
    return page


def check_text(text, page):
    """The page on screen is the same, fits, and carries the cautions."""
    lines = text.splitlines()
    wide = [line for line in lines if len(line) > 80]
    want(not wide, f"wider than 80 columns: {wide[:1]}")
    run_together = " ".join(text.split())
    for step in page["steps"]:
        value = f"{step['value']:.9g}" if step["symbol"] in "AB" else f"{step['value']:.6g}"
        for wanted in (f"{step['symbol']} = ", f"= {value}"):
            want(wanted in run_together, f"{page['pump']}: the page on screen lacks \"{wanted}\" of {step['name']}")
    want("lock out" in run_together, "the page on screen has no cautions")


def every_type(site):
    for kind, (pump, section) in PAGES.items():
        page = explain(site, pump, section)
        worked, given = check_page(page)
        missing = WANTED - {step["symbol"] for step in page["steps"]}
        want(not missing, f"{pump} ({kind}) lacks {sorted(missing)}")
        want(page["ends_because"] is None, f"{pump} ends early: {page['ends_because']}")
        say(f"{kind}: {pump} by {page['basis']}, {worked} numbers worked out, {given} given, all as printed")


def readings_of_hour(site, page):
    """Raw rows of the summary, as exported."""
    text = site.command("export", page["pump"], "--from", page["summary"]["from"], "--to", page["summary"]["to"]).decode()
    return [row for row in csv.DictReader(io.StringIO(text)) if row["section"] in ("", page["section"])]


def facts_of(site, pump_id):
    """What the plant file says of the pump, its oil and prices."""
    pump = next(pump for pump in site.plant["pumps"] if pump["id"] == pump_id)
    tank = next(tank for tank in site.plant["reservoirs"] if tank["id"] == pump["reservoir"])
    return {"pump": pump, "economics": site.plant["economics"], "fluid": tank["fluid"],
            "own_fluids": site.plant["fluids"], "fluids": without_comments("../fluids.json")}


def days_of(site, page):
    """Stored day verdicts of the page's track up to its day, by date."""
    ledger = sqlite3.connect(f"file:{site.ledger}?mode=ro", uri=True)
    ledger.row_factory = sqlite3.Row
    rows = ledger.execute("SELECT * FROM verdict WHERE pump = ? AND section = ? AND basis = ? ORDER BY date",
                          (page["pump"], page["section"], page["basis"])).fetchall()
    ledger.close()
    return [dict(row) for row in rows]


def by_hand(site, pump, section):
    page = explain(site, pump, section)
    checked = hand_worked.check(page, readings_of_hour(site, page), facts_of(site, pump), days_of(site, page))
    say(f"{pump}: {checked} numbers worked out again by hand, from {len(page['points'])} points")


def an_instant(site):
    """--at shows that instant: a judged one in the middle of a day, and one that was set aside."""
    last = explain(site, "press-1", "A")
    noon = datetime.fromisoformat(last["at"].replace("Z", "+00:00")).replace(hour=10, minute=30) - timedelta(days=9)
    page = explain(site, "press-1", "A", "--at", noon.strftime("%Y-%m-%dT%H:%M:%SZ"))
    check_page(page)
    want(page["summary"]["from"] == noon.strftime("%Y-%m-%dT10:00:00Z"), f"--at {noon} shows {page['summary']}")
    rows = site.json_of("history", "press-1", "--by", "summary")
    row = next(row for row in rows if row["time"] == page["summary"]["from"])
    told = {step["symbol"]: step["value"] for step in page["steps"]}
    want(told["w_own"] == row["leakage_ratio"]["value"] and told["w"] == row["filtered_ratio"]["value"],
         f"the page tells {told['w_own']} and {told['w']}, history {row}")
    aside = next(point for row in rows for point in [row] if row["leakage_ratio"]["value"] is None)
    page = explain(site, "press-1", "A", "--at", aside["time"])
    want(page["ends_because"], "a summary without a judged point goes on to a verdict")
    say(f"a summary without a judged point: {page['ends_because']}")
    done = site.command_done("explain", "press-1", "--at", "2031-01-01")
    want(done.returncode == 1 and b"no closed summary" in done.stdout, f"a time not yet come ends with {done.returncode}")
    want(site.command_done("explain", "lathe-1").returncode == 2, "a double pump is explained without --section")


def as_far_as_it_goes(site):
    blind = explain(site, "clipper-1", "A")
    check_page(blind)
    want("viscosity" in json.dumps(blind["remarks"]) and blind["ends_because"], f"without a thermometer: {blind}")
    say(f"without a thermometer: {blind['ends_because']}")
    none = explain(site, "press-1", "A", "--basis", "delivery")
    want(not none["steps"] and "delivery_flow" in none["ends_because"], f"without a meter: {none['ends_because']}")
    ledger = sqlite3.connect(site.ledger)
    with ledger:
        ledger.execute("DELETE FROM hour_block")
        ledger.execute("DELETE FROM recent")
    ledger.close()
    page = explain(site, "press-1", "A")
    check_page(page)
    symbols = {step["symbol"] for step in page["steps"]}
    want("q" not in symbols and "w" in symbols and not page["points"], "without raw readings it does not begin with the means")
    want("no longer kept" in json.dumps(page["remarks"]), "without raw readings it does not say so")
    say("without raw readings it begins with the summary's means, and says so")


def test(programs, folder):
    plant = the_mill()
    site = Site(programs, folder / "site", plant)
    file = folder / "mill.csv"
    plantsim(programs, "--csv", file, "--pumps", ",".join(pump["id"] for pump in plant["pumps"]), "--from", FROM,
             "--days", DAYS)
    site.command("load", file)
    every_type(site)
    for pump, section in (PAGES["axial piston"], PAGES["external gear"], PAGES["radial piston"]):
        by_hand(site, pump, section)
    an_instant(site)
    as_far_as_it_goes(site)


if __name__ == "__main__":
    run_test(test, 150)
