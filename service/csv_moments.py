"""Reads cells of a CSV body as times, a whole column of a block at once."""

import numpy as np

from schemas.moments import moments, plain_moments
from service.csv_numbers import BLANK, QUOTE, Numbers, Octets, Offsets


def read_moments(
    body: bytes, octets: Octets, starts: Offsets, ends: Offsets, decimal_comma: bool = False, per_day: float = 1.0
) -> tuple[Numbers, dict[int, tuple[bytes, str]]]:
    """Return the times in some cells as days, and which cells hold none.

    Parameters
    ----------
    body : bytes
        The text that holds the cells.
    octets : (len(body),) array
        The same bytes as an array.
    starts, ends : (cells,) arrays
        Offsets of each cell in it; a quoted cell with its quotes.
    decimal_comma : bool
        Whether the decimal sign of a number is a comma.
    per_day : float
        Days in the unit of the numbers.

    Returns
    -------
    days : (cells,) array
        NaN where the cell is missing or bad.
    bad : dict
        Index of a bad cell → its text, without quotes, and what is wrong with it.
    """
    quoted = octets.take(starts, mode="clip") == QUOTE
    starts, ends = starts + quoted, ends - quoted
    starts = starts + ((octets.take(starts, mode="clip") == BLANK) & (starts < ends))
    widths = ends - starts
    days = np.full(len(starts), np.nan)
    usual = int(np.bincount(widths).argmax()) if len(widths) else 0
    alike = np.flatnonzero(widths == usual)
    days[alike] = plain_moments(octets[starts[alike, np.newaxis] + np.arange(usual)])
    others = np.flatnonzero(np.isnan(days))
    spans = zip(starts[others].tolist(), ends[others].tolist(), strict=True)
    cells = [body[start:end] for start, end in spans]
    found, faults = moments([cell.decode().strip() for cell in cells], decimal_comma, per_day)
    days[others] = found
    return days, {int(others[row]): (cells[row], fault) for row, fault in faults.items()}
