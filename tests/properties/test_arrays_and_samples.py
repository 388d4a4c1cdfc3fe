"""A sample's answer is its own: the same alone or among others, in any order, and in any part of a batch."""

from functools import cache

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from service.physics.answer import Answer, answer
from service.physics.declare import GASES, QUANTITIES, TERMS, Array
from service.physics.question import ask
from tests.properties.questions import OF_SAMPLES, bits, question_for, transfer_pairs, typical_values

SAMPLES = 37  # neither a power of two nor a multiple of a vector register
PAIRS = transfer_pairs("co2")
SPOILED = {3: np.nan, 11: 1e9, 12: -1e9, 20: np.nan}  # samples that are missing or impossible


@cache
def inputs_of(quantity: str, gas: str, method: str | None) -> dict[str, Array]:
    """Return samples scattered about what is typical, some of them spoiled; one input holds for all of them."""
    rng = np.random.default_rng(37)
    made: dict[str, Array] = {}
    for number, (name, value) in enumerate(typical_values(quantity, gas, method).items()):
        term = TERMS[name]
        low, high = (max(term.possible[0], value - term.scale), min(term.possible[1], value + term.scale))
        made[name] = rng.uniform(low, high, 1 if term.holds == "request" or number == 1 else SAMPLES)
        if number % 2 and made[name].size > 1:
            made[name][list(SPOILED)] = list(SPOILED.values())
    return made


def part(values: dict[str, Array], of: slice | list[int]) -> dict[str, Array]:
    return {name: array if array.size == 1 else array[of] for name, array in values.items()}


def answer_to(quantity: str, gas: str, method: str | None, values: dict[str, Array]) -> Answer:
    question = question_for(quantity, gas, values, method)
    return answer(question, values, max(array.size for array in values.values()))


def told(found: Answer, row: int) -> tuple[dict[str, bytes], int, list[str]]:
    """Return all that is told of a sample: the bits of its results, its flag and the reasons."""
    results = {name: bits(array[row : row + 1]) for name, array in found.outcome.results.items()}
    return results, int(found.outcome.verdict.flags[row]), found.outcome.verdict.reasons.get(row, [])


QUESTIONS: list[tuple[str, str, str | None]] = [
    (quantity, gas, None)
    for quantity in OF_SAMPLES
    for gas in (GASES if quantity in ("flux", "solubility") else ["co2", "o2"])
]
QUESTIONS += [("transfer-velocity", gas, method) for method, gas in PAIRS]


@pytest.mark.parametrize(("quantity", "gas", "method"), QUESTIONS)
def test_a_sample_among_others_has_the_answer_that_it_has_alone(quantity: str, gas: str, method: str | None) -> None:
    values = inputs_of(quantity, gas, method)
    together = answer_to(quantity, gas, method, values)

    for row in range(0, together.samples, 1 if method is None and gas == "co2" else 3):
        assert told(answer_to(quantity, gas, method, part(values, [row])), 0) == told(together, row)


@pytest.mark.parametrize("quantity", OF_SAMPLES)
@given(start=st.integers(0, SAMPLES - 2), length=st.integers(2, SAMPLES))
def test_any_part_of_a_batch_has_the_answers_of_that_part(quantity: str, start: int, length: int) -> None:
    values = inputs_of(quantity, "o2", None)
    whole = answer_to(quantity, "o2", None, values)
    cut = answer_to(quantity, "o2", None, part(values, slice(start, start + length)))

    assert all(told(cut, row) == told(whole, start + row) for row in range(cut.samples))


@given(order=st.permutations(range(SAMPLES)))
def test_the_order_of_the_samples_does_not_matter(order: list[int]) -> None:
    values = inputs_of("flux", "co2", None)
    whole = answer_to("flux", "co2", None, values)
    mixed = answer_to("flux", "co2", None, part(values, order))

    assert all(told(mixed, place) == told(whole, row) for place, row in enumerate(order))


@pytest.mark.parametrize("quantity", OF_SAMPLES)
def test_the_inputs_are_left_as_they_were(quantity: str) -> None:
    values = inputs_of(quantity, "o2", None)
    before = {name: array.copy() for name, array in values.items()}
    answer_to(quantity, "o2", None, values)

    assert all(bits(values[name]) == bits(before[name]) for name in values)


def test_several_parameterisations_give_what_each_gives_alone() -> None:
    values = inputs_of("flux", "co2", None)
    names = ("wanninkhof-2014", "nightingale-2000", "liss-merlivat-1986")
    question = ask(QUANTITIES["flux"], GASES["co2"], None, frozenset(values), (), names, (), (), "gas")
    several = answer(question, values, SAMPLES)
    for name in names:
        alone = answer_to("flux", "co2", name, values)

        assert {key: bits(array) for key, array in several.by_parameterisation[name].results.items()} == {
            key: bits(array) for key, array in alone.outcome.results.items()
        }
        assert several.by_parameterisation[name].verdict.reasons == alone.outcome.verdict.reasons


def test_the_mean_and_the_spread_are_over_the_methods_that_give_a_number() -> None:
    values = inputs_of("flux", "co2", None)
    names = ("wanninkhof-2014", "nightingale-2000", "ho-2006")
    question = ask(QUANTITIES["flux"], GASES["co2"], None, frozenset(values), (), names, (), (), "gas")
    several = answer(question, values, SAMPLES)
    stack = np.stack([several.by_parameterisation[name].results["flux"] for name in names])
    good = ~np.isnan(stack).any(axis=0)

    assert good.sum() > SAMPLES / 2
    assert several.outcome.results["flux"][good] == pytest.approx(stack.mean(axis=0)[good], rel=1e-14)
    assert several.spread["flux"][good] == pytest.approx(stack.std(axis=0, ddof=1)[good], rel=1e-12)
