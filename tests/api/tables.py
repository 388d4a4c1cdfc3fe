"""The table that these tests send, and how they read the one that comes back."""

from typing import Any

from flask.testing import FlaskClient
from werkzeug.test import TestResponse

from tests.api.questions import PER_SAMPLE, ROWS, rows

ADDED = [
    "flux [mmol m-2 d-1]",
    "evasion [mmol m-2 d-1]",
    "invasion [mmol m-2 d-1]",
    "transfer_velocity [cm h-1]",
    "schmidt_number [1]",
    "wind_speed_10m [m s-1]",
    "solubility [mol L-1 atm-1]",
    "fugacity_in_water [uatm]",
    "fugacity_in_air [uatm]",
    "fugacity_difference [uatm]",
    "quality_flag",
    "quality_reason",
]
COLUMN = "flux [mmol m-2 d-1]"


def ask(client: FlaskClient, content: bytes, query: str = "") -> TestResponse:
    return client.post(f"/v1/flux?gas=co2{query}", data=content)


def fluxes(answer: TestResponse, delimiter: str = ",") -> list[float | None]:
    return [float(row[COLUMN]) if row[COLUMN] else None for row in rows(answer, delimiter)]


def flags(answer: TestResponse, delimiter: str = ",") -> list[str]:
    return [row["quality_flag"] for row in rows(answer, delimiter)]


def renamed(**names: str) -> list[str]:
    return [names.get(name, name) for name in PER_SAMPLE]


def replaced(name: str, value: Any) -> list[list[Any]]:
    """Return the rows with another value in the second one."""
    second = [value if each == name else cell for each, cell in zip(PER_SAMPLE, ROWS[1], strict=True)]
    return [ROWS[0], second]
