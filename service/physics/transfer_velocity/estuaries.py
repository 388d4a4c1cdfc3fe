"""Transfer velocities of estuaries, from wind and tidal currents."""

import numpy as np

from service.physics import sources
from service.physics.declare import Array, step
from service.physics.transfer_velocity.reference import COMMON_RANGE, REFERENCE, reference
from service.physics.transfer_velocity.scaling import set_negative_to_zero

CENTIMETRES = 100.0  # cm in a metre: the papers take currents in cm s-1

BORGES_2004 = (1.0, 1.719, 2.58)  # cm h-1; with (cm s-1)^0.5 m^-0.5; with m s-1; Borges et al. (2004)


@step(
    REFERENCE,
    method="borges-2004",
    source=sources.BORGES_2004,
    equation="sum of a current and a wind term",
    formula="k600 = 1.0 + 1.719 w^0.5 h^-0.5 + 2.58 U, w in cm s-1",
    supplies=reference(600.0),
    valid={"wind_speed_10m": COMMON_RANGE},
    range_kind="common practice",
    water=("estuary",),
    wind_averaging="short",
)
def borges_2004(wind_speed_10m: Array, flow_velocity: Array, water_depth: Array) -> Array:
    """Return the transfer velocity of Borges et al. (2004) for a tidal estuary.

    Parameters
    ----------
    wind_speed_10m : (...) array
        [m s-1]
    flow_velocity : (...) array
        Of the current. [m s-1]
    water_depth : (...) array
        [m]

    Returns
    -------
    (...) array
        Transfer velocity at a Schmidt number of 600. [cm h-1]

    Notes
    -----
    ``k600 = 1.0 + 1.719 w^0.5 h^-0.5 + 2.58 U`` with w in cm s-1; copies with ``h^+0.5`` are misprints. No range is
    stated; 0 to 20 m s-1 is common practice. NaN in, NaN out.

    References
    ----------
    Borges et al. (2004). doi:10.1007/BF02907647
    """
    still, of_current, of_wind = BORGES_2004
    current = np.sqrt(CENTIMETRES * flow_velocity / water_depth)
    return still + of_current * current + of_wind * wind_speed_10m


RAYMOND_COLE_2001 = (1.91, 0.35)  # cm h-1, per m s-1; Raymond and Cole (2001)


@step(
    REFERENCE,
    method="raymond-cole-2001",
    source=sources.RAYMOND_COLE_2001,
    equation="exponential fit to published values",
    formula="k600 = 1.91 exp(0.35 U)",
    supplies=reference(600.0),
    valid={"wind_speed_10m": COMMON_RANGE},
    range_kind="common practice",
    water=("estuary",),
    wind_averaging="short",
)
def raymond_cole_2001(wind_speed_10m: Array) -> Array:
    """Return the transfer velocity of Raymond and Cole (2001) for estuaries.

    Parameters
    ----------
    wind_speed_10m : (...) array
        [m s-1]

    Returns
    -------
    (...) array
        Transfer velocity at a Schmidt number of 600. [cm h-1]

    Notes
    -----
    ``k600 = 1.91 exp(0.35 U)``. No range is stated; 0 to 20 m s-1 is common practice, but an exponential fitted to
    weak winds leads far out there. NaN in, NaN out.

    References
    ----------
    Raymond and Cole (2001). doi:10.2307/1352954
    """
    coefficient, rate = RAYMOND_COLE_2001
    return coefficient * np.exp(rate * wind_speed_10m)


HO_2016 = (0.77, 0.266)  # cm h-1 with (cm s-1)^0.5 m^-0.5; cm h-1 (m s-1)-2; Ho et al. (2016)


@step(
    REFERENCE,
    method="ho-2016",
    source=sources.HO_2016,
    equation="sum of a current and a wind term",
    formula="k600 = 0.77 v^0.5 h^-0.5 + 0.266 <U^2>, v in cm s-1",
    supplies=reference(600.0),
    valid={"wind_speed_10m": COMMON_RANGE},
    range_kind="common practice",
    water=("estuary",),
    wind_averaging="short",
    note="The unit of the current is from memory.",
)
def ho_2016(wind_speed_10m_second_moment: Array, flow_velocity: Array, water_depth: Array) -> Array:
    """Return the transfer velocity of Ho et al. (2016) for a shallow estuary.

    Parameters
    ----------
    wind_speed_10m_second_moment : (...) array
        [m2 s-2]
    flow_velocity : (...) array
        Of the current. [m s-1]
    water_depth : (...) array
        [m]

    Returns
    -------
    (...) array
        Transfer velocity at a Schmidt number of 600. [cm h-1]

    Notes
    -----
    ``k600 = 0.77 v^0.5 h^-0.5 + 0.266 U^2`` with v in cm s-1. No range is stated; 0 to 20 m s-1 is common practice.
    NaN in, NaN out.

    References
    ----------
    Ho et al. (2016). doi:10.1002/2016GL068727
    """
    of_current, of_wind = HO_2016
    return of_current * np.sqrt(CENTIMETRES * flow_velocity / water_depth) + of_wind * wind_speed_10m_second_moment


