"""Writes the lines of a CSV answer: the input lines as they came, with the results behind them."""

import re
from collections.abc import Sequence
from typing import Any

import numpy as np
import orjson
from numpy.typing import NDArray

from service.csv_table import Block, Header


def answer_header(header: Header, added: Sequence[str]) -> bytes:
    """Return the header line of an answer.

    Parameters
    ----------
    header : Header
        The header of the table; its line is kept as it came.
    added : sequence of str
        Headers of the results, with their units.

    Returns
    -------
    bytes
        One line, with its line feed.
    """
    names = [_quoted(name, header.delimiter) for name in added]
    return header.delimiter.join([header.line_text, *names]).encode() + b"\n"


def answer_lines(
    block: Block,
    delimiter: str,
    numbers: Sequence[NDArray[Any]],
    texts: Sequence[Sequence[str] | NDArray[Any]],
    missing: bytes,
) -> bytes:
    """Return the lines of an answer for one block.

    Each input line stands as it came, whatever its line end was. Three kinds of bad rows would push results
    out from under their headers, and a reader might then take a foreign cell for a result. So a line with
    too few cells is filled up with delimiters; the surplus cells of one with too many come after the last
    result, beyond all headers, as they were beyond all headers before; and a quote left open at the end of
    a line is closed.

    Parameters
    ----------
    block : Block
        The records.
    delimiter : str
        The delimiter of the table.
    numbers : sequence of (records,) arrays
        Results, written with the shortest digits that read back exactly. What is not finite is missing.
    texts : sequence of (records,) sequences
        What follows the numbers: integers such as flags as arrays, sentences as strings.
    missing : bytes
        What to write where a number is missing.

    Returns
    -------
    bytes
        One line per record, each with its line feed.
    """
    between = delimiter.encode()
    heads = block.lines
    if block.mended:
        heads = [block.mended[row][0] if row in block.mended else line for row, line in enumerate(heads)]
    columns = [heads]
    columns += [number_cells(column, missing) for column in numbers]
    for column in texts:
        if isinstance(column, np.ndarray) and column.dtype.kind in "iu":
            columns.append(number_cells(column, missing))
        else:
            columns.append([_quoted(str(text), delimiter).encode() if text else b"" for text in column])
    lines = list(map(between.join, zip(*columns, strict=True)))
    for row, (_, tail) in block.mended.items():
        lines[row] += tail
    return b"\n".join(lines) + b"\n"


def number_cells(column: NDArray[Any], missing: bytes) -> list[bytes]:
    """Return numbers as cells: the shortest digits that read back exactly, `missing` where there is none."""
    written = orjson.dumps(np.ascontiguousarray(column), option=orjson.OPT_SERIALIZE_NUMPY)
    return written[1:-1].replace(b"null", missing).split(b",")


def _quoted(text: str, delimiter: str) -> str:
    """Return a cell as RFC 4180 writes it: in quotes if it has a delimiter, quote or line break."""
    if re.search(rf'[{delimiter}"\r\n]', text):
        return '"' + text.replace('"', '""') + '"'
    return text
