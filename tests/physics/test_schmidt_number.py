"""Schmidt numbers: the polynomials against viscosity over diffusivity, and those against other libraries."""

from dataclasses import dataclass
from itertools import product

import iapws
import numpy as np
import pytest
from CoolProp.CoolProp import PropsSI

from service.physics import quantities  # noqa: F401  imported for what it declares
from service.physics.declare import FAMILIES, GASES, STEPS, Array
from service.physics.engine import plan, run
from service.physics.methods import default_method, methods_for
from service.physics.schmidt_number.diffusivity import MolarVolume, hayduk_laudie_1974, wilke_chang_1955
from service.physics.schmidt_number.viscosity import fresh_water_viscosity

FIRST_PRINCIPLES = "viscosity-over-diffusivity"
SCHMIDT, DIFFUSIVITY = FAMILIES["schmidt_number"], FAMILIES["diffusivity_in_fresh_water"]
PAIRS = [(gas, method) for gas in GASES for method in methods_for(GASES[gas], SCHMIDT)]
POLYNOMIALS = [(gas, method) for gas, method in PAIRS if method != FIRST_PRINCIPLES]
DIFFUSIVITIES = [(gas, method) for gas in GASES for method in methods_for(GASES[gas], DIFFUSIVITY)]
SEA_ONLY = [(gas, m) for gas, m in POLYNOMIALS if GASES[gas].block("schmidt_number", m).coefficients.fresh is None]  # type: ignore[union-attr]
FRESH_ONLY = [(gas, m) for gas, m in POLYNOMIALS if GASES[gas].block("schmidt_number", m).coefficients.sea is None]  # type: ignore[union-attr]
CORRELATIONS = ("wilke-chang-1955", "hayduk-laudie-1974")


def compute(gas: str, wanted: str, chosen: dict[str, str], t: Array, S: Array) -> Array:
    """Return a term by the methods chosen, with arrays of any shape."""
    steps = plan((wanted,), frozenset({"water_temperature", "salinity"}), tuple(sorted(chosen.items())), gas)

    assert not steps.missing
    return run(steps, {"water_temperature": t, "salinity": S})[steps.keys[wanted]]


def schmidt(gas: str, method: str, t: Array, S: Array) -> Array:
    return compute(gas, "schmidt_number", {"schmidt_number": method}, t, S)


def salinities(gas: str, method: str) -> tuple[float, ...]:
    """Return the salinities for which a method prints a row."""
    return (35.0,) if (gas, method) in SEA_ONLY else (0.0,) if (gas, method) in FRESH_ONLY else (0.0, 35.0)


@pytest.mark.parametrize(("gas", "method"), PAIRS)
def test_temperatures_and_salinities_broadcast(gas: str, method: str) -> None:
    t, S = np.array([5.0, 10.0, 29.0]), np.array([0.0, 20.0, 35.0, 36.5])
    grid = schmidt(gas, method, t[:, np.newaxis], S)
    singles = [schmidt(gas, method, np.array([a]), np.array([b]))[0] for a, b in product(t, S)]

    assert grid.shape == (3, 4)
    assert np.array_equal(grid.ravel(), singles, equal_nan=True)


@pytest.mark.parametrize(("gas", "method"), PAIRS)
def test_a_number_without_axes_is_a_number(gas: str, method: str) -> None:
    S = salinities(gas, method)[0]
    single = schmidt(gas, method, np.array(10.0), np.array(S))

    assert np.ndim(single) == 0
    assert float(single) == schmidt(gas, method, np.array([10.0]), np.array([S]))[0]


@pytest.mark.parametrize(("gas", "method"), PAIRS)
def test_a_gap_stays_a_gap_and_spreads_no_further(gas: str, method: str) -> None:
    S = salinities(gas, method)[0]
    found = schmidt(gas, method, np.array([10.0, np.nan, 10.0, 10.0]), np.array([S, S, np.nan, S]))

    assert np.isnan(found).tolist() == [False, True, True, False]
    assert found[0] == found[3]


