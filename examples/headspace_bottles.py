"""Does a rack of lake bottles with a headspace, for methane, nitrous oxide and carbon dioxide.

Prints what was dissolved in the lake, the saturation, and the flux to the air, bottle by bottle with flags, the mean of
each station, and what was assumed. The rack that comes with it, headspace_rack.csv, is invented. For your own, change
what stands below. Needs nothing but Python. Exit status: 0 answered, 1 refused, 2 no service or no file.
"""

import argparse
import csv
import io
import json
import statistics
import sys
import urllib.error
import urllib.request
from collections.abc import Mapping
from dataclasses import dataclass
from pathlib import Path
from urllib.parse import urlencode

RACK = {
    "water": "lake",
    "parameterisation": "cole-caraco-1998",
    "wind_height": "2",  # m, on the pier
    "air_pressure": "@lake_hPa",
    "equilibrator_temperature": "@lab_C",  # where the bottles were shaken: read it, the lake is no stand-in
    "equilibrator_pressure": "@lab_hPa",
    "headspace_ratio": "@gas_per_water",  # volumes; this script divides gas_mL by water_mL
}


@dataclass(frozen=True)
class Species:
    """A gas: its column, what the air and so the headspace held of it, and the units to print."""

    name: str
    column: str
    air: str  # umol mol-1, lake air, with which the headspaces were filled too
    concentration: str
    flux: str


SPECIES = (
    Species("ch4", "ch4_ppm", "2.02", "nmol L-1", "umol m-2 d-1"),
    Species("n2o", "n2o_ppm", "0.338", "nmol L-1", "umol m-2 d-1"),
    Species("co2", "co2_ppm", "431", "umol L-1", "mmol m-2 d-1"),
)
FLAGS = {"1": "good", "3": "suspect", "4": "bad", "9": "missing"}
Row = dict[str, str]


class Stop(Exception):
    """A reason to end, in one line, and the exit status."""

    def __init__(self, reason: str, status: int) -> None:
        super().__init__(reason)
        self.status = status


def read_table(body: bytes) -> list[Row]:
    """Return the rows, by column name without its unit."""
    lines = csv.reader(io.StringIO(body.decode("utf-8-sig"), newline=""))
    names = [name.partition(" [")[0] for name in next(lines, [])]
    return [dict(zip(names, cells, strict=False)) for cells in lines if cells]


def with_ratio(body: bytes) -> bytes:
    """Return the table with the ratio of the volumes behind it."""
    lines = body.decode("utf-8-sig").splitlines()
    try:
        ratios = [f"{float(row['gas_mL']) / float(row['water_mL']):.6g}" for row in read_table(body)]
    except (KeyError, ValueError, ZeroDivisionError) as error:
        raise Stop(f"gas_mL and water_mL must be volumes in every row: {error}", 1) from error
    added = [f"{line},{cell}" for line, cell in zip(lines, ["gas_per_water", *ratios], strict=True)]
    return "\n".join([*added, ""]).encode()


def ask(url: str, species: Species, body: bytes, more: Mapping[str, str]) -> tuple[list[Row], Mapping[str, str]]:
    """Return the answered rows for a gas, and the headers of the answer."""
    question = {
        "gas": species.name,
        "water_mole_fraction": f"@{species.column}",
        "headspace_start_mole_fraction": species.air,
        "air_mole_fraction": species.air,
        "pick": "concentration_in_water;saturation;flux",
        "unit.concentration_in_water": species.concentration,
        "unit.flux": species.flux,
        **RACK,
        **more,
    }
    address = f"{url.rstrip('/')}/v1/flux?{urlencode(question)}"
    request = urllib.request.Request(address, body, {"Content-Type": "text/csv"})
    try:
        with urllib.request.urlopen(request, timeout=60) as response:
            return read_table(response.read()), response.headers
    except urllib.error.HTTPError as error:
        raise Stop(f"{species.name} refused with {error.code}: {refusal(error.read())}", 1) from error
    except (OSError, ValueError) as error:
        raise Stop(f"no service answers at {url}: is it running? Start it with: catspaw serve", 2) from error


def refusal(body: bytes) -> str:
    """Return what a problem document says."""
    try:
        return str(json.loads(body)["detail"])
    except (ValueError, KeyError, TypeError):
        return body[:200].decode(errors="replace")


