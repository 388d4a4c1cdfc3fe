"""Other ways from the wind at the anemometer to that at 10 m: drag coefficients, and a power of the height."""

import numpy as np

from service.physics import sources
from service.physics.declare import Array, same_as, step
from service.physics.wind import REFERENCE_HEIGHT, VON_KARMAN

LARGE_POND_1981_LOW = 1.2e-3  # 1, 4 to 11 m s-1; kept below 4 m s-1
LARGE_POND_1981_HIGH = (0.49e-3, 0.065e-3)  # 1, per m s-1, 11 to 25 m s-1; Large and Pond (1981), from memory
LARGE_POND_1981_BREAK = 11.0  # m s-1
STEPS_TO_CONVERGE = 12  # fixed, so that no sample depends on its neighbours; each gains a factor of 10 or more
CONSTANT_DRAG = 1.3e-3  # 1, common practice
POWER = 1.0 / 7.0  # common practice for a neutral boundary layer


def large_pond_1981_drag(wind_speed_10m: Array) -> Array:
    """Return the neutral drag coefficient of Large and Pond (1981). [1]"""
    constant, slope = LARGE_POND_1981_HIGH
    return np.where(wind_speed_10m < LARGE_POND_1981_BREAK, LARGE_POND_1981_LOW, constant + slope * wind_speed_10m)


def _to_10m(wind_speed: Array, height: Array, drag: Array | float) -> Array:
    """Return the wind at 10 m from the logarithmic profile of a drag coefficient there. [m s-1]"""
    return np.asarray(wind_speed / (1.0 + np.sqrt(drag) / VON_KARMAN * np.log(height / REFERENCE_HEIGHT)))


@step(
    "wind_speed_10m",
    method="large-pond-1981",
    way="wind_height",
    source=sources.LARGE_POND_1981,
    equation="neutral drag coefficient",
    formula="C_D = 1.2e-3 (U10 < 11), (0.49 + 0.065 U10) 1e-3; U10 = Uz / (1 + C_D^0.5/0.40 ln(z/10))",
    valid={"wind_speed": (0.0, 25.0)},
)
def large_pond_1981(wind_speed: Array, wind_height: Array) -> Array:
    """Return the neutral wind speed at 10 m with the drag coefficient of Large and Pond (1981).

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
    Measured from 4 to 25 m s-1; the coefficient at 4 m s-1 is kept below. NaN in, NaN out.

    References
    ----------
    Large and Pond (1981). doi:10.1175/1520-0485(1981)011<0324:OOMFMI>2.0.CO;2
    """
    at_10m = wind_speed
    for _ in range(STEPS_TO_CONVERGE):
        at_10m = _to_10m(wind_speed, wind_height, large_pond_1981_drag(at_10m))
    return at_10m


@step(
    "friction_velocity_air",
    method="large-pond-1981",
    source=sources.LARGE_POND_1981,
    equation="neutral drag coefficient",
    formula="u* = C_D^0.5 U10, C_D = 1.2e-3 (U10 < 11), (0.49 + 0.065 U10) 1e-3",
    valid={"wind_speed_10m": (0.0, 25.0)},
)
def large_pond_1981_friction_velocity(wind_speed_10m: Array) -> Array:
    """Return the friction velocity in the air with the drag coefficient of Large and Pond (1981).

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
    Measured from 4 to 25 m s-1; the coefficient at 4 m s-1 is kept below. NaN in, NaN out.

    References
    ----------
    Large and Pond (1981). doi:10.1175/1520-0485(1981)011<0324:OOMFMI>2.0.CO;2
    """
    return np.sqrt(large_pond_1981_drag(wind_speed_10m)) * wind_speed_10m


@step(
    "wind_speed_10m",
    method="constant-drag",
    way="wind_height",
    formula="U10 = Uz / (1 + C_D^0.5/0.40 ln(z/10)), C_D = 1.3e-3",
    range_kind="common practice",
)
def constant_drag(wind_speed: Array, wind_height: Array) -> Array:
    """Return the neutral wind speed at 10 m with a constant drag coefficient.

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
    1.3e-3 is common practice for lakes and the sea alike. NaN in, NaN out.
    """
    return _to_10m(wind_speed, wind_height, CONSTANT_DRAG)


@step("friction_velocity_air", method="constant-drag", formula="u* = C_D^0.5 U10, C_D = 1.3e-3")
def constant_drag_friction_velocity(wind_speed_10m: Array) -> Array:
    """Return the friction velocity in the air with a constant drag coefficient.

    Parameters
    ----------
    wind_speed_10m : (...) array
        Neutral. [m s-1]

    Returns
    -------
    (...) array
        [m s-1]
    """
    return np.asarray(np.sqrt(CONSTANT_DRAG) * wind_speed_10m)


@step(
    "wind_speed_10m",
    method="power-law",
    way="wind_height",
    formula="U10 = Uz (10/z)^(1/7)",
    range_kind="common practice",
    note="Gives no friction velocity.",
)
def power_law(wind_speed: Array, wind_height: Array) -> Array:
    """Return the wind speed at 10 m by a power of the height.

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
    The exponent of 1/7 is common practice. NaN in, NaN out.
    """
    return wind_speed * (REFERENCE_HEIGHT / wind_height) ** POWER


for _method in ("large-pond-1981", "constant-drag", "power-law"):
    same_as("wind_speed_10m", "wind_speed", method=_method, assumes=("wind_height",))
    same_as("friction_velocity_air", "friction_velocity", method=_method, way="friction_velocity")
