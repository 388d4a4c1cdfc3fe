"""From the analyser's mole fraction to the fugacity in the water: identities, limits, and figures from elsewhere."""

from collections.abc import Mapping

import numpy as np
import pytest
import scipy.constants
from CoolProp import CoolProp

from service.physics.answer import answer
from service.physics.declare import GASES, QUANTITIES, Array
from service.physics.equilibrator import constant_concentration, takahashi_1993, takahashi_2009
from service.physics.question import ask
from tests.properties.questions import bits, compute

SEA: dict[str, float] = {"water_temperature": 18.4, "salinity": 35.1, "air_pressure": 1008.2}
LAKE: dict[str, float] = {"water_temperature": 20.0, "salinity": 0.0, "air_pressure": 1000.0}
BOTTLE = {**LAKE, "equilibrator_temperature": 20.0, "equilibrator_pressure": 1000.0}
SOME_GASES = ["co2", "ch4", "n2o", "o2", "sf6"]
CORRECTIONS = {
    "co2": ["by-salinity", "takahashi-1993", "takahashi-2009", "constant-concentration", "none"],
    "ch4": ["constant-concentration", "none"],
}
EVERY = [(gas, method) for gas, methods in CORRECTIONS.items() for method in methods]
ROUNDING = 1e-14
Values = Mapping[str, float | Array]


def f(gas: str, values: Values, correction: str | None = None) -> Array:
    chosen = {"temperature_correction": correction} if correction else {}
    return compute("fugacity_in_water", chosen, gas, values)["fugacity_in_water"]


@pytest.mark.parametrize("gas", SOME_GASES)
def test_a_mole_fraction_taken_to_fugacity_and_back_is_itself(gas: str) -> None:
    x = np.array([0.5, 380.0, 4000.0])
    fugacity = f(gas, {**SEA, "water_mole_fraction": x})
    coefficient = compute("fugacity_coefficient_at_equilibrator", {}, gas, {**SEA, "water_mole_fraction": x}).popitem()[
        1
    ]
    dry = (1008.2 - compute("water_vapour_pressure", {}, gas, SEA)["water_vapour_pressure"]) / 1013.25

    assert fugacity / coefficient / dry == pytest.approx(x, rel=ROUNDING)


@pytest.mark.parametrize("gas", SOME_GASES)
def test_water_and_air_with_one_mole_fraction_are_in_equilibrium(gas: str) -> None:
    x = np.array([0.5, 380.0, 4000.0])
    water = f(gas, {**SEA, "water_mole_fraction": x})
    air = compute("fugacity_in_air", {}, gas, {**SEA, "air_mole_fraction": x})["fugacity_in_air"]

    assert np.array_equal(water, air)


@pytest.mark.parametrize(("gas", "method"), EVERY)
def test_an_equilibrator_at_the_temperature_of_the_water_corrects_nothing(gas: str, method: str) -> None:
    values: Values = {**SEA, "water_temperature": np.array([-1.2, 3.0, 18.4, 31.0]), "water_mole_fraction": 380.0}
    at_the_same = {**values, "equilibrator_temperature": values["water_temperature"]}

    assert bits(f(gas, at_the_same, method)) == bits(f(gas, values))


def test_carbon_dioxide_by_the_carbonate_system_is_unchanged_at_the_temperature_of_the_water() -> None:
    values = {**SEA, "water_mole_fraction": 380.0, "alkalinity": 2310.0}
    at_the_same = {**values, "equilibrator_temperature": SEA["water_temperature"]}

    assert f("co2", at_the_same, "carbonate") == pytest.approx(f("co2", values), rel=1e-9)  # pH converged to 1e-10


@pytest.mark.parametrize("gas", SOME_GASES)
def test_an_equilibrator_at_the_pressure_of_the_air_is_the_same_without_saying_so(gas: str) -> None:
    values = {**SEA, "water_mole_fraction": 380.0, "equilibrator_temperature": 19.1}

    assert bits(f(gas, {**values, "equilibrator_pressure": 1008.2})) == bits(f(gas, values))


@pytest.mark.parametrize("gas", SOME_GASES)
def test_a_wet_reading_is_the_dry_one_times_the_share_of_dry_air(gas: str) -> None:
    values = {**SEA, "equilibrator_temperature": 19.1, "equilibrator_pressure": 1011.0}
    vapour = compute("water_vapour_pressure", {}, gas, {**SEA, "water_temperature": 19.1})["water_vapour_pressure"]
    wet = 380.0 * (1.0 - vapour / 1011.0)

    assert f(gas, {**values, "water_mole_fraction_wet": wet}) == pytest.approx(
        f(gas, {**values, "water_mole_fraction": 380.0}), rel=ROUNDING
    )


