"""Figures from outside that every method is held against: the rows, how near a number must come, what each proves."""

import csv
from collections.abc import Callable, Iterable, Mapping
from dataclasses import dataclass
from functools import cached_property, lru_cache
from importlib.resources import files
from typing import Any, TypeVar
from urllib.parse import parse_qsl, urlencode

import numpy as np

from service.physics import quantities  # noqa: F401  imported for what it declares
from service.physics.declare import (
    FAMILIES,
    FAMILY_OF,
    GASES,
    NO_GAS,
    QUANTITIES,
    SIDES,
    STEPS,
    TERMS,
    DeclarationError,
    Family,
    Source,
    Step,
)
from service.physics.engine import plan, run
from service.physics.methods import GIVEN, TRANSFER_FAMILY
from service.physics.plans import Plan
from service.physics.sources import SOURCES
from service.physics.units import Conversion, conversion

COLUMNS = ("id", "quantity", "result", "inputs", "value", "unit", "tolerance", "kind", "source", "where", "note")
RECORD = (
    *("id", "gas", "methods", "quantity", "result", "inputs", "published", "computed", "unit", "difference"),
    *("tolerance", "tolerance_stated", "holds", "kind", "source", "citation", "doi", "where", "note", "problem"),
)
STEP = "step"  # in the place of a quantity: the result is any term, straight from the plan
NONE = "none"

# What a figure can be, the strongest first, and what it proves of a method.
KINDS: Mapping[str, str] = {
    "paper": "published figure: a value printed in a paper comes out",
    "standard": "published figure: a value of a standard comes out",
    "handbook": "published figure: a value of a handbook comes out",
    "worked example": "published figure: a worked example comes out",
    "library": "independent library: a general-purpose library agrees",
    "formula": "independent formula: another published formula agrees within a stated bound",
    "transcription": "none from outside yet: transcription only, the printed coefficients computed a second time",
}
OPTIONS = ("gas", "water", "mass_as")  # what a caller may say beside inputs and methods
# Members of families that are choices, not published methods.
CHOICES = (GIVEN, "none", "upward", "downward", "linear", "nonlinear")
Cell = TypeVar("Cell")


@dataclass(frozen=True, slots=True)
class Tolerance:
    """How far a number may be off: absolute in the row's unit, or relative to the published value."""

    value: float
    relative: bool
    text: str

    def of(self, published: float) -> float:
        """Return what is allowed at a published value, in its unit."""
        return self.value * abs(published) if self.relative else self.value


@dataclass(frozen=True, eq=False)
class Check:
    """One figure from outside: the question that should give it, where it is printed, and how near to come."""

    id: str
    quantity: str
    result: str
    inputs: Mapping[str, str]
    value: float
    unit: str
    tolerance: Tolerance
    kind: str
    source: Source
    where: str
    note: str

    @property
    def gas(self) -> str | None:
        """Return the gas, None for a property of water, air or wind."""
        return self.inputs.get("gas")

    @cached_property
    def conversion(self) -> Conversion:
        """Return the conversion between the row's unit and that of its term."""
        term, gas = TERMS[self.result], GASES.get(self.gas or "")
        mass_as = self.inputs.get("mass_as", "gas")
        return conversion(self.unit, term.unit, gas=gas if term.of_gas else None, mass_as=mass_as)

    @cached_property
    def term(self) -> str:
        """Return the term that gives the result in the row's unit."""
        per_litre = TERMS[self.result].per_litre
        return per_litre if per_litre and self.conversion.basis == "per_litre" else self.result

    @cached_property
    def plan(self) -> Plan:
        """Return the plan that a caller's question with these names leads to."""
        options = {family.option: family.name for family in FAMILIES.values()}
        chosen = {options[name]: value for name, value in self.inputs.items() if name in options}
        given = frozenset(name for name in self.inputs if name in TERMS)
        own = FAMILIES[TRANSFER_FAMILY].given_by
        if own and given & set(SIDES[own].members):
            chosen[TRANSFER_FAMILY] = GIVEN
        gas = self.gas or NO_GAS.name
        return plan((self.term,), given, tuple(sorted(chosen.items())), gas)

    @cached_property
    def methods(self) -> tuple[tuple[str, str], ...]:
        """Return what the row is evidence for, as (family, method).

        All methods that took part in the number count, but not those that only handed an input on; and the source of
        the very step that gives the result, under the name of the result.
        """
        found: dict[tuple[str, str], None] = {}
        for record in self.plan.records:
            family = FAMILY_OF.get(record.results[0])
            if record.same_as or record.method in CHOICES:
                continue
            if family and record.method:
                found[family.name, record.method] = None
            elif record.source and self.term in record.results:
                found[self.result, record.source.key] = None
        return tuple(found)


@dataclass(frozen=True, slots=True)
class Finding:
    """What a check came to: the number computed now, NaN and the reason where there is none."""

    check: Check
    computed: float
    problem: str | None = None

    @property
    def difference(self) -> float:
        """Return computed minus published, in the row's unit."""
        return self.computed - self.check.value

    @property
    def holds(self) -> bool:
        """Tell whether the number is as near to the published one as the row asks."""
        return bool(abs(self.difference) <= self.check.tolerance.of(self.check.value))

    def record(self) -> dict[str, Any]:
        """Return the finding as it is told to callers; a number that could not be had is None."""
        one, known = self.check, bool(np.isfinite(self.computed))
        values = (
            one.id,
            one.gas,
            dict(one.methods),
            one.quantity,
            one.result,
            urlencode(one.inputs),
            one.value,
            self.computed if known else None,
            one.unit,
            self.difference if known else None,
            one.tolerance.of(one.value),
            one.tolerance.text,
            self.holds,
            one.kind,
            one.source.key,
            one.source.citation,
            one.source.doi,
            one.where,
            one.note or None,
            self.problem,
        )
        return dict(zip(RECORD, values, strict=True))


