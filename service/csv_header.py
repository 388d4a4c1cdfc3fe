"""Checks that a body is CSV text at all, reads its header line, and says why where it cannot."""

import codecs
import csv
import io
import re
from collections.abc import Sequence
from dataclasses import dataclass
from typing import Literal

Code = Literal[
    "empty_body",
    "encoding",
    "line_ends",
    "header",
    "too_many_columns",
    "name_too_long",
    "no_data_row",
    "unclosed_quote",
    "not_a_number",
]

DELIMITERS = (",", ";", "\t")
QUOTED_LINES = 100  # a quote that is not closed within so many lines is taken for a stray one
HEADER_BYTES = 1 << 20
PIECE_BYTES = 1 << 22  # decoding in pieces keeps the memory for the check small
GLUED_BYTES = 4096  # of a single line, enough to see that numbers are glued to names
SHOWN = 40  # characters of a cell that a sentence quotes

BRACKET = re.compile(r"(.*?)\s*\[([^\[\]]*)\]", re.DOTALL)
GLUED = re.compile(r"(?:^|[^\d\s])[+-]?\d+(?:\.\d*)?$")


class TableError(Exception):
    """A body that is refused as a whole, before the first byte of an answer.

    Parameters
    ----------
    status : int
        400 if the body cannot be read, 422 if it can but is wrong.
    code : str
        One of `Code`.
    detail : str
        A sentence for the sender.
    line : int, optional
        Line of the body, from 1.
    column : str, optional
        Name of the column.
    """

    def __init__(
        self, status: int, code: Code, detail: str, line: int | None = None, column: str | None = None
    ) -> None:
        super().__init__(detail)
        self.status = status
        self.code = code
        self.detail = detail
        self.line = line
        self.column = column


@dataclass(frozen=True, slots=True)
class Limits:
    """How many columns a table may have, and how many characters a cell and a name."""

    columns: int = 1024 + 64
    cell: int = 1000
    name: int = 100


@dataclass(frozen=True, slots=True)
class Header:
    """The header line: one name, unit and raw cell per column.

    ``wind_speed [kn]`` has the name ``wind_speed`` and the unit ``kn``; the unit is None without brackets and
    empty with empty ones. `line_text` is the line as it came, without byte order mark and line end.
    """

    names: tuple[str, ...]
    units: tuple[str | None, ...]
    raw: tuple[str, ...]
    delimiter: str
    line_text: str


def check_encoding(body: bytes) -> None:
    """Refuse a body that is not UTF-8 or has carriage returns of its own.

    Parameters
    ----------
    body : bytes
        The whole body.

    Raises
    ------
    TableError
        Status 400, with the line.
    """
    if body.startswith((codecs.BOM_UTF16_LE, codecs.BOM_UTF16_BE)):
        text = "The body is UTF-16 or UTF-32, not UTF-8: save the file as CSV UTF-8."
        raise TableError(400, "encoding", text, 1)
    if (nul := body.find(b"\0")) >= 0:
        line = body.count(b"\n", 0, nul) + 1
        text = f"Line {line} has a NUL byte: the file is UTF-16, UTF-32 or damaged; save it as CSV UTF-8."
        raise TableError(400, "encoding", text, line)
    if not body.isascii():
        decoder = codecs.getincrementaldecoder("utf-8")()
        for at in range(0, len(body), PIECE_BYTES):
            waiting = len(decoder.getstate()[0])  # octets of a character that the last piece cut in two
            try:
                decoder.decode(body[at : at + PIECE_BYTES], final=at + PIECE_BYTES >= len(body))
            except UnicodeDecodeError as error:
                line = body.count(b"\n", 0, at - waiting + error.start) + 1
                text = f"Line {line} is not UTF-8 but latin-1 or another code page: save it as CSV UTF-8."
                raise TableError(400, "encoding", text, line) from None
    if body.count(b"\r") != body.count(b"\r\n") and (bare := re.search(rb"\r(?!\n)", body)):
        line = body.count(b"\n", 0, bare.start()) + 1
        text = f"Line {line} has a carriage return without a line feed; lines must end in LF or CRLF."
        raise TableError(400, "line_ends", text, line)


