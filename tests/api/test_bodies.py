"""Bodies are read as bytes and recognised by their content, whatever their type is said to be."""

import io
import json
from typing import Any
from urllib.parse import quote

import pytest
import requests
from flask.testing import FlaskClient

from tests.api.questions import FLUX, ROWS, body, faults, flux, number, problem, quality, rows, table, values

TYPES = [
    None,
    "",
    "application/json",
    "application/json; charset=utf-8",
    "application/x-www-form-urlencoded",
    "text/plain;charset=utf-8",
    "text/csv",
    "application/octet-stream",
    "multipart/form-data",
    "multipart/form-data; boundary=x",
    "application/vnd.ms-excel",
    "nonsense",
]
TEXTS = {name: str(value) for name, value in FLUX.items()}


@pytest.mark.parametrize("kind", TYPES)
def test_json_is_known_by_its_brace(client: FlaskClient, kind: str | None) -> None:
    answer = client.post("/v1/flux", data=body(), content_type=kind)

    assert answer.mimetype == "application/json"
    assert number(answer, "flux") == number(client.get(flux()), "flux")


@pytest.mark.parametrize("kind", TYPES)
def test_a_table_is_known_by_its_lines(client: FlaskClient, kind: str | None) -> None:
    answer = client.post("/v1/flux?gas=co2", data=table(), content_type=kind)

    assert answer.mimetype == "text/csv"
    assert len(rows(answer)) == len(ROWS)


@pytest.mark.parametrize("kind", TYPES)
def test_a_form_is_known_by_its_first_name(client: FlaskClient, kind: str | None) -> None:
    content = "&".join(f"{name}={quote(value)}" for name, value in TEXTS.items())

    for text in (content, content + "\n", content + "\r\n"):
        assert client.post("/v1/flux", data=text, content_type=kind).data == client.get(flux()).data


BLANKS = [b"\xef\xbb\xbf", b"\n\n", b"  \t", b"\r\n"]


@pytest.mark.parametrize("before", BLANKS)
def test_blanks_and_a_byte_order_mark_before_json_do_no_harm(client: FlaskClient, before: bytes) -> None:
    assert client.post("/v1/flux", data=before + body() + b"\n").data == client.get(flux()).data


# Ways of sending the same JSON or table inside a form, by field or by file.
JSON_FIELDS: list[dict[str, Any]] = [{"json": body().decode()}, {"json": (io.BytesIO, body(), "in.json")}]
JSON_FIELDS += [{"file": (io.BytesIO, body(), "in.json")}, {"upload": (io.BytesIO, b"\n" + body(), "x")}]
TABLE_FIELDS: list[dict[str, Any]] = [{"csv": table().decode()}, {"csv": (io.BytesIO, table(), "in.csv")}]
TABLE_FIELDS += [{"file": (io.BytesIO, table(), "in.csv")}, {"upload": (io.BytesIO, table(), "x")}]


def opened(fields: dict[str, Any]) -> dict[str, Any]:
    """Return the fields with their files opened."""
    return {name: (each[0](each[1]), each[2]) if isinstance(each, tuple) else each for name, each in fields.items()}


@pytest.mark.parametrize("fields", JSON_FIELDS, ids=lambda each: str(each)[:24])
def test_json_may_stand_in_a_field_or_file(client: FlaskClient, fields: dict[str, Any]) -> None:
    answer = client.post("/v1/flux", data=opened(fields))

    assert answer.data == client.get(flux()).data


@pytest.mark.parametrize("fields", TABLE_FIELDS, ids=lambda each: str(each)[:24])
def test_a_table_may_stand_in_a_field_or_file_with_parameters_beside_it(
    client: FlaskClient, fields: dict[str, Any]
) -> None:
    expected = client.post("/v1/flux?gas=co2&pick=flux", data=table())

    assert client.post("/v1/flux", data=opened({**fields, "gas": "co2", "pick": "flux"})).data == expected.data
    assert client.post("/v1/flux?gas=co2&pick=flux", data=opened(fields)).data == expected.data


