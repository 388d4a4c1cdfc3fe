"""An answer as JSON, as CSV behind the lines that were sent, or as bare numbers."""

import re
from collections.abc import Iterator, Mapping
from functools import lru_cache
from typing import Any

import numpy as np
import orjson

from service.config import service_version
from service.physics.answer import Answer, Outcome
from service.physics.declare import TERMS, Array
from service.physics.judge import Verdict
from service.physics.question import Question, Wanted
from service.physics.sureness import Asked, Sureness

SERVICE = {"name": "catspaw", "version": service_version()}
THREE_DECIMALS = re.compile(r"\.(\d{3})(?=$|[eE])")
OPTIONS = orjson.OPT_SERIALIZE_NUMPY


def unit_text(wanted: Wanted) -> str:
    """Return the unit of a result, with what a mass is the mass of."""
    mass_of = wanted.conversion.mass_of
    return f"{wanted.conversion.unit} as {mass_of}" if mass_of else wanted.conversion.unit


def _result(wanted: Wanted, values: Array, spread: Array | None, sure: Sureness | None) -> dict[str, Any]:
    told: dict[str, Any] = {"values": np.ascontiguousarray(values), "unit": wanted.conversion.unit}
    if wanted.conversion.mass_of:
        told["mass_of"] = wanted.conversion.mass_of
    told["standard_name"] = wanted.standard_name
    if spread is not None:
        told["spread"] = np.ascontiguousarray(spread)
    if sure is not None:
        told |= _sure(sure, spread)
    return told


def _sure(sure: Sureness, spread: Array | None) -> dict[str, Any]:
    """Return what is told of a result's uncertainty; with several methods the parts within and between them."""
    told: dict[str, Any] = {"u": _rows(sure.u)}
    if sure.u_inputs is not sure.u:
        told["u_inputs"] = _rows(sure.u_inputs)
    if spread is not None:
        told["u_total"] = _rows(np.sqrt(sure.u**2 + spread**2))
    if sure.budget:
        told["budget"] = {name: _rows(share) for name, share in sure.budget.items()}
    if sure.low is not None and sure.high is not None:
        told["interval"] = {"low": _rows(sure.low), "high": _rows(sure.high)}
    return told


def _rows(values: Array) -> Array:
    """Return an array as it can be written: row by row."""
    return np.ascontiguousarray(values)


def _quality(verdict: Verdict) -> dict[str, Any]:
    none: list[str] = []
    reasons = [none] * verdict.flags.size
    for row, told in verdict.reasons.items():
        reasons[row] = told
    return {"flags": verdict.flags, "reasons": reasons}


def _steps(outcome: Outcome) -> list[dict[str, Any]]:
    """Return the calculation in order, each number with its unit, formula and source."""
    told = []
    for each in outcome.chain:
        name, _, at = each.key.partition("@")
        source = each.step.source if each.step else None
        entry: dict[str, Any] = {"name": name, "values": np.ascontiguousarray(each.values), "unit": TERMS[name].unit}
        if at:
            entry["evaluated_with"] = dict(part.split("=") for part in at.split(","))
        entry["method"] = each.step.method if each.step else None
        entry["formula"] = each.how
        entry["source"] = source.citation if source else None
        entry["doi"] = source.doi if source else None
        told.append(entry)
    return told


def _outcome(question: Question, outcome: Outcome, spread: Mapping[str, Array]) -> dict[str, Any]:
    told: dict[str, Any] = {
        "results": {
            each.name: _result(each, outcome.results[each.name], spread.get(each.name), outcome.sure.get(each.name))
            for each in question.wanted
        },
        "quality": _quality(outcome.verdict),
    }
    if outcome.chain:
        told["steps"] = _steps(outcome)
    return told


def json_bytes(
    answer: Answer,
    detail: str = "full",
    asked: Asked | None = None,
    course: Array | None = None,
    more: Mapping[str, Any] | None = None,
) -> bytes:
    """Return an answer as JSON: arrays always, null where there is no number.

    Parameters
    ----------
    answer : Answer
        What is told.
    detail : str
        How much of it.
    asked : Asked, optional
        What was asked of its uncertainty.
    course : (times,) array, optional
        The times of a course. [d]
    more : mapping, optional
        What else is told, ahead of methods and assumptions.
    """
    question = answer.question
    document: dict[str, Any] = {
        "quantity": question.quantity.name,
        **({"gas": question.gas.name} if question.quantity.of_gas else {}),
        "samples": answer.samples,
    }
    if course is not None:
        document["times"] = {"values": course, "unit": "d"}
    document |= _outcome(question, answer.outcome, answer.spread)
    if answer.by_parameterisation:
        document["by_parameterisation"] = {
            name: _outcome(question, outcome, {}) for name, outcome in answer.by_parameterisation.items()
        }
    if asked:
        document["uncertainty"] = uncertainty_told(asked, answer.outcome.unpublished)
    document |= more or {}
    if detail != "brief":
        document["methods"] = question.methods
        document["assumed"] = question.assumed
    document["service"] = SERVICE
    return orjson.dumps(document, option=OPTIONS)


