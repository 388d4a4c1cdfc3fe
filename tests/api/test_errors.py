"""Problem documents: every status, every field, and bounds on all of them."""

import base64
import json
from typing import Any

import pytest
from flask.testing import FlaskClient
from hypothesis import given, settings
from hypothesis import strategies as st

from schemas.vocabulary import request_fields
from service.app import create_app
from service.config import Config
from service.physics.declare import QUANTITIES
from service.physics.faults import CODES
from tests.api.questions import FLUX, QUESTIONS, address, body, faults, flux, problem, table

BOUND = 64 * 1024

# Method, address, body, headers, status and the code of the first error.
PROBLEMS: list[tuple[str, str, bytes, dict[str, str], int, str]] = [
    ("POST", "/v1/flux", b"", {}, 400, "empty"),
    ("POST", "/v1/flux", b"  \n", {}, 400, "empty"),
    ("POST", "/v1/flux", b'{"gas":', {}, 400, "unreadable"),
    ("POST", "/v1/flux?gas=co2", b"a,\xff\n1,2\n", {}, 400, "unreadable"),
    ("GET", "/v1/fluxes", b"", {}, 404, "not_found"),
    ("GET", "/v1/gases/unobtainium", b"", {}, 404, "not_found"),
    ("GET", "/v1/parameterisations/nobody-1900", b"", {}, 404, "not_found"),
    ("GET", "/v1//flux", b"", {}, 404, "not_found"),
    ("PUT", "/v1/flux", b"", {}, 405, "method"),
    ("DELETE", "/v1/flux", b"", {}, 405, "method"),
    ("TRACE", "/v1/flux", b"", {}, 405, "method"),
    ("POST", "/v1/gases", b"", {}, 405, "method"),
    ("GET", "/v1/flux?gas=co2&salinity=" + "1;" * 5000, b"", {}, 414, "too_large"),
    ("POST", "/v1/flux", b"\x1b", {"Content-Encoding": "br"}, 415, "media_type"),
    ("POST", "/v1/flux", b"\x1f\x8b", {"Content-Encoding": "gzip"}, 400, "cut_short"),
    ("GET", "/v1/flux", b"", {}, 422, "missing_input"),
    ("POST", "/v1/flux", b"[]", {}, 422, "unreadable"),
]


def ask(client: FlaskClient, method: str, path: str, content: bytes, headers: dict[str, str], more: str = "") -> Any:
    path += ("&" if "?" in path else "?") + more if more else ""
    return client.open(path, method=method, data=content, headers=headers)


@pytest.mark.parametrize(
    ("method", "path", "content", "headers", "status", "code"), PROBLEMS, ids=lambda x: str(x)[:24]
)
def test_every_fault_is_a_problem_document(
    client: FlaskClient, method: str, path: str, content: bytes, headers: dict[str, str], status: int, code: str
) -> None:
    answer = ask(client, method, path, content, headers)
    told = problem(answer, status)

    assert told["type"].startswith("/reference#")
    assert told["title"]
    assert told["status"] == status
    assert len(told["detail"]) > 10
    assert told["instance"] == answer.headers["X-Request-ID"]
    assert told["errors"][0]["code"] == code
    assert told["errors"][0]["name"]
    assert told["errors"][0]["reason"]


@pytest.mark.parametrize(
    ("method", "path", "content", "headers"), [each[:4] for each in PROBLEMS], ids=lambda x: str(x)[:24]
)
def test_every_fault_can_be_one_line_of_text_with_status_200(
    client: FlaskClient, method: str, path: str, content: bytes, headers: dict[str, str]
) -> None:
    answer = ask(client, method, path, content, headers, "errors=text")

    assert answer.status_code == 200
    assert answer.mimetype == "text/plain"
    assert answer.text.startswith("ERROR ")
    assert ": " in answer.text
    assert "\n" not in answer.text


def test_a_query_that_is_not_utf_8_is_refused_in_the_way_asked_for(client: FlaskClient) -> None:
    told = client.get("/v1/flux", environ_overrides={"QUERY_STRING": "unit=\xb0C"})
    line = client.get("/v1/flux", environ_overrides={"QUERY_STRING": "unit=\xb0C&errors=text"})

    assert "%C2%B0" in problem(told, 400)["detail"]
    assert line.text.startswith("ERROR query: ")


