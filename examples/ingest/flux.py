"""Gets one number, sends a file however long, and sums it up: the flux of carbon dioxide, with requests.

    flux.py [FILE] [--json] [--set NAME=VALUE] [--tries N]

The service is at CATSPAW_URL. It keeps no state, so any request may be sent again: a connection that fails and a 503
are, with a longer wait each time, or the one that Retry-After asks for. A long file goes in pieces, with a bar.
"""

import argparse
import csv
import io
import os
import statistics
import sys
from collections.abc import Iterable, Iterator, Mapping, Sequence
from pathlib import Path
from typing import Any

import requests
from requests.adapters import HTTPAdapter
from tqdm import tqdm
from urllib3.util import Retry

URL = os.environ.get("CATSPAW_URL", "http://127.0.0.1:8660")
QUESTION = {"gas": "co2"}  # of a file; the columns of stations.csv bear the names of the service, with their units
INPUTS = ("water_temperature", "salinity", "wind_speed", "air_pressure", "water_fugacity", "air_fugacity")
PIECE = 50_000  # rows
TRIES = 6  # after the first
PATIENCE = (5, 120)  # s, to connect and for each part of the answer


def session(tries: int) -> requests.Session:
    """Return a session that sends again what was not answered."""
    again = Retry(
        total=tries,
        backoff_factor=0.5,  # 0, 1, 2, 4 ... s
        status_forcelist=(502, 503, 504),
        allowed_methods=None,  # POST too
        respect_retry_after_header=True,
    )
    made = requests.Session()
    made.mount("http://", HTTPAdapter(max_retries=again))
    made.mount("https://", HTTPAdapter(max_retries=again))
    return made


def one_number(service: requests.Session) -> float:
    question: dict[str, str | float] = {
        "gas": "co2",
        "water_temperature": 18.4,
        "salinity": 35.1,
        "wind_speed": "15 kn",
        "water_fugacity": 372.4,
        "air_fugacity": 409.1,
        "form": "number",
    }
    return float(checked(service.get(f"{URL}/v1/flux", params=question, timeout=PATIENCE)).text)


def send_csv(service: requests.Session, piece: bytes, question: Mapping[str, str]) -> bytes:
    headers = {"Content-Type": "text/csv", "Accept": "text/csv"}
    for left in reversed(range(1 + TRIES)):
        try:
            posted = service.post(f"{URL}/v1/flux", params=question, data=piece, headers=headers, timeout=PATIENCE)
        except requests.exceptions.ChunkedEncodingError:  # broke off in the middle of the answer
            if not left:
                raise
        else:
            return checked(posted).content
    raise AssertionError


def send_json(service: requests.Session, piece: bytes, question: Mapping[str, str]) -> bytes:
    """Send the columns that are inputs as JSON, and return the flux and its flag as CSV."""
    rows = list(csv.DictReader(io.StringIO(piece.decode("utf-8-sig"), newline="")))
    asked: dict[str, Any] = dict(question)
    for header in rows[0]:
        name, _, unit = header.rstrip("]").partition(" [")
        if name in INPUTS:
            asked[name] = {"values": [number(row[header]) for row in rows]} | ({"unit": unit} if unit else {})
    answer = checked(service.post(f"{URL}/v1/flux", json=asked, timeout=PATIENCE)).json()
    flux = answer["results"]["flux"]
    lines = [f"flux [{flux['unit']}],quality_flag"]
    for value, flag in zip(flux["values"], answer["quality"]["flags"], strict=True):
        lines.append(f"{'' if value is None else value},{flag}")
    return "".join(f"{line}\n" for line in lines).encode()


def number(cell: str) -> float | None:
    try:
        return float(cell) if cell not in ("NaN", "nan") else None
    except ValueError:
        return None


def checked(answer: requests.Response) -> requests.Response:
    """Return an answer, or end with what the service says is wrong."""
    if answer.status_code == 200:
        return answer
    try:
        sys.exit(f"flux: {answer.json()['detail']}")
    except (ValueError, KeyError, TypeError):
        sys.exit(f"flux: {URL} answers {answer.status_code} {answer.reason}")


def pieces(lines: Iterable[bytes], rows: int = PIECE) -> Iterator[tuple[bytes, int]]:
    """Yield parts of a table, each under its header, with the bytes of the file behind them.

    A line ends a row unless it lies within quotes.
    """
    header = b""
    held: list[bytes] = []
    size = count = quotes = 0
    for line in lines:
        size += len(line)
        if not header:
            header = line
            continue
        held.append(line)
        quotes += line.count(b'"')
        count += quotes % 2 == 0
        if count == rows:
            yield header + b"".join(held), size
            held, size, count = [], 0, 0
    if held:
        yield header + b"".join(held), size


def answer_file(
    service: requests.Session, path: Path, target: Path, question: Mapping[str, str], as_json: bool
) -> None:
    """Send a file piece by piece; the answer takes its name when it is whole."""
    send = send_json if as_json else send_csv
    unfinished = target.with_suffix(".part")
    with path.open("rb") as lines, unfinished.open("wb") as kept, bar(path.stat().st_size) as told:
        for place, (piece, size) in enumerate(pieces(lines)):
            answered = send(service, piece, question)
            kept.write(answered if place == 0 else answered.partition(b"\n")[2])
            told.update(size)
    unfinished.replace(target)


def bar(size: int) -> "tqdm[Any]":
    return tqdm(total=size, unit="B", unit_scale=True, desc="answered", disable=None)  # None: only on a terminal


def summary(name: str, target: Path) -> str:
    with target.open(newline="", encoding="utf-8") as lines:
        table = csv.reader(lines)
        header = next(table)
        place = next(i for i, title in enumerate(header) if title.startswith("flux ["))
        flux = [row[place] for row in table]
    unit = header[place].partition("[")[2].rstrip("]")
    return f"{name}: {len(flux)} rows answered, {told_mean([float(cell) for cell in flux if cell], unit)}"


def told_mean(flux: Sequence[float], unit: str) -> str:
    return f"{len(flux)} with a flux, mean {statistics.fmean(flux):.4f} {unit}" if flux else "none with a flux"


if __name__ == "__main__":
    parser = argparse.ArgumentParser(description="Flux of carbon dioxide for a file of stations.")
    parser.add_argument("file", nargs="?", type=Path, default=Path(__file__).with_name("stations.csv"))
    parser.add_argument("--json", action="store_true", help="send and receive JSON")
    parser.add_argument("--set", action="append", default=[], metavar="NAME=VALUE", help="add to the question")
    parser.add_argument("--tries", type=int, default=TRIES, help="after the first one (default: %(default)s)")
    options = parser.parse_args()
    asked = QUESTION | dict(each.partition("=")[::2] for each in options.set)
    output = Path(f"{options.file.stem}_flux.csv")
    with session(options.tries) as connected:
        try:
            print(f"one number: {one_number(connected)} mmol m-2 d-1")
            answer_file(connected, options.file, output, asked, options.json)
        except requests.RequestException as error:
            sys.exit(f"flux: no answer from {URL}: {type(error).__name__}")
    print(summary(options.file.name, output))
