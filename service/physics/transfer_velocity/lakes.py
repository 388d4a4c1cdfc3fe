"""Transfer velocities of lakes."""

import numpy as np

from service.physics import sources
from service.physics.declare import Array, step
from service.physics.polynomial import polynomial
from service.physics.transfer_velocity.reference import COMMON_RANGE, REFERENCE, SQUARE_ROOT, reference
from service.physics.transfer_velocity.scaling import set_negative_to_zero

LAKE_TRANSITION = 3.7  # m s-1, where the Schmidt exponent changes; from memory
SMOOTH = 2.0 / 3.0  # Schmidt exponent of a smooth surface


def lake_schmidt_exponent(wind_speed_10m: Array) -> Array:
    """Return the Schmidt exponent of a lake: 2/3 below 3.7 m s-1, 1/2 above.

    Parameters
    ----------
    wind_speed_10m : (...) array
        [m s-1]

    Returns
    -------
    (...) array
        [1]
    """
    return np.where(wind_speed_10m < LAKE_TRANSITION, SMOOTH, SQUARE_ROOT)


COLE_CARACO_1998 = (2.07, 0.215, 1.7)  # cm h-1, cm h-1 (m s-1)-1.7, 1; Cole and Caraco (1998)


@step(
    REFERENCE,
    method="cole-caraco-1998",
    source=sources.COLE_CARACO_1998,
    equation="fit to all lakes",
    formula="k600 = 2.07 + 0.215 U^1.7; n = 2/3 (U < 3.7), 1/2",
    supplies={"reference_schmidt_number": 600.0},
    valid={"wind_speed_10m": COMMON_RANGE},
    range_kind="common practice",
    water=("lake",),
    wind_averaging="short",
    note="Fitted mostly to low winds over small lakes.",
)
def cole_caraco_1998(wind_speed_10m: Array) -> Array:
    """Return the transfer velocity of Cole and Caraco (1998) for small lakes at low wind.

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
    ``k600 = 2.07 + 0.215 U^1.7``. No range is stated; 0 to 20 m s-1 is common practice, though the data are mostly of
    low winds. NaN in, NaN out.

    References
    ----------
    Cole and Caraco (1998). doi:10.4319/lo.1998.43.4.0647
    """
    still, slope, exponent = COLE_CARACO_1998
    return still + slope * wind_speed_10m**exponent


CRUSIUS_WANNINKHOF_2003_POWER = (0.168, 0.228, 2.2)  # cm h-1, cm h-1 (m s-1)-2.2, 1; Crusius and Wanninkhof (2003)


@step(
    REFERENCE,
    method="crusius-wanninkhof-2003-power",
    source=sources.CRUSIUS_WANNINKHOF_2003,
    equation="power fit",
    formula="k600 = 0.168 + 0.228 U^2.2; n = 2/3 (U < 3.7), 1/2",
    supplies={"reference_schmidt_number": 600.0},
    valid={"wind_speed_10m": COMMON_RANGE},
    range_kind="common practice",
    water=("lake",),
    wind_averaging="short",
)
def crusius_wanninkhof_2003_power(wind_speed_10m: Array) -> Array:
    """Return the transfer velocity of Crusius and Wanninkhof (2003) for a small lake, as a power of wind speed.

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
    ``k600 = 0.168 + 0.228 U^2.2``. No range is stated; 0 to 20 m s-1 is common practice. NaN in, NaN out.

    References
    ----------
    Crusius and Wanninkhof (2003). doi:10.4319/lo.2003.48.3.1010
    """
    still, slope, exponent = CRUSIUS_WANNINKHOF_2003_POWER
    return still + slope * wind_speed_10m**exponent


CRUSIUS_WANNINKHOF_2003_LOW = (0.0, 0.72)  # cm h-1 and cm h-1 (m s-1)-1, below 3.7 m s-1
CRUSIUS_WANNINKHOF_2003_HIGH = (-13.3, 4.33)  # the same, from 3.7 m s-1


