"""The demonstration's own plant file, and the daemon that runs on it."""
import json
import signal
import socket
import subprocess
import time
from pathlib import Path


class CannotRun(Exception):
    """The demonstration cannot go on; the text says why."""


def free_port():
    with socket.socket() as probe:
        probe.bind(("127.0.0.1", 0))
        return probe.getsockname()[1]


def write_plant_file(example, folder, webhook_url):
    """A copy of the example plant with the demonstration's own paths and ports, comments and all."""
    text = example.read_text(encoding="utf-8")
    (folder / "logger-files").mkdir(exist_ok=True)
    for written, wanted in {
        '"path": "veneer-mill.db"': f'"path": {json.dumps(str(folder / "ledger.db"))}',
        '"listen": "127.0.0.1:7310"': f'"listen": "127.0.0.1:{free_port()}"',
        '"folder": "logger-files"': f'"folder": {json.dumps(str(folder / "logger-files"))}',
        '"log": "alerts.ndjson"': f'"log": {json.dumps(str(folder / "alerts.ndjson"))}',
        '"url": "http://127.0.0.1:7390/alerts"': f'"url": "{webhook_url}"',
        '"listen": "127.0.0.1:7380"': f'"listen": "127.0.0.1:{free_port()}"',
    }.items():
        if text.count(written) != 1:
            raise CannotRun(f"{example} holds {written} {text.count(written)} times; wanted once")
        text = text.replace(written, wanted)
    plant = folder / "plant.json"
    plant.write_text(text, encoding="utf-8")
    return plant


class Daemon:
    """slipledgerd from start to stop, and the operator's command on the same plant file."""

    def __init__(self, programs, plant, folder):
        self._programs = Path(programs)
        self._plant = plant
        self._log = folder / "daemon.log"
        self._process = None
        self.drop_folder = folder / "logger-files"
        self.alert_log = folder / "alerts.ndjson"
        listens = [line.split('"listen": "')[1].split('"')[0]
                   for line in plant.read_text(encoding="utf-8").splitlines() if '"listen": "' in line]
        self.feed_address = listens[0]

    def __enter__(self):
        for name in ("slipledgerd", "slipledger", "plantsim"):
            if not (self._programs / name).exists():
                raise CannotRun(f"{self._programs / name} is not built")
        with open(self._log, "ab") as log:
            self._process = subprocess.Popen([self._programs / "slipledgerd", "--plant", self._plant],
                                             stdout=log, stderr=log)
        try:
            self._wait_until_listening()
        except CannotRun:
            self.__exit__()
            raise
        return self

    def __exit__(self, *_):
        if self._process.poll() is None:
            self._process.send_signal(signal.SIGTERM)
            try:
                self._process.wait(20)
            except subprocess.TimeoutExpired:
                self._process.kill()
                self._process.wait()

    def _wait_until_listening(self):
        host, port = self.feed_address.rsplit(":", 1)
        for _ in range(200):
            self.check_alive()
            with socket.socket() as probe:
                if probe.connect_ex((host, int(port))) == 0:
                    return
            time.sleep(0.05)
        raise CannotRun(f"the daemon does not listen on {self.feed_address}; see {self._log}")

    def check_alive(self):
        if self._process.poll() is not None:
            tail = "\n".join(self._log.read_text(errors="replace").splitlines()[-15:])
            raise CannotRun(f"the daemon ended with {self._process.returncode}:\n{tail}")

    def command(self, *arguments):
        done = subprocess.run([self._programs / "slipledger", *arguments, "--plant", self._plant],
                              capture_output=True, text=True, check=False)
        if done.returncode > 1:
            raise CannotRun(f"slipledger {' '.join(arguments)} ended with {done.returncode}: {done.stderr.strip()}")
        return done.stdout

    def json_of(self, *arguments):
        return json.loads(self.command(*arguments, "--json"))

    def wait_until_done(self, longest_s):
        """Until every file is taken, every work mark cleared and every notice delivered."""
        end = time.monotonic() + longest_s
        while self._unfinished():
            self.check_alive()
            if time.monotonic() > end:
                raise CannotRun(f"after {longest_s} s still: {self._unfinished()}; see {self._log}")
            time.sleep(0.3)

    def _unfinished(self):
        files = [path.name for path in self.drop_folder.glob("*.csv")]
        if files:
            return f"{len(files)} files to take"
        status = self.json_of("status")
        waiting = sum(target["pending"] for target in status["deliveries"])
        if status["marks"] or waiting:
            return f"{status['marks']} pumps to judge, {waiting} notices to deliver"
        return None