@pytest.mark.parametrize("gas", GASES)
def test_a_gas_without_a_polynomial_for_all_salinities_has_viscosity_over_diffusivity_by_default(gas: str) -> None:
    whole = [each for each in POLYNOMIALS if each[0] == gas and each not in SEA_ONLY + FRESH_ONLY]

    assert (default_method(GASES[gas], SCHMIDT) == FIRST_PRINCIPLES) == (not whole)


@pytest.mark.parametrize("gas", GASES)
def test_a_measured_diffusivity_comes_before_a_correlation(gas: str) -> None:
    methods = methods_for(GASES[gas], DIFFUSIVITY)
    measured = [method for method in methods if method not in CORRELATIONS]

    assert default_method(GASES[gas], DIFFUSIVITY) == (measured[0] if measured else "wilke-chang-1955")
    assert GASES[gas].defaults[DIFFUSIVITY.name] in methods


def test_sea_water_polynomials_say_nothing_below_the_salinity_they_were_made_for() -> None:
    S, t = np.array([0.0, 34.99, 35.0, 37.0]), np.array([15.0])

    assert {method for _, method in SEA_ONLY} >= {"keeling-1998", "saltzman-1993", "zheng-1998", "wanninkhof-2014"}
    for gas, method in SEA_ONLY:
        assert np.isnan(schmidt(gas, method, t, S)).tolist() == [True, True, False, False]


def test_fresh_water_polynomials_say_nothing_of_brackish_water() -> None:
    S, t = np.array([0.0, 1.99, 2.0, 35.0]), np.array([15.0])

    assert {method for _, method in FRESH_ONLY} == {"raymond-2012"}
    for gas, method in FRESH_ONLY:
        assert np.isnan(schmidt(gas, method, t, S)).tolist() == [False, False, True, True]


# A polynomial is held to viscosity over the gas's default diffusivity. Measured diffusivities are good to about 5
# percent (Jähne et al., 1987, from memory), Wilke and Chang's correlation to 10, viscosity to 1.5.
VISCOSITY_BOUND = 0.015
DIFFUSIVITY_BOUND = {True: 0.05, False: 0.10}


@dataclass(frozen=True)
class Departure:
    """How far a polynomial may be from first principles, beyond the stated uncertainty, and why."""

    bound: float
    reason: str


UNLIKE_FIRST_PRINCIPLES = {
    ("ch3br", "wanninkhof-2014"): Departure(
        0.22, "made from a measured diffusivity, which is higher than the correlation; none could be had here"
    ),
    ("o2", "keeling-1998"): Departure(
        0.14, "a cubic through other diffusivities of oxygen, which bends away at both ends of the range"
    ),
    ("cfc11", "zheng-1998"): Departure(
        0.08, "in step with a diffusivity that salt does not lower; first principles take 6 percent off"
    ),
    ("sf6", "king-saltzman-1995"): Departure(
        0.08, "in step with a diffusivity that salt does not lower; first principles take 6 percent off"
    ),
    ("cfc11", "wanninkhof-1992"): Departure(0.08, "older than the measurement of Zheng et al. (1998)"),
    ("cfc12", "wanninkhof-1992"): Departure(0.08, "older than the measurement of Zheng et al. (1998)"),
    ("co2", "raymond-2012"): Departure(0.10, "a cubic through other diffusivities: 625 at 20 degC, not 600"),
}


def both_ranges(gas: str, method: str) -> Array:
    """Return temperatures in the ranges of the polynomial and of the gas's default diffusivity, up to 35 degC.

    Warmer than that no diffusivity was measured, and at 40 degC, their end, the quartics swing up by 3 to 4 percent.
    """
    diffusivity = str(default_method(GASES[gas], DIFFUSIVITY))
    ranges = (
        STEPS["schmidt_number"][method][0].valid["water_temperature"],
        STEPS["diffusivity_in_fresh_water"][diffusivity][0].valid["water_temperature"],
    )
    low, high = max(0.0, *(each[0] for each in ranges)), min(35.0, *(each[1] for each in ranges))
    return np.linspace(low, high, 36)


