"""From the wind at the anemometer to the neutral wind at 10 m, and the friction velocity in the air."""

import numpy as np

from service.physics import sources
from service.physics.declare import Array, same_as, step

CHARNOCK = 0.011  # 1; Smith (1988)
SMOOTH_FLOW = 0.11  # 1; Smith (1988)
VON_KARMAN = 0.40  # 1; Smith (1988)
AIR_VISCOSITY = 1.5e-5  # m2 s-1
GRAVITY_SMITH = 9.81  # m s-2
REFERENCE_HEIGHT = 10.0  # m
FIRST_DRAG = 1.2e-3  # 1, the drag coefficient at which the iteration starts
STEPS_TO_CONVERGE = 5  # fixed, so that no sample depends on its neighbours; to rounding wherever there is a root
STILL_AIR = 0.5  # m s-1, below which the profile of this wind is used: the smooth-flow term has no limit at rest


def _friction_velocity(wind_speed: Array, height: Array | float) -> Array:
    """Return the neutral friction velocity for a wind at a height, by Newton's steps. [m s-1]"""
    u = np.maximum(wind_speed, STILL_AIR)
    friction = u * np.sqrt(FIRST_DRAG)
    for _ in range(STEPS_TO_CONVERGE):
        rough, smooth = _roughness_parts(friction)
        length = rough + smooth
        slope = (2.0 * rough - smooth) / length  # of ln z0 by ln u*
        friction = (VON_KARMAN * u - slope * friction) / (np.log(height / length) - slope)
    return np.asarray(friction)


def _roughness_parts(friction_velocity: Array) -> tuple[Array, Array]:
    """Return the two parts of the roughness length, by waves and of smooth flow. [m]"""
    rough = CHARNOCK * friction_velocity**2 / GRAVITY_SMITH
    return rough, SMOOTH_FLOW * AIR_VISCOSITY / friction_velocity


@step(
    "wind_speed_10m",
    method="smith-1988",
    way="wind_height",
    source=sources.SMITH_1988,
    equation="Eqs. 4 to 6",
    formula="z0 = 0.011 u*^2/g + 0.11 nu/u*, U10 = Uz ln(10/z0)/ln(z/z0)",
    valid={"wind_speed": (0.0, 25.0)},
    range_kind="data",
)
def smith_1988(wind_speed: Array, wind_height: Array) -> Array:
    """Return the neutral wind speed at 10 m after Smith (1988).

    Parameters
    ----------
    wind_speed : (...) array
        As measured. [m s-1]
    wind_height : (...) array
        Above the water. [m]

    Returns
    -------
    (...) array
        [m s-1]

    Notes
    -----
    Charnock's relation with 0.011 and a smooth-flow term, a logarithmic profile, no stability. At 10 m the input
    returns bit for bit. Below 0.5 m s-1, where the smooth-flow term grows without bound, the ratio at 0.5 m s-1 is
    used; k changes by less than it does for any other reason there. Measured to about 25 m s-1. NaN in, NaN out.

    References
    ----------
    Smith (1988). doi:10.1029/JC093iC12p15467
    """
    rough, smooth = _roughness_parts(_friction_velocity(wind_speed, wind_height))
    roughness = rough + smooth
    return wind_speed * (np.log(REFERENCE_HEIGHT / roughness) / np.log(wind_height / roughness))


@step(
    "friction_velocity_air",
    method="smith-1988",
    source=sources.SMITH_1988,
    equation="Eqs. 4 to 6",
    formula="u* = 0.40 U10 / ln(10/z0), z0 = 0.011 u*^2/g + 0.11 nu/u*",
    valid={"wind_speed_10m": (0.0, 25.0)},
    range_kind="data",
)
def smith_1988_friction_velocity(wind_speed_10m: Array) -> Array:
    """Return the friction velocity in the air after Smith (1988).

    Parameters
    ----------
    wind_speed_10m : (...) array
        Neutral. [m s-1]

    Returns
    -------
    (...) array
        [m s-1]

    Notes
    -----
    Below 0.5 m s-1 the drag coefficient at 0.5 m s-1 is used. NaN in, NaN out.

    References
    ----------
    Smith (1988). doi:10.1029/JC093iC12p15467
    """
    at_least = np.maximum(wind_speed_10m, STILL_AIR)
    return _friction_velocity(wind_speed_10m, REFERENCE_HEIGHT) * (wind_speed_10m / at_least)


same_as("wind_speed_10m", "wind_speed", method="smith-1988", assumes=("wind_height",))
same_as("friction_velocity_air", "friction_velocity", method="smith-1988", way="friction_velocity")
