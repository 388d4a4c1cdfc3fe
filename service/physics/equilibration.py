"""How long the mixed layer takes to come into equilibrium with the air."""

import numpy as np

from service.physics.constants import LN_2, METRES_PER_DAY
from service.physics.declare import Array, Remark, step

SECONDS_PER_DAY = 86400.0

NO_OPEN_WATER = Remark(
    "no open water: nothing is exchanged, so there is no time",
    ("open_water_fraction",),
    lambda a: a == 0.0,
    flag=4,
)


@step(
    "equilibration_time",
    formula="1/tau = A K / (h storage_ratio) + decay_constant",
    remarks=(NO_OPEN_WATER,),
)
def equilibration_time(
    mixed_layer_depth: Array,
    open_water_fraction: Array,
    total_transfer_velocity: Array,
    storage_ratio: Array,
    decay_constant: Array,
) -> Array:
    """Return the e-folding time of a disequilibrium of the mixed layer.

    Parameters
    ----------
    mixed_layer_depth : (...) array
        [m]
    open_water_fraction : (...) array
        [1]
    total_transfer_velocity : (...) array
        [cm h-1]
    storage_ratio : (...) array
        Change of the stored substance over change of the dissolved gas. [1]
    decay_constant : (...) array
        Zero for a gas that does not decay. [s-1]

    Returns
    -------
    (...) array
        [d]

    Notes
    -----
    Common practice: k is about 3 m per day, so about 33 days for a column of 100 m.
    """
    velocity = open_water_fraction * total_transfer_velocity * METRES_PER_DAY
    by_exchange = mixed_layer_depth / velocity * storage_ratio
    return by_exchange / (1.0 + decay_constant * SECONDS_PER_DAY * by_exchange)


@step("half_time", formula="tau ln 2")
def half_time(equilibration_time: Array) -> Array:
    """Return the time in which a disequilibrium is halved.

    Parameters
    ----------
    equilibration_time : (...) array
        [d]

    Returns
    -------
    (...) array
        [d]
    """
    return equilibration_time * LN_2


@step("time_to_fraction", formula="-tau ln(1 - fraction)")
def time_to_fraction(equilibration_time: Array, fraction: Array) -> Array:
    """Return the time in which a fraction of a disequilibrium is gone.

    Parameters
    ----------
    equilibration_time : (...) array
        [d]
    fraction : (...) array
        [1]

    Returns
    -------
    (...) array
        [d]
    """
    return np.asarray(-equilibration_time * np.log1p(-fraction))
