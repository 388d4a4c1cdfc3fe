"""What may be sent, in the words of the API document: each input and option, in a query and in JSON."""

import re
from collections.abc import Iterable, Iterator, Mapping
from typing import Any

import numpy as np
from apispec.ext.marshmallow.openapi import OpenAPIConverter
from marshmallow import fields

from schemas.needs import defaults_by_gas, gases_by_choice
from schemas.options import Choice, Line, OptionNumber, Words
from schemas.requests import CORRELATION, SAMPLES_LIMIT
from schemas.samples import MISSING_MARKS, NUMBER, Measured
from schemas.vocabulary import UNCERTAIN, quantity_families, uncertain_inputs
from service.physics.declare import GASES, QUANTITIES, SIDES, TERMS, Family, Quantity, Term
from service.physics.question import known_names
from service.physics.units import allowed

Described = dict[str, Any]

NO_DEFAULT = ("gas", "water")  # never guessed; of every other choice the first word is the default
UNIT_KINDS = ("amount", "mass", "gas_volume")  # ways of saying how much of a gas, open to every gas


def _any_case(words: Iterable[str]) -> str:
    return "|".join("".join(f"[{letter}{letter.upper()}]" for letter in word) for word in words)


def _pattern(number: str, marks: str, reference: str = "") -> str:
    """Return a pattern for numbers and missing marks parted by semicolons, a unit at the end."""
    value = f"(?:{number}|{marks})"
    return rf"^(?:{reference}(?:\s*(?:{value}\s*)?;)*\s*(?:{value}[^;]*(?:;\s*)?)?)$"


def value_schemas() -> dict[str, Described]:
    """Return the schemas that every input shares: how a value is written in JSON, in a query and in a form."""
    point = NUMBER.pattern
    words = sorted((mark for mark in MISSING_MARKS if mark), reverse=True)  # the longer of two that begin alike first
    marks = _any_case(words)
    element = {"anyOf": [{"type": ["number", "null"]}, {"$ref": "#/components/schemas/MissingMark"}]}
    return {
        "MissingMark": {
            "type": "string",
            "description": f"A word for no number, in any case: {', '.join(words)}, or nothing.",
            "pattern": rf"^\s*(?:{marks})?\s*$",
        },
        "Numbers": {
            "type": "array",
            "description": "One entry per sample; an array of one holds for every sample.",
            "items": element,
            "minItems": 1,
            "maxItems": SAMPLES_LIMIT,
        },
        "TextWithUnit": {
            "type": "string",
            "description": "A number and its unit, such as `12 kn`; a number without a unit is sent bare, not as text.",
            "pattern": _pattern(point, marks),
            "not": {"pattern": rf"^\s*{point}\s*$"},
        },
        "Value": {
            "description": "A number, an array of numbers and missing marks, text with a unit, or values and unit.",
            "anyOf": [
                {"type": ["number", "null"]},
                {"$ref": "#/components/schemas/Numbers"},
                {"$ref": "#/components/schemas/TextWithUnit"},
                {
                    "type": "object",
                    "properties": {
                        "values": {"anyOf": [{"type": ["number", "null"]}, {"$ref": "#/components/schemas/Numbers"}]},
                        "unit": {"type": ["string", "null"]},
                    },
                    "required": ["values"],
                    "additionalProperties": False,
                },
            ],
        },
        "ValueText": {
            "type": "string",
            "description": (
                "A number; several, one per sample, parted by `;`; missing marks among them; one unit at the end, such "
                "as `7.5;8.1 m s-1`. With `decimal=comma` the decimal sign is a comma. Beside a CSV body also "
                "`@` and a column's header."
            ),
            "pattern": _pattern(point.replace(r"\.", "[.,]"), marks, r"@[\s\S]*|"),
        },
        "Form": {
            "type": "object",
            "description": "The parameters of the query; or a field or file `csv` or `json` that holds a whole body.",
            "properties": {"csv": {"type": "string"}, "json": {"type": "string"}},
            "additionalProperties": {"type": "string"},
        },
    }


def number_text(value: float) -> str:
    """Return a number as a person writes it, whole ones without a point."""
    return f"{value:.15g}"


