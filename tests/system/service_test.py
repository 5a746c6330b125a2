#!/usr/bin/python3
"""The daemon as the service manager, the operator and a failing disk meet it: signals, its lock, refused lines,
the drop folder, no room on disk. Each part is a daemon of its own.

   service_test.py FOLDER_OF_PROGRAMS"""
import json
import resource
import signal
import sqlite3
import subprocess
import sys
from datetime import datetime, timedelta
from pathlib import Path

sys.path.insert(0, str(Path(__file__).resolve().parent))
from proving_ground import Connection, Site, drop_feed, free_port, mill, run_test, say, tcp_feed, until, want  # noqa: E402

FROM = datetime.fromisoformat("2025-07-20T00:00:00+00:00")
HEADER = "time,pump,outlet_pressure,shaft_speed,case_drain_flow,fluid_temperature\n"


def row(number, temperature_c=48.0, pump="press-1", step_s=60):
    at = FROM + timedelta(seconds=number * step_s)
    return {"time": f"{at:%Y-%m-%dT%H:%M:%SZ}", "pump": pump, "outlet_pressure": 180 + number % 7, "shaft_speed": 1487,
            "case_drain_flow": 3 + number % 5 / 10, "fluid_temperature": temperature_c}


def lines(rows):
    return "".join(json.dumps(each) + "\n" for each in rows)


def csv_text(rows):
    return HEADER + "".join(",".join(map(str, each.values())) + "\n" for each in rows)


def site_with_feed(programs, folder, **alerts):
    port = free_port()
    return Site(programs, folder, {**mill(("press-1",)), "feeds": [tcp_feed(port)], "alerts": alerts}), port


def stored_rows(site):
    return len(site.command("export").splitlines()) - 1


def stops_in_good_order(programs, folder):
    """SIGTERM while a logger sends as fast as it can: what was answered for is what is stored."""
    site, port = site_with_feed(programs, folder)
    site.start()
    connection = Connection(port)
    sent = 0
    for _ in range(40):
        connection.send(lines(row(n) for n in range(sent, sent + 500)))
        sent += 500
    connection.replies_through(1)
    took = site.stop()
    acknowledged = 1
    while (reply := connection.reply()) is not None:
        acknowledged = reply["through"]
    stored = stored_rows(site)
    want(stored == acknowledged, f"{acknowledged} rows were answered for, {stored} are stored")
    say(f"SIGTERM: {sent} rows sent, {acknowledged} answered for and stored, ended in {took:.2f} s")


def reopens_the_alert_log(programs, folder):
    log = folder / "alerts.ndjson"
    site, port = site_with_feed(programs, folder, log=str(log))
    site.start()
    connection = Connection(port)
    connection.send(lines(row(n, 48.0 if n < 60 else 85.0) for n in range(200)))
    until(lambda: log.exists() and log.read_text().count("\n"), 20, "hot oil is in the alert log")
    site.wait_until_done()
    log.rename(folder / "alerts.1")
    before = (folder / "alerts.1").read_text()
    site.daemon.send_signal(signal.SIGUSR1)
    until(log.exists, 10, "SIGUSR1 makes a new alert log")
    connection.send(lines(row(n) for n in range(200, 400)))
    until(lambda: log.read_text().count("\n"), 20, "the oil's cooling is in the new alert log")
    want((folder / "alerts.1").read_text() == before, "the old alert log was written to after SIGUSR1")
    longest = site.json_of("status")["longest_commit_ms"]
    want(0 < longest["last_minute"] <= longest["since_start"] < 60_000, f"status tells of a longest commit of {longest} ms")
    say(f"SIGUSR1: {before.count(chr(10))} notices in the old log, the next in a new one")
    site.stop()


