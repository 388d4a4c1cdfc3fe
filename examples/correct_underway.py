"""Takes a day of raw ship data to fluxes, and prints how much each correction moved the mean of the day.

First the true wind from what the anemometer felt, then the flux with every correction, then again with one of them left
out at a time. The file that comes with it, underway_day.csv, is invented. For your own, change WIND and FLUX below.
Needs nothing but Python. Exit status: 0 answered, 1 refused, 2 no service or no file.
"""

import argparse
import csv
import io
import json
import re
import statistics
import sys
import urllib.error
import urllib.request
from collections import Counter
from collections.abc import Mapping
from pathlib import Path
from typing import Any
from urllib.parse import urlencode

Question = dict[str, str | None]

WIND: Question = {
    "apparent_wind_speed": "@wind_rel_speed",  # m s-1
    "apparent_wind_direction": "@wind_rel_dir",  # from the bow; for a zero line elsewhere send anemometer_zero_line
    "course_over_ground": "@COG",
    "speed_over_ground": "@SOG",  # its unit, kn, stands in its header
    "pick": "true_wind_speed;true_wind_direction",
}
FLUX: Question = {
    "gas": "co2",
    "water": "ocean",
    "water_temperature": "@SST_intake",  # 5 m down, where the pump takes its water
    "subskin_temperature": "@SST_float",  # just below the skin: in a lull warmer than the intake
    "skin_correction": "donlon-2002",
    "wind_speed": "@true_wind_speed",
    "wind_height": "23",  # m
    "air_pressure": "@baro_hPa",
    "barometer_height": "18",  # m
    "water_mole_fraction": "@xCO2_equ",  # dry
    "equilibrator_temperature": "@T_equ",
    "equilibrator_pressure": "@P_equ",
    "temperature_correction": "takahashi-1993",
    "air_mole_fraction": "@xCO2_air",  # dry
    "pick": "flux;wind_speed_10m;fugacity_difference",
    "ignore": "quality_flag;quality_reason",  # of the wind: a row without wind is told again by the flux
}

# What each line leaves out; None takes an input away.
LEFT_OUT: dict[str, Question] = {
    "the ship's own motion": {"wind_speed": "@wind_rel_speed"},
    "height of the anemometer": {"wind_height": "10"},
    "height of the barometer": {"barometer_height": "0"},
    "warmth of the equilibrator": {"temperature_correction": "none"},
    "pressure of the equilibrator": {"equilibrator_pressure": None},
    "warm layer over the intake": {"subskin_temperature": None},
    "cool skin": {"skin_correction": "none"},
}
# What another laboratory may do differently with the same readings.
INSTEAD: dict[str, Question] = {
    "wind_profile large-pond-1981": {"wind_profile": "large-pond-1981"},
    "wind_profile power-law": {"wind_profile": "power-law"},
    "correction takahashi-2009": {"temperature_correction": "takahashi-2009"},
    "reaction in the boundary layer": {"chemical_enhancement": "hoover-berkshire-1969", "alkalinity": "2310 umol/kg"},
    "nightingale-2000": {"parameterisation": "nightingale-2000"},
}
READING = re.compile(r"(?<![\w.-])-?\d+\.\d+")
FLAGS = {"1": "good", "3": "suspect", "4": "bad, no result", "9": "missing, no result"}
Row = dict[str, str]


class Stop(Exception):
    """A reason to end, in one line, and the exit status."""

    def __init__(self, reason: str, status: int) -> None:
        super().__init__(reason)
        self.status = status


def post(url: str, quantity: str, question: Mapping[str, str | None], body: bytes) -> tuple[bytes, Mapping[str, str]]:
    """Return what the service answers to a table, and the headers of its answer."""
    sent = urlencode({name: value for name, value in question.items() if value is not None})
    request = urllib.request.Request(f"{url.rstrip('/')}/v1/{quantity}?{sent}", body, {"Content-Type": "text/csv"})
    try:
        with urllib.request.urlopen(request, timeout=120) as response:
            return response.read(), response.headers
    except urllib.error.HTTPError as error:
        raise Stop(f"refused with {error.code}: {refusal(error.read())}", 1) from error
    except (OSError, ValueError) as error:
        raise Stop(f"no service answers at {url}: is it running? Start it with: catspaw serve", 2) from error


def refusal(body: bytes) -> str:
    """Return what a problem document says."""
    try:
        return str(json.loads(body)["detail"])
    except (ValueError, KeyError, TypeError):
        return body[:200].decode(errors="replace")


def read_table(body: bytes) -> list[Row]:
    """Return the rows, by column name without its unit; of two columns of one name the last, which is the answer's."""
    lines = csv.reader(io.StringIO(body.decode("utf-8-sig"), newline=""))
    names = [name.partition(" [")[0] for name in next(lines, [])]
    return [dict(zip(names, cells, strict=False)) for cells in lines if cells]


def fluxes(rows: list[Row]) -> dict[int, float]:
    """Return the flux of the rows that have one."""
    return {number: float(row["flux"]) for number, row in enumerate(rows) if row["flux"]}


def mean(rows: list[Row], name: str) -> float:
    """Return the mean of a column over the rows that have a flux."""
    return statistics.fmean(float(row[name]) for row in rows if row["flux"])


