"""What bubbles inject, and the supersaturation that they sustain where nothing else moves the gas."""

import numpy as np

from service.physics import sources
from service.physics.constants import AIR_DENSITY, METRES_PER_DAY
from service.physics.declare import Array, derived, same_as, step

MICRO = 1.0e-6
MMOL_PER_LITRE_ATMOSPHERE = 1.0e6  # mmol m-3 in one mol L-1


@step("friction_velocity_water", formula="u*w = u* (1.2/rho)^1/2, air of 1.2 kg m-3")
def friction_velocity_water(friction_velocity_air: Array, density: Array) -> Array:
    """Return the friction velocity in the water, by the stress being the same on both sides.

    Parameters
    ----------
    friction_velocity_air : (...) array
        [m s-1]
    density : (...) array
        Of the water. [kg m-3]

    Returns
    -------
    (...) array
        [m s-1]

    Notes
    -----
    The density of air is 1.2 kg m-3, that at about 20 degC; 10 K move the result by 2 percent.
    """
    return friction_velocity_air * np.sqrt(AIR_DENSITY / density)


# In bubbles it is the partial pressure that counts; where the fugacity is sent, that is had from it.
same_as("partial_pressure_in_bubbles", "partial_pressure_in_air")
derived(
    "fugacity_coefficient_at_air_fugacity",
    of="fugacity_coefficient",
    partial_pressure_in_air="air_fugacity",
    water_temperature="skin_temperature",
)


@step("partial_pressure_in_bubbles", way="air_fugacity", formula="p = f / phi")
def partial_pressure_in_bubbles(air_fugacity: Array, fugacity_coefficient_at_air_fugacity: Array) -> Array:
    """Return the partial pressure of the gas in the air from its fugacity there.

    Parameters
    ----------
    air_fugacity : (...) array
        [uatm]
    fugacity_coefficient_at_air_fugacity : (...) array
        Taken where the partial pressure equals the fugacity; the error is of the second order. [1]

    Returns
    -------
    (...) array
        [uatm]
    """
    return air_fugacity / fugacity_coefficient_at_air_fugacity


def bubble_injection(bubble_injection_per_atmosphere: Array, partial_pressure_in_bubbles: Array) -> Array:
    """Return what bubbles carry into open water whatever the concentration there.

    Parameters
    ----------
    bubble_injection_per_atmosphere : (...) array
        [mmol m-2 d-1 atm-1]
    partial_pressure_in_bubbles : (...) array
        x (P - p_w). [uatm]

    Returns
    -------
    (...) array
        [mmol m-2 d-1]
    """
    return bubble_injection_per_atmosphere * (MICRO * partial_pressure_in_bubbles)


for _method in ("liang-2013", "emerson-2019", "stanley-2009"):
    step("bubble_injection", method=_method, formula="B = b x (P - p_w), b per atmosphere")(bubble_injection)


@step(
    "steady_state_supersaturation",
    method="bubble-injection",
    formula="Delta = b / (K K0), b the bubble injection per atmosphere",
    note="That of the parameterisation's own bubbles, at which gain by bubbles and loss through the surface balance.",
)
def steady_state_supersaturation(
    bubble_injection_per_atmosphere: Array, total_transfer_velocity: Array, solubility_per_litre_at_skin: Array
) -> Array:
    """Return the supersaturation at which the injection of bubbles and the loss through the surface balance.

    Parameters
    ----------
    bubble_injection_per_atmosphere : (...) array
        [mmol m-2 d-1 atm-1]
    total_transfer_velocity : (...) array
        [cm h-1]
    solubility_per_litre_at_skin : (...) array
        [mol L-1 atm-1]

    Returns
    -------
    (...) array
        [%]
    """
    velocity = METRES_PER_DAY * total_transfer_velocity
    return (
        100.0 * bubble_injection_per_atmosphere / (velocity * solubility_per_litre_at_skin * MMOL_PER_LITRE_ATMOSPHERE)
    )


@step(
    "steady_state_supersaturation",
    method="woolf-thorpe-1991",
    source=sources.WOOLF_THORPE_1991,
    equation="supersaturation at equilibrium",
    formula="Delta = 0.01 (U/U_i)^2, U_i of the gas",
    valid={"wind_speed_10m": (0.0, 20.0)},
    range_kind="common practice",
    note="A result beside the flux, which it does not enter.",
)
def woolf_thorpe_1991(coefficients: float, wind_speed_10m: Array) -> Array:
    """Return the supersaturation that bubbles sustain after Woolf and Thorpe (1991).

    Parameters
    ----------
    coefficients : float
        The wind speed at which the supersaturation of the gas is one percent. [m s-1]
    wind_speed_10m : (...) array
        [m s-1]

    Returns
    -------
    (...) array
        [%]

    Notes
    -----
    ``Delta = 0.01 (U/U_i)^2``, as a fraction. No range is stated; 0 to 20 m s-1 is common practice. NaN in, NaN out.

    References
    ----------
    Woolf and Thorpe (1991). doi:10.1357/002224091784995765
    """
    return (wind_speed_10m / coefficients) ** 2
