"""Which parameterisation may be used here, what is said of one that hardly may, and those that take more than wind."""

from typing import Any

import pytest
from flask.testing import FlaskClient

from tests.api.questions import address, faults, number, problem, quality, values

SEA: dict[str, Any] = {"gas": "o2", "water_temperature": 20, "salinity": 35, "wind_speed": 10}
LAKE: dict[str, Any] = {"gas": "co2", "water_temperature": 20, "salinity": 0, "water": "lake"}
STREAM: dict[str, Any] = {"gas": "co2", "water_temperature": 20, "salinity": 0, "water": "stream"}
LONG, SHORT = "wanninkhof-1992-long-term", "wanninkhof-1992"


def ask(client: FlaskClient, inputs: dict[str, Any], **more: Any) -> Any:
    """Return the answer about a transfer velocity."""
    return client.get(address("transfer-velocity", inputs, **more))


def told(client: FlaskClient, **filters: str) -> list[str]:
    """Return the names that the catalogue gives for a filter."""
    response = client.get("/v1/parameterisations", query_string=filters)
    assert response.status_code == 200, response.text
    return [each["name"] for each in response.get_json()["parameterisations"]]


def test_the_catalogue_holds_at_least_38(client: FlaskClient) -> None:
    names = told(client)

    assert len(names) >= 38
    assert names == sorted(names)


FILTERS: list[tuple[dict[str, str], set[str], set[str]]] = [
    ({"water": "stream"}, {"ulseth-2019", "raymond-2012-7"}, {"wanninkhof-2014", "borges-2004"}),
    ({"water": "estuary", "gas": "ch4"}, {"rosentreter-2017-ch4", "ho-2016"}, {"rosentreter-2017-co2"}),
    ({"wind_speed": "25"}, {"raymond-2012-5"}, {"wanninkhof-2014", "liang-2013", "yang-2022-friction-velocity"}),
    ({"wind_speed": "19", "water": "ocean"}, {"wanninkhof-2009", "liang-2013"}, {"nightingale-2000", "edson-2011"}),
    ({"inputs": "wind_speed", "water": "lake"}, {"cole-caraco-1998"}, {"vachon-prairie-2013", "ho-1997"}),
    ({"inputs": "wind_speed;lake_area", "water": "lake"}, {"cole-caraco-1998", "vachon-prairie-2013"}, {"ho-1997"}),
    ({"inputs": "friction_velocity"}, {"yang-2022-friction-velocity", "liang-2013"}, {"yang-2022", "woolf-1997"}),
    ({"inputs": "flow_velocity;slope"}, {"raymond-2012-5", "ulseth-2019"}, {"raymond-2012-1", "raymond-2012-6"}),
    ({"inputs": "wind_speed;own_cubic_coefficient"}, {"own-polynomial", "ho-2006"}, {"reichl-deike-2020"}),
    ({"inputs": ""}, set(), {"wanninkhof-2014", "raymond-2012-5"}),
]


@pytest.mark.parametrize(("filters", "within", "without"), FILTERS, ids=[str(each[0]) for each in FILTERS])
def test_the_catalogue_tells_what_may_be_used_here(
    client: FlaskClient, filters: dict[str, str], within: set[str], without: set[str]
) -> None:
    names = set(told(client, **filters))

    assert within <= names
    assert not without & names


def test_an_input_that_does_not_exist_is_refused_with_the_nearest(client: FlaskClient) -> None:
    response = client.get("/v1/parameterisations", query_string={"inputs": "wind_speed;lake_aera"})

    assert faults(response) == [("unknown_option", "inputs")]
    assert "lake_area" in response.get_data(as_text=True)


def test_the_catalogue_names_the_inputs_of_a_method(client: FlaskClient) -> None:
    found = client.get("/v1/parameterisations/borges-2004").get_json()

    assert set(found["inputs"]) == {"wind_speed", "flow_velocity", "water_depth"}
    assert client.get("/v1/parameterisations/liang-2013").get_json()["schmidt_exponent"] is None
    assert client.get("/v1/parameterisations/cole-caraco-1998").get_json()["schmidt_exponent"] != 0.5


def test_all_is_every_method_that_applies_side_by_side(client: FlaskClient) -> None:
    found = ask(client, LAKE, wind_speed=4, parameterisation="all").get_json()["by_parameterisation"]

    assert list(found) == ["cole-caraco-1998", "crusius-wanninkhof-2003-power", "macintyre-2010-combined"]


def test_all_says_what_is_missing_where_nothing_applies(client: FlaskClient) -> None:
    response = ask(client, LAKE, parameterisation="all")

    assert faults(response) == [("missing_input", "parameterisation")]
    assert "wind_speed, lake_area" in problem(response)["detail"]


def test_a_stream_needs_no_wind(client: FlaskClient) -> None:
    response = ask(client, STREAM, flow_velocity=0.3, slope=0.005, parameterisation="raymond-2012-5")

    assert 0.24 * number(response, "transfer_velocity_600") == pytest.approx(6.2815, rel=1e-6)
    assert "wind_speed_10m" not in response.get_json()["results"]