def test_the_vapour_in_the_equilibrator_is_that_at_its_own_temperature() -> None:
    values = {**LAKE, "water_mole_fraction": 380.0, "equilibrator_temperature": 25.0}
    p = compute("partial_pressure_at_equilibrator", {}, "co2", values)["partial_pressure_at_equilibrator"]
    vapour = CoolProp.PropsSI("P", "T", 298.15, "Q", 0, "Water") / 100.0

    # the vapour is 3 % of the pressure, and its two formulations differ by 0.15 % of it
    assert p == pytest.approx(380.0 * (1000.0 - vapour) / 1013.25, rel=5e-5)


def test_the_fugacity_coefficient_is_that_of_the_guides_virial_coefficients() -> None:
    values = {"water_temperature": 25.0, "salinity": 35.0, "air_pressure": 1013.25, "water_partial_pressure": 350.0}
    RT = scipy.constants.R / scipy.constants.atm * 1e6 * 298.15  # cm3 atm mol-1

    # Guide of 2007, SOP 24, from memory: B = -123.2 and delta = 22.5 cm3 mol-1 at 25 degC; half a digit is 6e-6
    assert f("co2", values) / 350.0 == pytest.approx(np.exp((-123.2 + 2.0 * 22.5) / RT), abs=6e-6)
    assert f("co2", values) == pytest.approx(348.88, abs=0.005)


def test_the_correction_of_takahashi_1993_is_4_23_percent_a_kelvin() -> None:
    factors = takahashi_1993(0.0423, np.array([18.0, 19.0]), np.array([19.0, 18.0]))

    assert np.log(factors) == pytest.approx([-0.0423, 0.0423], rel=1e-12)  # printed
    assert factors[0] * factors[1] == pytest.approx(1.0, rel=ROUNDING)


def test_the_correction_of_takahashi_2009_has_the_earlier_slope_as_its_mean() -> None:
    ends = takahashi_2009((0.0433, -4.35e-5), np.array([28.0]), np.array([2.0]))

    # the measurements spanned 2 to 28 degC and the earlier slope is printed as 0.0423 +- 0.0002
    assert np.log(ends) / 26.0 == pytest.approx(0.0423, abs=0.0004)


def test_every_other_gas_keeps_its_concentration_between_equilibrator_and_water() -> None:
    values = {**SEA, "water_mole_fraction": 2.1, "equilibrator_temperature": 21.0}
    wanted = ("fugacity_at_equilibrator", "solubility_at_equilibrator", "concentration_in_water")
    found = compute(wanted, {}, "ch4", values)
    there = found["fugacity_at_equilibrator"] * found["solubility_at_equilibrator"]

    assert found["concentration_in_water"] == pytest.approx(there, rel=ROUNDING)
    assert constant_concentration(np.array([2.0]), np.array([1.0])) == 2.0


def flags(values: Values, **options: str) -> list[tuple[int, list[str]]]:
    inputs = {name: np.atleast_1d(np.asarray(value, dtype=float)) for name, value in values.items()}
    chosen, pick = tuple(options.items()), ("fugacity_in_water",)
    question = ask(QUANTITIES["flux"], GASES["co2"], None, frozenset(inputs), chosen, (), pick, (), "gas")
    told = answer(question, inputs, max(array.size for array in inputs.values())).outcome.verdict
    return [(int(flag), told.reasons.get(row, [])) for row, flag in enumerate(told.flags)]


def test_fresh_water_without_alkalinity_is_flagged_and_sea_water_is_not() -> None:
    values: Values = {
        **SEA,
        "salinity": np.array([35.1, 19.99]),
        "water_mole_fraction": 380.0,
        "equilibrator_temperature": 19.0,
    }
    sea, brackish = flags(values)

    assert sea == (1, [])
    assert brackish[0] == 3
    assert "send alkalinity" in brackish[1][0]


def test_a_temperature_left_uncorrected_is_flagged_only_where_it_differs() -> None:
    values: Values = {**SEA, "water_mole_fraction": 380.0, "equilibrator_temperature": np.array([18.4, 19.0])}
    same, other = flags(values, temperature_correction="none")

    assert same == (1, [])
    assert other[0] == 3
    assert "nothing was corrected" in other[1][0]


@pytest.mark.parametrize("correction", ["takahashi-1993", "takahashi-2009"])
def test_the_corrections_of_sea_water_are_flagged_outside_2_to_28_degrees(correction: str) -> None:
    celsius = np.array([1.5, 15.0, 28.5])
    values: Values = {
        **SEA,
        "water_temperature": celsius,
        "water_mole_fraction": 380.0,
        "equilibrator_temperature": celsius + 0.5,
    }

    assert [flag for flag, _ in flags(values, temperature_correction=correction)] == [3, 1, 3]


