"""Tables: which columns are read, what passes through untouched, and what stands behind each line."""

from typing import Any

import pytest
from flask.testing import FlaskClient
from werkzeug.test import TestResponse

from schemas.vocabulary import request_fields
from service.physics.declare import QUANTITIES
from tests.api.questions import (
    FLUX,
    PER_SAMPLE,
    ROWS,
    body,
    faults,
    flux,
    number,
    problem,
    quality,
    rows,
    table,
    values,
)

ADDED = [
    "flux [mmol m-2 d-1]",
    "evasion [mmol m-2 d-1]",
    "invasion [mmol m-2 d-1]",
    "transfer_velocity [cm h-1]",
    "schmidt_number [1]",
    "wind_speed_10m [m s-1]",
    "solubility [mol L-1 atm-1]",
    "fugacity_in_water [uatm]",
    "fugacity_in_air [uatm]",
    "fugacity_difference [uatm]",
    "quality_flag",
    "quality_reason",
]
COLUMN = "flux [mmol m-2 d-1]"


def ask(client: FlaskClient, content: bytes, query: str = "") -> TestResponse:
    return client.post(f"/v1/flux?gas=co2{query}", data=content)


def fluxes(answer: TestResponse, delimiter: str = ",") -> list[float | None]:
    return [float(row[COLUMN]) if row[COLUMN] else None for row in rows(answer, delimiter)]


def flags(answer: TestResponse, delimiter: str = ",") -> list[str]:
    return [row["quality_flag"] for row in rows(answer, delimiter)]


def renamed(**names: str) -> list[str]:
    return [names.get(name, name) for name in PER_SAMPLE]


def replaced(name: str, value: Any) -> list[list[Any]]:
    """Return the rows with another value in the second one."""
    second = [value if each == name else cell for each, cell in zip(PER_SAMPLE, ROWS[1], strict=True)]
    return [ROWS[0], second]


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


# Parts of the vocabulary that change numbers: a column of theirs is read, or refused until it is.
CHANGES_NUMBERS = ["u_wind_speed", "alkalinity", "equilibrator_temperature", "headspace_ratio", "water_saturation"]


@pytest.mark.parametrize("header", CHANGES_NUMBERS)
def test_a_column_that_would_change_numbers_is_never_ignored_unasked(client: FlaskClient, header: str) -> None:
    content = table([[*row, "1"] for row in ROWS], [*PER_SAMPLE, header])
    answer = ask(client, content)

    if header not in request_fields(QUANTITIES["flux"]):
        assert faults(answer) == [("unknown_name", header)]
    assert flags(ask(client, content, f"&ignore={header}")) == ["1", "1"]


def test_a_file_with_decimal_commas_is_read_where_they_are_announced(client: FlaskClient) -> None:
    commas = [[str(cell).replace(".", ",") for cell in row] for row in ROWS]
    semicolons = ask(client, table(commas, delimiter=";"), "&decimal=comma")
    quoted = ask(client, table([[f'"{cell}"' for cell in row] for row in commas]), "&decimal=comma")

    assert fluxes(semicolons, ";") == fluxes(quoted) == fluxes(ask(client, table()))


def test_a_file_with_decimal_commas_is_refused_where_they_are_not(client: FlaskClient) -> None:
    commas = [[str(cell).replace(".", ",") for cell in row] for row in ROWS]
    told = problem(ask(client, table(commas, delimiter=";")))

    assert told["errors"][0]["line"] == 2
    assert "decimal=comma" in told["detail"]


GAPS = ["", "NA", "NaN", "nan", "null", '""', "  "]


@pytest.mark.parametrize("gap", GAPS)
def test_a_gap_is_a_missing_sample_and_never_a_default(client: FlaskClient, gap: str) -> None:
    answer = ask(client, table(replaced("air_pressure", gap)))

    assert flags(answer) == ["1", "9"]
    assert fluxes(answer)[1] is None
    assert rows(answer)[1]["quality_reason"] == "air_pressure is missing"
    assert "air_pressure" not in answer.headers["Catspaw-Assumed"]


BAD_CELLS = ["calm", "1_0", "0x10", "inf", "1e400", "12:30", "7.5 m", "٧", "-"]


@pytest.mark.parametrize("cell", BAD_CELLS)
def test_a_cell_that_is_no_number_spoils_its_row_alone_and_is_quoted(client: FlaskClient, cell: str) -> None:
    answer = ask(client, table(replaced("wind_speed", cell)))

    assert flags(answer) == ["1", "4"]
    assert cell in rows(answer)[1]["quality_reason"]
    assert "wind_speed" in rows(answer)[1]["quality_reason"]
    assert fluxes(answer) == [fluxes(ask(client, table()))[0], None]


def test_a_column_that_cannot_be_read_at_all_is_refused(client: FlaskClient) -> None:
    told = problem(ask(client, table([[*row[:3], "calm", *row[4:]] for row in ROWS])))

    assert (told["errors"][0]["code"], told["errors"][0]["name"]) == ("not_a_number", "wind_speed")
    assert told["errors"][0]["line"] == 2
    assert "'calm'" in told["detail"]


def test_rows_with_too_few_or_too_many_cells_keep_their_place(client: FlaskClient) -> None:
    lines = table([ROWS[0], ROWS[0], ROWS[0], ROWS[1]]).decode().split("\n")
    lines[2], lines[3] = lines[2].rpartition(",")[0], lines[3] + ",9"
    answer = ask(client, "\n".join(lines).encode())
    whole = fluxes(ask(client, table()))

    assert [row[COLUMN] for row in rows(answer)] == [str(whole[0]), "", "", str(whole[1])]
    assert flags(answer) == ["1", "4", "4", "1"]