def find_header(body: bytes) -> tuple[int, int, int]:
    """Find the header: the first line that is not blank, or more where its quotes hold line breaks.

    Parameters
    ----------
    body : bytes
        The whole body.

    Returns
    -------
    begin, end : int
        Offsets of the header, without byte order mark, with a carriage return.
    line : int
        Line on which it begins, from 1.

    Raises
    ------
    TableError
        If the body is blank or a single line, or a quote is not closed.
    """
    begin = len(codecs.BOM_UTF8) if body.startswith(codecs.BOM_UTF8) else 0
    if not (first := re.compile(rb"[^ \t\r\n]").search(body, begin)):
        text = "The body is empty: send a header line and at least one data line."
        raise TableError(400, "empty_body", text)
    begin = max(begin, body.rfind(b"\n", 0, first.start()) + 1)
    line = body.count(b"\n", 0, begin) + 1
    quotes, end = 0, begin - 1
    for _ in range(QUOTED_LINES):
        start, end = end + 1, body.find(b"\n", end + 1)
        if end < 0:
            break
        quotes += body.count(b'"', start, end)
        if quotes % 2 == 0:
            return begin, end, line
    if quotes:
        raise TableError(400, "unclosed_quote", f"A quote in the header (line {line}) is not closed.", line)
    raise no_data_row(re.split(r"[,;\t]", body[begin : begin + GLUED_BYTES].decode(errors="ignore")), line)


def no_data_row(cells: Sequence[str], line: int) -> TableError:
    """Return the error for a header without data, which may be a table that lost its line ends.

    Parameters
    ----------
    cells : sequence of str
        The cells of the header.
    line : int
        Its line.

    Returns
    -------
    TableError
        Status 422.
    """
    text = "The body has a header line but no data row."
    if any(GLUED.search(cell.strip()) for cell in cells):
        text = (
            "The body is one line, in which names and numbers run together: its line ends were lost. "
            "With curl, send the file with --data-binary, not -d."
        )
    return TableError(422, "no_data_row", text, line)


def read_header(octets: bytes, limits: Limits, line: int) -> Header:
    """Return names and units of the columns, and the delimiter.

    Parameters
    ----------
    octets : bytes
        The header without line end.
    limits : Limits
        How many columns, and how long a name may be.
    line : int
        Its line, for the error.

    Returns
    -------
    Header
        One name per column; it may be empty.

    Raises
    ------
    TableError
        If a limit is passed or a quote is out of place.
    """
    if len(octets) > HEADER_BYTES:
        raise TableError(422, "header", f"The header line is longer than {HEADER_BYTES} bytes.", line)
    text = octets.decode()
    bare = re.sub(r'"[^"]*"', "", text)
    delimiter = max(DELIMITERS, key=bare.count)
    if (columns := bare.count(delimiter) + 1) > limits.columns:
        detail = f"The table has {columns} columns; at most {limits.columns} are allowed."
        raise TableError(422, "too_many_columns", detail, line)
    try:
        raw = next(csv.reader(io.StringIO(text, newline=""), delimiter=delimiter, strict=True))
    except csv.Error as error:
        raise TableError(400, "header", f"The header (line {line}) cannot be read: {error}.", line) from None
    names, units = [], []
    for cell in raw:
        bracketed = BRACKET.fullmatch(cell.strip())
        name, unit = bracketed.groups() if bracketed else (cell.strip(), None)
        for part in (name, unit or ""):
            if len(part) > limits.name:
                detail = f"The header {shown(cell)} is longer than {limits.name} characters."
                raise TableError(422, "name_too_long", detail, line, part[: limits.name])
        names.append(name)
        units.append(unit if unit is None else unit.strip())
    return Header(tuple(names), tuple(units), tuple(raw), delimiter, text)


def shown(cell: str) -> str:
    """Return a cell as a sentence quotes it: cut, on one line, in single quotes.

    Parameters
    ----------
    cell : str
        The text of the cell.

    Returns
    -------
    str
        At most the first 40 characters, control characters escaped.
    """
    text = "".join(sign if sign.isprintable() else repr(sign)[1:-1] for sign in cell[:SHOWN])
    return f"'{text}…'" if len(cell) > SHOWN else f"'{text}'"
