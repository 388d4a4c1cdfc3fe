"""Times as people write them, ISO 8601 or days, read a whole column at once as days since 1970 in UTC."""

import re
from collections.abc import Sequence
from datetime import UTC, datetime, timedelta, timezone
from typing import Any

import numpy as np
from marshmallow import ValidationError
from numpy.typing import NDArray

from schemas.samples import COMMA_NUMBER, MISSING_MARKS, NUMBER, Column, Measured, Reading, Text, shown
from service.physics.declare import Array
from service.physics.faults import Fault

Octets = NDArray[np.uint8]

ISO = re.compile(
    r"(\d{4})-(\d\d)-(\d\d)(?:[Tt ](\d\d):(\d\d)(?::(\d\d)(?:[.,](\d+))?)?)? ?([Zz]|UTC|[+-]\d\d(?::?\d\d)?)?", re.ASCII
)
LOST_PLUS = re.compile(r".*\d:\d\d \d\d(:?\d\d)?", re.ASCII)
EPOCH = datetime(1970, 1, 1, tzinfo=UTC)
IN_WORDS = ("UTC", "ISO 8601", "ISO8601", "GMT", "Z")  # what headers of written times hold where a unit stands
ALLOWED = "ISO 8601 such as 2026-03-01T12:00:00Z, or days"
PLAIN_WIDTHS = (10, 16, 17, 19, 20)  # 2026-03-01, and with T12:00, T12:00Z, T12:00:00, T12:00:00Z
DATE, CLOCK, SECONDS = (0, 1, 2, 3, 5, 6, 8, 9), (11, 12, 14, 15), (17, 18)
ZERO, DASH, COLON = b"0-:"


def plain_moments(octets: Octets) -> Array:
    """Return the days since 1970 of times written plainly, NaN for all others.

    Parameters
    ----------
    octets : (times, width) array
        Their characters; only some widths are plain.
    """
    count, width = octets.shape
    if width not in PLAIN_WIDTHS or not count:
        return np.full(count, np.nan)
    digit = octets - np.uint8(ZERO)  # wraps round: only digits stay below ten
    places = [*DATE, *(CLOCK if width > 10 else ()), *(SECONDS if width > 17 else ())]
    good = (digit[:, places] < 10).all(axis=1) & (octets[:, [4, 7]] == DASH).all(axis=1)
    if width > 10:
        good &= np.isin(octets[:, 10], tuple(b"Tt ")) & (octets[:, 13] == COLON)
    if width > 17:
        good &= octets[:, 16] == COLON
    if width in (17, 20):
        good &= np.isin(octets[:, -1], tuple(b"Zz"))

    def number(first: int, last: int) -> NDArray[np.int64]:
        found = np.zeros(count, np.int64)
        for place in range(first, last):
            found = 10 * found + digit[:, place]
        return found

    month, day = number(5, 7), number(8, 10)
    months = (number(0, 4) - 1970) * 12 + month - 1
    begin, end = ((months + late).astype("datetime64[M]").astype("datetime64[D]").astype(np.int64) for late in (0, 1))
    good &= (month >= 1) & (month <= 12) & (day >= 1) & (day <= end - begin)
    clock = np.zeros(count, np.int64)
    if width > 10:
        hour, minute = number(11, 13), number(14, 16)
        second = number(17, 19) if width > 17 else clock
        good &= (hour < 24) & (minute < 60) & (second < 60)
        clock = 3600 * hour + 60 * minute + second
    return np.where(good, (begin + day - 1) + clock / 86400.0, np.nan)


def moments(texts: Sequence[str], comma: bool = False, per_day: float = 1.0) -> tuple[Array, dict[int, str]]:
    """Return times as days, and what is wrong with those that are none.

    Parameters
    ----------
    texts : sequence of str
        ISO 8601, in UTC where no offset is told; or numbers of days from any beginning; or missing marks.
    comma : bool
        Whether the decimal sign of a number is a comma.
    per_day : float
        Days in the unit of the numbers.

    Returns
    -------
    days : (texts,) array
        Since 1970-01-01T00:00:00Z where ISO 8601; NaN where missing or wrong.
    faults : dict
        Index to what is wrong.
    """
    days = np.full(len(texts), np.nan)
    widths = np.fromiter(map(len, texts), np.int64, len(texts))
    for width in PLAIN_WIDTHS:
        rows = np.flatnonzero(widths == width)
        joined = "".join([texts[row] for row in rows.tolist()])
        if rows.size and joined.isascii():
            days[rows] = plain_moments(np.frombuffer(joined.encode(), np.uint8).reshape(-1, width))
    faults = {}
    for row in np.flatnonzero(np.isnan(days)).tolist():
        days[row], fault = _moment(texts[row].strip(), comma, per_day)
        if fault:
            faults[row] = fault
    return days, faults


