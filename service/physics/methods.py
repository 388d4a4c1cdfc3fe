"""Which methods there are for a gas, and which of them gives a term where some inputs are known."""

from collections.abc import Callable, Collection, Iterable, Mapping
from dataclasses import replace
from functools import lru_cache
from typing import Any

import numpy as np
from numpy.typing import NDArray

from service.physics.declare import (
    AVERAGING,
    COEFFICIENTS,
    DERIVED,
    FAMILIES,
    FAMILY_OF,
    SIDES,
    STEPS,
    TERMS,
    Array,
    DeclarationError,
    Family,
    Gas,
    Remark,
    Side,
    Step,
)

TRANSFER_FAMILY = "transfer_velocity"
GIVEN = "given"  # stands for a method where the caller brings the numbers
ALWAYS_GIVEN = ("water_temperature", "salinity")  # what says of a method nothing that is its own
LONG_TERM, LONG_TERM_FROM = "long-term", 28 * 86400.0  # s, the shortest month


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


def method_by_input(given: Collection[str]) -> tuple[str, str] | None:
    """Return the transfer velocity method that an input chooses by itself, and that input; None where none does."""
    for method, ways in STEPS.get(FAMILIES[TRANSFER_FAMILY].results[0], {}).items():
        for way in (step.way for step in ways):
            if method and way in given:
                return method, str(way)
    return None


def ways_of(term: str, method: str | None) -> tuple[str, ...]:
    """Return the inputs by any one of which a method gives a term; none where it needs no certain one."""
    ways = [step.way for step in STEPS.get(term, {}).get(method, ())]
    return tuple(way for way in ways if way) if None not in ways else ()


def methods_giving(term: str, gas: Gas) -> tuple[str, ...]:
    """Return the methods that give a term for a gas."""
    by_method = STEPS.get(term, {}).items()
    return tuple(method for method, ways in by_method if method and any(_available(way, term, gas) for way in ways))


def wanting(gas: Gas, given: Collection[str], method: str) -> tuple[str, ...]:
    """Return what a transfer velocity method lacks for a gas, beyond temperature and salinity, where some is given."""
    choose = Chooser(gas, {*given, *ALWAYS_GIVEN}, {TRANSFER_FAMILY: method})
    return tuple(name for name in choose.leaves(TRANSFER_FAMILY) if choose.lacks(name))


def comparable(gas: Gas, water: str, given: Collection[str], wind_averaging: float | None) -> tuple[str, ...]:
    """Return the transfer velocity methods that may stand side by side for a water, whatever inputs they want.

    Left out are forms for long-term winds unless the wind is a mean over a month or longer, variants of one base, of
    several from one paper all but the recommended, and what has been replaced.

    Parameters
    ----------
    gas : Gas
        Of which gas.
    water : str
        The kind of water; a method of the caller's own is of any.
    given : collection of str
        Inputs sent.
    wind_averaging : float or None
        What the wind is averaged over. [s]

    Returns
    -------
    tuple of str
        In order of declaration.
    """
    own = method_by_input(given)
    long_term = wind_averaging is not None and wind_averaging >= LONG_TERM_FROM

    def fits(name: str) -> bool:
        record = transfer_methods()[name]
        made_for_it = water in record.water or (own is not None and own[0] == name)
        first_of_its_kind = record.in_all and record.variant_of is None and record.replaced_by is None
        in_season = long_term or record.wind_averaging != LONG_TERM
        return made_for_it and first_of_its_kind and in_season

    return tuple(name for name in methods_for(gas, FAMILIES[TRANSFER_FAMILY]) if name != GIVEN and fits(name))


def applicable(gas: Gas, water: str, given: Collection[str], wind_averaging: float | None) -> tuple[str, ...]:
    """Return those of the `comparable` methods for which the inputs at hand suffice."""
    every = comparable(gas, water, given, wind_averaging)
    return tuple(name for name in every if not wanting(gas, given, name))


def side_of(term: str) -> str | None:
    """Return the side that can give a term, for telling a caller what is missing."""
    ways = {step.way for steps in STEPS.get(term, {}).values() for step in steps}
    return next((name for name, record in SIDES.items() if ways & set(record.members)), None)


