"""Good samples beside bad ones, alike by query, JSON, form and table."""

from collections.abc import Callable
from typing import Any

import pytest
from flask.testing import FlaskClient
from werkzeug.test import TestResponse

from tests.api.questions import FLUX, PER_SAMPLE, faults, flux, problem, quality, rows, table, values

Ask = Callable[[FlaskClient, str, list[Any], str], TestResponse]


def by_query(client: FlaskClient, name: str, cells: list[Any], more: str) -> TestResponse:
    return client.get(flux(**{name: ";".join(map(str, cells))}) + more)


def by_json(client: FlaskClient, name: str, cells: list[Any], more: str) -> TestResponse:
    return client.post(f"/v1/flux?{more[1:]}", json={**FLUX, name: cells})


def by_form(client: FlaskClient, name: str, cells: list[Any], more: str) -> TestResponse:
    texts = {each: str(value) for each, value in FLUX.items()} | {name: ";".join(map(str, cells))}
    return client.post(f"/v1/flux?{more[1:]}", data=texts)


def by_table(client: FlaskClient, name: str, cells: list[Any], more: str) -> TestResponse:
    names = [*PER_SAMPLE, *([name] if name not in PER_SAMPLE else [])]
    lines = [[cell if each == name else FLUX[each] for each in names] for cell in cells]
    return client.post(f"/v1/flux?gas=co2{more}", data=table(lines, names))


WAYS: list[Ask] = [by_query, by_json, by_form, by_table]
ARRAYS = WAYS[:3]


def judged(answer: TestResponse) -> list[tuple[int, str]]:
    """Return flag and reasons of every sample, and see to it that bad ones have no result and good ones have."""
    if answer.mimetype == "text/csv":
        found = [(int(row["quality_flag"]), row["quality_reason"]) for row in rows(answer)]
        results = [row["flux [mmol m-2 d-1]"] or None for row in rows(answer)]
    else:
        found = [(flag, "; ".join(reasons)) for flag, reasons in quality(answer)]
        results = [value if value is None else str(value) for value in values(answer, "flux")]
    assert [flag >= 4 for flag, _ in found] == [result is None for result in results]
    return found


# Inputs sent, what is impossible there, and how the reason begins.
IMPOSSIBLE = [
    ("wind_speed", -3, "wind_speed -3 is impossible: 0 to 100 m s-1"),
    ("water_temperature", 84, "water_temperature 84 is impossible: -5 to 60 degC"),
    ("salinity", -1, "salinity -1 is impossible"),
    ("air_pressure", 10.08, "air_pressure 10.08 is impossible"),
    ("wind_height", 0, "wind_height 0 is impossible"),
    ("water_mole_fraction", -1, "water_mole_fraction -1 is impossible"),
    ("ice_fraction", 30, "ice_fraction 30 is impossible: 0 to 1"),
    ("barometer_height", 9000, "barometer_height 9000 is impossible"),
]


@pytest.mark.parametrize("ask", WAYS)
@pytest.mark.parametrize(("name", "value", "reason"), IMPOSSIBLE)
def test_an_impossible_value_makes_its_sample_bad(
    client: FlaskClient, ask: Ask, name: str, value: float, reason: str
) -> None:
    good = FLUX.get(name, 0)
    first, second = judged(ask(client, name, [good, value], ""))

    assert first == (1, "")
    assert second[0] == 4
    assert second[1].startswith(reason)


OPTIONAL = ["air_pressure", "wind_height", "ice_fraction", "barometer_height"]


@pytest.mark.parametrize("ask", WAYS)
@pytest.mark.parametrize("name", ["wind_speed", "salinity", "water_mole_fraction", "air_mole_fraction", *OPTIONAL])
def test_a_gap_makes_its_sample_missing_and_never_falls_back_to_a_default(
    client: FlaskClient, ask: Ask, name: str
) -> None:
    answer = ask(client, name, [FLUX.get(name, 0), "NA"], "")

    assert judged(answer) == [(1, ""), (9, f"{name} is missing")]
    assert f"{name}=" not in answer.headers["Catspaw-Assumed"]


@pytest.mark.parametrize("ask", WAYS)
def test_a_value_outside_the_range_of_a_method_is_computed_and_suspect(client: FlaskClient, ask: Ask) -> None:
    first, second = judged(ask(client, "water_temperature", [18.4, 45], ""))

    assert first == (1, "")
    assert second[0] == 3
    assert "water_temperature 45 degC is outside the range of" in second[1]
    assert "by 5 degC" in second[1]


@pytest.mark.parametrize("ask", WAYS)
def test_the_largest_flag_wins_and_all_reasons_are_kept(client: FlaskClient, ask: Ask) -> None:
    several = {**FLUX, "water_temperature": 45}
    gap = client.get(flux(water_temperature="45;45", wind_speed="NA;7", ice_fraction="2;0"))
    both = judged(ask(client, "wind_speed", ["NA"], "&ice_fraction=2"))

    assert quality(gap)[0][0] == 9
    assert len(quality(gap)[0][1]) >= 2
    assert quality(gap)[1][0] == 3
    assert both[0][0] == 9
    assert "wind_speed is missing" in both[0][1]
    assert "ice_fraction 2 is impossible" in both[0][1]
    assert several["gas"] == "co2"


