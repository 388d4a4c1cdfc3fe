"""Readings to one row for each interval: means of numbers, and of vectors where there is a direction."""

import math
from collections.abc import Iterable
from dataclasses import dataclass, field
from datetime import UTC, datetime, timedelta

from instruments import Line, Reading

COLUMNS = {
    "time": "time",
    "interval": "interval [s]",
    "latitude": "latitude",
    "longitude": "longitude",
    "water_temperature": "water_temperature [degC]",
    "salinity": "salinity",
    "wind_speed": "wind_speed [m s-1]",
    "wind_from": "wind_from [degree]",
    "apparent_wind_speed": "apparent_wind_speed [m s-1]",
    "apparent_wind_direction": "apparent_wind_direction [degree]",
    "heading": "heading [degree]",
    "course_over_ground": "course_over_ground [degree]",
    "speed_over_ground": "speed_over_ground [m s-1]",
    "air_pressure": "air_pressure [hPa]",
    "water_mole_fraction": "water_mole_fraction [umol mol-1]",
    "equilibrator_temperature": "equilibrator_temperature [degC]",
    "equilibrator_pressure": "equilibrator_pressure [hPa]",
    "lines_refused": "lines_refused",
}
MEANS = (
    "water_temperature",
    "salinity",
    "air_pressure",
    "water_mole_fraction",
    "equilibrator_temperature",
    "equilibrator_pressure",
)
HEADING_LASTS = timedelta(seconds=5)  # an older heading is not that of the ship when the wind was read
PLACES = {"latitude": 6, "longitude": 6}  # decimals; all others 4
EPOCH = datetime(1970, 1, 1, tzinfo=UTC)

Row = dict[str, str]


@dataclass
class Vectors:
    """Vectors summed up by their components, east and north."""

    east: list[float] = field(default_factory=list)
    north: list[float] = field(default_factory=list)

    def add(self, length: float, degrees: float) -> None:
        self.east.append(length * math.sin(math.radians(degrees)))
        self.north.append(length * math.cos(math.radians(degrees)))

    def mean(self) -> tuple[float | None, float | None]:
        """Return length and direction of the mean; nothing where there is none."""
        east, north = mean(self.east), mean(self.north)
        if east is None or north is None:
            return None, None
        return math.hypot(east, north), math.degrees(math.atan2(east, north)) % 360.0


class Interval:
    """The readings of one interval; nothing of the one before, so that it comes out the same after a restart."""

    def __init__(self, start: datetime, length: timedelta) -> None:
        self.start, self.end = start, start + length
        self.refused = 0
        self._numbers: dict[str, list[float]] = {}
        self._last: Reading = {}
        self._heading: tuple[datetime, float] | None = None
        self._true, self._apparent, self._motion, self._bow = Vectors(), Vectors(), Vectors(), Vectors()

    @classmethod
    def around(cls, time: datetime, length: timedelta) -> "Interval":
        return cls(EPOCH + (time - EPOCH) // length * length, length)

    def add(self, line: Line) -> None:
        """Take the readings of a line."""
        self.refused += line.refused
        if line.time is None:
            return
        found = line.readings
        for name in MEANS:
            if name in found:
                self._numbers.setdefault(name, []).append(found[name])
        self._last |= {name: found[name] for name in ("latitude", "longitude") if name in found}
        if "heading" in found:
            self._heading = (line.time, found["heading"])
            self._bow.add(1.0, found["heading"])
        if "course_over_ground" in found:
            self._motion.add(found["speed_over_ground"], found["course_over_ground"])
        if "true_wind_speed" in found:
            self._numbers.setdefault("wind_speed", []).append(found["true_wind_speed"])
        bow = self._bow_at(line.time)
        for kind, vectors in (("true", self._true), ("apparent", self._apparent)):
            if bow is not None and f"{kind}_wind_speed" in found:
                vectors.add(found[f"{kind}_wind_speed"], found[f"{kind}_wind_angle"] + bow)

    def _bow_at(self, time: datetime) -> float | None:
        if self._heading is None or time - self._heading[0] > HEADING_LASTS:
            return None
        return self._heading[1]

    def row(self) -> Row:
        """Return the averages, in the order of the columns; what was not read is empty."""
        values: dict[str, float | None] = {name: mean(found) for name, found in self._numbers.items()}
        values |= self._last
        _, values["wind_from"] = self._true.mean()
        _, heading = self._bow.mean()
        values["heading"] = heading
        values["speed_over_ground"], values["course_over_ground"] = self._motion.mean()
        # The felt wind is averaged over ground and told from the mean heading, so that the ship may turn meanwhile.
        speed, felt_from = self._apparent.mean()
        if heading is not None and felt_from is not None:
            values |= {"apparent_wind_speed": speed, "apparent_wind_direction": (felt_from - heading) % 360.0}
        cells = {name: cell(values.get(name), PLACES.get(name, 4)) for name in COLUMNS}
        seconds = round((self.end - self.start).total_seconds())
        return cells | {"time": stamp(self.start), "interval": str(seconds), "lines_refused": str(self.refused)}


def mean(values: Iterable[float]) -> float | None:
    found = list(values)
    return math.fsum(found) / len(found) if found else None


def cell(value: float | None, places: int) -> str:
    return "" if value is None else repr(round(value, places) + 0.0)  # + 0.0 turns -0.0 into 0.0


def stamp(time: datetime) -> str:
    return time.strftime("%Y-%m-%dT%H:%M:%SZ")
