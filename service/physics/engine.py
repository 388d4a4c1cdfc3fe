"""The engine: finds the steps that lead from what is given to what is wanted, and runs them."""

from collections.abc import Callable, Iterable, Mapping
from dataclasses import dataclass
from functools import lru_cache
from typing import Any

import numpy as np

from service.physics.declare import (
    COEFFICIENTS,
    DERIVED,
    FAMILIES,
    FAMILY_OF,
    GASES,
    SIDES,
    STEPS,
    TERMS,
    Array,
    DeclarationError,
    Family,
    Gas,
    Limits,
    Remark,
    Step,
)


@dataclass(frozen=True, slots=True)
class Node:
    """A step placed in a plan: the function with its gas bound, and the keys of what goes in and out."""

    step: Step
    function: Callable[..., Any]
    arguments: tuple[str, ...]
    results: tuple[str, ...]


@dataclass(frozen=True, slots=True)
class Range:
    """Limits that a method states for one term, under the key at which the plan holds it."""

    step: Step
    term: str
    key: str
    limits: Limits
    recommended: bool


@dataclass(frozen=True, slots=True)
class Plan:
    """The steps to run in order, the inputs they need, and what the caller must be told of them."""

    nodes: tuple[Node, ...]
    keys: Mapping[str, str]
    leaves: tuple[str, ...]
    defaults: Mapping[str, float]
    constants: Mapping[str, Array]
    missing: tuple[str, ...]
    records: tuple[Step, ...]
    methods: Mapping[str, str]
    ranges: tuple[Range, ...]
    remarks: tuple[tuple[Remark, tuple[str, ...]], ...]


def methods_for(gas: Gas, family: Family) -> list[str]:
    """Return the names of a family's methods that can answer for a gas, in order of declaration."""
    names: dict[str, None] = {}
    for result in family.results:
        for method, ways in STEPS.get(result, {}).items():
            if method is not None and any(_available(way, result, gas) for way in ways):
                names[method] = None
    return list(names)


def default_method(gas: Gas, family: Family) -> str | None:
    """Return the method that a family uses for a gas when none is asked for."""
    if name := gas.defaults.get(family.name, family.default):
        return name
    return next(iter(methods_for(gas, family)), None)


def _available(step: Step, result: str, gas: Gas) -> bool:
    return not step.needs_coefficients or gas.block(result, step.method) is not None


