"""The engine: the shortest way from what is given to what is wanted, and nothing beside it."""

import numpy as np
import pytest

from service.physics.declare import GASES, Array
from service.physics.engine import plan, run
from service.physics.plans import Plan

CHOSEN: tuple[tuple[str, str], ...] = ()
SEA = frozenset({"water_temperature", "salinity", "wind_speed"})


def plan_of(
    *wanted: str, given: frozenset[str] = SEA, gas: str = "co2", chosen: tuple[tuple[str, str], ...] = ()
) -> Plan:
    return plan(wanted, given, tuple(sorted(chosen)), gas)


def value(steps: Plan, term: str, **values: float) -> float:
    known = run(steps, {name: np.array([number]) for name, number in values.items()})
    return float(known[steps.keys[term]][0])


def names(steps: Plan) -> list[str]:
    return [node.results[0].partition("@")[0] for node in steps.nodes]


def test_a_step_runs_after_those_that_it_needs() -> None:
    steps = plan_of("flux", given=SEA | {"water_fugacity", "air_mole_fraction"})
    known = {*steps.leaves, *steps.constants}
    for node in steps.nodes:
        assert known.issuperset(node.arguments), node.results
        known.update(node.results)

    assert set(steps.keys.values()) <= known


def test_what_is_given_is_not_computed() -> None:
    steps = plan_of("fugacity_difference", given=SEA | {"water_fugacity", "air_fugacity"})

    assert names(steps) == ["fugacity_difference"]
    assert steps.leaves == ("water_fugacity", "air_fugacity")


def test_a_side_is_entered_where_it_is_given() -> None:
    by_mole_fraction = plan_of("fugacity_in_air", given=SEA | {"air_mole_fraction"})
    by_pressure = plan_of("fugacity_in_air", given=SEA | {"air_partial_pressure"})

    assert "partial_pressure_in_air" in names(by_mole_fraction)
    assert "partial_pressure_in_air" not in names(by_pressure)
    assert "air_partial_pressure" in by_pressure.leaves


def test_each_step_stands_in_a_plan_once() -> None:
    steps = plan_of("flux", "evasion", "invasion", "solubility", given=SEA | {"water_fugacity", "air_mole_fraction"})
    results = [node.results for node in steps.nodes]

    assert len(results) == len(set(results))


def test_wanting_less_computes_less() -> None:
    flux = plan_of("flux", given=SEA | {"water_fugacity", "air_fugacity"})
    velocity = plan_of("transfer_velocity")

    assert len(velocity.nodes) < len(flux.nodes)
    assert not {"solubility_per_litre", "density", "water_vapour_pressure"} & set(names(velocity))


def test_density_is_computed_only_where_it_is_asked_for() -> None:
    given = SEA | {"water_fugacity", "air_fugacity"}

    assert "density" not in names(plan_of("flux", given=given))
    assert "density" in names(plan_of("flux", "density", given=given))


def test_the_normalised_transfer_velocity_needs_no_temperature() -> None:
    steps = plan_of("transfer_velocity_600", "transfer_velocity_660", given=frozenset({"wind_speed"}))

    assert not steps.missing
    assert not {"water_temperature", "salinity"} & set(steps.leaves)


def test_the_normalised_transfer_velocity_is_the_method_at_that_schmidt_number() -> None:
    steps = plan_of("transfer_velocity_600", "transfer_velocity_660", given=frozenset({"wind_speed"}))
    k600, k660 = (value(steps, name, wind_speed=10.0) for name in steps.keys)

    assert k660 == pytest.approx(0.251 * 100.0, rel=1e-15)
    assert k600 == pytest.approx(0.251 * 100.0 * (660.0 / 600.0) ** 0.5, rel=1e-15)


def test_both_fugacity_coefficients_are_the_same_step_with_another_pressure() -> None:
    given = SEA | {"air_partial_pressure", "water_partial_pressure"}
    steps = plan_of("fugacity_in_water", "fugacity_in_air", given=given)
    values = {"water_temperature": 15.0, "salinity": 35.0, "wind_speed": 5.0}
    same = {"air_partial_pressure": 400.0, "water_partial_pressure": 400.0}

    assert value(steps, "fugacity_in_water", **values, **same) == value(steps, "fugacity_in_air", **values, **same)
    assert names(steps).count("fugacity_coefficient") == 2


GIVEN = (("transfer_velocity", "given"),)


