"""The numbers of a request: one value, a list or a column, with its unit, read as an array in one conversion."""

import re
from dataclasses import dataclass, replace
from typing import Any

import numpy as np
from marshmallow import ValidationError, fields

from service.physics.declare import Array, Term
from service.physics.faults import Fault

NUMBER = re.compile(r"[+-]?(?:[0-9]+(?:\.[0-9]*)?|\.[0-9]+)(?:[eE][+-]?[0-9]+)?", re.ASCII)
COMMA_NUMBER = re.compile(NUMBER.pattern.replace(r"\.", ","), re.ASCII)
LOST_PLUS = re.compile(r"[eE] [0-9]", re.ASCII)
DECIMAL_COMMA = "a comma: write a decimal point, or send decimal=comma; lists are parted by ;"
MISSING_MARKS = frozenset({"", "na", "nan", "null"})
PLAIN_TYPES = {int, float}
READ_AT_ONCE = {*PLAIN_TYPES, type(None)}  # numpy reads None as NaN
NO_NUMBERS = {bool: "true or false", list: "an array inside an array", dict: "an object inside an array"}
SHOWN = 60  # characters of a bad value that are repeated to its sender


class Numbers(list[Any]):
    """A JSON array of which its reader knows that it holds nothing but numbers and null."""

    __slots__ = ()


class Text(str):
    """A value from a query or a form, where numbers are text."""

    __slots__ = ()


@dataclass(frozen=True, slots=True)
class Column:
    """A CSV column that stands for an input, with the unit of its header."""

    index: int
    header: str
    unit: str | None


@dataclass(frozen=True, slots=True)
class Reading:
    """An input as sent: its numbers, or the column they will come from, and the unit, None for the term's own."""

    values: Array | None
    unit: str | None
    column: Column | None = None


def _fault(term: Term, code: str, reason: str, sample: int | None = None) -> ValidationError:
    allowed = f"a number in {term.unit}" if term.unit != "1" else "a number"
    # marshmallow carries whatever a message is; a fault says more than a sentence
    return ValidationError([Fault(code, term.name, reason, allowed, sample)])


def shown(value: object) -> str:
    """Return a value as it may be repeated to its sender, quoted and cut."""
    text = repr(str(value)[: SHOWN + 1])
    return text if len(text) <= SHOWN + 2 else text[: SHOWN - 3] + "...'"


class Measured(fields.Field[Reading]):
    """A number, a list of numbers, text with a unit, or a CSV column."""

    def __init__(self, term: Term, prefix: str = "", **more: Any) -> None:
        super().__init__(**more)
        self.term = replace(term, name=prefix + term.name) if prefix else term

    def _deserialize(self, value: Any, attr: str | None, data: Any, **kwargs: Any) -> Reading:
        if isinstance(value, Column):
            return Reading(None, value.unit, value)
        if isinstance(value, Text):
            return self._from_text(value, comma=bool(data.get("decimal") == "comma"))
        if isinstance(value, str):
            return self._from_string(value)
        if isinstance(value, dict):
            return self._from_object(value)
        return Reading(self._array(value if isinstance(value, list) else [value]), None)

    def _from_object(self, value: dict[str, Any]) -> Reading:
        if set(value) - {"values", "unit"} or "values" not in value:
            raise _fault(self.term, "not_a_number", 'an object must be {"values": [...], "unit": "..."}')
        unit = value.get("unit")
        if unit is not None and not isinstance(unit, str):
            raise _fault(self.term, "unit", "the unit must be a string")
        numbers = value["values"]
        if isinstance(numbers, str | dict):
            raise _fault(self.term, "not_a_number", '"values" must be a number or an array of numbers')
        return Reading(self._array(numbers if isinstance(numbers, list) else [numbers]), unit)

    def _from_string(self, value: str) -> Reading:
        if value.strip().lower() in MISSING_MARKS:
            return Reading(np.array([np.nan]), None)
        match = NUMBER.match(value.strip())
        unit = value.strip()[match.end() :].strip() if match else ""
        if match and not unit:
            raise _fault(self.term, "not_a_number", f"{shown(value)} is text: send a bare number, or one with a unit")
        return self._from_text(value, comma=False)

    def _from_text(self, text: str, comma: bool) -> Reading:
        parts = [part.strip() for part in text.split(";")]
        if len(parts) > 1 and not parts[-1]:
            parts.pop()
        numbers, unit = [], None
        for index, part in enumerate(parts):
            number, rest = self._number(part, index + 1 if len(parts) > 1 else None, comma)
            if rest and index < len(parts) - 1:
                raise _fault(self.term, "not_a_number", f"{shown(part)}: the unit stands once, at the end", index + 1)
            numbers.append(number)
            unit = rest or None
        return Reading(np.array(numbers, dtype=float), unit)

    def _number(self, part: str, sample: int | None, comma: bool) -> tuple[float, str]:
        word, _, rest = part.partition(" ")
        if word.lower() in MISSING_MARKS:
            return np.nan, rest.strip()
        match = (COMMA_NUMBER if comma else NUMBER).match(part)
        if match is None:
            raise _fault(self.term, "not_a_number", f"{shown(part)} is not a number", sample)
        rest = part[match.end() :].strip()
        if rest.startswith("," if not comma else "."):
            said = "a point: decimal=comma was sent" if comma else DECIMAL_COMMA
            raise _fault(self.term, "decimal_comma", f"{shown(part)} has {said}", sample)
        if LOST_PLUS.match(rest):
            reason = f"{shown(part)} has lost its +: in an address, + means a blank; write %2B or leave it out"
            raise _fault(self.term, "not_a_number", reason, sample)
        return float(match.group().replace(",", ".")), rest

    def _array(self, numbers: list[Any]) -> Array:
        if not numbers:
            raise _fault(self.term, "length", "holds no values")
        if not isinstance(numbers, Numbers) and not set(map(type, numbers)) <= READ_AT_ONCE:
            numbers = self._elements(numbers)
        try:
            return np.array(numbers, dtype=float)
        except OverflowError as error:
            raise _fault(self.term, "not_a_number", "holds an integer beyond the range of numbers") from error

    def _elements(self, elements: list[Any]) -> list[float]:
        """Return an array that is not all numbers as one that is, or refuse all that is neither number nor missing."""
        numbers: list[float] = []
        messages: list[Any] = []
        for index, element in enumerate(elements):
            if type(element) in PLAIN_TYPES:
                numbers.append(element)
            elif element is None or (isinstance(element, str) and element.strip().lower() in MISSING_MARKS):
                numbers.append(np.nan)
            else:
                what = shown(element) if isinstance(element, str) else NO_NUMBERS[type(element)]
                messages += _fault(self.term, "not_a_number", f"{what} is not a number", index + 1).messages
        if messages:
            raise ValidationError(messages)
        return numbers
