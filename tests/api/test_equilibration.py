"""Equilibration of a mixed layer: times that belong together, and what is refused."""

import math

import pytest
from flask.testing import FlaskClient

from schemas.vocabulary import quantity_inputs
from service.physics.declare import QUANTITIES
from tests.api.questions import QUESTIONS, address, faults, number, quality, values

MIXED_LAYER = QUESTIONS["equilibration"]
INPUTS = quantity_inputs(QUANTITIES["equilibration"])
OWN = {"gas": "ar", "water_temperature": 15, "salinity": 35, "mixed_layer_depth": 100, "given_transfer_velocity": 12.5}


def test_a_hundred_metres_at_three_metres_a_day_take_33_days(client: FlaskClient) -> None:
    # common practice, without a source: k is about 3 m per day, so about 33 days for a column of 100 m
    answer = client.get(address("equilibration", OWN))

    assert number(answer, "equilibration_time") == pytest.approx(100 / 3, rel=1e-12)


def test_half_time_and_time_to_a_fraction_follow_from_the_e_folding_time(client: FlaskClient) -> None:
    answer = client.get(address("equilibration", OWN, fraction=0.9))
    time = number(answer, "equilibration_time")

    assert number(answer, "half_time") == pytest.approx(time * math.log(2), rel=1e-14)
    assert number(answer, "time_to_fraction") == pytest.approx(time * math.log(10), rel=1e-12)
    assert number(answer, "storage_ratio") == 1


def test_the_fraction_is_95_percent_unless_said_otherwise(client: FlaskClient) -> None:
    answer = client.get(address("equilibration", MIXED_LAYER))

    assert answer.get_json()["assumed"]["fraction"]["value"] == 0.95


def test_the_fraction_stands_once_for_the_request(client: FlaskClient) -> None:
    assert faults(client.get(address("equilibration", MIXED_LAYER, fraction="0.5;0.9"))) == [("length", "fraction")]


def test_under_ice_that_covers_all_there_is_no_time(client: FlaskClient) -> None:
    answer = client.get(address("equilibration", MIXED_LAYER, ice_fraction=1))

    assert values(answer, "equilibration_time") == [None]
    assert "no open water" in quality(answer)[0][1][0]


@pytest.mark.parametrize("depth", [0, -5])
def test_a_layer_without_depth_is_impossible(client: FlaskClient, depth: float) -> None:
    answer = client.get(address("equilibration", MIXED_LAYER, mixed_layer_depth=depth))

    assert quality(answer)[0][0] == 4


@pytest.mark.parametrize("name", INPUTS)
def test_text_in_an_input_is_refused_by_its_name(client: FlaskClient, name: str) -> None:
    assert ("not_a_number", name) in faults(client.get(address("equilibration", MIXED_LAYER, **{name: "deep"})))


@pytest.mark.parametrize("name", ["gas", "water_temperature", "salinity", "wind_speed", "mixed_layer_depth"])
def test_a_needed_input_that_is_absent_is_named(client: FlaskClient, name: str) -> None:
    inputs = {each: value for each, value in MIXED_LAYER.items() if each != name}

    assert faults(client.get(address("equilibration", inputs))) == [("missing_input", name)]
