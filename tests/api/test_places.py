"""Large requests wait for a place and are sent away when none becomes free; small ones never wait."""

import threading
from typing import Any

import pytest
from flask import Flask
from flask.testing import FlaskClient

from service import app as application
from service.app import create_app
from service.config import Config
from service.places import Busy, Gate, Places
from tests.api.questions import ROWS, body, flux, problem, table

LARGE_TABLE = table(ROWS * 600)
LARGE = {
    "list": ("/v1/flux", body(wind_speed=[7.0] * 1001)),
    "table": ("/v1/flux?gas=co2&pick=flux", LARGE_TABLE),
    "table in memory": ("/v1/flux?gas=co2&pick=flux&form=json", LARGE_TABLE),
    "body": ("/v1/flux", body() + b" " * 100_000),
    "draws": ("/v1/flux?uncertainty_method=monte-carlo&draws=1000", body(u_wind_speed=0.5)),
}
SMALL = {
    "one": (flux(), None),
    "list": ("/v1/flux", body(wind_speed=[7.0] * 1000)),
    "table": ("/v1/flux?gas=co2&pick=flux", table(ROWS * 400)),
    "health": ("/healthz", None),
}


@pytest.fixture
def gates(monkeypatch: pytest.MonkeyPatch) -> list[Gate]:
    """Return the gates of the applications that are made from now on."""
    made: list[Gate] = []

    def make(config: Config) -> Gate:
        made.append(Gate(config))
        return made[-1]

    monkeypatch.setattr(application, "Gate", make)
    return made


@pytest.fixture
def busy(gates: list[Gate]) -> FlaskClient:
    """Return a client of an application with every slot taken, where nobody waits for long."""
    app: Flask = create_app(Config(wait_seconds=0))
    gates[0].slots.take(2)
    return app.test_client()


def ask(client: FlaskClient, path: str, content: bytes | None) -> Any:
    return client.get(path) if content is None else client.post(path, data=content)


@pytest.mark.parametrize(("path", "content"), LARGE.values(), ids=LARGE)
def test_a_large_request_is_sent_away_and_told_when_to_come_again(busy: FlaskClient, path: str, content: bytes) -> None:
    answer = ask(busy, path, content)
    told = problem(answer, 503)

    assert told["errors"][0]["code"] == "busy"
    assert answer.headers["Retry-After"] == "0"
    assert answer.headers["X-Request-ID"] == told["instance"]


@pytest.mark.parametrize(("path", "content"), SMALL.values(), ids=SMALL)
def test_a_small_request_does_not_wait(
    busy: FlaskClient, client: FlaskClient, path: str, content: bytes | None
) -> None:
    answer = ask(busy, path, content)

    assert answer.status_code == 200
    assert answer.data == ask(client, path, content).data


@pytest.mark.parametrize(("path", "content"), LARGE.values(), ids=LARGE)
def test_a_place_is_given_back_whatever_comes_of_the_request(gates: list[Gate], path: str, content: bytes) -> None:
    client = create_app(Config(wait_seconds=0, slots=1)).test_client()
    for _ in range(3):
        assert ask(client, path, content).status_code == 200
        assert ask(client, f"{path}{'&' if '?' in path else '?'}nonsense=1", content).status_code == 422

    gates[0].slots.take()  # there is one


def test_a_table_that_is_not_read_holds_no_place(gates: list[Gate]) -> None:
    client = create_app(Config(wait_seconds=0, slots=1)).test_client()
    slow = client.post("/v1/flux?gas=co2", data=table(ROWS * 20_000), buffered=False)
    parts = iter(slow.response)
    begun = [next(parts), next(parts)]
    other = client.post("/v1/flux?gas=co2", data=LARGE_TABLE)

    assert all(begun)
    assert other.status_code == 200
    assert sum(part.count(b"\n") for part in [*begun, *parts]) == 40_001
    slow.close()
    gates[0].slots.take()


def test_room_for_large_bodies_is_given_back(gates: list[Gate]) -> None:
    client = create_app(Config(wait_seconds=0, csv_bytes=2_000_000, json_bytes=2_000_000)).test_client()
    content = table(ROWS * 18_000)
    assert len(content) > 1_200_000
    for path in ("/v1/flux?gas=co2&pick=flux", "/v1/flux?gas=unobtainium"):
        for _ in range(5):
            client.post(path, data=content, buffered=True).close()

    gates[0].room.take(6_000_000)
    assert problem(client.post("/v1/flux?gas=co2", data=content), 503)["errors"][0]["code"] == "busy"


def test_who_waits_gets_the_place_that_becomes_free() -> None:
    places, got = Places(1, "x", 60), threading.Event()
    places.take()

    def wait() -> None:
        places.take()
        got.set()

    waiting = threading.Thread(target=wait)
    waiting.start()
    assert not got.is_set()
    places.give(1)
    waiting.join(60)

    assert got.is_set()


def test_more_places_than_there_are_mean_all_of_them() -> None:
    places = Places(3, "x", 0)

    assert places.take(10) == 3
    with pytest.raises(Busy):
        places.take()
    places.give(3)
    assert places.take(2) == 2
