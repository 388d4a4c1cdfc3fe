"""Every published figure recomputed by this installation: for callers of ``/v1/checks`` and for ``catspaw check``."""

import csv
import io
from collections.abc import Iterable, Mapping
from typing import Any

import numpy as np
import orjson
from flask import Flask, Response

from schemas.requests import load
from schemas.samples import Text
from service.catalogue import one_of, parameters
from service.config import service_version
from service.physics import check as figures
from service.physics.answer import answer
from service.physics.check import RECORD, STEP, Check, Finding
from service.physics.declare import GASES, QUANTITIES, DeclarationError
from service.physics.faults import Refused
from service.physics.sources import SOURCES

FILTERS = ("gas", "method", "source", "holds", "form")
FORMS = ("json", "csv")
YES_NO = ("1", "0")
HEADINGS = ("check", "methods", "gas", "published", "computed", "unit", "allowed", "kind", "source", "holds")
TO_THE_RIGHT = frozenset({"published", "computed", "allowed"})
WHOLE, FAILED = 0, 1


def recompute(one: Check) -> Finding:
    """Return what a check comes to here and now, by the same path as a caller's request."""
    try:
        return Finding(one, figures.compute_step(one)) if one.quantity == STEP else _asked(one)
    except (Refused, DeclarationError) as error:
        return Finding(one, np.nan, str(error))


def _asked(one: Check) -> Finding:
    raw = {name: Text(value) for name, value in (*one.inputs.items(), ("pick", one.result), ("unit", one.unit))}
    checked = load(QUANTITIES[one.quantity], raw)
    values = {each.term: each.values for each in checked.inputs if each.values is not None}
    outcome = answer(checked.question, values, checked.samples).outcome
    computed = float(outcome.results[one.result][-1])  # of a series the last one
    if np.isfinite(computed):
        return Finding(one, computed)
    return Finding(one, computed, "; ".join(outcome.verdict.reasons.get(checked.samples - 1, [])))


def method_names() -> list[str]:
    """Return the names by which checks can be asked for: those of methods, and of sources behind definitions."""
    declared = [method for _, method in figures.declared_methods()]
    return list(dict.fromkeys([*declared, *(method for one in figures.checks() for _, method in one.methods)]))


def findings(gas: str | None = None, method: str | None = None, source: str | None = None) -> list[Finding]:
    """Return what the checks of a gas, a method and a source come to; of all where none is named.

    Raises
    ------
    Refused
        Where a gas, a method or a source is unknown.
    """
    one_of("gas", gas, GASES)
    one_of("method", method, method_names())
    one_of("source", source, SOURCES)
    return [
        recompute(one)
        for one in figures.checks()
        if gas in (None, one.gas)
        and (method is None or method in dict(one.methods).values())
        and source in (None, one.source.key)
    ]


def summary(found: Iterable[Finding]) -> dict[str, Any]:
    """Return how many checks there are and how many hold, in all and by kind."""
    every = list(found)
    by_kind = {kind: [each for each in every if each.check.kind == kind] for kind in figures.KINDS}
    return {
        **_count(every),
        "by_kind": {kind: {"meaning": figures.KINDS[kind], **_count(some)} for kind, some in by_kind.items() if some},
    }


def _count(found: list[Finding]) -> dict[str, int]:
    return {"rows": len(found), "holding": sum(each.holds for each in found)}


def _csv(records: list[dict[str, Any]]) -> str:
    """Return the records as a table; what is not there stays empty."""
    written = io.StringIO()
    table = csv.DictWriter(written, RECORD, lineterminator="\n")  # writes nothing for None
    table.writeheader()
    for record in records:
        table.writerow({**record, "methods": _pairs(record["methods"]), "holds": int(record["holds"])})
    return written.getvalue()


def _pairs(methods: Mapping[str, str]) -> str:
    return "; ".join(f"{family}={method}" for family, method in methods.items())


def checks() -> Response:
    """Answer ``/v1/checks``."""
    asked = parameters(FILTERS)
    form = one_of("form", asked.get("form", "json"), FORMS)
    holds = one_of("holds", asked.get("holds"), YES_NO)
    found = findings(asked.get("gas"), asked.get("method"), asked.get("source"))
    if holds is not None:
        found = [each for each in found if each.holds == (holds == "1")]
    records = [each.record() for each in found]
    if form == "csv":
        return Response(_csv(records), content_type="text/csv; charset=utf-8")
    service = {"name": "catspaw", "version": service_version()}
    return Response(
        orjson.dumps({"summary": summary(found), "checks": records, "service": service}), mimetype="application/json"
    )


def install(app: Flask) -> None:
    """Add the address of the checks to an application."""
    app.add_url_rule("/v1/checks", "checks", checks, methods=["GET"])


def report(gas: str | None = None, method: str | None = None) -> tuple[list[str], int]:
    """Return the checks as an aligned table with a last line that counts them, and the exit status.

    The status is 1 where one does not hold, and where there is none to hold: nothing is proved by nothing.

    Raises
    ------
    Refused
        Where the gas or the method is unknown.
    """
    found = findings(gas, method)
    holding = sum(each.holds for each in found)
    lines = [*_aligned([HEADINGS, *(_cells(each) for each in found)]), ""]
    lines += [f"{each.check.id}: {each.problem}" for each in found if each.problem]
    lines.append(f"{len(found)} checks, {holding} hold")
    return lines, WHOLE if found and holding == len(found) else FAILED


def _cells(each: Finding) -> tuple[str, ...]:
    one = each.check
    methods = ", ".join(dict.fromkeys(method for _, method in one.methods))
    return (
        one.id,
        methods,
        one.gas or "-",
        f"{one.value:.10g}",
        f"{each.computed:.10g}",
        one.unit,
        f"{one.tolerance.of(one.value):.2g}",
        one.kind,
        one.source.citation,
        "yes" if each.holds else "NO",
    )


def _aligned(rows: list[tuple[str, ...]]) -> list[str]:
    widths = [max(map(len, column)) for column in zip(*rows, strict=True)]
    return [
        "  ".join(
            cell.rjust(width) if heading in TO_THE_RIGHT else cell.ljust(width)
            for cell, width, heading in zip(row, widths, HEADINGS, strict=True)
        ).rstrip()
        for row in rows
    ]
