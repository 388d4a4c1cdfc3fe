"""From what is known of the air and of the water to the fugacity on both sides."""

import numpy as np
import pytest

from service.physics.declare import Array
from tests.properties.questions import ask_and_answer, compute

SEA: dict[str, float | Array] = {"water_temperature": 25.0, "salinity": 35.0}


def found(wanted: str, gas: str = "co2", **values: float) -> float:
    return among(wanted, gas, values)


def among(wanted: str, gas: str, values: dict[str, float]) -> float:
    return float(compute(wanted, {}, gas, {**SEA, **values})[wanted][0])


def test_the_air_is_moist_at_the_surface() -> None:
    p_w = found("water_vapour_pressure") / 1013.25
    p = found("partial_pressure_in_air", air_mole_fraction=400.0, air_pressure=1013.25)

    assert p == pytest.approx(400.0 * (1.0 - p_w), rel=1e-15)
    assert 0.030 < p_w < 0.032  # 3.1 % of an atmosphere at 25 degC, handbook


def test_the_fugacity_of_carbon_dioxide_is_a_third_of_a_percent_below_its_partial_pressure() -> None:
    f, p = (found(name, air_mole_fraction=400.0) for name in ("fugacity_in_air", "partial_pressure_in_air"))

    assert f / p == pytest.approx(0.9969, abs=0.0002)  # Weiss (1974): about 0.3 % at 25 degC and 1 atm


@pytest.mark.parametrize("side", ["air", "water"])
def test_every_way_of_giving_a_side_leads_to_the_same_fugacity(side: str) -> None:
    result, p_name = f"fugacity_in_{side}", f"partial_pressure_in_{side}"
    x = 400.0
    f = among(result, "co2", {f"{side}_mole_fraction": x, "air_pressure": 1013.25})
    p = x * (1.0 - found("water_vapour_pressure") / 1013.25)
    by_pressure = among(result, "co2", {f"{side}_partial_pressure": p, "air_pressure": 1013.25})

    assert among(p_name, "co2", {f"{side}_partial_pressure": p}) == p
    assert by_pressure == pytest.approx(f, rel=1e-14)
    assert among(result, "co2", {f"{side}_fugacity": f}) == f


def test_a_concentration_and_its_fugacity_are_told_by_each_other() -> None:
    f = found("fugacity_in_water", water_concentration=10.0)

    assert found("concentration_in_water", water_fugacity=f) == pytest.approx(10.0, rel=1e-15)
    assert found("concentration_in_water", water_concentration=10.0) == 10.0


@pytest.mark.parametrize("gas", ["co2", "o2", "ch4"])
def test_a_concentration_per_litre_is_one_per_kilogram_times_the_density(gas: str) -> None:
    per_kilogram = found("fugacity_in_water", gas, water_concentration=2.0)
    per_litre = found("fugacity_in_water", gas, water_concentration_per_litre=2.0)

    # the two sets of printed coefficients differ by up to 2e-4 through the density that their authors used
    assert per_kilogram / per_litre == pytest.approx(found("density", gas) / 1000.0, rel=3e-4)


def test_water_in_equilibrium_with_the_air_is_saturated_to_100_percent() -> None:
    f = found("fugacity_in_air", air_mole_fraction=400.0)

    assert found("saturation", air_mole_fraction=400.0, water_fugacity=f) == pytest.approx(100.0, rel=1e-15)
    assert found("saturation", air_mole_fraction=400.0, water_fugacity=2.0 * f) == pytest.approx(200.0, rel=1e-15)


def test_a_low_barometer_lowers_the_fugacity_in_proportion_to_the_dry_air() -> None:
    p_w = found("water_vapour_pressure")
    low, high = (found("partial_pressure_in_air", air_mole_fraction=400.0, air_pressure=P) for P in (950.0, 1013.25))

    assert low / high == pytest.approx((950.0 - p_w) / (1013.25 - p_w), rel=1e-14)


def test_oxygen_brings_its_own_share_of_dry_air() -> None:
    given, assumed = found("fugacity_in_air", "o2", air_mole_fraction=209460.0), found("fugacity_in_air", "o2")

    assert assumed == given


def test_what_is_assumed_of_oxygen_in_air_is_told() -> None:
    answer = ask_and_answer("flux", "o2", {**SEA, "wind_speed": 8.0, "water_concentration": 210.0})

    assert answer.question.assumed["air_mole_fraction"] == {"value": 209460.0, "unit": "umol mol-1"}


def test_a_gap_on_one_side_spoils_no_other_sample() -> None:
    values = {**SEA, "wind_speed": 8.0, "water_fugacity": np.array([400.0, np.nan]), "air_fugacity": 400.0}
    flux = ask_and_answer("flux", "co2", values).outcome.results["flux"]

    assert flux[0] == 0.0
    assert np.isnan(flux[1])
