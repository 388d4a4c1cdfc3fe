"""What only a real server shows: framing, old clients, and requests that end too early."""

import json
import os
import re
import socket
import subprocess
import sys
from collections.abc import Iterator
from pathlib import Path

import pytest
import requests

from tests.api.questions import body, flux, table

ROOT = Path(__file__).parents[2]
LISTENING = re.compile(r"Listening at: http://127\.0\.0\.1:(\d+)")
LIMIT = 100_000


@pytest.fixture(scope="module")
def port() -> Iterator[int]:
    """Return the port of a running service with small limits."""
    limits = {"CATSPAW_BIND": "127.0.0.1:0", "CATSPAW_WORKERS": "1", "CATSPAW_CSV_BYTES": str(LIMIT)}
    limits |= {"CATSPAW_JSON_BYTES": str(LIMIT)}
    command = [sys.executable, "-m", "service"]
    with subprocess.Popen(command, cwd=ROOT, env=os.environ | limits, stderr=subprocess.PIPE, text=True) as process:
        assert process.stderr is not None
        try:
            found = next(filter(None, map(LISTENING.search, process.stderr)))
            yield int(found[1])
        finally:
            process.terminate()
            process.stderr.read()


def said(port: int, request: bytes, end: bool = False) -> tuple[int, bytes, bytes]:
    """Send bytes, perhaps say that no more will come, and return status, headers and body."""
    with socket.create_connection(("127.0.0.1", port), timeout=20) as connection:
        connection.sendall(request)
        if end:
            connection.shutdown(socket.SHUT_WR)
        found = b""
        while piece := connection.recv(65536):
            found += piece
    head, _, rest = found.partition(b"\r\n\r\n")
    return int(head.split()[1]), head, rest


def chunked(content: bytes) -> bytes:
    pieces = [content[at : at + 8000] for at in range(0, len(content), 8000)]
    return b"".join(b"%x\r\n%b\r\n" % (len(piece), piece) for piece in pieces) + b"0\r\n\r\n"


START = b"POST /v1/flux?gas=co2&pick=flux HTTP/1.1\r\nHost: x\r\nConnection: close\r\n"


def test_the_service_answers_as_the_application_does(port: int) -> None:
    answer = requests.get(f"http://127.0.0.1:{port}{flux()}", timeout=20)

    assert answer.status_code == 200
    assert answer.json()["results"]["flux"]["values"][0] < 0


def test_a_chunked_body_is_read_whole(port: int) -> None:
    status, _, rest = said(port, START + b"Transfer-Encoding: chunked\r\n\r\n" + chunked(table()))

    assert status == 200
    assert rest.count(b"flux") == 1


def test_a_chunked_body_over_the_limit_is_refused_never_cut(port: int) -> None:
    content = table([[18.4, 35.1, 1008.2, 7.5, 18.0, 380.0, 419.0]] * 10_000)
    status, head, _ = said(port, START + b"Transfer-Encoding: chunked\r\n\r\n" + chunked(content))

    assert len(content) > 2 * LIMIT
    assert status == 413
    assert b"application/problem+json" in head


def test_an_announced_body_over_the_limit_is_refused_at_once(port: int) -> None:
    status, _, rest = said(port, START + b"Content-Length: %d\r\n\r\n" % (LIMIT + 1))

    assert status == 413
    assert str(LIMIT).encode() in rest


def test_a_body_that_ends_too_early_is_refused(port: int) -> None:
    content = table()
    status, _, rest = said(port, START + b"Content-Length: %d\r\n\r\n" % (len(content) + 5) + content, end=True)

    assert status == 400
    assert b"cut_short" in rest


WRONG_CHUNKS = [b"5\r\nabc", b"zz\r\nabc\r\n0\r\n\r\n", b"3\r\nabcdef\r\n0\r\n\r\n"]


@pytest.mark.parametrize("chunks", WRONG_CHUNKS)
def test_chunks_that_are_wrong_are_the_senders_fault(port: int, chunks: bytes) -> None:
    status, _, _ = said(port, START + b"Transfer-Encoding: chunked\r\n\r\n" + chunks, end=True)

    assert status == 400


