#!/usr/bin/python3
"""What README.md tells a reader to type does what README.md says: its logger's line and its CSV rows against
the first example plant file, and every subcommand it lists.

   readme_test.py FOLDER_OF_PROGRAMS"""
import json
import re
import shlex
import shutil
import subprocess
import sys
from pathlib import Path

sys.path.insert(0, str(Path(__file__).resolve().parent))
from proving_ground import SOURCE, Connection, Site, example, free_port, run_test, say, want  # noqa: E402

README = (SOURCE / "README.md").read_text(encoding="utf-8")
DOCUMENTED_PORT = 7310
PIPE = re.compile(r"^(printf .*) \| nc -q 2 127\.0\.0\.1 (\d+)\n(\{.*\})$", re.M)


def first_plant(folder, port):
    """The first example plant file with the test's own port and paths."""
    plant = example("first-plant.json")
    want(plant["feeds"][0]["listen"] == f"127.0.0.1:{DOCUMENTED_PORT}", "the first feed does not listen where README.md says")
    plant["feeds"][0]["listen"] = f"127.0.0.1:{port}"
    plant["feeds"][1]["folder"] = str(folder / "night-files")
    plant["alerts"]["log"] = str(folder / "alerts.ndjson")
    return plant


def send_as_documented(printf, port):
    """What `printf ... | nc -q 2` prints; without a netcat on this machine the same bytes go by a plain socket."""
    if shutil.which("nc"):
        piped = subprocess.run(["bash", "-c", f"{printf} | nc -q 2 127.0.0.1 {port}"], capture_output=True, text=True,
                               check=False, timeout=30)
        return piped.stdout
    say("no nc here: the same bytes by a socket")
    data = subprocess.run(shlex.split(printf), capture_output=True, check=True).stdout
    connection = Connection(port)
    connection.send(data)
    connection.end()
    return "".join(json.dumps(reply, separators=(",", ":")) + "\n" for reply in iter(connection.reply, None))


def netcat_line(site, port):
    pipes = PIPE.findall(README)
    want(len(pipes) == 1, f"README.md holds {len(pipes)} netcat lines with their reply; wanted one")
    printf, documented_port, reply = pipes[0]
    want(int(documented_port) == DOCUMENTED_PORT, f"README.md sends to port {documented_port}, the example listens on another")
    answer = send_as_documented(printf, port).strip()
    want(answer == reply, f"the logger was answered\n  {answer}\nREADME.md says\n  {reply}")
    say(f"the netcat line is answered as documented: {answer}")
    exported = site.command("export", "press-2").decode().splitlines()
    want(len(exported) == 2 and exported[1].startswith("2026-03-01T06:00:00Z,press-2,"), f"stored were {exported[1:]}")


def csv_rows(site, folder):
    """The first of its rows is the netcat line's, so that it comes as a repeat."""
    block = re.search(r"```\n(time,pump,.*?)```", README, re.S)
    want(block is not None, "README.md holds no CSV example")
    file = folder / "example.csv"
    file.write_text(block[1], encoding="utf-8")
    site.command("load", file)
    exported = site.command("export", "press-2").decode().splitlines()[1:]
    wanted = [line.split(",") for line in block[1].strip().splitlines()[1:]]
    want([line.split(",")[0] for line in exported] == [row[0] for row in wanted],
         f"after the CSV example {exported} is stored; wanted its rows once each")
    say(f"the CSV example is loaded as documented: {len(exported)} rows, one of them a repeat")


def subcommands(site):
    listed = sorted(set(re.findall(r"^slipledger ([a-z-]+)", README, re.M)))
    want(len(listed) >= 10, f"README.md lists {listed} only")
    for name in listed:
        done = subprocess.run([site.programs / "slipledger", name, "--help"], capture_output=True, text=True, check=False)
        want(done.returncode == 0, f"slipledger {name} is listed in README.md and not known")
        want(max(len(line) for line in done.stdout.splitlines()) <= 80, f"slipledger {name} --help is wider than a page")
    say(f"subcommands known: {', '.join(listed)}")


