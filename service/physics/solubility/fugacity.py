"""The fugacity coefficient of a gas in air, by virial expansion."""

from typing import NamedTuple

import numpy as np

from service.physics import sources
from service.physics.constants import GAS_CONSTANT_CM3_ATM, STANDARD_ATMOSPHERE, ZERO_CELSIUS
from service.physics.declare import Array, step
from service.physics.polynomial import polynomial

FORMULA = "f = p exp(P (B + 2 x2^2 delta) / (R T)), x2 = 1 - p/P"


class Virial(NamedTuple):
    """Polynomials in T [K] for the second virial coefficient B and the cross term delta, both in cm3 mol-1."""

    B: tuple[float, ...]
    delta: tuple[float, ...]


def _virial(coefficients: Virial, water_temperature: Array, pressure: Array, partial_pressure: Array) -> Array:
    """Return exp(P (B + 2 x2^2 delta) / (R T)), with P in hPa and p in uatm."""
    T = water_temperature + ZERO_CELSIUS
    atmospheres = pressure / STANDARD_ATMOSPHERE
    x2 = 1.0 - partial_pressure * 1e-6 / atmospheres
    B = polynomial(coefficients.B, T)
    delta = polynomial(coefficients.delta, T)
    return np.exp(atmospheres * (B + 2.0 * x2 * x2 * delta) / (GAS_CONSTANT_CM3_ATM * T))


@step(
    "fugacity_coefficient",
    method="weiss-1974",
    source=sources.WEISS_1974,
    equation="Eqs. 6, 9 and 11",
    formula=FORMULA,
)
def weiss_1974_fugacity(
    coefficients: Virial, water_temperature: Array, surface_pressure: Array, partial_pressure_in_air: Array
) -> Array:
    """Return the fugacity coefficient of carbon dioxide in air after Weiss (1974).

    Parameters
    ----------
    coefficients : Virial
        [cm3 mol-1]
    water_temperature : (...) array
        Of the interface. [degC]
    surface_pressure : (...) array
        Total pressure. [hPa]
    partial_pressure_in_air : (...) array
        Of the gas. [uatm]

    Returns
    -------
    (...) array
        Fugacity over partial pressure. [1]

    References
    ----------
    Weiss (1974), Eqs. 6, 9 and 11. doi:10.1016/0304-4203(74)90015-2
    """
    return _virial(coefficients, water_temperature, surface_pressure, partial_pressure_in_air)


@step(
    "fugacity_coefficient",
    method="weiss-price-1980",
    source=sources.WEISS_PRICE_1980,
    equation="Eqs. 5 to 8",
    formula=FORMULA,
)
def weiss_price_1980_fugacity(
    coefficients: Virial, water_temperature: Array, surface_pressure: Array, partial_pressure_in_air: Array
) -> Array:
    """Return the fugacity coefficient of nitrous oxide in air after Weiss and Price (1980).

    Parameters
    ----------
    coefficients : Virial
        [cm3 mol-1]
    water_temperature : (...) array
        Of the interface. [degC]
    surface_pressure : (...) array
        Total pressure. [hPa]
    partial_pressure_in_air : (...) array
        Of the gas. [uatm]

    Returns
    -------
    (...) array
        Fugacity over partial pressure. [1]

    References
    ----------
    Weiss and Price (1980), Eqs. 5 to 8. doi:10.1016/0304-4203(80)90024-9
    """
    return _virial(coefficients, water_temperature, surface_pressure, partial_pressure_in_air)


@step("fugacity_coefficient", method="none", formula="f = p", assumes_values={"fugacity_coefficient": 1.0})
def ideal_gas(partial_pressure_in_air: Array) -> Array:
    """Return 1: fugacity taken as partial pressure, for gases without a published virial coefficient.

    Parameters
    ----------
    partial_pressure_in_air : (...) array
        Of the gas. [uatm]

    Returns
    -------
    (...) array
        Fugacity over partial pressure. [1]
    """
    return np.ones_like(partial_pressure_in_air)
