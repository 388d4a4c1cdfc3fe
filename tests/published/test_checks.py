"""Every figure from outside is recomputed, and no method goes without one."""

import re
from collections import Counter

import pytest

from schemas.requests import load
from schemas.samples import Text
from service.evidence import method_names, recompute
from service.physics import check as figures
from service.physics.catalogue import gas_record, parameterisations
from service.physics.check import KINDS, STEP, Check
from service.physics.declare import FAMILIES, GASES, QUANTITIES, Step

CHECKS = figures.checks()
FROM_OUTSIDE = ("paper", "standard", "handbook", "worked example", "library")


def sets_of_coefficients() -> set[tuple[str, str, str | None]]:
    """Return every set of coefficients that a gas brings, as (gas, result, method)."""
    return {(gas.name, block.result, block.method) for gas in GASES.values() for block in gas.blocks}


def sets_reached(one: Check) -> set[tuple[str, str, str | None]]:
    records = [record for record in one.plan.records if record.needs_coefficients]
    return {(one.gas or "", result, record.method) for record in records for result in record.results}


@pytest.mark.parametrize("one", CHECKS, ids=lambda one: one.id)
def test_a_published_figure_comes_out(one: Check) -> None:
    found = recompute(one)
    allowed = one.tolerance.of(one.value)

    assert found.problem is None
    assert found.holds, f"published {one.value} {one.unit}, computed {found.computed}, allowed {allowed:.3g}"


@pytest.mark.parametrize(
    ("family", "method"), [(family.name, method) for family, method in figures.declared_methods()], ids=str
)
def test_every_method_has_a_check(family: str, method: str) -> None:
    assert any((family, method) in one.methods for one in CHECKS)


@pytest.mark.parametrize("step", figures.sourced_definitions(), ids=lambda step: step.name)
def test_every_definition_with_a_source_has_a_check(step: Step) -> None:
    assert any(step in one.plan.records and one.term in step.results for one in CHECKS)


def test_every_set_of_coefficients_is_reached_by_a_check() -> None:
    reached = {each for one in CHECKS for each in sets_reached(one)}

    assert sets_of_coefficients() - reached == set()


def test_every_method_that_a_check_names_is_declared() -> None:
    families = {family.option: family.name for family in FAMILIES.values()}
    declared = {(family.name, method) for family, method in figures.declared_methods()}
    named = [
        (one.id, families[name], value) for one in CHECKS for name, value in one.inputs.items() if name in families
    ]

    assert [one for one in named if one[1:] not in declared and one[2] not in figures.CHOICES] == []


@pytest.mark.parametrize("one", [one for one in CHECKS if one.quantity != STEP], ids=lambda one: one.id)
def test_a_check_names_the_methods_of_the_answer_itself(one: Check) -> None:
    raw = {name: Text(value) for name, value in (*one.inputs.items(), ("pick", one.result), ("unit", one.unit))}
    told = load(QUANTITIES[one.quantity], raw).question.methods
    answered = {(family, entry["name"]) for family, entries in told.items() for entry in entries}
    sourced = {record.method or record.source.key for record in one.plan.records if record.source}

    assert {(family, method) for family, method in one.methods if method in sourced} <= answered


def test_names_of_checks_are_plain_and_their_data_complete() -> None:
    wrong = [one.id for one in CHECKS if not re.fullmatch(r"[a-z0-9]+(-[a-z0-9.]+)+", one.id)]
    silent = [one.id for one in CHECKS if not (one.where and one.unit and one.tolerance.value >= 0.0)]

    assert wrong == []
    assert silent == []


def test_there_are_checks_enough_and_enough_of_them_from_outside() -> None:
    kinds = Counter(one.kind for one in CHECKS)

    assert kinds.total() >= 120
    assert sum(kinds[kind] for kind in FROM_OUTSIDE) >= 60


def test_the_catalogue_tells_which_evidence_each_method_has() -> None:
    told = [
        entry["evidence"] for gas in GASES.values() for some in gas_record(gas)["methods"].values() for entry in some
    ]
    told += [entry["evidence"] for entry in parameterisations()]

    assert all(set(entry) == {"kind", "meaning", "checks"} for entry in told)
    assert {entry["kind"] for entry in told} <= {*KINDS, "none"}
    assert [entry for entry in told if (entry["kind"] == "none") != (entry["checks"] == 0)] == []


def test_a_gas_is_shown_the_evidence_for_its_own_coefficients() -> None:
    def kind(gas: str, option: str, method: str) -> str:
        entries = {entry["name"]: entry for entry in gas_record(GASES[gas])["methods"][option]}
        return str(entries[method]["evidence"]["kind"])

    assert kind("co2", "schmidt_method", "wanninkhof-2014") == "paper"
    assert kind("n2", "schmidt_method", "wanninkhof-2014") == "transcription"


def test_every_declared_method_can_be_asked_for() -> None:
    assert {method for _, method in figures.declared_methods()} <= set(method_names())
