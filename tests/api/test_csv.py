"""Tables: which columns are read, and what passes through untouched."""

import pytest
from flask.testing import FlaskClient

from schemas.vocabulary import request_fields
from service.physics.declare import QUANTITIES
from tests.api.questions import (
    FLUX,
    PER_SAMPLE,
    QUESTIONS,
    ROWS,
    address,
    faults,
    flux,
    number,
    problem,
    rows,
    table,
)
from tests.api.tables import ADDED, ask, flags, fluxes, renamed, replaced


def test_a_table_is_answered_with_its_lines_and_the_results_behind_them(client: FlaskClient) -> None:
    answer = ask(client, table())
    lines = answer.text.split("\n")

    assert answer.headers["Content-Type"] == "text/csv; charset=utf-8"
    assert lines[0] == ",".join([*PER_SAMPLE, *ADDED])
    assert lines[-1] == ""
    assert [line.split(",")[: len(PER_SAMPLE)] for line in lines[1:-1]] == [[str(c) for c in row] for row in ROWS]
    assert flags(answer) == ["1", "1"]


@pytest.mark.parametrize("delimiter", [",", ";", "\t"])
def test_the_answer_has_the_delimiter_of_the_question(client: FlaskClient, delimiter: str) -> None:
    answer = ask(client, table(delimiter=delimiter))

    assert fluxes(answer, delimiter) == fluxes(ask(client, table()))


SAME = {
    "a byte order mark": lambda content: b"\xef\xbb\xbf" + content,
    "line ends of two characters": lambda content: content.replace(b"\n", b"\r\n"),
    "no line end at the end": lambda content: content.rstrip(b"\n"),
    "blank lines": lambda content: content.replace(b"\n", b"\n\n  \n"),
    "quoted cells": lambda content: content.replace(b"7.5", b'"7.5"').replace(b"salinity", b'"salinity"'),
    "blanks in cells": lambda content: content.replace(b"7.5", b" 7.5 ").replace(b"salinity", b" salinity "),
}


@pytest.mark.parametrize("change", SAME)
def test_a_table_is_read_alike_with(client: FlaskClient, change: str) -> None:
    answer = ask(client, SAME[change](table()))

    assert fluxes(answer) == fluxes(ask(client, table()))
    assert not answer.data.startswith(b"\xef\xbb\xbf")
    assert b"\r" not in answer.data


def test_a_header_carries_the_unit_of_its_column(client: FlaskClient) -> None:
    knots = [[*row[:3], row[3] * 3600 / 1852, *row[4:]] for row in ROWS]
    answer = ask(client, table(knots, renamed(wind_speed="wind_speed [kn]")))

    assert fluxes(answer) == pytest.approx(fluxes(ask(client, table())), rel=1e-12)


def test_a_unit_that_cannot_be_is_refused_with_those_allowed(client: FlaskClient) -> None:
    told = problem(ask(client, table(names=renamed(wind_speed="wind_speed [furlongs]"))))

    assert (told["errors"][0]["code"], told["errors"][0]["name"]) == ("unit", "wind_speed")
    assert "kn" in told["errors"][0]["allowed"]


# A header, the reference to it, and what the wind is then in.
REFERENCES = [
    ("WSPD", "@WSPD"),
    ("WSPD [m s-1]", "@WSPD"),
    ("WSPD [m s-1]", "@WSPD [m s-1]"),
    ("WSPD", "@WSPD [m s-1]"),
    ("True Wind (bow)", "@True Wind (bow)"),
    ("wind [bow]", "@wind [bow] [m s-1]"),
]


@pytest.mark.parametrize(("header", "reference"), REFERENCES)
def test_a_parameter_points_to_a_column_of_another_name(client: FlaskClient, header: str, reference: str) -> None:
    content = table(names=renamed(wind_speed=header))
    answer = client.post("/v1/flux", query_string={"gas": "co2", "wind_speed": reference}, data=content)

    assert fluxes(answer) == fluxes(ask(client, table()))
    assert header in answer.text.split("\n")[0]


def test_a_reference_can_add_a_unit(client: FlaskClient) -> None:
    content = table([[*row[:3], row[3] * 3600 / 1852, *row[4:]] for row in ROWS], renamed(wind_speed="WSPD"))
    answer = client.post("/v1/flux", query_string={"gas": "co2", "wind_speed": "@WSPD [kn]"}, data=content)

    assert fluxes(answer) == pytest.approx(fluxes(ask(client, table())), rel=1e-12)


# References that are refused, with the code and a word of the cure.
WRONG_REFERENCES = [
    ("WSPD", "@WSPEED", "column", "WSPD"),
    ("WSPD [kn]", "@WSPD [m s-1]", "two_ways", "kn"),
    ("WSPD [bow]", "@WSPD", "unit", "kn"),
]


