"""Transfer velocities of the open sea and the coast as functions of wind speed."""

import numpy as np

from service.physics import sources
from service.physics.declare import Array, Limits, relative_uncertainty, step
from service.physics.polynomial import polynomial

SEA = ("ocean", "coastal")
COMMON_RANGE: Limits = (0.0, 20.0)  # m s-1, common practice where authors state none
SQUARE_ROOT = 0.5  # Schmidt exponent of a wavy surface without bubbles
REFERENCE = "transfer_velocity_at_reference"


def reference(schmidt: float, exponent: float = SQUARE_ROOT) -> dict[str, float]:
    """Return what a method brings for scaling: its reference Schmidt number and its exponent."""
    return {"reference_schmidt_number": schmidt, "schmidt_exponent": exponent}


def moments(ascending: tuple[float, ...], *powers: Array) -> Array:
    """Return c0 + c1 <U> + c2 <U^2> + ..., from the mean, the second moment and so on, as many as are given.

    Parameters
    ----------
    ascending : tuple of float
        Coefficients from the constant upwards. [cm h-1 per power of m s-1]
    *powers : (...) arrays
        The mean wind speed and its higher moments, in order. [m s-1, m2 s-2, ...]

    Returns
    -------
    (...) array
        [cm h-1]
    """
    total = np.full_like(powers[0], ascending[0])
    for coefficient, power in zip(ascending[1:], powers, strict=True):
        total = total + coefficient * power
    return total


LISS_MERLIVAT_SMOOTH = (0.0, 0.17)  # cm h-1 and cm h-1 (m s-1)-1; Liss and Merlivat (1986), to 3.6 m s-1
LISS_MERLIVAT_ROUGH = (-9.65, 2.85)  # the same, 3.6 to 13 m s-1
LISS_MERLIVAT_BREAKING = (-49.3, 5.9)  # the same, over 13 m s-1
LISS_MERLIVAT_LIMITS = (3.6, 13.0)  # m s-1


@step(
    REFERENCE,
    "schmidt_exponent",
    method="liss-merlivat-1986",
    source=sources.LISS_MERLIVAT_1986,
    equation="three-segment relation",
    formula="k600 = 0.17 U (U <= 3.6), 2.85 U - 9.65 (to 13), 5.9 U - 49.3; n = 2/3 (U <= 3.6), 1/2",
    supplies={"reference_schmidt_number": 600.0},
    valid={"wind_speed_10m": COMMON_RANGE},
    range_kind="common practice",
    water=(*SEA, "lake"),
    wind_averaging="short",
    replaced_by="wanninkhof-2014",
)
def liss_merlivat_1986(wind_speed_10m: Array) -> tuple[Array, Array]:
    """Return the transfer velocity of Liss and Merlivat (1986) and its Schmidt exponent.

    Parameters
    ----------
    wind_speed_10m : (...) array
        [m s-1]

    Returns
    -------
    (...) array
        Transfer velocity at a Schmidt number of 600. [cm h-1]
    (...) array
        Schmidt exponent, 2/3 on a smooth surface and 1/2 above. [1]

    Notes
    -----
    ``k600 = 0.17 U``, ``2.85 U - 9.65`` from 3.6 m s-1, ``5.9 U - 49.3`` from 13 m s-1. No range is stated; 0 to
    20 m s-1 is common practice. Where the exponent switches at 3.6 m s-1, k of a gas with a Schmidt number below 600
    falls with rising wind. NaN in, NaN out.

    References
    ----------
    Liss and Merlivat (1986), in The Role of Air-Sea Exchange in Geochemical Cycling, pp. 113-127.
    """
    smooth, breaking = LISS_MERLIVAT_LIMITS
    k = np.where(
        wind_speed_10m <= smooth,
        polynomial(LISS_MERLIVAT_SMOOTH, wind_speed_10m),
        np.where(
            wind_speed_10m <= breaking,
            polynomial(LISS_MERLIVAT_ROUGH, wind_speed_10m),
            polynomial(LISS_MERLIVAT_BREAKING, wind_speed_10m),
        ),
    )
    return k, np.where(wind_speed_10m <= smooth, 2.0 / 3.0, SQUARE_ROOT)


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


