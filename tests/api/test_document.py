"""The API document: valid, and whole; what it says of the service is held against it in a file of its own."""

import hashlib
import json
import re
import subprocess
import sys
from pathlib import Path
from typing import Any

import pytest
from openapi_spec_validator import OpenAPIV31SpecValidator

from schemas.document import document
from schemas.options import Choice
from schemas.parameters import units_of
from schemas.requests import SAMPLES_LIMIT, load
from schemas.samples import Text
from schemas.vocabulary import quantity_inputs, request_fields, uncertain_inputs
from service import catalogue
from service.app import create_app
from service.config import Config
from service.errors import TYPES
from service.physics.declare import GASES, QUANTITIES, TERMS
from service.physics.faults import CODES, Refused
from service.physics.question import known_names
from tests.api.api_document import APP, DOCUMENT, faults, members, parameters, path_item

BY_QUANTITY = pytest.mark.parametrize("quantity", QUANTITIES.values(), ids=QUANTITIES)

# Declares a gas, a method, an input and an option that nothing else knows, then prints the document.
MADE_UP = """
import json
from dataclasses import replace
from service.physics import question
from service.physics.declare import GASES, QUANTITIES, Gas, family, gas, input_term, step, term
from service.physics.sources import SOURCES

input_term("kelp_cover", "%", "share of the surface under kelp", possible=(0.0, 100.0), default=3.0, example=7.0)
term("kelp_drag", "m s-1", "what the kelp takes from the wind")
family("kelp", "kelp_method", "what the kelp takes from the wind", ("kelp_drag",), default="author-1999")

@step("kelp_drag", method="author-1999", source=next(iter(SOURCES.values())))
def author_1999(wind_speed: object, kelp_cover: object) -> object:
    return wind_speed

@step("transfer_velocity_at_reference", method="author-2001", source=next(iter(SOURCES.values())), water=("ocean",),
      supplies={"reference_schmidt_number": 660.0, "schmidt_exponent": 0.5})
def author_2001(kelp_drag: object) -> object:
    return kelp_drag

gas(replace(GASES["co2"], name="xg", title="made-up gas"))

from schemas.document import document
print(json.dumps(document("0", {}, {})))
"""


def codes_of(name: str, value: str, gas: str) -> set[str]:
    """Return what is wrong with a question that holds but one input."""
    try:
        load(QUANTITIES["flux"], {"gas": Text(gas), name: Text(value)})
    except Refused as error:
        return {fault.code for fault in error.faults if fault.name == name}
    return set()


def test_the_document_is_valid() -> None:
    OpenAPIV31SpecValidator(DOCUMENT).validate()

    assert DOCUMENT["openapi"].startswith("3.1")
    assert DOCUMENT["info"]["license"]["identifier"] == "MIT"


def test_the_document_has_every_address_and_no_other() -> None:
    served = {
        (re.sub(r"<(?:\w+:)?(\w+)>", r"{\1}", rule.rule), method.lower())
        for rule in APP.url_map.iter_rules()
        for method in (rule.methods or set()) - {"HEAD", "OPTIONS"}
        if not rule.rule.startswith("/page/")  # parts of the page, that nobody asks for by name
    }
    told = {
        (path, method)
        for path, item in DOCUMENT["paths"].items()
        for method in item
        if method in ("get", "post", "put")
    }

    assert told == served


def test_every_operation_has_its_own_name() -> None:
    names = [
        item[method]["operationId"]
        for item in DOCUMENT["paths"].values()
        for method in ("get", "post")
        if method in item
    ]

    assert len(set(names)) == len(names)
    assert all(name.isidentifier() for name in names)


@BY_QUANTITY
def test_every_input_is_there_with_its_unit_and_limits(quantity: Any) -> None:
    in_query, in_json = parameters(quantity.name), members(quantity.name)
    needs = {each["name"] for each in path_item(quantity.name)["x-inputs"]}

    for name in quantity_inputs(quantity):
        term = TERMS[name]
        low, high = (limit if abs(limit) != float("inf") else None for limit in term.possible)
        for told in (in_query[name], in_json[name]):
            assert told["x-unit"] == term.unit
            assert told["x-possible"] == [low, high]
            assert told["description"] == term.meaning
        assert in_json[name].get("default") == term.default
        assert DOCUMENT["x-unit-lists"][in_query[name]["x-units"]][0] == term.unit
        assert name in needs


@BY_QUANTITY
def test_every_option_is_there_with_its_words(quantity: Any) -> None:
    in_query, in_json = parameters(quantity.name), members(quantity.name)

    for name, field in request_fields(quantity).items():
        if name == "units":  # gathers unit.<result>
            continue
        assert name in in_query
        assert name in in_json or "x-uncertainty-of" in in_query[name]
        if isinstance(field, Choice):
            assert in_query[name]["schema"]["enum"] == list(field.choices)
    assert {"form", "errors", "nocache"} <= set(in_query)
    assert not {"form", "errors", "nocache"} & set(in_json)


