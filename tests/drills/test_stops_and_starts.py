"""Stopping, reloading, killing and restarting under load: nothing in flight is lost."""

import os
import re
import signal
import socket
import subprocess
import sys
import time
from pathlib import Path

import pytest

from tests.api.questions import table
from tests.drills.serving import (
    ENVIRONMENT,
    PATIENCE,
    ROOT,
    ROW,
    SERVE,
    Clients,
    Served,
    answers_of,
    received,
    served,
    until,
)

pytestmark = pytest.mark.drills
LONG = table([ROW] * 40_000)
PLACE = 'method="POST",route="/v1/flux"'


def request(content: bytes, path: str = "/v1/flux?gas=co2") -> bytes:
    return (
        b"POST %b HTTP/1.1\r\nHost: x\r\nConnection: close\r\nContent-Length: %d\r\n\r\n"
        % (
            path.encode(),
            len(content),
        )
        + content
    )


def whole(answer: bytes) -> bool:
    """Tell whether an answer in chunks came to its end."""
    return answer.startswith(b"HTTP/1.1 200") and answer.endswith(b"\r\n0\r\n\r\n")


def test_every_request_sent_before_the_word_to_stop_is_answered_in_full(tmp_path: Path) -> None:
    """Four long ones under way, and eight connections still in the queue of a worker that is busy accepting."""
    with served(tmp_path, workers=1) as one:
        expected = one.ask("/v1/flux?gas=co2", LONG)[2]
        connections = [socket.create_connection(("127.0.0.1", one.port), timeout=PATIENCE) for _ in range(12)]
        for number, connection in enumerate(connections):
            connection.sendall(request(LONG if number < 4 else table()))
        one.process.send_signal(signal.SIGTERM)
        answers = [received(connection) for connection in connections]
        status = one.process.wait(PATIENCE)
        for connection in connections:
            connection.close()

    assert [whole(answer) for answer in answers] == [True] * 12
    assert all(answer.count(b"\n") > expected.count(b"\n") for answer in answers[:4])
    assert status == 0
    assert "Traceback" not in one.said


def test_a_silent_connection_does_not_hold_up_a_stop(tmp_path: Path) -> None:
    with (
        served(tmp_path) as one,
        socket.create_connection(("127.0.0.1", one.port)),
        socket.create_connection(("127.0.0.1", one.port)) as kept,
    ):
        kept.sendall(b"GET /healthz HTTP/1.1\r\nHost: x\r\n\r\n")
        assert kept.recv(65536).startswith(b"HTTP/1.1 200")
        began = time.monotonic()
        status = one.stop()

        assert status == 0
        assert time.monotonic() - began < 20  # s; a stop waits 30 s for requests in flight


def test_a_service_can_be_stopped_while_it_starts(tmp_path: Path) -> None:
    """The word to stop may reach a worker that does not listen to any yet, once in some twenty times without care."""
    spent = []
    for _ in range(12):
        with served(tmp_path) as one:
            began = time.monotonic()
            assert one.stop() == 0
            spent.append(time.monotonic() - began)

    assert max(spent) < 20  # s; a worker that does not hear it is killed after 30 s


def test_a_draining_service_says_so_and_goes_on_answering(tmp_path: Path) -> None:
    with served(tmp_path, {"DRAIN_SECONDS": 3600}) as one:
        one.process.send_signal(signal.SIGTERM)
        until(lambda: one.ask("/readyz")[0] == 503)
        status, headers, told = one.ask("/readyz")

        assert (status, headers["Content-Type"]) == (503, "application/problem+json")
        assert "Retry-After" in headers
        assert b"about to stop" in told
        assert one.ask("/healthz")[0] == 200
        assert set(answers_of(one)) == {"one", "number", "json", "table"}
        assert one.stop() == 0  # the second word


def test_a_drain_ends_by_itself(tmp_path: Path) -> None:
    with served(tmp_path, {"DRAIN_SECONDS": 1}) as one:
        one.process.send_signal(signal.SIGTERM)

        assert one.process.wait(PATIENCE) == 0


def test_reloading_under_load_loses_nothing_and_replaces_every_worker(tmp_path: Path) -> None:
    with served(tmp_path) as one, Clients(one.port, answers_of(one)) as clients:
        for _ in range(3):
            before = one.workers
            clients.wait_for(100)
            one.process.send_signal(signal.SIGHUP)
            until(lambda before=before: len(one.workers) == 2 and not one.workers & before)  # type: ignore[misc]
            clients.wait_for(100)
        tally = clients.tally

    assert tally.failures == []
    assert tally.differing == 0
    assert tally.answers >= 600


