"""How near a number must come to a published one, and rows of data that are refused."""

import numpy as np
import pytest

from service.physics import check as figures
from service.physics.check import Finding
from service.physics.declare import DeclarationError

ROW = {
    "id": "a-row",
    "quantity": "solubility",
    "result": "solubility",
    "inputs": "gas=co2&water_temperature=25&salinity=35",
    "value": "0.02839",
    "unit": "mol kg-1 atm-1",
    "tolerance": "0.00001",
    "kind": "paper",
    "source": "weiss-1974",
    "where": "Table I",
    "note": "",
}
STEP_ROW = ROW | {
    "quantity": "step",
    "result": "density",
    "inputs": "water_temperature=20&salinity=0",
    "value": "0.9982",
    "unit": "g cm-3",
}


@pytest.mark.parametrize(
    ("text", "published", "allowed"),
    [("0.001", 274.61, 0.001), ("rel 1e-3", 200.0, 0.2), ("rel 1e-3", -200.0, 0.2), ("0", 5.0, 0.0)],
)
def test_a_tolerance_is_absolute_in_the_unit_or_relative_to_the_published_value(
    text: str, published: float, allowed: float
) -> None:
    assert figures.tolerance(text).of(published) == pytest.approx(allowed, rel=1e-15)


@pytest.mark.parametrize("computed", [0.02839, 0.028399, 0.028381])
def test_a_finding_holds_within_the_tolerance(computed: float) -> None:
    assert Finding(figures.check(ROW), computed).holds


@pytest.mark.parametrize("computed", [0.02841, 0.028379, -0.02839, np.nan, np.inf])
def test_a_finding_does_not_hold_outside_the_tolerance(computed: float) -> None:
    assert not Finding(figures.check(ROW), computed).holds


def test_a_number_that_could_not_be_had_is_told_as_none() -> None:
    record = Finding(figures.check(ROW), np.nan, "no reason").record()

    assert (record["computed"], record["difference"], record["holds"]) == (None, None, False)
    assert record["problem"] == "no reason"


@pytest.mark.parametrize(
    ("column", "value"),
    [
        ("source", "nobody-1900"),
        ("kind", "hearsay"),
        ("quantity", "colour"),
        ("result", "colour"),
        ("value", "much"),
        ("tolerance", "about 1 %"),
        ("tolerance", "-0.1"),
        ("inputs", "gas"),
        ("inputs", "gas=co2&wind=5"),
    ],
)
def test_a_row_that_speaks_of_what_there_is_not_is_refused(column: str, value: str) -> None:
    with pytest.raises(DeclarationError, match=f"check a-row: {column}"):
        figures.check(ROW | {column: value})


def test_a_term_is_computed_straight_from_the_plan_in_the_unit_of_the_row() -> None:
    row = figures.check(STEP_ROW)

    assert figures.compute_step(row) == pytest.approx(0.998207, abs=1e-6)


def test_a_step_without_an_input_that_it_needs_is_refused_by_name() -> None:
    row = figures.check(STEP_ROW | {"inputs": "salinity=0"})

    with pytest.raises(DeclarationError, match="water_temperature is missing"):
        figures.compute_step(row)


def test_a_method_that_only_hands_an_input_on_is_not_proved_by_it() -> None:
    inputs = "gas=co2&wind_speed=7&parameterisation=ho-2006"
    row = figures.check(ROW | {"quantity": "transfer-velocity", "result": "transfer_velocity_600", "inputs": inputs})

    assert row.methods == (("transfer_velocity", "ho-2006"),)


def test_the_strongest_kind_of_evidence_is_told() -> None:
    assert figures.strongest(["transcription", "formula", "library"]) == "library"
    assert figures.strongest([]) == figures.NONE
    assert figures.evidence("solubility", "nobody-1900") == {"kind": "none", "meaning": "no check yet", "checks": 0}
