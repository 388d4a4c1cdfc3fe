"""The transfer velocity that a gas in the mixed layer remembers, from the winds before it was measured.

A gas that biology makes leaves the layer over weeks, so that its amount answers to the winds of those weeks, each the
less the more of the layer has been ventilated since. The biological oxygen flux follows from it: at steady state, what
biology adds is what leaves through the surface. Argon dissolves like oxygen but is untouched by biology, so the ratio
of the two, measured against that at air equilibrium, leaves the biological part::

    biological oxygen flux = k Ceq(O2) D(O2/Ar),   D(O2/Ar) = (O2/Ar) / (O2/Ar)eq - 1

with k the `weighted_transfer_velocity` and Ceq the `equilibrium_concentration` of o2. Worked, with invented numbers: k
of 15 cm/h is 3.6 m/d; Ceq of 250 umol/kg times 1.025 kg/L is 256 mmol/m3; a D(O2/Ar) of 0.020 then gives
3.6 x 256 x 0.020 = 18.4 mmol of oxygen per square metre and day, out of the water, so that at least as much was
produced net. It is blind to oxygen mixed up from below, and holds only as far as the `ventilated_fraction` is near 1.

How a series is read. Times increase. A sample without a number is left out and the time is bridged from its
neighbours; a spacing of more than three median ones is bridged as well, and every sample that remembers it is flagged
3. With reuer-2007 a sample stands for the time since the one before it, with teeter-2018 half-way to its neighbours.
Under ice the velocity counts with the open fraction. A standard uncertainty of an input is taken as an error that all
samples of the series share.
"""

import numpy as np
from numpy.typing import NDArray

from service.physics import sources
from service.physics.constants import METRES_PER_DAY
from service.physics.declare import Array, Remark, step
from service.physics.series import gaps_until, in_place, over_time, together

Places = NDArray[np.intp]

MEMORY = 60.0  # d; Reuer et al. (2007)
WHOLE_LAYER = 700.0  # e-foldings that stand for a layer exchanged whole: exp(-700) is 0 but for 1e-304
REACH = 500.0  # e-foldings that one scan spans: exp(500) times any number of days is still a number
REMEMBERED = 4.6  # exchanges after which 99 percent of the layer has been ventilated

SHORT_MEMORY = Remark(
    "the series reaches back less than the memory of 60 d and less than 99 % of the layer was ventilated in that time",
    ("memory_length", "memory_exchange"),
    lambda length, exchange: (length < MEMORY) & (exchange < REMEMBERED),
)
GAP_IN_MEMORY = Remark(
    "a gap of more than three median spacings lies in the memory and is bridged from its neighbours",
    ("memory_gaps",),
    lambda gaps: gaps > 0.0,
)


def decayed_sums(gains: Array, depth: Array) -> Array:
    """Return the sum of all gains up to each place, each decayed by the depth passed since.

    Parameters
    ----------
    gains : (rows, places) array
        What is added at each place.
    depth : (places,) array
        Never falling. [1]

    Returns
    -------
    (rows, places) array
        ``sum over i <= j of gains_i exp(depth_i - depth_j)``, by scans that span as much depth as exp can hold.
    """
    sums = np.empty_like(gains)
    carried, before, begin = np.zeros(len(gains)), 0.0, 0
    while begin < depth.size:
        end = int(np.searchsorted(depth, depth[begin] + REACH, side="right"))
        grown = np.exp(depth[begin:end] - depth[begin])
        carried = carried * np.exp(before - depth[begin])
        sums[:, begin:end] = (carried[:, np.newaxis] + np.cumsum(gains[:, begin:end] * grown, axis=1)) / grown
        carried, before, begin = sums[:, end - 1], float(depth[end - 1]), end
    return sums


def _weighted(velocity: Array, spans: Array, depth: Array, ends: Places, starts: Places) -> tuple[Array, Array]:
    """Return the sums over the places behind `starts` up to `ends` of span and decay, times velocity and alone.

    Of the velocity only its departures from the first are summed, so that one that does not change is met exactly.
    A start of -1 is before the first place.
    """
    sums = decayed_sums(np.stack([spans * (velocity - velocity[0]), spans]), depth)
    first = np.maximum(starts, 0)
    left = np.where(starts >= 0, np.exp(depth[first] - depth[ends]), 0.0) * sums[:, first]
    departure, weight = sums[:, ends] - left
    return departure, weight