@pytest.mark.parametrize(("header", "reference", "code", "cure"), WRONG_REFERENCES)
def test_a_reference_that_cannot_be_followed_is_refused(
    client: FlaskClient, header: str, reference: str, code: str, cure: str
) -> None:
    content = table(names=renamed(wind_speed=header))
    told = problem(client.post("/v1/flux", query_string={"gas": "co2", "wind_speed": reference}, data=content))

    assert (told["errors"][0]["code"], told["errors"][0]["name"]) == (code, "wind_speed")
    assert cure in told["detail"]


def test_a_reference_without_a_table_says_so(client: FlaskClient) -> None:
    told = problem(client.get(flux(wind_speed="@WSPD")))

    assert told["errors"][0]["code"] == "column"
    assert "no CSV" in told["detail"]


NEAR_MISSES = [
    "Wind_Speed",
    "wind speed",
    "wind-speed",
    "WIND_SPEED",
    "windspeed",
    "wind_sped",
    "wind_spede",
    "wind_speeed",
]


@pytest.mark.parametrize("header", NEAR_MISSES)
def test_a_header_that_is_nearly_an_input_is_refused_with_both_cures(client: FlaskClient, header: str) -> None:
    told = problem(ask(client, table(names=renamed(wind_speed=header))))

    assert ("near_miss", header) in [(error["code"], error["name"]) for error in told["errors"]]
    assert "wind_speed" in told["detail"]
    assert f"ignore={header}" in told["detail"]


def test_a_misspelt_optional_input_is_refused_too(client: FlaskClient) -> None:
    assert faults(ask(client, table(names=renamed(air_pressure="air_presure")))) == [("near_miss", "air_presure")]


def test_a_near_miss_may_be_ignored(client: FlaskClient) -> None:
    answer = ask(client, table(names=renamed(air_pressure="air_presure")), "&ignore=air_presure")

    assert flags(answer) == ["1", "1"]
    assert "air_pressure=1013.25 hPa" in answer.headers["Catspaw-Assumed"]
    assert rows(answer)[1]["air_presure"] == "990.5"


def test_a_column_that_is_an_input_may_be_ignored(client: FlaskClient) -> None:
    answer = ask(client, table(), "&ignore=wind_height;air_pressure")

    assert "wind_height=10.0 m" in answer.headers["Catspaw-Assumed"]


def test_a_column_to_be_ignored_that_is_not_there_is_refused(client: FlaskClient) -> None:
    assert faults(ask(client, table(), "&ignore=gust")) == [("column", "gust")]


def test_a_column_that_is_no_input_passes_untouched(client: FlaskClient) -> None:
    names = ["time", *PER_SAMPLE, "remark", "strict", "fraction", "pick"]
    content = table(
        [
            ["2031-07-01T00:00:00Z", *ROWS[0], '"rain, then ""sun"""', "x", "0.5", "=1+1"],
            ["  2031-07-01 00:05", *ROWS[1], "üß µ", "", "", "1,5".replace(",", ".")],
        ],
        names,
    )
    answer = ask(client, content)
    sent, got = content.decode().split("\n"), answer.text.split("\n")

    assert all(line.startswith(before + ",") for before, line in zip(sent[:3], got[:3], strict=True))
    assert fluxes(answer) == fluxes(ask(client, table()))


def test_bytes_of_the_lines_pass_as_they_came(client: FlaskClient) -> None:
    line = b'18.40,35.100,  1008.2,+7.5,1.8e1,"380",419.000'
    answer = ask(client, ",".join(PER_SAMPLE).encode() + b"\n" + line + b"\n")

    assert answer.data.split(b"\n")[1].startswith(line + b",")
    assert fluxes(answer) == [number(client.get(flux()), "flux")]


COLLISIONS = ["flux", "flux [mol]", "quality_flag", "solubility", "schmidt_number [1]"]


@pytest.mark.parametrize("header", COLLISIONS)
def test_a_header_that_is_also_a_column_to_be_written_is_refused_with_both_cures(
    client: FlaskClient, header: str
) -> None:
    content = table([[*row, "1"] for row in ROWS], [*PER_SAMPLE, header])
    told = problem(ask(client, content))
    name = header.partition(" [")[0]

    assert [(error["code"], error["name"]) for error in told["errors"]] == [("collision", name)]
    assert "rename" in told["detail"]
    assert f"ignore={name}" in told["detail"]
    assert ask(client, content, f"&ignore={name}").status_code == 200


def test_what_is_not_written_does_not_collide(client: FlaskClient) -> None:
    content = table([[*row, "1"] for row in ROWS], [*PER_SAMPLE, "flux"])

    assert ask(client, content, "&pick=schmidt_number").status_code == 200
    assert ask(client, content, "&form=json").status_code == 200


def test_two_columns_for_one_input_are_refused(client: FlaskClient) -> None:
    content = table([[*row, "1"] for row in ROWS], [*PER_SAMPLE, "salinity"])
    told = problem(ask(client, content))

    assert told["errors"][0]["code"] == "two_ways"
    assert "two columns" in told["detail"]


