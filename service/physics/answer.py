"""The answer to a question: what the plans give, judged sample by sample, for one method or for several."""

from collections.abc import Callable, Iterator, Mapping, Sequence
from dataclasses import dataclass, field

import numpy as np
from numpy.typing import NDArray

from service.physics.declare import TERMS, Array, Step
from service.physics.engine import Shared, run
from service.physics.judge import BAD, SUSPECT, Verdict, judge, judge_results, mark_left_out, mark_order
from service.physics.plans import Plan
from service.physics.question import Question
from service.physics.summary import Series, Summary, summarise
from service.physics.sureness import Asked, Sureness, of_samples, over_methods, sureness, uncertain


@dataclass(frozen=True, slots=True)
class Unreadable:
    """Samples with something that is no number: the reason of each, and the inputs it is in, none for all of them."""

    reasons: Mapping[int, str]
    inputs: Mapping[str, Sequence[int]]


@dataclass(frozen=True, slots=True)
class Told:
    """One number of the calculation: an input as it was taken, or what a step gave."""

    key: str
    values: Array
    how: str
    step: Step | None


@dataclass(frozen=True, slots=True)
class Outcome:
    """Results in the units asked for, by name, with the flags and reasons of the samples."""

    results: Mapping[str, Array]
    verdict: Verdict
    chain: tuple[Told, ...] = ()
    sure: Mapping[str, Sureness] = field(default_factory=dict)
    unpublished: tuple[str, ...] = ()
    summary: Summary | None = None


@dataclass(frozen=True, slots=True)
class Answer:
    """The outcome for each parameterisation, and the one over all of them."""

    question: Question
    samples: int
    outcome: Outcome
    spread: Mapping[str, Array]
    by_parameterisation: Mapping[str, Outcome]


def answer(
    question: Question,
    values: Mapping[str, Array],
    samples: int,
    unreadable: Unreadable | None = None,
    labels: Mapping[str, str] | None = None,
    with_steps: bool = False,
    asked: Asked | None = None,
    series: Series | None = None,
) -> Answer:
    """Compute the answer to a question.

    Parameters
    ----------
    question : Question
        From `ask`.
    values : mapping of str to (1,) or (samples,) array
        The inputs that the question uses, in the unit of their term; NaN where missing.
    samples : int
        How many samples there are.
    unreadable : Unreadable, optional
        Samples that could not be read, or not in all their inputs.
    labels : mapping of str to str, optional
        How the sender knows an input, where not by its own name.
    with_steps : bool
        Whether the calculation is told step by step.
    asked : Asked, optional
        How sure the results are to be told.
    series : Series, optional
        The times of the samples, where a summary over them is to be told.

    Returns
    -------
    Answer
    """
    used = {name: values[name] for name in values if name in question.used}
    inputs = {name: array for name, array in used.items() if TERMS[name].holds != "course"}
    unreadable = unreadable or Unreadable({}, {})
    verdict = judge(inputs, samples, labels or {}, unreadable.inputs)
    mark_order(inputs, verdict)
    if series:
        mark_left_out(series.time, verdict)
    inputs |= {name: array[:, np.newaxis] for name, array in used.items() if TERMS[name].holds == "course"}
    in_part = {row for rows in unreadable.inputs.values() for row in rows}
    for row, reason in unreadable.reasons.items():
        if row not in in_part:
            verdict.reasons[row] = []  # what could not be read is not missing
            verdict.flags[row] = BAD
        verdict.mark([row], BAD, reason)
    if asked:
        asked = uncertain(asked, verdict, samples)
    shared: Shared | None = {} if len(question.plans) > 1 else None
    outcomes = {
        name: _outcome(question, steps, inputs, verdict, shared, with_steps, asked, series)
        for name, steps in question.plans.items()
    }
    if len(outcomes) == 1:
        return Answer(question, samples, next(iter(outcomes.values())), {}, {})
    named = {str(name): outcome for name, outcome in outcomes.items()}
    outcome, spread = _over(question, named)
    return Answer(question, samples, outcome, spread, named)


