"""The checks as callers see them: the address, its filters and forms, and the command that proves an installation."""

import csv
import io
import subprocess
import sys
import time
from dataclasses import replace
from typing import Any

import pytest
from flask.testing import FlaskClient

from service.__main__ import main
from service.app import create_app
from service.config import Config
from service.physics import check as figures

CHECKS = figures.checks()
ONE = next(one for one in CHECKS if one.id == "co2-weiss-1974-printed")


@pytest.fixture
def client() -> FlaskClient:
    return create_app(Config()).test_client()


@pytest.fixture
def tampered(monkeypatch: pytest.MonkeyPatch) -> str:
    """Let one published figure differ from what is computed, and return the name of its row."""
    wrong = replace(ONE, value=ONE.value * 1.01)
    monkeypatch.setattr(figures, "checks", lambda: tuple(wrong if one is ONE else one for one in CHECKS))
    return wrong.id


def told(client: FlaskClient, query: str = "") -> Any:
    response = client.get(f"/v1/checks{query}")

    assert response.status_code == 200
    return response.get_json()


def test_every_check_is_recomputed_and_holds(client: FlaskClient) -> None:
    answer = told(client)

    assert answer["summary"]["rows"] == answer["summary"]["holding"] == len(CHECKS)
    assert [record["id"] for record in answer["checks"]] == [one.id for one in CHECKS]
    assert [record["id"] for record in answer["checks"] if not record["holds"]] == []
    assert sum(kind["rows"] for kind in answer["summary"]["by_kind"].values()) == len(CHECKS)


def test_a_check_shows_the_published_and_the_computed_value_with_its_source(client: FlaskClient) -> None:
    record = next(each for each in told(client)["checks"] if each["id"] == "co2-weiss-1974-printed")

    assert record["published"] == 0.02839
    assert record["computed"] == pytest.approx(0.02839, abs=5e-6)
    assert record["difference"] == record["computed"] - record["published"]
    assert (record["gas"], record["methods"]) == ("co2", {"solubility": "weiss-1974"})
    assert (record["source"], record["doi"]) == ("weiss-1974", "10.1016/0304-4203(74)90015-2")
    assert (record["kind"], record["unit"]) == ("paper", "mol kg-1 atm-1")


def test_a_check_can_be_asked_again_as_a_question_of_ones_own(client: FlaskClient) -> None:
    record = next(each for each in told(client)["checks"] if each["id"] == "o2-water-analysis-700-hundredths-atm")
    query = f"{record['inputs']}&pick={record['result']}&unit={record['unit'].replace(' ', '+')}&form=number"
    response = client.get(f"/v1/{record['quantity']}?{query}")

    assert float(response.get_data(as_text=True)) == record["computed"]


def test_all_checks_take_under_a_second_and_a_half(client: FlaskClient) -> None:
    start = time.process_time()  # not the clock on the wall, which runs on while other programs are served
    told(client)

    assert time.process_time() - start < 1.5


@pytest.mark.parametrize(
    ("query", "kept"),
    [
        ("?gas=n2o", lambda each: each["gas"] == "n2o"),
        ("?method=nightingale-2000", lambda each: "nightingale-2000" in each["methods"].values()),
        ("?source=apha-2017", lambda each: each["source"] == "apha-2017"),
        ("?gas=o2&source=apha-2017", lambda each: (each["gas"], each["source"]) == ("o2", "apha-2017")),
        ("?holds=1", lambda each: each["holds"]),
    ],
)
def test_checks_are_filtered(client: FlaskClient, query: str, kept: Any) -> None:
    every, some = told(client)["checks"], told(client, query)["checks"]

    assert some
    assert some == [each for each in every if kept(each)]


def test_checks_that_fail_can_be_asked_for(client: FlaskClient, tampered: str) -> None:
    answer = told(client, "?holds=0")

    assert [each["id"] for each in answer["checks"]] == [tampered]
    assert (answer["summary"]["rows"], answer["summary"]["holding"]) == (1, 0)


@pytest.mark.parametrize(
    ("query", "name"),
    [
        ("?gas=argon", "gas"),
        ("?method=nobody-1900", "method"),
        ("?source=nobody-1900", "source"),
        ("?holds=perhaps", "holds"),
        ("?form=number", "form"),
        ("?colour=red", "colour"),
        ("?gas=co2&gas=o2", "gas"),
    ],
)
def test_an_unknown_filter_is_refused_by_name(client: FlaskClient, query: str, name: str) -> None:
    response = client.get(f"/v1/checks{query}")

    assert response.status_code == 422
    assert response.get_json()["errors"][0]["name"] == name


def test_checks_come_as_a_table_too(client: FlaskClient) -> None:
    response = client.get("/v1/checks?form=csv&gas=dms")
    rows = list(csv.DictReader(io.StringIO(response.get_data(as_text=True))))
    records = told(client, "?gas=dms")["checks"]

    assert response.mimetype == "text/csv"
    assert [row["id"] for row in rows] == [record["id"] for record in records]
    assert [float(row["computed"]) for row in rows] == [record["computed"] for record in records]
    assert set(rows[0]) == set(records[0])
    assert {row["holds"] for row in rows} == {"1"}


def test_a_check_that_cannot_be_computed_is_told_and_does_not_hold(
    client: FlaskClient, monkeypatch: pytest.MonkeyPatch
) -> None:
    impossible = replace(ONE, inputs={"gas": "co2", "water_temperature": "25"})
    monkeypatch.setattr(figures, "checks", lambda: (impossible,))
    record = told(client)["checks"][0]

    assert (record["computed"], record["holds"]) == (None, False)
    assert "salinity" in record["problem"]


def test_the_command_prints_a_table_and_succeeds_where_all_hold() -> None:
    done = subprocess.run(
        [sys.executable, "-m", "service", "check"], capture_output=True, text=True, timeout=60, check=False
    )
    lines = done.stdout.splitlines()

    assert (done.returncode, done.stderr) == (0, "")
    assert lines[-1] == f"{len(CHECKS)} checks, {len(CHECKS)} hold"
    assert lines[0].split()[0] == "check"
    assert all(any(line.startswith(f"{one.id} ") for line in lines) for one in CHECKS)


def test_the_command_fails_where_a_figure_does_not_come_out(tampered: str, capsys: pytest.CaptureFixture[str]) -> None:
    status = main(["check"])
    lines = capsys.readouterr().out.splitlines()

    assert status == 1
    assert lines[-1] == f"{len(CHECKS)} checks, {len(CHECKS) - 1} hold"
    assert [line.split()[0] for line in lines if line.endswith("NO")] == [tampered]


def test_the_command_fails_where_the_data_are_lost(
    monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str]
) -> None:
    monkeypatch.setattr(figures, "checks", lambda: ())
    status = main(["check"])

    assert status == 1
    assert capsys.readouterr().out.splitlines()[-1] == "0 checks, 0 hold"


def test_the_command_takes_a_gas_and_a_method(capsys: pytest.CaptureFixture[str]) -> None:
    status = main(["check", "--gas", "n2o", "--method", "weiss-price-1980"])
    lines = capsys.readouterr().out.splitlines()[1:-2]

    assert status == 0
    assert lines
    assert all(" n2o " in line and "weiss-price-1980" in line for line in lines)


@pytest.mark.parametrize("words", [["--gas", "argon"], ["--method", "nobody-1900"]])
def test_the_command_refuses_what_it_does_not_know(words: list[str], capsys: pytest.CaptureFixture[str]) -> None:
    status = main(["check", *words])

    assert status == 2
    assert words[1] in capsys.readouterr().err