def largest_difference(gas: str, method: str) -> float:
    """Return the largest relative difference of a polynomial from first principles."""
    t = both_ranges(gas, method)
    return max(
        float(np.abs(schmidt(gas, method, t, S) / schmidt(gas, FIRST_PRINCIPLES, t, S) - 1.0).max())
        for S in (np.array([each]) for each in salinities(gas, method))
    )


@pytest.mark.parametrize(("gas", "method"), POLYNOMIALS)
def test_a_polynomial_is_viscosity_over_diffusivity_within_the_stated_uncertainty(gas: str, method: str) -> None:
    measured = default_method(GASES[gas], DIFFUSIVITY) not in CORRELATIONS
    stated = DIFFUSIVITY_BOUND[measured] + VISCOSITY_BOUND
    exception = UNLIKE_FIRST_PRINCIPLES.get((gas, method))
    found = largest_difference(gas, method)

    if exception is None:
        assert found < stated
    else:
        assert stated < found < exception.bound, "an exception that is none is to be struck off"


@pytest.mark.parametrize("gas", ["co2", "ch4", "rn222", "dms", "sf6", "cfc11", "cfc12"])
def test_the_fresh_rows_of_wanninkhof_2014_are_viscosity_over_the_measured_diffusivity(gas: str) -> None:
    t, S = np.linspace(0.0, 30.0, 31), np.array([0.0])
    ratio = schmidt(gas, "wanninkhof-2014", t, S) / schmidt(gas, FIRST_PRINCIPLES, t, S)

    assert ratio == pytest.approx(1.0, abs=0.01)  # the error of the quartic


@pytest.mark.parametrize("gas", ["he", "ne", "kr", "rn222", "ch4", "co2"])
def test_the_fresh_rows_of_wanninkhof_1992_are_viscosity_over_the_measured_diffusivity(gas: str) -> None:
    t, S = np.linspace(0.0, 25.0, 26), np.array([0.0])
    ratio = schmidt(gas, "wanninkhof-1992", t, S) / schmidt(gas, FIRST_PRINCIPLES, t, S)

    assert ratio == pytest.approx(1.0, abs=0.016)  # the error of a cubic, which leaves the curve towards 30 degC


@pytest.mark.parametrize(("gas", "method"), DIFFUSIVITIES)
def test_diffusivity_rises_with_temperature_and_falls_with_salt(gas: str, method: str) -> None:
    chosen, t = {DIFFUSIVITY.name: method}, np.linspace(0.0, 30.0, 31)
    fresh, sea = (compute(gas, "diffusivity", chosen, t, np.array([S])) for S in (0.0, 35.0))

    assert (np.diff(fresh) > 0.0).all()
    assert sea / fresh == pytest.approx(0.94, rel=1e-12)  # 6 percent, Jähne et al. (1987)


# The correlations are held to the measurements within 15 percent, one and a half times the average that the authors of
# the one state. Heavy noble gases diffuse more slowly than their size says.
CORRELATION_BOUND = 0.15
HEAVY_NOBLE_GASES = {"kr": 0.13, "xe": 0.20}
MEASURED = {gas: method for gas, method in reversed(DIFFUSIVITIES) if method not in CORRELATIONS}
COMPARABLE = [(gas, method) for gas, method in DIFFUSIVITIES if method in CORRELATIONS and gas in MEASURED]


@pytest.mark.parametrize(("gas", "method"), COMPARABLE)
def test_a_correlation_is_near_the_measured_diffusivity(gas: str, method: str) -> None:
    t, S = np.array([25.0]), np.array([0.0])
    one, other = (
        compute(gas, "diffusivity_in_fresh_water", {DIFFUSIVITY.name: name}, t, S) for name in (method, MEASURED[gas])
    )

    assert one == pytest.approx(other, rel=HEAVY_NOBLE_GASES.get(gas, CORRELATION_BOUND))


