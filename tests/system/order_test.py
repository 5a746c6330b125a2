#!/usr/bin/python3
"""What is judged depends on what is stored, never on the order it came in. The same readings, with one cell in
a hundred disputed and one row a second before an hour's end, go in by seven ways; all histories come out byte
for byte the same.

   order_test.py FOLDER_OF_PROGRAMS          SLIPLEDGER_SEED draws disputes and blocks"""
import csv
import io
import os
import random
import sys
from pathlib import Path

sys.path.insert(0, str(Path(__file__).resolve().parent))
from proving_ground import (SLOWNESS, Connection, Site, compare, free_port, mill, plantsim, run_test, say,  # noqa: E402
                            tcp_feed, want)

PUMPS = ("barker-1", "lathe-1", "loader-1")
FROM = "2025-08-08"  # barker-1 breaks on the 28th: there is something to tell
DAYS = 24 if SLOWNESS == 1 else 15
DISPUTED = 0.01
QUANTITIES = ("outlet_pressure", "shaft_speed", "case_drain_flow", "fluid_temperature", "delivery_flow")
NAMES = ("time", "pump", "section", *QUANTITIES)


def make_readings(programs, folder):
    plantsim(programs, "--csv", folder / "mill.csv", "--pumps", ",".join(PUMPS), "--from", FROM, "--days", DAYS)
    with open(folder / "mill.csv", encoding="utf-8", newline="") as lines:
        rows = [tuple(row[name] for name in NAMES) for row in csv.DictReader(lines)]
    at = next(i for i, row in enumerate(rows) if row[0] >= "2025-08-12T11:00:00Z")
    before = next(row for row in reversed(rows[:at]) if row[1] == "barker-1")
    late = ("2025-08-12T10:59:59Z", *before[1:])
    return rows[:at] + [late] + rows[at:], late


def disputes_of(rows, chance):
    """A second, different value for one cell in a hundred."""
    disputes = []
    for row in rows:
        for cell in range(3, len(row)):
            if row[cell] and chance.random() < DISPUTED:
                other = [*row[:3], *("" for _ in QUANTITIES)]
                other[cell] = f"{float(row[cell]) * 1.03 + 0.11:.3f}"
                disputes.append(tuple(other))
    return disputes


def csv_text(rows):
    out = io.StringIO()
    writer = csv.writer(out, lineterminator="\n")
    writer.writerow(NAMES)
    writer.writerows(rows)
    return out.getvalue()


def write_files(folder, groups):
    folder.mkdir()
    files = [folder / f"part-{number:03}.csv" for number in range(len(groups))]
    for file, rows in zip(files, groups):
        file.write_text(csv_text(rows), encoding="utf-8")
    return files


def weeks(rows):
    """Rows by week and pump, as a logger's files would have them, in order of time."""
    groups = {}
    for row in rows:
        groups.setdefault((int(row[0][5:7]) * 31 + int(row[0][8:10])) // 7, {}).setdefault(row[1], []).append(row)
    return [group for _, by_pump in sorted(groups.items()) for _, group in sorted(by_pump.items())]


def random_blocks(rows, chance):
    blocks, begin = [], 0
    while begin < len(rows):
        size = chance.randint(1, 600)
        blocks.append(rows[begin:begin + size])
        begin += size
    chance.shuffle(blocks)
    return [[row for block in blocks[i::6] for row in block] for i in range(6)]


def in_portions(site, files, portion):
    """Loads so many files at a time, so that judging goes on between."""
    for begin in range(0, len(files), portion):
        site.command("load", *files[begin:begin + portion])


def by_load(name, groups, portion):
    def way(programs, folder):
        site = Site(programs, folder, mill(PUMPS))
        in_portions(site, write_files(folder / "files", groups), portion)
        return site.judgements()
    return name, way


def by_tcp_and_load(rows, disputes):
    """Half by TCP to a running daemon, while `load` brings the other half through it."""
    def way(programs, folder):
        port = free_port()
        site = Site(programs, folder, {**mill(PUMPS), "feeds": [tcp_feed(port, format="csv")]})
        site.start()
        connection = Connection(port)
        sent, half = 1, rows[::2]
        connection.send(",".join(NAMES) + "\n")
        files = write_files(folder / "files", [*weeks(rows[1::2])[::-1], disputes])
        step = len(half) // len(files) + 1
        for number, file in enumerate(files):
            block = half[number * step:(number + 1) * step]
            connection.send(csv_text(block).split("\n", 1)[1])
            sent += len(block)
            site.command("load", file)
        if len(half) > len(files) * step:
            raise AssertionError("some rows were not sent")
        connection.replies_through(sent)
        connection.close()
        site.wait_until_done()
        kept = site.judgements()
        site.stop()
        return kept
    return "half by TCP, half by load meanwhile", way


def ways(rows, late, disputes, chance):
    tidy = sorted([*rows, *disputes], key=lambda row: row[0])
    without_late = [row for row in rows if row != late]
    yield by_load("in order", weeks(tidy), 1000)
    yield by_load("in order, a few files at a time", weeks(tidy), 3)
    yield by_load("in reverse file order, the late row last", [*weeks(without_late)[::-1], disputes, [late]], 5)
    yield by_load("disputes first, random blocks", [disputes, *random_blocks(rows, chance)], 2)
    yield by_load("random blocks", random_blocks([*disputes, *rows], chance), 1)
    yield by_load("twice", [*weeks(rows), disputes, *(group[::-1] for group in weeks(rows))], 6)
    yield by_tcp_and_load(rows, disputes)


def test(programs, folder):
    seed = int(os.environ.get("SLIPLEDGER_SEED", "1"))
    chance = random.Random(seed)
    rows, late = make_readings(programs, folder)
    disputes = disputes_of(rows, chance)
    say(f"SLIPLEDGER_SEED={seed}: {len(rows)} rows, {len(disputes)} disputed cells, late row {late[0]}")
    want(len(disputes) > len(rows) // 100, "too few disputes to prove anything")
    reference = None
    for number, (name, way) in enumerate(ways(rows, late, disputes, chance)):
        kept = way(programs, folder / f"way-{number}")
        if reference is None:
            reference = kept
            say("  ".join(f"{what}: {len(text)} bytes" for what, text in kept.items()))
            want(all(len(text) > 1000 for what, text in kept.items()), "little to compare")
        compare(reference, kept, name)
        say(f"byte-equal: {name}")


if __name__ == "__main__":
    run_test(test, 200)
