"""Schmidt numbers as polynomials in temperature, linear in salinity between fresh water and sea water."""

from typing import NamedTuple

import numpy as np

from service.physics import sources
from service.physics.declare import Array, step
from service.physics.polynomial import polynomial
from service.physics.seawater import BRACKISH_LIMIT

SEA_SALINITY = 35.0  # 1, the salinity of the sea-water rows
SEA_ONLY = {"salinity": (SEA_SALINITY, 40.0)}  # the range of a method that prints no fresh-water row
FRESH_ONLY = {"salinity": (0.0, BRACKISH_LIMIT)}  # the range of one that prints no sea-water row


class Rows(NamedTuple):
    """The sea-water (salinity 35) and fresh-water rows of a table: ascending powers of temperature [degC].

    None stands for a row that the authors do not print; at least one is there.
    """

    sea: tuple[float, ...] | None
    fresh: tuple[float, ...] | None


def between(rows: Rows, water_temperature: Array, salinity: Array) -> Array:
    """Return the Schmidt number, linear in salinity between the two rows.

    Without a fresh-water row there is no number (NaN) below salinity 35, and without a sea-water row none from salinity
    2 upwards: two authors are never joined.

    Parameters
    ----------
    rows : Rows
        As printed, signs included.
    water_temperature : (...) array
        [degC]
    salinity : (...) array
        Practical salinity. [1]

    Returns
    -------
    (...) array
        [1]
    """
    sea, fresh = rows
    if sea is None or fresh is None:
        alone = polynomial(sea or fresh or (np.nan,), water_temperature)
        offered = salinity >= SEA_SALINITY if fresh is None else salinity < BRACKISH_LIMIT
        return np.where(offered, alone, np.nan)
    of_fresh_water = polynomial(fresh, water_temperature)
    of_sea_water = polynomial(sea, water_temperature)
    return of_fresh_water + (of_sea_water - of_fresh_water) * (salinity / SEA_SALINITY)


@step(
    "schmidt_number",
    method="wanninkhof-2014",
    source=sources.WANNINKHOF_2014,
    equation="Table 1",
    formula="Sc = A + B t + C t^2 + D t^3 + E t^4; linear in salinity from 0 to 35",
    valid={"water_temperature": (-2.0, 40.0), "salinity": (0.0, 40.0)},
)
def wanninkhof_2014(coefficients: Rows, water_temperature: Array, salinity: Array) -> Array:
    """Return the Schmidt number after Wanninkhof (2014).

    Parameters
    ----------
    coefficients : Rows
        [1]
    water_temperature : (...) array
        [degC]
    salinity : (...) array
        Practical salinity. [1]

    Returns
    -------
    (...) array
        [1]

    Notes
    -----
    Printed for salinity 35 and 0 and -2 to 40 degC; linear in between is common practice. NaN in, NaN out.

    References
    ----------
    Wanninkhof (2014), Table 1. doi:10.4319/lom.2014.12.351
    """
    return between(coefficients, water_temperature, salinity)


@step(
    "schmidt_number",
    method="wanninkhof-1992",
    source=sources.WANNINKHOF_1992,
    equation="Table A1",
    formula="Sc = A - B t + C t^2 - D t^3; linear in salinity from 0 to 35",
    valid={"water_temperature": (0.0, 30.0), "salinity": (0.0, 40.0)},
)
def wanninkhof_1992(coefficients: Rows, water_temperature: Array, salinity: Array) -> Array:
    """Return the Schmidt number after Wanninkhof (1992).

    Parameters
    ----------
    coefficients : Rows
        [1]
    water_temperature : (...) array
        [degC]
    salinity : (...) array
        Practical salinity. [1]

    Returns
    -------
    (...) array
        [1]

    Notes
    -----
    Printed for salinity 35 and 0 and 0 to 30 degC; linear in between is common practice. NaN in, NaN out.

    References
    ----------
    Wanninkhof (1992), Table A1. doi:10.1029/92JC00188
    """
    return between(coefficients, water_temperature, salinity)


@step(
    "schmidt_number",
    method="keeling-1998",
    source=sources.KEELING_1998,
    equation="the cubic for oxygen",
    formula="Sc = A - B t + C t^2 - D t^3",
    valid={"water_temperature": (0.0, 30.0)},
    range_kind="common practice",
    note="for sea water of salinity 35; the authors' range could not be confirmed",
)
def keeling_1998(coefficients: Rows, water_temperature: Array, salinity: Array) -> Array:
    """Return the Schmidt number of oxygen in sea water after Keeling et al. (1998).

    Parameters
    ----------
    coefficients : Rows
        [1]
    water_temperature : (...) array
        [degC]
    salinity : (...) array
        Practical salinity. [1]

    Returns
    -------
    (...) array
        [1]

    Notes
    -----
    From 0 to 30 degC by common practice. NaN in, NaN out.

    References
    ----------
    Keeling et al. (1998). doi:10.1029/97GB02339
    """
    return between(coefficients, water_temperature, salinity)