def figure(text: str, width: int) -> str:
    """Return a result to four figures, a dash where there is none."""
    return f"{float(text):{width}.4g}" if text else f"{'-':>{width}}"


def of_station(rows: list[Row], name: str) -> str:
    """Return mean and scatter of the bottles of a station that have a result."""
    numbers = [float(row[name]) for row in rows if row[name]]
    if not numbers:
        return "none"
    scatter = f"+-{statistics.stdev(numbers):.2g}" if len(numbers) > 1 else "one bottle"
    return f"{statistics.fmean(numbers):.4g} {scatter}"


def report(url: str, species: Species, body: bytes, more: Mapping[str, str]) -> list[str]:
    """Return the lines about a gas."""
    rows, headers = ask(url, species, body, more)
    lines = [
        f"{species.name}: dissolved [{species.concentration}], saturation [%], flux to the air [{species.flux}]",
        f"  {'bottle':<8}{'ppm':>9}{'dissolved':>11}{'saturation':>12}{'flux':>10}  flag",
    ]
    for row in rows:
        numbers = f"{figure(row['concentration_in_water'], 11)}{figure(row['saturation'], 12)}{figure(row['flux'], 10)}"
        reason = f": {row['quality_reason']}" if row["quality_reason"] else ""
        flag = row["quality_flag"]
        lines.append(f"  {row['bottle']:<8}{row[species.column]:>9}{numbers}  {flag} {FLAGS.get(flag, '')}{reason}")
    for station in dict.fromkeys(row["station"] for row in rows):
        own = [row for row in rows if row["station"] == station]
        dissolved, flux = of_station(own, "concentration_in_water"), of_station(own, "flux")
        lines.append(f"  {station:<24} dissolved {dissolved:<18} flux {flux}")
    return [*lines, f"  assumed: {headers.get('Catspaw-Assumed', 'not told')}", ""]


def without_alkalinity(url: str, body: bytes, more: Mapping[str, str]) -> str:
    """Return what the flux of carbon dioxide would be without alkalinity."""
    carbon = SPECIES[-1]
    with_it, _ = ask(url, carbon, body, more)
    without, _ = ask(url, carbon, body, {"ignore": "alkalinity", **more})
    pairs = [(float(a["flux"]), float(b["flux"])) for a, b in zip(with_it, without, strict=True) if a["flux"]]
    if not pairs:
        return "co2: no bottle has an alkalinity, so that its carbonate system was left out of every one"
    here, there = (statistics.fmean(numbers) for numbers in zip(*pairs, strict=True))
    return (
        f"co2 without the alkalinity of these {len(pairs)} bottles: mean flux {there:.4g} instead of {here:.4g} "
        f"{carbon.flux} ({100.0 * (there - here) / abs(here):+.1f} %), every bottle flagged 3"
    )


def arguments() -> argparse.Namespace:
    parser = argparse.ArgumentParser(description="Do a rack of headspace bottles for three gases.")
    here = Path(__file__).with_name("headspace_rack.csv")
    parser.add_argument("file", nargs="?", type=Path, default=here, help="CSV file (default: the invented rack)")
    parser.add_argument("--url", default="http://127.0.0.1:8660", help="of the service (default: %(default)s)")
    parser.add_argument(
        "--set", action="append", default=[], metavar="NAME=VALUE", help="change or add to the question; repeatable"
    )
    return parser.parse_args()


def run(options: argparse.Namespace) -> None:
    more = dict(each.partition("=")[::2] for each in options.set)
    try:
        body = with_ratio(options.file.read_bytes())
    except OSError as error:
        raise Stop(f"cannot read {options.file}: {error.strerror}", 2) from error
    method = {**RACK, **more}["parameterisation"]
    lines = [f"{options.file.name}: {len(read_table(body))} bottles, transfer velocity by {method}", ""]
    for species in SPECIES:
        lines += report(options.url, species, body, more)
    lines.append(without_alkalinity(options.url, body, more))
    lines.append("ch4: what diffuses through the surface; bubbles that rise from the sediment are not in it")
    print("\n".join(lines))


if __name__ == "__main__":
    try:
        run(arguments())
    except Stop as stop:
        print(f"headspace_bottles: {stop}", file=sys.stderr)
        sys.exit(stop.status)
