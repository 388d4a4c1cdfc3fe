"""Solubilities published as concentrations in equilibrium with moist air, turned into K0."""

from typing import Any

from service.physics import sources
from service.physics.constants import ZERO_CELSIUS
from service.physics.declare import Array, step
from service.physics.solubility.forms import (
    MoistAir,
    ScaledTemperature,
    from_moist_air,
    kelvin_1968,
    scaled_temperature,
    solubility_from_moist_air,
)
from service.physics.solubility.marine import BOTH_FORMS


def _garcia_gordon(coefficients: ScaledTemperature, water_temperature: Array, salinity: Array) -> Array:
    """Return K0 from a Garcia-Gordon fit, per kilogram or litre as its coefficients are."""
    celsius_1968 = kelvin_1968(water_temperature) - ZERO_CELSIUS
    concentration = scaled_temperature(coefficients, celsius_1968, salinity)
    return from_moist_air(concentration, coefficients.mole_fraction, water_temperature, salinity) * coefficients.moles


GARCIA_GORDON: dict[str, Any] = {
    "source": sources.GARCIA_GORDON_1992,
    "formula": "ln C* = sum A_i Ts^i + S sum B_i Ts^i + C0 S^2, Ts = ln((298.15 - t)/(273.15 + t)); "
    "K0 = C* / (x (1 - p_w))",
    "valid": {"water_temperature": (-2.0, 40.0), "salinity": (0.0, 42.0)},
}


@step(
    "solubility",
    method="garcia-gordon-1992",
    equation="Eq. 8, Table 1, fit to Benson and Krause (1984)",
    **GARCIA_GORDON,
)
def garcia_gordon_1992(coefficients: ScaledTemperature, water_temperature: Array, salinity: Array) -> Array:
    """Return the solubility of oxygen after Garcia and Gordon (1992), their fit to Benson and Krause (1984).

    Parameters
    ----------
    coefficients : ScaledTemperature
        For umol kg-1.
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
    Valid from the freezing point to 40 degC and salinity 0 to 42. The printed Eq. 8 carries "A3 Ts^2"; the erratum
    (1993) makes it A3 Ts^3, as here. NaN in, NaN out.

    References
    ----------
    Garcia and Gordon (1992), Eq. 8 and Table 1. doi:10.4319/lo.1992.37.6.1307
    """
    return _garcia_gordon(coefficients, water_temperature, salinity)


@step(
    "solubility_per_litre",
    method="garcia-gordon-1992",
    equation="Eq. 8, Table 1, fit to Benson and Krause (1984), mL L-1",
    **GARCIA_GORDON,
)
def garcia_gordon_1992_per_litre(coefficients: ScaledTemperature, water_temperature: Array, salinity: Array) -> Array:
    """Return the solubility of oxygen per litre after Garcia and Gordon (1992), from their fit in mL L-1.

    Parameters
    ----------
    coefficients : ScaledTemperature
        For mL L-1 at 0 degC and 1 atm.
    water_temperature : (...) array
        ITS-90, converted to IPTS-68. [degC]
    salinity : (...) array
        Practical salinity. [1]

    Returns
    -------
    (...) array
        K0. [mol L-1 atm-1]

    Notes
    -----
    Millilitres become moles by the authors' molar volume, 22.3916 L mol-1. NaN in, NaN out.

    References
    ----------
    Garcia and Gordon (1992), Eq. 8 and Table 1. doi:10.4319/lo.1992.37.6.1307
    """
    return _garcia_gordon(coefficients, water_temperature, salinity)


@step(
    "solubility",
    method="garcia-gordon-1992-combined",
    equation="Eq. 8, Table 1, combined fit",
    **GARCIA_GORDON,
)
def garcia_gordon_1992_combined(coefficients: ScaledTemperature, water_temperature: Array, salinity: Array) -> Array:
    """Return the solubility of oxygen after Garcia and Gordon (1992), their fit to all data together.

    Parameters
    ----------
    coefficients : ScaledTemperature
        For umol kg-1.
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
    The authors recommend the fit to Benson and Krause (1984) instead. NaN in, NaN out.

    References
    ----------
    Garcia and Gordon (1992), Eq. 8 and Table 1. doi:10.4319/lo.1992.37.6.1307
    """
    return garcia_gordon_1992(coefficients, water_temperature, salinity)