class _Planner:
    """One walk from the wanted terms back to the inputs."""

    def __init__(self, gas: Gas, given: frozenset[str], chosen: Mapping[str, str]) -> None:
        self.gas, self.given = gas, given
        self.methods = {
            name: method
            for name, family in FAMILIES.items()
            if (method := chosen.get(name) or default_method(gas, family))
        }
        blocks = [block for block in gas.blocks if self._method_of(block.result) == block.method]
        self.defaults = {name: value for block in blocks for name, value in block.supplies.items()}
        self.nodes: list[Node] = []
        self.placed: set[tuple[str, ...]] = set()
        self.open: set[str] = set()
        self.cones: dict[str, frozenset[str]] = {}
        self.keys: dict[str, str] = {}
        self.leaves: dict[str, float | None] = {}
        self.constants: dict[str, Array] = {}
        self.missing: dict[str, None] = {}
        self.records: dict[Step, None] = {}
        self.ranges: list[Range] = []
        self.remarks: list[tuple[Remark, tuple[str, ...]]] = []

    def _method_of(self, term: str) -> str | None:
        family = FAMILY_OF.get(term)
        return self.methods.get(family.name) if family else None

    def select(self, term: str) -> Step | None:
        """Return the one step that gives a term here: by its method, else by what is given, else by definition."""
        for method in dict.fromkeys((self._method_of(term), None)):
            ways = [s for s in STEPS.get(term, {}).get(method, ()) if _available(s, term, self.gas)]
            for known in (self.given, self.defaults, (None,)):
                for step in ways:
                    if step.way in known:
                        return step
        return None

    def supplied(self, term: str) -> float | None:
        """Return the constant that the gas, or the method chosen for the term's family, brings for a term."""
        if (constant := self.gas.constants.get(term, TERMS[term].constant)) is not None:
            return constant
        if family := FAMILY_OF.get(term):
            lead = self.select(family.results[0]) if term != family.results[0] else None
            return lead.supplies.get(term) if lead else None
        return None

    def cone(self, term: str) -> frozenset[str]:
        """Return all terms that a term depends on here, itself included."""
        if term not in self.cones:
            if term in self.open:
                raise DeclarationError(f"{term} is needed to compute itself")
            self.open.add(term)
            self.cones[term] = frozenset({term}).union(*(self.cone(name) for name in self._inputs(term)))
            self.open.discard(term)
        return self.cones[term]

    def _inputs(self, term: str) -> tuple[str, ...]:
        if term in self.given or term in self.gas.constants:
            return ()
        if term in DERIVED:
            return (DERIVED[term].of, *DERIVED[term].replace.values())
        step = self.select(term)
        return tuple(name for name in step.parameters if name != COEFFICIENTS) if step else ()

    def _same(self, term: str) -> str:
        while term not in self.given and (step := self.select(term)) and step.same_as:
            term = step.same_as
        return term

    def visit(self, term: str, swap: Mapping[str, str]) -> str:
        """Place all that a term needs and return the key under which its value will stand."""
        if term in swap:
            return self.visit(swap[term], {})
        cone = self.cone(term) if swap else frozenset()
        swap = {old: new for old, new in swap.items() if old in cone and self._same(new) != old}
        suffix = "@" + ",".join(f"{old}={new}" for old, new in swap.items()) if swap else ""
        if term + suffix not in self.keys:
            self.keys[term + suffix] = self._find(term, swap, suffix)
        return self.keys[term + suffix]

    def _find(self, term: str, swap: Mapping[str, str], suffix: str) -> str:
        if term in self.given:
            return self._leaf(term)
        if term in DERIVED:
            return self.visit(DERIVED[term].of, {**DERIVED[term].replace, **swap})
        step = None if term in self.gas.constants else self.select(term)
        if step:
            return self._place(term, step, swap, suffix)
        if (constant := self.supplied(term)) is not None:
            self.constants[term] = np.array([constant])
            return term
        return self._leaf(term)

    def _leaf(self, term: str) -> str:
        default = self.defaults.get(term, TERMS[term].default)
        if term not in self.given and default is None:
            self.missing[term] = None
        self.leaves[term] = default
        return term

    def _place(self, term: str, step: Step, swap: Mapping[str, str], suffix: str) -> str:
        for assumed in step.assumes:
            self._leaf(assumed)
        around = {} if step.in_situ else swap
        arguments = tuple(self.visit(name, around) for name in step.parameters if name != COEFFICIENTS)
        self.records[step] = None
        self._note(step, term, swap)
        if step.same_as:
            return arguments[0]
        results = tuple(name + suffix for name in step.results)
        if results not in self.placed:
            self.placed.add(results)
            self.nodes.append(Node(step, self._bind(step, term), arguments, results))
        return term + suffix

    def _note(self, step: Step, term: str, swap: Mapping[str, str]) -> None:
        block = self.gas.block(term, step.method)
        stated = {**step.valid, **(block.valid if block else {})}
        for ranges, recommended in ((stated, False), (step.recommended, True)):
            for name, limits in ranges.items():
                entry = Range(step, name, self.visit(name, swap), limits, recommended)
                if entry not in self.ranges:
                    self.ranges.append(entry)
        for remark in step.remarks:
            remark_keys = (remark, tuple(self.visit(name, swap) for name in remark.terms))
            if remark_keys not in self.remarks:
                self.remarks.append(remark_keys)

    def _bind(self, step: Step, term: str) -> Callable[..., Any]:
        if not step.needs_coefficients:
            return step.function
        block = self.gas.block(term, step.method)
        if block is None or step.parameters[0] != COEFFICIENTS:
            raise DeclarationError(f"{step.name} must take the coefficients first")
        function, coefficients = step.function, block.coefficients
        return lambda *values: function(coefficients, *values)

    def plan(self, wanted: Iterable[str]) -> Plan:
        """Return the plan for the wanted terms."""
        keys = {term: self.visit(term, {}) for term in wanted}
        defaults = {name: value for name, value in self.leaves.items() if name not in self.given and value is not None}
        return Plan(
            tuple(self.nodes),
            keys,
            tuple(self.leaves),
            defaults,
            self.constants,
            tuple(self.missing),
            tuple(self.records),
            self.methods,
            tuple(self.ranges),
            tuple(self.remarks),
        )


@lru_cache(maxsize=2048)
def plan(wanted: tuple[str, ...], given: frozenset[str], chosen: tuple[tuple[str, str], ...], gas_name: str) -> Plan:
    """Return the steps from what is given to what is wanted; the only place where methods are dispatched.

    Parameters
    ----------
    wanted : tuple of str
        Terms to compute.
    given : frozenset of str
        Inputs that the caller sends.
    chosen : tuple of (family, method)
        Methods asked for; other families use their default for the gas.
    gas_name : str
        The gas.

    Returns
    -------
    Plan
        With `missing` naming what is neither given nor has a default.
    """
    return _Planner(GASES[gas_name], given, dict(chosen)).plan(wanted)


def run(steps: Plan, values: Mapping[str, Array]) -> dict[str, Array]:
    """Run a plan.

    Parameters
    ----------
    steps : Plan
        What to run.
    values : mapping of str to (1,) or (N,) array
        The inputs, in the unit of their term.

    Returns
    -------
    dict of str to array
        Every input, intermediate number and result by its key. NaN in, NaN out.
    """
    known = {name: np.array([value]) for name, value in steps.defaults.items()}
    known |= steps.constants
    known |= values
    with np.errstate(all="ignore"):
        for node in steps.nodes:
            outcome = node.function(*[known[key] for key in node.arguments])
            if len(node.results) == 1:
                known[node.results[0]] = outcome
            else:
                known.update(zip(node.results, outcome, strict=True))
    return known


def side_of(term: str) -> str | None:
    """Return the side that can give a term, for telling a caller what is missing."""
    ways = {step.way for steps in STEPS.get(term, {}).values() for step in steps}
    return next((name for name, record in SIDES.items() if ways & set(record.members)), None)
