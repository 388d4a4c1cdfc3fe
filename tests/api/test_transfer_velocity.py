"""The transfer velocity: published coefficients, the caller's own k, wind to 10 m, and what is refused."""

import pytest
from flask.testing import FlaskClient

from schemas.vocabulary import quantity_inputs
from service.physics.declare import QUANTITIES
from tests.api.questions import QUESTIONS, address, faults, number, quality, values

TRANSFER = QUESTIONS["transfer-velocity"]
INPUTS = quantity_inputs(QUANTITIES["transfer-velocity"])


def test_ten_metres_a_second_give_25_centimetres_an_hour_at_660(client: FlaskClient) -> None:
    # k = 0.251 U^2 (Sc/660)^-0.5, Wanninkhof (2014), Eq. 4
    answer = client.get(address("transfer-velocity", TRANSFER, wind_speed=10))

    assert number(answer, "transfer_velocity_660") == pytest.approx(25.1, rel=1e-14)
    assert number(answer, "transfer_velocity_600") == pytest.approx(25.1 * (600 / 660) ** -0.5, rel=1e-14)


def test_wind_at_ten_metres_returns_bit_for_bit(client: FlaskClient) -> None:
    answer = client.get(address("transfer-velocity", TRANSFER, wind_height=10))

    assert number(answer, "wind_speed_10m") == TRANSFER["wind_speed"]


def test_wind_higher_up_is_brought_down_and_the_profile_is_listed_as_assumed(client: FlaskClient) -> None:
    answer = client.get(address("transfer-velocity", TRANSFER, wind_height=18))

    assert number(answer, "wind_speed_10m") < TRANSFER["wind_speed"]
    assert answer.get_json()["assumed"]["wind_profile"] == {"value": "smith-1988"}


OWN = [
    ("given_transfer_velocity", "transfer_velocity"),
    ("given_transfer_velocity_600", "transfer_velocity_600"),
    ("given_transfer_velocity_660", "transfer_velocity_660"),
]


@pytest.mark.parametrize(("given", "result"), OWN)
def test_ones_own_k_comes_back_at_its_schmidt_number(client: FlaskClient, given: str, result: str) -> None:
    inputs = {"gas": "co2", "water_temperature": 18.4, "salinity": 35.1, given: 12.5}
    answer = client.get(address("transfer-velocity", inputs, pick=result))

    assert number(answer, result) == pytest.approx(12.5, rel=1e-14)


def test_ones_own_k_is_scaled_by_the_exponent_that_is_sent(client: FlaskClient) -> None:
    inputs = {"gas": "co2", "water_temperature": 20, "salinity": 35, "given_transfer_velocity_600": 12.5}
    answer = client.get(
        address("transfer-velocity", inputs, pick="transfer_velocity;schmidt_number", schmidt_exponent=0.67)
    )
    schmidt = number(answer, "schmidt_number")

    assert number(answer, "transfer_velocity") == pytest.approx(12.5 * (schmidt / 600) ** -0.67, rel=1e-14)


def test_wind_outside_the_range_of_a_method_is_computed_and_suspect(client: FlaskClient) -> None:
    answer = client.get(address("transfer-velocity", TRANSFER, wind_speed="7;45", parameterisation="wanninkhof-2014"))
    (first, second) = quality(answer)

    assert first == (1, [])
    assert second[0] == 3
    assert values(answer, "transfer_velocity")[1] is not None


def test_a_method_made_for_lakes_is_suspect_at_sea(client: FlaskClient) -> None:
    answer = client.get(address("transfer-velocity", TRANSFER, parameterisation="cole-caraco-1998", water="ocean"))
    ((flag, reasons),) = quality(answer)

    assert flag == 3
    assert "not for water ocean" in reasons[0]


@pytest.mark.parametrize("name", INPUTS)
def test_text_in_an_input_is_refused_by_its_name(client: FlaskClient, name: str) -> None:
    assert ("not_a_number", name) in faults(client.get(address("transfer-velocity", TRANSFER, **{name: "calm"})))


@pytest.mark.parametrize("name", ["gas", "water_temperature", "salinity", "wind_speed"])
def test_a_needed_input_that_is_absent_is_named(client: FlaskClient, name: str) -> None:
    inputs = {each: value for each, value in TRANSFER.items() if each != name}

    assert faults(client.get(address("transfer-velocity", inputs))) == [("missing_input", name)]


def test_two_ways_of_giving_ones_own_k_are_refused(client: FlaskClient) -> None:
    inputs = {"gas": "co2", "water_temperature": 18.4, "salinity": 35.1}
    both = {"given_transfer_velocity": 12, "given_transfer_velocity_600": 12}

    assert faults(client.get(address("transfer-velocity", inputs, **both)))[0][0] == "two_ways"