def moved(every: dict[int, float], other: dict[int, float]) -> tuple[float, float, float]:
    """Return the mean of the other question, how far all corrections are from it, and the same in percent."""
    both = every.keys() & other.keys()
    if not both:
        raise Stop("answered, but without a flux in any row: look at the reasons in the output", 1)
    here, there = (statistics.fmean(each[number] for number in both) for each in (every, other))
    return there, here - there, 100.0 * (here - there) / abs(here)


def report(url: str, body: bytes, question: Question) -> tuple[str, bytes]:
    """Return the whole report, and the answered table."""
    with_wind, _ = post(url, "true-wind", WIND, body)
    answered, headers = post(url, "flux", question, with_wind)
    rows = read_table(answered)
    every = fluxes(rows)
    if not every:
        raise Stop("answered, but without a flux in any row: look at the reasons in the output", 1)
    flags = Counter(row["quality_flag"] for row in rows)
    lines = [
        f"{len(rows)} rows, {len(every)} with a flux: "
        + ", ".join(f"{count} {FLAGS.get(flag, flag)}" for flag, count in sorted(flags.items())),
        f"wind felt {mean(rows, 'wind_rel_speed'):.1f} m/s, true {mean(rows, 'true_wind_speed'):.1f}, "
        f"at 10 m {mean(rows, 'wind_speed_10m'):.1f}; fugacity, water less air "
        f"{mean(rows, 'fugacity_difference'):.1f} uatm",
        "",
        "flux of carbon dioxide [mmol m-2 d-1], positive out of the water, mean of the day",
        f"  {'with all corrections':<32}{statistics.fmean(every.values()):8.3f}",
    ]

    def ask_again(change: Question) -> tuple[float, float, float]:
        return moved(every, fluxes(read_table(post(url, "flux", question | change, with_wind)[0])))

    lines += ["", f"  {'left out, one at a time':<32}{'mean':>8}  {'moved it by':>11}"]
    everything = {name: value for change in LEFT_OUT.values() for name, value in change.items()}
    for name, change in {**LEFT_OUT, "all of these": everything}.items():
        there, shift, percent = ask_again(change)
        lines.append(f"  {name:<32}{there:8.3f}  {shift:+11.3f}{percent:+8.1f} %")
    lines += ["", f"  {'done differently, one at a time':<32}{'mean':>8}  {'differs by':>11}"]
    for name, change in INSTEAD.items():
        there, shift, percent = ask_again(change)
        lines.append(f"  {name:<32}{there:8.3f}  {-shift:+11.3f}{-percent:+8.1f} %")
    doubtful = [row["quality_reason"] for row in rows if row["quality_flag"] != "1"]
    reasons = Counter(READING.sub("…", part) for told in doubtful for part in told.split("; "))
    lines += ["", "why rows are not flagged good (… stands for a reading)"]
    lines += [f"  {count:5}  {reason}" for reason, count in reasons.most_common()]
    for title, header in (("assumed", "Catspaw-Assumed"), ("methods", "Catspaw-Methods")):
        lines += ["", title, *(f"  {item}" for item in headers.get(header, "not told").split("; "))]
    return "\n".join(lines), answered


def steps(url: str, body: bytes, question: Question, number: int) -> str:
    """Return the calculation of one data row, step by step."""
    lines = post(url, "true-wind", WIND, body)[0].splitlines()
    if not 1 <= number < len(lines):
        raise Stop(f"there is no data row {number}: 1 to {len(lines) - 1}", 1)
    one = b"\n".join([lines[0], lines[number], b""])
    told: dict[str, Any] = json.loads(post(url, "flux", question | {"detail": "steps", "form": "json"}, one)[0])
    out = [f"data row {number}, step by step"]
    for each in told["steps"]:
        (value,) = each["values"]
        at = "".join(f", {old} that of {new}" for old, new in each.get("evaluated_with", {}).items())
        shown = "no number" if value is None else f"{value:.7g}"
        out.append(f"  {each['name']:<34}{shown:>14} {each['unit']:<16}{each['formula']}{at}")
    return "\n".join([*out, *(f"  flag: {reason}" for reason in told["quality"]["reasons"][0])])


def arguments() -> argparse.Namespace:
    parser = argparse.ArgumentParser(description="Take raw underway data to fluxes, and tell what each correction did.")
    here = Path(__file__).with_name("underway_day.csv")
    parser.add_argument("file", nargs="?", type=Path, default=here, help="CSV file (default: the invented day)")
    parser.add_argument("--url", default="http://127.0.0.1:8660", help="of the service (default: %(default)s)")
    parser.add_argument("--output", type=Path, help="where the answered table goes (default: nowhere)")
    parser.add_argument("--row", type=int, help="show the calculation of this data row instead")
    parser.add_argument(
        "--set", action="append", default=[], metavar="NAME=VALUE", help="change or add to FLUX; repeatable"
    )
    return parser.parse_args()


def run(options: argparse.Namespace) -> None:
    question: Question = FLUX | dict(each.partition("=")[::2] for each in options.set)
    try:
        body = options.file.read_bytes()
    except OSError as error:
        raise Stop(f"cannot read {options.file}: {error.strerror}", 2) from error
    if options.row is not None:
        print(steps(options.url, body, question, options.row))
        return
    told, answered = report(options.url, body, question)
    print(f"{options.file.name}\n{told}")
    if options.output:
        options.output.write_bytes(answered)


if __name__ == "__main__":
    try:
        run(arguments())
    except Stop as stop:
        print(f"correct_underway: {stop}", file=sys.stderr)
        sys.exit(stop.status)
