"""Good samples beside bad ones: IOC quality flags and the reasons for them."""

import math
from collections.abc import Callable, Mapping, Sequence
from dataclasses import dataclass, field

import numpy as np
from numpy.typing import NDArray

from service.physics.declare import TERMS, Array, Limits, Term
from service.physics.plans import Plan, Range
from service.physics.series import out_of_order

GOOD, SUSPECT, BAD, MISSING = 1, 3, 4, 9  # UNESCO, IOC Manuals and Guides 54, vol. 3
NO_NUMBER = "no method gives a number here"


@dataclass(slots=True)
class Verdict:
    """A flag for each sample, and the reasons of those that have any."""

    flags: NDArray[np.int8]
    reasons: dict[int, list[str]] = field(default_factory=dict)

    def mark(self, rows: Sequence[int] | NDArray[np.intp], flag: int, reason: str | Sequence[str]) -> None:
        """Raise the flag of some samples and add a reason, one for all or one for each; a reason is told once."""
        where = np.asarray(rows, dtype=np.intp)
        self.flags[where] = np.maximum(self.flags[where], flag)
        texts = [reason] * where.size if isinstance(reason, str) else reason
        for row, text in zip(where.tolist(), texts, strict=True):
            told = self.reasons.setdefault(row, [])
            if text not in told:
                told.append(text)

    @property
    def lost(self) -> NDArray[np.bool_]:
        """Tell which samples have no result."""
        return self.flags >= BAD


def number_text(value: float) -> str:
    """Return a number as a person writes it, to six figures and without a negative zero."""
    return f"{value + 0.0:.6g}"


def limits_text(limits: Limits, unit: str) -> str:
    """Return limits with their unit, such as ``0 to 20 m s-1``."""
    low, high = limits
    told = "" if unit == "1" else f" {unit}"
    if not np.isfinite(low):
        return f"up to {number_text(high)}{told}"
    if not np.isfinite(high):
        return f"from {number_text(low)}{told}"
    return f"{number_text(low)} to {number_text(high)}{told}"


def possible_text(term: Term) -> str:
    """Return the limits of the possible of a term, in words."""
    above = "above " if term.above_lower_limit else ""
    return above + limits_text(term.possible, term.unit)


def _rows(mask: NDArray[np.bool_], samples: int) -> NDArray[np.intp]:
    """Return the marked samples; a value that holds for every sample marks them all."""
    return np.arange(samples) if mask.size == 1 and samples > 1 and mask[0] else np.flatnonzero(mask)


def _told(rows: NDArray[np.intp], array: Array, sentence: Callable[[float], str]) -> list[str]:
    """Return a sentence for the value of each sample; each value is put into words once, since many recur."""
    values, which = np.unique(array[rows] if array.size > 1 else np.repeat(array, rows.size), return_inverse=True)
    sentences = [sentence(value) for value in values.tolist()]
    return [sentences[place] for place in which.tolist()]


def _extent(array: Array) -> tuple[float, float]:
    """Return the smallest and the largest number; a reduction costs as much for one number as for many."""
    if array.size == 1:
        value = array.item()
        return value, value
    return array.min(), array.max()


def judge(
    values: dict[str, Array], samples: int, labels: Mapping[str, str], unread: Mapping[str, Sequence[int]] | None = None
) -> Verdict:
    """Flag what is missing or impossible in the inputs and blank it there.

    Parameters
    ----------
    values : dict of str to (1,) or (samples,) array
        Inputs by name, in the unit of their term; an array with something impossible is replaced by a copy.
    samples : int
        How many samples there are.
    labels : mapping of str to str
        How the sender knows an input, where not by its own name.
    unread : mapping of str to sequence of int
        Samples at which something stands that is no number: they are told apart, not called missing.

    Returns
    -------
    Verdict
        9 for NaN, 4 for what is outside the limits of the possible.
    """
    verdict = Verdict(np.full(samples, GOOD, dtype=np.int8))
    for name, array in values.items():
        term = TERMS[name]
        low, high = term.possible
        smallest, largest = _extent(array)
        if (smallest > low if term.above_lower_limit else smallest >= low) and largest <= high:
            continue
        missing = np.isnan(array)
        if unread and name in unread and array.size == samples:
            missing[list(unread[name])] = False
        label = labels.get(name, name)
        verdict.mark(_rows(missing, samples), MISSING, f"{label} is missing")
        within = (array > low if term.above_lower_limit else array >= low) & (array <= high)
        impossible = ~within & ~np.isnan(array)
        if impossible.any():
            _tell_impossible(verdict, label, term, _rows(impossible, samples), array)
            values[name] = np.where(impossible, np.nan, array)
    return verdict


