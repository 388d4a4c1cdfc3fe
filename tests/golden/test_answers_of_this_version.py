"""No number that an unchanged request returns changes within a version."""

import math
from typing import Any

import pytest
from flask.testing import FlaskClient

from service.app import create_app
from service.config import Config, service_version
from service.physics.declare import GASES, QUANTITIES
from service.physics.methods import transfer_methods
from tests.golden.renew import covers, file_of, read, told

ROUNDING = 1e-11  # relative; processors differ in the last digits of powers and exponentials
FILE = file_of(service_version())
KEPT = read(FILE) if FILE.exists() else []


@pytest.fixture(scope="module")
def client() -> FlaskClient:
    return create_app(Config()).test_client()


def same(now: Any, then: Any) -> bool:
    """Tell whether two answers are the same but for rounding."""
    if isinstance(then, float | int) and isinstance(now, float | int) and not isinstance(then, bool):
        return math.isclose(now, then, rel_tol=ROUNDING, abs_tol=1e-300)
    if isinstance(then, dict) and isinstance(now, dict):
        return now.keys() == then.keys() and all(same(now[name], then[name]) for name in then)
    if isinstance(then, list) and isinstance(now, list):
        return len(now) == len(then) and all(map(same, now, then))
    if isinstance(then, str) and isinstance(now, str) and now != then:
        try:
            return math.isclose(float(now), float(then), rel_tol=ROUNDING)
        except ValueError:
            return False
    return bool(now == then)


@pytest.mark.parametrize("kept", KEPT, ids=lambda each: str(each["address"])[:60])
def test_a_request_has_the_answer_that_it_had(client: FlaskClient, kept: dict[str, Any]) -> None:
    now = told(client, kept["address"], kept["body"])

    assert same(now, kept["answer"]), "a number changed: see Change a number in DEVELOPERS.md"


def test_this_version_has_its_answers_for_every_quantity_gas_and_method() -> None:
    addresses = [covers(each["address"]) for each in KEPT]
    methods = {part.partition("=")[2] for address in addresses for part in address[2:]}

    assert FILE.exists(), f"no answers of {service_version()}: python tests/golden/renew.py"
    assert {address[0] for address in addresses} == {f"/v1/{name}" for name in QUANTITIES}
    assert {address[1] for address in addresses} >= set(GASES)
    assert {name for name, record in transfer_methods().items() if record.way is None} <= methods


def test_a_change_is_seen() -> None:
    before = {"results": {"flux": {"values": [1.0, None], "unit": "mmol m-2 d-1"}}, "rows": [["1.5", "x"]]}
    unequal = [
        {"results": {"flux": {"values": [1.0 + 1e-10, None], "unit": "mmol m-2 d-1"}}, "rows": [["1.5", "x"]]},
        {"results": {"flux": {"values": [1.0, 2.0], "unit": "mmol m-2 d-1"}}, "rows": [["1.5", "x"]]},
        {"results": {"flux": {"values": [1.0], "unit": "mmol m-2 d-1"}}, "rows": [["1.5", "x"]]},
        {"results": {"flux": {"values": [1.0, None], "unit": "umol m-2 d-1"}}, "rows": [["1.5", "x"]]},
        {"results": {"flux": {"values": [1.0, None], "unit": "mmol m-2 d-1"}}, "rows": [["1.6", "x"]]},
        {"results": {}, "rows": [["1.5", "x"]]},
    ]

    assert same(before, before)
    assert not any(same(now, before) for now in unequal)