def tolerance(text: str) -> Tolerance:
    """Return a tolerance from its spelling: ``0.001`` in the unit of the value, or ``rel 1e-5``."""
    relative = text.startswith("rel ")
    value = float(text.removeprefix("rel "))
    if not value >= 0.0:
        raise ValueError("must not be negative")
    return Tolerance(value, relative, text)


def check(row: Mapping[str, str]) -> Check:
    """Return a check from a row of data.

    Raises
    ------
    DeclarationError
        Naming the row, where it speaks of something that does not exist.
    """
    for column, known in (("source", SOURCES), ("kind", KINDS), ("quantity", (*QUANTITIES, STEP)), ("result", TERMS)):
        if row[column] not in known:
            raise DeclarationError(f"check {row['id']}: {column} {row[column]!r} is unknown")
    return Check(
        row["id"],
        row["quantity"],
        row["result"],
        _read(row, "inputs", _names),
        _read(row, "value", float),
        row["unit"],
        _read(row, "tolerance", tolerance),
        row["kind"],
        SOURCES[row["source"]],
        row["where"],
        row["note"],
    )


def _read(row: Mapping[str, str], column: str, read: Callable[[str], Cell]) -> Cell:
    try:
        return read(row[column])
    except ValueError as error:
        raise DeclarationError(f"check {row['id']}: {column} {row[column]!r}: {error}") from error


def _names(text: str) -> Mapping[str, str]:
    """Return inputs and options by name from a query string."""
    found = dict(parse_qsl(text, keep_blank_values=True, strict_parsing=True))
    known = (*TERMS, *(family.option for family in FAMILIES.values()), *OPTIONS)
    if strangers := [name for name in found if name not in known]:
        raise ValueError(f"{', '.join(strangers)} is unknown")
    return found


@lru_cache(maxsize=1)
def checks() -> tuple[Check, ...]:
    """Return every check of the data files beside this module, in the order of the files.

    Raises
    ------
    DeclarationError
        Where a file lacks a column, a row is wrong, or two rows have one name.
    """
    found: dict[str, Check] = {}
    data = (entry for entry in files("service.physics.checks").iterdir() if entry.name.endswith(".csv"))
    for entry in sorted(data, key=lambda each: each.name):
        reader = csv.DictReader(entry.read_text(encoding="utf-8").splitlines(), strict=True)
        if tuple(reader.fieldnames or ()) != COLUMNS:
            raise DeclarationError(f"{entry.name}: the columns must be {', '.join(COLUMNS)}")
        for row in reader:
            if None in row or None in row.values():
                raise DeclarationError(f"{entry.name}, line {reader.line_num}: must have {len(COLUMNS)} cells")
            one = check(row)
            if one.id in found:
                raise DeclarationError(f"check {one.id} stands twice")
            found[one.id] = one
    return tuple(found.values())


def compute_step(row: Check) -> float:
    """Return the number of a row that asks for a term directly, in the row's unit; of a series the last one.

    Raises
    ------
    DeclarationError
        Where an input is missing or is no number.
    """
    if row.plan.missing:
        raise DeclarationError(f"check {row.id}: {', '.join(row.plan.missing)} is missing")
    sent = {name: text.split(";") for name, text in row.inputs.items() if name in TERMS}
    known = run(row.plan, {name: np.array(numbers, dtype=float) for name, numbers in sent.items()})
    return float(row.conversion.from_base(known[row.plan.keys[row.term]])[-1])


def declared_methods() -> tuple[tuple[Family, str], ...]:
    """Return every published method with its family, in the order of declaration."""
    found: dict[tuple[str, str], None] = {}
    for result, by_method in STEPS.items():
        if family := FAMILY_OF.get(result):
            found |= {(family.name, method): None for method in by_method if method and method not in CHOICES}
    return tuple((FAMILIES[family], method) for family, method in found)


def sourced_definitions() -> tuple[Step, ...]:
    """Return the steps that rest on a publication without being one of several methods."""
    every = (step for by_method in STEPS.values() for step in by_method.get(None, ()))
    return tuple(dict.fromkeys(step for step in every if step.source))


@lru_cache(maxsize=1)
def _kinds() -> Mapping[tuple[str, str, str | None], tuple[str, ...]]:
    found: dict[tuple[str, str, str | None], list[str]] = {}
    for each in checks():
        for family, method in each.methods:
            for gas in {each.gas, None}:
                found.setdefault((family, method, gas), []).append(each.kind)
    return {key: tuple(kinds) for key, kinds in found.items()}


def strongest(kinds: Iterable[str]) -> str:
    """Return the strongest of some kinds, ``none`` where there is none."""
    present = set(kinds)
    return next((kind for kind in KINDS if kind in present), NONE)


def evidence(family: str, method: str, gas: str | None = None) -> dict[str, Any]:
    """Return which evidence a method has: the strongest kind among its checks, and how many there are.

    Parameters
    ----------
    family, method : str
        Which method.
    gas : str, optional
        The gas whose coefficients are meant; None for a method without such.
    """
    kinds = _kinds().get((family, method, gas), ())
    kind = strongest(kinds)
    nothing = "no published method: nothing to check" if method in CHOICES else "no check yet"
    return {"kind": kind, "meaning": KINDS.get(kind, nothing), "checks": len(kinds)}
