"""What is said of time: a series of samples in order, the times of a course, and the summary of a series."""

from collections.abc import Collection, Iterable, Mapping
from typing import Any

import numpy as np
from marshmallow import fields

from schemas.checked import Input, Request, SeriesAsked
from schemas.moments import Moment
from schemas.options import Choice, Words
from schemas.samples import Measured
from service.physics.declare import SIDES, TERMS, Array, Quantity
from service.physics.faults import Fault, Refused
from service.physics.series import out_of_order
from service.physics.summary import Series

TIME, TIMES, AREA, COMMON, SUMMARY = "time", "times", "area", "common", "summary"
TIMES_LIMIT = 1000
COURSE_LIMIT = 5_000_000  # samples times times
PER_SAMPLE = ("sample", "series")  # how a term may hold that stands once for each sample


def series_fields(quantity: Quantity) -> dict[str, fields.Field[Any]]:
    """Return the fields that tell of a series; a time is known to every quantity, and read where one asks for it."""
    found: dict[str, fields.Field[Any]] = {
        TIME: Moment(TERMS[TIME], metadata={"description": TERMS[TIME].meaning}),
    }
    if quantity.summaries:
        about = "1 adds mean and integral over time of " + ", ".join(quantity.summaries)
        found[SUMMARY] = Choice(("0", "1"), metadata={"description": about})
        found[AREA] = Measured(TERMS[AREA], metadata={"description": TERMS[AREA].meaning})
        about = "inputs whose error all samples share; of the others each sample has its own"
        found[COMMON] = Words(metadata={"description": about})
    return found


def reads_time(inputs: Collection[str], sent: Mapping[str, Any]) -> bool:
    """Tell whether a time that is sent is read: by a quantity that needs it, or for a summary."""
    return TIME in inputs or str(sent.get(SUMMARY, "0")).strip() == "1"


def wants_time(quantity: Quantity, sent: Mapping[str, Any]) -> bool:
    """Tell whether a column that happens to be called time is read: where a result asked for hangs on it.

    Tables often hold a time without being a series, so that no sample may be judged by it unasked; a column that is
    pointed to, ``time=@header``, is read anyway.
    """
    picked = {word.strip() for word in str(sent.get("pick", "")).split(";")}
    sides = {name for name, side in SIDES.items() if TIME in side.members}
    hanging = {result for result, side in quantity.needs_side.items() if side in sides}
    return quantity.series or str(sent.get(SUMMARY, "0")).strip() == "1" or bool(picked & hanging)


def check_course(inputs: Iterable[Input], samples: int) -> None:
    """Refuse the times of a course that do not increase, are too many, or are none."""
    for each in inputs:
        if TERMS[each.term].holds != "course":
            continue
        term, values = TERMS[each.term], each.values
        allowed = f"increasing, {term.possible[0]:g} to {term.possible[1]:g} {term.unit}, at most {TIMES_LIMIT}"
        if values is None:
            raise Refused(Fault("column", each.term, "stands once for the whole request, never as a column", allowed))
        low, high = term.possible
        if not bool(((values >= low) & (values <= high)).all()):
            raise Refused(Fault("order", each.term, f"must be numbers from {low:g} to {high:g} {term.unit}", allowed))
        if late := np.flatnonzero(out_of_order(values)).tolist():
            raise Refused(Fault("order", each.term, f"must increase: entry {late[0] + 1} does not", allowed))
        if values.size > TIMES_LIMIT or values.size * samples > COURSE_LIMIT:
            reason = f"{values.size} for {samples} samples are too many"
            raise Refused(Fault("too_large", each.term, reason, f"{TIMES_LIMIT}; times samples up to {COURSE_LIMIT}"))


def check_order(time: Input | None, samples: int) -> None:
    """Refuse the times of a series that stand beside each other in a request and do not increase."""
    if time is None or time.values is None:
        return
    if time.values.size < samples:
        raise Refused(Fault("length", time.term, f"is one for {samples} samples: send one for each"))
    late = np.flatnonzero(out_of_order(time.values)).tolist()
    if late:
        told = "is not later than that of every sample before it: sort the samples, and send each time once"
        raise Refused(*(Fault("order", time.term, told, sample=row + 1) for row in late))


def series_asked(
    options: Mapping[str, Any], time: Input | None, area: Input | None, uncertain: Collection[str]
) -> SeriesAsked | None:
    """Return what is asked of a summary, None where none is.

    Raises
    ------
    Refused
        Where its time is missing, or something is sent that only a summary uses.
    """
    if options.get(SUMMARY, "0") != "1":
        lone = [name for name, value in ((AREA, area), (COMMON, options.get(COMMON))) if value is not None]
        if lone:
            raise Refused(*(Fault("unused", name, "is used only beside summary=1") for name in lone))
        return None
    if time is None:
        term = TERMS[TIME]
        raise Refused(Fault("missing_input", TIME, f"is needed for a summary: {term.meaning} [{term.unit}]"))
    size = None
    if area is not None:
        low, high = TERMS[AREA].possible
        if area.values is None or area.values.size != 1 or not low < float(area.values[0]) <= high:
            raise Refused(Fault("unknown_option", AREA, "must be one number above 0, once for the request"))
        size = float(area.values[0])
    common = frozenset(options.get(COMMON, ()))
    if strangers := sorted(common - set(uncertain)):
        allowed = ", ".join(sorted(uncertain)) or "none was sent"
        told = "must name inputs whose uncertainty is sent, without u_"
        raise Refused(*(Fault("unknown_option", COMMON, f"{name[:100]!r}: {told}", allowed) for name in strangers))
    return SeriesAsked(time, size, common)


def shared(request: Request) -> frozenset[str]:
    """Return the inputs whose error all samples share: those named, and those that stand once for all samples."""
    once = {each.term for each in request.inputs if each.values is not None and each.values.size == 1}
    named = request.series.common if request.series else frozenset()
    return frozenset(once | named)


def check_shared(request: Request) -> None:
    """Refuse what cannot be combined over a series: correlations across, draws sample by sample."""
    if request.options.get("uncertainty_method") == "monte-carlo" and any(
        TERMS[name].holds == "series" for name in request.question.used
    ):
        reason = "monte-carlo draws sample by sample, and this series hangs together: leave it out"
        raise Refused(Fault("unknown_option", "uncertainty_method", reason, "first-order"))
    if request.series is None:
        return
    common = shared(request)
    for a, b in request.correlations:
        if (a in common) != (b in common):
            reason = "cannot be summed: the error of one is the same in all samples, that of the other is not"
            raise Refused(Fault("unknown_option", f"correlation.{a}.{b}", f"{reason}; name both or none as common"))


def series_of(request: Request, time: Array | None) -> Series | None:
    """Return what the summary of a request needs, None where none is asked for; impossible times are none."""
    if request.series is None or time is None:
        return None
    low, high = TERMS[TIME].possible
    with np.errstate(invalid="ignore"):
        return Series(np.where((time >= low) & (time <= high), time, np.nan), request.series.area, shared(request))
