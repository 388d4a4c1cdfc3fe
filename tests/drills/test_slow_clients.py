"""Clients that send a byte now and then, say nothing, or do not read: the others are served, and threads come back."""

import shutil
import socket
import subprocess
import threading
import time
from collections.abc import Iterator
from contextlib import ExitStack, contextmanager
from pathlib import Path

import pytest

from tests.api.questions import table
from tests.drills.serving import PATIENCE, ROOT, ROW, Clients, Served, answers_of, received, served, until

pytestmark = pytest.mark.drills
FRONT = ROOT / "examples" / "deploy" / "nginx"
COUNT = 50
HEAD = b"POST /v1/flux?gas=co2 HTTP/1.1\r\nHost: x\r\nContent-Length: 100000\r\n"
# What a slow client sends first; after that it sends a byte now and then, or nothing.
SLOW: dict[str, tuple[bytes, bytes]] = {
    "heads": (b"POST /v1/flux HTTP/1.1\r\nHost: x\r\nX-Slow: ", b"x"),
    "bodies": (HEAD + b"\r\nsalinity", b"1"),
    "silence": (b"", b""),
}
LARGE = table([ROW] * 150_000)


@contextmanager
def slow_clients(port: int, first: bytes, then: bytes, count: int = COUNT) -> Iterator[list[socket.socket]]:
    """Hold connections that send a byte each every half second, or none."""
    over = threading.Event()
    with ExitStack() as stack:
        connections = [stack.enter_context(socket.create_connection(("127.0.0.1", port))) for _ in range(count)]
        for connection in connections:
            connection.sendall(first)

        def trickle() -> None:
            while then and not over.wait(0.5):
                for connection in connections:
                    try:
                        connection.sendall(then)
                    except OSError:
                        continue

        thread = threading.Thread(target=trickle)
        thread.start()
        try:
            yield connections
        finally:
            over.set()
            thread.join(PATIENCE)


def asked_beside(one: Served, expected: dict[str, bytes]) -> None:
    """Ask from eight sides a hundred times, and find every answer there and right."""
    with Clients(one.port, expected) as clients:
        clients.wait_for(100)
        tally = clients.tally

    assert tally.failures == []
    assert tally.differing == 0
    assert sorted(tally.seconds)[int(0.99 * len(tally.seconds))] < 5  # s, ten times the bar


@pytest.mark.parametrize("kind", SLOW)
def test_others_are_served_beside_fifty_slow_clients(tmp_path: Path, kind: str) -> None:
    with served(tmp_path) as one:
        expected = answers_of(one)
        with slow_clients(one.port, *SLOW[kind]):
            asked_beside(one, expected)


@pytest.mark.parametrize("kind", ["heads", "bodies"])
def test_slow_clients_who_hold_every_thread_are_let_go(tmp_path: Path, kind: str) -> None:
    with served(tmp_path, {"THREADS": 4, "SLOW_SECONDS": 1}) as one:
        expected = answers_of(one)
        with slow_clients(one.port, *SLOW[kind], count=24) as connections:
            first, *_ = [received(connection) for connection in connections]
            asked_beside(one, expected)

    assert first.startswith(b"HTTP/1.1 408" if kind == "heads" else b"HTTP/1.1 400")
    assert b"application/problem+json" in first
    assert b"cut_short" in first


def test_a_silent_connection_holds_no_thread(tmp_path: Path) -> None:
    with served(tmp_path, {"THREADS": 1}, workers=1) as one:
        expected = answers_of(one)
        with slow_clients(one.port, *SLOW["silence"], count=8):
            asked_beside(one, expected)


def test_a_client_that_does_not_read_is_let_go_and_holds_no_slot(tmp_path: Path) -> None:
    """Four who ask for tens of megabytes and read none, of a service with as many threads and one slot."""
    with served(tmp_path, {"THREADS": 4, "SLOTS": 1, "SLOW_SECONDS": 2, "WAIT_SECONDS": 60}, workers=1) as one:
        expected = one.ask("/v1/flux?gas=co2&pick=flux", table([ROW] * 2000))[2]
        ask = b"POST /v1/flux?gas=co2 HTTP/1.1\r\nHost: x\r\nContent-Length: %d\r\n\r\n" % len(LARGE)
        with ExitStack() as stack:
            for _ in range(4):
                connection = stack.enter_context(socket.create_connection(("127.0.0.1", one.port)))
                connection.setsockopt(socket.SOL_SOCKET, socket.SO_RCVBUF, 4096)
                connection.sendall(ask + LARGE)
            status, _, told = one.ask("/v1/flux?gas=co2&pick=flux", table([ROW] * 2000))

        assert (status, told) == (200, expected)
        assert "Traceback" not in one.said


