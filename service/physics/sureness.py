"""The uncertainty of an answer: what was asked of it, and what is told of each result."""

from collections.abc import Mapping, Sequence
from dataclasses import dataclass, replace

import numpy as np

from service.physics.declare import Array
from service.physics.judge import GOOD, Verdict
from service.physics.plans import Plan
from service.physics.question import Question
from service.physics.uncertainty import APART, Doubt, Spread, first_order, monte_carlo

DRAWS, SEED = 100_000, 1  # of a Monte Carlo, where not asked otherwise


@dataclass(frozen=True, slots=True)
class Asked:
    """How uncertainty is to be told: what is doubtful, by which way, and with which coverage."""

    doubt: Doubt
    monte_carlo: bool = False
    draws: int = DRAWS
    seed: int = SEED
    coverage: float | None = None


@dataclass(frozen=True, slots=True)
class Sureness:
    """What is told of one result, in its unit: NaN where there is nothing to tell.

    Attributes
    ----------
    u, u_inputs : (samples,) array
        Standard uncertainty, with the methods' and from the inputs alone; the same array where no method counts.
    budget : mapping of str to (samples,) array
        Shares in u squared; together 1.
    low, high : (samples,) array or None
        The coverage interval, where one was asked for.
    """

    u: Array
    u_inputs: Array
    budget: Mapping[str, Array]
    low: Array | None = None
    high: Array | None = None


def of_samples(array: Array, samples: int) -> Array:
    """Return one number for each sample from an array of them or of one; of a course, one row for each sample."""
    if array.ndim > 1:
        return np.broadcast_to(array, (*array.shape[:-1], samples)).T
    return array if array.size == samples else np.repeat(array, samples)


def uncertain(asked: Asked, verdict: Verdict, samples: int) -> Asked:
    """Return what was asked with impossible uncertainties emptied, and the samples told of it.

    Parameters
    ----------
    asked : Asked
        As sent; NaN where missing.
    verdict : Verdict
        Of the inputs; reasons are added, no flag is raised.
    samples : int
        How many samples there are.
    """
    inputs = {}
    for name, u in asked.doubt.inputs.items():
        negative = np.broadcast_to(u < 0.0, samples)
        missing = np.broadcast_to(np.isnan(u), samples)
        verdict.mark(np.flatnonzero(missing), GOOD, f"u_{name} is missing: no uncertainty is told")
        verdict.mark(np.flatnonzero(negative), GOOD, f"u_{name} is negative: no uncertainty is told")
        inputs[name] = np.where(u < 0.0, np.nan, u)
    return replace(asked, doubt=replace(asked.doubt, inputs=inputs))


def sureness(
    question: Question, steps: Plan, known: Mapping[str, Array], asked: Asked, verdict: Verdict
) -> tuple[dict[str, Sureness], Spread]:
    """Return what is told of each wanted result, and the spread from which it is told.

    Parameters
    ----------
    question : Question
        What is asked.
    steps : Plan
        What was run.
    known : mapping of str to array
        What came of it.
    asked : Asked
        What is doubtful.
    verdict : Verdict
        Of the samples; those where Monte Carlo and first order differ by more than a tenth are told.
    """
    keys = list(dict.fromkeys(steps.keys.values()))
    doubt = replace(asked.doubt, inputs={n: u for n, u in asked.doubt.inputs.items() if n in steps.leaves})
    found = first_order(steps, known, keys, doubt, question.gas, asked.coverage)
    if asked.monte_carlo and not found.unpublished:
        linear = found
        drawn = (asked.draws, asked.seed, asked.coverage)
        found = monte_carlo(steps, known, keys, doubt, question.gas, *drawn)
        _tell_apart(linear, found, keys, verdict)
    told = {}
    lost = verdict.lost

    def shown(values: Array) -> Array:
        whole = of_samples(values, lost.size)
        return np.where(lost if whole.ndim == 1 else lost[:, np.newaxis], np.nan, whole)

    for each in question.wanted:
        key, change = steps.keys[each.term], each.conversion
        low, high = found.interval.get(key, (None, None))
        u = shown(change.unscale(found.u[key]))
        told[each.name] = Sureness(
            u,
            u if doubt.methods == "0" else shown(change.unscale(found.u_inputs[key])),
            {name: shown(share) for name, share in found.budget.get(key, {}).items()},
            None if low is None else shown(change.from_base(low)),
            None if high is None else shown(change.from_base(high)),
        )
    return told, found


def _tell_apart(linear: Spread, drawn: Spread, keys: Sequence[str], verdict: Verdict) -> None:
    for key in keys:
        with np.errstate(all="ignore"):
            apart = np.abs(drawn.u[key] / linear.u[key] - 1.0) > APART
        if apart.any():
            name = key.partition("@")[0]
            anywhere = apart.reshape(-1, apart.shape[-1]).any(axis=0)
            rows = np.flatnonzero(np.broadcast_to(anywhere, verdict.flags.shape))
            verdict.mark(rows, GOOD, f"u of {name}: first order and Monte Carlo differ by more than a tenth")


def over_methods(by_method: Sequence[Mapping[str, Sureness]], names: Sequence[str]) -> dict[str, Sureness]:
    """Return the uncertainty within methods: the root mean square over those that give one.

    Parameters
    ----------
    by_method : sequence of mappings
        What is told of each result by each method.
    names : sequence of str
        The results.
    """
    told = {}
    for name in names:
        with np.errstate(all="ignore"):
            u = _root_mean_square([each[name].u for each in by_method])
            u_inputs = _root_mean_square([each[name].u_inputs for each in by_method])
        told[name] = Sureness(u, u_inputs, {})
    return told


def _root_mean_square(arrays: Sequence[Array]) -> Array:
    stack = np.stack(arrays)
    given = np.isfinite(stack)
    total = np.where(given, stack**2, 0.0).sum(axis=0)
    return np.asarray(np.where(given.any(axis=0), np.sqrt(total / given.sum(axis=0)), np.nan))
