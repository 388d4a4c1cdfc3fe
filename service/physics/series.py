"""Samples in time: whether they follow each other, which spacings are gaps, and how long each sample holds."""

import numpy as np
from numpy.typing import NDArray

from service.physics.declare import Array

GAP_SPACINGS = 3.0  # a spacing longer than this many median ones is a gap


def out_of_order(time: Array) -> NDArray[np.bool_]:
    """Tell which samples are not later than every one before them; a missing time is none of them.

    Parameters
    ----------
    time : (samples,) array
        NaN where missing. [d]
    """
    known = np.where(np.isnan(time), -np.inf, time)
    latest = np.maximum.accumulate(known)
    before = np.concatenate(([-np.inf], latest[:-1]))
    return np.asarray(~np.isnan(time) & (known <= before))


def gap_limit(time: Array) -> float:
    """Return the spacing beyond which a gap begins, three median spacings.

    Parameters
    ----------
    time : (samples,) array
        Increasing. [d]

    Returns
    -------
    float
        Infinite with fewer than two samples. [d]
    """
    return GAP_SPACINGS * float(np.median(np.diff(time))) if time.size > 1 else np.inf


def holding_time(time: Array) -> Array:
    """Return how long each sample holds: half-way to its neighbours, the outer ones only inwards.

    Into a gap each of its two neighbours holds for half a median spacing; what lies between is not bridged.

    Parameters
    ----------
    time : (samples,) array
        Increasing. [d]

    Returns
    -------
    (samples,) array
        [d]
    """
    held = np.zeros_like(time)
    if time.size > 1:
        spacing = np.diff(time)
        half = 0.5 * np.where(spacing <= gap_limit(time), spacing, np.median(spacing))
        held[:-1] += half
        held[1:] += half
    return held


def over_time(time: Array, rate: Array) -> Array:
    """Return a rate summed over time up to each sample, each rate holding half-way to its neighbours, gaps bridged.

    Parameters
    ----------
    time : (samples,) array
        Increasing. [d]
    rate : (samples,) array
        [d-1]

    Returns
    -------
    (samples,) array
        Zero at the first sample. [1]
    """
    steps = 0.5 * (rate[1:] + rate[:-1]) * np.diff(time)
    return np.concatenate(([0.0], np.cumsum(steps)))


def gaps_until(time: Array) -> Array:
    """Return how many gaps lie before each sample.

    Parameters
    ----------
    time : (samples,) array
        Increasing. [d]
    """
    return np.concatenate(([0.0], np.cumsum(np.diff(time) > gap_limit(time))))


def together(time: Array, *others: Array) -> tuple[NDArray[np.bool_], Array, list[Array]]:
    """Return which samples of a series are complete, their times, and their other numbers.

    Parameters
    ----------
    time : (samples,) array
        [d]
    *others : (samples,) or (1,) arrays
        NaN where missing.
    """
    whole = [np.broadcast_to(each, time.shape) for each in others]
    complete = np.isfinite(time)
    for each in whole:
        complete = complete & np.isfinite(each)
    return complete, time[complete], [each[complete] for each in whole]


def in_place(complete: NDArray[np.bool_], values: Array) -> Array:
    """Return what was computed for the complete samples at their places among all, NaN elsewhere."""
    spread = np.full(complete.shape, np.nan)
    spread[complete] = values
    return spread
