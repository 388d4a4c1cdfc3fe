"""Solubilities of the noble gases, from fits of concentrations in moist air or of the Bunsen coefficient."""

from service.physics import sources
from service.physics.constants import MOLAR_VOLUME_IDEAL, ZERO_CELSIUS
from service.physics.declare import Array, step
from service.physics.solubility.forms import MoistAir, Weiss, kelvin_1968, solubility_from_moist_air, weiss

MOIST_AIR = (
    "ln C = A1 + A2 (100/T) + A3 ln(T/100) + A4 (T/100) + S (B1 + B2 (T/100) + B3 (T/100)^2); K0 = C / (x (1 - p_w))"
)


@step(
    "solubility",
    method="jenkins-2019",
    source=sources.JENKINS_2019,
    equation="Table 4",
    formula="ln C = A1 + A2 (100/T) + A3 ln(T/100) + A4 (T/100) + S (B1 + B2 (T/100) + B3 (T/100)^2) + C1 S^2; "
    "K0 = C / (x (1 - p_w))",
    valid={"water_temperature": (0.0, 35.0), "salinity": (0.0, 37.0)},
    range_kind="data",
    note="range from memory",
)
def jenkins_2019(coefficients: MoistAir, water_temperature: Array, salinity: Array) -> Array:
    """Return the solubility of a noble gas after Jenkins, Lott and Cahill (2019).

    Parameters
    ----------
    coefficients : MoistAir
        For mol kg-1.
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
    Fitted from 0 to 35 degC and salinity 0 to 37 (from memory). NaN in, NaN out.

    References
    ----------
    Jenkins et al. (2019), Table 4. doi:10.1016/j.marchem.2019.03.007
    """
    return solubility_from_moist_air(coefficients, water_temperature + ZERO_CELSIUS, water_temperature, salinity)


@step(
    "solubility",
    method="weiss-1971",
    source=sources.WEISS_1971,
    equation="the equation for moist air",
    formula=MOIST_AIR,
    valid={"water_temperature": (-2.0, 40.0), "salinity": (0.0, 40.0)},
    note="range from memory",
)
def weiss_1971(coefficients: MoistAir, water_temperature: Array, salinity: Array) -> Array:
    """Return the solubility of helium after Weiss (1971).

    Parameters
    ----------
    coefficients : MoistAir
        For mL kg-1 of the real gas at 0 degC and 1 atm.
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
    Valid from -2 to 40 degC and salinity 0 to 40 (from memory). NaN in, NaN out.

    References
    ----------
    Weiss (1971). doi:10.1021/je60049a019
    """
    return solubility_from_moist_air(coefficients, kelvin_1968(water_temperature), water_temperature, salinity)


@step(
    "solubility",
    method="weiss-kyser-1978",
    source=sources.WEISS_KYSER_1978,
    equation="the equation for moist air",
    formula=MOIST_AIR,
    valid={"water_temperature": (-2.0, 40.0), "salinity": (0.0, 40.0)},
    note="range from memory",
)
def weiss_kyser_1978(coefficients: MoistAir, water_temperature: Array, salinity: Array) -> Array:
    """Return the solubility of krypton after Weiss and Kyser (1978).

    Parameters
    ----------
    coefficients : MoistAir
        For mL kg-1 of the real gas at 0 degC and 1 atm.
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
    Valid from -2 to 40 degC and salinity 0 to 40 (from memory). NaN in, NaN out.

    References
    ----------
    Weiss and Kyser (1978). doi:10.1021/je60076a014
    """
    return solubility_from_moist_air(coefficients, kelvin_1968(water_temperature), water_temperature, salinity)


@step(
    "solubility_per_litre",
    method="schubert-2012",
    source=sources.SCHUBERT_2012,
    equation="the fit in temperature and salinity",
    formula="ln beta = A1 + A2 (100/T) + A3 ln(T/100) + S (B1 + B2 (T/100) + B3 (T/100)^2); K0 = beta / 22.414 L mol-1",
    valid={"water_temperature": (0.0, 40.0), "salinity": (0.0, 40.0)},
    range_kind="common practice",
    note="The range is that of the fits of the same form; the authors' own could not be confirmed.",
)
def schubert_2012(coefficients: Weiss, water_temperature: Array, salinity: Array) -> Array:
    """Return the solubility of radon after Schubert et al. (2012).

    Parameters
    ----------
    coefficients : Weiss
        For the Bunsen coefficient.
    water_temperature : (...) array
        Taken as it is. [degC]
    salinity : (...) array
        Practical salinity. [1]

    Returns
    -------
    (...) array
        K0. [mol L-1 atm-1]

    Notes
    -----
    The authors print Ostwald's coefficient as beta T / 273.15, which is K0 R T with 22.414 L mol-1. NaN in, NaN out.

    References
    ----------
    Schubert et al. (2012). doi:10.1021/es204680n
    """
    return weiss(coefficients, water_temperature + ZERO_CELSIUS, salinity) / MOLAR_VOLUME_IDEAL
