"""What the laws are tried on: every gas, every method, and the inputs that each needs, read from the registers."""

from collections.abc import Iterable, Mapping
from functools import cache

import numpy as np
from hypothesis import strategies as st
from hypothesis.extra.numpy import arrays

from service.physics.answer import Answer, answer
from service.physics.declare import (
    FAMILIES,
    GASES,
    NO_GAS,
    QUANTITIES,
    SIDES,
    STEPS,
    TERMS,
    Array,
    Gas,
    Limits,
    Quantity,
    Step,
)
from service.physics.engine import plan, run
from service.physics.methods import (
    TRANSFER_FAMILY,
    methods_for,
    methods_for_water,
    side_of,
    transfer_methods,
)
from service.physics.plans import Plan
from service.physics.question import Question, ask

Values = Mapping[str, float | Array]
OPEN_SEA: dict[str, Limits] = {  # where people measure; a law is tried within, unless a method's range is narrower
    "water_temperature": (0.0, 30.0),
    "salinity": (0.0, 40.0),
    "wind_speed": (0.0, 20.0),
    "air_pressure": (900.0, 1050.0),
}


NOT_OF_SAMPLES = {"series", "course"}  # what a term can hold that joins the samples of a request to one another
OF_SAMPLES = [name for name, record in QUANTITIES.items() if not record.series]  # each sample stands for itself


def transfer_pairs(*usual: str) -> list[tuple[str, str]]:
    """Return every published transfer velocity method with some gases, or with the first that it can answer for."""
    family, found = FAMILIES[TRANSFER_FAMILY], []
    by_gas = {gas: methods_for(record, family) for gas, record in GASES.items()}
    published = [name for name, record in transfer_methods().items() if record.way is None]  # not the caller's own
    for method in published:
        gases = [gas for gas in GASES if method in by_gas[gas]]
        found += [(method, gas) for gas in gases if gas in usual] or [(method, gases[0])]
    return found


def methods_and_gases(family: str) -> list[tuple[str, str]]:
    """Return every method of a family with every gas that it can answer for."""
    return [(method, gas) for gas in GASES for method in methods_for(GASES[gas], FAMILIES[family])]


def step_of(result: str, method: str) -> Step:
    """Return the record of a method for a result."""
    return STEPS[result][method][0]


def stated_range(result: str, method: str, gas: str, term: str) -> Limits:
    """Return the range of a term that a method states, its own or in the gas's block, else where people measure."""
    block = GASES[gas].block(result, method)
    stated = {**OPEN_SEA, **step_of(result, method).valid, **(block.valid if block else {})}
    return stated[term]


@cache
def sufficient(wanted: tuple[str, ...], chosen: tuple[tuple[str, str], ...], gas: str, given: tuple[str, ...]) -> Plan:
    """Return a plan without anything missing: what is needed beyond the inputs given is added to them."""
    names = set(given)
    while missing := plan(wanted, frozenset(names), tuple(sorted(chosen)), gas).missing:
        name = SIDES[side].members[0] if (side := side_of(missing[0])) else missing[0]
        assert TERMS[name].is_input, f"{name} cannot be had for {gas} by {chosen}"
        assert name not in names, f"{name} is given and yet missing"
        names.add(name)
    return plan(wanted, frozenset(names), tuple(sorted(chosen)), gas)


def typical(name: str) -> float:
    """Return a number that an input may well have."""
    term = TERMS[name]
    if term.example is not None:
        return term.example
    assert term.default is not None, f"{name} has neither example nor default"
    return term.default


def compute(wanted: str | Iterable[str], chosen: Mapping[str, str], gas: str, values: Values) -> dict[str, Array]:
    """Return terms by the methods chosen, from the values given and typical ones for all else that is needed."""
    names = (wanted,) if isinstance(wanted, str) else tuple(wanted)
    steps = sufficient(names, tuple(sorted(chosen.items())), gas, tuple(sorted(values)))
    needed = [name for name in steps.leaves if name not in steps.defaults]
    all_values = {name: values[name] if name in values else typical(name) for name in needed}
    inputs = {name: np.atleast_1d(np.asarray(value, float)) for name, value in all_values.items()}
    known = run(steps, inputs)
    return {name: known[steps.keys[name]] for name in names}


def inputs_for(quantity: Quantity, gas: Gas, chosen: Mapping[str, str], given: Iterable[str] = ()) -> list[str]:
    """Return inputs that suffice for the main results of a quantity."""
    courses = {side for side, each in SIDES.items() if {TERMS[name].holds for name in each.members} & NOT_OF_SAMPLES}
    wanted = tuple(name for name in quantity.results if quantity.needs_side.get(name) not in courses)
    steps = sufficient(wanted, tuple(sorted(chosen.items())), gas.name, tuple(sorted(given)))
    return [name for name in steps.leaves if name not in steps.defaults or name in OPEN_SEA]


def question_for(
    quantity: str,
    gas: str,
    given: Iterable[str],
    method: str | None = None,
    direction: str = "upward",
    pick: tuple[str, ...] = (),
) -> Question:
    """Return a question as the interface asks it."""
    return ask(
        QUANTITIES[quantity],
        gas_of(quantity, gas),
        _water(gas, method),
        frozenset(given),
        (("direction", direction),) if direction != "upward" else (),
        (method,) if method else (),
        pick,
        (),
        "gas",
    )


def gas_of(quantity: str, gas: str) -> Gas:
    """Return a gas, or none where a quantity is of none."""
    return GASES[gas] if QUANTITIES[quantity].of_gas else NO_GAS


def _water(gas: str, method: str | None) -> str | None:
    if method is None or method in methods_for_water(GASES[gas], "ocean"):
        return None
    return next(iter(transfer_methods()[method].water), None)


def ask_and_answer(
    quantity: str,
    gas: str,
    values: Values,
    method: str | None = None,
    direction: str = "upward",
    pick: tuple[str, ...] = (),
) -> Answer:
    """Return the answer to a question for the values given."""
    inputs = {name: np.atleast_1d(np.asarray(value, float)) for name, value in values.items()}
    longest = max(array.size for array in inputs.values())
    return answer(question_for(quantity, gas, inputs, method, direction, pick), inputs, longest)


def limits(name: str) -> Limits:
    """Return the limits within which a law is tried."""
    return OPEN_SEA.get(name, TERMS[name].possible)


def samples(*names: str, size: int = 20, **within: Limits) -> st.SearchStrategy[dict[str, Array]]:
    """Return a strategy for arrays of inputs, within the limits where people measure or others."""
    bounds = {name: limits(name) for name in names} | within
    return st.fixed_dictionaries(
        {
            name: arrays(float, size, elements=st.floats(low, high, allow_subnormal=False))
            for name, (low, high) in bounds.items()
        }
    )


def bits(array: Array) -> bytes:
    """Return the bits of an array, every NaN alike."""
    return np.where(np.isnan(array), np.nan, array).tobytes()


def typical_values(
    quantity: str, gas: str, method: str | None = None, given: Iterable[str] = ()
) -> dict[str, float | Array]:
    """Return typical values of the inputs that suffice for a question, those given first."""
    chosen = {TRANSFER_FAMILY: method} if method else {}
    return {name: typical(name) for name in inputs_for(QUANTITIES[quantity], gas_of(quantity, gas), chosen, given)}