NIGHTINGALE_2000 = (0.0, 0.333, 0.222)  # cm h-1 per power of m s-1; Nightingale et al. (2000)


@step(
    REFERENCE,
    method="nightingale-2000",
    source=sources.NIGHTINGALE_2000,
    equation="best fit to the dual-tracer data",
    formula="k600 = 0.222 U^2 + 0.333 U",
    supplies=reference(600.0),
    valid={"wind_speed_10m": (2.0, 16.0)},
    range_kind="data",
    water=SEA,
    wind_averaging="short",
)
def nightingale_2000(wind_speed_10m: Array, wind_speed_10m_second_moment: Array) -> Array:
    """Return the transfer velocity of Nightingale et al. (2000), from dual tracers in a shelf sea.

    Parameters
    ----------
    wind_speed_10m : (...) array
        [m s-1]
    wind_speed_10m_second_moment : (...) array
        [m2 s-2]

    Returns
    -------
    (...) array
        Transfer velocity at a Schmidt number of 600. [cm h-1]

    Notes
    -----
    ``k600 = 0.222 U^2 + 0.333 U``. The data span about 2 to 16 m s-1. NaN in, NaN out.

    References
    ----------
    Nightingale et al. (2000). doi:10.1029/1999GB900091
    """
    return moments(NIGHTINGALE_2000, wind_speed_10m, wind_speed_10m_second_moment)


MCGILLIS_2001 = (3.3, 0.0, 0.0, 0.026)  # cm h-1 per power of m s-1; McGillis et al. (2001)


@step(
    REFERENCE,
    method="mcgillis-2001",
    source=sources.MCGILLIS_2001,
    equation="fit to direct covariance fluxes",
    formula="k660 = 3.3 + 0.026 U^3",
    supplies=reference(660.0),
    valid={"wind_speed_10m": (2.0, 16.0)},
    range_kind="data",
    water=SEA,
    wind_averaging="short",
)
def mcgillis_2001(wind_speed_10m_third_moment: Array) -> Array:
    """Return the transfer velocity of McGillis et al. (2001), from direct covariance over the ocean.

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
    ``k660 = 3.3 + 0.026 U^3``. The data span about 2 to 16 m s-1. NaN in, NaN out.

    References
    ----------
    McGillis et al. (2001). doi:10.1029/2000JC000506
    """
    still, _, _, cubic = MCGILLIS_2001
    return still + cubic * wind_speed_10m_third_moment


HO_2006 = 0.266  # cm h-1 (m s-1)-2; Ho et al. (2006), Eq. 3, with a standard error of 0.019
HO_2006_STANDARD_ERROR = 0.019


@step(
    REFERENCE,
    method="ho-2006",
    source=sources.HO_2006,
    equation="Eq. 3",
    formula="k600 = 0.266 U^2",
    supplies=reference(600.0),
    valid={"wind_speed_10m": (7.0, 16.0)},
    range_kind="data",
    uncertainty=relative_uncertainty(
        HO_2006_STANDARD_ERROR / HO_2006, "standard error of the fit", "0.266 +- 0.019 cm h-1 (m s-1)-2"
    ),
    water=SEA,
    wind_averaging="short",
)
def ho_2006(wind_speed_10m_second_moment: Array) -> Array:
    """Return the transfer velocity of Ho et al. (2006), from dual tracers at high winds.

    Parameters
    ----------
    wind_speed_10m_second_moment : (...) array
        [m2 s-2]

    Returns
    -------
    (...) array
        Transfer velocity at a Schmidt number of 600. [cm h-1]

    Notes
    -----
    ``k600 = 0.266 U^2``. The data span 7 to 16 m s-1. NaN in, NaN out.

    References
    ----------
    Ho et al. (2006), Eq. 3. doi:10.1029/2006GL026817
    """
    return HO_2006 * wind_speed_10m_second_moment


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
