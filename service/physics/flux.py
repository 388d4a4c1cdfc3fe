"""The flux through the surface: its two one-way parts and their difference."""

from service.physics.constants import METRES_PER_DAY
from service.physics.declare import Array, step


@step("open_water_fraction", formula="A = 1 - ice_fraction")
def open_water_fraction(ice_fraction: Array) -> Array:
    """Return the fraction of the surface through which gas passes.

    Parameters
    ----------
    ice_fraction : (...) array
        [1]

    Returns
    -------
    (...) array
        [1]

    Notes
    -----
    Linear in the open fraction, as is common practice.
    """
    return 1.0 - ice_fraction


@step("evasion", formula="A K K0 f_water")
def evasion(
    open_water_fraction: Array,
    total_transfer_velocity: Array,
    solubility_per_litre: Array,
    fugacity_in_water: Array,
) -> Array:
    """Return the one-way flux out of the water.

    Parameters
    ----------
    open_water_fraction : (...) array
        [1]
    total_transfer_velocity : (...) array
        [cm h-1]
    solubility_per_litre : (...) array
        [mol L-1 atm-1]
    fugacity_in_water : (...) array
        [uatm]

    Returns
    -------
    (...) array
        [mmol m-2 d-1]

    Notes
    -----
    1 mol L-1 atm-1 times 1 uatm is 1 mmol m-3, so that cm h-1 to m d-1 is the only factor.
    """
    velocity = open_water_fraction * total_transfer_velocity * METRES_PER_DAY
    return velocity * solubility_per_litre * fugacity_in_water


@step("invasion", formula="A K K0 f_air + A B")
def invasion(
    open_water_fraction: Array,
    total_transfer_velocity: Array,
    solubility_per_litre_at_skin: Array,
    fugacity_in_air: Array,
    bubble_injection: Array,
) -> Array:
    """Return the one-way flux into the water.

    Parameters
    ----------
    open_water_fraction : (...) array
        [1]
    total_transfer_velocity : (...) array
        [cm h-1]
    solubility_per_litre_at_skin : (...) array
        [mol L-1 atm-1]
    fugacity_in_air : (...) array
        [uatm]
    bubble_injection : (...) array
        Gas of bubbles that dissolve whole, per area of open water. [mmol m-2 d-1]

    Returns
    -------
    (...) array
        [mmol m-2 d-1]
    """
    through_surface = evasion(
        open_water_fraction, total_transfer_velocity, solubility_per_litre_at_skin, fugacity_in_air
    )
    return through_surface + open_water_fraction * bubble_injection


@step("fugacity_difference", formula="f_water - f_air")
def fugacity_difference(fugacity_in_water: Array, fugacity_in_air: Array) -> Array:
    """Return the fugacity in the water minus that in the air, whatever direction is positive.

    Parameters
    ----------
    fugacity_in_water : (...) array
        [uatm]
    fugacity_in_air : (...) array
        [uatm]

    Returns
    -------
    (...) array
        [uatm]
    """
    return fugacity_in_water - fugacity_in_air


@step("flux", method="upward", formula="evasion - invasion")
def flux_upward(evasion: Array, invasion: Array) -> Array:
    """Return the net flux, positive out of the water.

    Parameters
    ----------
    evasion : (...) array
        [mmol m-2 d-1]
    invasion : (...) array
        [mmol m-2 d-1]

    Returns
    -------
    (...) array
        [mmol m-2 d-1]
    """
    return evasion - invasion


@step("flux", method="downward", formula="invasion - evasion")
def flux_downward(evasion: Array, invasion: Array) -> Array:
    """Return the net flux, positive into the water.

    Parameters
    ----------
    evasion : (...) array
        [mmol m-2 d-1]
    invasion : (...) array
        [mmol m-2 d-1]

    Returns
    -------
    (...) array
        [mmol m-2 d-1]
    """
    return invasion - evasion