def keeps_the_old_plant_file(programs, folder):
    """A bad plant file is refused and the old one stays; a good one is taken."""
    site, port = site_with_feed(programs, folder)
    site.start()
    plant = site.plant
    connection = Connection(port)
    connection.send(lines([row(0)]))
    connection.replies_through(1)
    broken = {**plant, "pumps": [{**plant["pumps"][0], "displacement_cm3": "large"}]}
    site.write_plant(broken)
    site.daemon.send_signal(signal.SIGHUP)
    until(lambda: "displacement_cm3" in site.said(), 10, "the fault is in the service's log")
    connection.send(lines([row(1)]))
    connection.replies_through(2)
    say("SIGHUP with a bad plant file: its fault is logged, the logger's connection goes on")

    site.write_plant({**plant, "pumps": mill(("press-1", "press-2"))["pumps"]})
    begin = site.log.stat().st_size
    site.daemon.send_signal(signal.SIGHUP)
    until(lambda: "ready:" in site.said(begin), 20, "the daemon comes up with the new plant file")
    connection = Connection(port)
    connection.send(lines([row(2, pump="press-2")]))
    reply = connection.replies_through(1)[-1]
    want(reply["stored"] == 1, f"the new pump's row is answered {reply}; wanted it stored")
    want(stored_rows(site) == 3, f"{stored_rows(site)} rows are stored; wanted 3")
    say("SIGHUP with a good one: the new pump's row is stored")
    site.stop()


REFUSED = {
    b"no json at all": "bad-syntax",
    b'{"pump":"press-1","outlet_pressure":180}': "missing-time",
    b'{"time":"yesterday","pump":"press-1","outlet_pressure":180}': "bad-time",
    b'{"time":"2199-01-01T00:00:00Z","pump":"press-1","outlet_pressure":180}': None,  # future or implausible
    b'{"time":"2025-07-20T06:00:00Z","pump":"press-9","outlet_pressure":180}': "unknown-pump",
    b'{"time":"2025-07-20T06:00:00Z","pump":"press-1","outlet_pressure":"18l.2"}': "bad-number",
    b'{"time":"2025-07-20T06:00:00Z","pump":"press-1","outlet_pressure":180,"outlet_pressure":181}': "duplicate-key",
    b"x" * 100_000: "line-too-long",
    b"\xff\xfe\x00\x01": "bad-syntax",
}


def keeps_refused_lines(programs, folder):
    site, port = site_with_feed(programs, folder)
    site.start()
    connection = Connection(port)
    for number, line in enumerate(REFUSED):
        connection.send(line + b"\r\n")
        connection.send(lines([row(number)]))
    replies = connection.replies_through(2 * len(REFUSED))
    total = {key: sum(reply[key] for reply in replies) for key in ("stored", "refused")}
    want(total == {"stored": len(REFUSED), "refused": len(REFUSED)}, f"answered {total}; wanted {len(REFUSED)} of each")
    faults = {fault["line"]: fault["reason"] for reply in replies for fault in reply["faults"]}
    with sqlite3.connect(f"file:{site.ledger}?mode=ro", uri=True) as ledger:
        ledger.text_factory = lambda text: text.decode(errors="replace")  # a foul line is kept as it came
        kept = ledger.execute("SELECT feed, place, code, message, text FROM refused_row ORDER BY id").fetchall()
    want(len(kept) == len(REFUSED), f"{len(kept)} refused lines are kept; wanted {len(REFUSED)}")
    for number, ((line, code), (feed, place, kept_code, message, text)) in enumerate(zip(REFUSED.items(), kept)):
        want(code in (None, kept_code), f"{line[:40]} is kept with code {kept_code}; wanted {code}")
        want(feed == "loggers" and place and message and text, f"{line[:40]} is kept as {feed}, {place}, {message}, {text}")
        want(2 * number + 1 in faults, f"no reply names line {2 * number + 1}, which was refused")
    say(f"{len(kept)} foul lines refused, each told and kept with its reason: {', '.join(code for _, _, code, _, _ in kept)}")
    site.stop()


def allows_one_daemon(programs, folder):
    site, port = site_with_feed(programs, folder)
    site.start()
    second = subprocess.run([site.programs / "slipledgerd", "--plant", site.plant_file], capture_output=True, text=True,
                            check=False, timeout=30)
    want(second.returncode == 3, f"a second daemon on the same ledger ended with {second.returncode}; wanted 3")
    want(str(site.daemon.pid) in second.stderr, f"the second daemon does not say who holds the ledger: {second.stderr}")
    connection = Connection(port)
    connection.send(lines([row(0)]))
    want(connection.replies_through(1)[-1]["stored"] == 1, "the first daemon no longer stores")
    say(f"a second daemon is refused: {second.stderr.strip().splitlines()[-1][-120:]}")
    site.kill()
    site.start()
    say("after kill -9 the ledger is free at once")
    site.stop()


