"""A question as it was asked, checked against what the methods need, and its answer."""

from collections.abc import Iterable, Mapping
from dataclasses import dataclass, replace
from functools import lru_cache
from typing import Any

import numpy as np

from service.physics import quantities  # noqa: F401  imported for what it declares
from service.physics.declare import FAMILIES, FAMILY_OF, SIDES, STEPS, TERMS, Family, Gas, Quantity, Remark, Side, Step
from service.physics.engine import plan
from service.physics.faults import Fault, Refused
from service.physics.methods import (
    GIVEN,
    LONG_TERM,
    TRANSFER_FAMILY,
    default_method,
    members_for,
    method_by_input,
    methods_for_water,
    methods_giving,
    side_of,
    transfer_methods,
    ways_of,
)
from service.physics.plans import Plan
from service.physics.terms import INLAND
from service.physics.units import Conversion, UnitError, conversion

SEA_LEVEL_PRESSURE = (870.0, 1085.0)  # hPa, the records at sea level, WMO archive of weather extremes (from memory)
FRESH_FOR_THE_SEA = 5.0  # practical salinity under which a sample without `water` is not taken for the sea


@dataclass(frozen=True, slots=True)
class Wanted:
    """A result as it will be told: its name, the term behind it, and its unit."""

    name: str
    term: str
    conversion: Conversion
    standard_name: str | None


@dataclass(frozen=True, slots=True, eq=False)
class Question:
    """What is asked, with a plan for each parameterisation; None stands for the default or the caller's own."""

    quantity: Quantity
    gas: Gas
    wanted: tuple[Wanted, ...]
    plans: Mapping[str | None, Plan]
    used: frozenset[str]
    assumed: Mapping[str, dict[str, Any]]
    methods: Mapping[str, list[dict[str, Any]]]


@lru_cache(maxsize=1024)
def ask(
    quantity: Quantity,
    gas: Gas,
    water: str | None,
    given: frozenset[str],
    chosen: tuple[tuple[str, str], ...],
    parameterisations: tuple[str, ...],
    pick: tuple[str, ...],
    units: tuple[tuple[str, str], ...],
    mass_as: str,
    optional: frozenset[str] = frozenset(),
) -> Question:
    """Check a question and plan its answer.

    Parameters
    ----------
    quantity : Quantity
        What is asked for.
    gas : Gas
        Of which gas.
    water : str or None
        The kind of water, where the caller says.
    given : frozenset of str
        Inputs sent.
    chosen : tuple of (family, method)
        Methods asked for, without parameterisations.
    parameterisations : tuple of str
        Empty for the default or the caller's own.
    pick : tuple of str
        Results wanted, in order; empty for the main ones.
    units : tuple of (result, unit)
        Units asked for.
    mass_as : str
        Whether a mass is that of the ``gas`` or of its ``element``.
    optional : frozenset of str
        Inputs that may go unused: the columns of a table.

    Returns
    -------
    Question

    Raises
    ------
    Refused
        Naming everything that is wrong, as far as it can be told at once.
    """
    given = _with_partners(given, optional)
    _check_sides(given, gas)
    methods = dict(chosen)
    if own := method_by_input(given):
        if parameterisations and own[0] == GIVEN:
            raise Refused(Fault("two_ways", own[1], "takes the place of a parameterisation: send one or the other"))
        methods |= {} if parameterisations else {TRANSFER_FAMILY: own[0]}
    leading = {TRANSFER_FAMILY: parameterisations[0]} if parameterisations else {}
    names = pick or _main_results(quantity, gas, given, methods | leading)
    wanted = tuple(_wanted(quantity, gas, name, dict(units), mass_as, methods) for name in names)
    plans: dict[str | None, Plan] = {}
    for name in parameterisations or (None,):
        by_name = methods | ({TRANSFER_FAMILY: name} if name else {})
        plans[name] = plan(
            tuple(dict.fromkeys(each.term for each in wanted)),
            given,
            tuple(sorted(by_name.items())),
            gas.name,
        )
    first = next(iter(plans.values()))
    asked = methods | ({TRANSFER_FAMILY: ""} if parameterisations else {})
    _check_inputs(plans.values(), water, gas, given)
    _check_spread(plans.values(), given)
    _check_unused(quantity, gas, given, optional, methods, parameterisations, dict(chosen))
    if TRANSFER_FAMILY not in asked and water not in (None, "ocean", "coastal") and _uses_transfer(first):
        allowed = ", ".join(methods_for_water(gas, water))
        raise Refused(Fault("missing_input", "parameterisation", f"has no default for water {water}", allowed))
    plans = {name: _with_remarks(each, name, water, asked) for name, each in plans.items()}
    return Question(
        quantity,
        gas,
        wanted,
        plans,
        frozenset(leaf for each in plans.values() for leaf in each.leaves if leaf in given),
        _assumed(plans.values(), gas, asked, given),
        _methods(plans.values()),
    )


