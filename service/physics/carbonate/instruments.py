"""What an equilibrator or a bottle with a headspace tells of carbon dioxide where alkalinity is known."""

import numpy as np

from service.physics import sources
from service.physics.carbonate.water_side import BESIDE, CO2
from service.physics.constants import (
    GAS_CONSTANT_LITRE_ATM,
    LITRES_PER_CUBIC_METRE,
    STANDARD_ATMOSPHERE,
    ZERO_CELSIUS,
)
from service.physics.declare import Array, same_as, step
from service.physics.equilibrator import TAKAHASHI_LIMIT, takahashi_1993

WAY = "equilibrator_temperature"


@step(
    "temperature_factor",
    method="carbonate",
    way=WAY,
    gases=CO2,
    formula="f(T_w) / f(T_eq) at constant alkalinity and total carbon",
    in_situ=True,
)
def carbonate(fugacity_at_equilibrator: Array, fugacity_after_equilibrator: Array) -> Array:
    """Return the change of the fugacity of carbon dioxide with temperature at constant alkalinity and total carbon.

    Parameters
    ----------
    fugacity_at_equilibrator, fugacity_after_equilibrator : (...) array
        At the equilibrator's temperature and at water_temperature. [uatm]

    Returns
    -------
    (...) array
        1 where there is no carbon dioxide. [1]
    """
    there, here = fugacity_at_equilibrator, fugacity_after_equilibrator
    return np.where(there == 0.0, 1.0, here / there)


@step(
    "salinity_below_takahashi",
    formula="salinity under 20, no number elsewhere",
    in_situ=True,
)
def salinity_below_takahashi(salinity: Array) -> Array:
    """Return the salinity where the carbonate system decides, so that it is not solved for the others.

    Parameters
    ----------
    salinity : (...) array
        Practical salinity. [1]

    Returns
    -------
    (...) array
        NaN from 20. [1]
    """
    return np.where(salinity < TAKAHASHI_LIMIT, salinity, np.nan)


@step(
    "temperature_factor",
    method="by-salinity",
    way=WAY,
    beside=BESIDE,
    source=sources.TAKAHASHI_1993,
    formula="takahashi-1993 from salinity 20, constant alkalinity and total carbon below",
    in_situ=True,
)
def by_salinity_with_alkalinity(
    coefficients: float,
    salinity: Array,
    water_temperature: Array,
    equilibrator_temperature: Array,
    fugacity_at_equilibrator: Array,
    fugacity_after_equilibrator_below_takahashi: Array,
) -> Array:
    """Return the change of the fugacity of carbon dioxide with temperature, as the salinity asks for.

    Parameters
    ----------
    coefficients : float
        Of takahashi-1993. [K-1]
    salinity : (...) array
        Practical salinity. [1]
    water_temperature : (...) array
        [degC]
    equilibrator_temperature : (...) array
        [degC]
    fugacity_at_equilibrator, fugacity_after_equilibrator_below_takahashi : (...) array
        At the equilibrator's temperature and at water_temperature. [uatm]

    Returns
    -------
    (...) array
        [1]

    References
    ----------
    Takahashi et al. (1993), from salinity 20. doi:10.1029/93GB02263
    """
    return np.where(
        salinity >= TAKAHASHI_LIMIT,
        takahashi_1993(coefficients, water_temperature, equilibrator_temperature),
        carbonate(fugacity_at_equilibrator, fugacity_after_equilibrator_below_takahashi),
    )


same_as(
    "fugacity_in_water",
    "fugacity_before_headspace",
    way="headspace_ratio",
    beside=BESIDE,
    gases=CO2,
    needs_given=("equilibrator_temperature", "equilibrator_pressure"),
    in_situ=True,
)


@step(
    "carbon_before_headspace",
    formula="DIC = DIC(T_eq, f) + r (p - p_start) / (R T_eq rho(T_eq)), alkalinity constant",
    in_situ=True,
)
def carbon_before_headspace(
    carbon_at_equilibrator: Array,
    partial_pressure_at_equilibrator: Array,
    headspace_ratio: Array,
    headspace_start_mole_fraction: Array,
    equilibrator_pressure: Array,
    equilibrator_temperature: Array,
    vapour_pressure_at_equilibrator: Array,
    density_at_equilibrator: Array,
) -> Array:
    """Return the total carbon in a bottle before its headspace was added, by mass balance at constant alkalinity.

    Parameters
    ----------
    carbon_at_equilibrator : (...) array
        After equilibrium. [umol kg-1]
    partial_pressure_at_equilibrator : (...) array
        After equilibrium. [uatm]
    headspace_ratio : (...) array
        Volume of gas over volume of water. [1]
    headspace_start_mole_fraction : (...) array
        Of the dry gas before. [umol mol-1]
    equilibrator_pressure : (...) array
        After equilibrium; the gas before is taken at the same pressure, saturated with vapour. [hPa]
    equilibrator_temperature : (...) array
        [degC]
    vapour_pressure_at_equilibrator : (...) array
        [hPa]
    density_at_equilibrator : (...) array
        [kg m-3]

    Returns
    -------
    (...) array
        [umol kg-1]
    """
    dry = (equilibrator_pressure - vapour_pressure_at_equilibrator) / STANDARD_ATMOSPHERE
    RT = GAS_CONSTANT_LITRE_ATM * (equilibrator_temperature + ZERO_CELSIUS)
    gained = headspace_ratio * (partial_pressure_at_equilibrator - headspace_start_mole_fraction * dry) / RT
    return carbon_at_equilibrator + gained / (density_at_equilibrator / LITRES_PER_CUBIC_METRE)
