"""Schmidt numbers as polynomials in temperature, linear in salinity between fresh water and sea water."""

from typing import NamedTuple

import numpy as np

from service.physics import sources
from service.physics.declare import Array, step
from service.physics.polynomial import polynomial

SEA_SALINITY = 35.0  # 1, the salinity of the sea-water rows


class Rows(NamedTuple):
    """The sea-water (salinity 35) and fresh-water rows of a table: ascending powers of temperature [degC]."""

    sea: tuple[float, ...]
    fresh: tuple[float, ...] | None


def between(rows: Rows, water_temperature: Array, salinity: Array) -> Array:
    """Return the Schmidt number, linear in salinity between the two rows.

    Without a fresh-water row there is no number (NaN) below salinity 35: two authors are never joined.

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
    sea = polynomial(rows.sea, water_temperature)
    if rows.fresh is None:
        return np.where(salinity >= SEA_SALINITY, sea, np.nan)
    fresh = polynomial(rows.fresh, water_temperature)
    return fresh + (sea - fresh) * (salinity / SEA_SALINITY)


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
