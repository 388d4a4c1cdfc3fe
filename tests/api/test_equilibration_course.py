"""The course of a disequilibrium, at times asked for or along a series; carbon dioxide; turnover; ventilation."""

import math
from typing import Any

import pytest
from flask.testing import FlaskClient

from tests.api.questions import address, faults, number, problem, quality, rows, values

OWN: dict[str, Any] = {
    "gas": "o2",
    "water_temperature": 15.0,
    "salinity": 35.0,
    "mixed_layer_depth": 40.0,
    "given_transfer_velocity": 20.0,
}
CARBON = {**OWN, "gas": "co2", "alkalinity": 2300.0, "water_fugacity": 600.0, "air_fugacity": 400.0}
TAU = 40.0 / 4.8  # d


def test_the_course_is_told_at_the_times_asked_for(client: FlaskClient) -> None:
    answer = client.post("/v1/equilibration", json={**OWN, "mixed_layer_depth": [40, 80], "times": [0, 1, TAU]})
    course: Any = values(answer, "disequilibrium")

    assert answer.get_json()["times"] == {"values": [0.0, 1.0, TAU], "unit": "d"}
    assert course[0] == pytest.approx([1.0, math.exp(-1.0 / TAU), math.exp(-1.0)], rel=1e-13)
    assert course[1] == pytest.approx([1.0, math.exp(-0.5 / TAU), math.exp(-0.5)], rel=1e-13)


def test_a_table_has_a_column_for_each_time(client: FlaskClient) -> None:
    inputs = {name: value for name, value in OWN.items() if name != "mixed_layer_depth"}
    found = rows(client.post(address("equilibration", inputs, times="0;12;24 h"), data="mixed_layer_depth\n40\n80\n"))

    assert float(found[0]["disequilibrium.t=0.5 [1]"]) == pytest.approx(math.exp(-0.5 / TAU), rel=1e-13)
    assert float(found[1]["disequilibrium.t=1 [1]"]) == pytest.approx(math.exp(-0.5 / TAU), rel=1e-13)
    assert found[0]["disequilibrium.t=0 [1]"] == "1.0"


def test_one_value_of_a_course_has_its_uncertainty_beside_it(client: FlaskClient) -> None:
    answer = client.get(address("equilibration", OWN, times="1;10", u_given_transfer_velocity=2, pick="disequilibrium"))
    told = answer.get_json()["results"]["disequilibrium"]

    assert told["u"][0] == pytest.approx([0.1 * t / TAU * math.exp(-t / TAU) for t in (1, 10)], rel=1e-6)


WRONG_TIMES = [
    ([1, 0], "order"),
    ([0, 1, 1], "order"),
    ([-1, 1], "order"),
    ([0, None], "order"),
    ([], "length"),
    ("soon", "not_a_number"),
    (list(range(1001)), "too_large"),
    ({"values": [0, 1], "unit": "kg"}, "unit"),
]


@pytest.mark.parametrize(("times", "code"), WRONG_TIMES)
def test_times_that_do_not_increase_or_are_none_are_refused(client: FlaskClient, times: Any, code: str) -> None:
    assert faults(client.post("/v1/equilibration", json={**OWN, "times": times})) == [(code, "times")]


def test_a_course_is_no_bare_number(client: FlaskClient) -> None:
    answer = client.get(address("equilibration", OWN, times="1;2", pick="disequilibrium", form="number"))

    assert faults(answer) == [("unknown_option", "form")]


def test_a_disequilibrium_without_a_time_names_both_ways(client: FlaskClient) -> None:
    told = problem(client.get(address("equilibration", OWN, pick="disequilibrium")))["detail"]

    assert "times" in told
    assert faults(client.get(address("equilibration", OWN, times=1, time=1))) == [("two_ways", "time and times")]


def test_under_ice_that_covers_all_there_is_no_course(client: FlaskClient) -> None:
    answer = client.get(address("equilibration", OWN, ice_fraction=1, times="1;2", pick="disequilibrium"))

    course: Any = values(answer, "disequilibrium")

    assert course == [[None, None]]
    assert quality(answer)[0] == (4, ["no open water: nothing is exchanged, so there is no time"])


# A series: the wind changes on the way.


def test_a_series_tells_what_is_left_since_its_first_time(client: FlaskClient) -> None:
    answer = client.post("/v1/equilibration", json={**OWN, "given_transfer_velocity": [20, 10, 0], "time": [0, 2, 3]})
    rates = [4.8 / 40, 2.4 / 40, 0.0]

    left = [1.0, math.exp(-2 * (rates[0] + rates[1]) / 2), math.exp(-(rates[0] + rates[1]) - rates[1] / 2)]
    picked = client.post(
        "/v1/equilibration",
        json={**OWN, "given_transfer_velocity": [20, 10, 0], "time": [0, 2, 3], "pick": "disequilibrium"},
    )
    assert values(picked, "disequilibrium") == pytest.approx(left, rel=1e-13)
    assert values(answer, "disequilibrium")[:2] == pytest.approx(left[:2], rel=1e-13)


@pytest.mark.parametrize("steps", [1, 1000])
def test_a_constant_decay_is_the_same_in_one_step_or_in_a_thousand(client: FlaskClient, steps: int) -> None:
    times = [10.0 * step / steps for step in range(steps + 1)]

    left = values(client.post("/v1/equilibration", json={**OWN, "time": times}), "disequilibrium")

    assert left[-1] == pytest.approx(math.exp(-10.0 / TAU), rel=1e-12)


