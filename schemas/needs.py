"""What a quantity needs: which inputs always, which by a method, which as one of a side; read from its plans."""

from collections.abc import Iterable, Iterator
from dataclasses import dataclass
from functools import lru_cache
from typing import Any

from schemas.vocabulary import family_choices, quantity_families, quantity_inputs
from service.physics.declare import FAMILIES, GASES, SIDES, STEPS, TERMS, Family, Gas, Quantity, Side
from service.physics.engine import plan
from service.physics.methods import (
    GIVEN,
    TRANSFER_FAMILY,
    applicable,
    default_method,
    members_for,
    remarks_of,
    side_of,
)
from service.physics.plans import Plan

FIRST_GASES = ("co2", "o2")  # most often asked for; another gas stands in examples only where these have no answer


@dataclass(frozen=True, slots=True)
class Way:
    """A plan of a quantity, with the method by which it goes where that is not the gas's default."""

    plan: Plan
    option: str | None = None
    method: str | None = None


def plan_for(
    quantity: Quantity, gas: Gas, given: Iterable[str] = (), chosen: Iterable[tuple[str, str]] = (), more: bool = False
) -> Plan:
    """Return the plan of a quantity's main results.

    Parameters
    ----------
    quantity : Quantity
        What is asked for.
    gas : Gas
        Of which gas.
    given : iterable of str
        Inputs that are sent.
    chosen : iterable of (family, method)
        Methods asked for.
    more : bool
        Whether to include the results for which a side may be left out.
    """
    wanted = tuple(name for name in quantity.results if more or name not in quantity.needs_side)
    return plan(wanted, frozenset(given), tuple(sorted(chosen)), gas.name)


@lru_cache(maxsize=64)
def offered(family: Family) -> dict[str, list[str]]:
    """Return the methods of a family for each gas, those gases first that are most often asked for."""
    return {gas.name: family_choices(family, gas) for gas in usual_gases()}


def usual_gases() -> list[Gas]:
    """Return the gases, those most often asked for first."""
    return [GASES[name] for name in dict.fromkeys((*FIRST_GASES, *GASES)) if name in GASES]


def _ways(quantity: Quantity) -> Iterator[Way]:
    """Yield a plan for every gas by default, every method that is offered, and every number of the caller's own."""
    usual = usual_gases()[0]
    for gas in GASES.values() if quantity.of_gas else [usual]:
        yield Way(plan_for(quantity, gas))
    for family in quantity_families(quantity):
        alike = {_shape(family, default_method(usual, family)): plan_for(quantity, usual)}
        for method, gases in gases_by_choice(family).items():
            shape = _shape(family, method)  # what hangs on the gas is in the plans by default
            if shape not in alike:
                alike[shape] = plan_for(quantity, GASES[gases[0]], chosen=[(family.name, method)])
            yield Way(alike[shape], family.option, method)
        for member in SIDES[family.given_by].members if family.given_by else ():
            yield Way(plan_for(quantity, usual, [member], [(family.name, GIVEN)]))


def _shape(family: Family, method: str | None) -> tuple[Any, ...]:
    """Return all that a plan depends on in a method, so that of many methods alike one is planned."""
    return tuple(
        (
            *(result, each.parameters, each.way, each.beside, each.needs_given, each.gases, each.same_as, each.assumes),
            *(tuple(each.supplies), tuple(each.valid), tuple(each.recommended)),
            *(remark.terms for remark in remarks_of(each)),
        )
        for result in family.results
        for each in STEPS.get(result, {}).get(method, ())
    )


def quantity_needs(quantity: Quantity) -> list[dict[str, Any]]:
    """Return the inputs of a quantity with the word that says when each is needed.

    Returns
    -------
    list of dict
        ``name``; ``needed``: ``always``, ``one_of_side`` (its ``side`` says when), ``by_method`` (``methods`` has them
        by option), ``with_input`` (``with`` has the inputs that bring it along) or ``never``.
    """
    ways, brings = list(_ways(quantity)), _brought_along(quantity)
    sides = {name: side.name for side in SIDES.values() for name in side.members}
    told: list[dict[str, Any]] = []
    for name in quantity_inputs(quantity):
        missing = [way for way in ways if name in way.plan.missing]
        if missing and len(missing) == len(ways):
            told.append({"name": name, "needed": "always"})
        elif name in sides:
            told.append({"name": name, "needed": "one_of_side", "side": sides[name]})
        elif methods := _by_option(missing):
            told.append({"name": name, "needed": "by_method", "methods": methods})
        elif name in brings:
            told.append({"name": name, "needed": "with_input", "with": brings[name]})
        else:
            told.append({"name": name, "needed": "never"})
    return told


def _brought_along(quantity: Quantity) -> dict[str, list[str]]:
    """Return the inputs that are needed only because another one is sent, with those others."""
    gas, found = usual_gases()[0], dict[str, list[str]]()
    anyway = plan_for(quantity, gas, more=True).missing
    leading = {step.way for by_method in STEPS.values() for ways in by_method.values() for step in ways}
    for name in (each for each in quantity_inputs(quantity) if each in leading):
        for other in plan_for(quantity, gas, [name], more=True).missing:
            if other not in anyway and TERMS[other].is_input:
                found.setdefault(other, []).append(name)
    return found


