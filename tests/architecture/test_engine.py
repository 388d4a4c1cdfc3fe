"""The engine knows no quantity, no gas and no method; a contradiction between declarations is found at once."""

import ast
import re
from collections.abc import Callable
from pathlib import Path

import pytest

from service.physics import declare, engine, methods, quantities
from service.physics.declare import (
    DERIVED,
    FAMILIES,
    GASES,
    QUANTITIES,
    SIDES,
    STEPS,
    TERMS,
    DeclarationError,
    Gas,
    Quantity,
    derived,
    family,
    gas,
    quantity,
    side,
    step,
    term,
)

ENGINE = Path(engine.__file__)
DISPATCHERS = [ENGINE, Path(methods.__file__), ENGINE.with_name("plans.py")]
LONGEST = 150


def words_and_texts(path: Path) -> set[str]:
    """Return every name and every text constant of a module, docstrings left out."""
    tree = ast.parse(path.read_text(encoding="utf-8"))
    docstrings = {
        id(node.body[0].value)
        for node in ast.walk(tree)
        if isinstance(node, ast.Module | ast.ClassDef | ast.FunctionDef)
        and node.body
        and isinstance(node.body[0], ast.Expr)
    }
    found: set[str] = set()
    for node in ast.walk(tree):
        if isinstance(node, ast.Constant) and isinstance(node.value, str) and id(node) not in docstrings:
            found.add(node.value)
        elif isinstance(node, ast.Name):
            found.add(node.id)
        elif isinstance(node, ast.Attribute):
            found.add(node.attr)
    return found


def test_the_engine_stays_small() -> None:
    assert len(ENGINE.read_text(encoding="utf-8").splitlines()) < LONGEST


@pytest.mark.parametrize("path", DISPATCHERS, ids=lambda path: path.name)
def test_the_dispatch_names_no_quantity(path: Path) -> None:
    assert quantities.FLUX.name == "flux"
    assert not words_and_texts(path) & set(QUANTITIES)
    assert not re.search(r"\bif\s+\w*quantity\b|\bquantity(\.name)?\s*(==|in)\s", path.read_text(encoding="utf-8"))


@pytest.mark.parametrize("path", DISPATCHERS, ids=lambda path: path.name)
def test_the_dispatch_names_no_gas_and_no_method(path: Path) -> None:
    every_method = {name for by_method in STEPS.values() for name in by_method if name}
    standing_for_none = {methods.GIVEN}  # the caller's own numbers in place of a method

    assert not words_and_texts(path) & (set(GASES) | every_method - standing_for_none)


def test_the_engine_names_no_term() -> None:
    assert not words_and_texts(ENGINE) & set(TERMS)


@pytest.mark.usefixtures("registers")
def test_steps_that_need_each_other_are_refused() -> None:
    term("hen", "1", "invented")
    term("egg", "1", "invented")
    step("hen")(lambda egg: egg)
    step("egg")(lambda hen: hen)
    term("chick", "1", "invented")
    derived("chick", of="hen", schmidt_number="schmidt_number_600")

    with pytest.raises(DeclarationError, match="needed to compute itself"):
        engine.plan(("chick",), frozenset(), (), "co2")
    with pytest.raises(DeclarationError, match="needed to compute itself"):
        engine.plan(("hen",), frozenset(), (), "co2")


@pytest.mark.usefixtures("registers")
def test_a_step_that_needs_itself_is_refused() -> None:
    term("ouroboros", "1", "invented")
    step("ouroboros")(lambda ouroboros: ouroboros)

    with pytest.raises(DeclarationError, match="ouroboros is needed to compute itself"):
        engine.plan(("ouroboros",), frozenset(), (), "co2")


@pytest.mark.usefixtures("registers")
def test_a_circle_is_no_matter_where_one_of_its_terms_is_given() -> None:
    term("hen", "1", "invented", is_input=True)
    term("egg", "1", "invented")
    step("hen")(lambda egg: egg)
    step("egg")(lambda hen: hen)

    assert engine.plan(("egg",), frozenset({"hen"}), (), "co2").leaves == ("hen",)


