"""From what is known of the gas in the air and in the water to its fugacity on both sides of the interface."""

from service.physics.constants import STANDARD_ATMOSPHERE
from service.physics.declare import Array, Remark, derived, same_as, step

# Air: mole fraction -> partial pressure -> fugacity; each way of giving the side enters at its own place.
same_as("fugacity_in_air", "air_fugacity", way="air_fugacity")
same_as("partial_pressure_in_air", "air_partial_pressure", way="air_partial_pressure")
same_as("dry_mole_fraction_in_air", "air_mole_fraction", way="air_mole_fraction")
derived("vapour_pressure_at_interface", of="water_vapour_pressure", water_temperature="skin_temperature")
derived("fugacity_coefficient_at_interface", of="fugacity_coefficient", water_temperature="skin_temperature")
derived("vapour_pressure_at_mast", of="water_vapour_pressure", water_temperature="air_temperature", salinity="no_salt")


@step("dry_mole_fraction_in_air", way="air_mole_fraction_wet", formula="x = x_wet / (1 - RH p_w(T_a)/P)")
def dry_mole_fraction_in_air(
    air_mole_fraction_wet: Array,
    relative_humidity: Array,
    vapour_pressure_at_mast: Array,
    surface_pressure: Array,
) -> Array:
    """Return the mole fraction in dry air from one read without drying.

    Parameters
    ----------
    air_mole_fraction_wet : (...) array
        As read. [umol mol-1]
    relative_humidity : (...) array
        Where it was read. [%]
    vapour_pressure_at_mast : (...) array
        Over pure water at the temperature of that air. [hPa]
    surface_pressure : (...) array
        Total. [hPa]

    Returns
    -------
    (...) array
        [umol mol-1]
    """
    return air_mole_fraction_wet / (1.0 - relative_humidity / 100.0 * vapour_pressure_at_mast / surface_pressure)


def of_dry_air(mole_fraction: Array, pressure: Array, vapour_pressure: Array) -> Array:
    """Return the partial pressure of a gas in vapour-saturated air from its mole fraction in the air when dried.

    Parameters
    ----------
    mole_fraction : (...) array
        [umol mol-1]
    pressure : (...) array
        Total. [hPa]
    vapour_pressure : (...) array
        [hPa]

    Returns
    -------
    (...) array
        [uatm]
    """
    return mole_fraction * ((pressure - vapour_pressure) / STANDARD_ATMOSPHERE)


def partial_pressure_in_air(
    dry_mole_fraction_in_air: Array, surface_pressure: Array, vapour_pressure_at_interface: Array
) -> Array:
    """Return the partial pressure at the interface, where the air is saturated with vapour.

    Parameters
    ----------
    dry_mole_fraction_in_air : (...) array
        [umol mol-1]
    surface_pressure : (...) array
        Total. [hPa]
    vapour_pressure_at_interface : (...) array
        [hPa]

    Returns
    -------
    (...) array
        [uatm]
    """
    return of_dry_air(dry_mole_fraction_in_air, surface_pressure, vapour_pressure_at_interface)


for _way in ("air_mole_fraction", "air_mole_fraction_wet"):
    step("partial_pressure_in_air", way=_way, formula="p = x (P - p_w)")(partial_pressure_in_air)


@step("fugacity_in_air", formula="f = p phi")
def fugacity_in_air(partial_pressure_in_air: Array, fugacity_coefficient_at_interface: Array) -> Array:
    """Return the fugacity in the air at the interface.

    Parameters
    ----------
    partial_pressure_in_air : (...) array
        [uatm]
    fugacity_coefficient_at_interface : (...) array
        [1]

    Returns
    -------
    (...) array
        [uatm]
    """
    return partial_pressure_in_air * fugacity_coefficient_at_interface


# Water: the same, and by concentration or saturation; always at water_temperature, whatever the interface has.
same_as("fugacity_in_water", "water_fugacity", way="water_fugacity")
same_as("partial_pressure_in_water", "water_partial_pressure", way="water_partial_pressure")
derived("fugacity_coefficient_in_water", of="fugacity_coefficient", partial_pressure_in_air="partial_pressure_in_water")


@step("fugacity_in_water", way="water_partial_pressure", formula="f = p phi", in_situ=True)
def fugacity_in_water(partial_pressure_in_water: Array, fugacity_coefficient_in_water: Array) -> Array:
    """Return the fugacity in the water from the partial pressure there.

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


TOTAL_CARBON = 500.0  # umol kg-1 or umol L-1, above which dissolved CO2 alone is rare and total carbon likely


def _likely_total_carbon(concentration: str) -> Remark:
    return Remark(
        f"{concentration} above {TOTAL_CARBON:g} is likely total carbon: CO2(aq) + H2CO3 is meant",
        ("reacts_with_water", concentration),
        lambda reacts, amount: (reacts > 0.0) & (amount > TOTAL_CARBON),
    )


@step(
    "fugacity_in_water",
    way="water_concentration",
    formula="f = C / K0",
    in_situ=True,
    remarks=(_likely_total_carbon("water_concentration"),),
)
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


@step(
    "fugacity_in_water",
    way="water_concentration_per_litre",
    formula="f = C / K0",
    in_situ=True,
    remarks=(_likely_total_carbon("water_concentration_per_litre"),),
)
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


derived(
    "fugacity_in_air_of_saturation",
    of="fugacity_in_air",
    surface_pressure="saturation_pressure",
    skin_temperature="water_temperature",  # a probe's percentage knows of no skin
)
derived("fugacity_in_air_of_bulk", of="fugacity_in_air", skin_temperature="subskin_temperature")
same_as("saturation_pressure", "surface_pressure")


@step("fugacity_in_water", way="water_saturation", formula="f = saturation / 100 f_air(P_sat)", in_situ=True)
def fugacity_from_saturation(water_saturation: Array, fugacity_in_air_of_saturation: Array) -> Array:
    """Return the fugacity in the water from its percentage of air equilibrium.

    Parameters
    ----------
    water_saturation : (...) array
        [%]
    fugacity_in_air_of_saturation : (...) array
        In the air at the pressure to which the percentage refers. [uatm]

    Returns
    -------
    (...) array
        [uatm]
    """
    return water_saturation / 100.0 * fugacity_in_air_of_saturation


@step("saturation", formula="100 f_water / f_air")
def saturation(fugacity_in_water: Array, fugacity_in_air_of_bulk: Array) -> Array:
    """Return the saturation at the surface pressure and the temperature of the water.

    Parameters
    ----------
    fugacity_in_water : (...) array
        [uatm]
    fugacity_in_air_of_bulk : (...) array
        In air in equilibrium with water below the skin. [uatm]

    Returns
    -------
    (...) array
        [%]
    """
    return 100.0 * fugacity_in_water / fugacity_in_air_of_bulk