def test_an_input_of_a_method_that_is_absent_is_named_with_its_unit(client: FlaskClient) -> None:
    response = ask(client, LAKE, wind_speed=4, parameterisation="vachon-prairie-2013")

    assert faults(response) == [("missing_input", "lake_area")]
    assert "km2" in problem(response)["detail"]


def test_a_negative_k_is_set_to_zero_and_suspect(client: FlaskClient) -> None:
    response = ask(client, LAKE, wind_speed=[0.0, 0.08, 0.09], parameterisation="macintyre-2010-heating")
    told_of = quality(response)

    assert values(response, "transfer_velocity_600")[:2] == [0.0, 0.0]
    assert [flag for flag, _ in told_of] == [3, 3, 1]
    assert "negative" in told_of[0][1][0]


FLAGGED = [
    (LONG, {"wind_averaging": "6 h"}, 3),
    (LONG, {"wind_averaging": "1 d"}, 1),
    (LONG, {"wind_averaging": "30 d"}, 1),
    (SHORT, {"wind_averaging": "10 min"}, 1),
    (SHORT, {"wind_averaging": "1 d"}, 3),
    (SHORT, {"wind_averaging": "1 d", "wind_speed_variance": 4}, 1),
    (SHORT, {"wind_averaging": "1 d", "weibull_shape": 2}, 1),
    ("wanninkhof-2014", {"wind_averaging": "30 d"}, 3),
    (SHORT, {}, 1),
    (LONG, {}, 1),
]


@pytest.mark.parametrize(("method", "inputs", "flag"), FLAGGED)
def test_the_averaging_of_the_wind_is_held_against_the_method(
    client: FlaskClient, method: str, inputs: dict[str, Any], flag: int
) -> None:
    ((found, reasons),) = quality(ask(client, SEA, parameterisation=method, **inputs))

    assert found == flag
    assert bool(reasons) is (flag == 3)


REFUSED: list[tuple[dict[str, Any], str, str]] = [
    ({"parameterisation": LONG, "wind_speed_variance": 4}, "unused", "wind_speed_variance"),
    ({"parameterisation": f"wanninkhof-2014;{LONG}", "weibull_shape": 2}, "unused", "weibull_shape"),
    ({"wind_speed_variance": 4, "weibull_shape": 2}, "two_ways", "weibull_shape and wind_speed_variance"),
    ({"wind_averaging": "600;1200"}, "length", "wind_averaging"),
    ({"parameterisation": "own-polynomial"}, "missing_input", "own_constant"),
    ({"parameterisation": SHORT, "own_constant": 1}, "unused", "own_constant"),
    ({"given_transfer_velocity": 9, "rain_rate": 3}, "unused", "rain_rate"),
    ({"own_reference_schmidt_number": 600}, "unused", "own_reference_schmidt_number"),
]


@pytest.mark.parametrize(("inputs", "code", "name"), REFUSED)
def test_what_contradicts_itself_is_refused(client: FlaskClient, inputs: dict[str, Any], code: str, name: str) -> None:
    assert (code, name) in faults(ask(client, SEA, **inputs))


def test_the_variance_is_that_at_the_height_of_the_wind(client: FlaskClient) -> None:
    response = ask(client, SEA, wind_height=23, wind_speed_variance=9)
    at_ten = number(response, "wind_speed_10m")

    assert number(response, "transfer_velocity_660") == pytest.approx(0.251 * at_ten**2 * (1 + 9 / 100), rel=1e-13)


def test_rain_is_added_to_the_wind_and_told_with_its_source(client: FlaskClient) -> None:
    inputs = {**LAKE, "wind_speed": 3, "parameterisation": "cole-caraco-1998"}
    dry, wet = ask(client, inputs), ask(client, inputs, rain_rate=10)
    more = number(wet, "transfer_velocity_600") - number(dry, "transfer_velocity_600")

    assert more == pytest.approx(6.79 - 0.15, rel=1e-13)
    assert quality(wet) == [(1, [])]
    assert "ho-1997" in [each["name"] for each in wet.get_json()["methods"]["transfer_velocity"]]


SUSPECT_RAIN = [({"salinity": 30}, "salt"), ({"wind_speed": 6}, "5 m s-1")]


@pytest.mark.parametrize(("inputs", "reason"), SUSPECT_RAIN)
def test_rain_on_salt_water_or_in_wind_is_suspect(client: FlaskClient, inputs: dict[str, Any], reason: str) -> None:
    sent = {**LAKE, "wind_speed": 3, "parameterisation": "cole-caraco-1998", "rain_rate": [0, 10]}
    dry, wet = quality(ask(client, {**sent, **inputs}))

    assert dry == (1, [])
    assert wet[0] == 3
    assert reason in wet[1][0]


def test_rain_on_still_water_has_a_method_of_its_own(client: FlaskClient) -> None:
    response = ask(client, LAKE, rain_rate=10, parameterisation="ho-1997")

    assert number(response, "transfer_velocity_600") == pytest.approx(0.929 + 6.79 - 0.15, rel=1e-13)


