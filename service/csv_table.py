"""Reads the bytes of a CSV body in blocks: the lines as they came, and the columns asked for as numbers.

Nothing here knows what a column means. Where records and cells end is found by array arithmetic over the
bytes of a block, quoted cells with delimiters or line breaks included. Only what is out of the ordinary
costs a step of its own: a line with the wrong number of cells, and a block whose quotes are out of place,
which is walked cell by cell.
"""

import re
from collections.abc import Iterator, Mapping, Sequence
from dataclasses import dataclass, field
from functools import cached_property

import numpy as np
from numpy.typing import NDArray

from service.csv_header import (
    QUOTED_LINES,
    Header,
    Limits,
    TableError,
    check_encoding,
    find_header,
    no_data_row,
    read_header,
    shown,
)
from service.csv_moments import read_moments
from service.csv_numbers import Numbers, Octets, Offsets, read_numbers

__all__ = ["Block", "Header", "Limits", "Table", "TableError", "open_table"]

NEWLINE, RETURN, QUOTE, BLANK, TAB = b'\n\r" \t'
BLOCK_BYTES = 1 << 22  # bounds the memory of a block, whatever the length of its lines


@dataclass(slots=True)
class Block:
    """Some consecutive records of a table.

    Attributes
    ----------
    first_line : int
        Line of the body, from 1, on which the first record begins.
    lines : list of bytes
        The records as they came, without line end; with line breaks where a quoted cell has them.
    line_numbers : (records,) array
        Line on which each record begins.
    columns : list of (records,) arrays
        One per column asked for; NaN where the cell is missing or bad, or the line is bad.
    bad : dict
        Row in the block → what is wrong with it. A NaN in a row that is not here is a missing cell.
    unread : dict
        Row in the block → places in `columns` whose cell is no number; a bad row that is not here is bad whole.
    mended : dict
        Row in the block → what stands before and behind the results, for rows whose own text would not let
        the results land under their headers: too few cells are filled up, an open quote is closed, surplus
        cells come last.
    """

    first_line: int
    lines: list[bytes]
    line_numbers: Offsets
    columns: list[Numbers]
    bad: dict[int, str]
    mended: dict[int, tuple[bytes, bytes]]
    unread: dict[int, set[int]] = field(default_factory=dict)


@dataclass(slots=True)
class _Layout:
    """Where the records and cells of a block lie in the body; blank lines are left out."""

    starts: Offsets  # (records,)
    stops: Offsets  # (records,), before the line end
    line_numbers: Offsets  # (records,)
    counts: Offsets  # (records,) cells in each
    first_cells: Offsets  # (records,) index in cell_ends of each one's first cell
    cell_ends: Offsets  # (cells,)
    next_byte: int
    next_line: int
    bad: dict[int, str] = field(default_factory=dict)
    open_quotes: set[int] = field(default_factory=set)


def open_table(body: bytes, limits: Limits | None = None) -> "Table":
    """Check the encoding and line ends of a whole body, read its header, and return the table.

    Parameters
    ----------
    body : bytes
        The body, unpacked. It is kept, never copied as a whole.
    limits : Limits, optional
        What a table may hold.

    Returns
    -------
    Table
        A table with at least one data row.

    Raises
    ------
    TableError
        If the body is empty, is not UTF-8, has bare carriage returns, no usable header or no data row.
    """
    limits = limits or Limits()
    check_encoding(body)
    begin, end, line = find_header(body)
    header = read_header(body[begin:end].removesuffix(b"\r"), limits, line)
    blanks = rb"[^ \r\n]" if header.delimiter == "\t" else rb"[^ \t\r\n]"
    if not re.compile(blanks).search(body, end):
        raise no_data_row(header.raw, line)
    return Table(header, body, limits, end + 1, line + body.count(b"\n", begin, end + 1))


