"""From the mole fraction that an analyser reads in equilibrated air to the fugacity in the water where it was taken."""

import numpy as np

from service.physics import sources
from service.physics.constants import GAS_CONSTANT_LITRE_ATM, STANDARD_ATMOSPHERE, ZERO_CELSIUS
from service.physics.declare import Array, Remark, derived, same_as, step
from service.physics.sides import of_dry_air

TAKAHASHI_LIMIT = 20.0  # practical salinity below which the sea-water correction is not the default
WAYS = ("water_mole_fraction", "water_mole_fraction_wet")

same_as("equilibrator_temperature", "water_temperature")
same_as("equilibrator_pressure", "surface_pressure")
AT_EQUILIBRATOR = {"water_temperature": "equilibrator_temperature"}
derived("vapour_pressure_at_equilibrator", of="water_vapour_pressure", **AT_EQUILIBRATOR)
derived("solubility_at_equilibrator", of="solubility", **AT_EQUILIBRATOR)
derived("solubility_per_litre_at_equilibrator", of="solubility_per_litre", **AT_EQUILIBRATOR)
derived("density_at_equilibrator", of="density", **AT_EQUILIBRATOR)
derived(
    "fugacity_coefficient_at_equilibrator",
    of="fugacity_coefficient",
    surface_pressure="equilibrator_pressure",
    partial_pressure_in_air="partial_pressure_at_equilibrator",
    **AT_EQUILIBRATOR,
)


@step("partial_pressure_at_equilibrator", way="water_mole_fraction", formula="p = x (P_eq - p_w(T_eq))")
def partial_pressure_at_equilibrator(
    water_mole_fraction: Array, equilibrator_pressure: Array, vapour_pressure_at_equilibrator: Array
) -> Array:
    """Return the partial pressure in the equilibrator from the mole fraction in its dried air.

    Parameters
    ----------
    water_mole_fraction : (...) array
        [umol mol-1]
    equilibrator_pressure : (...) array
        Total. [hPa]
    vapour_pressure_at_equilibrator : (...) array
        [hPa]

    Returns
    -------
    (...) array
        [uatm]
    """
    return of_dry_air(water_mole_fraction, equilibrator_pressure, vapour_pressure_at_equilibrator)


@step("partial_pressure_at_equilibrator", way="water_mole_fraction_wet", formula="p = x_wet P_eq")
def partial_pressure_at_equilibrator_wet(water_mole_fraction_wet: Array, equilibrator_pressure: Array) -> Array:
    """Return the partial pressure in the equilibrator from the mole fraction in its undried air.

    Parameters
    ----------
    water_mole_fraction_wet : (...) array
        [umol mol-1]
    equilibrator_pressure : (...) array
        Total. [hPa]

    Returns
    -------
    (...) array
        [uatm]
    """
    return water_mole_fraction_wet * (equilibrator_pressure / STANDARD_ATMOSPHERE)


@step("fugacity_at_equilibrator", formula="f = p phi", in_situ=True)
def fugacity_at_equilibrator(
    partial_pressure_at_equilibrator: Array, fugacity_coefficient_at_equilibrator: Array
) -> Array:
    """Return the fugacity in the equilibrator at its own temperature.

    Parameters
    ----------
    partial_pressure_at_equilibrator : (...) array
        [uatm]
    fugacity_coefficient_at_equilibrator : (...) array
        [1]

    Returns
    -------
    (...) array
        [uatm]
    """
    return partial_pressure_at_equilibrator * fugacity_coefficient_at_equilibrator


# A closed bottle, where the headspace took gas out of the water: declared first, so that a ratio is never overlooked.
NO_CARBONATE = Remark(
    "the headspace's carbon dioxide was taken from CO2 alone, not from the carbonate system: send alkalinity",
    ("reacts_with_water", "headspace_ratio"),
    lambda reacts, ratio: (reacts > 0.0) & (ratio > 0.0),
)


@step(
    "fugacity_in_water",
    way="headspace_ratio",
    formula="f = C / K0(T_w)",
    needs_given=("equilibrator_temperature", "equilibrator_pressure"),
    remarks=(NO_CARBONATE,),
    in_situ=True,
)
def fugacity_from_headspace(headspace_concentration: Array, solubility_per_litre: Array) -> Array:
    """Return the fugacity in the water from the concentration that a closed headspace tells.

    Parameters
    ----------
    headspace_concentration : (...) array
        [umol L-1]
    solubility_per_litre : (...) array
        At water_temperature. [mol L-1 atm-1]

    Returns
    -------
    (...) array
        [uatm]
    """
    return headspace_concentration / solubility_per_litre


@step(
    "headspace_concentration",
    formula="C = K0(T_eq) f + r (p - p_start) / (R T_eq)",
    in_situ=True,
)
def headspace_concentration(
    fugacity_at_equilibrator: Array,
    partial_pressure_at_equilibrator: Array,
    solubility_per_litre_at_equilibrator: Array,
    headspace_ratio: Array,
    headspace_start_mole_fraction: Array,
    equilibrator_pressure: Array,
    equilibrator_temperature: Array,
    vapour_pressure_at_equilibrator: Array,
) -> Array:
    """Return the concentration in a bottle before its headspace was added, by mass balance.

    Parameters
    ----------
    fugacity_at_equilibrator : (...) array
        After equilibrium. [uatm]
    partial_pressure_at_equilibrator : (...) array
        After equilibrium. [uatm]
    solubility_per_litre_at_equilibrator : (...) array
        [mol L-1 atm-1]
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

    Returns
    -------
    (...) array
        [umol L-1]
    """
    p_start = of_dry_air(headspace_start_mole_fraction, equilibrator_pressure, vapour_pressure_at_equilibrator)
    RT = GAS_CONSTANT_LITRE_ATM * (equilibrator_temperature + ZERO_CELSIUS)
    dissolved = solubility_per_litre_at_equilibrator * fugacity_at_equilibrator
    return dissolved + headspace_ratio * (partial_pressure_at_equilibrator - p_start) / RT


