"""The forms in which solubilities are published, and the way from an air-equilibrium concentration to K0."""

from typing import NamedTuple

import numpy as np

from service.physics.constants import T68_PER_T90, ZERO_CELSIUS
from service.physics.declare import Array
from service.physics.polynomial import polynomial


class Weiss(NamedTuple):
    """ln X = A1 + A2 (100/T) + A3 ln(T/100) + S (B1 + B2 (T/100) + B3 (T/100)^2), T in kelvin."""

    A1: float
    A2: float
    A3: float
    B1: float
    B2: float
    B3: float


class MoistAir(NamedTuple):
    """ln C = A1 + A2 (100/T) + A3 ln(T/100) + A4 (T/100) + S (B1 + B2 (T/100) + B3 (T/100)^2) + C1 S^2.

    `mole_fraction` is the one in dry air for which C is printed, None where the fit is per mole fraction; `moles` turns
    the printed amount into moles.
    """

    A1: float
    A2: float
    A3: float
    A4: float
    B1: float
    B2: float
    B3: float
    moles: float
    mole_fraction: float | None = None
    C1: float = 0.0


class ScaledTemperature(NamedTuple):
    """ln C = sum A_i Ts^i + S sum B_i Ts^i + C0 S^2, Ts = ln((298.15 - t)/(273.15 + t)), at a dry mole fraction.

    `moles` turns the printed amount into moles.
    """

    A: tuple[float, ...]
    B: tuple[float, ...]
    C0: float
    mole_fraction: float
    moles: float


class SolubilityFunction(NamedTuple):
    """ln F = A1 + A2 (100/T) + A3 ln(T/100) + A4 (T/100)^2 + S (B1 + B2 (T/100) + B3 (T/100)^2), T in kelvin.

    F is the concentration over the dry mole fraction in vapour-saturated air at a total pressure of 1 atm.
    """

    A1: float
    A2: float
    A3: float
    A4: float
    B1: float
    B2: float
    B3: float


class InverseTemperature(NamedTuple):
    """ln H = intercept + slope / T, T in kelvin."""

    intercept: float
    slope: float


def kelvin_1968(water_temperature: Array) -> Array:
    """Return the absolute temperature on IPTS-68 from degrees Celsius on ITS-90. [K]"""
    return water_temperature * T68_PER_T90 + ZERO_CELSIUS


def weiss(coefficients: Weiss, kelvin: Array, salinity: Array) -> Array:
    """Return exp of the six-coefficient form, in the unit of its coefficients.

    Parameters
    ----------
    coefficients : Weiss
        As printed.
    kelvin : (...) array
        Temperature on the authors' scale. [K]
    salinity : (...) array
        Practical salinity. [1]
    """
    A1, A2, A3, B1, B2, B3 = coefficients
    tt = kelvin / 100.0
    return np.exp(A1 + A2 / tt + A3 * np.log(tt) + salinity * (B1 + tt * (B2 + B3 * tt)))


def moist_air(coefficients: MoistAir, kelvin: Array, salinity: Array) -> Array:
    """Return the concentration in equilibrium with moist air at 1 atm, in the coefficients' unit.

    Parameters
    ----------
    coefficients : MoistAir
        As printed.
    kelvin : (...) array
        Temperature on the authors' scale. [K]
    salinity : (...) array
        Practical salinity. [1]
    """
    A1, A2, A3, A4, B1, B2, B3, _, _, C1 = coefficients
    tt = kelvin / 100.0
    of_salinity = salinity * (B1 + tt * (B2 + B3 * tt) + C1 * salinity)
    return np.exp(A1 + A2 / tt + A3 * np.log(tt) + A4 * tt + of_salinity)


def solubility_from_moist_air(
    coefficients: MoistAir, kelvin: Array, water_temperature: Array, salinity: Array
) -> Array:
    """Return K0 from a fit to concentrations in equilibrium with moist air.

    Parameters
    ----------
    coefficients : MoistAir
        As printed.
    kelvin : (...) array
        Temperature on the authors' scale. [K]
    water_temperature : (...) array
        The same on ITS-90. [degC]
    salinity : (...) array
        Practical salinity. [1]

    Returns
    -------
    (...) array
        [mol kg-1 atm-1 or mol L-1 atm-1]
    """
    concentration = moist_air(coefficients, kelvin, salinity)
    mole_fraction = 1.0 if coefficients.mole_fraction is None else coefficients.mole_fraction
    return from_moist_air(concentration, mole_fraction, water_temperature, salinity) * coefficients.moles


def solubility_function(coefficients: SolubilityFunction, kelvin: Array, salinity: Array) -> Array:
    """Return F, in the unit of its coefficients.

    Parameters
    ----------
    coefficients : SolubilityFunction
        As printed.
    kelvin : (...) array
        Temperature on the authors' scale. [K]
    salinity : (...) array
        Practical salinity. [1]
    """
    A1, A2, A3, A4, B1, B2, B3 = coefficients
    tt = kelvin / 100.0
    return np.exp(A1 + A2 / tt + A3 * np.log(tt) + A4 * tt * tt + salinity * (B1 + tt * (B2 + B3 * tt)))


def scaled_temperature(coefficients: ScaledTemperature, celsius: Array, salinity: Array) -> Array:
    """Return the concentration in equilibrium with moist air at 1 atm, in the coefficients' unit.

    Parameters
    ----------
    coefficients : ScaledTemperature
        As printed.
    celsius : (...) array
        Temperature on the authors' scale. [degC]
    salinity : (...) array
        Practical salinity. [1]
    """
    Ts = np.log((298.15 - celsius) / (273.15 + celsius))
    powers_a = polynomial(coefficients.A, Ts)
    powers_b = polynomial(coefficients.B, Ts)
    return np.exp(powers_a + salinity * (powers_b + coefficients.C0 * salinity))


def vapour_pressure_atm(water_temperature: Array, salinity: Array) -> Array:
    """Return the vapour pressure over sea water after Weiss and Price (1980), Eq. 10. [atm]

    Parameters
    ----------
    water_temperature : (...) array
        ITS-90. [degC]
    salinity : (...) array
        Practical salinity. [1]
    """
    tt = kelvin_1968(water_temperature) / 100.0
    return np.exp(24.4543 - 67.4509 / tt - 4.8489 * np.log(tt) - 0.000544 * salinity)


def from_moist_air(concentration: Array, mole_fraction: float, water_temperature: Array, salinity: Array) -> Array:
    """Return K0 from a concentration in equilibrium with moist air at 1 atm: C / (x (1 - p_w)).

    Parameters
    ----------
    concentration : (...) array
        In equilibrium with vapour-saturated air at a total pressure of 1 atm. [X]
    mole_fraction : float
        Of the gas in dry air, as the authors of the concentration took it. [1]
    water_temperature : (...) array
        ITS-90. [degC]
    salinity : (...) array
        Practical salinity. [1]

    Returns
    -------
    (...) array
        [X atm-1]
    """
    return concentration / (mole_fraction * (1.0 - vapour_pressure_atm(water_temperature, salinity)))