def _moment(text: str, comma: bool, per_day: float) -> tuple[float, str | None]:
    """Return one time that is not written plainly."""
    if text.lower() in MISSING_MARKS:
        return np.nan, None
    if (COMMA_NUMBER if comma else NUMBER).fullmatch(text):
        return float(text.replace(",", ".")) * per_day, None
    if LOST_PLUS.fullmatch(text):
        return np.nan, "has lost the + of its offset: in an address, + means a blank; write %2B"
    match = ISO.fullmatch(text)
    if match is None:
        return np.nan, f"is no time: write {ALLOWED}"
    year, month, day, hour, minute, second = (int(part or 0) for part in match.groups()[:6])
    try:
        found = datetime(year, month, day, hour, minute, tzinfo=_offset(match[8]))
    except ValueError as error:
        return np.nan, f"is no time: {error}"
    if second > 60:
        return np.nan, "is no time: second must be in 0..60"
    seconds = second + float(f"0.{match[7] or 0}")  # 60 is a leap second: the next one
    whole = found - EPOCH
    return whole.days + (whole.seconds + seconds) / 86400.0, None


def _offset(text: str | None) -> timezone:
    if text is None or text.upper() in ("Z", "UTC"):
        return UTC
    digits = text[1:].replace(":", "").ljust(4, "0")
    minutes = int(digits[:2]) * 60 + int(digits[2:])
    if int(digits[2:]) > 59:
        raise ValueError("the minutes of the offset must be in 0..59")
    return timezone((-1 if text[0] == "-" else 1) * timedelta(minutes=minutes))


def _holds_words(value: dict[str, Any]) -> bool:
    """Tell whether an object of values and unit has times in words among its values."""
    values = value.get("values")
    known = set(value) <= {"values", "unit"} and isinstance(values, list)
    return known and any(isinstance(each, str) and ISO.match(each.strip()) for each in values or ())


class Moment(Measured):
    """Times: texts in ISO 8601, numbers of days or of another unit of time, or a CSV column of either."""

    def _deserialize(self, value: Any, attr: str | None, data: Any, **kwargs: Any) -> Reading:
        if isinstance(value, Column):
            words = (value.unit or "").upper()
            return Reading(None, None if words in IN_WORDS else value.unit, value)
        if isinstance(value, Text):
            parts = value.split(";")
            if any(ISO.match(part.strip()) for part in parts):
                return self._written(parts[:-1] if len(parts) > 1 and not parts[-1].strip() else parts)
        elif isinstance(value, str) and ISO.match(value.strip()):
            return self._written([value])
        elif isinstance(value, list) and any(isinstance(each, str) for each in value):
            return self._written(value)
        elif isinstance(value, dict) and _holds_words(value):
            if (value.get("unit") or "UTC") not in IN_WORDS:
                raise ValidationError([Fault("unit", self.term.name, "a unit stands only beside numbers")])
            return self._written(value["values"])
        return super()._deserialize(value, attr, data, **kwargs)

    def _written(self, values: list[Any]) -> Reading:
        texts = [self._text(value, index) for index, value in enumerate(values)]
        days, faults = moments(texts)
        if faults:
            messages = [
                Fault("not_a_number", self.term.name, f"{shown(texts[row])} {fault}", ALLOWED, row + 1)
                for row, fault in faults.items()
            ]
            raise ValidationError(list(messages))
        return Reading(days, None)

    def _text(self, value: Any, index: int) -> str:
        if value is None:
            return ""
        if isinstance(value, str):
            return value
        if type(value) in (int, float):
            return repr(value)
        raise ValidationError([Fault("not_a_number", self.term.name, "is no time", ALLOWED, index + 1)])