def test_columns_that_the_picked_results_do_not_need_are_not_judged(client: FlaskClient) -> None:
    answer = ask(client, table(replaced("wind_speed", "calm")), "&pick=schmidt_number")

    assert flags(answer) == ["1", "1"]


def test_missing_results_can_be_written_as_nan(client: FlaskClient) -> None:
    content = table(replaced("wind_speed", ""))

    assert rows(ask(client, content))[1][COLUMN] == ""
    assert {rows(ask(client, content, "&missing=NaN"))[1][name] for name in ADDED[:-2]} == {"NaN"}
    assert rows(ask(client, content, "&missing=NaN"))[1]["wind_speed"] == ""


def test_headers_can_be_plain(client: FlaskClient) -> None:
    header = ask(client, table(), "&headers=plain").text.split("\n")[0]

    assert header == ",".join([*PER_SAMPLE, *(name.partition(" [")[0] for name in ADDED)])


def test_a_chosen_unit_stands_in_the_header_with_what_a_mass_is_of(client: FlaskClient) -> None:
    header = ask(client, table(), "&pick=flux&unit=g/m2/yr&mass_as=element").text.split("\n")[0]

    assert header.split(",")[len(PER_SAMPLE) :] == ["flux [g m-2 yr-1 as C]", "quality_flag", "quality_reason"]


def test_several_parameterisations_have_a_column_each_behind_mean_and_spread(client: FlaskClient) -> None:
    answer = ask(client, table(), "&pick=flux&parameterisation=ho-2006;wanninkhof-2014")
    first = rows(answer)[0]
    single = {name: rows(ask(client, table(), f"&parameterisation={name}"))[0][COLUMN] for name in ("ho-2006",)}

    assert list(first)[len(PER_SAMPLE) :] == [
        COLUMN,
        "flux_spread [mmol m-2 d-1]",
        "flux.ho-2006 [mmol m-2 d-1]",
        "flux.wanninkhof-2014 [mmol m-2 d-1]",
        "quality_flag",
        "quality_reason",
    ]
    assert first["flux.ho-2006 [mmol m-2 d-1]"] == single["ho-2006"]
    mean = (float(first["flux.ho-2006 [mmol m-2 d-1]"]) + float(first["flux.wanninkhof-2014 [mmol m-2 d-1]"])) / 2
    assert float(first[COLUMN]) == pytest.approx(mean, rel=1e-14)


def test_a_table_may_be_answered_with_json_or_numbers(client: FlaskClient) -> None:
    content = table(replaced("wind_speed", "calm"))
    as_json, as_numbers = ask(client, content, "&form=json"), ask(client, content, "&form=number")
    first = fluxes(ask(client, content))[0]

    assert values(as_json, "flux") == [first, None]
    assert quality(as_json)[1][0] == 4
    assert [float(line) for line in as_numbers.text.split("\n")[:1]] == [first]
    assert as_numbers.text.split("\n")[1:] == ["NaN"]


def test_a_query_and_json_may_be_answered_with_a_table(client: FlaskClient) -> None:
    by_query = client.get(flux(wind_speed="7;8", form="csv"))
    by_json = client.post("/v1/flux?form=csv", data=body(wind_speed=[7, 8]))

    assert by_query.data == by_json.data
    assert [row["wind_speed [m s-1]"] for row in rows(by_query)] == ["7.0", "8.0"]
    assert fluxes(by_query) == values(client.get(flux(wind_speed="7;8")), "flux")


def test_accept_changes_the_form_only_where_it_excludes_the_own_one(client: FlaskClient) -> None:
    def kind(accept: str) -> str | None:
        return client.post("/v1/flux?gas=co2", data=table(), headers={"Accept": accept}).mimetype

    assert kind("*/*") == "text/csv"
    assert kind("application/json, text/xml, application/xml, */*") == "text/csv"
    assert kind("application/json") == "application/json"
    assert kind("image/png") == "text/csv"
    assert client.get(flux(form="csv"), headers={"Accept": "application/json"}).mimetype == "text/csv"


def test_tables_longer_than_a_block_are_answered_line_by_line(client: FlaskClient) -> None:
    count = 40_000
    content = table([[*ROWS[i % 2][:3], f"{5 + i % 1000 / 100}", *ROWS[i % 2][4:]] for i in range(count)])
    content = content.replace(b"\n12.0,34.0,990.5,5.01,", b"\n12.0,34.0,990.5,calm,")
    answer = ask(client, content, "&pick=flux")
    found = rows(answer)

    assert len(found) == count
    assert [row["quality_flag"] for row in found] == ["4" if i % 1000 == 1 else "1" for i in range(count)]
    assert found[2][COLUMN] == found[38_002][COLUMN]


def test_strict_refuses_a_table_for_its_bad_rows_by_line_and_counts_them(client: FlaskClient) -> None:
    bad = replaced("wind_speed", "NA")[1]
    content = table([ROWS[0]] * 20_000 + [bad] * 30 + [ROWS[0]])
    told = problem(ask(client, content, "&strict=1"))

    assert told["detail"].startswith("30 of 20031 samples have no result")
    assert [(error["sample"], error["line"]) for error in told["errors"]] == [
        (20_001 + i, 20_002 + i) for i in range(20)
    ]
    assert told["more"] == 10
    assert problem(ask(client, content, "&strict=1&form=json"))["errors"] == told["errors"]
    assert ask(client, table(), "&strict=1").data == ask(client, table()).data


def test_an_old_client_gets_the_whole_answer_at_once(client: FlaskClient) -> None:
    whole = client.post("/v1/flux?gas=co2", data=table(), environ_overrides={"SERVER_PROTOCOL": "HTTP/1.0"})

    assert whole.content_length == len(whole.data)
    assert whole.data == ask(client, table()).data


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