def test_parameters_may_be_the_fields_themselves(client: FlaskClient) -> None:
    plain = client.post("/v1/flux", data=TEXTS)
    parts = client.post("/v1/flux", data=TEXTS, content_type="multipart/form-data")

    assert plain.data == parts.data == client.get(flux()).data


def test_lists_may_be_fields(client: FlaskClient) -> None:
    answer = client.post("/v1/flux", data={**TEXTS, "wind_speed": "7;8;"})

    assert values(answer, "flux") == values(client.get(flux(wind_speed="7;8")), "flux")


def test_json_fields_stand_beside_parameters(client: FlaskClient) -> None:
    rest = json.dumps({name: value for name, value in FLUX.items() if name != "gas"})

    assert client.post("/v1/flux", data={"gas": "co2", "json": rest}).data == client.get(flux()).data
    assert faults(client.post("/v1/flux", data={"gas": "co2", "json": body().decode()})) == [("repeated_name", "gas")]


def test_two_bodies_in_one_form_are_refused(client: FlaskClient) -> None:
    two_files = [("file", (io.BytesIO(table()), "a.csv")), ("other", (io.BytesIO(table()), "b.csv"))]

    assert faults(client.post("/v1/flux", data={"csv": table().decode(), "json": "{}"}))[0][0] == "two_ways"
    assert faults(client.post("/v1/flux", data=dict(two_files)))[0][0] == "repeated_name"


def test_a_plain_field_may_be_as_long_as_a_body(client: FlaskClient) -> None:
    content = table(ROWS * 12_000)
    sent = requests.Request("POST", "http://x", files={"gas": (None, "co2"), "csv": (None, content)}).prepare()
    answer = client.post("/v1/flux?pick=flux", data=sent.body, content_type=sent.headers["Content-Type"])

    assert len(content) > 600_000  # of which a careless reader would take half a million
    assert answer.data == client.post("/v1/flux?gas=co2&pick=flux", data=content).data


def test_an_empty_body_leaves_the_question_to_the_query(client: FlaskClient) -> None:
    assert client.post(flux()).data == client.get(flux()).data
    assert client.post(flux(), data=b" \n").data == client.get(flux()).data


def test_an_empty_question_is_refused_with_what_may_be_the_cause(client: FlaskClient) -> None:
    told = problem(client.post("/v1/flux"), 400)

    assert told["errors"][0]["code"] == "empty"
    assert "Content-Length" in told["detail"]
    assert problem(client.post("/v1/flux?form=csv"), 400)["errors"][0]["code"] == "empty"


@pytest.mark.parametrize("content", [body(), table()], ids=["json", "table"])
def test_a_body_cut_short_is_refused(client: FlaskClient, content: bytes) -> None:
    told = problem(
        client.post(
            "/v1/flux?errors=problem", data=content, environ_overrides={"CONTENT_LENGTH": str(len(content) + 1)}
        ),
        400,
    )

    assert told["errors"][0]["code"] == "cut_short"
    assert str(len(content) + 1) in told["detail"]


# JSON that cannot be read, and a word of the answer.
BROKEN = [
    (b'{"gas": "co2"', "not JSON"),
    (b"{gas: co2}", "not JSON"),
    (b"{'gas': 'co2'}", "not JSON"),
    (b'{"gas": "co2",}', "not JSON"),
    (b'{"wind_speed": Infinity}', "null"),
    (b'{"wind_speed": -Infinity}', "null"),
    (b'{"wind_speed": NaN, "salinity": Infinity}', "null"),
    (b'{"wind_speed": 1e999}', "not JSON"),
    (b'{"wind_speed": 01}', "not JSON"),
    (b'{"wind_speed": +1}', "not JSON"),
    (b'{"wind_speed": 1_0}', "not JSON"),
    (b'{"gas": "\xff"}', "not JSON"),
    (b'{"gas": "\\ud800"}', "not JSON"),
    (b'{"gas": "co2"} x', "not JSON"),
    (b"[" * 100_000, "not JSON"),
    (b'{"a":' * 1000 + b"1" + b"}" * 1000, "too deep"),
    (b'{"a":' * 100_000, "not JSON"),
]