@step(
    REFERENCE,
    method="crusius-wanninkhof-2003-bilinear",
    source=sources.CRUSIUS_WANNINKHOF_2003,
    equation="bilinear fit",
    formula="k600 = 0.72 U (U < 3.7), 4.33 U - 13.3; n = 2/3 (U < 3.7), 1/2",
    supplies={"reference_schmidt_number": 600.0},
    valid={"wind_speed_10m": COMMON_RANGE},
    range_kind="common practice",
    water=("lake",),
    wind_averaging="short",
    variant_of="crusius-wanninkhof-2003-power",
)
def crusius_wanninkhof_2003_bilinear(wind_speed_10m: Array) -> Array:
    """Return the transfer velocity of Crusius and Wanninkhof (2003) for a small lake, linear in two parts.

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
    ``k600 = 0.72 U`` below 3.7 m s-1, ``4.33 U - 13.3`` from there. No range is stated; 0 to 20 m s-1 is common
    practice. NaN in, NaN out.

    References
    ----------
    Crusius and Wanninkhof (2003). doi:10.4319/lo.2003.48.3.1010
    """
    low = polynomial(CRUSIUS_WANNINKHOF_2003_LOW, wind_speed_10m)
    high = polynomial(CRUSIUS_WANNINKHOF_2003_HIGH, wind_speed_10m)
    return np.where(wind_speed_10m < LAKE_TRANSITION, low, high)


CRUSIUS_WANNINKHOF_2003_CONSTANT = 1.0  # cm h-1, below 3.7 m s-1; Crusius and Wanninkhof (2003)
CRUSIUS_WANNINKHOF_2003_LINEAR = (-17.9, 5.14)  # cm h-1 and cm h-1 (m s-1)-1, from 3.7 m s-1


@step(
    REFERENCE,
    method="crusius-wanninkhof-2003-constant-linear",
    source=sources.CRUSIUS_WANNINKHOF_2003,
    equation="constant and linear fit",
    formula="k600 = 1.0 (U < 3.7), 5.14 U - 17.9; n = 2/3 (U < 3.7), 1/2",
    supplies={"reference_schmidt_number": 600.0},
    valid={"wind_speed_10m": COMMON_RANGE},
    range_kind="common practice",
    water=("lake",),
    wind_averaging="short",
    variant_of="crusius-wanninkhof-2003-power",
)
def crusius_wanninkhof_2003_constant_linear(wind_speed_10m: Array) -> Array:
    """Return the transfer velocity of Crusius and Wanninkhof (2003) for a small lake, constant and then linear.

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
    ``k600 = 1.0`` below 3.7 m s-1, ``5.14 U - 17.9`` from there. No range is stated; 0 to 20 m s-1 is common
    practice. NaN in, NaN out.

    References
    ----------
    Crusius and Wanninkhof (2003). doi:10.4319/lo.2003.48.3.1010
    """
    high = polynomial(CRUSIUS_WANNINKHOF_2003_LINEAR, wind_speed_10m)
    return np.where(wind_speed_10m >= LAKE_TRANSITION, high, CRUSIUS_WANNINKHOF_2003_CONSTANT + 0.0 * wind_speed_10m)


VACHON_PRAIRIE_2013 = (
    2.51,
    1.48,
    0.39,
)  # cm h-1, cm h-1 (m s-1)-1, the same per decade of area; Vachon and Prairie (2013)


@step(
    REFERENCE,
    method="vachon-prairie-2013",
    source=sources.VACHON_PRAIRIE_2013,
    equation="model of wind speed and lake area",
    formula="k600 = 2.51 + 1.48 U + 0.39 U log10(area in km2); n = 2/3 (U < 3.7), 1/2",
    supplies={"reference_schmidt_number": 600.0},
    valid={"wind_speed_10m": COMMON_RANGE},
    range_kind="common practice",
    water=("lake",),
    wind_averaging="short",
    note="Standard errors of the coefficients: 0.99, 0.34, 0.08.",
)
def vachon_prairie_2013(wind_speed_10m: Array, lake_area: Array) -> Array:
    """Return the transfer velocity of Vachon and Prairie (2013), by wind speed and the area of the lake.

    Parameters
    ----------
    wind_speed_10m : (...) array
        [m s-1]
    lake_area : (...) array
        Of the surface of the lake. [km2]

    Returns
    -------
    (...) array
        Transfer velocity at a Schmidt number of 600. [cm h-1]

    Notes
    -----
    ``k600 = 2.51 (+- 0.99) + 1.48 (+- 0.34) U + 0.39 (+- 0.08) U log10(area)``. Below an area of about 2e-4 km2 it
    falls with rising wind. No range is stated; 0 to 20 m s-1 is common practice. NaN in, NaN out.

    References
    ----------
    Vachon and Prairie (2013). doi:10.1139/cjfas-2013-0241
    """
    still, slope, by_area = VACHON_PRAIRIE_2013
    return still + slope * wind_speed_10m + by_area * wind_speed_10m * np.log10(lake_area)


