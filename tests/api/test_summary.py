"""The summary of a series of fluxes: mean, integral, amount and mass, the gaps, and what errors are shared."""

import math
from typing import Any

import pytest
from flask.testing import FlaskClient

from tests.api.questions import FLUX, address, faults, problem, quality, values

CARBON: dict[str, Any] = {
    "gas": "co2",
    "water_temperature": 20.0,
    "salinity": 35.0,
    "given_transfer_velocity": 16.0,
    "air_fugacity": 400.0,
    "pick": "flux",
    "summary": 1,
}
SERIES = {**CARBON, "water_fugacity": [360.0, 380.0, 420.0, 400.0], "time": [0, 1, 3, 4]}


def ask(client: FlaskClient, **more: Any) -> Any:
    return client.post("/v1/flux", json={**SERIES, **more})


def told(answer: Any) -> Any:
    assert answer.status_code == 200, answer.text
    return answer.get_json()["summary"]


def test_each_sample_counts_for_the_time_half_way_to_its_neighbours(client: FlaskClient) -> None:
    answer = ask(client)
    one, two, three, four = (float(each or 0.0) for each in values(answer, "flux"))
    mean = (0.5 * one + 1.5 * two + 1.5 * three + 0.5 * four) / 4.0

    found = told(answer)
    assert found["results"]["flux"]["mean"] == {"value": pytest.approx(mean, rel=1e-14), "unit": "mmol m-2 d-1"}
    assert found["results"]["flux"]["integral"] == {"value": pytest.approx(4.0 * mean, rel=1e-14), "unit": "mmol m-2"}
    assert (found["samples"], found["left_out"], found["gaps"]) == (4, 0, 0)
    assert found["covered"] == {"value": 4.0, "unit": "d"}
    assert found["fraction_covered"] == 1.0
    assert found["longest_gap"] == {"value": 2.0, "unit": "d"}


def test_an_area_gives_moles_and_mass_of_the_gas_or_of_its_element(client: FlaskClient) -> None:
    gas = told(ask(client, area="2 km2"))["results"]["flux"]
    element = told(ask(client, area={"values": 2e6, "unit": "m2"}, mass_as="element", unit="g m-2 yr-1"))["results"][
        "flux"
    ]

    moles = gas["integral"]["value"] * 2e6 / 1000.0
    assert gas["amount"] == {"value": pytest.approx(moles, rel=1e-13), "unit": "mol"}
    assert gas["mass"]["value"] == pytest.approx(moles * 44.009 / 1000.0, rel=2e-5)  # g mol-1 to its digits
    assert (gas["mass"]["unit"], gas["mass"]["mass_of"]) == ("kg", "CO2")
    assert element["mass"]["value"] == pytest.approx(moles * 12.011 / 1000.0, rel=1e-4)
    assert element["mass"]["mass_of"] == "C"
    assert element["mean"]["unit"] == "g m-2 yr-1"
    assert element["mean"]["value"] == pytest.approx(gas["mean"]["value"] * 12.011e-3 * 365.2425, rel=1e-4)


def test_a_gap_is_stated_and_not_bridged(client: FlaskClient) -> None:
    found = told(ask(client, water_fugacity=[360] * 6, time=[0, 1, 2, 3, 20, 21]))

    assert found["gaps"] == 1
    assert found["longest_gap"]["value"] == 17.0
    assert found["covered"]["value"] == 5.0
    assert found["fraction_covered"] == pytest.approx(5.0 / 21.0)


def test_a_sample_without_a_flux_or_a_time_is_left_out(client: FlaskClient) -> None:
    answer = ask(client, water_fugacity=[360, None, 420, 400, -5], time=[0, 1, 2, None, 4])

    assert (told(answer)["samples"], told(answer)["left_out"]) == (2, 3)
    assert quality(answer)[3] == (1, ["time is missing: the sample is left out of the summary"])
    assert values(answer, "flux")[3] is not None


def test_one_sample_has_a_mean_and_no_integral(client: FlaskClient) -> None:
    found = told(ask(client, water_fugacity=360, time=0))

    assert "integral" not in found["results"]["flux"]
    assert found["fraction_covered"] is None


