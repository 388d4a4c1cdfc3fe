"""A polynomial of the caller's own in wind speed, so that a laboratory can use its own fit."""

from service.physics.declare import Array, same_as, step
from service.physics.transfer_velocity.reference import REFERENCE
from service.physics.transfer_velocity.scaling import set_negative_to_zero

METHOD = "own-polynomial"
COEFFICIENTS = ("own_constant", "own_linear_coefficient", "own_quadratic_coefficient", "own_cubic_coefficient")


def own_polynomial(
    own_constant: Array,
    own_linear_coefficient: Array,
    own_quadratic_coefficient: Array,
    own_cubic_coefficient: Array,
    wind_speed_10m: Array,
    wind_speed_10m_second_moment: Array,
    wind_speed_10m_third_moment: Array,
) -> Array:
    """Return the transfer velocity by coefficients of the caller's own.

    Parameters
    ----------
    own_constant : (...) array
        The constant. [cm h-1]
    own_linear_coefficient : (...) array
        With the mean wind speed in m s-1. [cm h-1]
    own_quadratic_coefficient : (...) array
        With its mean square. [cm h-1]
    own_cubic_coefficient : (...) array
        With its mean cube. [cm h-1]
    wind_speed_10m : (...) array
        [m s-1]
    wind_speed_10m_second_moment : (...) array
        [m2 s-2]
    wind_speed_10m_third_moment : (...) array
        [m3 s-3]

    Returns
    -------
    (...) array
        Transfer velocity at the caller's own reference Schmidt number. [cm h-1]

    Notes
    -----
    ``k = c0 + c1 <U> + c2 <U^2> + c3 <U^3>``; without a variance or a Weibull shape the moments are powers of U.
    """
    linear = own_constant + own_linear_coefficient * wind_speed_10m
    quadratic = own_quadratic_coefficient * wind_speed_10m_second_moment
    return linear + quadratic + own_cubic_coefficient * wind_speed_10m_third_moment


for _name in COEFFICIENTS:  # any one of them makes the method; the others are then 0
    step(
        REFERENCE,
        method=METHOD,
        way=_name,
        formula="k = c0 + c1 <U> + c2 <U^2> + c3 <U^3>",
        wind_averaging="short",
        note="The caller's own: water, range and uncertainty are the caller's to know.",
    )(own_polynomial)

same_as("reference_schmidt_number", "own_reference_schmidt_number", method=METHOD)
set_negative_to_zero(METHOD)