def a_gas() -> Gas:
    return Gas("co2", "CO2", "invented", 44.0, blocks=())


TWICE: list[tuple[str, Callable[[], object]]] = [
    ("term", lambda: term("salinity", "1", "again")),
    ("derived term", lambda: derived("transfer_velocity_600", of="transfer_velocity")),
    ("side", lambda: side("water_side", ("a", "b"), "again")),
    ("family", lambda: family("solubility", "solubility_method", "again", ("solubility",))),
    ("family of a term", lambda: family("other", "other", "again", ("solubility",))),
    ("gas", lambda: gas(a_gas())),
    ("quantity", lambda: quantity(Quantity("flux", "again", ("flux",)))),
    ("definition", lambda: step("evasion")(lambda invasion: invasion)),
    ("method", lambda: step("schmidt_number", method="wanninkhof-2014")(lambda salinity: salinity)),
]


@pytest.mark.usefixtures("registers")
@pytest.mark.parametrize("again", [declare_it for _, declare_it in TWICE], ids=[name for name, _ in TWICE])
def test_declaring_a_thing_twice_is_refused(again: Callable[[], object]) -> None:
    with pytest.raises(DeclarationError, match="declared twice"):
        again()


@pytest.mark.usefixtures("registers")
def test_two_ways_of_one_method_stand_beside_each_other() -> None:
    term("invented", "1", "invented")
    step("invented", way="salinity")(lambda salinity: salinity)
    step("invented", way="water_temperature")(lambda water_temperature: water_temperature)

    assert engine.plan(("invented",), frozenset({"salinity"}), (), "co2").leaves == ("salinity",)
    assert engine.plan(("invented",), frozenset({"water_temperature"}), (), "co2").leaves == ("water_temperature",)


@pytest.mark.usefixtures("registers")
def test_a_step_is_returned_unchanged_by_its_declaration() -> None:
    def function(salinity: float) -> float:
        return salinity

    term("unchanged", "1", "invented")

    assert step("unchanged")(function) is function


def test_what_is_declared_hangs_together() -> None:
    words = set(TERMS)
    used = {name for by_method in STEPS.values() for ways in by_method.values() for s in ways for name in s.parameters}
    ranged = {
        name
        for by_method in STEPS.values()
        for ways in by_method.values()
        for s in ways
        for name in (*s.valid, *s.recommended, *s.supplies, *s.assumes, *s.assumes_values)
    }
    remarked = {
        name
        for by_method in STEPS.values()
        for ways in by_method.values()
        for s in ways
        for remark in s.remarks
        for name in remark.terms
    }

    assert set(STEPS) <= words
    assert used - {declare.COEFFICIENTS} <= words
    assert ranged <= words
    assert remarked <= words
    assert {name for record in DERIVED.values() for name in (record.of, *record.replace.values())} <= words
    assert {name for record in SIDES.values() for name in record.members} <= words
    assert {name for record in FAMILIES.values() for name in record.results} <= words
    assert {name for q in QUANTITIES.values() for name in (*q.results, *q.more, *q.needs_side)} <= words


@pytest.mark.parametrize("name", GASES)
def test_a_gas_has_a_step_for_every_block_that_it_brings(name: str) -> None:
    homeless = [
        (block.result, block.method)
        for block in GASES[name].blocks
        if not any(way.needs_coefficients for way in STEPS.get(block.result, {}).get(block.method, ()))
    ]

    assert not homeless


@pytest.mark.parametrize("name", GASES)
def test_the_default_methods_of_a_gas_are_ones_that_it_has(name: str) -> None:
    record = GASES[name]
    wrong = {
        family_name: method
        for family_name, method in record.defaults.items()
        if method not in methods.methods_for(record, FAMILIES[family_name])
    }

    assert not wrong
