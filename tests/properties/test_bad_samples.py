"""Whatever is sent, a sample has a finite number and a flag that says so, or no number and a flag that says that."""

from functools import cache

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st
from hypothesis.extra.numpy import arrays

from service.physics.answer import Answer
from service.physics.declare import FAMILIES, GASES, QUANTITIES, TERMS, Array
from service.physics.engine import run
from service.physics.judge import BAD, GOOD, MISSING, SUSPECT
from service.physics.methods import TRANSFER_FAMILY, methods_for
from service.physics.plans import Plan
from tests.properties.questions import (
    OF_SAMPLES,
    OPEN_SEA,
    Values,
    ask_and_answer,
    methods_and_gases,
    sufficient,
    transfer_pairs,
    typical,
    typical_values,
)

ANY = st.one_of(
    st.floats(allow_nan=True, allow_infinity=True),
    st.floats(-100.0, 2000.0),
    st.sampled_from([0.0, -0.0, 1e-320, 1e308, 1e6, 35.0, 100.0, -5.0, 60.0, 1100.0]),
)
GASES_TRIED = ("co2", "o2", "n2o", "sf6")


@cache
def names_for(quantity: str, gas: str) -> tuple[str, ...]:
    return tuple(name for name in typical_values(quantity, gas) if TERMS[name].holds == "sample")


def check_that_every_number_is_finite_and_flagged(found: Answer) -> None:
    flags = found.outcome.verdict.flags
    lost = flags >= BAD

    assert set(flags.tolist()) <= {GOOD, SUSPECT, BAD, MISSING}
    for array in found.outcome.results.values():
        assert np.isnan(array[lost]).all()
        assert np.isfinite(array[~lost]).all()
    for row in np.flatnonzero(flags != GOOD).tolist():
        assert found.outcome.verdict.reasons[row]


@pytest.mark.parametrize("quantity", OF_SAMPLES)
@pytest.mark.parametrize("gas", GASES_TRIED)
@given(data=st.data())
def test_anything_at_all_gives_a_finite_number_or_none(quantity: str, gas: str, data: st.DataObject) -> None:
    values: Values = {name: data.draw(arrays(float, 12, elements=ANY), name) for name in names_for(quantity, gas)}

    check_that_every_number_is_finite_and_flagged(ask_and_answer(quantity, gas, values))


@pytest.mark.parametrize("quantity", OF_SAMPLES)
@pytest.mark.parametrize("gas", GASES_TRIED)
def test_the_corners_of_the_possible_give_a_finite_number_or_none(quantity: str, gas: str) -> None:
    names = names_for(quantity, gas)
    rng = np.random.default_rng(4)
    corners: Values = {name: rng.choice([*TERMS[name].possible, typical(name)], 400) for name in names}

    check_that_every_number_is_finite_and_flagged(ask_and_answer(quantity, gas, corners))


@pytest.mark.parametrize("quantity", OF_SAMPLES)
@pytest.mark.parametrize("gas", GASES_TRIED)
def test_a_gap_in_any_input_that_is_used_is_flag_9_and_no_number(quantity: str, gas: str) -> None:
    for name in names_for(quantity, gas):
        values = typical_values(quantity, gas) | {name: np.array([typical(name), np.nan])}
        found = ask_and_answer(quantity, gas, values).outcome

        assert found.verdict.flags[1] == MISSING, name
        assert found.verdict.flags[0] < BAD, name
        assert f"{name} is missing" in found.verdict.reasons[1]
        assert all(np.isnan(array[1]) and np.isfinite(array[0]) for array in found.results.values()), name


