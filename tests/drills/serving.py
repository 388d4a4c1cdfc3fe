"""A running service that drills do harm to, and clients that keep asking it while they do."""

import http.client
import json
import os
import re
import socket
import subprocess
import sys
import threading
import time
from collections.abc import Callable, Iterator, Mapping, Sequence
from contextlib import contextmanager, suppress
from dataclasses import dataclass, field
from pathlib import Path
from typing import Any

from tests.api.questions import body, flux, table

ROOT = Path(__file__).parents[2]
LISTENING = re.compile(r"Listening at: http://127\.0\.0\.1:(\d+)")
ENVIRONMENT = {name: value for name, value in os.environ.items() if not name.startswith("CATSPAW_")}
BARE = {"PATH": "/usr/bin:/bin"}
PATIENCE = 60.0  # s
SERVE = (sys.executable, "-m", "service", "serve")


def until(true: Callable[[], bool], patience: float = PATIENCE, pause: float = 0.02) -> None:
    """Poll until something is true."""
    end = time.monotonic() + patience
    waiting = threading.Event()
    while not true():
        assert time.monotonic() < end, "waited in vain"
        waiting.wait(pause)


class Served:
    """A service in processes of its own, on a free port of the loopback."""

    def __init__(self, process: "subprocess.Popen[bytes]", folder: Path, port: int) -> None:
        self.process = process
        self.port = port
        self._folder = folder

    @property
    def workers(self) -> set[int]:
        """Return the process ids of its workers."""
        with suppress(FileNotFoundError):
            told = Path(f"/proc/{self.process.pid}/task/{self.process.pid}/children").read_text()
            return {int(one) for one in told.split()}
        return set()

    @property
    def lines(self) -> list[dict[str, Any]]:
        """Return what it wrote of its requests."""
        return [json.loads(line) for line in (self._folder / "out").read_bytes().splitlines()]

    @property
    def said(self) -> str:
        """Return what it said beside that."""
        return (self._folder / "err").read_text()

    def ask(
        self, path: str, content: bytes | None = None, headers: Mapping[str, str] | None = None
    ) -> tuple[int, dict[str, str], bytes]:
        """Send one request on a connection of its own."""
        connection = http.client.HTTPConnection("127.0.0.1", self.port, timeout=PATIENCE)
        try:
            connection.request("GET" if content is None else "POST", path, content, dict(headers or {}))
            answer = connection.getresponse()
            return answer.status, dict(answer.getheaders()), answer.read()
        finally:
            connection.close()

    def is_ready(self) -> bool:
        """Tell whether it says that it is ready."""
        with suppress(OSError, http.client.HTTPException):
            return self.ask("/readyz")[0] == 200
        return False

    def stop(self) -> int:
        """Stop it and return its exit status."""
        self.process.terminate()
        return self.process.wait(PATIENCE)


@contextmanager
def served(
    folder: Path,
    settings: Mapping[str, Any] | None = None,
    command: Sequence[str] = SERVE,
    environment: Mapping[str, str] | None = None,
    workers: int = 2,
    **more: Any,
) -> Iterator[Served]:
    """Run a service with some settings, as ``NAME=value`` without the prefix, until the block ends."""
    asked = {"BIND": "127.0.0.1:0", "WORKERS": workers, **(settings or {})}
    variables = {**(environment or ENVIRONMENT), **{f"CATSPAW_{name}": str(value) for name, value in asked.items()}}
    with (folder / "out").open("wb") as out, (folder / "err").open("wb") as err:
        process = subprocess.Popen([*command], cwd=ROOT, env=variables, stdout=out, stderr=err, **more)
    try:
        port = 0

        def listens() -> bool:
            nonlocal port
            assert process.poll() is None, (folder / "err").read_text()
            port = int(found[1]) if (found := LISTENING.search((folder / "err").read_text())) else 0
            return port > 0

        until(listens)
        one = Served(process, folder, port)
        until(one.is_ready)
        yield one
    finally:
        if process.poll() is None:
            process.terminate()
        try:
            process.wait(PATIENCE)
        finally:
            if process.poll() is None:
                process.kill()


