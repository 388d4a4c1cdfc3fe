"""Bodies packed with gzip: read like plain ones, within the limits of what they unpack to."""

import gzip
import time
import zlib

import pytest
from flask.testing import FlaskClient

from service.app import create_app
from service.bodies import unpacked
from service.config import MEBIBYTE, Config
from service.physics.faults import Refused
from tests.api.questions import ROWS, body, faults, flux, problem, table

PACKED = {"Content-Encoding": "gzip"}
CSV = "/v1/flux?gas=co2"


def bomb(mebibytes: int) -> bytes:
    """Return zeros in one gzip member."""
    stream, zeros = zlib.compressobj(9, wbits=31), bytes(MEBIBYTE)
    return b"".join(stream.compress(zeros) for _ in range(mebibytes)) + stream.flush()


@pytest.mark.parametrize(
    "headers", [PACKED, {"Content-Encoding": " GZip "}, {"Content-Encoding": "x-gzip"}, {}], ids=str
)
def test_a_packed_body_is_answered_like_a_plain_one(client: FlaskClient, headers: dict[str, str]) -> None:
    document = client.post("/v1/flux", data=gzip.compress(body()), headers=headers)
    lines = client.post(CSV, data=gzip.compress(table(ROWS * 500)), headers=headers)

    assert document.data == client.get(flux()).data
    assert lines.data == client.post(CSV, data=table(ROWS * 500)).data


def test_a_packed_form_is_read(client: FlaskClient) -> None:
    content = b'--x\r\nContent-Disposition: form-data; name="csv"\r\n\r\n' + table() + b"\r\n--x--\r\n"
    kind = "multipart/form-data; boundary=x"
    answer = client.post(CSV, data=gzip.compress(content), headers=PACKED, content_type=kind)

    assert answer.data == client.post(CSV, data=table()).data


def test_members_one_behind_another_are_one_body(client: FlaskClient) -> None:
    halves = table(ROWS * 300)
    content = gzip.compress(halves[:1000]) + gzip.compress(b"") + gzip.compress(halves[1000:])

    assert client.post(CSV, data=content, headers=PACKED).data == client.post(CSV, data=halves).data


WHOLE = gzip.compress(table())
# What cannot be unpacked, and the code of the error.
BROKEN = [
    (WHOLE[:-1], "cut_short"),
    (WHOLE[:30], "cut_short"),
    (b"\x1f\x8b", "cut_short"),
    (WHOLE + b"xy", "unreadable"),
    (WHOLE[:-8] + bytes(8), "unreadable"),
    (WHOLE[:40] + b"\xff" * 40 + WHOLE[80:], "unreadable"),
    (table(), "unreadable"),
    (zlib.compress(table()), "unreadable"),
]


@pytest.mark.parametrize(("content", "code"), BROKEN, ids=lambda each: repr(each[-12:]))
def test_a_body_that_cannot_be_unpacked_is_refused(client: FlaskClient, content: bytes, code: str) -> None:
    assert faults(client.post(CSV, data=content, headers=PACKED), 400) == [(code, "body")]


def test_a_packed_body_that_is_empty_is_empty(client: FlaskClient) -> None:
    assert faults(client.post("/v1/flux", data=gzip.compress(b""), headers=PACKED), 400) == [("empty", "body")]
    assert faults(client.post("/v1/flux", data=b"", headers=PACKED), 400) == [("empty", "body")]


def test_limits_hold_for_what_is_unpacked(small: FlaskClient) -> None:
    told = problem(small.post("/v1/flux", data=gzip.compress(table(ROWS * 100)), headers=PACKED), 413)
    inside = small.post("/v1/flux", data=gzip.compress(b'{"gas": "co2"' + b" " * 2500 + b"}"), headers=PACKED)

    assert told["errors"][0]["allowed"] == "4000 bytes"
    assert problem(inside, 413)["errors"][0]["allowed"] == "2000 bytes"


@pytest.mark.parametrize("mebibytes", [2, 64])
def test_a_bomb_is_refused_before_it_swells(client: FlaskClient, mebibytes: int) -> None:
    content = bomb(mebibytes)
    began = time.process_time()
    answer = client.post(CSV, data=content, headers=PACKED)
    spent = time.process_time() - began

    assert faults(answer, 413) == [("too_large", "body")]
    assert "250 times" in problem(answer, 413)["detail"]
    assert spent < 0.1  # s of the processor


def test_a_bomb_that_begins_like_a_table_is_refused_at_the_limit() -> None:
    limit = 8 * MEBIBYTE
    began = time.process_time()
    with pytest.raises(Refused) as refused:
        unpacked(gzip.compress(table(ROWS * 20_000)) + bomb(64), limit)

    assert refused.value.status == 413
    assert time.process_time() - began < 0.5  # s; what fits is unpacked


def test_the_limit_of_swelling_is_told(client: FlaskClient) -> None:
    assert client.get("/v1").get_json()["limits"]["unpacked_ratio"] == 250


def test_a_table_as_alike_as_tables_are_is_no_bomb() -> None:
    content = table([[18.4, 35.1, 1008.2, 7.5, 18.0, 380.0, 419.0]] * 10_000)

    assert create_app(Config()).test_client().post(CSV, data=gzip.compress(content), headers=PACKED).status_code == 200
