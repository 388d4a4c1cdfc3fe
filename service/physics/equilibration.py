"""How long the mixed layer takes to come into equilibrium with the air, and what is left of a disequilibrium."""

import numpy as np

from service.physics.constants import LN_2, METRES_PER_DAY, SECONDS_PER_DAY
from service.physics.declare import Array, Remark, step
from service.physics.series import gaps_until, in_place, over_time, together

NO_OPEN_WATER = Remark(
    "no open water: nothing is exchanged, so there is no time",
    ("open_water_fraction",),
    lambda a: a == 0.0,
    flag=4,
)
GAP_BEFORE = Remark(
    "a gap of more than three median spacings lies before it and is bridged from its neighbours",
    ("gaps_before",),
    lambda gaps: gaps > 0.0,
)


@step("equilibration_rate", formula="A K / (h storage_ratio) + decay_constant + ventilation_rate")
def equilibration_rate(
    mixed_layer_depth: Array,
    open_water_fraction: Array,
    total_transfer_velocity: Array,
    storage_ratio: Array,
    decay_constant: Array,
    ventilation_rate: Array,
) -> Array:
    """Return the part of a disequilibrium that is lost in a unit of time.

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
    ventilation_rate : (...) array
        Part of the layer replaced from below with water at equilibrium. [d-1]

    Returns
    -------
    (...) array
        [d-1]
    """
    velocity = open_water_fraction * total_transfer_velocity * METRES_PER_DAY
    by_exchange = velocity / (mixed_layer_depth * storage_ratio)
    return by_exchange + decay_constant * SECONDS_PER_DAY + ventilation_rate


@step("equilibration_time", formula="tau = 1 / equilibration_rate", remarks=(NO_OPEN_WATER,))
def equilibration_time(equilibration_rate: Array) -> Array:
    """Return the e-folding time of a disequilibrium of the mixed layer.

    Parameters
    ----------
    equilibration_rate : (...) array
        [d-1]

    Returns
    -------
    (...) array
        [d]

    Notes
    -----
    Common practice: k is about 3 m per day, so about 33 days for a column of 100 m.
    """
    return 1.0 / equilibration_rate


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


@step(
    "disequilibrium",
    method="linear",
    way="times",
    formula="exp(-t equilibration_rate)",
    remarks=(NO_OPEN_WATER,),
)
def disequilibrium_by_then(equilibration_rate: Array, times: Array) -> Array:
    """Return what is left of a disequilibrium at some times from the beginning, all else unchanged.

    Parameters
    ----------
    equilibration_rate : (...) array
        [d-1]
    times : (times, 1) array
        [d]

    Returns
    -------
    (times, ...) array
        [1]
    """
    return np.asarray(np.exp(-times * equilibration_rate))


@step("gaps_before", formula="spacings of more than three median ones")
def gaps_before(time: Array, equilibration_rate: Array) -> Array:
    """Return how many gaps lie between the first sample with a rate and each other one.

    Parameters
    ----------
    time : (samples,) array
        Increasing; NaN where missing. [d]
    equilibration_rate : (...) array
        [d-1]

    Returns
    -------
    (samples,) array
        [1]
    """
    complete, moment, _ = together(time, equilibration_rate)
    return in_place(complete, gaps_until(moment) if moment.size else moment)


@step(
    "disequilibrium",
    method="linear",
    way="time",
    formula="exp(-int equilibration_rate dt) since the first sample",
    remarks=(GAP_BEFORE,),
)
def disequilibrium_since(time: Array, equilibration_rate: Array) -> Array:
    """Return what is left at each sample of a disequilibrium at the first one.

    Parameters
    ----------
    time : (samples,) array
        Increasing; NaN where missing. [d]
    equilibration_rate : (...) array
        Each holds half-way to its neighbours. [d-1]

    Returns
    -------
    (samples,) array
        [1]

    Notes
    -----
    The decay under a rate that holds is integrated exactly, so that the number of samples in a time without change
    does not matter. A sample without a rate has no result and is bridged from its neighbours. What sets the rate, the
    air side and the temperature among it, may change; the disequilibrium is that of the first sample carried on.
    """
    complete, moment, (rate,) = together(time, equilibration_rate)
    return in_place(complete, np.exp(-over_time(moment, rate)) if moment.size else moment)