@pytest.mark.parametrize("ask", WAYS)
def test_only_inputs_that_the_picked_results_need_are_judged(client: FlaskClient, ask: Ask) -> None:
    answer = ask(client, "wind_speed", [-3, "NA"], "&pick=schmidt_number")
    found = (
        [int(row["quality_flag"]) for row in rows(answer)]
        if answer.mimetype == "text/csv"
        else [flag for flag, _ in quality(answer)]
    )

    assert found == [1, 1]


@pytest.mark.parametrize("ask", ARRAYS)
def test_text_for_a_number_is_refused_by_name_and_sample(client: FlaskClient, ask: Ask) -> None:
    told = problem(ask(client, "wind_speed", [7, "calm"], ""))
    (error,) = told["errors"]

    assert (error["code"], error["name"], error["sample"]) == ("not_a_number", "wind_speed", 2)
    assert "'calm'" in error["reason"]


def test_text_for_a_number_in_a_table_makes_its_row_bad_and_is_quoted(client: FlaskClient) -> None:
    first, second = judged(by_table(client, "wind_speed", [7, "calm"], ""))

    assert first == (1, "")
    assert second[0] == 4
    assert "'calm'" in second[1]


# What refuses a whole request, whatever the samples are: parameters, and the code and name of the error.
REFUSED = [
    ("&wind_sped=7", "unknown_name", "wind_sped"),
    ("&water_fugacity=370", "two_ways", None),
    ("&barometer_height=9 kn", "unit", "barometer_height"),
    ("&positive=sideways", "unknown_option", "positive"),
    ("&water=pond", "unknown_option", "water"),
    ("&parameterisation=nobody-1900", "unknown_option", "parameterisation"),
    ("&pick=fluxes", "unknown_option", "pick"),
    ("&unit=degC", "unit", "unit.flux"),
    ("&ice_fraction=0;0;0", "length", None),
]


@pytest.mark.parametrize("ask", WAYS)
@pytest.mark.parametrize(("more", "code", "name"), REFUSED)
def test_a_wrong_question_is_refused_whole(
    client: FlaskClient, ask: Ask, more: str, code: str, name: str | None
) -> None:
    (found, *_) = faults(ask(client, "wind_speed", [7, 8], more))

    assert found[0] == code
    assert name in (None, found[1])


def test_the_nearest_known_name_is_told(client: FlaskClient) -> None:
    told = problem(client.get(flux(wind_sped=7)))

    assert "did you mean wind_speed?" in told["detail"]


def test_possible_inputs_without_a_finite_result_are_bad(client: FlaskClient) -> None:
    # an air of nothing but the gas at a pressure just above that of the vapour, and water without any
    answer = client.get(flux(air_mole_fraction="419;0", pick="saturation"))

    assert quality(answer)[1] == (4, ["no method gives a number here"])
    assert values(answer, "saturation")[1] is None


@pytest.mark.parametrize("ask", WAYS)
def test_strict_refuses_bad_and_missing_samples_and_names_them(client: FlaskClient, ask: Ask) -> None:
    cells = [7, "NA", 8, -3]
    told = problem(ask(client, "wind_speed", cells, "&strict=1"))

    assert told["detail"].startswith("2 of 4 samples have no result")
    assert [(error["code"], error["sample"]) for error in told["errors"]] == [("bad_sample", 2), ("bad_sample", 4)]
    assert "wind_speed is missing" in told["errors"][0]["reason"]
    assert "more" not in told


def test_strict_names_the_first_twenty_and_counts_the_rest(client: FlaskClient) -> None:
    told = problem(by_json(client, "wind_speed", [None] * 50, "&strict=1"))

    assert [error["sample"] for error in told["errors"]] == list(range(1, 21))
    assert told["more"] == 30
    assert told["detail"].startswith("50 of 50 samples")


@pytest.mark.parametrize("ask", WAYS)
def test_strict_lets_suspect_samples_pass(client: FlaskClient, ask: Ask) -> None:
    answer = ask(client, "water_temperature", [18.4, 45], "&strict=1")

    assert [flag for flag, _ in judged(answer)] == [1, 3]


def test_a_value_that_holds_for_every_sample_marks_them_all(client: FlaskClient) -> None:
    answer = client.get(flux(wind_speed="7;8;9", salinity="NA"))

    assert quality(answer) == [(9, ["salinity is missing"])] * 3


def test_reasons_in_a_table_are_joined_by_semicolons(client: FlaskClient) -> None:
    content = table([[18.4, 35.1, 10, -3, 18.0, 380.0, 419.0]])
    (row,) = rows(client.post("/v1/flux?gas=co2", data=content))

    assert row["quality_reason"].count("; ") == 1
    assert "air_pressure" in row["quality_reason"]
    assert "wind_speed" in row["quality_reason"]