@step(
    "schmidt_number",
    method="saltzman-1993",
    source=sources.SALTZMAN_1993,
    equation="the cubic for sea water",
    formula="Sc = A - B t + C t^2 - D t^3",
    valid={"water_temperature": (5.0, 30.0)},
    range_kind="data",
    note="for sea water of salinity 35; range from memory",
)
def saltzman_1993(coefficients: Rows, water_temperature: Array, salinity: Array) -> Array:
    """Return the Schmidt number of dimethyl sulphide in sea water after Saltzman et al. (1993).

    Parameters
    ----------
    coefficients : Rows
        [1]
    water_temperature : (...) array
        [degC]
    salinity : (...) array
        Practical salinity. [1]

    Returns
    -------
    (...) array
        [1]

    Notes
    -----
    Measured from 5 to 30 degC (from memory). NaN in, NaN out.

    References
    ----------
    Saltzman et al. (1993). doi:10.1029/93JC01858
    """
    return between(coefficients, water_temperature, salinity)


@step(
    "schmidt_number",
    method="king-saltzman-1995",
    source=sources.KING_SALTZMAN_1995,
    equation="the cubic for sea water",
    formula="Sc = A - B t + C t^2 - D t^3",
    valid={"water_temperature": (5.0, 25.0)},
    range_kind="data",
    note="for sea water of salinity 35; range from memory",
)
def king_saltzman_1995(coefficients: Rows, water_temperature: Array, salinity: Array) -> Array:
    """Return the Schmidt number of sulphur hexafluoride in sea water after King and Saltzman (1995).

    Parameters
    ----------
    coefficients : Rows
        [1]
    water_temperature : (...) array
        [degC]
    salinity : (...) array
        Practical salinity. [1]

    Returns
    -------
    (...) array
        [1]

    Notes
    -----
    Measured from 5 to 25 degC (from memory). NaN in, NaN out.

    References
    ----------
    King and Saltzman (1995). doi:10.1029/94JC03313
    """
    return between(coefficients, water_temperature, salinity)


@step(
    "schmidt_number",
    method="zheng-1998",
    source=sources.ZHENG_1998,
    equation="the cubics for sea water",
    formula="Sc = A - B t + C t^2 - D t^3",
    valid={"water_temperature": (0.0, 30.0)},
    range_kind="data",
    note="for sea water of salinity 35; range from memory",
)
def zheng_1998(coefficients: Rows, water_temperature: Array, salinity: Array) -> Array:
    """Return the Schmidt number of chlorofluorocarbon 11 or 12 in sea water after Zheng et al. (1998).

    Parameters
    ----------
    coefficients : Rows
        [1]
    water_temperature : (...) array
        [degC]
    salinity : (...) array
        Practical salinity. [1]

    Returns
    -------
    (...) array
        [1]

    Notes
    -----
    Measured from 0 to 30 degC (from memory). NaN in, NaN out.

    References
    ----------
    Zheng et al. (1998). doi:10.1029/97JC02761
    """
    return between(coefficients, water_temperature, salinity)


@step(
    "schmidt_number",
    method="raymond-2012",
    source=sources.RAYMOND_2012,
    equation="Table 1",
    formula="Sc = A + B t + C t^2 + D t^3",
    valid={"water_temperature": (4.0, 35.0)},
    note="for fresh water",
)
def raymond_2012(coefficients: Rows, water_temperature: Array, salinity: Array) -> Array:
    """Return the Schmidt number of a gas in fresh water after Raymond et al. (2012), Table 1.

    Parameters
    ----------
    coefficients : Rows
        [1]
    water_temperature : (...) array
        [degC]
    salinity : (...) array
        Practical salinity. [1]

    Returns
    -------
    (...) array
        [1]

    Notes
    -----
    From 4 to 35 degC. For co2 it gives 625 at 20 degC, not 600. NaN in, NaN out.

    References
    ----------
    Raymond et al. (2012), Table 1. doi:10.1215/21573689-1597669
    """
    return between(coefficients, water_temperature, salinity)
