"""What must outlive the program: intervals that wait for an answer, how far the log is averaged, and the daily tables.

An interval enters the queue by one synced append that also says where the log goes on. It leaves by an atomic exchange
of the file, after its answered line is synced into the table of its day. Killed between these two, the program finds
the line in the table when it starts again, and does not ask twice.
"""

import json
import os
from collections.abc import Iterable, Sequence
from dataclasses import dataclass
from pathlib import Path

from averages import Row


@dataclass(frozen=True)
class Place:
    """How far the log is averaged: a file, the byte in it where the next line begins, and the end of the interval."""

    file: str = ""
    offset: int = 0
    until: str = ""


class Queue:
    """Intervals that wait for an answer, in the order of time."""

    def __init__(self, path: Path) -> None:
        self.path = path
        self.place = Place()
        self.rows: list[Row] = []
        mend(path)
        if path.exists():
            for line in path.read_text().splitlines():
                entry = json.loads(line)
                self.place = Place(*entry["place"])
                self.rows += [entry["row"]] if "row" in entry else []

    def add(self, row: Row, place: Place) -> None:
        """Keep a row, and where the log goes on behind it, in one append."""
        append(self.path, _entry(place, row))
        self.rows.append(row)
        self.place = place

    def drop(self, times: Iterable[str]) -> None:
        """Take rows out whose answers are in the daily tables."""
        gone = set(times)
        kept = [row for row in self.rows if row["time"] not in gone]
        if len(kept) == len(self.rows):
            return
        lines = b"".join(_entry(self.place, row) for row in kept) or _entry(self.place)
        new = self.path.with_suffix(".new")
        new.unlink(missing_ok=True)
        append(new, lines)
        os.replace(new, self.path)
        sync_directory(self.path.parent)
        self.rows = kept


def _entry(place: Place, row: Row | None = None) -> bytes:
    entry: dict[str, object] = {"place": [place.file, place.offset, place.until]}
    if row is not None:
        entry["row"] = row
    return json.dumps(entry).encode() + b"\n"


class Daily:
    """One table for each day, ``flux_2024-04-16.csv``; another beside it if the columns change during the day."""

    def __init__(self, directory: Path) -> None:
        self.directory = directory

    def tables(self, day: str) -> list[Path]:
        return sorted(self.directory.glob(f"flux_{day}*.csv"))

    def known(self, rows: Sequence[Row]) -> set[str]:
        """Return which times of these rows are in the tables, a torn last line taken off first."""
        found: set[str] = set()
        for day in {row["time"][:10] for row in rows}:
            for table in self.tables(day):
                mend(table)
                found |= {line.partition(",")[0] for line in table.read_text().splitlines()[1:]}
        return found & {row["time"] for row in rows}

    def write(self, header: str, lines: Sequence[str]) -> None:
        """Append answered lines to the tables of their days."""
        for day in sorted({line[:10] for line in lines}):
            table = self._table(day, header)
            text = "".join(f"{line}\n" for line in lines if line.startswith(day))
            if not table.exists() or table.stat().st_size == 0:
                text = f"{header}\n{text}"
            append(table, text.encode())

    def _table(self, day: str, header: str) -> Path:
        number = 1
        while True:
            table = self.directory / (f"flux_{day}.csv" if number == 1 else f"flux_{day}_{number}.csv")
            if not table.exists():
                return table
            with table.open() as lines:
                first = lines.readline()
            if first in ("", f"{header}\n"):
                return table
            number += 1


def append(path: Path, text: bytes) -> None:
    """Append bytes and wait until they are on the disk; taken back if they do not fit on it."""
    is_new = not path.exists()
    handle = os.open(path, os.O_WRONLY | os.O_APPEND | os.O_CREAT, 0o644)
    try:
        before = os.fstat(handle).st_size
        try:
            left = memoryview(text)
            while left:
                left = left[os.write(handle, left) :]
            os.fsync(handle)
        except OSError:
            os.ftruncate(handle, before)
            raise
    finally:
        os.close(handle)
    if is_new:
        sync_directory(path.parent)


def mend(path: Path) -> None:
    """Take off a last line that was not written to its end."""
    if not path.exists():
        return
    text = path.read_bytes()
    whole = text.rfind(b"\n") + 1
    if whole < len(text):
        os.truncate(path, whole)


def sync_directory(path: Path) -> None:
    handle = os.open(path, os.O_RDONLY)
    try:
        os.fsync(handle)
    finally:
        os.close(handle)