def mark_order(values: dict[str, Array], verdict: Verdict) -> None:
    """Flag samples of a series that are not later than every one before them, and blank their time.

    Parameters
    ----------
    values : dict of str to array
        Inputs by name, from `judge`; only those that hold for a series are looked at.
    verdict : Verdict
        Raised in place.
    """
    for name in [name for name in values if TERMS[name].holds == "series"]:
        late = out_of_order(values[name])
        if late.any():
            told = f"{name} is not later than that of every sample before it: the sample is left out of the series"
            verdict.mark(np.flatnonzero(late), BAD, told)
            values[name] = np.where(late, np.nan, values[name])


def _tell_impossible(verdict: Verdict, label: str, term: Term, rows: NDArray[np.intp], array: Array) -> None:
    allowed = possible_text(term)
    told = _told(rows, array, lambda value: f"{label} {number_text(value)} is impossible: {allowed}")
    verdict.mark(rows, BAD, told)


def mark_left_out(time: Array, verdict: Verdict) -> None:
    """Tell the samples that a summary leaves out for their time, and flag those that stand out of order."""
    told = "time is not later than that of every sample before it: the sample is left out of the summary"
    verdict.mark(np.flatnonzero(out_of_order(time)), SUSPECT, told)
    verdict.mark(np.flatnonzero(np.isnan(time)), GOOD, "time is missing: the sample is left out of the summary")


def judge_results(verdict: Verdict, plan: Plan, known: Mapping[str, Array]) -> None:
    """Flag samples outside a method's range, those a method remarks on, and those without a finite result.

    Parameters
    ----------
    verdict : Verdict
        From `judge`; raised in place.
    plan : Plan
        What was run.
    known : mapping of str to array
        What came of it.
    """
    samples = verdict.flags.size
    for entry in plan.ranges:
        _judge_range(verdict, entry, known[entry.key], samples)
    for remark, keys in plan.remarks:
        applies = np.atleast_1d(remark.applies(*[known[key] for key in keys]))
        if applies.any():
            verdict.mark(_rows(applies, samples), remark.flag, remark.reason)
    finite = np.ones(samples, dtype=bool)
    for key in plan.keys.values():
        array = known[key]
        if not math.isfinite(array.item() if array.size == 1 else array.sum()):
            finite &= np.isfinite(array).reshape(-1, array.shape[-1]).all(axis=0)
    if not finite.all():
        verdict.mark(np.flatnonzero(~finite & ~verdict.lost), BAD, NO_NUMBER)


def _judge_range(verdict: Verdict, entry: Range, array: Array, samples: int) -> None:
    low, high = entry.limits
    smallest, largest = _extent(array)
    if smallest >= low and largest <= high:
        return
    outside = (array < low) | (array > high)
    if entry.recommended and entry.term in entry.step.valid:
        widest = entry.step.valid[entry.term]  # beyond it the range itself has been told
        outside &= (array >= widest[0]) & (array <= widest[1])
    if not outside.any():
        return
    term, method = TERMS[entry.term], entry.step.method or entry.step.name
    kind = "recommended range" if entry.recommended else "range"
    allowed = limits_text(entry.limits, term.unit)
    unit = "" if term.unit == "1" else f" {term.unit}"
    rows = _rows(outside, samples)

    def sentence(value: float) -> str:
        beyond = low - value if value < low else value - high
        return (
            f"{entry.term} {number_text(value)}{unit} is outside the {kind} of {method}, {allowed}, "
            f"by {number_text(beyond)}{unit}"
        )

    verdict.mark(rows, GOOD if entry.recommended else SUSPECT, _told(rows, array, sentence))
