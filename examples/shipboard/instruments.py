"""Lines of a log to readings: NMEA 0183 sentences, their checksum verified, and the lines of an analyser."""

import math
import re
from collections.abc import Mapping
from dataclasses import dataclass
from datetime import UTC, datetime

import pynmea2

NUMBER = re.compile(r"[+-]?(\d+\.?\d*|\.\d+)([eE][+-]?\d+)?\Z", re.ASCII)
METRES_PER_SECOND = {"K": 1 / 3.6, "N": 1852 / 3600, "M": 1.0}  # km/h, knots and m/s, exact by definition
HECTOPASCAL = {"B": 1000.0, "P": 0.01}  # bar and pascal
FULL_TURN = 360.0  # degrees

Reading = dict[str, float]


@dataclass(frozen=True)
class Line:
    """What one line of the log says: its time, its readings, and whether something in it could not be used."""

    time: datetime | None
    readings: Reading
    refused: bool = False


@dataclass(frozen=True)
class Analyser:
    """How the lines of an analyser are laid out."""

    starts: str
    cells: tuple[str, ...]
    missing: frozenset[str]


class Reader:
    """Reads lines of the form ``2024-04-16T05:00:00.000Z $WIMWV,...``; a time alone says that time went on."""

    def __init__(self, analyser: Analyser, transducers: Mapping[str, str]) -> None:
        self.analyser = analyser
        self.transducers = transducers

    def read(self, line: str) -> Line:
        """Return what a line says; what is blank, void or garbled is left out, never taken for zero."""
        stamp, _, text = line.strip().partition(" ")
        try:
            time = datetime.fromisoformat(stamp).astimezone(UTC)
        except ValueError:
            return Line(None, {}, refused=True)
        text = text.strip()
        if not text:
            return Line(time, {})
        if text.startswith("$"):
            return self._sentence(time, text)
        if text.partition(",")[0].strip() == self.analyser.starts:
            return self._analysed(time, text)
        return Line(time, {}, refused=True)

    def _sentence(self, time: datetime, text: str) -> Line:
        try:
            said = pynmea2.parse(text, check=True)
        except pynmea2.SentenceTypeError:
            return Line(time, {})  # whole, but nothing that is wanted here
        except (pynmea2.ParseError, ValueError):
            return Line(time, {}, refused=True)
        kind = getattr(said, "sentence_type", "")
        if kind == "XDR":
            return Line(time, self._transduced(list(said.data)))
        found = SENTENCES[kind](said) if kind in SENTENCES else {}
        return Line(time, {name: value for name, value in found.items() if value is not None})

    def _transduced(self, fields: list[str]) -> Reading:
        """Return the readings of the transducers that have a name here: kind, value, unit, name, and the next four."""
        found: Reading = {}
        for kind, raw, unit, name in zip(fields[0::4], fields[1::4], fields[2::4], fields[3::4], strict=False):
            value = number(raw)
            if name not in self.transducers or value is None:
                continue
            if kind == "P" and unit in HECTOPASCAL:
                found[self.transducers[name]] = value * HECTOPASCAL[unit]
            elif kind == "C" and unit == "C":
                found[self.transducers[name]] = value
        return found

    def _analysed(self, time: datetime, text: str) -> Line:
        cells = [cell.strip() for cell in text.split(",")[1:]]
        if len(cells) != len(self.analyser.cells):
            return Line(time, {}, refused=True)
        found: Reading = {}
        refused = False
        for name, cell in zip(self.analyser.cells, cells, strict=True):
            if not name or cell in self.analyser.missing:
                continue
            value = number(cell)
            if value is None:
                refused = True
            else:
                found[name] = value
        return Line(time, found, refused)


def number(raw: object) -> float | None:
    """Return a number, or None for a blank, a word, or what is not finite."""
    text = str(raw).strip()
    if not NUMBER.match(text):
        return None
    value = float(text)
    return value if math.isfinite(value) else None


def angle(raw: object) -> float | None:
    value = number(raw)
    return value if value is not None and 0.0 <= value <= FULL_TURN else None


def _wind(said: pynmea2.MWV) -> dict[str, float | None]:
    """MWV: R is the wind felt on the moving ship, T the true wind; both angles are from the bow."""
    speed, direction = number(said.wind_speed), angle(said.wind_angle)
    factor = METRES_PER_SECOND.get(said.wind_speed_units)
    if said.status != "A" or speed is None or direction is None or factor is None:
        return {}
    kind = {"R": "apparent", "T": "true"}.get(said.reference)
    return {f"{kind}_wind_speed": speed * factor, f"{kind}_wind_angle": direction} if kind else {}


def _water(said: pynmea2.MTW) -> dict[str, float | None]:
    return {"water_temperature": number(said.temperature) if said.units == "C" else None}


def _heading(said: pynmea2.HDT) -> dict[str, float | None]:
    return {"heading": angle(said.heading)}


def _course(said: pynmea2.VTG) -> dict[str, float | None]:
    if said.faa_mode == "N":  # not valid
        return {}
    return _motion(said.true_track, said.spd_over_grnd_kts)


def _fix(said: pynmea2.RMC) -> dict[str, float | None]:
    if said.status != "A":
        return {}
    found = _motion(said.true_course, said.spd_over_grnd)
    if said.lat and said.lon and said.lat_dir in ("N", "S") and said.lon_dir in ("E", "W"):
        try:
            found |= {"latitude": said.latitude, "longitude": said.longitude}
        except ValueError:
            return found
    return found


def _motion(course: object, knots: object) -> dict[str, float | None]:
    """Return course and speed as one reading: half of a vector is none."""
    towards, speed = angle(course), number(knots)
    if towards is None or speed is None:
        return {}
    return {"course_over_ground": towards, "speed_over_ground": speed * METRES_PER_SECOND["N"]}


SENTENCES = {"MWV": _wind, "MTW": _water, "HDT": _heading, "VTG": _course, "RMC": _fix}
