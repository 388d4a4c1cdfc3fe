"""The API document: valid, whole, and true of what the service does."""

import hashlib
import json
import subprocess
import sys
import time
from collections.abc import Iterator
from typing import Any

import pytest
from flask.testing import FlaskClient
from openapi_schema_validator import OAS31Validator
from openapi_spec_validator import OpenAPIV31SpecValidator
from werkzeug.test import TestResponse

from schemas.document import document
from schemas.examples import quantity_examples
from schemas.parameters import units_of
from schemas.requests import SAMPLES_LIMIT, load, quantity_inputs, request_fields
from schemas.samples import Measured, Text
from service.app import create_app
from service.config import Config
from service.errors import TYPES
from service.physics.declare import FAMILIES, GASES, QUANTITIES, TERMS
from service.physics.faults import CODES, Refused
from service.physics.methods import transfer_methods
from service.physics.question import known_names

APP = create_app(Config())
DOCUMENT: dict[str, Any] = APP.test_client().get("/openapi.json").get_json()
EXAMPLES = [each for quantity in QUANTITIES.values() for each in quantity_examples(quantity)]

# Values in a query that the service reads, and ones that it refuses.
READ_TEXTS = [
    "18.4", "+18.4", "-1", ".5", "18.", "1e1", "18.4 degC", "18.4degC", "18.4;18.6", "18.4;18.6 degC", "18.4; 18.6 ;",
    "", ";", ";;18.4", "NaN", "na", " null ", "18.4;NA;18.6", "18,4",
]  # fmt: skip
REFUSED_TEXTS = ["warm", "about 18", "-", "e5", "18.4;warm", "18.4 degC;18.6 degC", "--1", "\u0661"]

# The same in JSON.
READ_VALUES: list[Any] = [
    18.4, -1, 0, None, [18.4], [18.4, None], [18.4, "NaN", "na"], ["", 18.4], "18.4 degC", "18.4;18.6 degC", "NA",
    {"values": [18.4, 18.6], "unit": "degC"}, {"values": 18.4}, {"values": None, "unit": None},
]  # fmt: skip
REFUSED_VALUES: list[Any] = [
    "18.4", "warm", True, [], [True], ["18.4"], [[18.4]], [{}], {}, {"unit": "degC"}, {"values": []},
    {"values": "18.4"}, {"values": [18.4], "unit": 1}, {"values": [18.4], "units": "degC"},
]  # fmt: skip


def resolved(node: Any) -> Any:
    """Follow a reference within the document."""
    while "$ref" in node:
        target: Any = DOCUMENT
        for part in node["$ref"].removeprefix("#/").split("/"):
            target = target[part]
        node = target | {key: value for key, value in node.items() if key != "$ref"}
        if node["$ref":] if False else target.get("$ref") is None:
            break
    return node