def test_times_in_words_are_told_in_words(client: FlaskClient) -> None:
    found = told(ask(client, time=["2026-01-01", "2026-01-02", "2026-01-04T12:00Z", "2026-01-05T00:00:00+01:00"]))

    assert found["start"]["utc"] == "2026-01-01T00:00:00Z"
    assert found["end"]["utc"] == "2026-01-04T23:00:00Z"


# Uncertainty: independent and common.


def test_independent_errors_dwindle_and_common_ones_do_not(client: FlaskClient) -> None:
    many = {"water_fugacity": [360.0] * 101, "time": list(range(101)), "u_water_fugacity": 4.0, "u_methods": 0}
    single = ask(client, water_fugacity=[360.0, 360.0], time=[0, 1], u_water_fugacity=4.0, u_methods=0)
    u = single.get_json()["results"]["flux"]["u"][0]

    alone = told(ask(client, **many))["results"]["flux"]["mean"]
    shared = told(ask(client, **many, common="water_fugacity"))["results"]["flux"]["mean"]

    weights = [0.5, *[1.0] * 99, 0.5]
    assert alone["u"] == pytest.approx(u * math.sqrt(sum(w**2 for w in weights)) / 100.0, rel=1e-9)
    assert (alone["u_common"], alone["u_independent"]) == (0.0, alone["u"])
    assert shared["u"] == pytest.approx(u, rel=1e-9)
    assert (shared["u_common"], shared["u_independent"]) == (shared["u"], 0.0)


def test_an_input_that_stands_once_has_one_error_for_all_samples(client: FlaskClient) -> None:
    found = told(ask(client, u_given_transfer_velocity=3.2, u_water_fugacity=2.0, u_methods=0))
    once, each = found["results"]["flux"]["mean"], found["results"]["flux"]["budget"]

    assert "given_transfer_velocity" in found["uncertainty"]["common"]
    assert "water_fugacity" not in found["uncertainty"]["common"]
    assert once["u_common"] == pytest.approx(0.2 * abs(once["value"]), rel=1e-6)  # a fifth of k is a fifth of the mean
    assert sum(each.values()) == pytest.approx(1.0, abs=1e-12)


def test_the_error_of_a_method_is_shared_by_all_samples(client: FlaskClient) -> None:
    wind = {name: value for name, value in SERIES.items() if name != "given_transfer_velocity"}
    answer = client.post("/v1/flux", json={**wind, "wind_speed": [5, 6, 7, 8], "u_unpublished": 0})
    found = told(answer)["results"]["flux"]

    assert found["mean"]["u_independent"] == 0.0
    assert found["mean"]["u"] >= 0.2 * abs(found["mean"]["value"]) * 0.99  # wanninkhof-2014 states 20 percent
    assert any(name.startswith("transfer_velocity") for name in found["budget"])


def test_a_method_that_publishes_nothing_leaves_the_inputs_and_says_so(client: FlaskClient) -> None:
    wind = {name: value for name, value in SERIES.items() if name != "given_transfer_velocity"}
    found = told(client.post("/v1/flux", json={**wind, "wind_speed": [5, 6, 7, 8], "u_wind_speed": 0.5}))["results"][
        "flux"
    ]

    assert found["mean"]["u"] is None
    assert found["mean"]["u_inputs"] > 0.0
    assert "u_unpublished" in found["reason"]["u"]


def test_a_missing_uncertainty_is_named(client: FlaskClient) -> None:
    found = told(ask(client, u_water_fugacity=[1, 1, None, 1], u_methods=0))["results"]["flux"]

    assert found["mean"]["u"] is None
    assert found["mean"]["value"] is not None
    assert "u_water_fugacity" in found["reason"]["u"]


def test_several_parameterisations_have_a_summary_each_and_their_spread(client: FlaskClient) -> None:
    wind = {name: value for name, value in SERIES.items() if name != "given_transfer_velocity"}
    both = ["wanninkhof-2014", "nightingale-2000"]
    found = told(client.post("/v1/flux", json={**wind, "wind_speed": [5, 6, 7, 8], "parameterisation": both}))
    one, two = (found["by_parameterisation"][name]["results"]["flux"]["mean"]["value"] for name in both)

    assert found["results"]["flux"]["mean"]["value"] == pytest.approx((one + two) / 2.0)
    assert found["results"]["flux"]["mean"]["spread"] == pytest.approx(abs(one - two) / math.sqrt(2.0))