def limits_of(term: Term) -> list[float | None]:
    """Return the limits of the possible, None where there is no limit."""
    return [limit if np.isfinite(limit) else None for limit in term.possible]


def units_of(term: Term) -> list[str]:
    """Return the units in which an input may be sent or a result asked for, its own first."""
    radioactive = any(gas.constants.get("decay_constant") for gas in GASES.values())
    kinds = (*UNIT_KINDS, *(("activity",) if radioactive else ())) if term.of_gas else ("amount",)
    return list(allowed(term.unit, "salinity" if term.name == "salinity" else None, kinds))


def unit_list(term: Term) -> str:
    """Return the name of the list of units that a term has in common with others."""
    if term.name == "salinity":
        return "practical salinity"
    return f"{term.unit} of a gas" if term.of_gas else term.unit


def unit_lists() -> dict[str, list[str]]:
    """Return the lists of units of everything that is sent or answered, by their names."""
    results = {name for quantity in QUANTITIES.values() for name in known_names(quantity)}
    terms = [term for term in TERMS.values() if term.is_input or term.name in results]
    return {unit_list(term): units_of(term) for term in terms}


def _bare(term: Term) -> Described:
    return {"x-unit": term.unit, "x-possible": limits_of(term)}


def term_facts(term: Term) -> Described:
    """Return what a page needs to know of an input, beyond how its value is written."""
    if term.name not in TERMS:
        return {"x-uncertainty-of": term.name.removeprefix(UNCERTAIN)}
    facts: Described = {"x-units": unit_list(term), "x-holds": term.holds}
    if term.above_lower_limit:
        facts["x-above-lower-limit"] = True
    if term.no_default_for_water:
        facts["x-no-default-for-water"] = list(term.no_default_for_water)
    if side := next((side.name for side in SIDES.values() if term.name in side.members), None):
        facts["x-side"] = side
    if term.used_with:
        facts["x-used-with"] = list(term.used_with)
    if term.standard_name:
        facts["x-standard-name"] = term.standard_name
    return facts


def _term_of(field: Measured) -> Term:
    """Return the term that a field is told as: an uncertainty has the unit of its input and nothing else of it."""
    if field.term.name in TERMS:
        return field.term
    return Term(
        field.term.name,
        field.term.unit,
        field.metadata.get("description", ""),
        is_input=True,
        possible=(0.0, np.inf),
        holds=field.term.holds,
        of_gas=field.term.of_gas,
    )


def _family_facts(family: Family) -> Described:
    """Return which method each gas uses by default, and for which gases the others are, where not for all."""
    gases = gases_by_choice(family)
    some = {choice: names for choice, names in gases.items() if len(names) < len(GASES)}
    return {"x-default-by-gas": defaults_by_gas(family), **({"x-gases-by-choice": some} if some else {})}


def patterned(quantity: Quantity) -> dict[str, Described]:
    """Return what is sent under names made of other names: a pattern for the name to what may stand there."""
    names = "|".join(uncertain_inputs(quantity))
    number = {"type": "number", "minimum": -1, "maximum": 1}
    text = {"type": "string", "pattern": rf"^\s*(?:{NUMBER.pattern})\s*$"}
    return {
        rf"^{UNCERTAIN}(?:{names})$": {
            "$ref": "#/components/schemas/Value",
            "description": "standard uncertainty of the input, in the unit in which that is sent",
        },
        rf"^unit\.(?:{'|'.join(known_names(quantity))})$": {"type": "string", "description": "unit of the result"},
        rf"^{re.escape(CORRELATION)}\w+\.\w+$": {
            "description": "correlation of two inputs whose standard uncertainties are sent",
            "anyOf": [number, text],
        },
    }


