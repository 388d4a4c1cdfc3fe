"""Tables: cells that are no numbers, and what is written behind each line."""

import pytest
from flask.testing import FlaskClient

from tests.api.questions import (
    PER_SAMPLE,
    ROWS,
    body,
    flux,
    problem,
    quality,
    rows,
    table,
    values,
)
from tests.api.tables import ADDED, COLUMN, ask, flags, fluxes, replaced


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
