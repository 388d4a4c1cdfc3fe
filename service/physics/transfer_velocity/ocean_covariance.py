"""Transfer velocities of the sea from direct covariance, the flux measured in the air itself."""

from service.physics import sources
from service.physics.declare import Array, relative_uncertainty, step
from service.physics.polynomial import polynomial
from service.physics.transfer_velocity.reference import COMMON_RANGE, FRICTION_RANGE, REFERENCE, SEA, moments, reference

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


EDSON_2011 = (5.4, 0.0, 0.0, 0.029)  # cm h-1 per power of m s-1; Edson et al. (2011)


@step(
    REFERENCE,
    method="edson-2011",
    source=sources.EDSON_2011,
    equation="fit to direct covariance fluxes",
    formula="k660 = 5.4 + 0.029 <U^3>",
    supplies=reference(660.0),
    valid={"wind_speed_10m": (0.0, 18.0)},
    range_kind="data",
    water=SEA,
    wind_averaging="short",
)
def edson_2011(wind_speed_10m_third_moment: Array) -> Array:
    """Return the transfer velocity of Edson et al. (2011), from direct covariance over the Southern Ocean.

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
    ``k660 = 5.4 + 0.029 U^3``. The data reach 18 m s-1. NaN in, NaN out.

    References
    ----------
    Edson et al. (2011). doi:10.1029/2011JC007022
    """
    still, _, _, cubic = EDSON_2011
    return still + cubic * wind_speed_10m_third_moment


BUTTERWORTH_MILLER_2016 = (1.3, 0.0, 0.245)  # cm h-1 per power of m s-1; Butterworth and Miller (2016)


@step(
    REFERENCE,
    method="butterworth-miller-2016",
    source=sources.BUTTERWORTH_MILLER_2016,
    equation="fit to direct covariance fluxes",
    formula="k660 = 1.3 + 0.245 <U^2>",
    supplies=reference(660.0),
    valid={"wind_speed_10m": (0.0, 15.0)},
    range_kind="data",
    water=SEA,
    wind_averaging="short",
    note="From open water and the ice zone of the Southern Ocean; the data reach a little over 15 m s-1.",
)
def butterworth_miller_2016(wind_speed_10m_second_moment: Array) -> Array:
    """Return the transfer velocity of Butterworth and Miller (2016), from direct covariance in the Southern Ocean.

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
    ``k660 = 1.3 + 0.245 U^2``. The data reach a little over 15 m s-1. NaN in, NaN out.

    References
    ----------
    Butterworth and Miller (2016). doi:10.1002/2016GL069581
    """
    still, _, quadratic = BUTTERWORTH_MILLER_2016
    return still + quadratic * wind_speed_10m_second_moment


YANG_2022 = (0.36, 1.203, 0.167)  # cm h-1 per power of m s-1; Yang et al. (2022), abstract
YANG_2022_FRICTION_VELOCITY = (1.47, 76.67, 20.48)  # cm h-1 per power of m s-1, friction velocity in the air
YANG_2022_SPREAD = relative_uncertainty(0.20, "standard deviation", "20 % standard deviation, 7 % standard error")


@step(
    REFERENCE,
    method="yang-2022",
    source=sources.YANG_2022,
    equation="abstract",
    formula="k660 = 0.36 + 1.203 <U> + 0.167 <U^2>",
    supplies=reference(660.0),
    valid={"wind_speed_10m": COMMON_RANGE},
    range_kind="common practice",
    uncertainty=YANG_2022_SPREAD,
    water=SEA,
    wind_averaging="short",
)
def yang_2022(wind_speed_10m: Array, wind_speed_10m_second_moment: Array) -> Array:
    """Return the transfer velocity of Yang et al. (2022), from many cruises with direct covariance, by wind speed.

    Parameters
    ----------
    wind_speed_10m : (...) array
        [m s-1]
    wind_speed_10m_second_moment : (...) array
        [m2 s-2]

    Returns
    -------
    (...) array
        Transfer velocity at a Schmidt number of 660. [cm h-1]

    Notes
    -----
    ``k660 = 0.36 + 1.203 U + 0.167 U^2``. No range is taken from the paper; 0 to 20 m s-1 is common practice. NaN in,
    NaN out.

    References
    ----------
    Yang et al. (2022), abstract. doi:10.3389/fmars.2022.826421
    """
    return moments(YANG_2022, wind_speed_10m, wind_speed_10m_second_moment)


@step(
    REFERENCE,
    method="yang-2022-friction-velocity",
    source=sources.YANG_2022,
    equation="abstract",
    formula="k660 = 1.47 + 76.67 u* + 20.48 u*^2, u* in the air",
    supplies=reference(660.0),
    valid={"friction_velocity_air": FRICTION_RANGE},
    range_kind="common practice",
    uncertainty=YANG_2022_SPREAD,
    water=SEA,
    wind_averaging="short",
    variant_of="yang-2022",
    note="Takes friction_velocity where it is sent, else that of the wind profile.",
)
def yang_2022_friction_velocity(friction_velocity_air: Array) -> Array:
    """Return the transfer velocity of Yang et al. (2022) by friction velocity.

    Parameters
    ----------
    friction_velocity_air : (...) array
        [m s-1]

    Returns
    -------
    (...) array
        Transfer velocity at a Schmidt number of 660. [cm h-1]

    Notes
    -----
    ``k660 = 1.47 + 76.67 u* + 20.48 u*^2``. NaN in, NaN out.

    References
    ----------
    Yang et al. (2022), abstract. doi:10.3389/fmars.2022.826421
    """
    return polynomial(YANG_2022_FRICTION_VELOCITY, friction_velocity_air)