def examples(site):
    for file in sorted((SOURCE / "config" / "examples").glob("*.json")):
        done = subprocess.run([site.programs / "slipledger", "check-plant", file], capture_output=True, text=True, check=False)
        want(done.returncode == 0, f"check-plant refuses the example {file.name}: {done.stderr}{done.stdout}")
    wrong = subprocess.run([site.programs / "slipledger", "helth", "press-2"], capture_output=True, check=False)
    want(wrong.returncode == 2, f"an unknown subcommand ends with {wrong.returncode}; README.md says 2")
    unreadable = subprocess.run([site.programs / "slipledger", "fleet", "--plant", site.folder / "none.json"],
                                capture_output=True, check=False)
    want(unreadable.returncode == 3, f"a plant file that is not there ends with {unreadable.returncode}; README.md says 3")


def acts(site):
    """Acts by the command, while the daemon runs."""
    site.command("note", "press-2", "--by", "reader", "--text", "strainer\x1b[2J cleaned")
    for wrong in (("note", "press-2", "--by", " ", "--text", "x"), ("note", "press-2", "--by", "reader", "--text", ""),
                  ("health", "press-2", "--section", "B"),
                  ("replaced", "press-2", "--by", "reader", "--at", "2190-01-01"),
                  ("replaced", "press-2", "--by", "reader", "--displacement", "7100"),
                  ("replaced", "press-2", "--by", "reader", "--displacement", "-71", "--displacement-is-right")):
        site.command(*wrong, ends=(2,))
    want(site.command_done("export", "--from", "soon").stdout == b"", "export prints before its options are checked")
    hint = site.command_done("export", "--from", "soon").stderr.decode()
    for time in re.findall(r"2026-03-01[\dT:Z]*", hint) + ["2026-03-01 06:00", "2026-03-01T07:00+01:00"]:
        site.command("export", "--from", time)
    want(hint.count("2026-03-01") == 3, f"the hint has other examples: {hint}")
    site.command("replaced", "press-2", "--section", "A", "--at", "2026-03-01T07:00:00Z", "--by", "reader",
                 "--displacement", "71")
    events = site.json_of("health", "press-2")["events"]
    want([event["kind"] for event in events] == ["replaced", "note"], f"health tells the events {events}")
    want(events[1]["text"] == "strainer?[2J cleaned", f"the note is kept as {events[1]}")
    for text, name in (("", "empty.csv"), ("time,pump,outlet_pressure\n2026-03-01T06:00:00Z,press-9,180\n", "foul.csv")):
        (site.folder / name).write_text(text, encoding="utf-8")
        want(b"nothing taken" in site.command("load", site.folder / name, ends=(1,)), f"load of {name} does not say so")
    with open("/dev/full", "w", encoding="utf-8") as full:
        done = subprocess.run([site.programs / "slipledger", "fleet", "--plant", site.plant_file], stdout=full,
                              stderr=subprocess.DEVNULL, check=False)
    want(done.returncode == 3, f"fleet on a full disk ends with {done.returncode}; wanted 3")
    site.command("backup", site.folder / "copy.db")
    want((site.folder / "copy.db").stat().st_size > 0, "the backup is empty")
    for question in (("fleet",), ("health", "press-2"), ("history", "press-2"), ("alerts",), ("status",)):
        lines = site.command(*question).decode().splitlines()
        want(all(len(line) <= 80 for line in lines), f"slipledger {question[0]} is wider than 80 columns")
        site.json_of(*question)


def test(programs, folder):
    port = free_port()
    site = Site(programs, folder / "site", first_plant(folder, port))
    site.start()
    netcat_line(site, port)
    csv_rows(site, folder)
    subcommands(site)
    examples(site)
    acts(site)
    site.stop()


if __name__ == "__main__":
    run_test(test, 60)