def members_for(side: Side, gas: Gas) -> tuple[str, ...]:
    """Return the members of a side without those that lead somewhere for other gases alone."""
    every = [(result, each) for result, ways in STEPS.items() for steps in ways.values() for each in steps]
    used = {each.way for _, each in every}
    open_to_it = {each.way for result, each in every if _available(each, result, gas)}
    return tuple(name for name in side.members if name in open_to_it or name not in used)


def terms_of(step: Step) -> tuple[str, ...]:
    """Return the terms that a step takes."""
    return tuple(name for name in step.parameters if name != COEFFICIENTS)


def remarks_of(step: Step) -> tuple[Remark, ...]:
    """Return what may have to be remarked on where a step is used: its own, and those of its wind averaging."""
    return (*step.remarks, *AVERAGING.get(step.wind_averaging or "", ()))


def bind(step: Step, term: str, gas: Gas) -> Callable[..., Any]:
    """Return a step's function, with the gas's coefficients closed over where it takes any."""
    if not step.needs_coefficients:
        return step.function
    block = gas.block(term, step.method)
    if block is None or step.parameters[0] != COEFFICIENTS:
        raise DeclarationError(f"{step.name} must take the coefficients first")
    function, coefficients = step.function, block.coefficients
    return lambda *values: function(coefficients, *values)


def _available(step: Step, result: str, gas: Gas) -> bool:
    if step.gases and gas.name not in step.gases:
        return False
    return not step.needs_coefficients or gas.block(result, step.method) is not None


def _never(*_: Array) -> NDArray[np.bool_]:
    return np.array([False])


class Chooser:
    """The choice of steps for one gas, the inputs given, and the methods asked for."""

    def __init__(self, gas: Gas, given: Collection[str], chosen: Mapping[str, str]) -> None:
        self.gas, self.given = gas, given
        self.whatever_basis = {*given, *(name.removesuffix("_per_litre") for name in given)}
        self.methods = {
            name: method
            for name, family in FAMILIES.items()
            if (method := chosen.get(name) or default_method(gas, family))
        }
        blocks = [block for block in gas.blocks if self._method_of(block.result) == block.method]
        self.defaults = {name: value for block in blocks for name, value in block.supplies.items()}
        self._cones: dict[str, frozenset[str]] = {}
        self._reaches: dict[str, frozenset[str]] = {}
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
                fit = [s for s in ways if s.way in known and self.whatever_basis.issuperset(s.beside)]
                if fit:
                    return max(fit, key=lambda step: len(step.beside))
        return None

    def remarks(self, step: Step) -> list[Remark]:
        """Return the remarks of a step for what is given; one that another input answers is kept but never applies."""
        given = set(self.given)
        asked = (remark for remark in remarks_of(step) if given.issuperset(remark.if_given))
        return [each if given.isdisjoint(each.unless_given) else replace(each, applies=_never) for each in asked]

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

    def reach(self, term: str) -> frozenset[str]:
        """Return the terms in whose place another one would change a term: none beyond a step in situ."""
        if term not in self._reaches:
            self.cone(term)  # refuses a circle
            within = [self.reach(name) for name in self._needs(term)]
            if term in DERIVED and term not in self.given:
                within[0] -= DERIVED[term].replace.keys()
            elif (step := self.select(term)) and step.in_situ:
                within = []
            self._reaches[term] = frozenset({term}).union(*within)
        return self._reaches[term]

    def _needs(self, term: str) -> Iterable[str]:
        if term in DERIVED and term not in self.given:
            return (DERIVED[term].of, *DERIVED[term].replace.values())
        step = self.select(term)
        return terms_of(step) if step else ()

    def leaves(self, term: str) -> list[str]:
        """Return the terms that a term depends on here and that no step gives, in the order of the vocabulary."""
        cone = self.cone(term)
        return [name for name in TERMS if name in cone and name not in DERIVED and self.select(name) is None]

    def lacks(self, leaf: str) -> bool:
        """Tell whether a leaf is neither given nor brought by gas or method nor has a default."""
        known = leaf in self.given or leaf in self.defaults or self.constant(leaf) is not None
        return not known and TERMS[leaf].default is None

    def same(self, term: str) -> str:
        """Return the term that a term is only another name for here, or itself."""
        while (step := self.select(term)) and step.same_as:
            term = step.same_as
        return term
