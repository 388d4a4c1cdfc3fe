"""The mean square and the mean cube of a wind that is not steady, and what its averaging says of a method."""

import numpy as np

from service.physics.declare import Array, Remark, averaging, step

DAY = 86400.0  # s
HALF_LN_2_PI = 0.9189385332046727  # half the natural logarithm of 2 pi
STIRLING = (1.0 / 12.0, -1.0 / 360.0, 1.0 / 1260.0, -1.0 / 1680.0, 1.0 / 1188.0)  # B_2k / (2k (2k-1)), exact
STIRLING_FROM = 9  # steps up before the series is used: it is then good to 2e-15

# What a mean over a long time says of a method, wherever one is used.
FOR_SHORT_MEANS = Remark(
    "the method is one for short means: with a wind averaged over a day or longer send wind_speed_variance",
    ("wind_averaging",),
    lambda duration: duration >= DAY,
    if_given=("wind_averaging",),
    unless_given=("wind_speed_variance", "weibull_shape"),
)
FOR_LONG_MEANS = Remark(
    "the method is one for long-term mean winds: the wind is averaged over less than a day",
    ("wind_averaging",),
    lambda duration: duration < DAY,
    if_given=("wind_averaging",),
)
averaging("short", FOR_SHORT_MEANS)
averaging("second moment", FOR_SHORT_MEANS)
averaging("long-term", FOR_LONG_MEANS)


@step("wind_speed_10m_second_moment", formula="<U^2> = U^2, without a variance")
def second_moment(wind_speed_10m: Array) -> Array:
    """Return the mean square of a steady wind.

    Parameters
    ----------
    wind_speed_10m : (...) array
        [m s-1]

    Returns
    -------
    (...) array
        [m2 s-2]
    """
    return wind_speed_10m**2


@step("wind_speed_10m_third_moment", formula="<U^3> = U^3, without a variance")
def third_moment(wind_speed_10m: Array) -> Array:
    """Return the mean cube of a steady wind.

    Parameters
    ----------
    wind_speed_10m : (...) array
        [m s-1]

    Returns
    -------
    (...) array
        [m3 s-3]
    """
    return wind_speed_10m**3


def _variance_10m(wind_speed_10m: Array, wind_speed: Array, variance: Array) -> Array:
    """Return the variance at 10 m; where the mean is 0 the wind is at rest, and the ratio of heights is taken as 1."""
    moving = wind_speed > 0.0
    ratio = np.where(moving, wind_speed_10m / np.where(moving, wind_speed, 1.0), 1.0)
    return variance * (ratio * ratio + 0.0 * wind_speed)


@step(
    "wind_speed_10m_second_moment",
    way="wind_speed_variance",
    formula="<U^2> = U^2 + s^2 (U10/Uz)^2",
)
def second_moment_by_variance(wind_speed_10m: Array, wind_speed: Array, wind_speed_variance: Array) -> Array:
    """Return the mean square of a wind from its mean and variance.

    Parameters
    ----------
    wind_speed_10m : (...) array
        The mean. [m s-1]
    wind_speed : (...) array
        The mean as measured, at the height of the variance. [m s-1]
    wind_speed_variance : (...) array
        [m2 s-2]

    Returns
    -------
    (...) array
        [m2 s-2]
    """
    return wind_speed_10m**2 + _variance_10m(wind_speed_10m, wind_speed, wind_speed_variance)


@step(
    "wind_speed_10m_third_moment",
    way="wind_speed_variance",
    formula="<U^3> = U^3 + 3 U s^2 (U10/Uz)^2",
)
def third_moment_by_variance(wind_speed_10m: Array, wind_speed: Array, wind_speed_variance: Array) -> Array:
    """Return the mean cube of a wind from its mean and variance, for a distribution without skewness.

    Parameters
    ----------
    wind_speed_10m : (...) array
        The mean. [m s-1]
    wind_speed : (...) array
        The mean as measured, at the height of the variance. [m s-1]
    wind_speed_variance : (...) array
        [m2 s-2]

    Returns
    -------
    (...) array
        [m3 s-3]
    """
    variance = _variance_10m(wind_speed_10m, wind_speed, wind_speed_variance)
    return wind_speed_10m**3 + 3.0 * wind_speed_10m * variance


def ln_gamma(x: Array) -> Array:
    """Return the natural logarithm of the gamma function of a positive number.

    Parameters
    ----------
    x : (...) array
        Over 0. [1]

    Returns
    -------
    (...) array
        [1]

    Notes
    -----
    Stirling's series, NIST Digital Library of Mathematical Functions, Eq. 5.11.1, after the recurrence of Eq. 5.5.1
    has led to where its five terms are enough.

    Examples
    --------
    >>> float(np.exp(ln_gamma(np.array([5.0])))[0].round(9))
    24.0
    """
    below = np.ones_like(x)
    for step_up in range(STIRLING_FROM):
        below = below * (x + step_up)
    large = x + STIRLING_FROM
    series = sum(term * large ** -(2 * place + 1) for place, term in enumerate(STIRLING))
    return np.asarray((large - 0.5) * np.log(large) - large + HALF_LN_2_PI + series - np.log(below))


def _weibull_ratio(shape: Array, power: int) -> Array:
    """Return <U^n> over <U>^n of a Weibull distribution. [1]"""
    return np.exp(ln_gamma(1.0 + power / shape) - power * ln_gamma(1.0 + 1.0 / shape))


@step(
    "wind_speed_10m_second_moment",
    way="weibull_shape",
    formula="<U^2> = U^2 G(1 + 2/c) / G(1 + 1/c)^2",
)
def second_moment_by_weibull(wind_speed_10m: Array, weibull_shape: Array) -> Array:
    """Return the mean square of a wind whose distribution is Weibull's.

    Parameters
    ----------
    wind_speed_10m : (...) array
        The mean. [m s-1]
    weibull_shape : (...) array
        c, the same at every height; 2 is Rayleigh's distribution, and gives 1.27 U^2. [1]

    Returns
    -------
    (...) array
        [m2 s-2]
    """
    return wind_speed_10m**2 * _weibull_ratio(weibull_shape, 2)


@step(
    "wind_speed_10m_third_moment",
    way="weibull_shape",
    formula="<U^3> = U^3 G(1 + 3/c) / G(1 + 1/c)^3",
)
def third_moment_by_weibull(wind_speed_10m: Array, weibull_shape: Array) -> Array:
    """Return the mean cube of a wind whose distribution is Weibull's.

    Parameters
    ----------
    wind_speed_10m : (...) array
        The mean. [m s-1]
    weibull_shape : (...) array
        c, the same at every height; 2 is Rayleigh's distribution, and gives 1.91 U^3. [1]

    Returns
    -------
    (...) array
        [m3 s-3]
    """
    return wind_speed_10m**3 * _weibull_ratio(weibull_shape, 3)