def test_bodies_over_the_limit_are_refused_with_the_limit(small: FlaskClient) -> None:
    for content, limit in ((b'{"gas": "co2"' + b" " * 2500 + b"}", 2000), (table() * 100, 4000)):
        told = problem(small.post("/v1/flux", data=content), 413)

        assert told["errors"][0]["code"] == "too_large"
        assert told["errors"][0]["allowed"] == f"{limit} bytes"
        assert str(limit) in told["detail"]


def test_a_form_has_the_limit_of_json_and_its_table_that_of_tables(small: FlaskClient) -> None:
    rest = {name: str(value) for name, value in FLUX.items() if name != "salinity"}
    form = small.post("/v1/flux", data={**rest, "salinity": "35;" * 800})
    inside = small.post("/v1/flux", data={"gas": "co2", "csv": table([[18.4, 35.1, 1008.2, 7.5, 18.0, 380, 419]] * 70)})

    assert problem(form, 413)["errors"][0]["allowed"] == "2000 bytes"
    assert inside.status_code == 200


def test_too_many_samples_are_refused_with_the_cure(client: FlaskClient) -> None:
    told = problem(client.post("/v1/flux", data=body(wind_speed=[7] * 100_001)))

    assert told["errors"][0]["code"] == "too_large"
    assert "CSV" in told["detail"]


def test_too_many_fields_in_a_form_are_refused(client: FlaskClient) -> None:
    fields = {f"a{i}": "1" for i in range(2000)}

    assert faults(client.post("/v1/flux", data=fields), 413) == [("too_large", "body")]
    assert faults(client.post("/v1/flux", data=fields, content_type="multipart/form-data"), 413) == [
        ("too_large", "body")
    ]


ALLOW = [
    ("PUT", "/v1/flux", "GET, HEAD, OPTIONS, POST"),
    ("POST", "/v1/gases", "GET, HEAD, OPTIONS"),
    ("POST", "/v1", "GET, HEAD, OPTIONS"),
    ("PATCH", "/healthz", "GET, HEAD, OPTIONS"),
]


@pytest.mark.parametrize(("method", "path", "allow"), ALLOW)
def test_a_method_that_is_not_taken_is_answered_with_those_that_are(
    client: FlaskClient, method: str, path: str, allow: str
) -> None:
    answer = client.open(path, method=method)

    assert answer.status_code == 405
    assert answer.headers["Allow"] == allow
    assert client.open(f"{path}?errors=text", method=method).headers["Allow"] == allow


def test_an_encoding_that_is_not_read_is_answered_with_the_one_that_is(client: FlaskClient) -> None:
    answer = client.post("/v1/flux", data=b"\x1b", headers={"Content-Encoding": "br"})

    assert answer.status_code == 415
    assert answer.headers["Accept-Encoding"] == "gzip, identity"
    assert client.post("/v1/flux", data=body(), headers={"Content-Encoding": "identity"}).status_code == 200


def test_the_line_of_text_names_what_is_allowed(client: FlaskClient) -> None:
    assert client.get(flux(wind_speed="calm") + "&errors=text").text == (
        "ERROR wind_speed: 'calm' is not a number (allowed: a number in m s-1)"
    )
    assert "cole-caraco-1998" in client.get(flux(water="lake", air_pressure="990") + "&errors=text").text
    assert client.get("/v1/flux?errors=text").text.startswith("ERROR gas: is needed (allowed: ")


def test_good_answers_do_not_mind_how_errors_are_wanted(client: FlaskClient) -> None:
    assert client.get(flux() + "&errors=text").data == client.get(flux()).data
    assert client.get(flux() + "&errors=problem").data == client.get(flux()).data
    assert faults(client.get(flux() + "&errors=html")) == [("unknown_option", "errors")]


# What floods an error document: a body, and how many errors it holds.
FLOODS: list[tuple[bytes, int]] = [
    (body(wind_speed=["calm"] * 100_000), 100_000),
    (json.dumps({f"name {i}": i for i in range(5_000)}).encode(), 5_000),
    (json.dumps({"\x01" * 99 + str(i): "x" for i in range(300)}).encode(), 300),
    (json.dumps({"\U0001f30a" * 99 + str(i): "x" for i in range(300)}, ensure_ascii=False).encode(), 300),
    (json.dumps({"n" * 1_000_000: 1}).encode(), 1),
    (json.dumps({**FLUX, "wind_speed": "x" * 1_000_000}).encode(), 1),
    (json.dumps({**FLUX, "gas": "x" * 1_000_000}).encode(), 1),
    (json.dumps({**FLUX, "pick": ["x" * 1_000 + str(i) for i in range(500)]}).encode(), 500),
    (json.dumps({**FLUX, "unit": "x" * 1_000_000}).encode(), 1),
]


