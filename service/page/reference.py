"""The reference as people read it: every address, name, unit, default, limit, error and example of the API document."""

import json
from collections.abc import Iterable, Mapping
from typing import Any

from schemas.parameters import Described, number_text
from service.page.description import UNCERTAIN, UNIT_OF_RESULT, parameters, resolved

NEEDED = {
    "always": "always",
    "one_of_side": "one of a side",
    "by_method": "by some methods",
    "with_input": "beside",
    "never": "no",
}
LONG_LIST = 14  # units beyond which a list is folded away


def contents(document: Mapping[str, Any]) -> dict[str, Any]:
    """Return all that the reference prints, read from the API document."""
    quantities = [path for path, item in document["paths"].items() if "x-quantity" in item]
    others = [path for path in document["paths"] if path not in quantities]
    names = _names(document, quantities)
    return {
        "title": document["info"]["summary"],
        "version": document["info"]["version"],
        "about": paragraphs(document["info"]["description"]),
        "quantities": [_quantity(document, path, names) for path in quantities],
        "inputs": [each for each in names.values() if each["unit"] is not None],
        "options": [each for each in names.values() if each["unit"] is None],
        "addresses": [_address(document, path) for path in others],
        "units": [
            {"name": name, "units": units, "long": len(units) > LONG_LIST}
            for name, units in document["x-unit-lists"].items()
        ],
        "limits": list(document["x-limits"].items()),
        "problems": _problems(document),
        "codes": list(document["x-codes"].items()),
        "flags": document["components"]["schemas"]["Quality"]["properties"]["flags"]["description"],
        "headers": [
            {"name": name, "description": each["description"]}
            for name, each in document["components"]["headers"].items()
        ],
    }


def paragraphs(text: str) -> list[list[Described]]:
    """Return a text as paragraphs, each in pieces."""
    return [pieces(part) for part in text.split("\n\n")]


def pieces(text: str) -> list[Described]:
    """Return a text in pieces of which every second one stood between back-ticks and is code."""
    return [{"text": piece, "code": place % 2 == 1} for place, piece in enumerate(text.replace("\n", " ").split("`"))]


def unit_anchor(name: str) -> str:
    """Return the anchor of a list of units."""
    return "units-" + "-".join(name.replace("%", "percent").split())


def _names(document: Mapping[str, Any], paths: Iterable[str]) -> dict[str, Described]:
    """Return every input and option once, with the quantities that take it."""
    found: dict[str, Described] = {}
    for path in paths:
        for name, parameter in parameters(document, path).items():
            if UNCERTAIN in parameter or name.startswith(UNIT_OF_RESULT):
                continue  # told once, as patterns
            entry = found.setdefault(name, _name(parameter))
            entry["quantities"].append(document["paths"][path]["x-quantity"])
    return dict(sorted(found.items()))


def _name(parameter: Described) -> Described:
    schema = parameter["schema"]
    unit = parameter.get("x-unit")
    low, high = parameter.get("x-possible", (None, None))
    choices = parameter.get("x-choices", schema.get("enum", []))
    return {
        "name": parameter["name"],
        "description": parameter.get("description", ""),
        "unit": unit,
        "units": unit_anchor(parameter["x-units"]) if "x-units" in parameter else "",
        "possible": _range(low, high, parameter.get("x-above-lower-limit", False)) if unit is not None else "",
        "default": _default(parameter),
        "choices": [each or "(nothing)" for each in choices],
        "several": parameter.get("x-several", False),
        "example": parameter.get("example", ""),
        "holds": {"sample": "per sample", "series": "per sample of a series"}.get(
            parameter.get("x-holds", ""), "per request"
        ),
        "used_with": parameter.get("x-used-with", []),
        "quantities": [],
    }


def _default(parameter: Described) -> str:
    by_gas = set(parameter.get("x-default-by-gas", {}).values())
    if len(by_gas) == 1:
        return str(by_gas.pop() or "")
    return "by gas" if by_gas else str(parameter["schema"].get("default", ""))


def _range(low: float | None, high: float | None, above: bool) -> str:
    """Return limits in words."""
    if low is None and high is None:
        return ""
    if high is None:
        return f"{'above' if above else 'from'} {number_text(low or 0.0)}"
    return f"{'above ' if above else ''}{number_text(low or 0.0)} to {number_text(high)}"


def _quantity(document: Mapping[str, Any], path: str, names: Mapping[str, Described]) -> Described:
    item = document["paths"][path]
    taken = parameters(document, path)
    return {
        "name": item["x-quantity"],
        "path": path,
        "title": item["get"]["summary"],
        "inputs": [{**names[each["name"]], "needed": _needed(each)} for each in item["x-inputs"]],
        "options": [name for name in taken if name in names and names[name]["unit"] is None],
        "sides": [_side(each) for each in item["x-sides"]],
        "results": [each | {"units": unit_anchor(taken[f"unit.{each['name']}"]["x-units"])} for each in _results(item)],
        "examples": [_example(each) for each in item["x-examples"]],
    }


def _results(item: Described) -> list[Described]:
    return [
        {
            **{key: each[key] for key in ("name", "unit", "meaning", "main")},
            "standard_names": sorted(
                {
                    text
                    for text in (
                        each["standard_name"],
                        *(text for by in each.get("standard_name_by_gas", {}).values() for text in by.values()),
                    )
                    if text
                }
            ),
        }
        for each in item["x-results"]
    ]


def _needed(told: Described) -> Described:
    """Return when an input is needed, in words, with what that depends on."""
    words = NEEDED[told["needed"]]
    methods = [method for of_option in told.get("methods", {}).values() for method in of_option]
    if "with" in told:
        words += " " + ", ".join(told["with"])
    return {"words": words, "side": told.get("side", ""), "methods": methods}


def _side(side: Described) -> Described:
    gases, assumed = side["needed_for_gases"], side["default_by_gas"]
    return {
        **side,
        "needed": ", ".join(gases) if gases else "",
        "assumed": [
            (gas, ", ".join(f"{name} {number_text(value)}" for name, value in values.items()))
            for gas, values in assumed.items()
        ],
        "beside": list(side.get("beside", {}).items()),
    }


def _example(example: Described) -> Described:
    body = example.get("body", "")
    return {
        **{key: example[key] for key in ("name", "summary", "method", "url")},
        "kind": example.get("content_type", ""),
        "body": body if isinstance(body, str) else json.dumps(body, indent=1),
    }


def _address(document: Mapping[str, Any], path: str) -> Described:
    get = document["paths"][path]["get"]
    taken = [resolved(document, each) for each in get.get("parameters", ())]
    return {
        "path": path,
        "anchor": get["operationId"],
        "summary": get["summary"],
        "open": get.get("security") == [],
        "parameters": [
            {
                "name": each["name"],
                "where": each["in"],
                "description": each.get("description", ""),
                "choices": each.get("x-choices", each["schema"].get("enum", [])),
                "default": each["schema"].get("default", ""),
            }
            for each in taken
        ],
    }


def _problems(document: Mapping[str, Any]) -> list[Described]:
    """Return the kinds of problem with their anchors, which are those of the ``type`` of a problem document."""
    properties = document["components"]["schemas"]["Problem"]["properties"]
    kinds = zip(properties["type"]["enum"], properties["status"]["enum"], strict=True)
    return [
        {
            "anchor": kind.partition("#")[2],
            "type": kind,
            "status": status,
            "title": document["components"]["responses"][f"problem-{status}"]["description"],
        }
        for kind, status in kinds
    ]