def test_a_killed_worker_costs_a_client_at_most_one_answer_and_is_replaced(tmp_path: Path) -> None:
    with served(tmp_path) as one, Clients(one.port, answers_of(one)) as clients:
        clients.wait_for(100)
        victim = min(one.workers)
        os.kill(victim, signal.SIGKILL)
        until(lambda: len(one.workers) == 2 and victim not in one.workers)
        at_hand = clients.tally.answers
        until(lambda: clients.tally.answers >= at_hand + 200)
        tally = clients.tally

    failing = [client for client, _ in tally.failures]
    assert len(failing) == len(set(failing)), tally.failures
    assert tally.differing == 0


def test_replacing_workers_after_some_requests_loses_nothing(tmp_path: Path) -> None:
    with served(tmp_path, {"MAX_REQUESTS": 60}) as one:
        first = one.workers
        with Clients(one.port, answers_of(one)) as clients:
            clients.wait_for(800)
            tally = clients.tally
        until(lambda: len(one.workers) == 2)

        assert not one.workers & first
        assert tally.failures == []
        assert tally.differing == 0


def activated(listener: socket.socket, folder: Path) -> "subprocess.Popen[bytes]":
    """Start a service as systemd does with a socket unit: the socket is its descriptor 3."""
    code = (
        "import os, sys\n"
        f"os.dup2({listener.fileno()}, 3)\n"
        "os.environ |= {'LISTEN_FDS': '1', 'LISTEN_PID': str(os.getpid())}\n"
        "os.execv(sys.argv[1], sys.argv[1:])\n"
    )
    with (folder / "out").open("ab") as out, (folder / "err").open("ab") as err:
        return subprocess.Popen(
            [sys.executable, "-c", code, *SERVE],
            cwd=ROOT,
            env=ENVIRONMENT,
            pass_fds=[listener.fileno()],
            stdout=out,
            stderr=err,
        )


def test_restarts_behind_a_held_socket_lose_nothing(tmp_path: Path) -> None:
    with socket.create_server(("127.0.0.1", 0), backlog=512) as listener:
        port = listener.getsockname()[1]
        process = activated(listener, tmp_path)
        try:
            one = Served(process, tmp_path, port)
            until(one.is_ready)
            with Clients(port, answers_of(one)) as clients:
                for _ in range(2):
                    clients.wait_for(100)
                    process.terminate()
                    assert process.wait(PATIENCE) == 0
                    process = activated(listener, tmp_path)
                    clients.wait_for(100)
                tally = clients.tally
        finally:
            process.terminate()
            process.wait(PATIENCE)

    assert tally.failures == []
    assert tally.differing == 0
    assert tally.longest < 20  # s; two on an idle machine


def test_counts_are_right_over_workers_and_after_the_death_of_one(tmp_path: Path) -> None:
    with served(tmp_path) as one:
        asked = 0
        for victims in (1, 1, 0):
            for _ in range(30):
                one.ask("/v1/flux?gas=co2", table([ROW] * 5))
            asked += 30
            counted = f'catspaw_requests_total{{{PLACE},status="200"}} {asked}.0'
            until(lambda counted=counted: counted in one.ask("/metrics")[2].decode())  # type: ignore[misc]
            for victim in sorted(one.workers)[:victims]:
                os.kill(victim, signal.SIGKILL)
                until(lambda victim=victim: len(one.workers) == 2 and victim not in one.workers)  # type: ignore[misc]
        told = one.ask("/metrics")[2].decode()
        descriptors = [path.readlink() for path in Path(f"/proc/{one.process.pid}/fd").iterdir()]
        (folder,) = [path.parent for path in descriptors if path.name == "alive"]
        files = {path.name for path in folder.glob("*.db")}
        status = one.stop()

    assert f'catspaw_requests_total{{{PLACE},status="200"}} {asked}.0' in told
    assert f"catspaw_samples_total{{{PLACE}}} {asked * 5}.0" in told
    assert f"catspaw_request_duration_seconds_count{{{PLACE}}} {asked}.0" in told
    assert len(files) <= 6, "files of ended workers stay"
    assert status == 0
    assert not folder.exists()
    assert not re.search(r"Traceback", one.said)