@pytest.mark.parametrize(("content", "count"), FLOODS, ids=lambda each: str(each)[:30])
def test_an_error_document_is_short_whatever_was_sent(client: FlaskClient, content: bytes, count: int) -> None:
    answer = client.post("/v1/flux", data=content)
    told = problem(answer)

    assert len(answer.data) <= BOUND
    assert len(told["errors"]) <= 20
    assert len(told["errors"]) + told.get("more", 0) == count
    assert all(len(error["name"]) <= 1000 for error in told["errors"])


def test_a_table_floods_no_error_document_either(client: FlaskClient) -> None:
    wide = table([["1"] * 900], ["\U000e0001" * 60 + str(i) for i in range(900)])  # each sign is shown as ten
    answer = client.post("/v1/flux?gas=co2&ignore=" + ";".join(f"w{i}" for i in range(900)), data=wide)
    told = problem(answer)

    assert len(answer.data) <= BOUND
    assert 0 < len(told["errors"]) < 20
    assert len(told["errors"]) + told["more"] == 900


def test_control_characters_are_shown_not_sent(client: FlaskClient) -> None:
    answer = client.post("/v1/flux", data=json.dumps({"bell\x07\x1b[2J\n": 1}))
    line = client.post("/v1/flux?errors=text", data=json.dumps({"bell\x07\x1b[2J\n": 1}))

    assert problem(answer)["errors"][0]["name"] == "bell\\x07\\x1b[2J\\n"
    assert line.text.isprintable()


def test_the_codes_of_errors_are_a_closed_list(client: FlaskClient) -> None:
    seen = set()
    for method, path, content, headers, *_ in PROBLEMS:
        seen |= {error["code"] for error in ask(client, method, path, content, headers).get_json()["errors"]}

    assert len(seen) > 6
    assert seen <= set(CODES)


@pytest.mark.parametrize("quantity", QUESTIONS)
@pytest.mark.parametrize("name", ["form", "errors", "nocache"])
def test_what_is_read_from_the_address_alone_is_refused_in_a_body_with_the_cure(
    client: FlaskClient, quantity: str, name: str
) -> None:
    inputs = {**QUESTIONS[quantity], name: "csv"}
    texts = {each: str(value) for each, value in inputs.items()}
    for content in (json.dumps(inputs), texts, {"json": json.dumps(inputs)}):
        told = problem(client.post(f"/v1/{quantity}", data=content))

        assert [(error["code"], error["name"]) for error in told["errors"]] == [("unknown_name", name)]
        assert "behind the ?" in told["detail"]


def test_the_spare_name_is_ignored_in_an_address(client: FlaskClient) -> None:
    assert client.get(flux() + "&nocache=1&nocache=2").data == client.get(flux()).data


# Words of the vocabulary that the flux does not take.
OTHERS = {name for quantity in QUANTITIES.values() for name in request_fields(quantity)}
OTHERS -= set(request_fields(QUANTITIES["flux"]))


@pytest.mark.parametrize("name", sorted(OTHERS))
def test_a_word_of_another_quantity_is_refused_never_ignored(client: FlaskClient, name: str) -> None:
    assert faults(client.get(flux(**{name: 1}))) == [("unknown_name", name)]
    assert faults(client.post("/v1/flux", data=body(**{name: 1}))) == [("unknown_name", name)]


def test_an_unknown_detail_is_refused(client: FlaskClient) -> None:
    assert faults(client.get(flux(detail="everything"))) == [("unknown_option", "detail")]


def test_a_name_over_a_hundred_characters_is_refused_and_cut(client: FlaskClient) -> None:
    told = problem(client.get(flux(**{"n" * 101: 1})))

    assert told["errors"][0]["name"] == "n" * 100
    assert "100" in told["errors"][0]["reason"]


def test_several_faults_are_told_at_once(client: FlaskClient) -> None:
    told = problem(client.get(flux(wind_speed="calm", salinity="fresh", water="pond")))

    assert {error["name"] for error in told["errors"]} == {"wind_speed", "salinity", "water"}
    assert told["detail"].endswith("; and 2 more")


def credentials(pair: str) -> dict[str, str]:
    return {"Authorization": "Basic " + base64.b64encode(pair.encode()).decode()}


