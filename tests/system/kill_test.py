#!/usr/bin/python3
"""Kills the daemon at twenty moments while loggers feed it. What it then holds and has told is what an
undisturbed run holds and has told: nothing acknowledged is lost, nothing is stored or told twice.

   kill_test.py FOLDER_OF_PROGRAMS          SLIPLEDGER_SEED draws the moments"""
import atexit
import json
import os
import random
import subprocess
import sys
import time
from pathlib import Path

sys.path.insert(0, str(Path(__file__).resolve().parent))
from proving_ground import (SLOWNESS, Site, compare, drop_feed, free_port, mill, run_test, say, tcp_feed,  # noqa: E402
                            want)
from webhook import WebhookReceiver  # noqa: E402  (of the demonstration)

KILLS = 20
BY_TCP = ("press-1", "lathe-1")
BY_FILE = ("barker-1", "loader-1")
DAYS = 62 if SLOWNESS == 1 else 45
FROM = "2025-07-05"  # a life's learning, then a step on 28 August: there is something to tell
FEEDING_S = 16 * SLOWNESS
LONGEST_S = 60


def build(programs, folder):
    receiver = WebhookReceiver(folder / "webhook.ndjson")
    files = folder / "files"
    files.mkdir()
    plant = mill(BY_TCP + BY_FILE)
    plant["feeds"] = [tcp_feed(free_port()), drop_feed(files)]
    plant["alerts"] |= {"log": str(folder / "alerts.ndjson"), "webhooks": [{"name": "office", "url": receiver.url}]}
    return Site(programs, folder / "site", plant), receiver, files


def feeder(site, files, *pace):
    """The loggers of half the pumps, and the files of the other half, a week in each."""
    loggers = subprocess.Popen(
        [site.programs / "plantsim", "--pumps", ",".join(BY_TCP + BY_FILE), "--tcp-pumps", ",".join(BY_TCP),
         "--tcp", site.plant["feeds"][0]["listen"], "--drop", files, "--from", FROM, "--days", str(DAYS), *pace],
        stderr=subprocess.PIPE, text=True)
    atexit.register(loggers.kill)
    return loggers


def finish(site, loggers):
    _, said = loggers.communicate(timeout=LONGEST_S * SLOWNESS)
    want(loggers.returncode == 0, f"the loggers could not deliver: {said.strip()}")
    site.wait_until_done(LONGEST_S)
    return next(line for line in said.splitlines() if "rows by TCP" in line)


def first_told(lines):
    """Per pump, in order: what was told, each id once."""
    told, seen = {}, set()
    for line in lines:
        notice = json.loads(line)
        if notice["id"] in seen:
            continue
        seen.add(notice["id"])
        told.setdefault(notice.get("pump") or notice["subject"].split("/")[0], []).append(line)
    return {pump: "\n".join(kept).encode() for pump, kept in told.items()}


def kept_and_told(site, receiver, folder):
    """All that is compared, by name, as bytes."""
    kept = site.judgements()
    lines = (folder / "alerts.ndjson").read_text().splitlines()
    ids = [json.loads(line)["id"] for line in lines]
    want(len(ids) == len(set(ids)), f"the alert log holds {len(ids) - len(set(ids))} notices twice")
    kept.update({f"alert log, {pump}": text for pump, text in first_told(lines).items()})
    kept.update({f"webhook, {pump}": text for pump, text in first_told(receiver.lines).items()})
    return kept


def undisturbed(programs, folder):
    folder.mkdir()
    site, receiver, files = build(programs, folder)
    site.start()
    say(f"undisturbed: {finish(site, feeder(site, files))}")
    kept = kept_and_told(site, receiver, folder)
    site.stop()
    return kept


def killed(programs, folder, chance):
    """One feeding, evenly paced, with a kill in each of twenty-one equal stretches of it but the last."""
    folder.mkdir()
    site, receiver, files = build(programs, folder)
    site.start()
    begun = time.monotonic()
    loggers = feeder(site, files, "--speedup", str(round(DAYS * 86400 / FEEDING_S)))
    for number in range(KILLS):
        moment = FEEDING_S * (number + chance.random()) / (KILLS + 1)
        time.sleep(max(0.02, begun + moment - time.monotonic()))
        want(loggers.poll() is None, f"the feeding was over before kill {number + 1}")
        site.kill()
        site.start()
    say(f"killed {KILLS} times: {finish(site, loggers)}")
    kept = kept_and_told(site, receiver, folder)
    site.stop()
    return kept


def test(programs, folder):
    seed = int(os.environ.get("SLIPLEDGER_SEED", "1"))
    say(f"SLIPLEDGER_SEED={seed}")
    wanted = undisturbed(programs, folder / "undisturbed")
    for name in (f"{log}, {pump}" for log in ("alert log", "webhook") for pump in BY_TCP + BY_FILE):
        want(wanted.get(name, b"").count(b"\n") > 2, f"little was told to compare: {name}")
    found = killed(programs, folder / "killed", random.Random(seed))
    for name, text in wanted.items():
        say(f"{len(text):>9} bytes  {name}")
    compare(wanted, found, "killed twenty times")
    say("all byte-equal")


if __name__ == "__main__":
    run_test(test, 200)
