"""The API document: valid, whole, and true of what the service does."""

import hashlib
import json
import re
import socket
import subprocess
import sys
from pathlib import Path
from typing import Any
from urllib.request import urlopen

import pytest
from openapi_schema_validator import OAS31Validator
from openapi_spec_validator import OpenAPIV31SpecValidator
from werkzeug.test import TestResponse

from schemas.document import document
from schemas.examples import Example, quantity_examples
from schemas.options import Choice
from schemas.parameters import units_of
from schemas.requests import SAMPLES_LIMIT, load
from schemas.samples import Text
from schemas.vocabulary import quantity_inputs, request_fields
from service import catalogue
from service.app import create_app
from service.config import Config
from service.errors import TYPES
from service.physics.declare import GASES, QUANTITIES, TERMS
from service.physics.faults import CODES, Refused
from service.physics.judge import BAD
from service.physics.question import known_names

APP = create_app(Config())
DOCUMENT: dict[str, Any] = APP.test_client().get("/openapi.json").get_json()
EXAMPLES = [each for quantity in QUANTITIES.values() for each in quantity_examples(quantity)]
BY_QUANTITY = pytest.mark.parametrize("quantity", QUANTITIES.values(), ids=QUANTITIES)

# Values in a query that the service reads, and ones that it refuses.
READ_TEXTS = [
    *(
        "18.4",
        "+18.4",
        "-1",
        ".5",
        "18.",
        "1e1",
        "18.4 degC",
        "18.4degC",
        "18.4;18.6",
        "18.4;18.6 degC",
        "18.4; 18.6 ;",
    ),
    *("", ";", ";;18.4", "NaN", "na", " null ", "18.4;NA;18.6"),
]
REFUSED_TEXTS = ["warm", "about 18", "-", "e5", "18.4;warm", "18.4 degC;18.6 degC", "--1", "\u0661", "NaN;n;1"]

# The same as members of a JSON body.
READ_VALUES: list[Any] = [
    *(18.4, -1, 0, None, [18.4], [18.4, None], [18.4, "NaN", "na"], ["", 18.4]),
    *("18.4 degC", "18.4;18.6 degC", "NA", ""),
    *({"values": [18.4, 18.6], "unit": "degC"}, {"values": 18.4}, {"values": None, "unit": None}),
]
REFUSED_VALUES: list[Any] = [
    *("18.4", "warm", True, [], [True], ["18.4"], [[18.4]], [{}]),
    *({}, {"unit": "degC"}, {"values": []}, {"values": "18.4"}, {"values": [18.4], "unit": 1}),
    {"values": [18.4], "units": "degC"},
]

# One request for each status that the application itself can be brought to give.
WRONG: list[tuple[int, str, dict[str, Any]]] = [
    (400, "/v1/flux", {"method": "POST", "data": b'{"gas": '}),
    (400, "/v1/flux", {"method": "POST"}),
    (404, "/v1/gases/unobtainium", {}),
    (404, "/v1/fluxes", {}),
    (405, "/v1/flux", {"method": "DELETE"}),
    (413, "/v1/flux", {"method": "POST", "data": b"x" * 4097}),
    (414, "/v1/flux?nocache=" + "x" * 9000, {}),
    (415, "/v1/flux", {"method": "POST", "data": b"x", "headers": {"Content-Encoding": "br"}}),
    (422, "/v1/flux?gas=co2&water_temprature=1", {}),
]

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


def path_item(quantity_name: str) -> dict[str, Any]:
    item: dict[str, Any] = DOCUMENT["paths"][f"/v1/{quantity_name}"]
    return item


def resolved(node: dict[str, Any], whole: dict[str, Any] = DOCUMENT) -> dict[str, Any]:
    """Return what a reference within the document stands for."""
    if not node.get("$ref", "").startswith("#/components/"):
        return node
    _, kind, name = node["$ref"].removeprefix("#/").split("/")
    found: dict[str, Any] = whole["components"][kind][name]
    return found


