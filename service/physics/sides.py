"""From what is known of the gas in the air and in the water to its fugacity on both sides of the interface."""

from service.physics.constants import STANDARD_ATMOSPHERE
from service.physics.declare import Array, derived, same_as, step

# Air: mole fraction -> partial pressure -> fugacity; each way of giving the side enters at its own place.
same_as("fugacity_in_air", "air_fugacity", way="air_fugacity")
same_as("partial_pressure_in_air", "air_partial_pressure", way="air_partial_pressure")


@step("partial_pressure_in_air", way="air_mole_fraction", formula="p = x (P - p_w)")
def partial_pressure_in_air(air_mole_fraction: Array, surface_pressure: Array, water_vapour_pressure: Array) -> Array:
    """Return the partial pressure at the interface, where the air is saturated with vapour.

    Parameters
    ----------
    air_mole_fraction : (...) array
        In dry air. [umol mol-1]
    surface_pressure : (...) array
        Total. [hPa]
    water_vapour_pressure : (...) array
        At the interface. [hPa]

    Returns
    -------
    (...) array
        [uatm]
    """
    return air_mole_fraction * ((surface_pressure - water_vapour_pressure) / STANDARD_ATMOSPHERE)


@step("fugacity_in_air", formula="f = p phi")
def fugacity_in_air(partial_pressure_in_air: Array, fugacity_coefficient: Array) -> Array:
    """Return the fugacity in the air at the interface.

    Parameters
    ----------
    partial_pressure_in_air : (...) array
        [uatm]
    fugacity_coefficient : (...) array
        [1]

    Returns
    -------
    (...) array
        [uatm]
    """
    return partial_pressure_in_air * fugacity_coefficient


# Water: the same, and by concentration.
same_as("fugacity_in_water", "water_fugacity", way="water_fugacity")
same_as("partial_pressure_in_water", "water_partial_pressure", way="water_partial_pressure")
derived(
    "fugacity_coefficient_in_water",
    of="fugacity_coefficient",
    partial_pressure_in_air="partial_pressure_in_water",
)


@step("partial_pressure_in_water", way="water_mole_fraction", formula="p = x (P - p_w)")
def partial_pressure_in_water(
    water_mole_fraction: Array, surface_pressure: Array, water_vapour_pressure: Array
) -> Array:
    """Return the partial pressure in the water from dried air in equilibrium with it, in situ.

    Parameters
    ----------
    water_mole_fraction : (...) array
        In the dried air. [umol mol-1]
    surface_pressure : (...) array
        At which it was in equilibrium. [hPa]
    water_vapour_pressure : (...) array
        [hPa]

    Returns
    -------
    (...) array
        [uatm]
    """
    return partial_pressure_in_air(water_mole_fraction, surface_pressure, water_vapour_pressure)


def _fugacity_in_water(partial_pressure_in_water: Array, fugacity_coefficient_in_water: Array) -> Array:
    """Return the fugacity in the water.

    Parameters
    ----------
    partial_pressure_in_water : (...) array
        [uatm]
    fugacity_coefficient_in_water : (...) array
        [1]

    Returns
    -------
    (...) array
        [uatm]
    """
    return partial_pressure_in_water * fugacity_coefficient_in_water


for _way in ("water_mole_fraction", "water_partial_pressure"):
    step("fugacity_in_water", way=_way, formula="f = p phi")(_fugacity_in_water)


@step("fugacity_in_water", way="water_concentration", formula="f = C / K0")
def fugacity_from_concentration(water_concentration: Array, solubility: Array) -> Array:
    """Return the fugacity in the water from the concentration per kilogram.

    Parameters
    ----------
    water_concentration : (...) array
        [umol kg-1]
    solubility : (...) array
        [mol kg-1 atm-1]

    Returns
    -------
    (...) array
        [uatm]
    """
    return water_concentration / solubility


@step("fugacity_in_water", way="water_concentration_per_litre", formula="f = C / K0")
def fugacity_from_concentration_per_litre(water_concentration_per_litre: Array, solubility_per_litre: Array) -> Array:
    """Return the fugacity in the water from the concentration per litre.

    Parameters
    ----------
    water_concentration_per_litre : (...) array
        [umol L-1]
    solubility_per_litre : (...) array
        [mol L-1 atm-1]

    Returns
    -------
    (...) array
        [uatm]
    """
    return water_concentration_per_litre / solubility_per_litre


same_as("concentration_in_water", "water_concentration", way="water_concentration")
same_as("concentration_in_water_per_litre", "water_concentration_per_litre", way="water_concentration_per_litre")


@step("concentration_in_water", formula="C = K0 f_water")
def concentration_in_water(solubility: Array, fugacity_in_water: Array) -> Array:
    """Return the concentration of the dissolved gas per kilogram.

    Parameters
    ----------
    solubility : (...) array
        [mol kg-1 atm-1]
    fugacity_in_water : (...) array
        [uatm]

    Returns
    -------
    (...) array
        [umol kg-1]
    """
    return solubility * fugacity_in_water


@step("concentration_in_water_per_litre", formula="C = K0 (per litre) f_water")
def concentration_in_water_per_litre(solubility_per_litre: Array, fugacity_in_water: Array) -> Array:
    """Return the concentration of the dissolved gas per litre.

    Parameters
    ----------
    solubility_per_litre : (...) array
        [mol L-1 atm-1]
    fugacity_in_water : (...) array
        [uatm]

    Returns
    -------
    (...) array
        [umol L-1]
    """
    return solubility_per_litre * fugacity_in_water


@step("saturation", formula="100 f_water / f_air")
def saturation(fugacity_in_water: Array, fugacity_in_air: Array) -> Array:
    """Return the saturation at the surface pressure and the temperature of the water.

    Parameters
    ----------
    fugacity_in_water : (...) array
        [uatm]
    fugacity_in_air : (...) array
        [uatm]

    Returns
    -------
    (...) array
        [%]
    """
    return 100.0 * fugacity_in_water / fugacity_in_air
