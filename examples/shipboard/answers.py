"""Intervals to the service and answered lines back, as one CSV batch."""

import csv
import io
import os
from collections.abc import Mapping, Sequence

import requests
from averages import COLUMNS, Row

PATIENCE = (5.0, 120.0)  # s, to connect and for each part of the answer
FELT = {
    name: COLUMNS[name]
    for name in (
        "time",
        "apparent_wind_speed",
        "apparent_wind_direction",
        "heading",
        "course_over_ground",
        "speed_over_ground",
    )
}


class Unavailable(Exception):
    """No answer now; the same question may be answered later."""

    def __init__(self, reason: str, wait: float = 0.0) -> None:
        super().__init__(reason)
        self.wait = wait


class Refused(Exception):
    """The service answers, but not this question."""


class Service:
    """Asks the service for the flux of many intervals at once."""

    def __init__(self, url: str, question: Mapping[str, str]) -> None:
        self.url, self.question = url.rstrip("/"), dict(question)
        self._headers = {"Content-Type": "text/csv", "Accept": "text/csv, application/json;q=0.5"}
        if token := os.environ.get("CATSPAW_TOKEN"):
            self._headers["Authorization"] = f"Bearer {token}"

    def flux(self, rows: Sequence[Row]) -> tuple[str, list[str]]:
        """Return the header and one line for each row, its own cells first.

        Raises
        ------
        Unavailable
            Where there is no answer, or half of one.
        Refused
            With the words of the service.
        """
        sent = table(self._with_true_wind(rows), COLUMNS)
        answered = self._post("/v1/flux", sent, self.question).splitlines()
        asked = sent.splitlines()
        whole = len(answered) == len(asked)
        if not whole or not all(a.startswith(f"{q},") for q, a in zip(asked, answered, strict=True)):
            raise Unavailable(f"{self.url} answered {len(answered)} lines to {len(asked)}, or others than were sent")
        return answered[0], answered[1:]

    def _with_true_wind(self, rows: Sequence[Row]) -> list[Row]:
        """Return the rows with the true wind from the felt one, where no sentence gave it and the service can."""
        lacking = [row for row in rows if not row["wind_speed"] and row["apparent_wind_speed"]]
        if not lacking or "true-wind" not in self._quantities():
            return list(rows)
        answer = self._post("/v1/true-wind", table(lacking, FELT), {"headers": "plain"})
        winds = {
            each["time"]: {"wind_speed": each["true_wind_speed"], "wind_from": each["true_wind_direction"]}
            for each in csv.DictReader(io.StringIO(answer))
        }
        return [row | winds.get(row["time"], {}) for row in rows]

    def _quantities(self) -> Mapping[str, object]:
        answer = self._ask("GET", "/v1", b"", {})
        try:
            listed = answer.json()["quantities"]
        except (ValueError, KeyError, TypeError) as error:
            raise Unavailable(f"{self.url}/v1 does not list what it answers") from error
        return listed if isinstance(listed, dict) else {}

    def _post(self, path: str, body: str, question: Mapping[str, str]) -> str:
        return self._ask("POST", path, body.encode(), question).content.decode()

    def _ask(self, method: str, path: str, body: bytes, question: Mapping[str, str]) -> requests.Response:
        try:
            # Each on a connection of its own: one kept open since the last interval may be gone by now.
            answer = requests.request(
                method, self.url + path, params=question, data=body, headers=self._headers, timeout=PATIENCE
            )
        except requests.RequestException as error:
            raise Unavailable(f"no answer from {self.url}: {type(error).__name__}") from error
        if answer.status_code >= 500 or answer.status_code in (408, 429):
            raise Unavailable(f"{self.url} answers {answer.status_code}", seconds(answer.headers.get("Retry-After")))
        if answer.status_code != 200:
            raise Refused(refusal(answer))
        return answer


def table(rows: Sequence[Row], columns: Mapping[str, str]) -> str:
    """Return rows as CSV under the headers of some columns; no cell of theirs needs a quote."""
    lines = [",".join(columns.values()), *(",".join(row.get(name, "") for name in columns) for row in rows)]
    return "".join(f"{line}\n" for line in lines)


def seconds(retry_after: str | None) -> float:
    return float(retry_after) if retry_after and retry_after.isdigit() else 0.0


def refusal(answer: requests.Response) -> str:
    try:
        return f"{answer.status_code}: {answer.json()['detail']}"
    except (ValueError, KeyError, TypeError):
        return f"{answer.status_code} {answer.reason}"