def parameters(quantity_name: str, whole: dict[str, Any] = DOCUMENT) -> dict[str, dict[str, Any]]:
    listed = [resolved(each, whole) for each in whole["paths"][f"/v1/{quantity_name}"]["parameters"]]
    return {each["name"]: each for each in listed}


def members(quantity_name: str, whole: dict[str, Any] = DOCUMENT) -> dict[str, dict[str, Any]]:
    body = whole["components"]["schemas"][f"Request.{quantity_name}"]
    return {name: resolved(each, whole) for name, each in body["properties"].items()}


def faults(schema: dict[str, Any], value: Any) -> list[str]:
    """Return what a value has against a schema of the document."""
    whole = {**schema, "components": DOCUMENT["components"]}
    return [f"{list(error.path)}: {error.message}" for error in OAS31Validator(whole).iter_errors(value)]


def answer_schema(response: dict[str, Any], content_type: str) -> dict[str, Any]:
    found: dict[str, Any] = resolved(response)["content"][content_type]["schema"]
    return found


def sent(example: Example) -> TestResponse:
    body = example.get("body")
    if isinstance(body, dict):
        body = json.dumps(body)
    return APP.test_client().open(
        example["url"], method=example["method"], data=body, content_type=example.get("content_type")
    )


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
        assert name in in_json
        if isinstance(field, Choice):
            assert in_query[name]["schema"]["enum"] == list(field.choices)
    assert {"form", "errors", "nocache"} <= set(in_query)
    assert not {"form", "errors", "nocache"} & set(in_json)


@BY_QUANTITY
def test_every_result_is_there_with_a_parameter_for_its_unit(quantity: Any) -> None:
    told = path_item(quantity.name)["x-results"]
    in_query, in_json = parameters(quantity.name), members(quantity.name)

    assert tuple(each["name"] for each in told) == known_names(quantity)
    for each in told:
        about = in_query[f"unit.{each['name']}"]
        assert about["schema"]["default"] == each["unit"]
        assert each["unit"] in DOCUMENT["x-unit-lists"][about["x-units"]]
        assert f"unit.{each['name']}" in in_json


@BY_QUANTITY
def test_the_uncertainty_of_every_input_is_there_in_its_unit(quantity: Any) -> None:
    in_query, in_json = parameters(quantity.name), members(quantity.name)

    for name in quantity_inputs(quantity):
        told = in_query[f"u_{name}"]
        assert told["x-uncertainty-of"] == name
        assert told["x-units"] == in_query[name]["x-units"]
        assert told["x-possible"] == in_json[f"u_{name}"]["x-possible"] == [0.0, None]
        assert "default" not in told["schema"]


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


@BY_QUANTITY
def test_what_is_always_needed_is_asked_for_when_it_lacks(quantity: Any) -> None:
    example = next(each for each in quantity_examples(quantity) if each["name"] == "json")
    always = [each["name"] for each in path_item(quantity.name)["x-inputs"] if each["needed"] == "always"]

    assert always
    for name in always:
        body = {key: value for key, value in example["body"].items() if key != name}
        refused = sent({**example, "body": body})
        assert refused.status_code == 422
        assert ("missing_input", name) in {(each["code"], each["name"]) for each in refused.get_json()["errors"]}


@BY_QUANTITY
def test_a_side_that_is_needed_is_asked_for_when_it_lacks(quantity: Any) -> None:
    example = next(each for each in quantity_examples(quantity) if each["name"] == "json")
    gas = example["body"]["gas"]

    for side in path_item(quantity.name)["x-sides"]:
        body = {key: value for key, value in example["body"].items() if key not in side["members"]}
        answered = sent({**example, "body": body})
        if gas in side["needed_for_gases"]:
            assert side["name"] in {each["name"] for each in answered.get_json()["errors"]}
        else:
            absent = set() if gas in side["default_by_gas"] else set(side["needed_for_results"])
            assert answered.status_code == 200
            assert not absent & set(answered.get_json()["results"])