def _uses_transfer(steps: Plan) -> bool:
    return any(_family_name(record) == TRANSFER_FAMILY and record.method for record in steps.records)


def _family_name(record: Step) -> str | None:
    family = FAMILY_OF.get(record.results[0])
    return family.name if family else None


def _with_partners(given: frozenset[str], optional: frozenset[str]) -> frozenset[str]:
    """Return what was given, without columns that lack what they are used with; refuse others that lack it."""
    alone = {
        name for name in given if (beside := TERMS[name].used_with) and not any(partner in given for partner in beside)
    }
    if alone - optional:
        raise Refused(*(_unused(name, given) for name in sorted(alone - optional)))
    return given - alone


def _check_sides(given: frozenset[str], gas: Gas) -> None:
    sent = {name.removesuffix("_per_litre") for name in given}
    for side in SIDES.values():
        members = members_for(side, gas)
        present = [name for name in members if name in sent and side.beside.get(name, name) in sent]
        if len(present) > 1:
            names = " and ".join(sorted(present))
            raise Refused(Fault("two_ways", names, f"both say {side.meaning}: send one", ", ".join(members)))


def _side_missing(side: Side, gas: Gas, given: frozenset[str]) -> Fault:
    members, sent = members_for(side, gas), {name.removesuffix("_per_litre") for name in given}
    for name in members:
        if name in sent and (partner := side.beside.get(name)) and partner not in sent:
            told = f"is needed beside {name}, which alone does not tell {side.meaning}"
            return Fault("missing_input", partner, told, f"{TERMS[partner].meaning} [{TERMS[partner].unit}]")
    allowed = ", ".join(f"{name} with {side.beside[name]}" if name in side.beside else name for name in members)
    return Fault("missing_input", side.name, f"is needed: {side.meaning}; send exactly one of {allowed}", allowed)


def _main_results(quantity: Quantity, gas: Gas, given: frozenset[str], chosen: Mapping[str, str]) -> tuple[str, ...]:
    """Return the main results, without those for which an optional side was not given."""

    def can(result: str) -> bool:
        if result not in quantity.needs_side:
            return True
        return not plan((result,), given, tuple(sorted(chosen.items())), gas.name).missing

    return tuple(result for result in quantity.results if can(result))


def _wanted(
    quantity: Quantity,
    gas: Gas,
    name: str,
    units: Mapping[str, str],
    mass_as: str,
    methods: Mapping[str, str],
) -> Wanted:
    term = TERMS[name]
    unit = units.get(name) or quantity.units.get(name) or term.unit
    try:
        change = conversion(unit, term.unit, gas=gas if term.of_gas else None, mass_as=mass_as)
    except UnitError as error:
        allowed = ", ".join(error.allowed[:40])
        raise Refused(Fault("unit", f"unit.{name}", str(error), allowed)) from error
    except ValueError as error:
        raise Refused(Fault("unit", f"unit.{name}", str(error))) from error
    other_basis = term.per_litre is not None and change.basis == "per_litre"
    direction = methods.get("direction", FAMILIES["direction"].default)
    standard = gas.standard_names.get(f"{name} {direction}") or gas.standard_names.get(name) or term.standard_name
    return Wanted(name, term.per_litre if other_basis and term.per_litre else name, change, standard)