def _outcome(
    question: Question,
    steps: Plan,
    inputs: Mapping[str, Array],
    judged: Verdict,
    shared: Shared | None,
    with_steps: bool,
    asked: Asked | None,
    series: Series | None,
) -> Outcome:
    known = run(steps, inputs, shared)
    verdict = Verdict(judged.flags.copy(), {row: list(told) for row, told in judged.reasons.items()})
    judge_results(verdict, steps, known)
    lost = verdict.lost
    any_lost = bool(lost.any())

    def told(array: Array) -> Array:
        whole = of_samples(array, lost.size)
        return np.where(lost if whole.ndim == 1 else lost[:, np.newaxis], np.nan, whole) if any_lost else whole

    results = {each.name: told(each.conversion.from_base(known[steps.keys[each.term]])) for each in question.wanted}
    chain = tuple(_chain(steps, known, lost, told)) if with_steps else ()
    sure, spread = (None, None) if asked is None else sureness(question, steps, known, asked, verdict)
    doubt = None if asked is None else asked.doubt
    summary = summarise(question, steps, known, lost, series, spread, doubt) if series else None
    return Outcome(results, verdict, chain, sure or {}, spread.unpublished if spread else (), summary)


def _chain(
    steps: Plan, known: Mapping[str, Array], lost: NDArray[np.bool_], told: Callable[[Array], Array]
) -> Iterator[Told]:
    """Yield the numbers in order: the inputs, what the gas brings, step by step, and results by another name."""
    for name in steps.leaves:
        yield Told(name, told(known[name]), "assumed" if name in steps.defaults else "as sent", None)
    for name, value in steps.constants.items():
        yield Told(name, told(value), "constant of the gas or the method", None)
    for node in steps.nodes:
        for key in node.results:
            if not _is_idle(known[key], lost):
                yield Told(key, told(known[key]), node.step.formula, node.step)
    for term, key in steps.keys.items():
        if key.partition("@")[0] != term:
            yield Told(term, told(known[key]), f"the same as {key}", None)


def _is_idle(array: Array, lost: NDArray[np.bool_]) -> bool:
    """Tell whether a step gave no number where there are results: a branch that none of the samples took."""
    kept = of_samples(array, lost.size)[~lost]
    return kept.size > 0 and bool(np.isnan(kept).all())


def _over(question: Question, outcomes: Mapping[str, Outcome]) -> tuple[Outcome, dict[str, Array]]:
    """Return mean and sample standard deviation over the methods that give a number."""
    results, spread = {}, {}
    for each in question.wanted:
        stack = np.stack([outcome.results[each.name] for outcome in outcomes.values()])
        numbers = np.isfinite(stack)
        count = numbers.sum(axis=0)
        with np.errstate(all="ignore"):
            mean = np.where(numbers, stack, 0.0).sum(axis=0) / count
            squares = np.where(numbers, (stack - mean) ** 2, 0.0).sum(axis=0)
            spread[each.name] = np.where(count > 1, np.sqrt(squares / (count - 1)), np.nan)
        results[each.name] = np.where(count > 0, mean, np.nan)
    names = [each.name for each in question.wanted]
    by_method = [outcome.sure for outcome in outcomes.values()]
    sure = over_methods(by_method, names) if all(by_method) else {}
    unpublished = tuple(dict.fromkeys(name for outcome in outcomes.values() for name in outcome.unpublished))
    return Outcome(results, _verdict_over(outcomes), (), sure, unpublished), spread


def _verdict_over(outcomes: Mapping[str, Outcome]) -> Verdict:
    """Return the worst flag among the methods that give a number, or among all where none does."""
    flags = np.stack([outcome.verdict.flags for outcome in outcomes.values()])
    lost = flags >= BAD
    worst = np.where(lost.all(axis=0), flags.max(axis=0), np.where(lost, 0, flags).max(axis=0))
    some_lost = lost.any(axis=0) & ~lost.all(axis=0)
    worst = np.where(some_lost, np.maximum(worst, SUSPECT), worst).astype(np.int8)
    return Verdict(worst, dict(_reasons_over(outcomes)))


def _reasons_over(outcomes: Mapping[str, Outcome]) -> Iterator[tuple[int, list[str]]]:
    rows = sorted({row for outcome in outcomes.values() for row in outcome.verdict.reasons})
    for row in rows:
        told: dict[str, list[str]] = {}
        for name, outcome in outcomes.items():
            for reason in outcome.verdict.reasons.get(row, []):
                told.setdefault(reason, []).append(name)
        every = len(outcomes)
        yield row, [text if len(by) == every else f"{', '.join(by)}: {text}" for text, by in told.items()]