@pytest.mark.parametrize("quantity", QUANTITIES.values(), ids=QUANTITIES)
def test_every_quantity_has_examples_of_every_kind(quantity: Any) -> None:
    examples = path_item(quantity.name)["x-examples"]
    content = path_item(quantity.name)["post"]["requestBody"]["content"]

    assert examples == quantity_examples(quantity)
    assert {each["method"] for each in examples} == {"GET", "POST"}
    for kind in ("application/json", "text/csv", "application/x-www-form-urlencoded"):
        assert [each["value"] for each in content[kind]["examples"].values()] == [
            each["body"] for each in examples if each.get("content_type") == kind
        ]


@pytest.mark.parametrize("example", EXAMPLES, ids=[f"{each['url'][4:12]} {each['name']}" for each in EXAMPLES])
def test_every_example_runs(example: Example) -> None:
    answered = sent(example)

    assert answered.status_code == 200, answered.text
    if answered.is_json:
        operation = path_item(answered.get_json()["quantity"])[example["method"].lower()]
        assert faults(answer_schema(operation["responses"]["200"], "application/json"), answered.get_json()) == []
        assert max(answered.get_json()["quality"]["flags"]) < BAD
    elif answered.mimetype == "text/csv":
        flags = [line.split(",")[-2] for line in answered.text.splitlines()[1:]]
        assert flags
        assert max(int(flag) for flag in flags) < BAD
    else:
        assert float(answered.text) == float(answered.text)  # a number, not NaN


@pytest.mark.parametrize("example", [each for each in EXAMPLES if isinstance(each.get("body"), dict)], ids=str)
def test_every_json_example_fits_the_schema_of_the_body(example: Example) -> None:
    name = example["url"].removeprefix("/v1/")

    assert faults(DOCUMENT["components"]["schemas"][f"Request.{name}"], example["body"]) == []


def test_every_parameter_that_shows_an_example_fits_its_own_schema() -> None:
    shown = [each for name in QUANTITIES for each in parameters(name).values() if "example" in each]

    assert shown
    assert [each["name"] for each in shown if faults(each["schema"], each["example"])] == []


@pytest.mark.parametrize("text", READ_TEXTS)
def test_a_text_that_is_read_fits_the_pattern(text: str) -> None:
    answered = APP.test_client().get(
        "/v1/schmidt-number", query_string={"gas": "co2", "salinity": "35", "water_temperature": text}
    )

    assert answered.status_code == 200
    assert faults(DOCUMENT["components"]["schemas"]["ValueText"], text) == []


@pytest.mark.parametrize("text", REFUSED_TEXTS)
def test_a_text_that_does_not_fit_the_pattern_is_refused(text: str) -> None:
    answered = APP.test_client().get(
        "/v1/schmidt-number", query_string={"gas": "co2", "salinity": "35", "water_temperature": text}
    )

    assert answered.status_code == 422
    assert faults(DOCUMENT["components"]["schemas"]["ValueText"], text) != []


@pytest.mark.parametrize("value", READ_VALUES, ids=str)
def test_a_value_that_is_read_fits_the_schema(value: Any) -> None:
    body = {"gas": "co2", "salinity": 35, "water_temperature": value}
    answered = APP.test_client().post("/v1/schmidt-number", json=body)

    assert answered.status_code == 200
    assert faults(DOCUMENT["components"]["schemas"]["Request.schmidt-number"], body) == []


@pytest.mark.parametrize("value", REFUSED_VALUES, ids=str)
def test_a_value_that_does_not_fit_the_schema_is_refused(value: Any) -> None:
    body = {"gas": "co2", "salinity": 35, "water_temperature": value}
    answered = APP.test_client().post("/v1/schmidt-number", json=body)

    assert answered.status_code == 422
    assert faults(DOCUMENT["components"]["schemas"]["Request.schmidt-number"], body) != []


