"""The questions that these tests ask, their numbers invented, and how they read the answers."""

import csv
import io
import json
from typing import Any
from urllib.parse import urlencode

from werkzeug.test import TestResponse

FLUX: dict[str, Any] = {
    "gas": "co2",
    "water_temperature": 18.4,
    "salinity": 35.1,
    "air_pressure": 1008.2,
    "wind_speed": 7.5,
    "wind_height": 18.0,
    "water_mole_fraction": 380.0,
    "air_mole_fraction": 419.0,
}
QUESTIONS: dict[str, dict[str, Any]] = {
    "solubility": {"gas": "n2o", "water_temperature": 18.4, "salinity": 35.1, "air_mole_fraction": 0.336},
    "schmidt-number": {"gas": "ch4", "water_temperature": 18.4, "salinity": 35.1},
    "transfer-velocity": {"gas": "co2", "water_temperature": 18.4, "salinity": 35.1, "wind_speed": 7.5},
    "flux": FLUX,
    "equilibration": {
        "gas": "o2",
        "water_temperature": 18.4,
        "salinity": 35.1,
        "wind_speed": 7.5,
        "mixed_layer_depth": 40.0,
    },
}
PER_SAMPLE = [name for name in FLUX if name != "gas"]

# Rows of an invented cruise: nothing in them is out of the ordinary.
ROWS = [[18.4, 35.1, 1008.2, 7.5, 18.0, 380.0, 419.0], [12.0, 34.0, 990.5, 11.25, 18.0, 402.5, 419.5]]


def address(quantity: str, inputs: dict[str, Any], **more: Any) -> str:
    """Return the address that asks for a quantity; a list is written with semicolons."""
    merged = {**inputs, **more}
    texts = {name: ";".join(map(str, v)) if isinstance(v, list) else str(v) for name, v in merged.items()}
    return f"/v1/{quantity}?{urlencode(texts)}"


def flux(**more: Any) -> str:
    """Return the address that asks for the flux, with some inputs changed or, if None, left out."""
    merged = {**FLUX, **more}
    return address("flux", {name: value for name, value in merged.items() if value is not None})


def body(**more: Any) -> bytes:
    """Return the JSON body that asks for the flux, with some inputs changed or added."""
    return json.dumps({**FLUX, **more}).encode()


def table(rows: list[list[Any]] | None = None, names: list[str] | None = None, delimiter: str = ",") -> bytes:
    """Return a CSV body."""
    lines = [names or PER_SAMPLE, *(rows or ROWS)]
    return "".join(delimiter.join(map(str, line)) + "\n" for line in lines).encode()


def values(response: TestResponse, name: str) -> list[float | None]:
    """Return a result from a JSON answer."""
    assert response.status_code == 200, response.text
    found: list[float | None] = response.get_json()["results"][name]["values"]
    return found


def number(response: TestResponse, name: str) -> float:
    """Return the only value of a result from a JSON answer."""
    (value,) = values(response, name)
    assert value is not None, response.text
    return value


def quality(response: TestResponse) -> list[tuple[int, list[str]]]:
    """Return flag and reasons of each sample of a JSON answer."""
    assert response.status_code == 200, response.text
    told = response.get_json()["quality"]
    return list(zip(told["flags"], told["reasons"], strict=True))


def rows(response: TestResponse, delimiter: str = ",") -> list[dict[str, str]]:
    """Return the rows of a CSV answer by their headers."""
    assert response.status_code == 200, response.text
    return list(csv.DictReader(io.StringIO(response.text), delimiter=delimiter, strict=True))


def problem(response: TestResponse, status: int = 422) -> dict[str, Any]:
    """Return a problem document."""
    assert response.status_code == status, response.text
    assert response.mimetype == "application/problem+json"
    found: dict[str, Any] = response.get_json()
    return found


def faults(response: TestResponse, status: int = 422) -> list[tuple[str, str]]:
    """Return code and name of each error of a problem document."""
    return [(each["code"], each["name"]) for each in problem(response, status)["errors"]]