def own_fields(_: OpenAPIConverter, field: fields.Field[Any], **__: Any) -> Described:
    """Describe one of our own fields as a member of a JSON body; apispec knows those of marshmallow itself."""
    if isinstance(field, Measured):
        return {"$ref": "#/components/schemas/Value"}
    if isinstance(field, Choice):
        numbers = [int(word) for word in field.choices if word.isdigit()]
        return {"enum": [*field.choices, *numbers]} if numbers else {"type": "string", "enum": list(field.choices)}
    if isinstance(field, Words):
        word, fewest = {"type": "string"}, 0 if field.may_be_empty else 1
        return {"anyOf": [word, {"type": "array", "items": word, "uniqueItems": True, "minItems": fewest}]}
    if isinstance(field, OptionNumber):
        kind = "integer" if field.whole else "number"
        number = {"type": kind, "minimum": field.low, "maximum": field.high}
        return {"anyOf": [number, {"type": "string", "pattern": rf"^\s*(?:{NUMBER.pattern})\s*$"}]}
    return {"type": "string"} if isinstance(field, Line) else {}


class Sent:
    """The inputs and options of one quantity, as JSON members and as query parameters."""

    def __init__(self, quantity: Quantity, known: Mapping[str, fields.Field[Any]], converter: OpenAPIConverter) -> None:
        self.quantity, self.converter = quantity, converter
        self.fields = {name: field for name, field in known.items() if not isinstance(field, fields.Dict)}
        self.families = {family.option: family for family in quantity_families(quantity)}

    @property
    def required(self) -> list[str]:
        """Return the names without which no question can be asked."""
        return [name for name, field in self.fields.items() if field.required]

    def members(self) -> dict[str, Described]:
        """Return the members of a JSON body by name; what a page needs beyond the value stands on the parameter."""
        found = {}
        for name, field in self.fields.items():
            if isinstance(field, Measured) and field.term.name not in TERMS:
                continue  # told by a pattern
            member = self.converter.field2property(field)
            if isinstance(field, Measured):
                assumed = field.term.default
                member |= _bare(field.term) | ({} if assumed is None else {"default": assumed})
            if isinstance(field, Choice) and (default := self._first(name, field)) is not None:
                member["default"] = default
            found[name] = member
        return found

    def parameters(self) -> list[Described]:
        """Return the query parameters, in the order of the vocabulary."""
        found = [self._parameter(name, field) for name, field in self.fields.items()]
        return found + [
            {"name": f"unit.{name}", "in": "query", "schema": schema, **about, "x-units": unit_list(TERMS[name])}
            for name, schema, about in self._units()
        ]

    def _parameter(self, name: str, field: fields.Field[Any]) -> Described:
        about: Described = {"description": field.metadata.get("description", "")}
        schema: Described
        if isinstance(field, Measured):
            term = _term_of(field)
            schema = {"$ref": "#/components/schemas/ValueText"}
            if term.default is not None:
                schema["default"] = number_text(term.default)
            if term.example is not None:
                about["example"] = number_text(term.example)
        elif isinstance(field, Choice):
            schema = {"type": "string", "enum": list(field.choices)}
            if (default := self._first(name, field)) is not None:
                schema["default"] = default
        elif isinstance(field, Words):
            schema = {"type": "string"}
        else:
            schema = self.converter.field2property(field)
        return {"name": name, "in": "query", "schema": schema, **about, **self._facts(name, field)}

    def _facts(self, name: str, field: fields.Field[Any]) -> Described:
        if isinstance(field, Measured):
            return _bare(_term_of(field)) | term_facts(_term_of(field))
        facts = _family_facts(self.families[name]) if name in self.families else {}
        if isinstance(field, Words):
            choices = list(field.metadata.get("choices", ()))
            if name == "pick":
                choices = [*known_names(self.quantity), "all"]
            facts = {"x-several": True, **({"x-choices": choices} if choices else {}), **facts}
        if name == "gas":
            facts["x-titles"] = {gas.name: gas.title for gas in GASES.values()}
        return facts

    def _first(self, name: str, field: Choice) -> str | None:
        return None if name in NO_DEFAULT or name in self.families else field.choices[0]

    def _units(self) -> Iterator[tuple[str, Described, Described]]:
        """Yield each result with the schema of its unit and what is said of it."""
        for name in known_names(self.quantity):
            default = self.quantity.units.get(name, TERMS[name].unit)
            yield name, {"type": "string", "default": default}, {"description": f"unit of {name}"}