# What is refused.

WRONG: list[tuple[dict[str, Any], tuple[str, str]]] = [
    ({"time": [0, 2, 1, 3]}, ("order", "time")),
    ({"time": [0, 1, 1, 3]}, ("order", "time")),
    ({"time": "2026-01-01"}, ("length", "time")),
    ({"time": [0, 1, 2]}, ("length", "time")),
    ({"area": -2}, ("unknown_option", "area")),
    ({"area": [1, 2]}, ("unknown_option", "area")),
    ({"area": "2 kg"}, ("unit", "area")),
    ({"common": "salinity"}, ("unknown_option", "common")),
    ({"common": "wind"}, ("unknown_option", "common")),
    ({"summary": 0, "area": 5}, ("unused", "area")),
    ({"summary": 0, "common": "salinity"}, ("unused", "common")),
    ({"summary": 2}, ("unknown_option", "summary")),
    (
        {"u_salinity": 0.1, "u_water_fugacity": 1, "correlation.salinity.water_fugacity": 0.5},
        ("unknown_option", "correlation.salinity.water_fugacity"),
    ),
]  # fmt: skip


@pytest.mark.parametrize(("changed", "fault"), WRONG)
def test_what_a_summary_cannot_use_is_refused_by_name(
    client: FlaskClient, changed: dict[str, Any], fault: tuple[str, str]
) -> None:
    assert fault in faults(ask(client, **changed))


def test_a_summary_without_times_names_what_is_missing(client: FlaskClient) -> None:
    without = {name: value for name, value in SERIES.items() if name != "time"}

    assert faults(client.post("/v1/flux", json=without)) == [("missing_input", "time")]


IMPOSSIBLE = [
    {"u_wind_speed": 0.5, "u_salinity": 0.1, "correlation.wind_speed.salinity": 1.5},
    {"u_wind_speed": 0.5, "correlation.wind_speed.salinity": 0.5},
    {
        "u_wind_speed": 0.5,
        "u_salinity": 0.1,
        "u_water_temperature": 0.1,
        "correlation.wind_speed.salinity": 0.9,
        "correlation.salinity.water_temperature": 0.9,
        "correlation.wind_speed.water_temperature": -0.9,
    },
]


@pytest.mark.parametrize("changed", IMPOSSIBLE)
def test_correlations_that_cannot_be_are_refused(client: FlaskClient, changed: dict[str, Any]) -> None:
    assert {code for code, _ in faults(client.post("/v1/flux", json={**FLUX, **changed}))} == {"unknown_option"}


# Tables.

TABLE = "time,water_fugacity\n2026-01-01,360\n2026-01-02,380\n2026-01-02,390\n2026-01-04,420\n2026-01-05,400\n"
ONCE = {name: value for name, value in CARBON.items() if name not in ("pick", "summary")}


def test_a_table_is_summed_up_in_json(client: FlaskClient) -> None:
    answer = client.post(address("flux", ONCE, summary=1, form="json", pick="flux"), data=TABLE)
    found = told(answer)

    assert (found["samples"], found["left_out"]) == (4, 1)
    assert quality(answer)[2][0] == 3
    assert "left out of the summary" in quality(answer)[2][1][0]
    assert found["results"]["flux"]["mean"]["value"] == told(ask(client))["results"]["flux"]["mean"]["value"]


def test_a_table_has_no_room_for_a_summary(client: FlaskClient) -> None:
    refused = client.post(address("flux", ONCE, summary=1), data=TABLE)

    assert faults(refused) == [("unknown_option", "summary")]
    assert "form=json" in problem(refused)["detail"]


def test_without_a_summary_a_column_of_times_passes_through(client: FlaskClient) -> None:
    answer = client.post(address("flux", ONCE), data=TABLE.replace("2026-01-05", "some day"))

    assert answer.status_code == 200
    assert "some day,400," in answer.text