def _mean(departure: Array, weight: Array, velocity: Array) -> Array:
    """Return the weighted velocity; that of the sample itself where there is no memory yet."""
    remembered = weight > 0.0
    return np.where(remembered, velocity[0] + departure / np.where(remembered, weight, 1.0), velocity)


@step(
    "memory_length",
    "memory_exchange",
    "memory_gaps",
    formula="over the last 60 d: time, sum of A K / h dt, spacings of more than three median ones",
)
def memory(
    time: Array, open_water_fraction: Array, total_transfer_velocity: Array, mixed_layer_depth: Array
) -> tuple[Array, Array, Array]:
    """Return what lies within the memory of each sample.

    Parameters
    ----------
    time : (samples,) array
        Increasing. [d]
    open_water_fraction : (...) array
        [1]
    total_transfer_velocity : (...) array
        [cm h-1]
    mixed_layer_depth : (...) array
        [m]

    Returns
    -------
    memory_length : (samples,) array
        At most 60. [d]
    memory_exchange : (samples,) array
        [1]
    memory_gaps : (samples,) array
        [1]
    """
    complete, moment, (opened, velocity, layer) = together(
        time, open_water_fraction, total_transfer_velocity, mixed_layer_depth
    )
    if not moment.size:
        return in_place(complete, moment), in_place(complete, moment), in_place(complete, moment)
    exchange, gaps = over_time(moment, opened * velocity * METRES_PER_DAY / layer), gaps_until(moment)
    begin = np.maximum(np.searchsorted(moment, moment - MEMORY, side="right") - 1, 0)
    length = np.minimum(moment - moment[0], MEMORY)
    at_begin = np.interp(moment - length, moment, exchange)
    return (
        in_place(complete, length),
        in_place(complete, exchange - at_begin),
        in_place(complete, gaps - gaps[begin]),
    )


@step(
    "weighted_transfer_velocity",
    "ventilated_fraction",
    method="reuer-2007",
    source=sources.REUER_2007,
    equation="section on the weighted gas transfer velocity",
    formula="k = sum(w A K dt) / sum(w dt) over 60 d, w(0) = 1, w(i) = w(i-1) (1 - f(i-1)), f = A K dt / h",
    note="From memory. As printed the mean is also divided by 1 - w(60), for the part of the layer not ventilated "
    "within the memory; it is left out, since a constant wind would then not give its own transfer velocity. "
    "ventilated_fraction tells that part.",
    remarks=(SHORT_MEMORY, GAP_IN_MEMORY),
)
def reuer_2007(
    time: Array, open_water_fraction: Array, total_transfer_velocity: Array, mixed_layer_depth: Array
) -> tuple[Array, Array]:
    """Return the transfer velocity weighted by the fraction of the layer ventilated since, after Reuer et al. (2007).

    Parameters
    ----------
    time : (samples,) array
        Increasing; NaN where missing. [d]
    open_water_fraction : (...) array
        [1]
    total_transfer_velocity : (...) array
        [cm h-1]
    mixed_layer_depth : (...) array
        [m]

    Returns
    -------
    weighted_transfer_velocity : (samples,) array
        Of the whole surface, ice counted in; that of the sample itself at the first. [cm h-1]
    ventilated_fraction : (samples,) array
        [1]

    Notes
    -----
    Made for daily values: each sample stands for the time since the one before it, and a step in which the layer is
    exchanged more than once wipes the memory out. Sixty days are remembered. The division by ``1 - w(60)`` of the
    print is left out. From memory: confirm. NaN in, NaN out there; others bridge it.

    References
    ----------
    Reuer et al. (2007). doi:10.1016/j.dsr.2007.02.007
    """
    complete, moment, (opened, velocity, layer) = together(
        time, open_water_fraction, total_transfer_velocity, mixed_layer_depth
    )
    if not moment.size:
        return in_place(complete, moment), in_place(complete, moment)
    through = opened * velocity
    spans = np.diff(moment, prepend=moment[0])
    fraction = np.minimum(through * METRES_PER_DAY * spans / layer, 1.0)
    with np.errstate(divide="ignore"):
        depth = np.cumsum(np.minimum(-np.log1p(-fraction), WHOLE_LAYER))
    ends = np.arange(moment.size)
    starts = np.searchsorted(moment, moment - MEMORY, side="right") - 1
    weighted = _mean(*_weighted(through, spans, depth, ends, starts), through)
    ventilated = np.abs(np.expm1(depth[np.maximum(starts, 0)] - depth))
    return in_place(complete, weighted), in_place(complete, ventilated)


