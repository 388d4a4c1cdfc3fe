"""Sends an underway file to a running service, keeps the answer, and prints what a marine chemist would ask of it.

The file that comes with it, underway_cruise.csv, is an invented cruise. For your own, change QUESTION below.
Exit status: 0 answered, 1 refused, 2 no service or no file.
"""

import argparse
import csv
import io
import math
import re
import statistics
import sys
import time
from collections import Counter
from collections.abc import Mapping, Sequence
from datetime import datetime, timedelta
from itertools import pairwise
from pathlib import Path

import requests

QUESTION = {
    "gas": "co2",
    "water_temperature": "@SST",  # at the hull; the column water_temperature is of the laboratory, 0.3 degC warmer,
    "ignore": "water_temperature",  # and must not be used
    "air_pressure": "@baro_hPa",
    "barometer_height": "12",  # m
    "wind_height": "18",  # m; the unit of the wind, kn, stands in its header
    "water_mole_fraction": "@xCO2_sea",  # dry, at the temperature of the sea
    "air_mole_fraction": "@xCO2_air",  # dry
    # `water` is left out on purpose: one word cannot be true of the shelf and of the river mouth.
}
BEHIND_THE_FLUX = ("SST", "salinity", "wind_speed", "baro_hPa", "xCO2_sea", "xCO2_air")
FLAGS = {"1": "good", "3": "suspect", "4": "bad, no result", "9": "missing, no result"}
NUMBER = re.compile(r"(?<![\w.-])-?\d+(?:\.\d+)?(?:e[+-]?\d+)?(?![\w-])")  # not the year in author-1999
PLACE = "\0"  # stands for a number in a sentence

Row = dict[str, str]


class Stop(Exception):
    """A reason to end, in one line, and the exit status."""

    def __init__(self, reason: str, status: int) -> None:
        super().__init__(reason)
        self.status = status


def send(body: bytes, url: str, question: Mapping[str, str]) -> tuple[bytes, Mapping[str, str], float]:
    """Return the answered table, the headers of the answer, and the seconds it took."""
    began = time.monotonic()
    address = f"{url.rstrip('/')}/v1/flux"
    try:
        with requests.post(
            address,
            params=question,
            data=body,
            headers={"Content-Type": "text/csv", "Accept": "text/csv"},
            timeout=(5, 120),
            stream=True,
        ) as response:
            if response.status_code != 200:
                raise Stop(refusal(response), 1)
            answered, rows = bytearray(), -1  # the header line is no row
            for piece in response.iter_content(1 << 16):
                answered += piece
                rows += piece.count(b"\n")
                if sys.stderr.isatty():
                    print(f"\r{rows} rows answered", end="", file=sys.stderr)
    except ValueError as error:  # requests tells so of an address it cannot use
        raise Stop(f"{url} is no address of a service, such as http://127.0.0.1:8660", 2) from error
    except requests.ConnectionError as error:
        raise Stop(f"no service answers at {url}: is it running? Start it with: catspaw serve", 2) from error
    except requests.Timeout as error:
        raise Stop(f"the service at {url} did not answer in time", 2) from error
    except requests.RequestException as error:
        raise Stop(f"the answer from {url} broke off: {error}", 2) from error
    if sys.stderr.isatty():
        print(file=sys.stderr)
    return bytes(answered), response.headers, time.monotonic() - began


def refusal(response: requests.Response) -> str:
    """Return what a problem document says, or the status where the answer is none."""
    try:
        problem = response.json()
        detail = problem["detail"]
    except (ValueError, KeyError, TypeError):
        return f"refused with {response.status_code} {response.reason}"
    told = [f"refused with {response.status_code}: {detail}"]
    errors = problem.get("errors", [])
    if len(errors) > 1:
        told += [f"  {each.get('name')} {each.get('reason')}" for each in errors]
    return "\n".join(told)


def read_table(body: bytes) -> list[Row]:
    """Return the rows, by column name without its unit."""
    lines = csv.reader(io.StringIO(body.decode("utf-8-sig"), newline=""))
    names = [name.partition(" [")[0] for name in next(lines, [])]
    return [dict(zip(names, cells, strict=False)) for cells in lines if cells]


def unit_of(body: bytes, name: str) -> str:
    """Return the unit that stands behind a name in the header line."""
    header = next(csv.reader(io.StringIO(body.decode("utf-8-sig"), newline="")))
    return next((cell.partition(" [")[2].rstrip("]") for cell in header if cell.partition(" [")[0] == name), "")


def numbers(rows: Sequence[Row], name: str) -> list[float]:
    """Return the numbers of a column; blanks and marks are left out."""
    found = []
    for row in rows:
        try:
            value = float(row.get(name, ""))
        except ValueError:
            continue
        if math.isfinite(value):
            found.append(value)
    return found


def times_of(rows: Sequence[Row]) -> list[datetime]:
    """Return the column `time`."""
    times = []
    for number, row in enumerate(rows, start=1):
        try:
            times.append(datetime.fromisoformat(row.get("time", "")))
        except ValueError:
            reason = f"answered and kept, but not summed up: data row {number} has no ISO 8601 time in a column time"
            raise Stop(reason, 1) from None
    return times


