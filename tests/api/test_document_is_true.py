"""What the API document says is so: its examples run, its patterns are those of the service, its schemas fit."""

from typing import Any

import pytest

from schemas.examples import Example, quantity_examples
from service.app import create_app
from service.config import Config
from service.physics.declare import QUANTITIES
from service.physics.judge import BAD
from tests.api.api_document import APP, DOCUMENT, answer_schema, faults, parameters, path_item, resolved, sent

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
    gas = example["body"].get("gas")

    for side in path_item(quantity.name)["x-sides"]:
        body = {key: value for key, value in example["body"].items() if key not in side["members"]}
        answered = sent({**example, "body": body})
        if gas in side["needed_for_gases"]:
            assert side["name"] in {each["name"] for each in answered.get_json()["errors"]}
        else:
            absent = set() if gas in side["default_by_gas"] else set(side["needed_for_results"])
            assert answered.status_code == 200
            assert not absent & set(answered.get_json()["results"])


@BY_QUANTITY
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
    "path",
    [
        path
        for path, item in DOCUMENT["paths"].items()
        if "post" not in item and "application/json" in item["get"]["responses"]["200"]["content"]
    ],
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