@pytest.mark.parametrize("quantity", OF_SAMPLES)
@pytest.mark.parametrize("gas", GASES_TRIED)
def test_an_impossible_value_is_flag_4_and_no_number(quantity: str, gas: str) -> None:
    for name in names_for(quantity, gas):
        low, high = TERMS[name].possible
        beyond = [np.nextafter(low, -np.inf), np.nextafter(high, np.inf), np.inf, -np.inf]
        if TERMS[name].above_lower_limit:
            beyond.append(low)
        values = typical_values(quantity, gas) | {name: np.array([typical(name), *beyond])}
        found = ask_and_answer(quantity, gas, values).outcome

        assert found.verdict.flags.tolist() == [found.verdict.flags[0], *[BAD] * len(beyond)], name
        assert all(np.isnan(array[1:]).all() for array in found.results.values()), name
        assert all("is impossible" in found.verdict.reasons[row][0] for row in range(1, 1 + len(beyond)))


@pytest.mark.parametrize("name", [name for name, term in TERMS.items() if term.is_input and term.holds == "sample"])
def test_the_limits_of_the_possible_are_told_with_what_is_typical_between_them(name: str) -> None:
    low, high = TERMS[name].possible

    assert np.isfinite([low, high]).all()
    assert low <= typical(name) <= high
    assert low < high
    assert TERMS[name].scale > 0.0


def run_strictly(steps: Plan, values: dict[str, Array]) -> None:
    """Run a plan as the engine does, but let numpy complain of anything that is not a plain number."""
    known = {name: np.array([value]) for name, value in steps.defaults.items()} | dict(steps.constants) | values
    with np.errstate(all="raise", under="ignore"):
        for node in steps.nodes:
            outcome = node.function(*[known[key] for key in node.arguments])
            many = outcome if len(node.results) > 1 else (outcome,)
            known |= dict(zip(node.results, many, strict=True))

    engine = run(steps, values)
    assert all(np.array_equal(engine[key], known[key], equal_nan=True) for key in steps.keys.values())


def within_the_ranges(steps: Plan, size: int = 200) -> dict[str, Array]:
    """Return inputs within what all methods of a plan state of them, else within what is typical."""
    rng = np.random.default_rng(200)
    values: dict[str, Array] = {}
    for name in steps.leaves:
        low, high = OPEN_SEA.get(name, (typical(name), typical(name)))
        stated = [entry.limits for entry in steps.ranges if entry.term in (name, f"{name}_10m")]
        low, high = max([low, *(limits[0] for limits in stated)]), min([high, *(limits[1] for limits in stated)])
        values[name] = rng.uniform(low, high, size)
        values[name][:2] = low, high
    return values


BESIDE = {"bubble-injection": ((TRANSFER_FAMILY, "liang-2013"),)}  # a method that needs a certain other one
FAMILIES_TRIED = [name for name in FAMILIES if name not in ("direction", TRANSFER_FAMILY)]
CASES = [
    (family, method, gas)
    for family in FAMILIES_TRIED
    for method, gas in methods_and_gases(family)
    if gas in GASES_TRIED or method not in methods_for(GASES["o2"], FAMILIES[family])
]
CASES += [(TRANSFER_FAMILY, method, gas) for method, gas in transfer_pairs("o2")]


@pytest.mark.parametrize(("family", "method", "gas"), CASES)
def test_no_method_makes_numpy_complain_within_its_range(family: str, method: str, gas: str) -> None:
    wanted = "transfer_velocity" if family == TRANSFER_FAMILY else FAMILIES[family].results[0]
    steps = sufficient((wanted,), ((family, method), *BESIDE.get(method, ())), gas, ())
    values = within_the_ranges(steps)
    if method in BESIDE:
        values["wind_speed"] = np.maximum(values["wind_speed"], 1.0)  # in a calm there is nothing to be steady

    run_strictly(steps, values)


@pytest.mark.parametrize("gas", GASES)
def test_a_whole_flux_makes_numpy_complain_of_nothing(gas: str) -> None:
    steps = sufficient(tuple(QUANTITIES["flux"].results), (), gas, ())
    values = within_the_ranges(steps)
    values["salinity"] = np.full_like(values["salinity"], 35.0)

    run_strictly(steps, values)
