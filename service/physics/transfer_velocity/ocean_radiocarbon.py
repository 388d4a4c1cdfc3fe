"""Transfer velocities of the sea that are held to the inventory of bomb radiocarbon, or to it and other data."""

from service.physics import sources
from service.physics.declare import Array, relative_uncertainty, step
from service.physics.polynomial import polynomial
from service.physics.transfer_velocity.reference import COMMON_RANGE, REFERENCE, SEA, moments, reference

WANNINKHOF_1992_SHORT = 0.31  # cm h-1 (m s-1)-2; Wanninkhof (1992), Eq. 3


@step(
    REFERENCE,
    method="wanninkhof-1992",
    source=sources.WANNINKHOF_1992,
    equation="Eq. 3",
    formula="k660 = 0.31 U^2",
    supplies=reference(660.0),
    valid={"wind_speed_10m": COMMON_RANGE},
    range_kind="common practice",
    uncertainty=relative_uncertainty(0.25, "author's estimate", "about 25 % (from memory)"),
    water=SEA,
    wind_averaging="short",
    replaced_by="wanninkhof-2014",
)
def wanninkhof_1992(wind_speed_10m_second_moment: Array) -> Array:
    """Return the transfer velocity of Wanninkhof (1992) for steady or short-term winds.

    Parameters
    ----------
    wind_speed_10m_second_moment : (...) array
        [m2 s-2]

    Returns
    -------
    (...) array
        Transfer velocity at a Schmidt number of 660. [cm h-1]

    Notes
    -----
    ``k660 = 0.31 U^2``. No range is stated; 0 to 20 m s-1 is common practice. NaN in, NaN out.

    References
    ----------
    Wanninkhof (1992), Eq. 3. doi:10.1029/92JC00188
    """
    return WANNINKHOF_1992_SHORT * wind_speed_10m_second_moment


WANNINKHOF_1992_LONG_TERM = 0.39  # cm h-1 (m s-1)-2; Wanninkhof (1992), for long-term mean winds


@step(
    REFERENCE,
    method="wanninkhof-1992-long-term",
    source=sources.WANNINKHOF_1992,
    equation="relation for long-term winds",
    formula="k660 = 0.39 <U>^2",
    supplies=reference(660.0),
    valid={"wind_speed_10m": COMMON_RANGE},
    range_kind="common practice",
    uncertainty=relative_uncertainty(0.25, "author's estimate", "about 25 % (from memory)"),
    water=SEA,
    wind_averaging="long-term",
    note="Holds the spread of the wind within a month or more, taken as Rayleigh: never with a variance.",
)
def wanninkhof_1992_long_term(wind_speed_10m: Array) -> Array:
    """Return the transfer velocity of Wanninkhof (1992) for winds averaged over a month or more.

    Parameters
    ----------
    wind_speed_10m : (...) array
        The long-term mean. [m s-1]

    Returns
    -------
    (...) array
        Transfer velocity at a Schmidt number of 660. [cm h-1]

    Notes
    -----
    ``k660 = 0.39 <U>^2``: the relation for steady winds with the second moment of a Rayleigh distribution, 0.31 times
    1.27, in it. No range is stated; 0 to 20 m s-1 is common practice. NaN in, NaN out.

    References
    ----------
    Wanninkhof (1992). doi:10.1029/92JC00188
    """
    return WANNINKHOF_1992_LONG_TERM * wind_speed_10m**2


WANNINKHOF_MCGILLIS_1999_SHORT = 0.0283  # cm h-1 (m s-1)-3; Wanninkhof and McGillis (1999), Eq. 4


@step(
    REFERENCE,
    method="wanninkhof-mcgillis-1999",
    source=sources.WANNINKHOF_MCGILLIS_1999,
    equation="Eq. 4",
    formula="k660 = 0.0283 U^3",
    supplies=reference(660.0),
    valid={"wind_speed_10m": COMMON_RANGE},
    range_kind="common practice",
    water=SEA,
    wind_averaging="short",
    replaced_by="wanninkhof-2009",
)
def wanninkhof_mcgillis_1999(wind_speed_10m_third_moment: Array) -> Array:
    """Return the transfer velocity of Wanninkhof and McGillis (1999) for short-term winds, cubic in wind speed.

    Parameters
    ----------
    wind_speed_10m_third_moment : (...) array
        [m3 s-3]

    Returns
    -------
    (...) array
        Transfer velocity at a Schmidt number of 660. [cm h-1]

    Notes
    -----
    ``k660 = 0.0283 U^3``, steep above 10 m s-1. No range is stated; 0 to 20 m s-1 is common practice. NaN in, NaN
    out.

    References
    ----------
    Wanninkhof and McGillis (1999), Eq. 4. doi:10.1029/1999GL900363
    """
    return WANNINKHOF_MCGILLIS_1999_SHORT * wind_speed_10m_third_moment


WANNINKHOF_MCGILLIS_1999_LONG_TERM = (0.0, 1.09, -0.333, 0.078)  # cm h-1 per power of m s-1; long-term winds


