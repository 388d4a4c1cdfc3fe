"""The summary of a series as JSON: mean, integral, amount and mass, each with what is known of its uncertainty."""

from collections.abc import Mapping
from datetime import UTC, datetime, timedelta
from typing import Any

import numpy as np

from service.physics.answer import Answer, Outcome
from service.physics.question import Question, Wanted
from service.physics.summary import RULE, Doubted, Series, Summary

MMOL = 1000.0  # in one mol
GRAMS = 1000.0  # in one kg
EPOCH = datetime(1970, 1, 1, tzinfo=UTC)
SHARING = (
    "to first order; the errors of methods and of the inputs in `common` are the same in all samples, those of other "
    "inputs independent of each other"
)


def summary_told(answer: Answer, series: Series, mass_as: str) -> dict[str, Any]:
    """Return what an answer tells of its series; with several methods the mean over them, with its spread.

    Parameters
    ----------
    answer : Answer
        With a summary in its outcome or in those of its parameterisations.
    series : Series
        What was asked.
    mass_as : str
        Whether a mass is that of the ``gas`` or of its ``element``.
    """
    question = answer.question
    outcomes = answer.by_parameterisation or {"": answer.outcome}
    told = {name: _one(question, outcome, series, mass_as) for name, outcome in outcomes.items()}
    first = next(iter(told.values()))
    if not answer.by_parameterisation:
        return first
    return {
        "rule": RULE,
        "results": {name: _over([each["results"][name] for each in told.values()]) for name in first["results"]},
        "by_parameterisation": {name: {k: v for k, v in each.items() if k != "rule"} for name, each in told.items()},
    }


def _over(results: list[Mapping[str, Any]]) -> dict[str, Any]:
    """Return mean and sample standard deviation over the methods that give a number."""
    found: dict[str, Any] = {}
    for part in ("mean", "integral", "amount", "mass"):
        values = [each[part]["value"] for each in results if part in each and each[part]["value"] is not None]
        if values:
            spread = float(np.std(values, ddof=1)) if len(values) > 1 else None
            found[part] = {**_bare(results[0][part]), "value": float(np.mean(values)), "spread": spread}
    return found


def _bare(told: Mapping[str, Any]) -> dict[str, Any]:
    return {name: value for name, value in told.items() if name in ("unit", "mass_of")}


def _one(question: Question, outcome: Outcome, series: Series, mass_as: str) -> dict[str, Any]:
    summary = outcome.summary
    if summary is None:
        raise LookupError("there is no summary")
    span = summary.end - summary.start
    told: dict[str, Any] = {
        "rule": RULE,
        "samples": summary.samples,
        "left_out": summary.left_out,
        "start": _moment(summary.start),
        "end": _moment(summary.end),
        "covered": {"value": summary.covered, "unit": "d"},
        "fraction_covered": summary.covered / span if span > 0.0 else None,
        "longest_gap": {"value": _number(summary.longest_gap), "unit": "d"},
        "gaps": summary.gaps,
    }
    if series.area is not None:
        told["area"] = {"value": series.area, "unit": "m2"}
    if summary.doubts:
        told["uncertainty"] = {"sharing": SHARING, "common": sorted(series.common)}
    wanted = [each for each in question.wanted if each.name in summary.means]
    told["results"] = {each.name: _result(question, each, summary, series.area, mass_as) for each in wanted}
    return told


def _result(question: Question, wanted: Wanted, summary: Summary, area: float | None, mass_as: str) -> dict[str, Any]:
    mean, doubted = summary.means[wanted.name], summary.doubts.get(wanted.name)
    mean_unit = {"unit": wanted.conversion.unit}
    if wanted.conversion.mass_of:
        mean_unit["mass_of"] = wanted.conversion.mass_of
    told = {"mean": _told(mean, 1.0 / wanted.conversion.factor, mean_unit, doubted)}
    if summary.covered > 0.0:
        time = summary.covered
        told["integral"] = _told(mean, time, {"unit": "mmol m-2"}, doubted)
        if area is not None:
            gas = question.gas
            element = mass_as == "element" and gas.element is not None and gas.element_mass is not None
            molar, of = (gas.element_mass, gas.element) if element else (gas.molar_mass, gas.formula)
            moles = time * area / MMOL
            told["amount"] = _told(mean, moles, {"unit": "mol"}, doubted)
            told["mass"] = _told(mean, moles * float(molar or 0.0) / GRAMS, {"unit": "kg", "mass_of": of}, doubted)
    if doubted is not None:
        told["budget"] = {name: _number(share) for name, share in doubted.budget.items()}
        if doubted.reason:
            told["reason"] = {"u": doubted.reason}
    return told


def _told(mean: float, factor: float, about: Mapping[str, Any], doubted: Doubted | None) -> dict[str, Any]:
    told: dict[str, Any] = {"value": _number(mean * factor), **about}
    if doubted is not None:
        for name in ("u", "u_inputs", "independent", "common"):
            key = name if name.startswith("u") else f"u_{name}"
            told[key] = _number(getattr(doubted, name) * factor)
    return told


def _number(value: float) -> float | None:
    return value if np.isfinite(value) else None


def _moment(days: float) -> dict[str, Any] | None:
    """Return a time in days, and in words as if they count from 1970."""
    if not np.isfinite(days):
        return None
    told: dict[str, Any] = {"value": days, "unit": "d"}
    try:
        told["utc"] = (EPOCH + timedelta(seconds=round(days * 86400.0, 3))).isoformat().replace("+00:00", "Z")
    except OverflowError:
        told["utc"] = None
    return told