def test_the_callers_own_transfer_velocity_comes_back_bit_for_bit() -> None:
    given = frozenset({"water_temperature", "salinity", "given_transfer_velocity"})
    steps = plan_of("transfer_velocity", given=given, chosen=GIVEN)
    for k in (12.3456789012345, 0.1, 1.0 / 3.0):
        found = value(steps, "transfer_velocity", water_temperature=11.1, salinity=33.3, given_transfer_velocity=k)

        assert found == k


def test_the_callers_own_transfer_velocity_is_scaled_where_600_is_wanted() -> None:
    given = frozenset({"water_temperature", "salinity", "given_transfer_velocity"})
    steps = plan_of("transfer_velocity_600", "schmidt_number", given=given, chosen=GIVEN)
    sea = {"water_temperature": 10.0, "salinity": 35.0, "given_transfer_velocity": 12.0}
    Sc = value(steps, "schmidt_number", **sea)

    assert value(steps, "transfer_velocity_600", **sea) == pytest.approx(12.0 * (Sc / 600.0) ** 0.5, rel=1e-14)


@pytest.mark.parametrize("reference", [600, 660])
def test_the_callers_own_normalised_transfer_velocity_is_scaled_to_the_gas(reference: int) -> None:
    name = f"given_transfer_velocity_{reference}"
    given = frozenset({"water_temperature", "salinity", name})
    steps = plan_of("transfer_velocity", "schmidt_number", f"transfer_velocity_{reference}", given=given, chosen=GIVEN)
    sea = {"water_temperature": 10.0, "salinity": 35.0, name: 12.0}
    Sc = value(steps, "schmidt_number", **sea)

    assert value(steps, f"transfer_velocity_{reference}", **sea) == 12.0
    assert value(steps, "transfer_velocity", **sea) == pytest.approx(12.0 * (Sc / reference) ** -0.5, rel=1e-14)
    assert steps.defaults["schmidt_exponent"] == 0.5


def test_a_gap_in_what_is_given_is_told_as_missing() -> None:
    steps = plan_of("flux", given=frozenset({"water_temperature"}))

    assert {"salinity", "wind_speed"} <= set(steps.missing)
    assert "water_temperature" not in steps.missing


def test_an_input_left_out_takes_its_default_and_the_plan_says_so() -> None:
    steps = plan_of("wind_speed_10m", "surface_pressure")

    assert steps.defaults["air_pressure"] == 1013.25
    assert steps.defaults["barometer_height"] == 0.0
    assert steps.defaults["wind_height"] == 10.0


def test_a_wind_without_height_is_taken_bit_for_bit() -> None:
    plain, at_ten = plan_of("wind_speed_10m"), plan_of("wind_speed_10m", given=SEA | {"wind_height"})

    assert plain.nodes == ()
    assert value(plain, "wind_speed_10m", wind_speed=7.3) == 7.3
    assert value(at_ten, "wind_speed_10m", wind_speed=7.3, wind_height=10.0) == 7.3
    assert value(at_ten, "wind_speed_10m", wind_speed=7.3, wind_height=18.0) < 7.3


@pytest.mark.parametrize("gas", GASES)
def test_every_gas_finds_its_way_to_a_flux(gas: str) -> None:
    steps = plan_of("flux", given=SEA | {"water_fugacity", "air_fugacity"}, gas=gas)

    assert not steps.missing


def test_a_plan_is_the_same_every_time_it_is_made() -> None:
    plan.cache_clear()
    first = plan_of("flux", given=SEA | {"water_fugacity", "air_fugacity"})
    plan.cache_clear()
    second = plan_of("flux", given=SEA | {"water_fugacity", "air_fugacity"})

    assert first is not second
    assert [node.results for node in first.nodes] == [node.results for node in second.nodes]


def test_an_inputs_array_is_left_as_it_was() -> None:
    steps = plan_of("flux", given=SEA | {"water_fugacity", "air_fugacity"})
    values: dict[str, Array] = {
        "water_temperature": np.array([10.0, np.nan]),
        "salinity": np.array([35.0]),
        "wind_speed": np.array([5.0, 6.0]),
        "water_fugacity": np.array([400.0]),
        "air_fugacity": np.array([410.0, 411.0]),
    }
    before = {name: array.copy() for name, array in values.items()}
    known = run(steps, values)

    assert all(np.array_equal(values[name], before[name], equal_nan=True) for name in values)
    assert np.isnan(known[steps.keys["flux"]]).tolist() == [False, True]