def durations(times: Sequence[datetime]) -> list[timedelta]:
    """Return the time each row stands for: until the next one, but never more than twice the usual spacing."""
    gaps = [later - earlier for earlier, later in pairwise(times)]
    longest = 2 * sorted(gaps)[len(gaps) // 2] if gaps else timedelta(0)
    return [*(min(gap, longest) for gap in gaps), timedelta(0)]


def grouped(reasons: Sequence[str]) -> list[tuple[int, str]]:
    """Return sentences that differ in their numbers alone as one, with how often it was said, most often first."""
    groups: dict[str, list[list[str]]] = {}
    for reason in reasons:
        groups.setdefault(NUMBER.sub(PLACE, reason), []).append(NUMBER.findall(reason))
    told = []
    for pattern, found in groups.items():
        ranges = iter([(min(each, key=float), max(each, key=float)) for each in zip(*found, strict=True)])
        pieces = pattern.split(PLACE)
        text = pieces[0]
        for (low, high), piece in zip(ranges, pieces[1:], strict=False):
            text += (low if low == high else f"({low} to {high})") + piece
        told.append((len(found), text))
    return sorted(told, key=lambda each: (-each[0], each[1]))


def hours(time_span: timedelta) -> str:
    return f"{time_span / timedelta(hours=1):.1f} h"


def span(values: Sequence[float], places: int = 2) -> str:
    return f"{min(values):.{places}f} to {max(values):.{places}f}" if values else "none"


def mean(values: Sequence[float]) -> str:
    return f"{statistics.fmean(values):.1f}" if values else "-"


def means(title: str, rows: Sequence[Row], covered: timedelta, period: timedelta) -> str:
    """Return the line of the table of means for some rows."""
    flux = numbers(rows, "flux")
    if not flux:
        return f"  {title:<22}none"
    share = f" ({covered / period:.0%})" if period else ""
    return (
        f"  {title:<22}{statistics.fmean(flux):8.2f}  {span(flux):<18}"
        f"{mean(numbers(rows, 'transfer_velocity')):>8}{mean(numbers(rows, 'wind_speed_10m')):>9}"
        f"{len(flux):7}  {hours(covered)}{share}"
    )


def report(body: bytes, answered: bytes, headers: Mapping[str, str], question: Mapping[str, str]) -> str:
    """Return the whole report as text."""
    rows = read_table(answered)
    with_flux = [row for row in rows if row["flux"]]
    times = times_of(rows)
    each, period = durations(times), times[-1] - times[0]

    def covered(flags: str) -> timedelta:
        kept = (long for long, row in zip(each, rows, strict=True) if row["flux"] and row["quality_flag"] in flags)
        return sum(kept, timedelta(0))

    direction = "into" if question.get("positive") == "downward" else "out of"
    k_unit, wind_unit = unit_of(answered, "transfer_velocity"), unit_of(answered, "wind_speed_10m")
    lines = [
        f"period    {rows[0]['time']} to {rows[-1]['time']}, {hours(period)}",
        f"position  latitude {span(numbers(rows, 'latitude'))}, longitude {span(numbers(rows, 'longitude'))}",
        f"rows      {len(read_table(body))} sent, {len(rows)} answered, {len(with_flux)} with a flux",
        "",
        f"flux of {question['gas']} [{unit_of(answered, 'flux')}], positive {direction} the water; means over rows",
        f"  {'':<22}{'mean':>8}  {'range':<18}{'k':>8}{'wind 10m':>9}{'rows':>7}  time covered",
        means("all with a flux", with_flux, covered("13"), period),
        means("good alone (flag 1)", [row for row in with_flux if row["quality_flag"] == "1"], covered("1"), period),
        f"  k in {k_unit}, wind in {wind_unit}",
        "",
        "inputs behind the flux",
        *(f"  {name:<12}{span(numbers(with_flux, name))}  {unit_of(answered, name)}" for name in BEHIND_THE_FLUX),
        "",
        "quality flag (IOC)",
    ]
    flags = Counter(row["quality_flag"] for row in rows)
    lines += [f"  {flag}  {flags[flag]:5}  {FLAGS.get(flag, '')}" for flag in sorted(flags)]
    lines += ["", "reasons (a good row may carry one, a row may carry several)"]
    reasons = [reason for row in rows for reason in row["quality_reason"].split("; ") if reason]
    lines += [f"  {count:5}  {reason}" for count, reason in grouped(reasons)]
    for title, header in (("assumed", "Catspaw-Assumed"), ("methods", "Catspaw-Methods")):
        lines += ["", title, *(f"  {item}" for item in headers.get(header, "not told").split("; "))]
    return "\n".join(line.rstrip() for line in lines)


def arguments() -> argparse.Namespace:
    parser = argparse.ArgumentParser(description="Send an underway file to the service and report the flux.")
    here = Path(__file__).with_name("underway_cruise.csv")
    parser.add_argument("file", nargs="?", type=Path, default=here, help="CSV file (default: the invented cruise)")
    parser.add_argument("--url", default="http://127.0.0.1:8660", help="of the service (default: %(default)s)")
    parser.add_argument("--output", type=Path, help="where the answer goes (default: <name>_flux.csv beside the file)")
    parser.add_argument(
        "--set", action="append", default=[], metavar="NAME=VALUE", help="change or add to the question; repeatable"
    )
    return parser.parse_args()


def run(options: argparse.Namespace) -> None:
    question = QUESTION | dict(each.partition("=")[::2] for each in options.set)
    output = options.output or options.file.with_name(f"{options.file.stem}_flux.csv")
    try:
        body = options.file.read_bytes()
    except OSError as error:
        raise Stop(f"cannot read {options.file}: {error.strerror}", 2) from error
    print(f"{options.file.name}: sending {len(body) / 1000:.0f} kB to {options.url}", flush=True)
    answered, headers, seconds = send(body, options.url, question)
    try:
        output.write_bytes(answered)
    except OSError as error:
        raise Stop(f"cannot write {output}: {error.strerror}", 2) from error
    print(f"{report(body, answered, headers, question)}\n\n{seconds:.2f} s; the answer, row by row: {output.name}")


if __name__ == "__main__":
    try:
        run(arguments())
    except Stop as stop:
        print(f"ingest_cruise: {stop}", file=sys.stderr)
        sys.exit(stop.status)
