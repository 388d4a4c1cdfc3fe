"""A service in its own process, and a relay before it that counts, refuses, cuts and repeats nothing by itself."""

import http.client
import os
import socket
import subprocess
import sys
import threading
import time
import urllib.error
import urllib.request
from collections.abc import Callable, Iterator
from contextlib import contextmanager, suppress
from http.server import BaseHTTPRequestHandler, ThreadingHTTPServer
from pathlib import Path

ROOT = Path(__file__).parents[2]
EXAMPLES = ROOT / "examples"
ENVIRONMENT = {name: value for name, value in os.environ.items() if not name.startswith("CATSPAW_")}
ENVIRONMENT |= {"NO_PROXY": "127.0.0.1", "no_proxy": "127.0.0.1", "LC_ALL": "C.UTF-8"}
PATIENCE = 60  # s


def free_port() -> int:
    with socket.socket() as probe:
        probe.bind(("127.0.0.1", 0))
        port: int = probe.getsockname()[1]
        return port


def until(true: Callable[[], bool], patience: float = PATIENCE, pause: float = 0.02) -> None:
    """Poll until something is true."""
    end = time.monotonic() + patience
    waiting = threading.Event()
    while not true():
        assert time.monotonic() < end, "waited in vain"
        waiting.wait(pause)


class Service:
    """The service on a port of its own; it can be stopped, and started again on the same port."""

    def __init__(self, log: Path) -> None:
        self.port = free_port()
        self.url = f"http://127.0.0.1:{self.port}"
        self._log = log
        self._process: subprocess.Popen[bytes] | None = None

    def start(self) -> None:
        with self._log.open("ab") as sink:
            process = subprocess.Popen(
                [sys.executable, "-m", "service", "--bind", f"127.0.0.1:{self.port}", "--workers", "1"],
                cwd=ROOT,
                env=ENVIRONMENT,
                stdout=sink,
                stderr=sink,
            )
        self._process = process
        until(lambda: process.poll() is not None or self.is_ready(), pause=0.05)
        assert process.poll() is None, self._log.read_text()

    def stop(self) -> None:
        if self._process is not None:
            self._process.terminate()
            try:
                self._process.wait(PATIENCE)
            finally:
                self._process.kill()

    def is_ready(self) -> bool:
        try:
            with urllib.request.urlopen(f"{self.url}/readyz", timeout=5) as response:
                return bool(response.status == 200)
        except (urllib.error.URLError, ConnectionError, TimeoutError):
            return False


class Relay:
    """Passes requests on to a service and notes them; ``faults`` says what happens to the next ones instead.

    A fault is ``503`` (with Retry-After: 0), ``drop`` (closed without a word) or ``cut`` (half of the answer).
    """

    def __init__(self, behind: str) -> None:
        self.faults: list[str] = []
        self.requests: list[tuple[str, str]] = []
        relay, port = self, int(behind.rpartition(":")[2])

        class Handler(BaseHTTPRequestHandler):
            protocol_version = "HTTP/1.1"

            def do_GET(self) -> None:
                self.passed_on(b"")

            def do_POST(self) -> None:
                self.passed_on(self.rfile.read(int(self.headers["Content-Length"])))

            def passed_on(self, body: bytes) -> None:
                relay.requests.append((self.command, self.path.partition("?")[0]))
                fault = relay.faults.pop(0) if relay.faults else ""
                self.close_connection = True
                if fault == "drop":
                    return
                if fault == "503":
                    self.send_response(503)
                    self.send_header("Retry-After", "0")
                    self.send_header("Content-Length", "0")
                    self.send_header("Connection", "close")
                    self.end_headers()
                    return
                connection = http.client.HTTPConnection("127.0.0.1", port, timeout=PATIENCE)
                headers = {"Content-Type": self.headers.get("Content-Type", ""), "Connection": "close"}
                connection.request(self.command, self.path, body, headers)
                answer = connection.getresponse()
                text = answer.read()
                connection.close()
                self.send_response(answer.status)
                self.send_header("Content-Length", str(len(text)))
                self.send_header("Connection", "close")
                self.end_headers()
                self.wfile.write(text[: len(text) // 2] if fault == "cut" else text)

            def log_message(self, *_: object) -> None:
                pass

        self._server = ThreadingHTTPServer(("127.0.0.1", 0), Handler)
        self.url = f"http://127.0.0.1:{self._server.server_address[1]}"
        self._thread = threading.Thread(target=self._server.serve_forever, kwargs={"poll_interval": 0.05})

    @contextmanager
    def running(self) -> Iterator["Relay"]:
        self._thread.start()
        try:
            yield self
        finally:
            self._server.shutdown()
            self._server.server_close()
            self._thread.join(PATIENCE)


@contextmanager
def stopped_at_the_end(process: "subprocess.Popen[bytes]") -> Iterator["subprocess.Popen[bytes]"]:
    try:
        yield process
    finally:
        with suppress(ProcessLookupError):
            process.kill()
        process.wait(PATIENCE)