class Table:
    """The data rows of a body, read in blocks; `open_table` makes it."""

    def __init__(self, header: Header, body: bytes, limits: Limits, first_byte: int, first_line: int) -> None:
        self.header = header
        self._body = body
        self._octets: Octets = np.frombuffer(body, np.uint8)
        self._limits = limits
        self._first_byte = first_byte
        self._first_line = first_line
        self._delimiter = header.delimiter.encode()
        self._between = re.compile(self._delimiter)
        blanks = b" " if header.delimiter == "\t" else b" \t"
        self._blank_lines = re.compile(rb"(?:[%b]*+\r?(?:\n|\Z))++" % blanks)
        self._cell = re.compile(rb'("(?:[^"]++|"")*+")?([^\n%b]*+)' % self._delimiter)

    @cached_property
    def rows_at_most(self) -> int:
        """Return an upper limit of the data rows."""
        return self._body.count(b"\n") + 1

    def blocks(
        self,
        used: Sequence[int],
        decimal_comma: bool = False,
        rows: int = 16384,
        moments: Mapping[int, float] | None = None,
    ) -> Iterator[Block]:
        """Yield the table block by block.

        The first block is read whole before it is yielded, so a caller that takes it before the first byte of
        its answer can still refuse the table; from the second on nothing raises, and every fault is a row's.

        Parameters
        ----------
        used : sequence of int
            Indices of the columns to read as numbers.
        decimal_comma : bool
            Whether ``12,5`` is a number, and ``12.5`` none.
        rows : int
            Records in a block, at most. What is read does not depend on it.
        moments : mapping of int to float, optional
            Indices of the columns to read as times, with the days in the unit of their numbers.

        Yields
        ------
        Block
            At least one record.

        Raises
        ------
        TableError
            From the first block: if all cells of a used column are bad there, or if a quote is not closed
            within 100 lines.
        """
        begin, line, first = self._first_byte, self._first_line, True
        while begin < len(self._body):
            line_ends = self._line_ends(begin, rows)
            layout = self._lay_out(begin, line_ends, line)
            if layout is None:
                layout = self._walk(begin, int(line_ends[-1]), line, refuse=first)
            if len(layout.starts):
                yield self._read(layout, used, decimal_comma, moments or {}, first)
                first = False
            begin, line = layout.next_byte, layout.next_line

    def _line_ends(self, begin: int, rows: int) -> Offsets:
        """Return where the next lines end: at most `rows`, at most what fits in a block, at least one."""
        size = min(64 * rows, BLOCK_BYTES)
        while True:
            found = np.flatnonzero(self._octets[begin : begin + size] == NEWLINE)[:rows] + begin
            at_end = begin + size >= len(self._body)
            if len(found) == rows or size == BLOCK_BYTES or at_end:
                break
            size = min(2 * size, BLOCK_BYTES)
        if len(found) < rows and at_end and self._body[-1] != NEWLINE:
            found = np.append(found, len(self._body))
        if not len(found):
            end = self._body.find(b"\n", begin)
            found = np.array([len(self._body) if end < 0 else end])
        return found

    def _single_line(self, begin: int, end: int, line: int) -> _Layout:
        """Return a line too long to be looked into as one bad record."""
        count = min(self._body.count(self._delimiter, begin, end) + 1, len(self.header.names))
        spans = np.array([[begin], [end], [line], [count], [0]])
        layout = _Layout(spans[0], spans[1], spans[2], spans[3], spans[4], spans[1], end + 1, line + 1)
        layout.bad[0] = f"the line is longer than {BLOCK_BYTES} bytes"
        return layout

    def _lay_out(self, begin: int, line_ends: Offsets, line: int) -> _Layout | None:
        """Find records and cells by array arithmetic; None where quotes are out of place."""
        end = int(line_ends[-1])
        if end - begin > BLOCK_BYTES:
            return self._single_line(begin, end, line)
        octets = self._octets[begin:end]
        cell_ends = np.flatnonzero((octets == ord(self._delimiter)) | (octets == NEWLINE)) + begin
        cell_ends = np.append(cell_ends, end)
        record_ends, line_numbers = line_ends, np.arange(line, line + len(line_ends))
        quotes = np.flatnonzero(octets == QUOTE) + begin
        if len(quotes):
            if not self._in_place(quotes):
                return None
            cell_ends = cell_ends[np.searchsorted(quotes, cell_ends) % 2 == 0]
            outside = np.flatnonzero(np.searchsorted(quotes, line_ends) % 2 == 0)
            record_ends, line_numbers = line_ends[outside], line + np.append(0, outside[:-1] + 1)
            if np.diff(line_numbers, append=line + len(line_ends)).max() > QUOTED_LINES:
                return None
        starts = np.append(begin, record_ends[:-1] + 1)
        returns = (self._octets[record_ends - 1] == RETURN) & (record_ends > starts)
        last_cells = np.searchsorted(cell_ends, record_ends)
        counts = np.diff(last_cells, prepend=-1)
        stops = record_ends - returns
        first_cells = last_cells - counts + 1
        kept = ~self._blank(starts, stops, counts)
        return _Layout(
            starts[kept],
            stops[kept],
            line_numbers[kept],
            counts[kept],
            first_cells[kept],
            cell_ends,
            end + 1,
            line + len(line_ends),
        )

    def _in_place(self, quotes: Offsets) -> bool:
        """Say whether quotes, taken in turn as opening and closing, stand where such quotes may.

        An opening one follows a delimiter or line end, a closing one precedes it; a doubled one closes and
        opens.
        """
        if len(quotes) % 2:
            return False
        allowed = np.array([ord(self._delimiter), NEWLINE, QUOTE, RETURN], np.uint8)
        before = self._octets[quotes[::2] - 1]
        after = self._octets.take(quotes[1::2] + 1, mode="clip")  # at the end of the body: the quote itself
        return bool(np.isin(before, allowed[:3]).all() and np.isin(after, allowed).all())

    def _walk(self, begin: int, end: int, line: int, refuse: bool) -> _Layout:
        """Find the records that begin up to `end` cell by cell, quotes out of place among them."""
        records: list[tuple[int, int, int, int, int]] = []
        cell_ends: list[int] = []
        bad: dict[int, str] = {}
        open_quotes: set[int] = set()
        while True:
            blank = self._blank_lines.match(self._body, begin)
            if blank is not None:
                line += blank[0].count(b"\n")
                begin = blank.end()
            if begin >= min(end + 1, len(self._body)):
                break
            start, first_cell, fault, is_open = begin, len(cell_ends), None, False
            cell_end = self._body.find(b"\n", begin)
            cell_end = len(self._body) if cell_end < 0 else cell_end
            if self._body.find(b'"', begin, cell_end) < 0:
                between = self._between.finditer(self._body, begin, cell_end)
                cell_ends.extend(delimiter.start() for delimiter in between)
                cell_ends.append(cell_end)
            else:
                cell_end = begin - 1
                while cell_end < start or self._body.startswith(self._delimiter, cell_end):
                    cell_end, cell_fault, is_open = self._cell_end(cell_end + 1, start, line, refuse)
                    fault = fault or cell_fault
                    cell_ends.append(cell_end)
            begin = cell_end + 1
            record = self._body[start:cell_end]
            if fault:
                bad[len(records)] = fault
            if is_open:
                open_quotes.add(len(records))
            stop = cell_end - record.endswith(b"\r")
            records.append((start, stop, line, len(cell_ends) - first_cell, first_cell))
            line += record.count(b"\n") + 1
        starts, stops, lines, counts, first_cells = np.array(records, np.int64).reshape(-1, 5).T
        ends = np.array(cell_ends, np.int64)
        return _Layout(starts, stops, lines, counts, first_cells, ends, begin, line, bad, open_quotes)

    def _cell_end(self, begin: int, start: int, line: int, refuse: bool) -> tuple[int, str | None, bool]:
        """Return where a cell of the record at `start` ends, its quotes' fault, and whether one is open."""
        body = self._body
        cell = self._cell.match(body, begin)
        assert cell is not None  # the pattern matches the empty cell, too
        if not body.startswith(b'"', begin):
            return cell.end(), None, False
        closed = cell.end(1) >= 0
        lines = body.count(b"\n", begin, cell.end(1) if closed else len(body))
        stray = cell[2].removesuffix(b"\r")  # a carriage return stands only before a line feed
        if closed and lines <= QUOTED_LINES and not (lines and stray):
            text = cell[0].removesuffix(b"\r").decode()
            fault = f"text follows the closing quote of cell {shown(text)}" if stray else None
            return cell.end(), fault, False
        line += body.count(b"\n", start, begin)
        if refuse and lines > QUOTED_LINES:
            text = f"A quote that opens on line {line} is not closed within {QUOTED_LINES} lines."
            raise TableError(400, "unclosed_quote", text, line)
        # A stray quote, perhaps paired with one lines later, must not swallow the data in between: the cell
        # ends with its line.
        end = body.find(b"\n", begin)
        return len(body) if end < 0 else end, f"a quote that opens on line {line} is not closed", True

    def _blank(self, starts: Offsets, stops: Offsets, counts: Offsets) -> NDArray[np.bool_]:
        """Say which records are lines without anything but blanks."""
        lead = self._octets.take(starts, mode="clip")
        blank: NDArray[np.bool_] = (counts == 1) & ((starts == stops) | (lead == BLANK) | (lead == TAB))
        for row in np.flatnonzero(blank & (starts < stops)):
            blank[row] = not self._body[starts[row] : stops[row]].strip(b" \t")
        return blank

    def _read(
        self, layout: _Layout, used: Sequence[int], decimal_comma: bool, moments: Mapping[int, float], first: bool
    ) -> Block:
        """Turn a layout into a block."""
        spans = zip(layout.starts.tolist(), layout.stops.tolist(), strict=True)
        lines = [self._body[start:stop] for start, stop in spans]
        block = Block(int(layout.line_numbers[0]), lines, layout.line_numbers, [], dict(layout.bad), {})
        width = len(self.header.names)
        whole = layout.counts == width
        for row in np.flatnonzero(~whole).tolist() + list(layout.open_quotes):
            self._mend(block, layout, row)
        whole[list(layout.bad)] = False
        rows = np.flatnonzero(whole)
        ends = layout.cell_ends[layout.first_cells[rows, np.newaxis] + np.arange(width)]
        ends[:, -1] = layout.stops[rows]
        starts = np.column_stack([layout.starts[rows], ends[:, :-1] + 1])
        if (layout.stops - layout.starts).max() > self._limits.cell:
            short = self._short(block, starts, ends, rows)
            rows, starts, ends = rows[short], starts[short], ends[short]
        for place, column in enumerate(used):
            cells = self._body, self._octets, starts[:, column], ends[:, column], decimal_comma
            numbers, bad = read_moments(*cells, moments[column]) if column in moments else read_numbers(*cells)
            name = self.header.names[column] or str(column + 1)
            if first and len(bad) == len(rows) and bad:
                raise self._unreadable(name, *bad[0], int(layout.line_numbers[rows[0]]), len(rows))
            for index, (cell, fault) in bad.items():
                _note(block.bad, int(rows[index]), f"cell {shown(cell.decode())} in column {name} {fault}")
                block.unread.setdefault(int(rows[index]), set()).add(place)
            values = np.full(len(lines), np.nan)
            values[rows] = numbers
            block.columns.append(values)
        return block

    def _mend(self, block: Block, layout: _Layout, row: int) -> None:
        """Note a wrong number of cells, and keep the results of the row under their headers."""
        width, count, line = len(self.header.names), int(layout.counts[row]), block.lines[row]
        head = line + b'"' if row in layout.open_quotes else line
        tail = b""
        if count > width:
            cut = int(layout.cell_ends[layout.first_cells[row] + width - 1] - layout.starts[row])
            head, tail = head[:cut], head[cut:]
        head += self._delimiter * (width - count)
        block.mended[row] = head, tail
        if count != width and row not in layout.bad:
            block.bad[row] = f"{count} {'cell' if count == 1 else 'cells'} where the header has {width}"

    def _short(self, block: Block, starts: Offsets, ends: Offsets, rows: Offsets) -> NDArray[np.bool_]:
        """Say which rows have no cell over the limit, and note those that have."""
        limit = self._limits.cell
        short = np.ones(len(rows), np.bool_)
        for index, column in np.argwhere(ends - starts > limit).tolist():
            cell = _text(self._body[starts[index, column] : ends[index, column]])
            if len(cell) > limit:
                short[index] = False
                _note(block.bad, int(rows[index]), f"cell {shown(cell)} is longer than {limit} characters")
        return short

    def _unreadable(self, name: str, cell: bytes, fault: str, line: int, rows: int) -> TableError:
        text = f"Column {name} cannot be read: cell {shown(cell.decode())} on line {line} {fault}"
        text += "." if rows == 1 else f"; none of the first {rows} rows has a number there."
        return TableError(422, "not_a_number", text, line, name)


def _note(bad: dict[int, str], row: int, reason: str) -> None:
    bad[row] = f"{bad[row]}; {reason}" if row in bad else reason


def _text(cell: bytes) -> str:
    """Return what stands in a cell, without its quotes."""
    if cell.startswith(b'"'):
        cell = cell[1:-1].replace(b'""', b'"')
    return cell.decode()
