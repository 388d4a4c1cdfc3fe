"""What every answer carries, and what the addresses themselves promise."""

import re

import pytest
from flask.testing import FlaskClient

from service.app import create_app
from service.config import Config, service_version
from tests.api.questions import QUESTIONS, address, body, flux, number, problem, table

# Addresses of every kind with the status they answer.
ADDRESSES = [
    (flux(), 200),
    (flux(form="number"), 200),
    (flux(form="csv"), 200),
    ("/v1", 200),
    ("/v1/gases", 200),
    ("/v1/gases/co2", 200),
    ("/v1/parameterisations", 200),
    ("/v1/sources?form=bibtex", 200),
    ("/openapi.json", 200),
    ("/healthz", 200),
    ("/readyz", 200),
    ("/v1/flux", 422),
    ("/v1/nowhere", 404),
]


@pytest.mark.parametrize(("path", "status"), ADDRESSES)
def test_every_answer_tells_version_and_request_and_forbids_sniffing(
    client: FlaskClient, path: str, status: int
) -> None:
    answer = client.get(path)

    assert answer.status_code == status
    assert answer.headers["Catspaw-Version"] == service_version()
    assert re.fullmatch(r"[A-Za-z0-9._-]{1,64}", answer.headers["X-Request-ID"])
    assert answer.headers.getlist("X-Content-Type-Options") == ["nosniff"]
    assert answer.headers.getlist("Referrer-Policy") == ["no-referrer"]
    assert answer.headers["Access-Control-Allow-Origin"] == "*"
    assert "X-Request-ID" in answer.headers["Access-Control-Expose-Headers"]


GOOD_IDS = ["a", "2031-07-01T00.00_x", "x" * 64]
BAD_IDS = ["", "x" * 65, "a b", "a;b", "é", "a/b", '"a"']


@pytest.mark.parametrize("name", GOOD_IDS)
def test_a_good_request_id_comes_back(client: FlaskClient, name: str) -> None:
    answer = client.get("/v1/flux", headers={"X-Request-ID": name})

    assert answer.headers["X-Request-ID"] == name
    assert problem(answer)["instance"] == name


@pytest.mark.parametrize("name", BAD_IDS)
def test_a_bad_request_id_is_replaced(client: FlaskClient, name: str) -> None:
    answer = client.get("/healthz", headers={"X-Request-ID": name})

    assert answer.headers["X-Request-ID"] != name
    assert re.fullmatch(r"[0-9a-f]{16}", answer.headers["X-Request-ID"])


def test_request_ids_are_made_anew(client: FlaskClient) -> None:
    assert client.get("/healthz").headers["X-Request-ID"] != client.get("/healthz").headers["X-Request-ID"]


def test_assumptions_and_methods_stand_in_headers_too(client: FlaskClient) -> None:
    answer = client.get(flux(air_pressure=None))

    assert "air_pressure=1013.25 hPa" in answer.headers["Catspaw-Assumed"].split("; ")
    assert "parameterisation=wanninkhof-2014" in answer.headers["Catspaw-Assumed"].split("; ")
    assert "solubility=weiss-1974" in answer.headers["Catspaw-Methods"].split("; ")
    assert answer.headers["Catspaw-Assumed"].isascii()


@pytest.mark.parametrize("form", ["json", "csv", "number"])
def test_headers_are_the_same_in_every_form(client: FlaskClient, form: str) -> None:
    plain, formed = client.get(flux()), client.get(flux(form=form))

    for name in ("Catspaw-Assumed", "Catspaw-Methods"):
        assert formed.headers[name] == plain.headers[name]


def test_computed_answers_are_not_stored(client: FlaskClient) -> None:
    for answer in (client.get(flux()), client.post("/v1/flux?gas=co2", data=table()), client.get("/v1/flux")):
        assert answer.headers["Cache-Control"] == "no-store"
        assert "ETag" not in answer.headers