def uncertainty_told(asked: Asked, unpublished: tuple[str, ...]) -> dict[str, Any]:
    """Return how uncertainty was propagated, and what keeps it from being told."""
    told: dict[str, Any] = {
        "method": "monte-carlo" if asked.monte_carlo else "first-order",
        "methods_counted": asked.doubt.methods,
    }
    if asked.monte_carlo:
        told |= {"draws": asked.draws, "seed": asked.seed}
    if asked.coverage is not None:
        told["coverage"] = asked.coverage
    if unpublished:
        told["unpublished"] = unpublished
        told["reason"] = (
            "u is null: these methods publish no uncertainty; u_unpublished supplies one in percent, u_methods=0 "
            "leaves the methods out, u_inputs holds what comes from the inputs"
        )
    return told


def csv_names(
    question: Question, headers: str = "units", asked: Asked | None = None, course: Array | None = None
) -> list[str]:
    """Return the headers of the columns that are written, in order, the flag and the reason last."""
    names = []
    several = [name for name in question.plans if name] if len(question.plans) > 1 else []
    courses = _courses(question)
    for each in question.wanted:
        unit = unit_text(each)
        bracket = f" [{unit}]" if headers == "units" else ""
        stems = [each.name]
        if asked:
            stems += [f"u_{each.name}", f"u_inputs_{each.name}"]
            stems += [f"{each.name}_{end}" for end in ("low", "high") if asked.coverage is not None]
        if several:
            stems.append(f"{each.name}_spread")
            stems += [f"{each.name}.{name}" for name in several]
        if course is not None and each.name in courses:
            stems = [f"{stem}.t={time:.12g}" for stem in stems for time in course.tolist()]
        names += [stem + bracket for stem in stems]
    return [*names, "quality_flag", "quality_reason"]


def _courses(question: Question) -> set[str]:
    """Return the results that are told at several times: those that depend on a term that holds for a course."""
    steps = next(iter(question.plans.values()))
    reached = {leaf for leaf in steps.leaves if TERMS[leaf].holds == "course"}
    for node in steps.nodes:
        if not reached.isdisjoint(node.arguments):
            reached.update(node.results)
    return {each.name for each in question.wanted if steps.keys[each.term] in reached}


def csv_columns(answer: Answer) -> tuple[list[Array], list[Any]]:
    """Return the number columns of an answer, and its flag and reason columns."""
    numbers: list[Array] = []
    for each in answer.question.wanted:
        numbers.append(answer.outcome.results[each.name])
        if sure := answer.outcome.sure.get(each.name):
            numbers += [sure.u, sure.u_inputs]
            numbers += [end for end in (sure.low, sure.high) if end is not None]
        if answer.by_parameterisation:
            numbers.append(answer.spread[each.name])
            numbers += [outcome.results[each.name] for outcome in answer.by_parameterisation.values()]
    numbers = [column for array in numbers for column in (array.T if array.ndim > 1 else [array])]
    verdict = answer.outcome.verdict
    reasons = [""] * answer.samples
    for row, told in verdict.reasons.items():
        reasons[row] = "; ".join(told)
    return numbers, [verdict.flags, reasons]


def number_text(value: float, decimal: str = "point") -> str:
    """Return a number for a cell: shortest digits that read back exactly, never exactly three after the point.

    An office with decimal commas would read 1.234 as 1234; ``whole`` writes the digits without a point.
    """
    if not np.isfinite(value):
        return "NaN"
    text = repr(float(value))
    if decimal == "whole":
        return _whole(text)
    return THREE_DECIMALS.sub(r".\g<1>0", text)


def _whole(text: str) -> str:
    mantissa, _, exponent = text.partition("e")
    whole, _, part = mantissa.partition(".")
    part = part.rstrip("0")
    digits = whole + part
    sign = "-" if digits.startswith("-") else ""
    digits = digits.lstrip("-").lstrip("0") or "0"
    return f"{sign}{digits}E{int(exponent or 0) - len(part)}"


def number_lines(answer: Answer, decimal: str) -> Iterator[str]:
    """Yield the first wanted result of each sample as text."""
    values = answer.outcome.results[answer.question.wanted[0].name]
    for value in values.tolist():
        yield number_text(value, decimal)


@lru_cache(maxsize=1024)
def header_text(question: Question) -> tuple[str, str]:
    """Return what was assumed and which methods were used, each as one header line."""
    assumed = "; ".join(
        f"{name}={told['value']}" + (f" {told['unit']}" if told.get("unit", "1") != "1" else "")
        for name, told in question.assumed.items()
    )
    methods = "; ".join(f"{name}={','.join(e['name'] for e in told)}" for name, told in question.methods.items())
    return assumed, methods
