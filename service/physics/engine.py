"""The engine: finds the steps that lead from what is given to what is wanted, and runs them."""

from collections.abc import Iterable, Mapping
from functools import lru_cache
from typing import Any

import numpy as np

from service.physics.declare import DERIVED, GASES, NO_GAS, STAND_INS, TERMS, Array, Remark, Step
from service.physics.methods import Chooser, bind, terms_of
from service.physics.plans import Node, Plan, Range

Shared = dict[tuple[Any, ...], Any]  # outcomes by step and the very arrays that went in, for plans run on one input
Swap = Mapping[str, str]  # terms that stand in for others in a part of the plan


class _Planner:
    """One walk from the wanted terms back to the inputs."""

    def __init__(self, choose: Chooser) -> None:
        self.choose = choose
        self.nodes: dict[tuple[str, ...], Node] = {}
        self.keys: dict[str, str] = {}
        self.leaves: dict[str, float | None] = {}
        self.constants: dict[str, Array] = {}
        self.missing: dict[str, None] = {}
        self.records: dict[Step, None] = {}
        self.ranges: dict[Range, None] = {}
        self.remarks: dict[tuple[Remark, tuple[str, ...]], None] = {}

    def visit(self, term: str, swap: Swap) -> str:
        """Place all that a term needs and return the key under which its value will stand."""
        if term in swap:
            return self.visit(swap[term], {})
        reach = self.choose.reach(term) if swap else frozenset()
        swap = {old: new for old, new in swap.items() if old in reach and self.choose.same(new) != old}
        suffix = "@" + ",".join(f"{old}={new}" for old, new in swap.items()) if swap else ""
        if term + suffix not in self.keys:
            self.keys[term + suffix] = self._find(term, swap, suffix)
        return self.keys[term + suffix]

    def _find(self, term: str, swap: Swap, suffix: str) -> str:
        if term in DERIVED and term not in self.choose.given:
            inner = {old: swap.get(new, new) for old, new in DERIVED[term].replace.items()}
            return self.visit(DERIVED[term].of, {**swap, **inner})
        if step := self.choose.select(term):
            return self._place(term, step, swap, suffix)
        constant = None if term in self.choose.given else self.choose.constant(term)
        if constant is None:
            return self._leaf(term)
        self.constants[term] = np.array([constant])
        return term

    def _leaf(self, term: str) -> str:
        default = self.choose.defaults.get(term, TERMS[term].default)
        if term not in self.choose.given and default is None:
            self.missing[term] = None
        self.leaves[term] = default
        return term

    def _place(self, term: str, step: Step, swap: Swap, suffix: str) -> str:
        for name in step.assumes:
            self._leaf(name)
        self.missing.update(dict.fromkeys(name for name in step.needs_given if name not in self.choose.given))
        arguments = tuple(self.visit(name, swap) for name in terms_of(step))
        self.records[step] = None
        self._note(step, term, swap)
        if step.same_as:
            return arguments[0]
        results = tuple(name + suffix for name in step.results)
        if results not in self.nodes:
            self.nodes[results] = Node(step, bind(step, term, self.choose.gas), arguments, results)
        return term + suffix

    def _note(self, step: Step, term: str, swap: Swap) -> None:
        block = self.choose.gas.block(term, step.method)
        stated = {**step.valid, **(block.valid if block else {})}
        for ranges, recommended in ((stated, False), (step.recommended, True)):
            for name, limits in ranges.items():
                self.ranges[Range(step, name, self.visit(name, swap), limits, recommended)] = None
        for remark in self.choose.remarks(step):
            self.remarks[remark, tuple(self.visit(name, swap) for name in remark.terms)] = None

    def plan(self, wanted: Iterable[str]) -> Plan:
        """Return the plan for the wanted terms."""
        keys = {term: self.visit(term, STAND_INS) for term in wanted}
        given = self.choose.given
        return Plan(
            tuple(self.nodes.values()),
            keys,
            tuple(self.leaves),
            {name: value for name, value in self.leaves.items() if name not in given and value is not None},
            self.constants,
            tuple(self.missing),
            tuple(self.records),
            self.choose.methods,
            tuple(self.ranges),
            tuple(self.remarks),
        )


@lru_cache(maxsize=2048)
def plan(wanted: tuple[str, ...], given: frozenset[str], chosen: tuple[tuple[str, str], ...], gas: str) -> Plan:
    """Return the steps from what is given to what is wanted; the only place where methods are dispatched.

    Parameters
    ----------
    wanted, given : str
        Terms to compute, and inputs that the caller sends.
    chosen : tuple of (family, method)
        Methods asked for; other families use their default for the gas.
    gas : str
        The name of the gas.
    """
    return _Planner(Chooser(GASES.get(gas, NO_GAS), given, dict(chosen))).plan(wanted)


def run(steps: Plan, values: Mapping[str, Array], shared: Shared | None = None) -> dict[str, Array]:
    """Run a plan on (1,) or (N,) arrays and return every number by its key. NaN in, NaN out.

    Parameters
    ----------
    steps : Plan
        What to run.
    values : mapping of str to array
        The inputs, in the unit of their term.
    shared : dict, optional
        What other plans have computed from the same inputs; added to.
    """
    known = {name: np.array([value]) for name, value in steps.defaults.items()}
    known |= steps.constants
    known |= values
    with np.errstate(all="ignore"):
        for node in steps.nodes:
            arrays = [known[key] for key in node.arguments]
            called = (node.step, node.results, *map(id, arrays))
            _, outcome = (shared or {}).get(called, (None, None))
            if outcome is None:
                outcome = node.function(*arrays)
            if shared is not None:
                shared[called] = arrays, outcome  # the arrays are kept, so that their identities stay theirs
            if len(node.results) == 1:
                known[node.results[0]] = outcome
            else:
                known.update(zip(node.results, outcome, strict=True))
    return known