CATALOGUE = ["/v1", "/v1/gases", "/v1/gases/co2", "/v1/parameterisations", "/v1/sources", "/v1/units", "/openapi.json"]


@pytest.mark.parametrize("path", CATALOGUE)
def test_the_catalogue_is_kept_until_its_tag_changes(client: FlaskClient, path: str) -> None:
    first = client.get(path)
    again = client.get(path, headers={"If-None-Match": first.headers["ETag"]})
    other = client.get(path, headers={"If-None-Match": '"another"'})

    assert first.headers["Cache-Control"] == "no-cache"
    assert again.status_code == 304
    assert again.data == b""
    assert again.headers["ETag"] == first.headers["ETag"]
    assert other.data == first.data


@pytest.mark.parametrize(("path", "status"), ADDRESSES)
def test_head_is_get_without_the_body(client: FlaskClient, path: str, status: int) -> None:
    head, get = client.head(path), client.get(path)

    assert head.status_code == status
    assert head.data == b""
    for name in ("Content-Type", "Cache-Control", "ETag", "Catspaw-Assumed"):
        assert head.headers.get(name) == get.headers.get(name)


ANY = [*(path for path, _ in ADDRESSES), "/", "/nowhere/at/all", flux(wind_speed="calm"), "/v1/flux?" + "x" * 9000]


@pytest.mark.parametrize("path", ANY, ids=lambda path: path[:40])
def test_options_is_empty_on_any_path_and_checks_nothing(client: FlaskClient, path: str) -> None:
    answer = client.options(path)

    assert answer.status_code == 204
    assert answer.data == b""
    assert "Content-Type" not in answer.headers
    assert "POST" in answer.headers["Access-Control-Allow-Methods"]
    assert "Authorization" in answer.headers["Access-Control-Allow-Headers"]


@pytest.mark.parametrize("path", [path for path, status in ADDRESSES if status == 200])
def test_a_trailing_slash_is_accepted_without_a_redirect(client: FlaskClient, path: str) -> None:
    before, mark, query = path.partition("?")

    assert client.get(f"{before}/{mark}{query}").data == client.get(path).data


DOUBLED = ["/v1//flux", "/v1/flux//", "//v1/flux", "/v1//", "/v1/gases//co2"]


@pytest.mark.parametrize("path", DOUBLED)
def test_a_doubled_slash_is_not_found(client: FlaskClient, path: str) -> None:
    answer = client.get("/", environ_overrides={"PATH_INFO": path})

    assert problem(answer, 404)["errors"][0]["code"] == "not_found"


def test_origins_are_those_configured() -> None:
    one = create_app(Config(cors="https://lab.example")).test_client().get("/v1")
    none = create_app(Config(cors="")).test_client().options("/v1")

    assert one.headers["Access-Control-Allow-Origin"] == "https://lab.example"
    assert not [name for name, _ in none.headers if name.startswith("Access-Control")]


def test_headers_of_a_client_change_no_address(client: FlaskClient) -> None:
    forged = {
        "X-Forwarded-Host": "elsewhere.example",
        "X-Forwarded-Prefix": "/x",
        "X-HTTP-Method-Override": "DELETE",
        "Script-Name": "/v1",
        "X-Script-Name": "/v1",
    }

    assert client.get("/v1", headers=forged).data == client.get("/v1").data


@pytest.mark.parametrize("quantity", QUESTIONS)
def test_every_quantity_is_asked_by_get_and_post(client: FlaskClient, quantity: str) -> None:
    by_get = client.get(address(quantity, QUESTIONS[quantity]))
    by_post = client.post(f"/v1/{quantity}", json=QUESTIONS[quantity])

    assert by_get.status_code == 200
    assert by_get.data == by_post.data


def test_the_same_question_has_the_same_bytes(client: FlaskClient) -> None:
    again = create_app(Config()).test_client()

    assert client.get(flux()).data == again.get(flux()).data
    assert number(client.post("/v1/flux", data=body()), "flux") == number(client.get(flux()), "flux")
