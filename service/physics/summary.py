"""The mean and the integral of a series of fluxes over time, with their uncertainty and the gaps."""

from collections.abc import Collection, Mapping, Sequence
from dataclasses import dataclass, field

import numpy as np
from numpy.typing import NDArray

from service.physics.declare import Array
from service.physics.plans import Plan
from service.physics.question import Question
from service.physics.series import gap_limit, holding_time, out_of_order
from service.physics.uncertainty import Doubt, Spread

RULE = (
    "each sample holds half-way to its neighbours, the outer ones only inwards; a spacing of more than three median "
    "ones is a gap, into which its neighbours hold for half a median spacing; mean and integral are over the time "
    "covered"
)


@dataclass(frozen=True, slots=True)
class Series:
    """What a summary needs beside the results: times, the area, and the inputs whose errors all samples share."""

    time: Array
    area: float | None = None
    common: frozenset[str] = frozenset()


@dataclass(frozen=True, slots=True)
class Doubted:
    """How sure a mean is, in the unit of its result; NaN where it cannot be told.

    Attributes
    ----------
    u, u_inputs : float
        Standard uncertainty, with the methods' and from the inputs alone.
    independent, common : float
        The parts of `u` that the samples do not share, and that they share.
    budget : mapping of str to float
        Shares in u squared; together 1.
    reason : str or None
        Why `u` is not told.
    """

    u: float
    u_inputs: float
    independent: float
    common: float
    budget: Mapping[str, float]
    reason: str | None = None


@dataclass(frozen=True, slots=True)
class Summary:
    """A series in short.

    Attributes
    ----------
    samples, left_out : int
        How many samples are in it, and how many are not, for want of a result or of a time in order.
    start, end, covered, longest_gap : float
        First and last time, the time for which a sample holds, the longest spacing; NaN where there is none. [d]
    gaps : int
        How many spacings are longer than three median ones.
    means : mapping of str to float
        Of each result over the time covered, in the unit of its term.
    doubts : mapping of str to Doubted
        How sure they are, where that was asked for.
    """

    samples: int
    left_out: int
    start: float
    end: float
    covered: float
    longest_gap: float
    gaps: int
    means: Mapping[str, float]
    doubts: Mapping[str, Doubted] = field(default_factory=dict)


def summarise(
    question: Question,
    steps: Plan,
    known: Mapping[str, Array],
    lost: NDArray[np.bool_],
    series: Series,
    spread: Spread | None,
    doubt: Doubt | None,
) -> Summary:
    """Return the summary of what one plan gives.

    Parameters
    ----------
    question : Question
        What is asked.
    steps : Plan
        What was run.
    known : mapping of str to array
        What came of it.
    lost : (samples,) array
        Samples without a result.
    series : Series
        Their times; NaN where missing.
    spread : Spread or None
        To first order, where uncertainty was asked for.
    doubt : Doubt or None
        What is uncertain.
    """
    used = np.isfinite(series.time) & ~out_of_order(series.time) & ~lost
    time = series.time[used]
    held, spacing = holding_time(time), np.diff(time)
    covered = float(held.sum())
    weights = held / covered if covered > 0.0 else np.full(time.size, 1.0 / max(time.size, 1))

    def of_used(values: Array) -> Array:
        return np.broadcast_to(values, lost.shape)[used]

    means, doubts = {}, {}
    for each in question.wanted:
        if each.name not in question.quantity.summaries:
            continue
        key = steps.keys[each.term]
        means[each.name] = float(weights @ of_used(known[key])) if time.size else np.nan
        if spread is not None and doubt is not None:
            parts = {name: weights * of_used(part[key]) for name, part in spread.parts.items()}
            doubts[each.name] = combined(parts, doubt, series.common, spread.unknown.get(key, ()))
    nothing = np.nan
    return Summary(
        int(time.size),
        int(lost.size - time.size),
        float(time[0]) if time.size else nothing,
        float(time[-1]) if time.size else nothing,
        covered,
        float(spacing.max()) if spacing.size else nothing,
        int((spacing > gap_limit(time)).sum()),
        means,
        doubts,
    )


def combined(
    parts: Mapping[str, Array], doubt: Doubt, common: Collection[str], unpublished: Sequence[str] = ()
) -> Doubted:
    """Return how sure a weighted mean is, from the weighted parts of its samples.

    Parameters
    ----------
    parts : mapping of str to (samples,) array
        Weight times derivative times standard uncertainty, of each input and method; signed.
    doubt : Doubt
        Tells the inputs from the methods, and their correlations.
    common : collection of str
        Inputs whose error all samples share; that of a method they always share.
    unpublished : sequence of str
        Methods that publish no uncertainty, so that the whole is not known.

    Notes
    -----
    What samples do not share adds as squares and dwindles with their number; what they share adds as it is, with its
    sign, and never dwindles.
    """
    shared = {name for name in parts if name in common or name not in doubt.inputs}
    squares = {
        name: float(part.sum()) ** 2 if name in shared else float((part**2).sum()) for name, part in parts.items()
    }
    among = {True: sum(squares[n] for n in shared), False: sum(v for n, v in squares.items() if n not in shared)}
    of_inputs = sum(value for name, value in squares.items() if name in doubt.inputs)
    for (a, b), r in doubt.correlations.items():
        if a not in parts or b not in parts or (a in shared) != (b in shared):
            continue
        both = a in shared
        product = parts[a].sum() * parts[b].sum() if both else (parts[a] * parts[b]).sum()
        squares[f"correlation.{a}.{b}"] = term = 2.0 * r * float(product)
        among[both] += term
        of_inputs += term
    total = among[True] + among[False]
    missing = [name for name, value in squares.items() if not np.isfinite(value)]
    reason = None
    if missing:
        reason = f"u is null: {', '.join(f'u_{name}' for name in missing)} is missing or negative in some samples"
    elif unpublished:
        reason = f"u is null: {', '.join(unpublished)} publish no uncertainty; send u_unpublished, or u_methods=0"
    if unpublished:
        return Doubted(np.nan, _root(of_inputs), np.nan, np.nan, {}, reason)
    budget = {name: value / total for name, value in squares.items()} if total > 0.0 else {}
    return Doubted(_root(total), _root(of_inputs), _root(among[False]), _root(among[True]), budget, reason)


def _root(variance: float) -> float:
    return float(np.sqrt(max(variance, 0.0))) if np.isfinite(variance) else np.nan