@step(
    REFERENCE,
    method="wanninkhof-mcgillis-1999-long-term",
    source=sources.WANNINKHOF_MCGILLIS_1999,
    equation="relation for long-term winds",
    formula="k660 = 1.09 <U> - 0.333 <U>^2 + 0.078 <U>^3",
    supplies=reference(660.0),
    valid={"wind_speed_10m": COMMON_RANGE},
    range_kind="common practice",
    water=SEA,
    wind_averaging="long-term",
    note="Holds the spread of the wind within a month or more: never with a variance.",
)
def wanninkhof_mcgillis_1999_long_term(wind_speed_10m: Array) -> Array:
    """Return the transfer velocity of Wanninkhof and McGillis (1999) for winds averaged over a month or more.

    Parameters
    ----------
    wind_speed_10m : (...) array
        The long-term mean. [m s-1]

    Returns
    -------
    (...) array
        Transfer velocity at a Schmidt number of 660. [cm h-1]

    Notes
    -----
    ``k660 = 1.09 <U> - 0.333 <U>^2 + 0.078 <U>^3``, with powers of the mean. No range is stated; 0 to 20 m s-1 is
    common practice. NaN in, NaN out.

    References
    ----------
    Wanninkhof and McGillis (1999). doi:10.1029/1999GL900363
    """
    return polynomial(WANNINKHOF_MCGILLIS_1999_LONG_TERM, wind_speed_10m)


SWEENEY_2007 = 0.27  # cm h-1 (m s-1)-2; Sweeney et al. (2007)


@step(
    REFERENCE,
    method="sweeney-2007",
    source=sources.SWEENEY_2007,
    equation="abstract",
    formula="k660 = 0.27 <U^2>",
    supplies=reference(660.0),
    valid={"wind_speed_10m": COMMON_RANGE},
    range_kind="common practice",
    uncertainty=relative_uncertainty(0.30, "author's estimate", "30 % on the global mean"),
    water=SEA,
    wind_averaging="second moment",
)
def sweeney_2007(wind_speed_10m_second_moment: Array) -> Array:
    """Return the transfer velocity of Sweeney et al. (2007), scaled to the bomb-radiocarbon inventory.

    Parameters
    ----------
    wind_speed_10m_second_moment : (...) array
        [m2 s-2]

    Returns
    -------
    (...) array
        Transfer velocity at a Schmidt number of 660. [cm h-1]

    Notes
    -----
    ``k660 = 0.27 <U^2>``, with the second moment of the wind. No range is stated; 0 to 20 m s-1 is common practice.
    NaN in, NaN out.

    References
    ----------
    Sweeney et al. (2007). doi:10.1029/2006GB002784
    """
    return SWEENEY_2007 * wind_speed_10m_second_moment


WANNINKHOF_2009 = (3.0, 0.1, 0.064, 0.011)  # cm h-1 per power of m s-1; Wanninkhof et al. (2009)


@step(
    REFERENCE,
    method="wanninkhof-2009",
    source=sources.WANNINKHOF_2009,
    equation="hybrid polynomial",
    formula="k660 = 3 + 0.1 <U> + 0.064 <U^2> + 0.011 <U^3>",
    supplies=reference(660.0),
    valid={"wind_speed_10m": (0.0, 20.0)},
    water=SEA,
    wind_averaging="short",
)
def wanninkhof_2009(
    wind_speed_10m: Array, wind_speed_10m_second_moment: Array, wind_speed_10m_third_moment: Array
) -> Array:
    """Return the transfer velocity of Wanninkhof et al. (2009), each term for a process of its own.

    Parameters
    ----------
    wind_speed_10m : (...) array
        [m s-1]
    wind_speed_10m_second_moment : (...) array
        [m2 s-2]
    wind_speed_10m_third_moment : (...) array
        [m3 s-3]

    Returns
    -------
    (...) array
        Transfer velocity at a Schmidt number of 660. [cm h-1]

    Notes
    -----
    ``k660 = 3 + 0.1 U + 0.064 U^2 + 0.011 U^3``, from 0 to 20 m s-1. NaN in, NaN out.

    References
    ----------
    Wanninkhof et al. (2009). doi:10.1146/annurev.marine.010908.163742
    """
    powers = wind_speed_10m, wind_speed_10m_second_moment, wind_speed_10m_third_moment
    return moments(WANNINKHOF_2009, *powers)


WANNINKHOF_2014 = 0.251  # cm h-1 (m s-1)-2; Wanninkhof (2014), Eq. 4


@step(
    REFERENCE,
    method="wanninkhof-2014",
    source=sources.WANNINKHOF_2014,
    equation="Eq. 4",
    formula="k660 = 0.251 <U^2>",
    supplies=reference(660.0),
    valid={"wind_speed_10m": COMMON_RANGE},
    recommended={"wind_speed_10m": (4.0, 15.0)},
    range_kind="common practice",
    uncertainty=relative_uncertainty(0.20, "author's estimate", "20 % on the global mean"),
    water=SEA,
    wind_averaging="second moment",
)
def wanninkhof_2014(wind_speed_10m_second_moment: Array) -> Array:
    """Return the transfer velocity of Wanninkhof (2014), quadratic in wind speed.

    Parameters
    ----------
    wind_speed_10m_second_moment : (...) array
        [m2 s-2]

    Returns
    -------
    (...) array
        Transfer velocity at a Schmidt number of 660. [cm h-1]

    Notes
    -----
    ``k660 = 0.251 <U^2>``, with the second moment of the wind; best from 4 to 15 m s-1. NaN in, NaN out.

    References
    ----------
    Wanninkhof (2014), Eq. 4. doi:10.4319/lom.2014.12.351
    """
    return WANNINKHOF_2014 * wind_speed_10m_second_moment