def _by_option(ways: Iterable[Way]) -> dict[str, list[str]]:
    """Return the methods of some ways by their option.

    Of an option whose every method is there it is another option that has the need; the parameterisation alone can
    have it with every method, since the caller's own transfer velocity stands in its place.
    """
    found: dict[str, list[str]] = {}
    for way in ways:
        if way.option and way.method:
            found.setdefault(way.option, []).append(way.method)
    every = {family.option: len(gases_by_choice(family)) for family in FAMILIES.values() if family.option in found}
    own = FAMILIES[TRANSFER_FAMILY].option
    return {option: names for option, names in found.items() if len(names) < every[option]} or {
        option: names for option, names in found.items() if option == own
    }


def quantity_sides(quantity: Quantity) -> list[dict[str, Any]]:
    """Return the sides of a quantity: inputs of which one at most may be sent, and when one must be.

    Returns
    -------
    list of dict
        ``name``, ``meaning``, ``members``; ``needed_for_gases``, those of which nothing is assumed;
        ``needed_for_results``, those that are left out without it; ``default_by_gas``, what is assumed for others;
        ``beside``, the input without which a member tells nothing; ``gases_by_member``, where not every gas has it.
    """
    inputs = set(quantity_inputs(quantity))
    always = {each["name"] for each in quantity_needs(quantity) if each["needed"] == "always"}
    return [_side(quantity, side) for side in SIDES.values() if (inputs - always) & set(side.members)]


def _side(quantity: Quantity, side: Side) -> dict[str, Any]:
    needed, defaults = [], {}
    for gas in GASES.values():
        by_default = plan_for(quantity, gas, more=True)
        assumed = {name: value for name, value in by_default.defaults.items() if name in side.members}
        if assumed:
            defaults[gas.name] = assumed
        if any(side_of(term) == side.name for term in plan_for(quantity, gas).missing):
            needed.append(gas.name)
    members = [name for name in side.members if name in quantity_inputs(quantity)]
    told: dict[str, Any] = {
        "name": side.name,
        "meaning": side.meaning,
        "members": members,
        "needed_for_gases": needed,
        "needed_for_results": [name for name, of in quantity.needs_side.items() if of == side.name],
        "default_by_gas": defaults,
    }
    if side.beside:
        told["beside"] = dict(side.beside)
    if some := {name: gases for name, gases in _gases_by_member(side.name).items() if name in members}:
        told["gases_by_member"] = some
    return told


@lru_cache(maxsize=32)
def _gases_by_member(side: str) -> dict[str, list[str]]:
    """Return those members of a side that are not for every gas, with the gases they are for."""
    by_gas = {gas.name: members_for(SIDES[side], gas) for gas in GASES.values()}
    found = {name: [gas for gas, members in by_gas.items() if name in members] for name in SIDES[side].members}
    return {name: gases for name, gases in found.items() if len(gases) < len(GASES)}


def quantity_results(quantity: Quantity) -> list[dict[str, Any]]:
    """Return the results of a quantity, the main ones first, with unit, meaning and CF standard name."""
    told = []
    for name in (*quantity.results, *quantity.more):
        term = TERMS[name]
        by_gas = {
            gas.name: names
            for gas in GASES.values()
            if (names := {key: text for key, text in gas.standard_names.items() if key.split()[0] == name})
        }
        entry: dict[str, Any] = {
            "name": name,
            "unit": quantity.units.get(name, term.unit),
            "meaning": term.meaning,
            "main": name in quantity.results,
            "standard_name": term.standard_name,
        }
        told.append(entry | ({"standard_name_by_gas": by_gas} if by_gas else {}))
    return told


def enough(quantity: Quantity, gas: Gas, also: Iterable[str] = (), method: str | None = None) -> list[str] | None:
    """Return inputs that are enough for every main result, or None where the gas has no answer.

    Parameters
    ----------
    quantity, gas : Quantity, Gas
        What is asked for.
    also : iterable of str
        Inputs wanted anyway; names that the quantity does not know are left out.
    method : str, optional
        A parameterisation to suffice for.
    """
    chosen = [(TRANSFER_FAMILY, method)] if method else []
    names = [name for name in also if name in quantity_inputs(quantity)]
    while missing := plan_for(quantity, gas, names, chosen, more=True).missing:
        side = SIDES.get(side_of(missing[0]) or "")
        name = side.members[0] if side else missing[0]
        if not TERMS[name].is_input or name in names:
            return None
        names.append(name)
    used = set(plan_for(quantity, gas, names, chosen, more=True).leaves)
    return [name for name in quantity_inputs(quantity) if name in names and name in used]


def two_parameterisations(quantity: Quantity, gas: Gas, inputs: Iterable[str]) -> list[str]:
    """Return two methods for the open sea that the inputs suffice for, or none."""
    family = FAMILIES[TRANSFER_FAMILY]
    if family not in quantity_families(quantity):
        return []
    default = default_method(gas, family)
    fit = sorted(applicable(gas, "ocean", tuple(inputs), None), key=lambda name: name != default)
    return fit[:2] if len(fit) > 1 else []


def gases_by_choice(family: Family) -> dict[str, list[str]]:
    """Return the methods of a family with the gases that each can answer for."""
    found: dict[str, list[str]] = {}
    for gas, methods in offered(family).items():
        for method in methods:
            found.setdefault(method, []).append(gas)
    return found


def defaults_by_gas(family: Family) -> dict[str, str | None]:
    """Return the method that each gas uses where none is asked for."""
    return {gas.name: default_method(gas, family) for gas in GASES.values()}
