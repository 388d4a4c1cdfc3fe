"""Questions that run: for every quantity by GET, JSON, CSV and form, from the example values of the vocabulary."""

import csv
import io
from collections.abc import Iterable
from typing import Any
from urllib.parse import quote, urlencode

from schemas.needs import enough, two_parameterisations, usual_gases
from schemas.parameters import number_text
from schemas.series import PER_SAMPLE
from schemas.vocabulary import request_fields
from service.physics.declare import TERMS, Gas, Quantity, Term

# What an example sends beyond what its quantity needs, because people usually have it.
EXAMPLES = {
    "solubility": ("air_mole_fraction",),
    "transfer-velocity": ("wind_height",),
    "flux": ("air_pressure", "wind_height"),
}
STEP = 1.02  # from one sample of an example to the next
Example = dict[str, Any]


def _first(term: Term) -> float:
    """Return the value by which an input is shown."""
    low, high = term.possible
    shown = (term.example, term.default, low, high)
    return next(value for value in shown if value is not None and abs(value) != float("inf"))


def _second(term: Term) -> float:
    return min(float(f"{_first(term) * STEP:.4g}"), term.possible[1])


def _both(term: Term) -> tuple[float, ...]:
    return (_first(term), _second(term)) if term.holds in PER_SAMPLE else (_first(term),)


def _query(pairs: Iterable[tuple[str, str]]) -> str:
    return urlencode(list(pairs), safe=";@", quote_via=quote)


def _unit(term: Term) -> str:
    return "" if term.unit == "1" else f" {term.unit}"


def quantity_examples(quantity: Quantity) -> list[Example]:
    """Return questions that a quantity answers, each ready to be sent.

    Returns
    -------
    list of dict
        ``name``, ``summary``, ``method``, ``url`` from the server's root on, with its query; for POST also
        ``content_type`` and ``body``: text, or the JSON document itself.
    """
    for gas in usual_gases():
        names = enough(quantity, gas, EXAMPLES.get(quantity.name, ()))
        if names is not None:
            return list(_examples(quantity, gas, [TERMS[name] for name in names]))
    return []


def _examples(quantity: Quantity, gas: Gas, inputs: list[Term]) -> Iterable[Example]:
    address = f"/v1/{quantity.name}"
    named = [("gas", gas.name)] if "gas" in request_fields(quantity) else []
    one = named + [(term.name, number_text(_first(term))) for term in inputs]
    several = named + [
        (term.name, ";".join(number_text(value) for value in _both(term)) + _unit(term)) for term in inputs
    ]

    def get(name: str, summary: str, pairs: Iterable[tuple[str, str]]) -> Example:
        return {"name": name, "summary": summary, "method": "GET", "url": f"{address}?{_query(pairs)}"}

    def post(name: str, summary: str, kind: str, body: Any, pairs: Iterable[tuple[str, str]] = ()) -> Example:
        query = _query(pairs)
        url = f"{address}?{query}" if query else address
        return {"name": name, "summary": summary, "method": "POST", "url": url, "content_type": kind, "body": body}

    yield get("get", "one sample", one)
    yield get("get-several", "two samples, with units", several)
    yield get("get-number", "one bare number, for a cell", [*one, ("pick", quantity.results[0]), ("form", "number")])
    yield get("get-csv", "the answer as a table", [*several, ("form", "csv")])
    if methods := two_parameterisations(quantity, gas, [term.name for term in inputs]):
        both = ";".join(methods)
        yield get("get-methods", "by two methods, with mean and spread", [*one, ("parameterisation", both)])
    document = {**dict(named), **{term.name: _first(term) for term in inputs}}
    yield post("json", "one sample", "application/json", document)
    yield post(
        "json-several",
        "two samples, one of them with its unit",
        "application/json",
        {
            **dict(named),
            **{term.name: list(_both(term)) for term in inputs[:-1]},
            **{term.name: {"values": list(_both(term)), "unit": term.unit} for term in inputs[-1:]},
        },
    )
    once = [(term.name, number_text(_first(term))) for term in inputs if term.holds not in PER_SAMPLE]
    columns = [term for term in inputs if term.holds in PER_SAMPLE]
    yield post("csv", "a table, answered as a table", "text/csv", _table(columns), [*named, *once])
    yield post("form", "one sample, as a form", "application/x-www-form-urlencoded", _query(one))


def _table(columns: list[Term]) -> str:
    """Return a CSV table with a column of its own that passes through."""
    written = io.StringIO()
    table = csv.writer(written, lineterminator="\n")
    table.writerow(["station", *(f"{term.name} [{term.unit}]" for term in columns)])
    table.writerow(["A1", *(number_text(_first(term)) for term in columns)])
    table.writerow(["A2", *(number_text(_second(term)) for term in columns)])
    return written.getvalue()