@pytest.mark.parametrize("gas", ["ch4", "n2o", "o2", "sf6", "co2"])
def test_a_headspace_of_no_volume_is_the_flow_through_case(gas: str) -> None:
    values = {**BOTTLE, "water_temperature": 14.0, "water_mole_fraction": 380.0}
    flow_through = f(gas, values, "constant-concentration")
    bottle = f(gas, {**values, "headspace_ratio": 0.0})

    # per litre and per kilogram the same but for the density between the two temperatures and that of the authors
    assert bottle == pytest.approx(flow_through, rel=2e-3)
    assert f(gas, {**BOTTLE, "water_mole_fraction": 380.0, "headspace_ratio": 0.0}) == pytest.approx(
        f(gas, {**BOTTLE, "water_mole_fraction": 380.0}), rel=ROUNDING
    )


def test_a_bottle_of_methane_at_20_degrees_is_the_textbook_sum() -> None:
    values = {**BOTTLE, "water_mole_fraction": 50.0, "headspace_ratio": 1.0}
    wanted = ("concentration_in_water_per_litre", "solubility_per_litre", "ostwald_coefficient")
    found = compute(wanted, {}, "ch4", values)
    p = 50.0 * (1000.0 - compute("water_vapour_pressure", {}, "ch4", LAKE)["water_vapour_pressure"]) / 1013.25
    K0, L = found["solubility_per_litre"], found["ostwald_coefficient"]

    assert found["concentration_in_water_per_litre"] == pytest.approx((1.0 + 1.0 / L) * K0 * p, rel=ROUNDING)
    assert K0[0] == pytest.approx(1.54e-3, rel=0.05)  # compilations: 1.4e-3 at 25 degC, d ln/d(1/T) 1700 K


@pytest.mark.parametrize("gas", ["ch4", "n2o", "o2"])
@pytest.mark.parametrize("ratio", [0.1, 1.0, 25.0])
def test_the_gas_of_a_bottle_is_conserved(gas: str, ratio: float) -> None:
    values = {**BOTTLE, "equilibrator_temperature": 23.0, "water_mole_fraction": 50.0, "headspace_ratio": ratio}
    values |= {"headspace_start_mole_fraction": 2.0}
    wanted = ("headspace_concentration", "fugacity_at_equilibrator", "solubility_per_litre_at_equilibrator")
    found = compute(wanted, {}, gas, values)
    vapour = compute("water_vapour_pressure", {}, gas, {**LAKE, "water_temperature": 23.0})["water_vapour_pressure"]
    dry = (1000.0 - vapour) * 100.0  # Pa
    per_cubic_metre = dry / (scipy.constants.R * 296.15)  # mol of dry gas in a cubic metre: umol per mol to umol m-3
    before = found["headspace_concentration"] + ratio * 2.0 * per_cubic_metre / 1000.0
    dissolved = found["fugacity_at_equilibrator"] * found["solubility_per_litre_at_equilibrator"]
    after = dissolved + ratio * 50.0 * per_cubic_metre / 1000.0

    assert before == pytest.approx(after, rel=1e-12)


def test_gas_that_came_with_the_headspace_is_not_counted_as_the_waters() -> None:
    values = {**BOTTLE, "water_mole_fraction": 2.0, "headspace_ratio": 10.0}
    clean, of_air = (
        compute("headspace_concentration", {}, "ch4", {**values, "headspace_start_mole_fraction": x}).popitem()[1]
        for x in (0.0, 2.0)
    )
    untouched = compute("headspace_concentration", {}, "ch4", {**values, "headspace_ratio": 0.0}).popitem()[1]

    assert clean > 10.0 * untouched
    assert of_air == pytest.approx(untouched, rel=1e-12)


def test_the_bicarbonate_of_hard_water_makes_up_for_part_of_what_the_headspace_took() -> None:
    values = {**BOTTLE, "water_mole_fraction": 1500.0, "headspace_ratio": 1.0, "headspace_start_mole_fraction": 420.0}
    alone, fresh, hard = (f("co2", {**values, **more})[0] for more in ({}, {"alkalinity": 0.0}, {"alkalinity": 3000.0}))

    assert fresh == pytest.approx(alone, rel=0.02)  # hardly any bicarbonate in pure water
    assert hard < 0.95 * alone


@pytest.mark.parametrize("gas", SOME_GASES)
def test_gaps_stay_gaps_and_samples_stay_apart(gas: str) -> None:
    x = np.array([380.0, np.nan, 520.0])
    values: Values = {**BOTTLE, "water_mole_fraction": x, "headspace_ratio": np.array([0.5, 0.5, 2.0])}
    together = f(gas, values)
    alone = f(gas, {**values, "water_mole_fraction": 520.0, "headspace_ratio": 2.0})

    assert np.isnan(together).tolist() == [False, True, False]
    assert bits(together[2:]) == bits(alone)
