"""Some three hundred hostile requests: each a problem document at once, and the next good one answered as before."""

import json
import socket
import time
from collections.abc import Iterator
from contextlib import suppress
from pathlib import Path

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from tests.drills.hostile import HOSTILE
from tests.drills.serving import PATIENCE, Served, answers_of, received, served

pytestmark = pytest.mark.drills
BOUND = 64 * 1024
AT_MOST = 10.0  # s, ten times the bar: the machine is shared


@pytest.fixture(scope="module")
def one(tmp_path_factory: pytest.TempPathFactory) -> Iterator[Served]:
    with served(tmp_path_factory.mktemp("hostile")) as running:
        yield running


def told(port: int, request: bytes) -> bytes:
    """Send bytes and say that no more will come; the other side may have had enough before."""
    with socket.create_connection(("127.0.0.1", port), timeout=PATIENCE) as connection:
        with suppress(BrokenPipeError, ConnectionResetError, OSError):
            connection.sendall(request)
            connection.shutdown(socket.SHUT_WR)
        return received(connection)


def test_there_are_hundreds_of_them() -> None:
    assert len(HOSTILE) > 200
    assert len(set(HOSTILE)) == len(HOSTILE)


@pytest.mark.parametrize("request_", HOSTILE, ids=lambda each: repr(each[:40]))
def test_a_hostile_request_is_refused_at_once_and_harms_nobody(one: Served, request_: bytes) -> None:
    began = time.monotonic()
    answer = told(one.port, request_)
    spent = time.monotonic() - began
    head, _, content = answer.partition(b"\r\n\r\n")

    assert 400 <= int(head.split()[1]) < 500, content[:300]
    assert b"Content-Type: application/problem+json" in head
    assert b"\nServer:" not in head
    assert len(content) <= BOUND
    problem = json.loads(content)
    assert problem["status"] == int(head.split()[1])
    assert len(problem["errors"]) <= 20
    assert b"X-Request-ID: " + problem["instance"].encode() in head
    assert spent < AT_MOST


def test_after_all_of_them_good_requests_are_answered_as_by_a_new_service(one: Served, tmp_path: Path) -> None:
    with served(tmp_path) as new:
        expected = answers_of(new)

    assert answers_of(one) == expected
    assert len(one.workers) == 2
    assert "Traceback" not in one.said
    assert "WORKER TIMEOUT" not in one.said


def test_every_line_of_the_log_is_json_whatever_was_in_the_request(one: Served) -> None:
    forged = b"GET /v1/%0A%7B%22status%22%3A200%7D%1B%5B2J%C2%85%E2%80%A8 HTTP/1.1\r\nHost: x\r\nConnection: close\r\n"
    told(one.port, forged + b"X-Request-ID: a\x0bb\r\n\r\n")
    told(one.port, forged + b"X-Request-ID: {}\r\nUser-Agent: \xff\x1b\r\nAuthorization: Bearer secret\r\n\r\n")
    told(one.port, forged + b"\r\n")
    lines = one.lines

    assert len(lines) > 10
    assert {"time", "id", "client", "method", "path", "status", "samples", "bytes_in", "bytes_out", "seconds"} == set(
        lines[-1]
    )
    assert lines[-1]["path"].isprintable()
    assert lines[-1]["path"].startswith("/v1/\\n{")
    assert "secret" not in json.dumps(lines)
    assert "secret" not in one.said


WORDS = [
    b"GET ",
    b"POST ",
    b"/v1/flux",
    b"?gas=co2",
    b" HTTP/1.1",
    b" HTTP/1.0",
    b"\r\n",
    b"\r\n\r\n",
    b"\n",
    b"Host: x",
]
WORDS += [
    b"Content-Length: ",
    b"Transfer-Encoding: chunked",
    b"3",
    b"0",
    b"{",
    b"}",
    b'"gas"',
    b":",
    b'"co2"',
    b",",
    b"\x00",
]
WORDS += [
    b"Content-Encoding: gzip",
    b"\x1f\x8b\x08",
    b"Expect: 100-continue",
    b"Connection: keep-alive",
    b"\xff",
    b" ",
    b";",
]


@settings(max_examples=400, deadline=None, derandomize=True)
@given(st.lists(st.one_of(st.sampled_from(WORDS), st.binary(max_size=8)), max_size=24).map(b"".join))
def test_no_bytes_make_the_service_fail(one: Served, request_: bytes) -> None:
    for answer in told(one.port, request_).split(b"HTTP/1.1 ")[1:]:
        assert int(answer[:3]) < 500, answer[:300]