def test_a_column_and_a_parameter_for_one_input_are_refused_with_the_cure(client: FlaskClient) -> None:
    told = problem(ask(client, table(), "&salinity=35"))

    assert [(error["code"], error["name"]) for error in told["errors"]] == [("two_ways", "salinity")]
    assert "ignore=salinity" in told["detail"]
    assert flags(ask(client, table(), "&salinity=35&ignore=salinity")) == ["1", "1"]


def test_a_list_beside_a_table_is_refused_by_its_name(client: FlaskClient) -> None:
    names = [name for name in PER_SAMPLE if name != "salinity"]
    content = table([[row[0], *row[2:]] for row in ROWS], names)

    assert faults(ask(client, content, "&salinity=35;34")) == [("length", "salinity")]
    assert flags(ask(client, content, "&salinity=35")) == ["1", "1"]


def test_a_table_without_a_needed_column_is_refused(client: FlaskClient) -> None:
    content = table([[row[0], *row[2:]] for row in ROWS], [name for name in PER_SAMPLE if name != "salinity"])

    assert faults(ask(client, content)) == [("missing_input", "salinity")]


ONCE = ["gas=@gas", "water=@water", "parameterisation=@method", "strict=@strict"]


@pytest.mark.parametrize("parameter", ONCE)
def test_an_option_is_never_a_column(client: FlaskClient, parameter: str) -> None:
    header = parameter.partition("@")[2]
    content = table([[*row, "x"] for row in ROWS], [*PER_SAMPLE, header])
    query = f"&{parameter}" if not parameter.startswith("gas") else ""
    answer = client.post(f"/v1/flux?{parameter if not query else 'gas=co2' + query}", data=content)

    assert problem(answer)["errors"][0]["name"] == parameter.partition("=")[0]


def test_a_column_named_like_what_stands_once_passes_untouched(client: FlaskClient) -> None:
    inputs = {name: value for name, value in QUESTIONS["equilibration"].items() if name != "gas"}
    content = table([[*inputs.values(), "0.5"]], [*inputs, "fraction"])
    (row,) = rows(client.post("/v1/equilibration?gas=o2", data=content))
    pointed = client.post("/v1/equilibration?gas=o2&fraction=@fraction", data=content)

    assert row["fraction"] == "0.5"
    assert float(row["time_to_fraction [d]"]) == number(
        client.get(address("equilibration", QUESTIONS["equilibration"], fraction=0.95)), "time_to_fraction"
    )
    assert problem(pointed)["errors"][0]["name"] == "fraction"


# Parts of the vocabulary that change numbers: a column of theirs is read, or refused until it is.
CHANGES_NUMBERS = ["u_wind_speed", "alkalinity", "equilibrator_temperature", "headspace_ratio", "water_saturation"]


@pytest.mark.parametrize("header", CHANGES_NUMBERS)
def test_a_column_that_would_change_numbers_is_never_ignored_unasked(client: FlaskClient, header: str) -> None:
    content = table([[*row, "1"] for row in ROWS], [*PER_SAMPLE, header])
    answer = ask(client, content)

    if header not in request_fields(QUANTITIES["flux"]):
        assert faults(answer) == [("unknown_name", header)]
    assert flags(ask(client, content, f"&ignore={header}")) == ["1", "1"]


# Bodies that are no table, with status and a word of the answer.
NO_TABLES = [
    (b"water_temperature,salinity\n", 422, "no data row"),
    (b"water_temperature,salinity18.4,35.118.6,35.0", 422, "--data-binary"),
    (table().decode().encode("utf-16"), 400, "UTF-8"),
    (table(names=renamed(wind_height="höhe")).decode().encode("latin-1"), 400, "UTF-8"),
    (table().replace(b"\n", b"\r"), 400, "carriage return"),
    (b'"water_temperature,salinity\n18.4,35\n', 400, "quote"),
    (table(names=renamed(salinity="x" * 101)), 422, "100 characters"),
    (table([["1"] * 1200], [f"c{i}" for i in range(1200)]), 422, "columns"),
]


@pytest.mark.parametrize(("content", "status", "word"), NO_TABLES, ids=lambda each: str(each)[:30])
def test_what_is_no_table_is_refused_with_the_reason(
    client: FlaskClient, content: bytes, status: int, word: str
) -> None:
    told = problem(ask(client, content), status)

    assert word in told["detail"]


def test_a_cell_over_the_limit_spoils_its_row_alone(client: FlaskClient) -> None:
    answer = ask(client, table(replaced("wind_speed", "7" * 1001)))

    assert flags(answer) == ["1", "4"]
    assert "1000 characters" in rows(answer)[1]["quality_reason"]


def test_the_inputs_of_these_tables_are_those_of_the_single_question(client: FlaskClient) -> None:
    assert fluxes(ask(client, table()))[0] == number(client.get(flux()), "flux")
    assert [FLUX[name] for name in PER_SAMPLE] == ROWS[0]
