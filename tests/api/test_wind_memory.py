"""The memory of the wind: a series in, a weighted transfer velocity out, by JSON, query and table."""

import json
import time
from typing import Any

import numpy as np
import pytest
from flask.testing import FlaskClient

from tests.api.questions import address, faults, problem, quality, rows, values

LAYER: dict[str, Any] = {"gas": "o2", "water_temperature": 15.0, "salinity": 35.0, "mixed_layer_depth": 40.0}
DAYS = [str(day) for day in np.arange("2026-01-01", "2026-03-26", dtype="datetime64[D]")]
QUERY = {**LAYER, "wind_memory": "teeter-2018"}


def ask(client: FlaskClient, **more: Any) -> Any:
    return client.post("/v1/wind-memory", json={**LAYER, **more})


@pytest.mark.parametrize("method", ["reuer-2007", "teeter-2018"])
def test_a_constant_wind_gives_its_own_transfer_velocity(client: FlaskClient, method: str) -> None:
    answer = ask(
        client, wind_speed=7.5, time=DAYS, wind_memory=method, pick=["weighted_transfer_velocity", "transfer_velocity"]
    )
    weighted, own = (values(answer, name) for name in ("weighted_transfer_velocity", "transfer_velocity"))

    assert weighted == own
    assert answer.get_json()["time"] == DAYS


def test_a_storm_is_remembered_after_it_has_passed_and_forgotten_in_the_end(client: FlaskClient) -> None:
    wind = [5.0] * len(DAYS)
    wind[10] = 20.0
    weighted = values(ask(client, wind_speed=wind, time=DAYS), "weighted_transfer_velocity")

    assert weighted[9] == pytest.approx(weighted[0], rel=1e-12)
    assert weighted[11] > 1.5 * weighted[9]  # type: ignore[operator]
    assert weighted[-1] == pytest.approx(weighted[9], rel=0.02)  # 60 days and four exchanges later


def test_a_short_memory_is_flagged_until_the_layer_has_been_ventilated(client: FlaskClient) -> None:
    answer = ask(client, wind_speed=15.0, mixed_layer_depth=20.0, time=DAYS)
    flags = [flag for flag, _ in quality(answer)]
    ventilated = values(answer, "ventilated_fraction")

    assert flags[0] == 3
    assert flags[-1] == 1
    assert ventilated[0] == 0.0
    assert ventilated[-1] > 0.99  # type: ignore[operator]
    assert "memory of 60 d" in quality(answer)[0][1][0]


def test_a_gap_in_the_memory_is_bridged_and_flagged(client: FlaskClient) -> None:
    days = [*DAYS[:20], *DAYS[30:]]
    reasons = [told for _, told in quality(ask(client, wind_speed=15.0, mixed_layer_depth=20.0, time=days))]

    assert not any("gap" in " ".join(told) for told in reasons[:20])
    assert all("gap" in " ".join(told) for told in reasons[20:])


def test_a_missing_wind_is_flagged_9_and_costs_the_others_nothing(client: FlaskClient) -> None:
    answer = ask(client, wind_speed=[7.5, None, 7.5, 7.5], time=[0, 1, 2, 3])

    assert [flag for flag, _ in quality(answer)] == [3, 9, 3, 3]
    assert values(answer, "weighted_transfer_velocity")[1] is None
    assert values(answer, "weighted_transfer_velocity")[3] is not None


WRONG_ORDERS = [
    (["2026-01-02", "2026-01-01", "2026-01-03"], [2]),
    (["2026-01-01", "2026-01-01", "2026-01-01"], [2, 3]),
    ([1, 2, 1.5], [3]),
]


@pytest.mark.parametrize(("times", "samples"), WRONG_ORDERS)
def test_times_out_of_order_or_repeated_are_refused_in_json(
    client: FlaskClient, times: list[Any], samples: list[int]
) -> None:
    answer = ask(client, wind_speed=7.5, time=times)

    assert faults(answer) == [("order", "time")] * len(samples)
    assert [each["sample"] for each in problem(answer)["errors"]] == samples


TABLE = """station,time,wind_speed,note
a,2026-01-01T00:00Z,5,x
b,2026-01-02T00:00:00Z,8,"late, but fine"
c,yesterday,8,x
d,2026-01-02,9,twice
e,2026-01-03T02:00:00+02:00,,x
f,2026-01-04,11,x
"""


def table(client: FlaskClient, body: str, **query: Any) -> Any:
    return client.post(address("wind-memory", {**LAYER, **query}), data=body)


def test_in_a_table_a_time_that_is_none_or_out_of_order_costs_its_own_row_alone(client: FlaskClient) -> None:
    found = rows(table(client, TABLE))

    assert [row["quality_flag"] for row in found] == ["3", "3", "4", "4", "9", "3"]
    assert "'yesterday'" in found[2]["quality_reason"]
    assert "not later" in found[3]["quality_reason"]
    assert [bool(row["weighted_transfer_velocity [cm h-1]"]) for row in found] == [
        True,
        True,
        False,
        False,
        False,
        True,
    ]
    assert found[1]["note"] == "late, but fine"


