"""The true wind from the wind that a moving ship's anemometer feels."""

import numpy as np

from service.physics import sources
from service.physics.declare import Array, input_term, step, term

FULL_CIRCLE = 360.0  # degree
ANGLE = (-360.0, 720.0)  # degree; loggers count from -180, from 0 and past a turn

input_term(
    "apparent_wind_speed",
    "m s-1",
    "wind speed felt on the moving ship",
    possible=(0.0, 150.0),
    scale=10.0,
    example=11.3,
)
input_term(
    "apparent_wind_direction",
    "degree",
    "direction from which the felt wind comes, clockwise from the anemometer's zero line",
    possible=ANGLE,
    scale=100.0,
    example=35.0,
)
input_term(
    "anemometer_zero_line",
    "degree",
    "angle from the bow to the anemometer's zero line, clockwise",
    possible=ANGLE,
    default=0.0,
    scale=100.0,
    example=0.0,
)
input_term(
    "heading",
    "degree",
    "where the bow points, clockwise from true north",
    possible=ANGLE,
    scale=100.0,
    standard_name="platform_orientation",
    example=210.0,
)
input_term(
    "course_over_ground",
    "degree",
    "where the ship moves, clockwise from true north",
    possible=ANGLE,
    scale=100.0,
    standard_name="platform_course",
    example=214.0,
)
input_term(
    "speed_over_ground",
    "m s-1",
    "how fast the ship moves over the ground",
    possible=(0.0, 60.0),
    scale=10.0,
    standard_name="platform_speed_wrt_ground",
    example=5.4,
)
input_term(
    "current_speed",
    "m s-1",
    "speed of the surface current",
    possible=(0.0, 10.0),
    scale=1.0,
    example=0.6,
    used_with=("current_direction",),
)
input_term(
    "current_direction",
    "degree",
    "direction towards which the current flows, clockwise from true north",
    possible=ANGLE,
    scale=100.0,
    example=90.0,
    used_with=("current_speed",),
)
term("true_wind_eastward", "m s-1", "eastward part of the wind over ground", standard_name="eastward_wind")
term("true_wind_northward", "m s-1", "northward part of the wind over ground", standard_name="northward_wind")
term("true_wind_speed", "m s-1", "speed of the wind over ground", standard_name="wind_speed")
term(
    "true_wind_direction",
    "degree",
    "direction from which the wind over ground comes, clockwise from true north",
    standard_name="wind_from_direction",
)
term("wind_over_water_eastward", "m s-1", "eastward part of the wind over the moving water")
term("wind_over_water_northward", "m s-1", "northward part of the wind over the moving water")
term("wind_speed_over_water", "m s-1", "speed of the wind over the moving water")
term("wind_direction_over_water", "degree", "direction from which the wind over the moving water comes")


@step(
    "true_wind_eastward",
    "true_wind_northward",
    source=sources.SMITH_1999,
    equation="vector sum of section 2",
    formula="V_true = V_apparent + V_ship, the felt wind turned by heading + zero line + its direction",
)
def smith_1999(
    apparent_wind_speed: Array,
    apparent_wind_direction: Array,
    anemometer_zero_line: Array,
    heading: Array,
    course_over_ground: Array,
    speed_over_ground: Array,
) -> tuple[Array, Array]:
    """Return the wind over ground after Smith, Bourassa and Sharp (1999), as a vector.

    Parameters
    ----------
    apparent_wind_speed : (...) array
        Felt on the ship. [m s-1]
    apparent_wind_direction : (...) array
        Whence it comes, clockwise from the zero line. [degree]
    anemometer_zero_line : (...) array
        Clockwise from the bow. [degree]
    heading : (...) array
        Of the bow, clockwise from true north. [degree]
    course_over_ground : (...) array
        Clockwise from true north. [degree]
    speed_over_ground : (...) array
        [m s-1]

    Returns
    -------
    (...) array
        Eastward part. [m s-1]
    (...) array
        Northward part. [m s-1]

    Notes
    -----
    Vectors are added, and vectors are what may be averaged; angles are not. NaN in, NaN out.

    References
    ----------
    Smith, Bourassa and Sharp (1999). doi:10.1175/1520-0426(1999)016<0939:EMTITW>2.0.CO;2
    """
    whence = np.radians(heading + anemometer_zero_line + apparent_wind_direction)
    course = np.radians(course_over_ground)
    east = speed_over_ground * np.sin(course) - apparent_wind_speed * np.sin(whence)
    north = speed_over_ground * np.cos(course) - apparent_wind_speed * np.cos(whence)
    return east, north


@step("wind_over_water_eastward", "wind_over_water_northward", formula="V_true - V_current")
def wind_over_water(
    true_wind_eastward: Array, true_wind_northward: Array, current_speed: Array, current_direction: Array
) -> tuple[Array, Array]:
    """Return the wind over the moving water, as a vector.

    Parameters
    ----------
    true_wind_eastward : (...) array
        [m s-1]
    true_wind_northward : (...) array
        [m s-1]
    current_speed : (...) array
        [m s-1]
    current_direction : (...) array
        Towards which it flows. [degree]

    Returns
    -------
    (...) array
        Eastward part. [m s-1]
    (...) array
        Northward part. [m s-1]
    """
    towards = np.radians(current_direction)
    return (
        true_wind_eastward - current_speed * np.sin(towards),
        true_wind_northward - current_speed * np.cos(towards),
    )


@step("true_wind_speed", formula="|V_true|")
def true_wind_speed(true_wind_eastward: Array, true_wind_northward: Array) -> Array:
    """Return the speed of the wind over ground.

    Parameters
    ----------
    true_wind_eastward : (...) array
        [m s-1]
    true_wind_northward : (...) array
        [m s-1]

    Returns
    -------
    (...) array
        [m s-1]
    """
    return np.hypot(true_wind_eastward, true_wind_northward)


@step("true_wind_direction", formula="whence V_true comes, clockwise from north")
def true_wind_direction(true_wind_eastward: Array, true_wind_northward: Array) -> Array:
    """Return the direction from which the wind over ground comes, from 0 to below 360; 0 in a calm.

    Parameters
    ----------
    true_wind_eastward : (...) array
        [m s-1]
    true_wind_northward : (...) array
        [m s-1]

    Returns
    -------
    (...) array
        [degree]
    """
    calm = (true_wind_eastward == 0.0) & (true_wind_northward == 0.0)
    whence = np.degrees(np.arctan2(-true_wind_eastward, -true_wind_northward)) % FULL_CIRCLE
    return np.where(calm | (whence >= FULL_CIRCLE), 0.0 * whence, whence)


@step("wind_speed_over_water", formula="|V_true - V_current|")
def wind_speed_over_water(wind_over_water_eastward: Array, wind_over_water_northward: Array) -> Array:
    """Return the speed of the wind over the moving water.

    Parameters
    ----------
    wind_over_water_eastward : (...) array
        [m s-1]
    wind_over_water_northward : (...) array
        [m s-1]

    Returns
    -------
    (...) array
        [m s-1]
    """
    return true_wind_speed(wind_over_water_eastward, wind_over_water_northward)


@step("wind_direction_over_water", formula="whence V_true - V_current comes, clockwise from north")
def wind_direction_over_water(wind_over_water_eastward: Array, wind_over_water_northward: Array) -> Array:
    """Return the direction from which the wind over the moving water comes.

    Parameters
    ----------
    wind_over_water_eastward : (...) array
        [m s-1]
    wind_over_water_northward : (...) array
        [m s-1]

    Returns
    -------
    (...) array
        [degree]
    """
    return true_wind_direction(wind_over_water_eastward, wind_over_water_northward)