@BY_QUANTITY
def test_every_result_is_there_with_a_parameter_for_its_unit(quantity: Any) -> None:
    told = path_item(quantity.name)["x-results"]
    in_query, body = parameters(quantity.name), DOCUMENT["components"]["schemas"][f"Request.{quantity.name}"]

    assert tuple(each["name"] for each in told) == known_names(quantity)
    for each in told:
        about = in_query[f"unit.{each['name']}"]
        assert about["schema"]["default"] == each["unit"]
        assert each["unit"] in DOCUMENT["x-unit-lists"][about["x-units"]]
        assert faults(body, {f"unit.{each['name']}": each["unit"]}) == []
    assert faults(body, {"unit.nothing": "1"}) != []


@BY_QUANTITY
def test_the_uncertainty_of_every_input_is_there(quantity: Any) -> None:
    in_query = parameters(quantity.name)
    body = DOCUMENT["components"]["schemas"][f"Request.{quantity.name}"]

    for name in uncertain_inputs(quantity):
        told = in_query[f"u_{name}"]
        assert told["x-uncertainty-of"] == name
        assert told["x-unit"] == in_query[name]["x-unit"]
        assert told["x-possible"] == [0.0, None]
        assert "default" not in told["schema"]
        assert faults(body, {f"u_{name}": [0.1, 0.2]}) == []
        assert faults(body, {f"u_{name}": "little"}) != []


def test_every_option_of_methods_tells_the_default_for_every_gas() -> None:
    for option in ("solubility_method", "schmidt_method", "wind_profile", "parameterisation"):
        about = parameters("flux")[option]
        some = about.get("x-gases-by-choice", {})
        for gas, method in about["x-default-by-gas"].items():
            assert gas in some.get(method, GASES)
        assert set(about["x-default-by-gas"]) == set(GASES)


@pytest.mark.parametrize("name", quantity_inputs(QUANTITIES["flux"]))
def test_every_unit_that_is_listed_is_read(name: str) -> None:
    gases = ("co2", "rn222") if "rn222" in GASES else ("co2",)
    refused = [
        unit
        for unit in units_of(TERMS[name])
        if TERMS[name].unit != unit and all("unit" in codes_of(name, f"1 {unit}", gas) for gas in gases)
    ]

    assert refused == []


def test_every_code_and_every_status_is_listed() -> None:
    problem = DOCUMENT["components"]["schemas"]["Problem"]["properties"]

    assert DOCUMENT["x-codes"] == CODES
    assert problem["errors"]["items"]["properties"]["code"]["enum"] == list(CODES)
    assert problem["status"]["enum"] == list(TYPES)
    for status in TYPES:
        assert f"problem-{status}" in DOCUMENT["components"]["responses"]


def test_a_quantity_tells_of_every_refusal_it_can_give() -> None:
    post = path_item("flux")["post"]["responses"]

    assert {"200", "400", "401", "405", "413", "414", "415", "422", "503"} <= set(post)


def test_the_limits_are_those_of_the_configuration() -> None:
    limits = APP.test_client().get("/v1").get_json()["limits"]

    assert DOCUMENT["x-limits"] == limits
    assert DOCUMENT["components"]["schemas"]["Numbers"]["maxItems"] == SAMPLES_LIMIT


def test_the_document_is_made_once_and_only_when_it_is_asked_for(monkeypatch: pytest.MonkeyPatch) -> None:
    made: list[str] = []

    def make(version: str, *_: Any) -> dict[str, str]:
        made.append(version)
        return {"openapi": "3.1.0"}

    monkeypatch.setattr(catalogue, "document", make)
    client = create_app(Config()).test_client()

    assert made == []
    assert client.get("/openapi.json").data == client.get("/openapi.json").data
    assert len(made) == 1


def run_python(program: str, seed: str = "0") -> str:
    done = subprocess.run(
        [sys.executable, "-c", program],
        capture_output=True,
        text=True,
        check=True,
        timeout=60,
        env={"PYTHONHASHSEED": seed},
        cwd=Path(__file__).parents[2],
    )
    return done.stdout


def test_the_bytes_do_not_depend_on_the_process() -> None:
    program = "import json; from schemas.document import document; print(json.dumps(document('0', {}, {})))"
    found = {hashlib.sha256(run_python(program, seed).encode()).hexdigest() for seed in ("1", "2", "3")}

    assert found == {hashlib.sha256((json.dumps(document("0", {}, {})) + "\n").encode()).hexdigest()}


def test_what_is_newly_declared_appears_by_itself() -> None:
    whole = json.loads(run_python(MADE_UP))
    in_query, in_json = parameters("flux", whole), members("flux", whole)
    needs = {each["name"]: each for each in whole["paths"]["/v1/flux"]["x-inputs"]}

    assert in_query["gas"]["x-titles"]["xg"] == "made-up gas"
    assert "xg" in in_query["solubility_method"]["x-default-by-gas"]
    assert "author-2001" in in_query["parameterisation"]["x-choices"]
    assert in_query["kelp_method"]["schema"]["enum"] == ["author-1999"]
    assert in_query["kelp_cover"]["x-unit"] == "%"
    assert in_query["kelp_cover"]["example"] == "7"
    assert in_json["kelp_cover"]["default"] == 3.0
    assert needs["kelp_cover"]["needed"] == "never"  # it has a default
    assert "author-2001" in needs["wind_speed"]["methods"]["parameterisation"]
