"""Reads cells of a CSV body as numbers, a whole column of a block at once.

A plain number (digits, at most one decimal point, 16 characters or fewer besides a sign) is read by array
arithmetic: its digits make an integer that a double holds exactly, and the one division by a power of ten,
exact as well, rounds once; 16 digits have no point, and only the last of them rounds. So the result is the
double nearest to what is written, bit for bit the one of ``float``. This takes a third of the time of
`numpy.loadtxt`, which would also need blank cells filled in beforehand. Other cells are read by the JSON
reader if all are numbers to it, else one by one.
"""

import math
import re

import numpy as np
import orjson
from numpy.typing import NDArray

Numbers = NDArray[np.float64]
Offsets = NDArray[np.int64]
Octets = NDArray[np.uint8]

MISSING = frozenset({b"", b"na", b"nan", b"null"})
NUMBER = re.compile(rb"[+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?")
COMMA_NUMBER = re.compile(NUMBER.pattern.replace(rb"\.", b","))
PLAIN_WIDTH = 16
PADDING = 16  # blanks on either side of a plain number; wider cells are stripped one by one
POWERS_OF_TEN = 10.0 ** np.arange(PLAIN_WIDTH)
PLUS, MINUS, POINT, COMMA, ZERO, BLANK, QUOTE = b'+-.,0 "'


def read_numbers(
    body: bytes, octets: Octets, starts: Offsets, ends: Offsets, decimal_comma: bool = False
) -> tuple[Numbers, dict[int, tuple[bytes, str]]]:
    """Return the numbers in some cells, and which cells hold none.

    Parameters
    ----------
    body : bytes
        The text that holds the cells.
    octets : (len(body),) array
        The same bytes as an array.
    starts, ends : (cells,) arrays
        Offsets of each cell in it; a quoted cell with its quotes.
    decimal_comma : bool
        Whether the decimal sign is a comma.

    Returns
    -------
    numbers : (cells,) array
        NaN where the cell is missing or bad.
    bad : dict
        Index of a bad cell → its text, without quotes, and what is wrong with it.
    """
    quoted = octets.take(starts, mode="clip") == QUOTE
    starts, ends = starts + quoted, ends - quoted
    for _ in range(PADDING):
        leading = (octets.take(starts, mode="clip") == BLANK) & (starts < ends)
        trailing = (octets.take(ends - 1, mode="clip") == BLANK) & (starts + leading < ends)
        if not (leading.any() or trailing.any()):
            break
        starts, ends = starts + leading, ends - trailing
    numbers, plain = _plain_numbers(octets, starts, ends, COMMA if decimal_comma else POINT)
    numbers[~plain] = np.nan
    others = np.flatnonzero(~plain & (starts < ends))
    if not len(others):
        return numbers, {}
    spans = zip(starts[others].tolist(), ends[others].tolist(), strict=True)
    cells = [body[start:end] for start, end in spans]
    values = _all_at_once(cells, decimal_comma)
    if values is not None:
        numbers[others] = values
        return numbers, {}
    bad = {}
    for index, cell in zip(others.tolist(), cells, strict=True):
        numbers[index], fault = _number(cell, decimal_comma)
        if fault:
            bad[index] = (cell.replace(b'""', b'"') if quoted[index] else cell, fault)
    return numbers, bad


def _plain_numbers(
    octets: Octets, starts: Offsets, ends: Offsets, decimal_sign: int
) -> tuple[Numbers, NDArray[np.bool_]]:
    """Return the numbers of the cells that are plain, and which are."""
    sign = octets.take(starts, mode="clip")
    starts = starts + ((sign == MINUS) | (sign == PLUS))
    width = ends - starts
    integer = np.zeros(len(starts))
    digits, decimals, points = np.zeros((3, len(starts)), np.int64)
    for place in range(min(int(width.max(initial=0)), PLAIN_WIDTH)):
        octet = octets.take(starts + place, mode="clip")
        inside = place < width
        digit = octet - np.uint8(ZERO)  # wraps round: only digits stay below ten
        is_digit = (digit < 10) & inside
        np.multiply(integer, 10, out=integer, where=is_digit)
        np.add(integer, digit, out=integer, where=is_digit)
        digits += is_digit
        decimals += is_digit & (points > 0)
        points += (octet == decimal_sign) & inside
    numbers = integer / POWERS_OF_TEN[decimals]
    np.negative(numbers, out=numbers, where=sign == MINUS)
    return numbers, (digits > 0) & (points <= 1) & (digits + points == width)


def _all_at_once(cells: list[bytes], decimal_comma: bool) -> Numbers | None:
    """Return the numbers of all cells if each is one in JSON, else None."""
    if decimal_comma:
        joined = b"\0".join(cells)  # no cell has a NUL
        if b"." in joined:
            return None
        joined = joined.replace(b",", b".").replace(b"\0", b",")
    else:
        joined = b",".join(cells)
    try:
        numbers = orjson.loads(b"[%b]" % joined)
    except orjson.JSONDecodeError:
        return None
    if len(numbers) != len(cells) or not set(map(type, numbers)) <= {int, float}:
        return None
    found = np.array(numbers, np.float64)
    return found if np.isfinite(found).all() else None


def _number(cell: bytes, decimal_comma: bool) -> tuple[float, str | None]:
    cell = cell.strip()
    if cell.lower() in MISSING:
        return math.nan, None
    wanted, other = (COMMA_NUMBER, NUMBER) if decimal_comma else (NUMBER, COMMA_NUMBER)
    if not wanted.fullmatch(cell):
        hint = ""
        if other.fullmatch(cell):
            hint = " (a decimal comma? send decimal=comma)"
            if decimal_comma:
                hint = " (a decimal point? decimal=comma was sent)"
        return math.nan, "is not a number" + hint
    number = float(cell.replace(b",", b"."))
    if math.isinf(number):
        return math.nan, "is too large"
    return number, None