ROSENTRETER_2017_CO2 = (-0.08, 0.26, 0.83, 0.59)  # cm h-1; with cm s-1; with m s-1; with m; Rosentreter et al. (2017)
ROSENTRETER_2017_CH4 = (-1.07, 0.36, 0.99, 0.87)  # the same, fitted to methane


def _rosentreter_2017(coefficients: tuple[float, ...], wind: Array, current: Array, depth: Array) -> Array:
    still, of_current, of_wind, of_depth = coefficients
    return still + of_current * (CENTIMETRES * current) + of_wind * wind + of_depth * depth


@step(
    REFERENCE,
    method="rosentreter-2017-co2",
    source=sources.ROSENTRETER_2017,
    equation="regression for carbon dioxide",
    formula="k600 = -0.08 + 0.26 v + 0.83 U + 0.59 h, v in cm s-1",
    supplies=reference(600.0),
    valid={"wind_speed_10m": COMMON_RANGE},
    range_kind="common practice",
    water=("estuary",),
    wind_averaging="short",
    gases=("co2",),
    note="Of mangrove estuaries, fitted to carbon dioxide. The unit of the current is from memory.",
)
def rosentreter_2017_co2(wind_speed_10m: Array, flow_velocity: Array, water_depth: Array) -> Array:
    """Return the transfer velocity of carbon dioxide in mangrove estuaries by Rosentreter et al. (2017).

    Parameters
    ----------
    wind_speed_10m : (...) array
        [m s-1]
    flow_velocity : (...) array
        Of the current. [m s-1]
    water_depth : (...) array
        [m]

    Returns
    -------
    (...) array
        Transfer velocity at a Schmidt number of 600. [cm h-1]

    Notes
    -----
    ``k600 = -0.08 + 0.26 v + 0.83 U + 0.59 h`` with v in cm s-1. No range is stated; 0 to 20 m s-1 is common practice.
    NaN in, NaN out.

    References
    ----------
    Rosentreter et al. (2017). doi:10.1002/lno.10444
    """
    return _rosentreter_2017(ROSENTRETER_2017_CO2, wind_speed_10m, flow_velocity, water_depth)


@step(
    REFERENCE,
    method="rosentreter-2017-ch4",
    source=sources.ROSENTRETER_2017,
    equation="regression for methane",
    formula="k600 = -1.07 + 0.36 v + 0.99 U + 0.87 h, v in cm s-1",
    supplies=reference(600.0),
    valid={"wind_speed_10m": COMMON_RANGE},
    range_kind="common practice",
    water=("estuary",),
    wind_averaging="short",
    gases=("ch4",),
    note="Of mangrove estuaries, fitted to methane. The unit of the current is from memory.",
)
def rosentreter_2017_ch4(wind_speed_10m: Array, flow_velocity: Array, water_depth: Array) -> Array:
    """Return the transfer velocity of methane in mangrove estuaries by Rosentreter et al. (2017).

    Parameters
    ----------
    wind_speed_10m : (...) array
        [m s-1]
    flow_velocity : (...) array
        Of the current. [m s-1]
    water_depth : (...) array
        [m]

    Returns
    -------
    (...) array
        Transfer velocity at a Schmidt number of 600. [cm h-1]

    Notes
    -----
    ``k600 = -1.07 + 0.36 v + 0.99 U + 0.87 h`` with v in cm s-1. No range is stated; 0 to 20 m s-1 is common practice.
    NaN in, NaN out.

    References
    ----------
    Rosentreter et al. (2017). doi:10.1002/lno.10444
    """
    return _rosentreter_2017(ROSENTRETER_2017_CH4, wind_speed_10m, flow_velocity, water_depth)


set_negative_to_zero("rosentreter-2017-co2", gases=("co2",))
set_negative_to_zero("rosentreter-2017-ch4", gases=("ch4",))