def test_a_table_longer_than_a_block_is_worked_as_one_series(client: FlaskClient) -> None:
    wind = np.random.default_rng(3).uniform(3.0, 15.0, 40_000).round(1)
    body = "time [h],wind_speed\n" + "".join(f"{hour},{speed}\n" for hour, speed in enumerate(wind.tolist()))
    whole = json.dumps({**LAYER, "wind_speed": wind.tolist(), "time": {"values": list(range(40_000)), "unit": "h"}})

    written = [row["weighted_transfer_velocity [cm h-1]"] for row in rows(table(client, body))]
    told = values(client.post("/v1/wind-memory", data=whole), "weighted_transfer_velocity")

    assert [float(cell) for cell in written] == told


def test_a_table_without_its_time_is_told_so(client: FlaskClient) -> None:
    assert faults(table(client, "wind_speed\n5\n6\n")) == [("missing_input", "time")]
    assert faults(table(client, "wind_speed\n5\n6\n", time="2026-01-01")) == [("length", "time")]
    assert faults(table(client, "when,wind_speed\nnoon,6\n", time="@when")) == [("not_a_number", "when")]


def test_a_query_takes_times_in_words_days_or_hours(client: FlaskClient) -> None:
    words = client.get(address("wind-memory", QUERY, wind_speed="5;9", time="2026-03-01T12:00:00Z;2026-03-02T12:00"))
    days = client.get(address("wind-memory", QUERY, wind_speed="5;9", time="0;1"))
    hours = client.get(address("wind-memory", QUERY, wind_speed="5;9", time="0;24 h"))

    assert values(words, "weighted_transfer_velocity") == pytest.approx(values(days, "weighted_transfer_velocity"))
    assert values(hours, "weighted_transfer_velocity") == values(days, "weighted_transfer_velocity")


BAD_TIMES = [
    (["2026-03-01", "soon"], "not_a_number"),
    (["2026-02-30", "2026-03-01"], "not_a_number"),
    ({"values": ["2026-03-01", "2026-03-02"], "unit": "h"}, "unit"),
    ([[0], [1]], "not_a_number"),
    ([True, False], "not_a_number"),
    (["2026-03-01", True], "not_a_number"),
    ({"values": [0, 1], "unit": "kg"}, "unit"),
    (["2026-03-01", "2026-03-02", "2026-03-03"], "length"),
    ("2026-03-01", "length"),
]


@pytest.mark.parametrize(("times", "code"), BAD_TIMES)
def test_a_time_that_cannot_be_is_refused_by_its_name(client: FlaskClient, times: Any, code: str) -> None:
    found = faults(ask(client, wind_speed=[5, 6], time=times))

    assert (code, found[0][1]) in [(code, "time"), (code, "wind_speed")]
    assert found[0][0] == code


def test_a_plus_lost_on_the_way_is_explained(client: FlaskClient) -> None:
    answer = client.get(
        "/v1/wind-memory?gas=o2&water_temperature=15&salinity=35&mixed_layer_depth=40&wind_speed=5&time=2026-03-01T12:00+02:00"
    )

    assert "%2B" in problem(answer)["detail"]


def test_draws_sample_by_sample_are_refused_for_a_series(client: FlaskClient) -> None:
    answer = ask(client, wind_speed=[5, 6], time=[0, 1], u_wind_speed=0.5, uncertainty_method="monte-carlo")

    assert faults(answer) == [("unknown_option", "uncertainty_method")]


def test_the_uncertainty_of_a_wind_is_one_that_all_samples_share(client: FlaskClient) -> None:
    answer = ask(
        client,
        wind_speed=[7.5] * 5,
        time=[0, 1, 2, 3, 4],
        u_wind_speed=0.5,
        u_methods=0,
        pick=["weighted_transfer_velocity"],
    )
    alone = client.get(
        address(
            "transfer-velocity",
            {k: v for k, v in LAYER.items() if k != "mixed_layer_depth"},
            wind_speed=7.5,
            u_wind_speed=0.5,
            u_methods=0,
        )
    )

    u = answer.get_json()["results"]["weighted_transfer_velocity"]["u"]
    assert u == pytest.approx([alone.get_json()["results"]["transfer_velocity"]["u"][0]] * 5, rel=1e-9)


def test_a_hundred_thousand_hours_take_a_few_seconds(client: FlaskClient) -> None:
    wind = np.random.default_rng(1).uniform(3.0, 15.0, 100_000).tolist()
    body = json.dumps({**LAYER, "wind_speed": wind, "time": {"values": list(range(100_000)), "unit": "h"}})

    began = time.perf_counter()
    answer = client.post("/v1/wind-memory", data=body)

    assert answer.status_code == 200
    assert time.perf_counter() - began < 5.0  # ten times what was measured
