"""Transfer velocities of the sea from tracers: a wind tunnel and a lake, and pairs of tracers in shelf seas."""

import numpy as np

from service.physics import sources
from service.physics.declare import Array, relative_uncertainty, step
from service.physics.polynomial import polynomial
from service.physics.transfer_velocity.reference import COMMON_RANGE, REFERENCE, SEA, SQUARE_ROOT, moments, reference

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
    doi:10.1007/978-94-009-4738-2_5
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