@pytest.mark.parametrize(("content", "word"), BROKEN, ids=lambda each: str(each)[:30])
def test_json_that_cannot_be_read_is_refused(client: FlaskClient, content: bytes, word: str) -> None:
    told = problem(client.post("/v1/flux", data=content), 400)

    assert told["errors"][0]["code"] == "unreadable"
    assert word in told["detail"]


NO_OBJECTS = [b"[]", b"[1, 2]", b"[null]", b'[{"gas": "co2", "salinity": 35}, {"gas": "co2", "salinity": 34}]']


@pytest.mark.parametrize("content", NO_OBJECTS)
def test_an_array_is_refused_with_the_column_form_as_example(client: FlaskClient, content: bytes) -> None:
    told = problem(client.post("/v1/flux", data=content))
    example = json.loads(told["errors"][0]["allowed"])

    assert "an array" in told["detail"]
    assert isinstance(example["water_temperature"], list)
    assert client.post("/v1/schmidt-number", json=example).status_code == 200


SCALARS = [b"12", b'"gas"', b"true", b"null"]


@pytest.mark.parametrize("content", SCALARS)
def test_json_that_is_no_object_is_refused(client: FlaskClient, content: bytes) -> None:
    told = problem(client.post("/v1/flux", data=content, content_type="application/json"))

    assert told["errors"][0]["code"] == "unreadable"


def test_a_bare_nan_is_a_missing_mark_in_json(client: FlaskClient) -> None:
    answer = client.post("/v1/flux", data=body(wind_speed=[7.0, float("nan")], air_pressure=float("nan")))

    assert b"NaN" in body(air_pressure=float("nan"))
    assert quality(answer) == [
        (9, ["air_pressure is missing"]),
        (9, ["air_pressure is missing", "wind_speed is missing"]),
    ]


REPEATED = [
    b'{"gas": "co2", "gas": "o2"}',
    b'{"gas": "co2", "wind_speed": 7, "wind_speed": 7}',
    b'{"gas": "co2", "wind_speed": {"values": [7], "values": [8]}}',
    b'{"gas": "co2", "wind_speed": {"values": [7], "unit": "kn", "unit": "kn"}}',
    b'{"gas": "co2", "g\\u0061s": "o2"}',
    b'{"gas": "co2", "pick": ["a", "b"], "gas": "o2"}',
    b'{"gas": "co2", "wind_speed": NaN, "wind_speed": 7}',
]


@pytest.mark.parametrize("content", REPEATED)
def test_a_name_that_stands_twice_is_refused(client: FlaskClient, content: bytes) -> None:
    assert faults(client.post("/v1/flux", data=content))[0][0] == "repeated_name"


def test_strings_with_quotes_and_backslashes_are_no_repeated_names(client: FlaskClient) -> None:
    told = problem(client.post("/v1/flux", data=body(unit='a "quoted" \\ unit')))

    assert told["errors"][0]["code"] == "unit"


def test_a_table_without_its_line_ends_is_answered_with_the_option_that_keeps_them(client: FlaskClient) -> None:
    glued = table().replace(b"\n", b"")  # as curl -d sends a file
    told = problem(client.post("/v1/flux?gas=co2", data=glued, content_type="application/x-www-form-urlencoded"))

    assert "--data-binary" in told["detail"]


def test_multipart_without_its_boundary_is_answered_with_that(client: FlaskClient) -> None:
    content = b'--x\r\nContent-Disposition: form-data; name="gas"\r\n\r\nco2\r\n--x--\r\n'

    for kind in ("multipart/form-data", "text/plain", None):
        told = problem(client.post("/v1/flux", data=content, content_type=kind), 400)

        assert "boundary" in told["detail"]


def test_text_in_a_form_that_is_not_utf_8_is_refused(client: FlaskClient) -> None:
    told = problem(
        client.post("/v1/flux", data=b"gas=co2&unit=\xb0C", content_type="application/x-www-form-urlencoded"), 400
    )

    assert "UTF-8" in told["detail"]


def test_a_field_of_a_form_that_is_no_parameter_is_refused(client: FlaskClient) -> None:
    assert faults(client.post("/v1/flux", data={**TEXTS, "csvv": "x"})) == [("unknown_name", "csvv")]
