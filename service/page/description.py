"""What the page needs of the API document: its inputs, units, needs and results, told once and without the rest."""

from collections import Counter
from collections.abc import Mapping
from typing import Any

from schemas.answers import FLAGS
from schemas.parameters import Described
from service.physics.declare import GASES, QUANTITIES
from service.physics.methods import transfer_methods

UNCERTAIN = "x-uncertainty-of"
UNIT_OF_RESULT = "unit."
READ = frozenset(  # what the page reads of a parameter, without x-
    {"unit", "units", "possible", "holds", "used-with", "several", "choices", "default-by-gas", "gases-by-choice"}
    | {"no-default-for-water"}
)
EXAMPLE = "get"  # the question with which the page begins


def resolved(document: Mapping[str, Any], node: Described) -> Described:
    """Return what a reference of the document stands for, anything else as it is."""
    if "$ref" not in node:
        return node
    found: Any = document
    for part in node["$ref"].removeprefix("#/").split("/"):
        found = found[part]
    return dict(found)


def parameters(document: Mapping[str, Any], path: str) -> dict[str, Described]:
    """Return the query parameters of an address by name, in their order."""
    listed = (resolved(document, each) for each in document["paths"][path].get("parameters", ()))
    return {each["name"]: each for each in listed}


def _about(parameter: Described) -> Described:
    """Return a parameter without what the page does not read."""
    schema = parameter["schema"]
    named = {key.removeprefix("x-"): value for key, value in parameter.items() if key.startswith("x-")}
    told = {key: value for key, value in named.items() if key in READ}
    told["description"] = parameter.get("description", "")
    if "default-by-gas" in told:
        told["default-by-gas"] = _mostly(told["default-by-gas"])
    if "example" in parameter:
        told["example"] = parameter["example"]
    if "default" in schema:
        told["default"] = schema["default"]
    if choices := parameter.get("x-choices", schema.get("enum")):
        told["choices"] = choices
    return told


def _mostly(by_gas: Mapping[str, str | None]) -> Described:
    """Return the default of most gases under ``mostly``, and those of the others."""
    most = Counter(by_gas.values()).most_common(1)[0][0]
    return {"mostly": most, **{gas: method for gas, method in by_gas.items() if method != most}}


def described(document: Mapping[str, Any]) -> dict[str, Any]:
    """Return what the page is built from.

    Parameters
    ----------
    document : mapping
        The OpenAPI document.

    Returns
    -------
    dict
        ``names`` holds each input and option that is the same wherever it is taken; ``quantities`` which of them a
        quantity takes, and what it says otherwise; ``results`` each result that is the same wherever it is told,
        and ``needed_by`` the methods that need an input.
    """
    names: dict[str, Described] = {}
    results: dict[str, Described] = {}
    needed_by: dict[str, Described] = {}
    quantities = {name: _quantity(document, name, names, results) for name in QUANTITIES}
    for quantity in quantities.values():
        quantity["needs"] = {name: _shared(name, need, needed_by) for name, need in quantity["needs"].items()}
    return {
        "version": document["info"]["version"],
        "flags": {str(flag): meaning for flag, meaning in FLAGS.items()},
        "limits": document["x-limits"],
        "unit_lists": document["x-unit-lists"],
        "gases": {gas.name: {"title": gas.title, "formula": gas.formula} for gas in GASES.values()},
        "waters": {name: list(step.water) for name, step in transfer_methods().items()},
        "names": names,
        "results": results,
        "needed_by": needed_by,
        "quantities": quantities,
    }


def _shared(name: str, need: Described, needed_by: dict[str, Described]) -> Described:
    """Return a need without the methods that bring it along, where these are the same for another quantity."""
    methods = need.get("methods")
    if methods is None or needed_by.setdefault(name, methods) != methods:
        return need
    return {key: value for key, value in need.items() if key != "methods"}


def _quantity(
    document: Mapping[str, Any], name: str, names: dict[str, Described], results: dict[str, Described]
) -> Described:
    item, own = document["paths"][f"/v1/{name}"], dict[str, Described]()
    taken, measured, doubted = list[str](), list[str](), list[str]()
    units: dict[str, str] = {}
    for parameter, about in parameters(document, f"/v1/{name}").items():
        if UNCERTAIN in about:
            doubted.append(about[UNCERTAIN])
        elif parameter.startswith(UNIT_OF_RESULT):
            units[parameter.removeprefix(UNIT_OF_RESULT)] = about["x-units"]
        else:
            taken.append(parameter)
            if "x-unit" in about:
                measured.append(parameter)
            if names.setdefault(parameter, _about(about)) != _about(about):
                own[parameter] = _about(about)
    for each in item["x-results"]:
        results.setdefault(each["name"], {"meaning": each["meaning"], "units": units[each["name"]]})
    return {
        "title": QUANTITIES[name].title,
        "address": f"/v1/{name}",
        "takes": taken,
        "own": own,
        "certain": sorted(set(measured) - set(doubted)),
        "needs": {
            each["name"]: {key: value for key, value in each.items() if key != "name"}
            for each in item["x-inputs"]
            if each["needed"] != "never"
        },
        "sides": item["x-sides"],
        "results": [{key: each[key] for key in ("name", "unit", "main")} for each in item["x-results"]],
        "example": next((each["url"] for each in item["x-examples"] if each["name"] == EXAMPLE), ""),
    }