def test_a_series_by_table_is_the_series_by_json(client: FlaskClient) -> None:
    body = "time,given_transfer_velocity\n2026-01-01,20\n2026-01-02,35\n2026-01-05,5\n"
    inputs = {name: value for name, value in OWN.items() if name != "given_transfer_velocity"}

    found = rows(client.post(address("equilibration", inputs, time="@time"), data=body))
    picked = rows(client.post(address("equilibration", inputs, pick="disequilibrium"), data=body))
    told = client.post("/v1/equilibration", json={**inputs, "given_transfer_velocity": [20, 35, 5], "time": [0, 1, 4]})

    assert [float(row["disequilibrium [1]"]) for row in found] == pytest.approx(values(told, "disequilibrium"))
    assert [row["disequilibrium [1]"] for row in picked] == [row["disequilibrium [1]"] for row in found]


def test_a_table_that_happens_to_hold_a_time_is_no_series(client: FlaskClient) -> None:
    body = "time,mixed_layer_depth\n2026-01-02,40\n2026-01-01,50\nsome day,60\n"
    inputs = {name: value for name, value in OWN.items() if name != "mixed_layer_depth"}

    found = rows(client.post(address("equilibration", inputs), data=body))

    assert [row["quality_flag"] for row in found] == ["1", "1", "1"]
    assert "disequilibrium [1]" not in found[0]


def test_without_a_series_a_time_passes_through(client: FlaskClient) -> None:
    plain = client.post(
        "/v1/flux",
        json={
            "gas": "co2",
            "water_temperature": 20,
            "salinity": 35,
            "water_fugacity": 400,
            "air_fugacity": 400,
            "wind_speed": 5,
            "time": "noon, local",
        },
    )

    assert plain.status_code == 200
    assert plain.get_json()["time"] == "noon, local"


# Ventilation, radon, turnover, carbon dioxide.


def test_ventilation_from_below_shortens_the_time(client: FlaskClient) -> None:
    still = number(client.get(address("equilibration", OWN)), "equilibration_time")
    moved = number(client.get(address("equilibration", OWN, ventilation_rate="0.1 1/d")), "equilibration_time")

    assert still == pytest.approx(TAU, rel=1e-13)
    assert 1.0 / moved == pytest.approx(1.0 / still + 0.1, rel=1e-13)


def test_radon_decays_on_its_own_as_well(client: FlaskClient) -> None:
    radon = number(client.get(address("equilibration", OWN | {"gas": "rn222"})), "equilibration_time")

    assert 1.0 / radon == pytest.approx(4.8 / 40.0 + 2.098e-6 * 86400.0, rel=1e-3)  # to the digits of the constant


def test_the_two_turnover_times_have_their_own_names(client: FlaskClient) -> None:
    answer = client.get(
        address("equilibration", OWN, water_saturation=105, pick="turnover_one_way;turnover_net;equilibration_time")
    )

    assert number(answer, "turnover_one_way") == pytest.approx(TAU, rel=1e-12)
    assert number(answer, "turnover_net") == pytest.approx(TAU * 105.0 / 5.0, rel=1e-9)


def test_a_water_in_equilibrium_has_no_net_turnover(client: FlaskClient) -> None:
    both = {"gas": "co2", "water_fugacity": 400.0, "air_fugacity": 400.0}
    answer = client.get(address("equilibration", OWN | both, pick="turnover_net"))

    assert values(answer, "turnover_net") == [None]
    assert quality(answer)[0] == (4, ["no net flux: the stock lasts for ever"])


SEAS = [(5.0, 35.0, 2300.0, 400.0), (15.0, 35.0, 2300.0, 400.0), (30.0, 35.0, 2300.0, 400.0)]


@pytest.mark.parametrize(("temperature", "salinity", "alkalinity", "fugacity"), SEAS)
def test_carbon_dioxide_takes_two_to_seven_months_from_cold_to_warm_water(
    client: FlaskClient, temperature: float, salinity: float, alkalinity: float, fugacity: float
) -> None:
    # 40 m at 20 cm/h, air of today; common practice: two to seven months, for storage ratios of about 8 to 25
    water = {
        "water_temperature": temperature,
        "salinity": salinity,
        "alkalinity": alkalinity,
        "water_fugacity": fugacity,
    }
    answer = client.get(address("equilibration", {k: v for k, v in CARBON.items() if k != "air_fugacity"} | water))

    assert 7.0 < number(answer, "storage_ratio") < 25.0  # 7.3 at 5 degC is about 8
    assert 2.0 <= number(answer, "equilibration_time") / 30.44 <= 7.0


def test_far_from_equilibrium_the_nonlinear_course_is_another(client: FlaskClient) -> None:
    linear: Any = values(client.get(address("equilibration", CARBON, times="50;200")), "disequilibrium")
    answer = client.get(address("equilibration", CARBON, times="50;200", course="nonlinear"))
    nonlinear: Any = values(answer, "disequilibrium")

    assert answer.get_json()["methods"]["course"][0]["name"] == "nonlinear"
    assert [abs(a - b) > 0.005 for a, b in zip(linear[0], nonlinear[0], strict=True)] == [True, True]


def test_the_nonlinear_course_says_what_it_needs(client: FlaskClient) -> None:
    without = {name: value for name, value in CARBON.items() if name != "alkalinity"}

    assert ("missing_input", "alkalinity") in faults(
        client.get(address("equilibration", without, times=1, course="nonlinear", pick="disequilibrium"))
    )
    assert faults(client.get(address("equilibration", OWN, times=1, course="nonlinear"))) == [
        ("unknown_option", "course")
    ]
