"""A question is refused with every fault that can be told at once, or planned with all that was assumed."""

import numpy as np
import pytest

from service.physics.answer import answer
from service.physics.declare import GASES, QUANTITIES, Array
from service.physics.faults import Refused
from service.physics.question import Question, ask
from tests.properties.questions import ask_and_answer

SEA = ("water_temperature", "salinity", "wind_speed")
BOTH = (*SEA, "water_fugacity", "air_fugacity")


def asked(
    *given: str,
    quantity: str = "flux",
    gas: str = "co2",
    water: str | None = None,
    chosen: tuple[tuple[str, str], ...] = (),
    methods: tuple[str, ...] = (),
    pick: tuple[str, ...] = (),
    units: tuple[tuple[str, str], ...] = (),
    mass_as: str = "gas",
    optional: frozenset[str] = frozenset(),
) -> Question:
    return ask(
        QUANTITIES[quantity], GASES[gas], water, frozenset(given), chosen, methods, pick, units, mass_as, optional
    )


def faults(refused: pytest.ExceptionInfo[Refused]) -> set[tuple[str, str]]:
    return {(fault.code, fault.name) for fault in refused.value.faults}


TWO_WAYS = [
    (("water_fugacity", "water_partial_pressure"), "water_fugacity and water_partial_pressure"),
    (("air_fugacity", "air_mole_fraction"), "air_fugacity and air_mole_fraction"),
    (("water_fugacity", "water_concentration"), "water_concentration and water_fugacity"),
    (("given_transfer_velocity", "given_transfer_velocity_600"), "given_transfer_velocity"),
    (("air_pressure", "elevation"), "air_pressure and elevation"),
]


@pytest.mark.parametrize(("pair", "named"), TWO_WAYS)
def test_two_ways_of_saying_one_thing_are_refused_by_their_names(pair: tuple[str, str], named: str) -> None:
    rest = [name for name in BOTH if name not in pair and not name.startswith(pair[0].split("_")[0] + "_f")]
    with pytest.raises(Refused) as refused:
        asked(*rest, *pair)

    assert [fault.code for fault in refused.value.faults] == ["two_ways"]
    assert set(named.split(" and ")) <= set(refused.value.faults[0].name.split(" and "))


def test_a_concentration_per_litre_is_the_same_way_as_one_per_kilogram() -> None:
    with pytest.raises(Refused, match="send one"):
        asked(*SEA, "water_fugacity", "water_concentration_per_litre", "air_fugacity")


def test_the_callers_own_transfer_velocity_and_a_parameterisation_are_two_ways() -> None:
    with pytest.raises(Refused) as refused:
        asked(*BOTH, "given_transfer_velocity", methods=("wanninkhof-2014",))

    assert faults(refused) == {("two_ways", "given_transfer_velocity")}


def test_everything_that_is_missing_is_told_at_once() -> None:
    with pytest.raises(Refused) as refused:
        asked("water_temperature")

    assert faults(refused) == {
        ("missing_input", "salinity"),
        ("missing_input", "wind_speed"),
        ("missing_input", "water_side"),
        ("missing_input", "air_side"),
    }


def test_a_missing_side_is_told_with_all_ways_of_giving_it() -> None:
    with pytest.raises(Refused) as refused:
        asked(*SEA, "air_fugacity")
    fault = refused.value.faults[0]

    assert "exactly one of" in fault.reason
    assert {"water_mole_fraction", "water_fugacity", "water_concentration"} <= set((fault.allowed or "").split(", "))


def test_a_gas_whose_share_of_air_hardly_changes_needs_no_air_side() -> None:
    question = asked(*SEA, "water_concentration", gas="o2")

    assert question.assumed["air_mole_fraction"]["value"] == 209460.0


def test_an_input_that_nothing_uses_is_refused() -> None:
    with pytest.raises(Refused) as refused:
        asked(*BOTH, "mixed_layer_depth")

    assert faults(refused) == {("unused", "mixed_layer_depth")}


def test_an_input_that_only_an_unpicked_result_uses_is_no_fault() -> None:
    assert asked(*BOTH, pick=("fugacity_difference",)).used == {"water_fugacity", "air_fugacity"}


def test_a_column_that_nothing_uses_is_no_fault() -> None:
    question = asked(*BOTH, "mixed_layer_depth", optional=frozenset({"mixed_layer_depth"}))

    assert "mixed_layer_depth" not in question.used


INLAND = [("lake", "cole-caraco-1998"), ("lake", "wanninkhof-2014")]


@pytest.mark.parametrize(("water", "method"), INLAND)
def test_inland_water_needs_its_pressure_where_pressure_matters(water: str, method: str) -> None:
    given = (*SEA, "water_fugacity", "air_mole_fraction")
    with pytest.raises(Refused) as refused:
        asked(*given, water=water, methods=(method,))

    assert faults(refused) == {("missing_input", "air_pressure")}
    assert "elevation" in refused.value.faults[0].reason
    assert asked(*given, "air_pressure", water=water, methods=(method,))
    assert asked(*given, "elevation", water=water, methods=(method,))


def test_inland_water_needs_no_pressure_where_it_does_not_matter() -> None:
    assert asked(*BOTH, water="lake", methods=("cole-caraco-1998",))


@pytest.mark.parametrize("water", ["lake", "stream", "estuary"])
def test_a_water_other_than_the_sea_has_no_default_method(water: str) -> None:
    with pytest.raises(Refused) as refused:
        asked(*BOTH, water=water)

    assert ("missing_input", "parameterisation") in faults(refused)


def test_the_methods_of_a_lake_are_named_where_one_is_needed() -> None:
    with pytest.raises(Refused) as refused:
        asked(*BOTH, water="lake")

    assert "cole-caraco-1998" in (refused.value.faults[0].allowed or "")


