"""The solubility functions F that the same papers print beside K0: another set of coefficients for the same gas."""

from dataclasses import dataclass

import numpy as np
import pytest

from service.physics import quantities  # noqa: F401  imported for what it declares
from service.physics.constants import STANDARD_ATMOSPHERE, T68_PER_T90, ZERO_CELSIUS
from service.physics.declare import Array
from service.physics.engine import plan, run
from service.physics.solubility.forms import vapour_pressure_atm


@dataclass(frozen=True)
class MoistAirSet:
    """ln F = A1 + A2 (100/T) + A3 ln(T/100) + A4 (T/100)^2 + S (B1 + B2 (T/100) + B3 (T/100)^2).

    F is the concentration over the dry mole fraction in moist air at 1 atm. [mol kg-1 atm-1 or mol L-1 atm-1]
    `bound` is how far it may be from K0 (1 - p_w) phi, which each paper fits apart from it.
    """

    gas: str
    per: str
    A: tuple[float, float, float, float]
    B: tuple[float, float, float]
    bound: float
    converts: bool = True  # whether the authors' scale is IPTS-68 and the service converts to it

    def value(self, celsius: Array, salinity: Array) -> Array:
        tt = (celsius * (T68_PER_T90 if self.converts else 1.0) + ZERO_CELSIUS) / 100.0
        A1, A2, A3, A4 = self.A
        B1, B2, B3 = self.B
        return np.exp(A1 + A2 / tt + A3 * np.log(tt) + A4 * tt**2 + salinity * (B1 + B2 * tt + B3 * tt**2))


TENTH_OF_A_PERCENT = 1e-3  # F = K0 (1 - p_w) phi within 0.1 % over the range of the data, 0 to 40 degC
SF6_BOUND = 3e-3  # two three-term fits; without a fourth term F cannot follow the vapour pressure; authors state 2 %

# Weiss and Price (1980), Tables 2 and 6; Warner and Weiss (1985), Table 5; Bullister et al. (2002), Table 3.
CO2_KILOGRAM = MoistAirSet(
    "co2",
    "kilogram",
    (-162.8301, 218.2968, 90.9241, -1.47696),
    (0.025695, -0.025225, 0.0049867),
    TENTH_OF_A_PERCENT,
    converts=False,
)
CO2_LITRE = MoistAirSet(
    "co2",
    "litre",
    (-160.7333, 215.4152, 89.8920, -1.47759),
    (0.029941, -0.027455, 0.0053407),
    TENTH_OF_A_PERCENT,
    converts=False,
)
N2O_LITRE = MoistAirSet(
    "n2o",
    "litre",
    (-165.8806, 222.8743, 92.0792, -1.48425),
    (-0.056235, 0.031619, -0.0048472),
    TENTH_OF_A_PERCENT,
)
N2O_KILOGRAM = MoistAirSet(
    "n2o",
    "kilogram",
    (-168.2459, 226.0894, 93.2817, -1.48693),
    (-0.060361, 0.033765, -0.0051862),
    TENTH_OF_A_PERCENT,
)
CFC11_LITRE = MoistAirSet(
    "cfc11",
    "litre",
    (-229.9261, 319.6552, 119.4471, -1.39165),
    (-0.142382, 0.091459, -0.0157274),
    TENTH_OF_A_PERCENT,
)
CFC12_LITRE = MoistAirSet(
    "cfc12",
    "litre",
    (-218.0971, 298.9702, 113.8049, -1.39165),
    (-0.143566, 0.091015, -0.0153924),
    TENTH_OF_A_PERCENT,
)
CFC11_KILOGRAM = MoistAirSet(
    "cfc11",
    "kilogram",
    (-232.0411, 322.5546, 120.4956, -1.39165),
    (-0.146531, 0.093621, -0.0160693),
    TENTH_OF_A_PERCENT,
)
CFC12_KILOGRAM = MoistAirSet(
    "cfc12",
    "kilogram",
    (-220.2120, 301.8695, 114.8533, -1.39165),
    (-0.147718, 0.093175, -0.0157340),
    TENTH_OF_A_PERCENT,
)
SF6_LITRE = MoistAirSet(
    "sf6",
    "litre",
    (-80.0343, 117.232, 29.5817, 0.0),
    (0.0335183, -0.0373942, 0.00774862),
    SF6_BOUND,
    converts=False,
)
SF6_KILOGRAM = MoistAirSet(
    "sf6",
    "kilogram",
    (-82.1639, 120.152, 30.6372, 0.0),
    (0.0293201, -0.0351974, 0.00740056),
    SF6_BOUND,
    converts=False,
)
SETS = (
    *(CO2_KILOGRAM, CO2_LITRE, N2O_LITRE, N2O_KILOGRAM, CFC11_LITRE, CFC12_LITRE, CFC11_KILOGRAM, CFC12_KILOGRAM),
    *(SF6_LITRE, SF6_KILOGRAM),
)
EVERY_SET = pytest.mark.parametrize("moist", SETS, ids=lambda each: f"{each.gas} per {each.per}")