MACINTYRE_2010_COMBINED = (0.16, 2.25)  # cm h-1 and cm h-1 (m s-1)-1; MacIntyre et al. (2010)


@step(
    REFERENCE,
    method="macintyre-2010-combined",
    source=sources.MACINTYRE_2010,
    equation="fit to all data",
    formula="k600 = 2.25 U + 0.16",
    supplies=reference(600.0),
    valid={"wind_speed_10m": COMMON_RANGE},
    range_kind="common practice",
    water=("lake",),
    wind_averaging="short",
)
def macintyre_2010_combined(wind_speed_10m: Array) -> Array:
    """Return the transfer velocity of MacIntyre et al. (2010) for a lake, whatever the heat flux.

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
    ``k600 = 2.25 U + 0.16``. No range is stated; 0 to 20 m s-1 is common practice. NaN in,
    NaN out.

    References
    ----------
    MacIntyre et al. (2010). doi:10.1029/2010GL044164
    """
    return polynomial(MACINTYRE_2010_COMBINED, wind_speed_10m)


MACINTYRE_2010_COOLING = (2.0, 2.04)  # cm h-1 and cm h-1 (m s-1)-1; MacIntyre et al. (2010)


@step(
    REFERENCE,
    method="macintyre-2010-cooling",
    source=sources.MACINTYRE_2010,
    equation="cooling fit",
    formula="k600 = 2.04 U + 2.0",
    supplies=reference(600.0),
    valid={"wind_speed_10m": COMMON_RANGE},
    range_kind="common practice",
    water=("lake",),
    wind_averaging="short",
    variant_of="macintyre-2010-combined",
)
def macintyre_2010_cooling(wind_speed_10m: Array) -> Array:
    """Return the transfer velocity of MacIntyre et al. (2010) for a lake, while the lake loses heat.

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
    ``k600 = 2.04 U + 2.0``. No range is stated; 0 to 20 m s-1 is common practice. NaN in,
    NaN out.

    References
    ----------
    MacIntyre et al. (2010). doi:10.1029/2010GL044164
    """
    return polynomial(MACINTYRE_2010_COOLING, wind_speed_10m)


MACINTYRE_2010_HEATING = (-0.15, 1.74)  # cm h-1 and cm h-1 (m s-1)-1; MacIntyre et al. (2010)


@step(
    REFERENCE,
    method="macintyre-2010-heating",
    source=sources.MACINTYRE_2010,
    equation="heating fit",
    formula="k600 = 1.74 U - 0.15",
    supplies=reference(600.0),
    valid={"wind_speed_10m": COMMON_RANGE},
    range_kind="common practice",
    water=("lake",),
    wind_averaging="short",
    variant_of="macintyre-2010-combined",
)
def macintyre_2010_heating(wind_speed_10m: Array) -> Array:
    """Return the transfer velocity of MacIntyre et al. (2010) for a lake, while the lake gains heat.

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
    ``k600 = 1.74 U - 0.15``. Below 0.09 m s-1 it is negative. No range is stated; 0 to 20 m s-1 is common
    practice. NaN in, NaN out.

    References
    ----------
    MacIntyre et al. (2010). doi:10.1029/2010GL044164
    """
    return polynomial(MACINTYRE_2010_HEATING, wind_speed_10m)


for _method in (
    "cole-caraco-1998",
    "crusius-wanninkhof-2003-power",
    "crusius-wanninkhof-2003-bilinear",
    "crusius-wanninkhof-2003-constant-linear",
    "vachon-prairie-2013",
):
    step("schmidt_exponent", method=_method)(lake_schmidt_exponent)

set_negative_to_zero("vachon-prairie-2013", "macintyre-2010-heating")