# Questions of every size with a fixed answer each.
ROW = [18.4, 35.1, 1008.2, 7.5, 18.0, 380.0, 419.0]
QUESTIONS: dict[str, tuple[str, bytes | None]] = {
    "one": (flux(), None),
    "number": (flux(form="number"), None),
    "json": ("/v1/flux", body(wind_speed=[float(speed) for speed in range(1, 20)])),
    "table": ("/v1/flux?gas=co2&pick=flux", table([ROW] * 300)),
}


@dataclass
class Tally:
    """What clients saw: answers, what failed for which client, what differed, what had to be sent again."""

    answers: int = 0
    failures: list[tuple[int, str]] = field(default_factory=list)
    differing: int = 0
    again: int = 0
    longest: float = 0.0
    seconds: list[float] = field(default_factory=list)


class Clients:
    """Clients that ask the same questions over and over, on connections that they keep.

    A connection that ends between two requests, before a byte of an answer, is opened again and the request sent once
    more, as a client may; anything else is a failure.
    """

    def __init__(self, port: int, expected: Mapping[str, bytes], count: int = 8, at_most: int = 2000) -> None:
        self.tally = Tally()
        self._port, self._expected, self._at_most = port, expected, at_most
        self._stop, self._lock = threading.Event(), threading.Lock()
        self._threads = [threading.Thread(target=self._run, args=(number,)) for number in range(count)]

    def __enter__(self) -> "Clients":
        for thread in self._threads:
            thread.start()
        return self

    def __exit__(self, *_: object) -> None:
        self._stop.set()
        for thread in self._threads:
            thread.join(PATIENCE)

    def wait_for(self, answers: int) -> None:
        """Wait until there are so many more answers, or a failure."""
        wanted = self.tally.answers + answers
        until(lambda: self.tally.answers >= wanted or bool(self.tally.failures))

    def _run(self, number: int) -> None:
        connection = http.client.HTTPConnection("127.0.0.1", self._port, timeout=PATIENCE)
        names = list(self._expected)
        for turn in range(self._at_most):
            if self._stop.is_set():
                break
            name = names[(turn + number) % len(names)]
            path, content = QUESTIONS[name]
            began = time.monotonic()
            try:
                status, told = self._ask(connection, path, content)
            except (OSError, http.client.HTTPException) as error:
                connection.close()
                with self._lock:
                    self.tally.failures.append((number, f"{name}: {error!r}"))
                continue
            spent = time.monotonic() - began
            with self._lock:
                self.tally.answers += 1
                self.tally.longest = max(self.tally.longest, spent)
                self.tally.seconds.append(spent)
                self.tally.differing += told != self._expected[name]
                if status != 200:
                    self.tally.failures.append((number, f"{name}: {status}"))
        connection.close()

    def _ask(self, connection: http.client.HTTPConnection, path: str, content: bytes | None) -> tuple[int, bytes]:
        kept = connection.sock is not None
        try:
            connection.request("GET" if content is None else "POST", path, content)
            answer = connection.getresponse()
        except (http.client.RemoteDisconnected, ConnectionResetError, BrokenPipeError):
            connection.close()
            if not kept:
                raise
            with self._lock:
                self.tally.again += 1
            connection.request("GET" if content is None else "POST", path, content)
            answer = connection.getresponse()
        return answer.status, answer.read()


def answers_of(one: Served) -> dict[str, bytes]:
    """Return the answer to every question."""
    found = {}
    for name, (path, content) in QUESTIONS.items():
        status, _, told = one.ask(path, content)
        assert status == 200, told
        found[name] = told
    return found


def received(connection: socket.socket) -> bytes:
    """Return all that comes until the other side is done."""
    found = b""
    with suppress(ConnectionResetError):
        while piece := connection.recv(65536):
            found += piece
    return found