@pytest.mark.parametrize("water", [None, "ocean", "coastal"])
def test_the_sea_has_its_default_and_the_answer_says_so(water: str | None) -> None:
    question = asked(*BOTH, water=water)

    assert question.assumed["parameterisation"] == {"value": "wanninkhof-2014"}


def test_a_method_that_was_asked_for_is_not_told_as_assumed() -> None:
    assert "parameterisation" not in asked(*BOTH, methods=("wanninkhof-2014",)).assumed
    assert "parameterisation" not in asked(*BOTH, "given_transfer_velocity").assumed


def test_water_matters_not_where_no_method_of_transfer_does() -> None:
    assert asked("water_temperature", "salinity", quantity="schmidt-number", water="lake")


def values_of(**more: float | Array) -> dict[str, float | Array]:
    sea: dict[str, float | Array] = {"water_temperature": 18.0, "salinity": 35.0, "wind_speed": 8.0}
    return {**sea, "water_fugacity": 380.0, "air_fugacity": 410.0, **more}


def test_brackish_water_by_a_method_of_the_sea_is_flag_3_below_salinity_5() -> None:
    found = ask_and_answer("flux", "co2", values_of(salinity=np.array([5.0, 4.999, 0.0]))).outcome.verdict

    assert found.flags.tolist() == [1, 3, 3]
    assert "say which water this is" in found.reasons[1][0]


def test_brackish_water_is_not_remarked_on_where_the_method_was_asked_for() -> None:
    found = ask_and_answer("flux", "co2", values_of(salinity=2.0), method="wanninkhof-2014").outcome.verdict

    assert found.flags.tolist() == [1]


def test_a_method_outside_the_water_it_was_made_for_is_flag_3() -> None:
    arrays = {name: np.atleast_1d(np.asarray(value, float)) for name, value in values_of().items()}
    found = answer(asked(*BOTH, water="ocean", methods=("cole-caraco-1998",)), arrays, 1).outcome.verdict

    assert found.flags.tolist() == [3]
    assert found.reasons[0] == ["cole-caraco-1998 was made for lake, not for water ocean"]


ASSUMED = [
    (("water_fugacity", "air_mole_fraction"), "air_pressure", {"value": 1013.25, "unit": "hPa"}),
    (("water_fugacity", "air_mole_fraction", "air_pressure"), "barometer_height", {"value": 0.0, "unit": "m"}),
    (("water_fugacity", "air_fugacity"), "wind_height", {"value": 10.0, "unit": "m"}),
    (("water_fugacity", "air_fugacity"), "ice_fraction", {"value": 0.0, "unit": "1"}),
    (("water_fugacity", "air_fugacity", "wind_height"), "wind_profile", {"value": "smith-1988"}),
]


@pytest.mark.parametrize(("given", "name", "expected"), ASSUMED)
def test_what_is_assumed_is_told(given: tuple[str, ...], name: str, expected: dict[str, object]) -> None:
    assert asked(*SEA, *given).assumed[name] == expected


@pytest.mark.parametrize(("given", "name", "expected"), ASSUMED[:4])
def test_what_is_given_is_not_told_as_assumed(given: tuple[str, ...], name: str, expected: dict[str, object]) -> None:
    assert expected
    assert name not in asked(*SEA, *given, name).assumed


def test_a_fugacity_coefficient_of_one_is_told_as_assumed() -> None:
    given = (*SEA, "water_fugacity", "air_mole_fraction")

    assert asked(*given, gas="ch4").assumed["fugacity_coefficient"] == {"value": 1.0, "unit": "1"}
    assert "fugacity_coefficient" not in asked(*given, gas="co2").assumed


def test_the_methods_are_told_with_their_papers() -> None:
    methods = asked(*BOTH).methods

    assert methods["transfer_velocity"][0] == {
        "name": "wanninkhof-2014",
        "source": "Wanninkhof (2014)",
        "doi": "10.4319/lom.2014.12.351",
    }
    assert methods["solubility"][0]["source"] == "Weiss (1974)"


def test_the_main_results_come_where_none_is_picked() -> None:
    assert [each.name for each in asked(*BOTH).wanted] == list(QUANTITIES["flux"].results)
    assert [each.name for each in asked(*BOTH, pick=("saturation", "flux")).wanted] == ["saturation", "flux"]


def test_a_result_that_needs_the_air_side_is_left_out_without_it() -> None:
    without = asked("water_temperature", "salinity", quantity="solubility")
    beside = asked("water_temperature", "salinity", "air_mole_fraction", quantity="solubility")

    assert "equilibrium_concentration" not in {each.name for each in without.wanted}
    assert "equilibrium_concentration" in {each.name for each in beside.wanted}


def test_a_wrong_unit_is_refused_with_those_that_are_right() -> None:
    with pytest.raises(Refused) as refused:
        asked(*BOTH, units=(("flux", "hPa"),))

    assert faults(refused) == {("unit", "unit.flux")}
    assert "mmol m-2 d-1" in (refused.value.faults[0].allowed or "")


def test_the_mass_of_an_element_is_asked_for_only_where_there_is_one() -> None:
    units = (("flux", "g m-2 d-1"),)

    assert asked(*BOTH, units=units, mass_as="element").wanted[0].conversion.mass_of == "C"
    with pytest.raises(Refused):
        asked(*BOTH, gas="o2", units=units, mass_as="element")


def test_the_standard_name_follows_gas_and_direction() -> None:
    down = asked(*BOTH, chosen=(("direction", "downward"),)).wanted[0].standard_name

    assert asked(*BOTH).wanted[0].standard_name == "surface_upward_mole_flux_of_carbon_dioxide"
    assert down == "surface_downward_mole_flux_of_carbon_dioxide"
