"""Which methods there are for a gas, and which of them gives a term where some inputs are known."""

from collections.abc import Collection, Iterable, Mapping
from functools import lru_cache

from service.physics.declare import (
    COEFFICIENTS,
    DERIVED,
    FAMILIES,
    FAMILY_OF,
    SIDES,
    STEPS,
    TERMS,
    DeclarationError,
    Family,
    Gas,
    Step,
)

TRANSFER_FAMILY = "transfer_velocity"
GIVEN = "given"  # stands for a method where the caller brings the numbers


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


@lru_cache(maxsize=1)
def transfer_methods() -> dict[str, Step]:
    """Return the leading record of every transfer velocity method by its name."""
    found: dict[str, Step] = {}
    for result in FAMILIES[TRANSFER_FAMILY].results:
        for method, ways in STEPS.get(result, {}).items():
            if method and method != GIVEN:
                found.setdefault(method, ways[0])
    return found


def methods_for_water(gas: Gas, water: str | None) -> list[str]:
    """Return the transfer velocity methods made for a kind of water."""
    names = [name for name in methods_for(gas, FAMILIES[TRANSFER_FAMILY]) if name != GIVEN]
    return [name for name in names if water is None or water in transfer_methods()[name].water]


def side_of(term: str) -> str | None:
    """Return the side that can give a term, for telling a caller what is missing."""
    ways = {step.way for steps in STEPS.get(term, {}).values() for step in steps}
    return next((name for name, record in SIDES.items() if ways & set(record.members)), None)


def terms_of(step: Step) -> tuple[str, ...]:
    """Return the terms that a step takes."""
    return tuple(name for name in step.parameters if name != COEFFICIENTS)


def _available(step: Step, result: str, gas: Gas) -> bool:
    return not step.needs_coefficients or gas.block(result, step.method) is not None


class Chooser:
    """The choice of steps for one gas, the inputs given, and the methods asked for."""

    def __init__(self, gas: Gas, given: Collection[str], chosen: Mapping[str, str]) -> None:
        self.gas, self.given = gas, given
        self.methods = {
            name: method
            for name, family in FAMILIES.items()
            if (method := chosen.get(name) or default_method(gas, family))
        }
        blocks = [block for block in gas.blocks if self._method_of(block.result) == block.method]
        self.defaults = {name: value for block in blocks for name, value in block.supplies.items()}
        self._cones: dict[str, frozenset[str]] = {}
        self._open: set[str] = set()

    def _method_of(self, term: str) -> str | None:
        family = FAMILY_OF.get(term)
        return self.methods.get(family.name) if family else None

    def select(self, term: str) -> Step | None:
        """Return the one step that gives a term here: by its method, else by what is given, else by definition."""
        if term in self.given or term in self.gas.constants:
            return None
        for method in dict.fromkeys((self._method_of(term), None)):
            ways = [s for s in STEPS.get(term, {}).get(method, ()) if _available(s, term, self.gas)]
            for known in (self.given, self.defaults, (None,)):
                for step in ways:
                    if step.way in known:
                        return step
        return None

    def constant(self, term: str) -> float | None:
        """Return the constant that the gas, the method chosen for the term's family, or the term itself brings."""
        if term in self.gas.constants:
            return self.gas.constants[term]
        family = FAMILY_OF.get(term)
        if family and term != family.results[0]:
            lead = self.select(family.results[0])
            if lead and term in lead.supplies:
                return lead.supplies[term]
        return TERMS[term].constant

    def cone(self, term: str) -> frozenset[str]:
        """Return all terms that a term depends on here, itself included."""
        if term not in self._cones:
            if term in self._open:
                raise DeclarationError(f"{term} is needed to compute itself")
            self._open.add(term)
            self._cones[term] = frozenset({term}).union(*(self.cone(name) for name in self._needs(term)))
            self._open.discard(term)
        return self._cones[term]

    def _needs(self, term: str) -> Iterable[str]:
        if term in DERIVED and term not in self.given:
            return (DERIVED[term].of, *DERIVED[term].replace.values())
        step = self.select(term)
        return terms_of(step) if step else ()

    def same(self, term: str) -> str:
        """Return the term that a term is only another name for here, or itself."""
        while (step := self.select(term)) and step.same_as:
            term = step.same_as
        return term