# TEOS-10, example on the page of N2Osol_SP_pt: salinity, temperature, F/(1 - p_w). The page's label, umol/kg, is wrong.
TEOS_10 = (
    (34.7118, 28.8099, 0.01870711393),
    (35.0256, 22.7862, 0.0220078788),
    (34.8472, 10.2262, 0.03267027431),
    (34.7324, 4.3236, 0.04045647223),
)


def air_equilibrium(gas: str, per: str, celsius: Array, salinity: Array) -> Array:
    """Return K0 times the fugacity of 1 umol/mol in moist air at 1 atm, by the service. [umol kg-1 or umol L-1]"""
    term = "equilibrium_concentration" if per == "kilogram" else "equilibrium_concentration_per_litre"
    values = {
        "water_temperature": celsius,
        "salinity": salinity,
        "air_mole_fraction": np.array([1.0]),
        "air_pressure": np.array([STANDARD_ATMOSPHERE]),
    }
    steps = plan((term,), frozenset(values), (), gas)
    return run(steps, values)[steps.keys[term]]


def grid(coldest: float = 0.0) -> tuple[Array, Array]:
    celsius, salinity = np.meshgrid(np.linspace(coldest, 40.0, 41), np.linspace(0.0, 40.0, 9))
    return celsius.ravel(), salinity.ravel()


@EVERY_SET
def test_moist_air_solubility_is_that_of_dry_air_less_the_vapour(moist: MoistAirSet) -> None:
    celsius, salinity = grid()
    ratio = air_equilibrium(moist.gas, moist.per, celsius, salinity) / moist.value(celsius, salinity)

    assert np.abs(ratio - 1.0).max() <= moist.bound


@pytest.mark.parametrize(("salinity", "celsius", "published"), TEOS_10)
def test_nitrous_oxide_per_litre_gives_the_teos_10_examples(salinity: float, celsius: float, published: float) -> None:
    t, S = np.array([celsius]), np.array([salinity])
    dry = N2O_LITRE.value(t, S) / (1.0 - vapour_pressure_atm(t, S))

    assert dry[0] == pytest.approx(published, rel=1e-9)


@pytest.mark.parametrize(
    ("litre", "kilogram"),
    [(CO2_LITRE, CO2_KILOGRAM), (N2O_LITRE, N2O_KILOGRAM), (CFC11_LITRE, CFC11_KILOGRAM), (SF6_LITRE, SF6_KILOGRAM)],
    ids=lambda each: each.gas,
)
def test_sets_per_litre_and_per_kilogram_differ_by_the_density(litre: MoistAirSet, kilogram: MoistAirSet) -> None:
    celsius, salinity = grid()
    values = {"water_temperature": celsius, "salinity": salinity}
    steps = plan(("density",), frozenset(values), (), litre.gas)
    density = run(steps, values)[steps.keys["density"]] / 1000.0
    ratio = litre.value(celsius, salinity) / (kilogram.value(celsius, salinity) * density)

    assert np.abs(ratio - 1.0).max() <= TENTH_OF_A_PERCENT
