"""A small receiver of webhooks on the loopback, so that the demonstration can show what arrives."""
import threading
from http.server import BaseHTTPRequestHandler, ThreadingHTTPServer


class WebhookReceiver:
    """Keeps each body as one line, in order, in memory and in a file."""

    def __init__(self, log):
        self.lines = []
        receiver = self

        class Handler(BaseHTTPRequestHandler):
            protocol_version = "HTTP/1.1"

            def do_POST(self):  # noqa: N802  (the name http.server looks for)
                body = self.rfile.read(int(self.headers.get("Content-Length", 0))).decode()
                receiver.keep(" ".join(body.split("\n")))
                self.send_response(204)
                self.send_header("Content-Length", "0")
                self.end_headers()

            def log_message(self, *_):
                pass

        self._file = open(log, "a", encoding="utf-8", buffering=1)
        self._guard = threading.Lock()
        self._server = ThreadingHTTPServer(("127.0.0.1", 0), Handler)
        self.url = f"http://127.0.0.1:{self._server.server_address[1]}/alerts"
        threading.Thread(target=self._server.serve_forever, daemon=True).start()

    def keep(self, line):
        with self._guard:
            self.lines.append(line)
            self._file.write(line + "\n")
