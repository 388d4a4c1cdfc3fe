"""The Schmidt number: published values, and what is refused."""

import pytest
from flask.testing import FlaskClient

from schemas.vocabulary import quantity_inputs
from service.physics.declare import QUANTITIES
from tests.api.questions import QUESTIONS, address, faults, number, quality

SCHMIDT = QUESTIONS["schmidt-number"]
INPUTS = quantity_inputs(QUANTITIES["schmidt-number"])

# Wanninkhof (2014), Table 1, at 20 degC; printed as whole numbers
PUBLISHED = [("co2", 35, 668), ("co2", 0, 600)]


@pytest.mark.parametrize(("gas", "salinity", "published"), PUBLISHED)
def test_the_schmidt_number_at_20_degrees_is_that_of_the_paper(
    client: FlaskClient, gas: str, salinity: float, published: float
) -> None:
    answer = client.get(address("schmidt-number", {"gas": gas, "water_temperature": 20, "salinity": salinity}))

    assert number(answer, "schmidt_number") == pytest.approx(published, abs=0.5)


def test_temperature_outside_the_range_of_the_fit_is_computed_and_suspect(client: FlaskClient) -> None:
    answer = client.get(address("schmidt-number", SCHMIDT, water_temperature=45))
    ((flag, reasons),) = quality(answer)

    assert number(answer, "schmidt_number") > 0
    assert flag == 3
    assert "by 5 degC" in reasons[0]


def test_the_older_fit_can_be_asked_for(client: FlaskClient) -> None:
    answer = client.get(address("schmidt-number", SCHMIDT, schmidt_method="wanninkhof-1992"))

    assert answer.get_json()["methods"]["schmidt_number"][0]["name"] == "wanninkhof-1992"


@pytest.mark.parametrize("name", INPUTS)
def test_text_in_an_input_is_refused_by_its_name(client: FlaskClient, name: str) -> None:
    assert ("not_a_number", name) in faults(client.get(address("schmidt-number", SCHMIDT, **{name: "cold"})))


@pytest.mark.parametrize("name", ["gas", "water_temperature", "salinity"])
def test_a_needed_input_that_is_absent_is_named(client: FlaskClient, name: str) -> None:
    inputs = {each: value for each, value in SCHMIDT.items() if each != name}

    assert faults(client.get(address("schmidt-number", inputs))) == [("missing_input", name)]


def test_an_unknown_method_is_refused(client: FlaskClient) -> None:
    told = faults(client.get(address("schmidt-number", SCHMIDT, schmidt_method="nobody-1900")))

    assert told == [("unknown_option", "schmidt_method")]
