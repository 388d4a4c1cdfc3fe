"""Transfer velocities of lakes."""

import numpy as np

from service.physics import sources
from service.physics.declare import Array, step
from service.physics.transfer_velocity.ocean import COMMON_RANGE, REFERENCE, SQUARE_ROOT

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


for _method in ("cole-caraco-1998",):
    step("schmidt_exponent", method=_method)(lake_schmidt_exponent)
