"""What the catalogue lists is what the quantities take."""

import json
import re

import pytest
from flask.testing import FlaskClient

from schemas.vocabulary import quantity_inputs
from service.config import Config
from service.physics.declare import GASES, QUANTITIES
from service.physics.methods import transfer_methods
from tests.api.questions import QUESTIONS, faults, problem


def test_the_index_links_to_everything_that_answers(client: FlaskClient) -> None:
    index = client.get("/v1").get_json()
    links = [each["address"] for each in index["quantities"].values()] + [
        *index["catalogue"].values(),
        index["document"],
    ]

    assert set(QUESTIONS) <= set(index["quantities"])
    assert {client.get(link).status_code for link in links} <= {200, 422}
    assert all(client.get(link).status_code == 200 for link in index["catalogue"].values())


def test_the_index_tells_the_limits_that_hold(client: FlaskClient) -> None:
    limits = client.get("/v1").get_json()["limits"]
    config = Config()

    assert (limits["csv_bytes"], limits["json_bytes"]) == (config.csv_bytes, config.json_bytes)
    assert (limits["csv_bytes"], limits["json_bytes"]) == (128 * 1024**2, 16 * 1024**2)
    assert (limits["samples"], limits["query_bytes"], limits["name_characters"]) == (100_000, 8190, 100)
    assert (limits["cell_characters"], limits["columns_used"], limits["columns_passed"]) == (1000, 64, 1024)


def test_a_query_of_the_limit_is_read_and_one_byte_more_is_not(client: FlaskClient) -> None:
    start = "gas=co2&water_temperature=18&salinity="
    fits = start + "35".rjust(8190 - len(start), "0")

    assert client.get(f"/v1/schmidt-number?{fits}").status_code == 200
    assert client.get(f"/v1/schmidt-number?{fits}0").status_code == 414


def test_every_gas_is_listed_and_has_an_address_of_its_own(client: FlaskClient) -> None:
    gases = client.get("/v1/gases").get_json()["gases"]

    assert {gas["name"] for gas in gases} == set(GASES)
    assert {"co2", "o2", "n2", "ar", "ch4", "n2o", "sf6", "cfc11", "cfc12", "dms"} <= set(GASES)
    for gas in gases:
        assert client.get(f"/v1/gases/{gas['name']}").get_json() == gas
        assert gas["formula"]
        assert gas["molar_mass"]["unit"] == "g mol-1"


def test_every_method_of_a_gas_has_a_source(client: FlaskClient) -> None:
    sources = {each["key"] for each in client.get("/v1/sources").get_json()["sources"]}
    for gas in client.get("/v1/gases").get_json()["gases"]:
        for methods in gas["methods"].values():
            named = [method["source"]["key"] for method in methods if method.get("source")]

            assert set(named) <= sources


def test_every_parameterisation_is_listed_and_has_an_address_of_its_own(client: FlaskClient) -> None:
    listed = client.get("/v1/parameterisations").get_json()["parameterisations"]

    assert {each["name"] for each in listed} == set(transfer_methods())
    for each in listed:
        assert client.get(f"/v1/parameterisations/{each['name']}").get_json() == each
        assert each["source"] or each["name"].startswith("own-")  # what a caller brings has no paper


def test_parameterisations_are_filtered_by_water_wind_and_gas(client: FlaskClient) -> None:
    def names(query: str) -> set[str]:
        answer = client.get(f"/v1/parameterisations?{query}").get_json()
        return {each["name"] for each in answer["parameterisations"]}

    assert "cole-caraco-1998" in names("water=lake")
    assert "wanninkhof-2014" not in names("water=lake")
    assert "wanninkhof-2014" in names("water=ocean&wind_speed=7&gas=co2")
    assert names("water=ocean&wind_speed=90") < names("water=ocean")


# Queries that the catalogue refuses, with the name of the error.
WRONG = [
    ("/v1/parameterisations?water=pond", "water"),
    ("/v1/parameterisations?wind_speed=calm", "wind_speed"),
    ("/v1/parameterisations?gas=unobtainium", "gas"),
    ("/v1/parameterisations?depth=3", "depth"),
    ("/v1/parameterisations?water=lake&water=ocean", "water"),
    ("/v1/sources?form=html", "form"),
    ("/v1/gases?x=1", "x"),
    ("/v1?x=1", "x"),
    ("/v1/units?unit=kn", "unit"),
]


@pytest.mark.parametrize(("path", "name"), WRONG)
def test_a_parameter_that_the_catalogue_does_not_take_is_refused(client: FlaskClient, path: str, name: str) -> None:
    assert [each for _, each in faults(client.get(path))] == [name]


def test_the_spare_name_is_ignored_by_the_catalogue(client: FlaskClient) -> None:
    assert client.get("/v1/gases?nocache=7").data == client.get("/v1/gases").data


def test_an_unknown_gas_or_method_is_not_found_and_the_nearest_is_named(client: FlaskClient) -> None:
    gas = problem(client.get("/v1/gases/cfc13"), 404)
    method = problem(client.get("/v1/parameterisations/wanninkhof-2015"), 404)

    assert "cfc1" in gas["detail"]
    assert "wanninkhof-2014" in method["detail"]


def test_the_bibliography_comes_as_json_and_as_bibtex(client: FlaskClient) -> None:
    sources = client.get("/v1/sources").get_json()["sources"]
    bibtex = client.get("/v1/sources?form=bibtex")

    assert bibtex.mimetype == "application/x-bibtex"
    assert len(re.findall(r"^@\w+\{", bibtex.text, re.MULTILINE)) == len(sources)
    assert bibtex.text.count("{") == bibtex.text.count("}")
    assert "10.4319/lom.2014.12.351" in bibtex.text
    assert any(each["doi"] == "10.4319/lom.2014.12.351" for each in sources)


def test_units_are_listed_with_their_factors_and_other_spellings(client: FlaskClient) -> None:
    dimensions = {each["name"]: each for each in client.get("/v1/units").get_json()["dimensions"]}
    knots = next(unit for unit in dimensions["speed"]["units"] if unit["unit"] == "kn")

    assert knots["factor"] == pytest.approx(1852 / 3600, rel=1e-15)
    assert "knots" in knots["also"]
    assert dimensions["temperature"]["base"] == "degC"


def test_every_unit_that_is_listed_is_taken(client: FlaskClient) -> None:
    dimensions = {each["name"]: each for each in client.get("/v1/units").get_json()["dimensions"]}
    for unit in dimensions["speed"]["units"]:
        for spelling in (unit["unit"], *unit["also"]):
            inputs = {**QUESTIONS["transfer-velocity"], "wind_speed": {"values": [0], "unit": spelling}}

            assert client.post("/v1/transfer-velocity", json=inputs).status_code == 200, spelling


def test_the_document_has_every_quantity_with_its_inputs(client: FlaskClient) -> None:
    answer = client.get("/openapi.json")
    document = answer.get_json()

    assert document["openapi"].startswith("3.1")
    assert {f"/v1/{name}" for name in QUANTITIES} <= set(document["paths"])
    text = json.dumps(document["paths"]["/v1/flux"]) + json.dumps(document.get("components", {}))
    assert all(name in text for name in quantity_inputs(QUANTITIES["flux"]))


@pytest.mark.parametrize("path", ["/healthz", "/readyz"])
def test_health_is_told_without_computing(client: FlaskClient, path: str) -> None:
    answer = client.get(path)

    assert answer.status_code == 200
    assert set(answer.get_json()) == {"status"}
    assert answer.headers["Cache-Control"] == "no-store"
