"""The API document as a reader takes it: what stands under a reference, and what a value has against a schema."""

import json
from typing import Any

from openapi_schema_validator import OAS31Validator
from werkzeug.test import TestResponse

from schemas.examples import Example
from service.app import create_app
from service.config import Config

APP = create_app(Config())
DOCUMENT: dict[str, Any] = APP.test_client().get("/openapi.json").get_json()


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
