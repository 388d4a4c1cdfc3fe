"""How the tests read a CSV body and write results behind its lines."""

import math
import struct
from collections.abc import Sequence

import numpy as np
import pytest

from service.csv_table import Block, TableError, open_table
from service.csv_text import answer_header, answer_lines

# Quotes out of place in one line make its whole block be walked cell by cell.
STRAY = b'"stray"quote'
NUMBERS = [
    *[
        "12",
        "-12.5",
        "+3",
        ".5",
        "5.",
        "-.5",
        "007",
        "0",
        "-0",
        "1e3",
        "1E-3",
        "-1.5e+05",
        " 12 ",
        "\t7",
        "  -1 ",
        " " * 30 + "12" + " " * 17,
    ],
    *["0.1", "123456789012345", "12345678901234.5", "0.123456789012345", "9007199254740993", "1e-400"],
    *["0.30000000000000004", "123456789012345678901234567890", "2.2250738585072011e-308", "5e-324"],
    *["1.7976931348623157e308", "00000000000000000000001.5", "-0.000", "-0e5", "4.35", "1" * 300, "0." + "3" * 998],
]
NOT_NUMBERS = [
    *["abc", "1_0", "0x10", "inf", "-Infinity", "+nan", "nan(1)", "1 2", "--1", "+-1", "-", "+", ".", "-."],
    *[
        "1e",
        "e5",
        "1e5.0",
        "1.2.3",
        "1d5",
        "٣",
        "１",
        "−5",
        "\u00a012",
        "12°",
        "true",
        "[1]",
        "{}",
        "#",
        "1/2",
        "12:30",
    ],
    *["12345678901234567890x", "N/A", "none", "-NA", "1e400", "-1e400", "9" * 400],
]
MISSING = ["", " ", "  ", " " * 40, "NA", "na", "NaN", "nan", "NAN", "null", "NULL", " Null "]


def read(body: bytes, used: Sequence[int] = (0, 1), decimal_comma: bool = False, rows: int = 16384) -> list[Block]:
    return list(open_table(body).blocks(used, decimal_comma, rows))


def read_one(body: bytes, used: Sequence[int] = (0, 1), decimal_comma: bool = False) -> Block:
    (block,) = read(body, used, decimal_comma)
    return block


def refusal(body: bytes, used: Sequence[int] = (0, 1), decimal_comma: bool = False) -> TableError:
    with pytest.raises(TableError) as caught:
        read(body, used, decimal_comma)
    return caught.value


def bits(numbers: Sequence[float] | np.ndarray) -> list[bytes]:
    """Return what tells apart 0 and -0, and takes every NaN for the same."""
    return [b"NaN" if math.isnan(number) else struct.pack("<d", number) for number in numbers]


def answer(body: bytes, decimal_comma: bool = False, rows: int = 16384) -> bytes:
    """Return the first column as a result, a flag and the reason behind each line."""
    table = open_table(body)
    written = [answer_header(table.header, ["flux [mmol m-2 d-1]", "quality_flag", "quality_reason"])]
    for block in table.blocks([0], decimal_comma, rows):
        flags = np.array([4 if row in block.bad else 1 for row in range(len(block.lines))])
        reasons = [block.bad.get(row, "") for row in range(len(block.lines))]
        written.append(answer_lines(block, table.header.delimiter, block.columns, [flags, reasons], b""))
    return b"".join(written)
