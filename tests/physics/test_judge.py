"""Quality flags: what is missing, what is impossible, what is outside a method's range, and the reasons."""

import numpy as np
import pytest

from service.physics.declare import TERMS, Array
from service.physics.judge import BAD, GOOD, MISSING, SUSPECT, Verdict, judge, limits_text, possible_text
from tests.properties.questions import ask_and_answer

SEA: dict[str, float | Array] = {
    "water_temperature": 18.0,
    "salinity": 35.0,
    "wind_speed": 8.0,
    "water_fugacity": 380.0,
    "air_fugacity": 410.0,
}


def verdict_on(**values: float | Array) -> Verdict:
    return ask_and_answer("flux", "co2", {**SEA, **values}).outcome.verdict


def test_a_good_sample_is_flag_1_without_a_reason() -> None:
    verdict = verdict_on()

    assert verdict.flags.tolist() == [GOOD]
    assert verdict.reasons == {}


def test_a_missing_value_is_flag_9() -> None:
    verdict = verdict_on(wind_speed=np.array([8.0, np.nan]))

    assert verdict.flags.tolist() == [GOOD, MISSING]
    assert verdict.reasons == {1: ["wind_speed is missing"]}


def test_an_impossible_value_is_flag_4_and_told_with_what_is_possible() -> None:
    verdict = verdict_on(salinity=np.array([35.0, -1.0, 350.0]))

    assert verdict.flags.tolist() == [GOOD, BAD, BAD]
    assert verdict.reasons[1] == ["salinity -1 is impossible: 0 to 60"]
    assert verdict.reasons[2] == ["salinity 350 is impossible: 0 to 60"]


def test_the_limits_of_the_possible_are_themselves_possible() -> None:
    assert verdict_on(salinity=np.array([0.0, 60.0])).flags.max() < BAD


def test_infinity_is_impossible_and_not_missing() -> None:
    assert verdict_on(wind_speed=np.array([np.inf, -np.inf])).flags.tolist() == [BAD, BAD]


def test_a_value_outside_the_range_of_a_method_is_flag_3_and_told_by_how_much() -> None:
    verdict = verdict_on(wind_speed=np.array([8.0, 23.5]))

    assert verdict.flags.tolist() == [GOOD, SUSPECT]
    assert (
        "wind_speed_10m 23.5 m s-1 is outside the range of wanninkhof-2014, 0 to 20 m s-1, by 3.5 m s-1"
        in (verdict.reasons[1])
    )


def test_a_value_outside_the_recommended_range_alone_keeps_its_flag_and_has_a_reason() -> None:
    verdict = verdict_on(wind_speed=np.array([8.0, 3.0]))

    assert verdict.flags.tolist() == [GOOD, GOOD]
    assert verdict.reasons == {
        1: ["wind_speed_10m 3 m s-1 is outside the recommended range of wanninkhof-2014, 4 to 15 m s-1, by 1 m s-1"]
    }


def test_the_largest_flag_wins_and_all_reasons_are_kept() -> None:
    verdict = verdict_on(salinity=np.array([35.0, -1.0]), wind_speed=np.array([8.0, np.nan]))

    assert verdict.flags.tolist() == [GOOD, MISSING]
    assert sorted(verdict.reasons[1]) == ["salinity -1 is impossible: 0 to 60", "wind_speed is missing"]


def test_a_single_value_that_is_bad_is_bad_for_every_sample() -> None:
    verdict = verdict_on(salinity=-1.0, wind_speed=np.array([8.0, 9.0]))

    assert verdict.flags.tolist() == [BAD, BAD]
    assert set(verdict.reasons) == {0, 1}


def test_only_inputs_that_the_picked_results_need_are_judged() -> None:
    values = {**SEA, "wind_speed": np.array([8.0, np.nan])}
    picked = ask_and_answer("flux", "co2", values, pick=("fugacity_difference",)).outcome

    assert picked.verdict.flags.tolist() == [GOOD, GOOD]
    assert picked.results["fugacity_difference"].tolist() == [-30.0, -30.0]


def test_what_is_flagged_bad_has_no_number_in_any_result() -> None:
    found = ask_and_answer("flux", "co2", {**SEA, "wind_speed": np.array([8.0, np.nan])}).outcome

    assert all(np.isnan(array[1]) for array in found.results.values())
    assert all(np.isfinite(array[0]) for array in found.results.values())


def test_an_input_is_named_as_its_sender_knows_it() -> None:
    verdict = judge({"wind_speed": np.array([np.nan])}, 1, {"wind_speed": "TrueWind"})

    assert verdict.reasons == {0: ["TrueWind is missing"]}


def test_judging_leaves_the_array_of_the_sender_as_it_was() -> None:
    sent = np.array([35.0, -1.0])
    values = {"salinity": sent}
    judge(values, 2, {})

    assert sent.tolist() == [35.0, -1.0]
    assert np.isnan(values["salinity"]).tolist() == [False, True]


def test_a_reason_is_told_once() -> None:
    verdict = Verdict(np.array([GOOD], dtype=np.int8))
    verdict.mark([0], SUSPECT, "dubious")
    verdict.mark([0], GOOD, "dubious")

    assert verdict.reasons == {0: ["dubious"]}
    assert verdict.flags.tolist() == [SUSPECT]


TEXTS = [
    ((0.0, 20.0), "m s-1", "0 to 20 m s-1"),
    ((0.0, 42.0), "1", "0 to 42"),
    ((-np.inf, 3.5), "degC", "up to 3.5 degC"),
    ((30.0, np.inf), "1", "from 30"),
]


@pytest.mark.parametrize(("limits", "unit", "expected"), TEXTS)
def test_limits_are_told_in_words(limits: tuple[float, float], unit: str, expected: str) -> None:
    assert limits_text(limits, unit) == expected


def test_a_limit_that_must_be_exceeded_is_told_as_such() -> None:
    assert possible_text(TERMS["mixed_layer_depth"]) == "above 0 to 12000 m"
