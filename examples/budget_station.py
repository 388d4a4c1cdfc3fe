"""Asks a running service for the annual carbon dioxide flux at a station: how much, how sure, what drives the doubt.

Everything here is INVENTED: no such station exists, and every number of its year comes out of `invented_year` below.
For data of your own, put them in the place of that function. Exit status: 0 answered, 1 refused, 2 no service.
"""

import argparse
import math
import sys
from collections.abc import Mapping
from datetime import date, timedelta
from typing import Any

import requests

YEAR = 2025
AREA = 250.0  # km2, of the invented bay for which the station stands
DAYS_PER_YEAR = 365.2425
METHODS = ("wanninkhof-2014", "nightingale-2000", "ho-2006")  # the first for the budget, all for their spread
# Standard uncertainties, in the unit of each input. A sensor that reads too high does so every day: a common error.
UNCERTAINTY = {
    "water_temperature": 0.05,
    "salinity": 0.05,
    "wind_speed": 0.4,
    "water_partial_pressure": 3.0,
    "air_mole_fraction": 0.3,
    "air_pressure": 0.5,
}
COMMON = ("wind_speed", "water_partial_pressure")
UNPUBLISHED = 3.0  # %, our own figure for methods that publish none, here the Schmidt number
OUTAGE = range(205, 224)  # days without the station: a lost mooring line, invented like the rest


class Stop(Exception):
    """A reason to end, in one line, and the exit status."""

    def __init__(self, reason: str, status: int) -> None:
        super().__init__(reason)
        self.status = status


def invented_year() -> dict[str, list[Any]]:
    """Return daily values of an invented year, with gaps; the same numbers each time."""
    names = ("time", "water_temperature", "salinity", "wind_speed", "water_partial_pressure", "air_mole_fraction")
    year: dict[str, list[Any]] = {name: [] for name in (*names, "air_pressure")}
    for day in range(365):
        if day in OUTAGE:
            continue
        season = math.cos(2.0 * math.pi * (day - 45) / 365.0)  # 1 in the cold of mid February
        weather = math.sin(0.9 * day) + math.sin(2.3 * day + 1.0) + 0.6 * math.sin(0.23 * day)
        bloom = math.exp(-(((day - 125) / 28.0) ** 2))
        temperature = 12.5 - 5.5 * season + 0.3 * weather
        pressure = 396.0 + 9.0 * (temperature - 12.5) - 75.0 * bloom + 4.0 * weather
        year["time"].append((date(YEAR, 1, 1) + timedelta(days=day)).isoformat())
        year["water_temperature"].append(round(temperature, 2))
        year["salinity"].append(round(34.2 + 0.3 * season, 2))
        year["wind_speed"].append(None if day % 61 == 17 else round(max(7.2 + 1.9 * season + 1.6 * weather, 0.4), 1))
        year["water_partial_pressure"].append(None if day % 47 == 30 else round(pressure, 1))
        year["air_mole_fraction"].append(round(424.0 + 3.0 * season, 1))
        year["air_pressure"].append(round(1013.0 - 6.0 * weather, 1))
    return year


def ask(url: str, **question: Any) -> Any:
    """Return the service's answer to a question about the flux."""
    address = f"{url.rstrip('/')}/v1/flux"
    try:
        response = requests.post(address, json=question, timeout=60)
    except requests.RequestException as error:
        raise Stop(f"no service answers at {url}: is it running? Start it with: catspaw serve", 2) from error
    if response.status_code != 200:
        raise Stop(f"refused: {response.json().get('detail', response.text)[:300]}", 1)
    return response.json()


def sure(value: float, u: float, unit: str) -> str:
    """Return a value with its standard uncertainty, both to the place of the second digit of the latter."""
    places = max(1 - math.floor(math.log10(u)), 0) if u > 0.0 else 3
    return f"{value:.{places}f} +- {u:.{places}f} {unit}"


