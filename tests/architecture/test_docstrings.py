"""Every step documents its arguments with their units, and every published method its source."""

import ast
import inspect
import re
import unicodedata
from collections.abc import Callable, Iterator
from pathlib import Path
from typing import Any

import pytest

import service.physics.quantities  # noqa: F401  imported for what it declares
from service.physics.declare import COEFFICIENTS, STEPS, TERMS, Step

ROOT = Path(__file__).parents[2]
UNIT = re.compile(r"\[([^\]]+)\]")
PUBLISHED = re.compile(r"-(1[89]|20)\d\d(-|$)")  # a method that bears the year of a paper


def every_step() -> list[Step]:
    found = (way for by_method in STEPS.values() for ways in by_method.values() for way in ways)
    return [way for way in dict.fromkeys(found) if not way.same_as]


def section(docstring: str, title: str) -> str:
    """Return the text of a section of a docstring, empty where there is none."""
    match = re.search(rf"^{title}\n-+\n(.*?)(?=^\S[^\n]*\n-{{3,}}$|\Z)", docstring, re.DOTALL | re.MULTILINE)
    return match.group(1) if match else ""


def entries(text: str) -> Iterator[tuple[str, str]]:
    """Yield the head and the description of each entry of a section."""
    for match in re.finditer(r"^(\S[^\n]*)\n((?:[ \t]+[^\n]*\n?|\n)*)", text, re.MULTILINE):
        yield match.group(1), match.group(2)


def units_told(description: str) -> set[str]:
    """Return the units in the brackets of a description; several forms are parted by ``or``."""
    return {unit for inside in UNIT.findall(description) for unit in inside.split(" or ")}


STEPS_DECLARED = every_step()
FUNCTIONS: dict[Callable[..., Any], list[Step]] = {}
for _step in STEPS_DECLARED:
    FUNCTIONS.setdefault(_step.function, []).append(_step)
METHODS = [step for step in STEPS_DECLARED if step.method and PUBLISHED.search(step.method)]


def names(steps: list[Step]) -> list[str]:
    return [f"{step.results[0]} {step.method or step.name}" for step in steps]


@pytest.mark.parametrize("function", FUNCTIONS, ids=lambda function: function.__name__)
def test_every_argument_of_a_step_is_documented_with_its_unit(function: Callable[..., Any]) -> None:
    documented = {
        name.strip(): description
        for head, description in entries(section(inspect.getdoc(function) or "", "Parameters"))
        for name in head.partition(" : ")[0].split(",")
    }
    parameters = tuple(inspect.signature(function).parameters)
    wrong = {
        name: description.strip()
        for name, description in documented.items()
        if name != COEFFICIENTS and units_told(description) != {TERMS[name].unit}
    }

    assert tuple(documented) == parameters
    assert not wrong


@pytest.mark.parametrize("function", FUNCTIONS, ids=lambda function: function.__name__)
def test_every_result_of_a_step_is_documented_with_its_unit(function: Callable[..., Any]) -> None:
    told = [units_told(text) for _, text in entries(section(inspect.getdoc(function) or "", "Returns"))]
    for step in FUNCTIONS[function]:
        units = [TERMS[name].unit for name in step.results]

        assert len(told) == len(units)
        assert all(unit in each for unit, each in zip(units, told, strict=True)), (units, told)


@pytest.mark.parametrize("method", sorted({str(step.method) for step in METHODS}))
def test_a_published_method_tells_its_source_and_formula(method: str) -> None:
    sourced = [step for step in METHODS if step.method == method and step.source]

    assert sourced, "no record of this method names a source"
    assert all(step.formula or step.equation for step in sourced)


@pytest.mark.parametrize("step", [each for each in STEPS_DECLARED if each.source and each.method], ids=lambda s: s.name)
def test_a_published_method_names_its_source_in_its_docstring(step: Step) -> None:
    assert step.source is not None
    references = section(inspect.getdoc(step.function) or "", "References")

    assert str(step.source.year) in references
    if step.source.doi:
        assert f"doi:{step.source.doi}" in references
    else:
        assert "doi:" not in references


@pytest.mark.parametrize("step", METHODS, ids=names(METHODS))
def test_a_method_bears_the_authors_and_year_of_its_source(step: Step) -> None:
    if step.source is None:
        return
    surname = unicodedata.normalize("NFKD", step.source.authors.split(",")[0].lower())
    plain = re.sub(r"[^a-z]", "", surname)

    assert step.method is not None
    assert str(step.source.year) in step.method or step.source.note
    assert plain in step.method.replace("-", "")


MODULES = sorted(path for top in ("service", "schemas") for path in (ROOT / top).rglob("*.py"))
SHORTENED_WORDS = """abs acc addr amt approx arr att attrs avg buf calc cfg chk cnt coef coeff coeffs cols conc cond
    conf cur curr dens desc diff dist doc docs elem err evt expr fct fld fmt func fn freq grp hdr hum idx img
    info init inp ints iter itr lat len lib lon lst mgr misc msg mult nb num nums obj objs opt opts param params
    pct pos pred pres press prev proc prop props ptr qty rec recs rel req res resp ret rng sal samp sch schm sec
    seq sol solub spd spec std svc sz tbl temp temps tmp tot tr val vals var vars vec vel wnd wt"""
SHORTENED = frozenset(re.findall("[a-z]+", SHORTENED_WORDS))
OF_THE_TRADE = {"x", "S", "U"}  # the argument of a polynomial, and the papers' symbols in one-line conditions


def words_of(path: Path) -> Iterator[tuple[int, str, str]]:
    """Yield line, name and each word of what a module defines: functions, their parameters, classes."""
    for node in ast.walk(ast.parse(path.read_text(encoding="utf-8"))):
        found: list[str] = []
        if isinstance(node, ast.FunctionDef):
            arguments = [*node.args.posonlyargs, *node.args.args, *node.args.kwonlyargs]
            found = [node.name.replace("__init__", ""), *(argument.arg for argument in arguments)]
        elif isinstance(node, ast.ClassDef):
            found = re.findall("[A-Z][a-z0-9]+", node.name)
        for name in found:
            for word in filter(None, name.split("_")):
                yield getattr(node, "lineno", 0), name, word


@pytest.mark.parametrize("path", MODULES, ids=[str(path.relative_to(ROOT)) for path in MODULES])
def test_names_are_full_words(path: Path) -> None:
    wrong = [
        (line, name)
        for line, name, word in words_of(path)
        if word.lower() in SHORTENED or (len(word) == 1 and word not in OF_THE_TRADE | set("0123456789"))
    ]

    assert not wrong


@pytest.mark.parametrize("name", TERMS)
def test_the_words_of_the_vocabulary_are_full_words(name: str) -> None:
    assert re.fullmatch(r"[a-z][a-z0-9_]*", name)
    assert not set(name.split("_")) & SHORTENED
    assert all(len(word) > 1 or word.isdigit() for word in name.split("_"))
