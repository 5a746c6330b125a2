"""What the tests of this folder stand on: a folder of their own, a plant file made from the examples, the
daemon as a process, the operator's command, and one way to say that something is not as it should be.

A test is a script that gets the folder of the built programs. It ends only processes that it started itself."""
import atexit
import json
import os
import re
import shutil
import signal
import socket
import subprocess
import sys
import tempfile
import time
from pathlib import Path

sys.dont_write_bytecode = True
SOURCE = Path(__file__).resolve().parents[2]
sys.path.insert(0, str(SOURCE / "tools" / "demo"))

SKIPPED = 77  # what CMakeLists.txt tells ctest
SLOWNESS = float(os.environ.get("SLIPLEDGER_SLOWNESS", "1"))  # how much slower the programs are, under a sanitizer say
PROGRAMS = ("slipledgerd", "slipledger", "plantsim")


class NotAsItShouldBe(Exception):
    """The test has failed; the text says what was found and what was wanted."""


def want(condition, text):
    if not condition:
        raise NotAsItShouldBe(text)


def say(text):
    print(text, flush=True)


def until(met, longest_s, what, pause_s=0.05):
    """Waits until `met()` is true; fails, naming `what`, after `longest_s` (stretched where programs are slow)."""
    end = time.monotonic() + longest_s * SLOWNESS
    while True:
        found = met()
        if found:
            return found
        want(time.monotonic() < end, f"after {longest_s * SLOWNESS:.0f} s still not: {what}")
        time.sleep(pause_s)


def free_port():
    with socket.socket() as probe:
        probe.bind(("127.0.0.1", 0))
        return probe.getsockname()[1]


def example(name):
    """A plant file of config/examples as a value, its comments left out."""
    text = (SOURCE / "config" / "examples" / name).read_text(encoding="utf-8")
    string_or_comment = re.compile(r'"(?:\\.|[^"\\])*"|//[^\n]*|/\*.*?\*/', re.S)
    return json.loads(string_or_comment.sub(lambda m: m[0] if m[0].startswith('"') else "", text))


# Warm oil and a little more leakage are news here, so that alarms come and go all through a test.
TOUCHY = {"over_temperature_c": {"watch": 46, "plan": 48, "act": 50, "deadband": 0.5},
          "leakage_ratio": {"watch": 1.08, "plan": 1.2, "act": 1.4}}


def mill(pumps):
    """The veneer mill with these pumps alone, touchy limits, no feeds and nobody to alert."""
    plant = example("veneer-mill.json")
    plant["pumps"] = [pump for pump in plant["pumps"] if pump["id"] in pumps]
    plant["planned_stops"] = [stop for stop in plant["planned_stops"] if "areas" not in stop]
    plant["feeds"] = []
    plant["alerts"] = {"limits": TOUCHY}
    plant.pop("http", None)
    return plant


def tcp_feed(port, **more):
    return {"id": "loggers", "kind": "tcp", "listen": f"127.0.0.1:{port}", "reply": True, **more}


def drop_feed(folder, **more):
    return {"id": "files", "kind": "drop", "folder": str(folder), "stable_for": "100 ms", **more}


class Site:
    """One plant file in a folder of its own, with the daemon and the command on it."""

    def __init__(self, programs, folder, plant):
        self.programs = Path(programs)
        self.folder = Path(folder)
        self.folder.mkdir(parents=True, exist_ok=True)
        self.plant_file = self.folder / "plant.json"
        self.ledger = self.folder / "ledger.db"
        self.log = self.folder / "daemon.log"
        self.daemon = None
        self.write_plant({**plant, "store": {**plant.get("store", {}), "path": str(self.ledger)}})
        atexit.register(self.kill)

    def write_plant(self, plant):
        self.plant = plant
        self.plant_file.write_text(json.dumps(plant, indent=1), encoding="utf-8")

    def start(self, **popen):
        """Starts the daemon and waits until it says that it is ready."""
        begin = self.log.stat().st_size if self.log.exists() else 0
        with open(self.log, "ab") as log:
            self.daemon = subprocess.Popen([self.programs / "slipledgerd", "--plant", self.plant_file],
                                           stdout=log, stderr=log, **popen)
        until(lambda: self.daemon.poll() is not None or "ready:" in self.said(begin), 20, "the daemon is ready")
        want(self.daemon.poll() is None, f"the daemon ended with {self.daemon.poll()} at once:\n{self.said(begin)}")

    def said(self, begin=0):
        with open(self.log, "rb") as log:
            log.seek(begin)
            return log.read().decode(errors="replace")

    def kill(self):
        if self.daemon is not None and self.daemon.poll() is None:
            self.daemon.kill()
            self.daemon.wait()

    def stop(self):
        """A graceful stop. Returns how long it took."""
        begun = time.monotonic()
        self.daemon.send_signal(signal.SIGTERM)
        try:
            status = self.daemon.wait(30 * SLOWNESS)
        except subprocess.TimeoutExpired:
            raise NotAsItShouldBe("the daemon did not stop within 30 s of SIGTERM") from None
        want(status == 0, f"the daemon ended with {status} after SIGTERM; wanted 0. Its last words:\n{self.said()[-1500:]}")
        return time.monotonic() - begun

    def command(self, *arguments, ends=(0,)):
        """What `slipledger ARGUMENTS` prints, as bytes."""
        done = self.command_done(*arguments)
        want(done.returncode in ends, f"slipledger {' '.join(map(str, arguments))} ended with {done.returncode}; wanted "
                                      f"{' or '.join(map(str, ends))}: {done.stderr.decode(errors='replace').strip()[-800:]}")
        return done.stdout

    def command_done(self, *arguments):
        return subprocess.run([self.programs / "slipledger", *arguments, "--plant", self.plant_file],
                              capture_output=True, check=False, timeout=120 * SLOWNESS)

    def json_of(self, *arguments):
        return json.loads(self.command(*arguments, "--json"))

    def wait_until_done(self, longest_s=60):
        """Until every dropped file is taken, every mark judged and every notice delivered."""
        until(lambda: not self.unfinished(), longest_s, "all taken, judged and delivered", 0.3)

    def unfinished(self):
        want(self.daemon.poll() is None, f"the daemon ended with {self.daemon.poll()}:\n{self.said()[-1500:]}")
        for feed in self.plant["feeds"]:
            if feed["kind"] == "drop" and any(path.is_file() for path in Path(feed["folder"]).iterdir()):
                return "files to take"
        status = self.json_of("status")
        if status["marks"]:
            return f"{status['marks']} marks"
        return next((f"{target['pending']} notices" for target in status["deliveries"] if target["pending"]), None)

    def judgements(self):
        """Everything judged that does not hang on the wall clock, by name, each as the bytes the command prints."""
        kept = {"export": self.command("export"), "alerts": self.command("alerts", "--json")}
        for pump in self.plant["pumps"]:
            for by in ("day", "summary"):
                kept[f"history {pump['id']} --by {by}"] = self.command("history", pump["id"], "--by", by, "--json")
        return kept