def test_ones_own_polynomial_is_taken_without_being_named(client: FlaskClient) -> None:
    inputs = {**LAKE, "wind_speed": 5, "wind_speed_variance": 4, "own_quadratic_coefficient": 0.3}
    response = ask(client, inputs, own_constant="0.5 m d-1", own_reference_schmidt_number=600, schmidt_exponent=0.67)
    answer = response.get_json()

    assert number(response, "transfer_velocity_600") == pytest.approx(0.5 / 0.24 + 0.3 * 29, rel=1e-13)
    assert answer["methods"]["transfer_velocity"][0]["name"] == "own-polynomial"
    assert answer["assumed"]["own_linear_coefficient"] == {"value": 0.0, "unit": "cm h-1"}
    assert "parameterisation" not in answer["assumed"]


def test_ones_own_polynomial_stands_beside_a_published_one(client: FlaskClient) -> None:
    both = "own-polynomial;wanninkhof-2014"
    response = ask(client, SEA, own_quadratic_coefficient=0.251, parameterisation=both, pick="transfer_velocity")

    assert response.get_json()["results"]["transfer_velocity"]["spread"] == [pytest.approx(0.0, abs=1e-12)]


INJECTING = ["liang-2013", "emerson-2019", "stanley-2009"]


@pytest.mark.parametrize("method", INJECTING)
def test_a_gas_in_equilibrium_with_the_air_still_gains_from_bubbles(client: FlaskClient, method: str) -> None:
    inputs = {**SEA, "water_saturation": 100, "parameterisation": method, "ice_fraction": 0.25}
    response = client.get(address("flux", inputs, pick="flux;bubble_injection;fugacity_difference;evasion"))
    gained = 0.75 * number(response, "bubble_injection")

    assert number(response, "fugacity_difference") == pytest.approx(0.0, abs=1e-6)
    assert gained > 0.0
    assert number(response, "flux") == pytest.approx(-gained, rel=1e-9)


@pytest.mark.parametrize("method", INJECTING)
def test_the_supersaturation_of_bubbles_is_a_result_without_any_air(client: FlaskClient, method: str) -> None:
    response = ask(client, SEA, parameterisation=method, pick="steady_state_supersaturation")
    every = ask(client, SEA, parameterisation=method, pick="all")

    assert 0.1 < number(response, "steady_state_supersaturation") < 3.0
    assert number(every, "steady_state_supersaturation") == number(response, "steady_state_supersaturation")


def test_a_supersaturation_that_a_method_does_not_give_is_refused_with_those_that_do(client: FlaskClient) -> None:
    response = ask(client, SEA, pick="steady_state_supersaturation")
    (fault,) = problem(response)["errors"]

    assert fault["code"] == "missing_input"
    assert fault["allowed"] == ", ".join(INJECTING)
    assert "wanninkhof-2014" in fault["reason"]
    assert "steady_state_supersaturation" not in ask(client, SEA, pick="all").get_json()["results"]


def test_the_supersaturation_of_woolf_and_thorpe_goes_with_any_method(client: FlaskClient) -> None:
    wanted = {"pick": "steady_state_supersaturation", "supersaturation_method": "woolf-thorpe-1991"}

    assert number(ask(client, SEA, wind_speed=9, **wanted), "steady_state_supersaturation") == pytest.approx(1.0)
    assert faults(ask(client, {**SEA, "gas": "ch4"}, **wanted)) == [("unknown_option", "supersaturation_method")]


@pytest.mark.parametrize("gas", ["co2", "n2", "dms", "sf6", "ch4", "he"])
def test_the_resistance_of_the_air_is_offered_for_every_gas(client: FlaskClient, gas: str) -> None:
    inputs = {
        **SEA,
        "gas": gas,
        "air_side_resistance": "duce-1991",
        "pick": "transfer_velocity;total_transfer_velocity",
    }
    response = ask(client, inputs)

    assert 0.0 < number(response, "total_transfer_velocity") < number(response, "transfer_velocity")


PROFILES = ["smith-1988", "large-pond-1981", "constant-drag", "power-law"]


@pytest.mark.parametrize("profile", PROFILES)
def test_the_wind_profile_can_be_chosen(client: FlaskClient, profile: str) -> None:
    above = ask(client, SEA, wind_height=20, wind_profile=profile, pick="wind_speed_10m")
    at_ten = ask(client, SEA, wind_height=10, wind_profile=profile, pick="wind_speed_10m")

    assert 8.9 < number(above, "wind_speed_10m") < 9.5
    assert number(at_ten, "wind_speed_10m") == 10.0


def test_a_profile_without_friction_velocity_says_so(client: FlaskClient) -> None:
    inputs = {**SEA, "wind_profile": "power-law", "parameterisation": "yang-2022-friction-velocity"}

    assert faults(ask(client, inputs)) == [("missing_input", "friction_velocity")]
    assert number(ask(client, inputs, friction_velocity=0.3), "transfer_velocity_660") == pytest.approx(26.3142)
