"""A question as it was asked, checked against what the methods need, and its answer."""

from collections.abc import Iterable, Iterator, Mapping
from dataclasses import dataclass, replace
from functools import lru_cache
from typing import Any

import numpy as np

from service.physics import quantities  # noqa: F401  imported for what it declares
from service.physics.declare import FAMILIES, FAMILY_OF, SIDES, TERMS, Array, Gas, Quantity, Remark, Step
from service.physics.engine import plan, run
from service.physics.faults import Fault, Refused
from service.physics.judge import BAD, SUSPECT, Verdict, judge, judge_results
from service.physics.methods import GIVEN, TRANSFER_FAMILY, default_method, methods_for_water, side_of, transfer_methods
from service.physics.plans import Plan
from service.physics.terms import INLAND
from service.physics.units import Conversion, UnitError, conversion

FRESH_FOR_THE_SEA = 5.0  # practical salinity under which a sample without `water` is not taken for the sea


@dataclass(frozen=True, slots=True)
class Wanted:
    """A result as it will be told: its name, the term behind it, and its unit."""

    name: str
    term: str
    conversion: Conversion
    standard_name: str | None


@dataclass(frozen=True, slots=True)
class Question:
    """What is asked, with a plan for each parameterisation; None stands for the default or the caller's own."""

    quantity: Quantity
    gas: Gas
    wanted: tuple[Wanted, ...]
    plans: Mapping[str | None, Plan]
    used: frozenset[str]
    assumed: Mapping[str, dict[str, Any]]
    methods: Mapping[str, list[dict[str, Any]]]


@dataclass(frozen=True, slots=True)
class Outcome:
    """Results in the units asked for, by name, with the flags and reasons of the samples."""

    results: Mapping[str, Array]
    verdict: Verdict


@dataclass(frozen=True, slots=True)
class Answer:
    """The outcome for each parameterisation, and the one over all of them."""

    question: Question
    samples: int
    outcome: Outcome
    spread: Mapping[str, Array]
    by_parameterisation: Mapping[str, Outcome]


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
    _check_sides(given)
    names = pick or _main_results(quantity, gas, given, dict(chosen))
    methods = dict(chosen)
    wanted = tuple(_wanted(quantity, gas, name, dict(units), mass_as, methods) for name in names)
    own = FAMILIES[TRANSFER_FAMILY].given_by
    if own and (way := next((m for m in SIDES[own].members if m in given), None)):
        if parameterisations:
            raise Refused(Fault("two_ways", way, "takes the place of a parameterisation: send one or the other"))
        methods[TRANSFER_FAMILY] = GIVEN
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
    _check_inputs(plans.values(), water)
    _check_unused(quantity, gas, given, optional, methods, parameterisations)
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
        _assumed(plans.values(), gas, asked),
        _methods(plans.values()),
    )


def _uses_transfer(steps: Plan) -> bool:
    return any(_family_name(record) == TRANSFER_FAMILY and record.method for record in steps.records)


def _family_name(record: Step) -> str | None:
    family = FAMILY_OF.get(record.results[0])
    return family.name if family else None


def _check_sides(given: frozenset[str]) -> None:
    for side in SIDES.values():
        present = [name for name in given if name.removesuffix("_per_litre") in side.members]
        if len(present) > 1:
            names = " and ".join(sorted(present))
            raise Refused(Fault("two_ways", names, f"both say {side.meaning}: send one", ", ".join(side.members)))


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


def _check_inputs(plans: Iterable[Plan], water: str | None) -> None:
    faults: dict[str, Fault] = {}
    for each in plans:
        for term in each.missing:
            side = SIDES.get(side_of(term) or "")
            if side:
                faults[side.name] = Fault(
                    "missing_input",
                    side.name,
                    f"is needed: {side.meaning}; send exactly one of {', '.join(side.members)}",
                    ", ".join(side.members),
                )
            elif TERMS[term].is_input:
                unit = TERMS[term].unit
                faults[term] = Fault("missing_input", term, f"is needed: {TERMS[term].meaning} [{unit}]")
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


def _check_unused(
    quantity: Quantity,
    gas: Gas,
    given: frozenset[str],
    optional: frozenset[str],
    methods: Mapping[str, str],
    parameterisations: Iterable[str],
) -> None:
    known: set[str] = set()
    for name in [*parameterisations] or [""]:
        by_name = {**methods, **({TRANSFER_FAMILY: name} if name else {})}
        for result in (*quantity.results, *quantity.more):
            known |= set(plan((result,), given, tuple(sorted(by_name.items())), gas.name).leaves)
    if unused := sorted(given - known - optional):
        raise Refused(
            *(Fault("unused", name, "is not used by the methods chosen here: leave it out") for name in unused)
        )