def compare(reference, other, what):
    """Fails at the first value that differs, with the first line that does."""
    want(reference.keys() == other.keys(), f"{what}: other things were found: {sorted(reference)} {sorted(other)}")
    for name, wanted in reference.items():
        if other[name] == wanted:
            continue
        lines = [(a, b) for a, b in zip(wanted.splitlines(), other[name].splitlines()) if a != b]
        first = f"first difference: {lines[0][0]!r} wanted, {lines[0][1]!r} found" if lines else "one is longer"
        raise NotAsItShouldBe(f"{what}: {name} differs ({len(wanted)} and {len(other[name])} bytes); {first}")


class Connection:
    """A plain logger: sends lines, reads replies."""

    def __init__(self, port, timeout_s=20):
        self._socket = socket.create_connection(("127.0.0.1", port), timeout_s * SLOWNESS)
        self._unread = b""

    def send(self, data):
        self._socket.sendall(data if isinstance(data, bytes) else data.encode())

    def reply(self):
        """The next reply; None once the daemon has closed the connection."""
        while b"\n" not in self._unread:
            got = self._socket.recv(65536)
            if not got:
                return None
            self._unread += got
        line, self._unread = self._unread.split(b"\n", 1)
        return json.loads(line)

    def replies_through(self, line):
        """All replies up to the one that answers for this line."""
        replies = []
        while not replies or replies[-1]["through"] < line:
            reply = self.reply()
            want(reply is not None, f"the daemon closed the connection before it answered for line {line}")
            want("through" in reply, f"the daemon could not store: {reply}")
            replies.append(reply)
        return replies

    def end(self):
        self._socket.shutdown(socket.SHUT_WR)

    def close(self):
        self._socket.close()


def plantsim(programs, *arguments):
    """Runs the simulator to its end; says what it said where it failed."""
    done = subprocess.run([Path(programs) / "plantsim", *map(str, arguments)], capture_output=True, text=True,
                          check=False, timeout=120 * SLOWNESS)
    want(done.returncode == 0, f"plantsim {' '.join(map(str, arguments))} ended with {done.returncode}: {done.stderr.strip()}")
    return done.stderr


def run_test(test, longest_s):
    """Runs `test(programs, folder)` with the folder of the programs (the script's one argument) and a temporary folder,
    which stays for a look where the test fails. Ends the process."""
    def out_of_time(*_):
        raise NotAsItShouldBe(f"not done after {longest_s * SLOWNESS:.0f} s")

    programs = Path(sys.argv[1] if len(sys.argv) > 1 else SOURCE / "build" / "release" / "bin").resolve()
    missing = [name for name in PROGRAMS if not (programs / name).exists()]
    folder = Path(tempfile.mkdtemp(prefix="slipledger-test-"))
    signal.signal(signal.SIGALRM, out_of_time)
    signal.signal(signal.SIGTERM, lambda *_: sys.exit(143))
    signal.alarm(int(longest_s * SLOWNESS))
    begun = time.monotonic()
    try:
        want(not missing, f"{', '.join(missing)} not built in {programs}")
        test(programs, folder)
    except NotAsItShouldBe as problem:
        say(f"NOT AS IT SHOULD BE: {problem}\nThe test's files are in {folder}")
        sys.exit(1)
    except subprocess.TimeoutExpired as problem:
        say(f"NOT AS IT SHOULD BE: {problem}\nThe test's files are in {folder}")
        sys.exit(1)
    shutil.rmtree(folder, ignore_errors=True)
    say(f"as it should be, in {time.monotonic() - begun:.1f} s")
    sys.exit(0)