@step(
    "weighted_transfer_velocity",
    "ventilated_fraction",
    method="teeter-2018",
    source=sources.TEETER_2018,
    equation="refined weighting of past transfer velocities",
    formula="k = int(W A K dt) / int(W dt) over 60 d, W(t) = exp(-int from t of A K / h dt)",
    note="From memory, as the weighting under which a constant production gives its own flux; the exact integration "
    "over each half spacing is of this service.",
    remarks=(SHORT_MEMORY, GAP_IN_MEMORY),
)
def teeter_2018(
    time: Array, open_water_fraction: Array, total_transfer_velocity: Array, mixed_layer_depth: Array
) -> tuple[Array, Array]:
    """Return the transfer velocity weighted by what is left of each moment's production, after Teeter et al. (2018).

    Parameters
    ----------
    time : (samples,) array
        Increasing; NaN where missing. [d]
    open_water_fraction : (...) array
        [1]
    total_transfer_velocity : (...) array
        [cm h-1]
    mixed_layer_depth : (...) array
        [m]

    Returns
    -------
    weighted_transfer_velocity : (samples,) array
        Of the whole surface, ice counted in; that of the sample itself at the first. [cm h-1]
    ventilated_fraction : (samples,) array
        [1]

    Notes
    -----
    Within a spacing, too, gas leaves: the weight is integrated over it, not taken at its end, so that the spacing of
    the samples matters little. Each sample holds half-way to its neighbours. Sixty days are remembered, the first of
    them cut where they begin. From memory: confirm. NaN in, NaN out there; others bridge it.

    References
    ----------
    Teeter et al. (2018). doi:10.1029/2017GB005874
    """
    complete, moment, (opened, velocity, layer) = together(
        time, open_water_fraction, total_transfer_velocity, mixed_layer_depth
    )
    if not moment.size:
        return in_place(complete, moment), in_place(complete, moment)
    through = opened * velocity
    holder = np.concatenate(([0], np.repeat(np.arange(moment.size), 2)[1:-1]))  # the first piece has no length
    halves = np.concatenate(([0.0], np.repeat(0.5 * np.diff(moment), 2)))
    rate = (through * METRES_PER_DAY / layer)[holder]
    depth, piece_end = np.cumsum(rate * halves), moment[0] + np.cumsum(halves)
    ends = 2 * np.arange(moment.size)
    begin = np.maximum(moment - MEMORY, moment[0])
    starts = np.minimum(np.searchsorted(piece_end, begin, side="left"), ends)  # the piece that is cut
    departure, weight = _weighted(through[holder], halves * _mean_decay(rate * halves), depth, ends, starts)
    rest = np.maximum(piece_end[starts] - begin, 0.0)
    spent = rate[starts] * rest
    of_rest = np.exp(depth[starts] - depth[ends]) * rest * _mean_decay(spent)
    departure = departure + of_rest * (through[holder[starts]] - through[0])
    ventilated = np.abs(np.expm1(depth[starts] - depth[ends] - spent))
    return in_place(complete, _mean(departure, weight + of_rest, through)), in_place(complete, ventilated)


def _mean_decay(exchange: Array) -> Array:
    """Return the mean of exp(-x) from 0 to an exchange, 1 for none."""
    some = exchange > 0.0
    return np.where(some, -np.expm1(-exchange) / np.where(some, exchange, 1.0), 1.0)