@pytest.mark.parametrize(
    "path", [path for path, item in DOCUMENT["paths"].items() if "post" not in item and path != "/openapi.json"]
)
def test_what_the_catalogue_answers_fits_its_schema(path: str) -> None:
    operation = DOCUMENT["paths"][path]["get"]
    names = [each["schema"]["enum"] for each in operation["parameters"] if each.get("in") == "path"]

    for name in names[0] if names else [""]:
        answered = APP.test_client().get(path.replace("{name}", name))
        assert answered.status_code == 200
        assert faults(answer_schema(operation["responses"]["200"], "application/json"), answered.get_json()) == []


@pytest.mark.parametrize(("status", "address", "request_"), WRONG, ids=[f"{each[0]} {each[1][:20]}" for each in WRONG])
def test_what_is_refused_fits_the_schema_of_a_problem(status: int, address: str, request_: dict[str, Any]) -> None:
    client = create_app(Config(csv_bytes=4096, json_bytes=4096)).test_client()
    answered = client.open(address, **request_)

    assert answered.status_code == status
    assert answered.mimetype == "application/problem+json"
    assert faults(DOCUMENT["components"]["schemas"]["Problem"], answered.get_json()) == []
    told = DOCUMENT["components"]["responses"][f"problem-{status}"]
    assert {name for name, each in told["headers"].items() if resolved(each).get("required")} <= set(
        answered.headers.keys()
    )


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


def free_port() -> int:
    with socket.socket() as one:
        one.bind(("127.0.0.1", 0))
        port: int = one.getsockname()[1]
        return port


@pytest.mark.drills
def test_requests_generated_from_the_document_find_nothing(tmp_path: Path) -> None:
    """What schemathesis makes of the document, good and bad, is answered as the document says.

    Not asked: that whatever fits the schema is accepted; of two inputs for one side only the service can tell.
    """
    hooks = tmp_path / "hooks.py"
    hooks.write_text(
        "import schemathesis\n"
        "@schemathesis.serializer('text/csv')\n"
        "def table(context, value):\n"
        "    return str(value).encode('utf-8', 'replace')\n"
    )
    settings = tmp_path / "schemathesis.toml"
    settings.write_text('[parameters]\nerrors = "problem"\n')  # the other turns every refusal into a 200
    port = free_port()
    command = [sys.executable, "-m", "service", "serve", "--bind", f"127.0.0.1:{port}"]
    with subprocess.Popen(command, cwd=Path(__file__).parents[2], stderr=subprocess.DEVNULL) as server:
        try:
            wait_for(f"http://127.0.0.1:{port}/readyz", server)
            done = subprocess.run(
                [
                    *(Path(sys.executable).with_name("schemathesis"), "--config-file", settings, "run"),
                    *("--phases", "examples,coverage,fuzzing", "--mode", "all", "--generation-deterministic"),
                    *("--exclude-checks", "positive_data_acceptance", "--max-examples", "20", "--workers", "4"),
                    *("--continue-on-failure", f"http://127.0.0.1:{port}/openapi.json"),
                ],
                capture_output=True,
                text=True,
                timeout=600,
                check=False,
                env={"SCHEMATHESIS_HOOKS": str(hooks), "PATH": "", "HOME": str(tmp_path)},
                cwd=tmp_path,
            )
        finally:
            server.terminate()

    assert done.returncode == 0, done.stdout[-5000:]
    assert " passed" in done.stdout


def wait_for(address: str, server: "subprocess.Popen[bytes]") -> None:
    """Poll until a server answers, or fail when it has ended."""
    while server.poll() is None:
        try:
            urlopen(address, timeout=5).close()
        except OSError:
            continue
        return
    pytest.fail("the server ended before it answered")