def test_an_old_client_gets_a_whole_answer_with_its_length(port: int) -> None:
    content = table()
    request = b"POST /v1/flux?gas=co2 HTTP/1.0\r\nContent-Length: %d\r\n\r\n" % len(content)
    status, head, rest = said(port, request + content)

    assert status == 200
    assert b"Content-Length: %d" % len(rest) in head


def test_an_old_client_without_a_length_is_told_that_no_body_came(port: int) -> None:
    status, _, rest = said(port, b"POST /v1/flux HTTP/1.0\r\n\r\n" + table(), end=True)

    assert status == 400
    assert b"Content-Length" in rest


def test_bytes_beyond_ascii_in_an_address_are_the_senders_fault(port: int) -> None:
    status, _, _ = said(port, b"GET /v1/flux?unit=\xb0C HTTP/1.1\r\nHost: x\r\nConnection: close\r\n\r\n")

    assert status == 400


def test_a_doubled_slash_is_not_found_and_a_trailing_one_is_no_redirect(port: int) -> None:
    doubled = said(port, b"GET //v1/flux HTTP/1.1\r\nHost: x\r\nConnection: close\r\n\r\n")
    trailing = requests.get(f"http://127.0.0.1:{port}/v1/", timeout=20, allow_redirects=False)

    assert doubled[0] == 404
    assert trailing.status_code == 200


def test_headers_of_a_client_cannot_move_the_address(port: int) -> None:
    request = (
        b"GET /v1/gases HTTP/1.1\r\nHost: x\r\nConnection: close\r\nSCRIPT_NAME: /v1\r\nPATH_INFO: /nowhere\r\n\r\n"
    )
    status, _, _ = said(port, request)

    assert status == 200


def test_head_and_options_have_no_body(port: int) -> None:
    for method, status in ((b"HEAD", 200), (b"OPTIONS", 204)):
        found, _, rest = said(port, method + b" /v1/gases HTTP/1.1\r\nHost: x\r\nConnection: close\r\n\r\n")

        assert (found, rest) == (status, b"")


def test_expecting_a_go_ahead_is_answered(port: int) -> None:
    content = body()
    request = START.replace(b"?gas=co2&pick=flux", b"") + b"Expect: 100-continue\r\nContent-Length: %d\r\n\r\n" % len(
        content
    )
    status, _, rest = said(port, request + content)

    assert status in (100, 200)
    assert b'"flux"' in rest


# What never becomes a request of the application: bytes, and the status they are answered with.
UNREADABLE = [
    (b"GET /v1 HTTP/1.1\r\n\r\n", 400),
    (b"get /v1 HTTP/1.1\r\nHost: x\r\n\r\n", 400),
    (b"GET /v1 HTTP/1.1\nHost: x\n\n", 400),
    (b"GET /v1 HTTP/1.1\r\nHost: x\r\nHost: y\r\n\r\n", 400),
    (START + b"Content-Length: 3\r\nTransfer-Encoding: chunked\r\n\r\n0\r\n\r\n", 400),
    (START + b"Transfer-Encoding: unheard-of\r\n\r\n", 400),
    (START + b"Expect: wonders\r\n\r\n", 417),
    (b"GET /" + b"x" * 9000 + b" HTTP/1.1\r\nHost: x\r\n\r\n", 414),
    (START + b"X-Long: " + b"x" * 9000 + b"\r\n\r\n", 431),
]


@pytest.mark.parametrize(("request_", "expected"), UNREADABLE, ids=lambda each: repr(each)[-30:])
def test_what_is_not_http_is_a_problem_document_too(port: int, request_: bytes, expected: int) -> None:
    status, head, rest = said(port, request_, end=True)
    problem = json.loads(rest)

    assert status == problem["status"] == expected
    assert b"Content-Type: application/problem+json" in head
    assert b"X-Request-ID: " + problem["instance"].encode() in head
    assert problem["errors"][0]["reason"]


def test_nothing_tells_what_serves(port: int) -> None:
    good, bad = requests.get(f"http://127.0.0.1:{port}/v1", timeout=20), said(port, b"?\r\n\r\n", end=True)

    assert "Server" not in good.headers
    assert b"Server" not in bad[1]
    assert b"gunicorn" not in bad[1] + bad[2]