def _check_inputs(plans: Iterable[Plan], water: str | None, gas: Gas, given: frozenset[str]) -> None:
    faults: dict[str, Fault] = {}
    for each in plans:
        for term in each.missing:
            side, family = SIDES.get(side_of(term) or ""), FAMILY_OF.get(term)
            if family and (method := each.methods.get(family.name)):
                faults[term] = _not_by_method(term, family.option, method, methods_giving(term, gas))
            elif side:
                faults[side.name] = _side_missing(side, gas, given)
            elif TERMS[term].is_input:
                beside = next((f" beside {r.way}" for r in each.records if term in r.needs_given), "")
                meaning = TERMS[term].meaning.partition("; left out")[0]  # what may be left out is not told as missing
                told = f"is needed{beside}: {meaning} [{TERMS[term].unit}]"
                faults[term] = Fault("missing_input", term, told)
            else:
                faults[term] = Fault("missing_input", term, f"cannot be had for this gas: {TERMS[term].meaning}")
        if water in INLAND:
            for name in each.defaults:
                if water in TERMS[name].no_default_for_water:
                    faults[name] = Fault(
                        "missing_input", name, f"has no default for water {water}: send it, or elevation"
                    )
    if faults:
        raise Refused(*faults.values())


def _not_by_method(term: str, option: str, method: str, others: Iterable[str]) -> Fault:
    if ways := ways_of(term, method):
        allowed = ", ".join(ways)
        needed = allowed if len(ways) == 1 else f"at least one of {allowed}"
        return Fault("missing_input", ways[0], f"is needed: {option} {method} takes {needed}", allowed)
    allowed = ", ".join(others)
    told = f"is not given by {option} {method}: {TERMS[term].meaning}; choose one of {allowed or 'another'}"
    return Fault("missing_input", term, told, allowed)


def _check_spread(plans: Iterable[Plan], given: frozenset[str]) -> None:
    """Refuse the spread of the wind beside a method that holds it in itself already."""
    spread = sorted(given & set(SIDES["wind_spread"].members))
    method = next((r.method for each in plans for r in each.records if r.wind_averaging == LONG_TERM), None)
    if spread and method:
        told = f"cannot stand beside {method}, which holds the spread of long-term winds in itself: leave it out"
        raise Refused(Fault("unused", spread[0], told))


def _check_unused(
    quantity: Quantity,
    gas: Gas,
    given: frozenset[str],
    optional: frozenset[str],
    methods: Mapping[str, str],
    parameterisations: Iterable[str],
    chosen: Mapping[str, str],
) -> None:
    """Refuse inputs and options that change nothing: whoever sends one believes that it does."""
    known: set[str] = set()
    families: set[str | None] = set()
    for name in [*parameterisations] or [""]:
        by_name = {**methods, **({TRANSFER_FAMILY: name} if name else {})}
        for result in (*quantity.results, *quantity.more):
            steps = plan((result,), given, tuple(sorted(by_name.items())), gas.name)
            known |= set(steps.leaves)
            families |= set() if steps.missing else {_family_name(record) for record in steps.records}
    idle = {name for name, method in chosen.items() if method != default_method(gas, FAMILIES[name])} - families
    faults = [_unused(name, given) for name in sorted(given - known - optional)]
    if faults or idle:
        raise Refused(*faults, *(_idle(FAMILIES[name], chosen[name], given) for name in sorted(idle)))


def _idle(family: Family, method: str, given: frozenset[str]) -> Fault:
    """Return the fault of an option that nothing here depends on, and what it would depend on."""
    for result in family.results:
        if result in given:
            told = f"both say what is known of the {TERMS[result].meaning.partition(';')[0]}: send one"
            return Fault("two_ways", f"{family.option} and {result}", told)
    ways = ways_of(family.results[0], method)
    if ways and given.isdisjoint(ways):
        allowed = " or ".join(ways)
        return Fault("unused", family.option, f"is used only beside {allowed}: send that too, or leave it out", allowed)
    return Fault("unused", family.option, "changes nothing with the inputs sent here: leave it out")


