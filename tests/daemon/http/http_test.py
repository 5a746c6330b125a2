#!/usr/bin/python3
"""The pages and the API of a running daemon: what the command says is what they say, and what a foul client
sends does no harm.

   http_test.py FOLDER_OF_PROGRAMS"""
import http.client
import json
import socket
import sys
from pathlib import Path

sys.path.insert(0, str(Path(__file__).resolve().parents[2] / "system"))
from proving_ground import Site, free_port, mill, plantsim, run_test, say, want  # noqa: E402

PUMPS = ("press-1", "lathe-1", "clipper-1")


def get(port, path, method="GET", headers=None):
    connection = http.client.HTTPConnection("127.0.0.1", port, timeout=20)
    connection.request(method, path, headers=headers or {})
    answer = connection.getresponse()
    body = answer.read()
    connection.close()
    return answer.status, answer.getheader("Content-Type", ""), body


def wanted(port, path, kind):
    status, content_type, body = get(port, path)
    want(status == 200, f"GET {path} is answered {status}; wanted 200: {body[:200]!r}")
    want(content_type.startswith(kind), f"GET {path} has type {content_type}; wanted {kind}")
    return body


def same_as_the_command(site, port):
    for pump in PUMPS:
        for path, command in ((f"/api/pumps/{pump}/health", ("health", pump)),
                              (f"/api/pumps/{pump}/history", ("history", pump)),
                              (f"/api/pumps/{pump}/history?by=summary", ("history", pump, "--by", "summary"))):
            told, printed = wanted(port, path, "application/json"), site.command(*command, "--json")
            want(told == printed, f"{path} and slipledger {' '.join(command)} --json differ")
            say(f"{len(told):>8} bytes the same: {path}")
    want(wanted(port, "/api/fleet", "application/json") == site.command("fleet", "--json"), "/api/fleet and fleet --json differ")


def pages_and_metrics(port):
    want(b"press-1" in wanted(port, "/", "text/html"), "the fleet page does not name press-1")
    page = wanted(port, "/pumps/lathe-1", "text/html")
    want(b"safety" in page, "a pump's page goes without its cautions")
    want(b"<script>" not in page, "a page holds inline script, which its own policy forbids")
    metrics = wanted(port, "/metrics", "application/openmetrics-text")
    want(metrics.endswith(b"# EOF\n"), f"/metrics ends with {metrics[-40:]!r}; wanted # EOF")
    for line in metrics.decode().splitlines():
        want(line.startswith("# ") or len(line.rsplit(" ", 1)) == 2 and float(line.rsplit(" ", 1)[1]) is not None,
             f"not a metric: {line}")
    want(b"alive" in wanted(port, "/healthz", "text/plain"), "/healthz does not say alive")
    want(b"ready" in wanted(port, "/readyz", "text/plain"), "/readyz does not say ready")


def a_problem(answer, statuses, what):
    status, content_type, body = answer
    want(status in statuses, f"{what} is answered {status}; wanted {' or '.join(map(str, statuses))}")
    want(content_type == "application/problem+json", f"{what} is answered in {content_type}; wanted problem details")
    details = json.loads(body)
    want(details["status"] == status and details["title"], f"{what}: problem details are not whole: {details}")
    say(f"{what}: {status}, {details['title']}")


def foul_requests(port):
    for method in ("POST", "PUT", "DELETE", "PATCH"):
        a_problem(get(port, "/api/fleet", method), (405,), f"{method} /api/fleet")
    for path in ("/../../etc/passwd", "/web/../../../etc/passwd", "/web/%2e%2e/%2e%2e/etc/passwd",
                 "/api/pumps/..%2f..%2fetc/health", "/api/pumps/press-1%00/health", "/nothing/here"):
        a_problem(get(port, path), (400, 404), f"GET {path}")
    a_problem(get(port, "/api/pumps/press-99/health"), (404,), "a pump that is not there")
    for query in ("by=week", "by=", "section=Z"):
        a_problem(get(port, f"/api/pumps/press-1/history?{query}"), (400,), f"history?{query}")
    for host in ("elsewhere.example", "127.0.0.1.example:80", "", "localhost.example"):
        a_problem(get(port, "/api/fleet", headers={"Host": host}), (421,), f"a request for the host {host!r}")
    for host in ("localhost", "LOCALHOST:80", "127.0.0.1:1", "[::1]", f"[::1]:{port}"):
        want(get(port, "/healthz", headers={"Host": host})[0] == 200, f"a request for the host {host} is not answered")
    a_problem(raw(port, b"GET /healthz HTTP/1.1\r\nHost: x\r\nX-Long: " + b"a" * 200_000 + b"\r\n\r\n"), (400, 431),
              "a header of 200 KB")
    a_problem(raw(port, b"GET /" + b"a" * 60_000 + b" HTTP/1.1\r\nHost: x\r\n\r\n"), (400, 414, 431), "a path of 60 KB")
    a_problem(raw(port, b"\x16\x03\x01\x02\x00\x01\x00 not http at all\r\n\r\n"), (400,), "TLS to a plain port")


def raw(port, data):
    """Sends bytes as they are and reads the answer, if any, as http.client does."""
    with socket.create_connection(("127.0.0.1", port), 20) as connection:
        try:
            connection.sendall(data)
        except OSError:
            pass  # closed while we were still sending: the answer may have come all the same
        answer = http.client.HTTPResponse(connection)
        try:
            answer.begin()
        except (http.client.HTTPException, OSError) as problem:
            want(False, f"{data[:30]!r}... got no answer: {problem!r}")
        return answer.status, answer.getheader("Content-Type", ""), answer.read()


def half_requests(port):
    """Clients that begin and say no more hold up nobody."""
    idle = [socket.create_connection(("127.0.0.1", port), 20) for _ in range(50)]
    for connection in idle:
        connection.sendall(b"GET /api/fleet HT")
    wanted(port, "/healthz", "text/plain")
    for connection in idle:
        connection.close()


def test(programs, folder):
    plantsim(programs, "--csv", folder / "mill.csv", "--pumps", ",".join(PUMPS), "--from", "2025-07-20", "--days", 20)
    port = free_port()
    site = Site(programs, folder / "site", {**mill(PUMPS), "http": {"listen": f"127.0.0.1:{port}"}})
    site.start()
    site.command("load", folder / "mill.csv")
    site.wait_until_done()
    same_as_the_command(site, port)
    pages_and_metrics(port)
    foul_requests(port)
    half_requests(port)
    pages_and_metrics(port)
    want(site.daemon.poll() is None, "the daemon did not live through it")
    say(f"stopped in {site.stop():.2f} s")


if __name__ == "__main__":
    run_test(test, 60)