KNOWN = [{"Authorization": "Bearer open sesame"}, credentials("anyone:open sesame"), credentials(":open sesame")]
UNKNOWN: list[dict[str, str]] = [
    {},
    {"Authorization": "Bearer sesame"},
    {"Authorization": "open sesame"},
    {"Authorization": "Bearer"},
    {"Authorization": "Basic !"},
    credentials("open sesame:"),
    credentials("anyone:öpen sesame"),
]


def guarded() -> FlaskClient:
    return create_app(Config(token="open sesame")).test_client()


@pytest.mark.parametrize("headers", KNOWN, ids=str)
def test_a_guarded_service_answers_who_brings_the_token(headers: dict[str, str]) -> None:
    assert guarded().get(flux(), headers=headers).status_code == 200


@pytest.mark.parametrize("headers", UNKNOWN, ids=str)
def test_a_guarded_service_refuses_who_does_not_even_in_text(headers: dict[str, str]) -> None:
    for path in (flux(), "/v1", "/v1/gases", "/v1/nowhere", flux() + "&errors=text"):
        answer = guarded().get(path, headers=headers)

        assert problem(answer, 401)["status"] == 401
        assert "Bearer" in answer.headers["WWW-Authenticate"]


def test_a_guarded_service_leaves_health_and_options_open() -> None:
    assert guarded().get("/healthz").status_code == 200
    assert guarded().get("/readyz").status_code == 200
    assert guarded().options("/v1/flux").status_code == 204


@settings(max_examples=300)
@given(
    st.binary(max_size=300), st.sampled_from([*QUESTIONS]), st.sampled_from(["", "form=number", "gas=co2&errors=text"])
)
def test_no_body_is_a_fault_of_the_service(client: FlaskClient, content: bytes, quantity: str, query: str) -> None:
    for kind in (None, "application/json", "application/x-www-form-urlencoded", "text/csv"):
        assert client.post(f"/v1/{quantity}?{query}", data=content, content_type=kind).status_code < 500


JSON = st.recursive(
    st.none()
    | st.booleans()
    | st.integers()
    | st.floats()
    | st.text(max_size=8)
    | st.sampled_from(["12 kn", "NA", "@a"]),
    lambda inner: (
        st.lists(inner, max_size=4) | st.dictionaries(st.sampled_from(["values", "unit", "x"]), inner, max_size=3)
    ),
    max_leaves=8,
)


@settings(max_examples=120)
@given(st.dictionaries(st.sampled_from([*request_fields(QUANTITIES["flux"]), "unit.flux", "x"]), JSON, max_size=5))
def test_no_json_is_a_fault_of_the_service(client: FlaskClient, inputs: dict[str, Any]) -> None:
    for document in (inputs, {**FLUX, **inputs}):
        answer = client.post("/v1/flux", data=json.dumps(document))

        assert answer.status_code < 500
        assert len(answer.data) < BOUND


NAMES = st.sampled_from([*request_fields(QUANTITIES["flux"]), "unit.flux", "form", "errors", "nocache"]) | st.text(
    max_size=5
)
TEXT = st.text(max_size=12) | st.sampled_from(["1", "1;2", "NA", "12 kn", "1,5", "all", "co2", "@x", "csv", "number"])


@settings(max_examples=80)
@given(st.lists(st.tuples(NAMES, TEXT), max_size=6))
def test_no_query_is_a_fault_of_the_service(client: FlaskClient, pairs: list[tuple[str, str]]) -> None:
    for quantity, inputs in QUESTIONS.items():
        assert client.get(f"/v1/{quantity}", query_string=pairs).status_code < 500
        assert client.get(address(quantity, {**inputs, **dict(pairs)})).status_code < 500


@settings(max_examples=200)
@given(st.binary(max_size=80))
def test_no_raw_query_is_a_fault_of_the_service(client: FlaskClient, content: bytes) -> None:
    query = content.decode("latin-1")

    assert client.get("/v1/flux", environ_overrides={"QUERY_STRING": query}).status_code < 500
    assert client.get("/v1/units", environ_overrides={"QUERY_STRING": query}).status_code < 500


LINES = st.lists(
    st.lists(st.sampled_from(["1", "18.4", "", "NA", '"', '"a\n"', "x", "\x00", "é", "1e400"]), max_size=9), max_size=5
)


@settings(max_examples=120)
@given(LINES, st.sampled_from([",", ";", "\t"]))
def test_no_table_is_a_fault_of_the_service(client: FlaskClient, lines: list[list[str]], delimiter: str) -> None:
    content = table(delimiter=delimiter) + "".join(delimiter.join(line) + "\n" for line in lines).encode()

    assert client.post("/v1/flux?gas=co2", data=content).status_code < 500
