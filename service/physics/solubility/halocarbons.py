"""Solubilities of further halocarbons: chlorofluorocarbon 113, tetrachloromethane and bromomethane."""

from service.physics import sources
from service.physics.constants import ZERO_CELSIUS
from service.physics.declare import Array, relative_uncertainty, step
from service.physics.solubility.forms import (
    SolubilityFunction,
    Weiss,
    from_moist_air,
    kelvin_1968,
    solubility_function,
    weiss,
)

FUNCTION = (
    "ln F = A1 + A2 (100/T) + A3 ln(T/100) + A4 (T/100)^2 + S (B1 + B2 (T/100) + B3 (T/100)^2); K0 = F / (1 - p_w)"
)


@step(
    "solubility",
    method="bu-warner-1995",
    source=sources.BU_WARNER_1995,
    equation="Table 4",
    formula=FUNCTION,
    valid={"water_temperature": (0.0, 40.0), "salinity": (0.0, 40.0)},
    note="range from memory",
)
def bu_warner_1995(coefficients: SolubilityFunction, water_temperature: Array, salinity: Array) -> Array:
    """Return the solubility of chlorofluorocarbon 113 after Bu and Warner (1995).

    Parameters
    ----------
    coefficients : SolubilityFunction
        For F in mol kg-1 atm-1.
    water_temperature : (...) array
        ITS-90, converted to IPTS-68. [degC]
    salinity : (...) array
        Practical salinity. [1]

    Returns
    -------
    (...) array
        K0. [mol kg-1 atm-1]

    Notes
    -----
    F refers to the dry mole fraction in moist air at 1 atm, so that K0 = F / (1 - p_w). Valid from 0 to 40 degC and
    salinity 0 to 40 (from memory). NaN in, NaN out.

    References
    ----------
    Bu and Warner (1995), Table 4. doi:10.1016/0967-0637(95)00052-8
    """
    F = solubility_function(coefficients, kelvin_1968(water_temperature), salinity)
    return from_moist_air(F, 1.0, water_temperature, salinity)


@step(
    "solubility_per_litre",
    method="bullister-wisegarver-1998",
    source=sources.BULLISTER_WISEGARVER_1998,
    equation="the fit of F",
    formula=FUNCTION,
    valid={"water_temperature": (0.0, 40.0), "salinity": (0.0, 40.0)},
    uncertainty=relative_uncertainty(0.025, "author's estimate", "about 2.5 % (from memory)"),
    note="range from memory",
)
def bullister_wisegarver_1998(coefficients: SolubilityFunction, water_temperature: Array, salinity: Array) -> Array:
    """Return the solubility of tetrachloromethane after Bullister and Wisegarver (1998).

    Parameters
    ----------
    coefficients : SolubilityFunction
        For F in mol L-1 atm-1.
    water_temperature : (...) array
        ITS-90. [degC]
    salinity : (...) array
        Practical salinity. [1]

    Returns
    -------
    (...) array
        K0. [mol L-1 atm-1]

    Notes
    -----
    F refers to the dry mole fraction in moist air at 1 atm, so that K0 = F / (1 - p_w). Valid from 0 to 40 degC and
    salinity 0 to 40 (from memory). NaN in, NaN out.

    References
    ----------
    Bullister and Wisegarver (1998). doi:10.1016/S0967-0637(98)00017-X
    """
    F = solubility_function(coefficients, water_temperature + ZERO_CELSIUS, salinity)
    return from_moist_air(F, 1.0, water_temperature, salinity)


@step(
    "solubility_per_litre",
    method="de-bruyn-saltzman-1997",
    source=sources.DE_BRUYN_SALTZMAN_1997,
    equation="the fit of K0",
    formula="ln K0 = A1 + A2 (100/T) + A3 ln(T/100) + S (B1 + B2 (T/100) + B3 (T/100)^2)",
    valid={"water_temperature": (0.0, 30.0), "salinity": (0.0, 40.0)},
    note="range from memory",
)
def de_bruyn_saltzman_1997(coefficients: Weiss, water_temperature: Array, salinity: Array) -> Array:
    """Return the solubility of bromomethane after De Bruyn and Saltzman (1997).

    Parameters
    ----------
    coefficients : Weiss
        For mol L-1 atm-1.
    water_temperature : (...) array
        ITS-90. [degC]
    salinity : (...) array
        Practical salinity. [1]

    Returns
    -------
    (...) array
        K0. [mol L-1 atm-1]

    Notes
    -----
    Valid from 0 to 30 degC and salinity 0 to 40 (from memory). NaN in, NaN out.

    References
    ----------
    De Bruyn and Saltzman (1997). doi:10.1016/S0304-4203(96)00089-8
    """
    return weiss(coefficients, water_temperature + ZERO_CELSIUS, salinity)