@pytest.mark.parametrize("gas", ["he", "ne", "h2"])
def test_correlations_are_not_offered_for_the_light_gases_for_which_they_fail(gas: str) -> None:
    assert not set(methods_for(GASES[gas], DIFFUSIVITY)) & set(CORRELATIONS)


def test_the_correlations_keep_their_exponents() -> None:
    t, volume = np.array([0.0, 25.0]), MolarVolume(at_boiling_point=50.0)
    viscosity = fresh_water_viscosity(t)
    thinner = viscosity[0] / viscosity[1]
    hayduk_laudie, wilke_chang = (each(volume, t) for each in (hayduk_laudie_1974, wilke_chang_1955))

    assert hayduk_laudie[1] / hayduk_laudie[0] == pytest.approx(thinner**1.14, rel=1e-12)
    assert wilke_chang[1] / wilke_chang[0] == pytest.approx(thinner * 298.15 / 273.15, rel=1e-12)


# Fluids of which the library knows the liquid at 1 atm; carbon dioxide and sulphur hexafluoride sublime.
LIQUIDS = {
    "ar": "Argon",
    "kr": "Krypton",
    "xe": "Xenon",
    "n2": "Nitrogen",
    "o2": "Oxygen",
    "co": "CarbonMonoxide",
    "ch4": "Methane",
    "n2o": "NitrousOxide",
    "cfc11": "R11",
    "cfc12": "R12",
    "cfc113": "R113",
}


@pytest.mark.parametrize(("gas", "fluid"), LIQUIDS.items())
@pytest.mark.parametrize("method", CORRELATIONS)
def test_a_molar_volume_is_that_of_the_boiling_liquid(gas: str, fluid: str, method: str) -> None:
    block = GASES[gas].block("diffusivity_in_fresh_water", method)
    assert block is not None

    assert block.coefficients.at_boiling_point == pytest.approx(
        1e6 / PropsSI("Dmolar", "P", 101325.0, "Q", 0, fluid), abs=0.05
    )


@pytest.mark.parametrize("celsius", [0.5, 5.0, 10.0, 20.0, 30.0, 40.0])
def test_viscosity_of_pure_water_is_that_of_the_water_standard(celsius: float) -> None:
    ours = fresh_water_viscosity(np.array([celsius]))[0]

    # the authors state 0.05 percent to the standard of 2008; at 20 degC the older one, 1.002 mPa s, shows
    assert ours == pytest.approx(PropsSI("V", "T", celsius + 273.15, "P", 101325.0, "Water"), rel=5e-4)
    assert ours == pytest.approx(iapws.IAPWS95(T=celsius + 273.15, P=0.101325).mu, rel=5e-4)


@pytest.mark.parametrize("celsius", [0.5, 5.0, 10.0, 20.0, 30.0, 40.0])
def test_density_and_kinematic_viscosity_of_fresh_water_are_those_of_the_water_standard(celsius: float) -> None:
    t, S = np.array([celsius]), np.array([0.0])
    standard = iapws.IAPWS95(T=celsius + 273.15, P=0.101325)

    assert compute("co2", "density", {}, t, S)[0] == pytest.approx(standard.rho, rel=2e-6)
    assert compute("co2", "kinematic_viscosity", {}, t, S)[0] == pytest.approx(standard.nu, rel=5e-4)
    assert compute("co2", "density", {}, t, S)[0] == pytest.approx(
        PropsSI("D", "T", celsius + 273.15, "P", 101325.0, "Water"), rel=2e-6
    )


def test_sea_water_is_as_much_more_viscous_as_the_usual_tables_say() -> None:
    t = np.array([20.0])
    fresh, sea = (compute("co2", "kinematic_viscosity", {}, t, np.array([S])) for S in (0.0, 35.0))

    # 1.05 mm2 s-1 at 20 degC: towing-tank tables for sea water, from memory, to their second decimal
    assert sea * 1e6 == pytest.approx(1.05, abs=0.005)
    assert sea / fresh == pytest.approx(1.047, abs=0.015)  # the authors' 1.5 percent