def fugacity_from_equilibrator(fugacity_at_equilibrator: Array, temperature_factor: Array) -> Array:
    """Return the fugacity in the water from that in an equilibrator.

    Parameters
    ----------
    fugacity_at_equilibrator : (...) array
        [uatm]
    temperature_factor : (...) array
        [1]

    Returns
    -------
    (...) array
        [uatm]
    """
    return fugacity_at_equilibrator * temperature_factor


for _way in WAYS:
    step("fugacity_in_water", way=_way, formula="f(T_w) = f(T_eq) temperature_factor", in_situ=True)(
        fugacity_from_equilibrator
    )


@step(
    "temperature_factor",
    method="constant-concentration",
    formula="f(T_w) = f(T_eq) K0(T_eq)/K0(T_w)",
    way="equilibrator_temperature",
    in_situ=True,
)
def constant_concentration(solubility_at_equilibrator: Array, solubility: Array) -> Array:
    """Return the change of fugacity with temperature at a constant concentration of the gas itself.

    Parameters
    ----------
    solubility_at_equilibrator : (...) array
        [mol kg-1 atm-1]
    solubility : (...) array
        At water_temperature. [mol kg-1 atm-1]

    Returns
    -------
    (...) array
        [1]
    """
    return solubility_at_equilibrator / solubility


@step(
    "temperature_factor",
    method="takahashi-1993",
    source=sources.TAKAHASHI_1993,
    formula="exp(0.0423 (T_w - T_eq))",
    way="equilibrator_temperature",
    valid={"water_temperature": (2.0, 28.0), "salinity": (20.0, 40.0)},
    range_kind="data",
    in_situ=True,
)
def takahashi_1993(coefficients: float, water_temperature: Array, equilibrator_temperature: Array) -> Array:
    """Return the change of the fugacity of carbon dioxide in sea water with temperature, Takahashi et al. (1993).

    Parameters
    ----------
    coefficients : float
        Relative change per kelvin. [K-1]
    water_temperature : (...) array
        [degC]
    equilibrator_temperature : (...) array
        [degC]

    Returns
    -------
    (...) array
        [1]

    Notes
    -----
    Isochemical sea water, 2 to 28 degC. The salinity limits are common practice. NaN in, NaN out.

    References
    ----------
    Takahashi et al. (1993). doi:10.1029/93GB02263
    """
    return np.exp(coefficients * (water_temperature - equilibrator_temperature))


@step(
    "temperature_factor",
    method="takahashi-2009",
    source=sources.TAKAHASHI_2009,
    formula="exp(0.0433 (T_w - T_eq) - 4.35e-5 (T_w^2 - T_eq^2))",
    way="equilibrator_temperature",
    valid={"water_temperature": (2.0, 28.0), "salinity": (20.0, 40.0)},
    range_kind="data",
    in_situ=True,
)
def takahashi_2009(
    coefficients: tuple[float, float], water_temperature: Array, equilibrator_temperature: Array
) -> Array:
    """Return the change of the fugacity of carbon dioxide in sea water with temperature, Takahashi et al. (2009).

    Parameters
    ----------
    coefficients : tuple of float
        Of the first and the second power of temperature. [K-1, K-2]
    water_temperature : (...) array
        [degC]
    equilibrator_temperature : (...) array
        [degC]

    Returns
    -------
    (...) array
        [1]

    Notes
    -----
    Isochemical sea water, 2 to 28 degC. The salinity limits are common practice. NaN in, NaN out.

    References
    ----------
    Takahashi et al. (2009). doi:10.1016/j.dsr2.2008.12.009
    """
    linear, quadratic = coefficients
    T_w, T_eq = water_temperature, equilibrator_temperature
    return np.exp(linear * (T_w - T_eq) + quadratic * (T_w**2 - T_eq**2))


@step(
    "temperature_factor",
    method="by-salinity",
    formula="takahashi-1993 from salinity 20, constant concentration of CO2 below",
    way="equilibrator_temperature",
    source=sources.TAKAHASHI_1993,
    remarks=(
        Remark(
            "below salinity 20 without alkalinity the fugacity was taken to water_temperature at constant "
            "concentration of CO2: send alkalinity",
            ("salinity", "equilibrator_temperature", "water_temperature"),
            lambda salinity, T_eq, T_w: (salinity < TAKAHASHI_LIMIT) & (T_eq != T_w),
        ),
    ),
    in_situ=True,
)
def by_salinity(
    coefficients: float,
    salinity: Array,
    water_temperature: Array,
    equilibrator_temperature: Array,
    solubility_at_equilibrator: Array,
    solubility: Array,
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
    solubility_at_equilibrator : (...) array
        [mol kg-1 atm-1]
    solubility : (...) array
        At water_temperature. [mol kg-1 atm-1]

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
        constant_concentration(solubility_at_equilibrator, solubility),
    )


@step(
    "temperature_factor",
    method="none",
    formula="1",
    way="equilibrator_temperature",
    remarks=(
        Remark(
            "the equilibrator's temperature differs from that of the water and nothing was corrected",
            ("equilibrator_temperature", "water_temperature"),
            np.not_equal,
        ),
    ),
    in_situ=True,
)
def uncorrected(equilibrator_temperature: Array) -> Array:
    """Return 1, whatever the temperatures are.

    Parameters
    ----------
    equilibrator_temperature : (...) array
        [degC]

    Returns
    -------
    (...) array
        [1]
    """
    return np.ones_like(equilibrator_temperature)
