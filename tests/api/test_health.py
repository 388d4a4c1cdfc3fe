"""Whether the service is well, what it has done, and the line that it writes of each request."""

import json
import os
import shutil
from collections.abc import Iterator
from datetime import datetime, timedelta
from pathlib import Path
from typing import Any

import pytest
from flask.testing import FlaskClient
from prometheus_client import values

from service import counts, health
from service.app import create_app
from service.config import Config
from service.counts import FOLDER_VARIABLE, Counts, make_folder
from service.record import Recorder
from tests.api.questions import flux, problem


@pytest.fixture
def counted(monkeypatch: pytest.MonkeyPatch, tmp_path: Path) -> Iterator[Counts]:
    """Return new counts, in a folder that does not outlive the test."""
    monkeypatch.setattr(counts, "SHARED_MEMORY", str(tmp_path))
    monkeypatch.setenv(FOLDER_VARIABLE, str(tmp_path))  # and restore it
    monkeypatch.setattr(values, "ValueClass", values.MultiProcessValue())  # type: ignore[no-untyped-call]
    folder = make_folder()
    assert folder is not None
    assert folder.parent == tmp_path
    made = Counts(folder)
    yield made
    made.end()


def test_a_service_about_to_stop_is_alive_and_not_ready(client: FlaskClient, monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setattr(health, "STOPPING", bytearray(1))
    before = client.get("/readyz").status_code
    health.begin_to_stop()
    told = problem(client.get("/readyz"), 503)

    assert before == 200
    assert told["errors"][0]["code"] == "busy"
    assert "Retry-After" in client.get("/readyz").headers
    assert client.get("/healthz").status_code == 200
    assert client.get(flux()).status_code == 200


def test_metrics_that_are_not_counted_are_not_found(client: FlaskClient, monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.delenv(FOLDER_VARIABLE, raising=False)

    assert "CATSPAW_METRICS" in problem(client.get("/metrics"), 404)["detail"]


def test_metrics_are_guarded_by_the_token() -> None:
    guarded = create_app(Config(token="open")).test_client()

    assert guarded.get("/metrics").status_code == 401


def test_counts_add_up_by_route_method_and_status(client: FlaskClient, counted: Counts) -> None:
    for status, samples in (("200", 3), ("200", 4), ("422", 0)):
        counted.add("/v1/flux", "POST", status, 0.03, (samples, 10, 20))
    counted.add(None, "BREW", "404", 0.0, (0, 0, 0))
    answer = client.get("/metrics")
    told = answer.text.splitlines()

    assert answer.content_type == counts.CONTENT_TYPE
    assert answer.headers["Cache-Control"] == "no-store"
    for line in (
        'catspaw_requests_total{method="POST",route="/v1/flux",status="200"} 2.0',
        'catspaw_requests_total{method="POST",route="/v1/flux",status="422"} 1.0',
        'catspaw_requests_total{method="other",route="other",status="404"} 1.0',
        'catspaw_samples_total{method="POST",route="/v1/flux"} 7.0',
        'catspaw_request_bytes_total{method="POST",route="/v1/flux"} 30.0',
        'catspaw_response_bytes_total{method="POST",route="/v1/flux"} 60.0',
        'catspaw_request_duration_seconds_bucket{le="0.025",method="POST",route="/v1/flux"} 0.0',
        'catspaw_request_duration_seconds_bucket{le="0.05",method="POST",route="/v1/flux"} 3.0',
        'catspaw_request_duration_seconds_count{method="POST",route="/v1/flux"} 3.0',
    ):
        assert line in told


def test_what_an_ended_worker_counted_stays_and_its_files_do_not(client: FlaskClient, counted: Counts) -> None:
    counted.add("/v1/flux", "GET", "200", 0.03, (1, 0, 5))
    once = client.get("/metrics").text
    for worker in (1, 2):
        for kind in counts.KINDS:  # as if other processes had counted the same
            shutil.copyfile(counted.folder / f"{kind}_{os.getpid()}.db", counted.folder / f"{kind}_{worker}.db")
        counted.take_over(worker)
    for kind in counts.KINDS:
        (counted.folder / f"{kind}_{os.getpid()}.db").unlink()
    twice = client.get("/metrics").text
    files = {path.name for path in counted.folder.glob("*.db")}
    counted.end()

    assert 'catspaw_requests_total{method="GET",route="/v1/flux",status="200"} 1.0' in once
    assert 'catspaw_requests_total{method="GET",route="/v1/flux",status="200"} 2.0' in twice
    assert 'catspaw_request_duration_seconds_bucket{le="0.05",method="GET",route="/v1/flux"} 2.0' in twice
    assert files == {"counter_ended.db", "histogram_ended.db"}
    assert not counted.folder.exists()


def test_a_folder_whose_processes_were_killed_is_removed_and_one_in_use_is_not(counted: Counts) -> None:
    left = counted.folder.with_name(f"{counts.PREFIX}left")
    left.mkdir()
    (left / counts.ALIVE).touch()
    new = make_folder()

    assert new is not None
    assert not left.exists()
    assert counted.folder.exists()


class Answered:
    status, sent = "200 OK", 42


ENVIRON = {"REQUEST_METHOD": "GET", "PATH_INFO": "/v1/flux", "QUERY_STRING": "secret=1", "REMOTE_ADDR": "127.0.0.1"}
ENVIRON |= {"catspaw.id": "abc", "catspaw.route": "/v1/flux", "HTTP_AUTHORIZATION": "Bearer secret"}


def line_of(capfd: pytest.CaptureFixture[str], **more: Any) -> dict[str, Any]:
    """Return the line that is written of a request, read as JSON."""
    recorder = object.__new__(Recorder)
    recorder.access(Answered(), None, {**ENVIRON, **more}, timedelta(seconds=0.0123))
    (line,) = capfd.readouterr().out.splitlines()
    assert line.isprintable()
    told: dict[str, Any] = json.loads(line)
    return told


def test_a_request_is_one_line_of_json(capfd: pytest.CaptureFixture[str], monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setattr(Recorder, "lines", True)
    monkeypatch.setattr(Recorder, "counts", None)
    told = line_of(capfd, **{"catspaw.samples": 7, "catspaw.bytes": 99})

    assert datetime.fromisoformat(told.pop("time")).tzinfo is not None
    assert told == {
        "id": "abc",
        "client": "127.0.0.1",
        "method": "GET",
        "path": "/v1/flux",
        "status": 200,
        "samples": 7,
        "bytes_in": 99,
        "bytes_out": 42,
        "seconds": 0.0123,
    }


FORGED = [
    "/a\n{}",
    "/\x1b[2J",
    "/\x85\x9b",
    "/\xe2\x80\xa8",
    "/\xff\xfe",
    "/" + "x" * 9000,
    "/\x00",
    "/\xf0\x9f\x8c\x8a",
]


@pytest.mark.parametrize("path", FORGED, ids=lambda path: ascii(path[:20]))
def test_nothing_in_an_address_can_forge_a_line(
    capfd: pytest.CaptureFixture[str], monkeypatch: pytest.MonkeyPatch, path: str
) -> None:
    monkeypatch.setattr(Recorder, "lines", True)
    monkeypatch.setattr(Recorder, "counts", None)
    told = line_of(capfd, PATH_INFO=path, REQUEST_METHOD="G\nT" * 99)

    assert told["path"].isprintable()
    assert len(told["path"]) <= 2000
    assert len(told["method"]) <= 60
    assert "secret" not in json.dumps(told)


def test_no_line_is_written_where_none_is_wanted(
    capfd: pytest.CaptureFixture[str], monkeypatch: pytest.MonkeyPatch
) -> None:
    monkeypatch.setattr(Recorder, "lines", False)
    monkeypatch.setattr(Recorder, "counts", None)
    object.__new__(Recorder).access(Answered(), None, ENVIRON, timedelta(0))

    assert capfd.readouterr().out == ""