def takes_dropped_files(programs, folder):
    files = folder / "files"
    files.mkdir(parents=True)
    site = Site(programs, folder / "site", {**mill(("press-1",)), "feeds": [drop_feed(files)]})
    site.start()
    good = csv_text(row(n) for n in range(100))

    def drop(name, text, where):
        (files / f"{name}.part").write_text(text, encoding="utf-8")
        (files / f"{name}.part").rename(files / name)
        until(lambda: not (files / name).exists(), 20, f"{name} is taken from the drop folder")
        found = sorted(path.name for path in (files / where).iterdir())
        return found, json.loads(max((files / where).glob("*.receipt.json"), key=lambda p: p.stat().st_mtime_ns).read_text())

    found, receipt = drop("monday.csv", good, "taken")
    want(found == ["monday.csv", "monday.csv.receipt.json"], f"taken/ holds {found}")
    want((receipt["stored"], receipt["refused"], receipt["already_taken"]) == (100, 0, False), f"its receipt: {receipt}")
    found, receipt = drop("copy-of-monday.csv", good, "taken")
    want(receipt["already_taken"] is True, f"the same content again has the receipt {receipt}")
    found, receipt = drop("monday.csv", csv_text(row(n) for n in range(50, 150)), "taken")
    want("monday.csv.2" in found, f"an equal name with other content: taken/ holds {found}")
    want((receipt["stored"], receipt["repeated"]) == (50, 50), f"its receipt: {receipt}")
    found, receipt = drop("letter.csv", "Dear Sir,\nthe pump is fine.\n", "refused")
    want(found == ["letter.csv", "letter.csv.receipt.json"], f"refused/ holds {found}")
    want(receipt["stored"] == 0 and receipt["faults"], f"its receipt: {receipt}")
    want(stored_rows(site) == 150, f"{stored_rows(site)} rows are stored; wanted 150")
    say("dropped files: taken, taken once by content, numbered by name, refused; each with its receipt")
    site.stop()


def lives_through_a_full_disk(programs, folder):
    """No file may grow any more (as on a full disk) and later may again: nothing answered for is lost, and the service goes on."""
    site, port = site_with_feed(programs, folder)
    site.start(restore_signals=False)  # Python ignores SIGXFSZ, and so does then the daemon: it sees a failed write
    free, _ = resource.prlimit(site.daemon.pid, resource.RLIMIT_FSIZE)
    connection = Connection(port)
    connection.send(lines(row(n) for n in range(1000)))
    answered = connection.replies_through(1000)[-1]["through"]

    resource.prlimit(site.daemon.pid, resource.RLIMIT_FSIZE, (8192, free))
    failed = None
    for begin in range(1000, 60000, 1000):
        try:
            connection.send(lines(row(n) for n in range(begin, begin + 1000)))
            reply = connection.reply()
        except OSError:
            break
        if reply is None or "failed" in reply:
            failed = reply
            break
        answered = reply["through"]
    want(failed is not None, "with no room left every row was answered for, or the connection was cut without a word")
    want(site.daemon.poll() is None, "the daemon ended for want of room")
    say(f"no room: {answered} rows answered for, then {json.dumps(failed)}")

    resource.prlimit(site.daemon.pid, resource.RLIMIT_FSIZE, (free, free))
    connection = Connection(port)
    connection.send(lines(row(n) for n in range(answered, answered + 2000)))
    connection.replies_through(2000)
    site.wait_until_done()
    wanted = answered + 2000
    want(stored_rows(site) == wanted, f"{stored_rows(site)} rows are stored after room was made; wanted {wanted}")
    say(f"room again: the same daemon goes on, {wanted} rows stored")
    site.stop()


PARTS = (stops_in_good_order, reopens_the_alert_log, keeps_the_old_plant_file, keeps_refused_lines, allows_one_daemon,
         takes_dropped_files, lives_through_a_full_disk)


def test(programs, folder):
    for part in PARTS:
        part(programs, folder / part.__name__)


if __name__ == "__main__":
    run_test(test, 120)
