"""Solubility: every form of it agrees, and what is refused."""

import math

import pytest
from flask.testing import FlaskClient

from schemas.vocabulary import quantity_inputs
from service.physics.declare import QUANTITIES
from tests.api.questions import QUESTIONS, address, faults, number, problem

SOLUBILITY = QUESTIONS["solubility"]
INPUTS = quantity_inputs(QUANTITIES["solubility"])


def test_carbon_dioxide_at_25_degrees_has_the_value_of_the_guide(client: FlaskClient) -> None:
    # ln K0 = -3.5617 at 25 degC and salinity 35 (Dickson et al. 2007, chapter 5), printed to four decimals
    answer = client.get(address("solubility", {"gas": "co2", "water_temperature": 25, "salinity": 35}))

    assert math.log(number(answer, "solubility")) == pytest.approx(-3.5617, abs=5e-5)


def test_the_forms_of_solubility_are_one_number(client: FlaskClient) -> None:
    answer = client.get(address("solubility", SOLUBILITY, **{"unit.solubility": "mol L-1 atm-1", "pick": "all"}))
    per_litre = number(answer, "solubility")

    assert number(answer, "bunsen_coefficient") == pytest.approx(per_litre * 22.414, rel=1e-12)
    # R in L atm mol-1 K-1, from the SI value of R and the atmosphere
    ostwald = per_litre * (8.31446261815324 / 101.325) * (18.4 + 273.15)
    assert number(answer, "ostwald_coefficient") == pytest.approx(ostwald, rel=1e-12)


def test_henrys_constant_is_one_over_solubility(client: FlaskClient) -> None:
    answer = client.get(address("solubility", SOLUBILITY))

    assert number(answer, "henry_constant") * number(answer, "solubility") == pytest.approx(1.0, rel=1e-14)


def test_the_concentration_in_equilibrium_needs_the_air_side_and_is_left_out_without_it(client: FlaskClient) -> None:
    without = {name: value for name, value in SOLUBILITY.items() if name != "air_mole_fraction"}

    assert "equilibrium_concentration" in client.get(address("solubility", SOLUBILITY)).get_json()["results"]
    assert "equilibrium_concentration" not in client.get(address("solubility", without)).get_json()["results"]
    told = problem(client.get(address("solubility", without, pick="equilibrium_concentration")))
    assert told["errors"][0]["name"] == "air_side"


def test_oxygen_takes_its_share_of_dry_air_by_default(client: FlaskClient) -> None:
    # 274.646 umol kg-1 at 10 degC and salinity 35 is the check value of Garcia and Gordon (1992) for the
    # Benson and Krause data, at IPTS-68; the scale moves it by less than 0.02 umol kg-1
    answer = client.get(address("solubility", {"gas": "o2", "water_temperature": 10, "salinity": 35}))

    assert number(answer, "equilibrium_concentration") == pytest.approx(274.65, abs=0.1)


@pytest.mark.parametrize("name", INPUTS)
def test_text_in_an_input_is_refused_by_its_name(client: FlaskClient, name: str) -> None:
    assert ("not_a_number", name) in faults(client.get(address("solubility", SOLUBILITY, **{name: "cold"})))


@pytest.mark.parametrize("name", ["gas", "water_temperature", "salinity"])
def test_a_needed_input_that_is_absent_is_named(client: FlaskClient, name: str) -> None:
    inputs = {each: value for each, value in SOLUBILITY.items() if each != name}

    assert faults(client.get(address("solubility", inputs))) == [("missing_input", name)]


def test_an_input_of_another_quantity_is_refused_with_its_place(client: FlaskClient) -> None:
    told = problem(client.get(address("solubility", SOLUBILITY, mixed_layer_depth=40)))

    assert told["errors"][0]["code"] == "unknown_name"
    assert "equilibration" in told["detail"]


def test_a_method_without_coefficients_for_the_gas_is_refused_with_those_that_have(client: FlaskClient) -> None:
    told = problem(client.get(address("solubility", SOLUBILITY, solubility_method="weiss-1974")))

    assert told["errors"][0]["name"] == "solubility_method"
    assert "weiss-price-1980" in told["errors"][0]["allowed"]