@step(
    "solubility",
    method="hamme-emerson-2004",
    source=sources.HAMME_EMERSON_2004,
    equation="Eq. 1, Table 4",
    formula="ln C = sum A_i Ts^i + S sum B_i Ts^i, Ts = ln((298.15 - t)/(273.15 + t)); K0 = C / (x (1 - p_w))",
    valid={"water_temperature": (0.0, 30.0), "salinity": (0.0, 35.0)},
    range_kind="data",
)
def hamme_emerson_2004(coefficients: ScaledTemperature, water_temperature: Array, salinity: Array) -> Array:
    """Return the solubility of nitrogen, argon or neon after Hamme and Emerson (2004).

    Parameters
    ----------
    coefficients : ScaledTemperature
        For umol kg-1; for nmol kg-1 those of neon.
    water_temperature : (...) array
        ITS-90. [degC]
    salinity : (...) array
        Practical salinity. [1]

    Returns
    -------
    (...) array
        K0. [mol kg-1 atm-1]

    Notes
    -----
    Measured from 0 to 30 degC in fresh and sea water. NaN in, NaN out.

    References
    ----------
    Hamme and Emerson (2004), Eq. 1 and Table 4. doi:10.1016/j.dsr.2004.06.009
    """
    concentration = scaled_temperature(coefficients, water_temperature, salinity)
    return from_moist_air(concentration, coefficients.mole_fraction, water_temperature, salinity) * coefficients.moles


@step(
    "solubility_per_litre",
    method="weiss-1970",
    source=sources.WEISS_1970,
    equation="the equation for moist air",
    formula="ln C = A1 + A2 (100/T) + A3 ln(T/100) + A4 (T/100) + S (B1 + B2 (T/100) + B3 (T/100)^2); "
    "K0 = C / (x (1 - p_w))",
    valid={"water_temperature": (-2.0, 40.0), "salinity": (0.0, 40.0)},
    note="range from memory",
)
def weiss_1970(coefficients: MoistAir, water_temperature: Array, salinity: Array) -> Array:
    """Return the solubility of oxygen, nitrogen or argon after Weiss (1970).

    Parameters
    ----------
    coefficients : MoistAir
        For mL L-1 of the real gas at 0 degC and 1 atm.
    water_temperature : (...) array
        ITS-90, converted to IPTS-68, for which the authors' IPTS-48 is taken. [degC]
    salinity : (...) array
        Practical salinity. [1]

    Returns
    -------
    (...) array
        K0. [mol L-1 atm-1]

    Notes
    -----
    Between IPTS-48 and IPTS-68 there are at most 0.01 K from 0 to 40 degC, 2e-4 of the solubility. NaN in, NaN out.

    References
    ----------
    Weiss (1970). doi:10.1016/0011-7471(70)90037-9
    """
    return solubility_from_moist_air(coefficients, kelvin_1968(water_temperature), water_temperature, salinity)


@step(
    forms=BOTH_FORMS,
    method="wiesenburg-guinasso-1979",
    source=sources.WIESENBURG_GUINASSO_1979,
    equation="Eq. 7, Table VI",
    formula="ln C = ln x + A1 + A2 (100/T) + A3 ln(T/100) + A4 (T/100) + S (B1 + B2 (T/100) + B3 (T/100)^2); "
    "K0 = C / (x (1 - p_w))",
    valid={"water_temperature": (-2.0, 30.0), "salinity": (0.0, 40.0)},
)
def wiesenburg_guinasso_1979(coefficients: MoistAir, water_temperature: Array, salinity: Array) -> Array:
    """Return the solubility of methane, carbon monoxide or hydrogen after Wiesenburg and Guinasso (1979).

    Parameters
    ----------
    coefficients : MoistAir
        For nmol kg-1, nmol L-1 or nL L-1, per mole fraction.
    water_temperature : (...) array
        ITS-90, converted to IPTS-68. [degC]
    salinity : (...) array
        Practical salinity. [1]

    Returns
    -------
    (...) array
        K0 in the coefficients' basis. [mol kg-1 atm-1 or mol L-1 atm-1]

    Notes
    -----
    The printed equation is linear in the dry mole fraction, which therefore cancels. The authors' nL are those of an
    ideal gas: for methane their nL and nmol sets differ by 22.414 nL nmol-1. NaN in, NaN out.

    References
    ----------
    Wiesenburg and Guinasso (1979), Eq. 7 and Table VI. doi:10.1021/je60083a006
    """
    return solubility_from_moist_air(coefficients, kelvin_1968(water_temperature), water_temperature, salinity)