def _with_remarks(steps: Plan, name: str | None, water: str | None, asked: Mapping[str, str]) -> Plan:
    """Return the plan with what must be said of the kind of water."""
    method = name or steps.methods.get(TRANSFER_FAMILY)
    if not _uses_transfer(steps) or not method or method == GIVEN:
        return steps
    record, remarks = transfer_methods()[method], list(steps.remarks)
    if water and record.water and water not in record.water:
        told = f"{method} was made for {', '.join(record.water)}, not for water {water}"
        remarks.append((Remark(told, (), lambda: np.array([True])), ()))
    if TRANSFER_FAMILY not in asked and water is None and "salinity" in steps.leaves:
        told = f"salinity under {FRESH_FOR_THE_SEA:g} with a method made for the sea: say which water this is"
        remarks.append((Remark(told, ("salinity",), lambda S: S < FRESH_FOR_THE_SEA), ("salinity",)))
    return replace(steps, remarks=tuple(remarks))


def _assumed(plans: Iterable[Plan], gas: Gas, asked: Mapping[str, str]) -> dict[str, dict[str, Any]]:
    told: dict[str, dict[str, Any]] = {}
    for each in plans:
        for name, value in each.defaults.items():
            told[name] = {"value": value, "unit": TERMS[name].unit}
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
            if record.source is None and record.method != GIVEN:
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


def answer(
    question: Question, values: Mapping[str, Array], samples: int, unreadable: Mapping[int, str] | None = None
) -> Answer:
    """Compute the answer to a question.

    Parameters
    ----------
    question : Question
        From `ask`.
    values : mapping of str to (1,) or (samples,) array
        The inputs that the question uses, in the unit of their term; NaN where missing.
    samples : int
        How many samples there are.
    unreadable : mapping of int to str, optional
        Samples that could not be read, with the reason.

    Returns
    -------
    Answer
    """
    inputs = {name: values[name] for name in values if name in question.used}
    verdict = judge(inputs, samples)
    for row, reason in (unreadable or {}).items():
        verdict.reasons[row] = []  # what could not be read is not missing
        verdict.flags[row] = BAD
        verdict.mark([row], BAD, reason)
    outcomes = {name: _outcome(question, steps, inputs, verdict) for name, steps in question.plans.items()}
    if len(outcomes) == 1:
        return Answer(question, samples, next(iter(outcomes.values())), {}, {})
    named = {str(name): outcome for name, outcome in outcomes.items()}
    outcome, spread = _over(question, named)
    return Answer(question, samples, outcome, spread, named)


def _outcome(question: Question, steps: Plan, inputs: Mapping[str, Array], judged: Verdict) -> Outcome:
    known = run(steps, inputs)
    verdict = Verdict(judged.flags.copy(), {row: list(told) for row, told in judged.reasons.items()})
    judge_results(verdict, steps, known)
    lost = verdict.lost
    any_lost = bool(lost.any())
    results = {}
    for each in question.wanted:
        array = each.conversion.from_base(known[steps.keys[each.term]])
        if array.size != lost.size:
            array = np.repeat(array, lost.size)
        results[each.name] = np.where(lost, np.nan, array) if any_lost else array
    return Outcome(results, verdict)


def _over(question: Question, outcomes: Mapping[str, Outcome]) -> tuple[Outcome, dict[str, Array]]:
    """Return mean and sample standard deviation over the methods that give a number."""
    results, spread = {}, {}
    for each in question.wanted:
        stack = np.stack([outcome.results[each.name] for outcome in outcomes.values()])
        numbers = np.isfinite(stack)
        count = numbers.sum(axis=0)
        with np.errstate(all="ignore"):
            mean = np.where(numbers, stack, 0.0).sum(axis=0) / count
            squares = np.where(numbers, (stack - mean) ** 2, 0.0).sum(axis=0)
            spread[each.name] = np.where(count > 1, np.sqrt(squares / (count - 1)), np.nan)
        results[each.name] = np.where(count > 0, mean, np.nan)
    return Outcome(results, _verdict_over(outcomes)), spread


def _verdict_over(outcomes: Mapping[str, Outcome]) -> Verdict:
    """Return the worst flag among the methods that give a number, or among all where none does."""
    flags = np.stack([outcome.verdict.flags for outcome in outcomes.values()])
    lost = flags >= BAD
    worst = np.where(lost.all(axis=0), flags.max(axis=0), np.where(lost, 0, flags).max(axis=0))
    some_lost = lost.any(axis=0) & ~lost.all(axis=0)
    worst = np.where(some_lost, np.maximum(worst, SUSPECT), worst).astype(np.int8)
    return Verdict(worst, dict(_reasons_over(outcomes)))


def _reasons_over(outcomes: Mapping[str, Outcome]) -> Iterator[tuple[int, list[str]]]:
    rows = sorted({row for outcome in outcomes.values() for row in outcome.verdict.reasons})
    for row in rows:
        told: dict[str, list[str]] = {}
        for name, outcome in outcomes.items():
            for reason in outcome.verdict.reasons.get(row, []):
                told.setdefault(reason, []).append(name)
        every = len(outcomes)
        yield row, [text if len(by) == every else f"{', '.join(by)}: {text}" for text, by in told.items()]


def known_names(quantity: Quantity) -> tuple[str, ...]:
    """Return the results of a quantity, the main ones first."""
    return (*quantity.results, *quantity.more)