def months(answer: Any, times: list[str]) -> list[str]:
    """Return a line for each month: days with a flux, and means of what makes it."""
    results = answer["results"]
    lines = ["month  days     flux       k   water - air    wind"]
    for month in range(1, 13):
        rows = [row for row, time in enumerate(times) if int(time[5:7]) == month]
        rows = [row for row in rows if results["flux"]["values"][row] is not None]
        means = [
            sum(results[name]["values"][row] for row in rows) / len(rows) if rows else math.nan
            for name in ("flux", "transfer_velocity", "fugacity_difference", "wind_speed_10m")
        ]
        lines.append(
            f"   {month:2d}   {len(rows):3d}   {means[0]:6.2f}  {means[1]:6.1f}        {means[2]:6.1f}  {means[3]:6.1f}"
        )
    return [*lines, "  flux mmol m-2 d-1, positive out of the water; k cm h-1; water - air uatm; wind m s-1 at 10 m"]


def report(answer: Any, spread: Any, times: list[str]) -> list[str]:
    """Return what a practitioner would want to read."""
    summary, flux = answer["summary"], answer["summary"]["results"]["flux"]
    mean, mass = flux["mean"], flux["mass"]
    days = summary["covered"]["value"]
    year = DAYS_PER_YEAR / days  # the gaps are taken to be like the rest of the year
    tonnes = mass["value"] / 1000.0 * year
    per_kilogram = year / 1000.0
    unit = f"t {mass['mass_of']} yr-1"
    lines = [
        "INVENTED station in an invented bay: a year of co2 flux",
        f"period   {summary['start']['utc'][:10]} to {summary['end']['utc'][:10]}, {len(times)} daily rows",
        f"covered  {days:.0f} d ({100.0 * summary['fraction_covered']:.0f}%) by {summary['samples']} rows, "
        f"{summary['left_out']} left out; longest gap {summary['longest_gap']['value']:.0f} d",
        "",
        *months(answer, times),
        "",
        f"mean     {sure(mean['value'], mean['u'], mean['unit'])}",
        f"a year   {sure(mean['value'] * DAYS_PER_YEAR / 1000.0, mean['u'] * DAYS_PER_YEAR / 1000.0, 'mol m-2 yr-1')}",
        f"the bay  {sure(tonnes, mass['u'] * per_kilogram, unit)} over {AREA:g} km2",
        "  negative is into the water; +- one standard uncertainty; gaps taken to be like the rest",
        "",
        "what makes the doubt of the year (shares of u squared)",
    ]
    for name, share in sorted(flux["budget"].items(), key=lambda each: -abs(each[1])):
        kind = "common" if ":" in name or name in summary["uncertainty"]["common"] else "each day its own"
        lines.append(f"  {100.0 * share:5.1f}%  {name} ({kind})")
    independent, common = (mass[name] * per_kilogram for name in ("u_independent", "u_common"))
    lines += [
        f"  {independent:.1f} t would shrink with more days, {common:.0f} t would not",
        "",
        "by other parameterisations",
    ]
    for name, each in spread["summary"]["by_parameterisation"].items():
        lines.append(f"  {each['results']['flux']['mass']['value'] / 1000.0 * year:8.1f} t  {name}")
    between = spread["summary"]["results"]["flux"]["mass"]
    lines.append(
        f"  {between['value'] * per_kilogram:8.1f} t  their mean; between them {between['spread'] * per_kilogram:.1f} t"
    )
    return lines


def question() -> dict[str, Any]:
    """Return what is asked: the year, the area, and how to sum it up."""
    return {
        "gas": "co2",
        "water": "coastal",
        "wind_height": 4.0,  # m, of the buoy
        "summary": 1,
        "area": {"values": AREA, "unit": "km2"},
        "mass_as": "element",
        **invented_year(),
    }


def doubts() -> Mapping[str, Any]:
    """Return what is said of uncertainty."""
    return {
        **{f"u_{name}": u for name, u in UNCERTAINTY.items()},
        "common": list(COMMON),
        "u_unpublished": UNPUBLISHED,
    }


def main() -> int:
    parser = argparse.ArgumentParser(description="The annual flux at an invented station, from a running service.")
    parser.add_argument("--url", default="http://127.0.0.1:8660", help="where the service is")
    url = parser.parse_args().url
    asked = question()
    try:
        answer = ask(url, **asked, **doubts(), parameterisation=METHODS[0])
        spread = ask(url, **asked, parameterisation=list(METHODS), pick="flux")
    except Stop as stop:
        print(stop, file=sys.stderr)
        return stop.status
    print("\n".join(report(answer, spread, asked["time"])))
    return 0


if __name__ == "__main__":
    sys.exit(main())