def _unused(name: str, given: frozenset[str]) -> Fault:
    beside = TERMS[name].used_with
    if beside and given.isdisjoint(beside):
        ways = " or ".join(beside)
        return Fault("unused", name, f"is used only beside {ways}: send that too, or leave {name} out", ways)
    return Fault("unused", name, "is not used by the methods chosen here: leave it out")


def _with_remarks(steps: Plan, name: str | None, water: str | None, asked: Mapping[str, str]) -> Plan:
    """Return the plan with what must be said of the kind of water."""
    method, remarks = name or steps.methods.get(TRANSFER_FAMILY), list(steps.remarks)
    record = transfer_methods().get(method or "") if _uses_transfer(steps) else None
    if record and water and record.water and water not in record.water:
        told = f"{method} was made for {', '.join(record.water)}, not for water {water}"
        remarks.append((Remark(told, (), lambda: np.array([True])), ()))
    if water not in INLAND and "air_pressure" in steps.leaves:
        low, high = SEA_LEVEL_PRESSURE
        told = f"air_pressure is outside all that was ever measured at sea level, {low:g} to {high:g} hPa"
        remarks.append((Remark(told, ("air_pressure",), lambda P: (low > P) | (high < P)), ("air_pressure",)))
    if record and TRANSFER_FAMILY not in asked and water is None and "salinity" in steps.leaves:
        told = f"salinity under {FRESH_FOR_THE_SEA:g} with a method made for the sea: say which water this is"
        remarks.append((Remark(told, ("salinity",), lambda S: S < FRESH_FOR_THE_SEA), ("salinity",)))
    return replace(steps, remarks=tuple(remarks))


def _stand_ins(steps: Plan, given: frozenset[str]) -> dict[str, str]:
    """Return what an instrument was not said to read, with the term that is taken for it."""
    read = given.intersection(steps.leaves)
    absent = [name for name, term in TERMS.items() if name not in given and not read.isdisjoint(term.used_with)]
    found = {name: next((s.same_as for s in STEPS.get(name, {}).get(None, ())), None) for name in absent}
    return {name: other for name, other in found.items() if other}


def _assumed(
    plans: Iterable[Plan], gas: Gas, asked: Mapping[str, str], given: frozenset[str]
) -> dict[str, dict[str, Any]]:
    told: dict[str, dict[str, Any]] = {}
    for each in plans:
        for name, value in each.defaults.items():
            told[name] = {"value": value, "unit": TERMS[name].unit}
        told |= {name: {"value": other} for name, other in _stand_ins(each, given).items()}
        for record in each.records:
            for name, value in record.assumes_values.items():
                told[name] = {"value": value, "unit": TERMS[name].unit}
            family = FAMILY_OF.get(record.results[0])
            if family and family.told and family.name not in asked and not record.same_as and record.method:
                told[family.option] = {"value": default_method(gas, family)}
    return told


def _methods(plans: Iterable[Plan]) -> dict[str, list[dict[str, Any]]]:
    told: dict[str, list[dict[str, Any]]] = {}
    for each in plans:
        for record in each.records:
            of_transfer = _family_name(record) == TRANSFER_FAMILY
            own = of_transfer and record.method and ways_of(record.results[0], record.method)
            if record.source is None and not own:
                continue
            source = record.source
            entry = {
                "name": record.method or (source.key if source else ""),
                "source": source.citation if source else "the caller's own",
                "doi": source.doi if source else None,
            }
            of = told.setdefault(_family_name(record) or record.results[0], [])
            if entry not in of:
                of.append(entry)
    return told


def known_names(quantity: Quantity) -> tuple[str, ...]:
    """Return the results of a quantity, the main ones first."""
    return (*quantity.results, *quantity.more)