def test_a_client_that_is_slow_but_steady_is_served(tmp_path: Path) -> None:
    """A kilobyte every half second: slower than the limit of silence, faster than the least rate."""
    content = table([ROW] * 400)
    assert len(content) > 8 * 1024
    with served(tmp_path, {"SLOW_SECONDS": 2}) as one, socket.create_connection(("127.0.0.1", one.port)) as connection:
        expected = one.ask("/v1/flux?gas=co2&pick=flux", content)[2]
        began = time.monotonic()
        head = b"POST /v1/flux?gas=co2&pick=flux HTTP/1.1\r\nHost: x\r\nConnection: close\r\nContent-Length: %d\r\n\r\n"
        connection.sendall(head % len(content))
        pause = threading.Event()
        for at in range(0, len(content), 1024):
            connection.sendall(content[at : at + 1024])
            pause.wait(0.5)
        told = received(connection)

        assert time.monotonic() - began > 2 * 2
        assert told.startswith(b"HTTP/1.1 200")
        assert expected.rpartition(b"\n")[0].rpartition(b"\n")[2] in told


@contextmanager
def front(folder: Path, behind: int) -> Iterator[int]:
    """Run the front of the examples before a service, on a free port."""
    with socket.create_server(("127.0.0.1", 0)) as probe:
        port = probe.getsockname()[1]
    for name in ("upstream", "front"):
        text = (FRONT / f"{name}.conf").read_text()
        text = text.replace("127.0.0.1:8660", f"127.0.0.1:{behind}").replace("listen 80", f"listen 127.0.0.1:{port}")
        (folder / f"{name}.conf").write_text(text)
    places = "".join(
        f"{kind}_temp_path {folder}/{kind};\n" for kind in ("client_body", "proxy", "fastcgi", "uwsgi", "scgi")
    )
    (folder / "nginx.conf").write_text(
        f"daemon off;\nuser root;\npid {folder}/pid;\nevents {{ worker_connections 1024; }}\n"
        f"http {{ access_log off;\n{places}include {folder}/upstream.conf;\ninclude {folder}/front.conf;\n}}\n"
    )
    process = subprocess.Popen(["nginx", "-c", folder / "nginx.conf", "-p", folder, "-e", folder / "error"])
    try:
        until(lambda: process.poll() is not None or Served(process, folder, port).is_ready())
        assert process.poll() is None, (folder / "error").read_text()
        yield port
    finally:
        process.terminate()
        process.wait(PATIENCE)


needs_front = pytest.mark.skipif(shutil.which("nginx") is None, reason="nginx is not installed")


@needs_front
@pytest.mark.parametrize("kind", SLOW)
def test_a_front_keeps_slow_clients_from_a_service_of_two_threads(tmp_path: Path, kind: str) -> None:
    with served(tmp_path, {"THREADS": 2}, workers=1) as one, front(tmp_path, one.port) as port:
        expected = answers_of(one)
        with slow_clients(port, *SLOW[kind]):
            asked_beside(Served(one.process, tmp_path, port), expected)


@needs_front
def test_a_front_takes_the_answers_of_those_who_do_not_read(tmp_path: Path) -> None:
    with served(tmp_path, {"THREADS": 4}, workers=1) as one, front(tmp_path, one.port) as port:
        expected = answers_of(one)
        content = table([ROW] * 20_000)
        ask = b"POST /v1/flux?gas=co2 HTTP/1.1\r\nHost: x\r\nContent-Length: %d\r\n\r\n" % len(content)
        with ExitStack() as stack:
            for _ in range(16):
                connection = stack.enter_context(socket.create_connection(("127.0.0.1", port)))
                connection.setsockopt(socket.SOL_SOCKET, socket.SO_RCVBUF, 4096)
                connection.sendall(ask + content)
            asked_beside(Served(one.process, tmp_path, port), expected)


@needs_front
def test_a_front_tells_its_own_refusals_like_the_service(tmp_path: Path) -> None:
    with served(tmp_path) as one, front(tmp_path, one.port) as port:
        before = Served(one.process, tmp_path, port)
        too_large = before.ask("/v1/flux", None, {"Content-Length": str(10**10)})
        same = before.ask("/v1/flux")
        stopped = one.stop()
        gone = before.ask("/v1/flux")

    assert too_large[0] == 413
    assert same[0] == 422
    assert stopped == 0
    assert gone[0] == 503
    assert "Retry-After" in gone[1]
    for _, headers, told in (too_large, same, gone):
        assert headers["Content-Type"] == "application/problem+json"
        assert told.startswith(b'{"type":')
