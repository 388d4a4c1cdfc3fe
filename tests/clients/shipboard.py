"""The logger bridge as its tests run it, and what it leaves behind."""

import csv
import io
import json
import re
import subprocess
import sys
from datetime import UTC, datetime, timedelta
from pathlib import Path

from tests.clients.running import ENVIRONMENT, EXAMPLES, PATIENCE

SHIPBOARD = EXAMPLES / "shipboard"
SAMPLE = SHIPBOARD / "sample.log"
BEGIN = datetime(2024, 4, 16, 12, 0, tzinfo=UTC)

Table = dict[str, bytes]


def command(url: str, data: Path, *more: str | Path) -> list[str]:
    told = more or (SAMPLE,)
    return [sys.executable, str(SHIPBOARD / "bridge.py"), "--url", url, "--data", str(data), *map(str, told)]


def bridge(url: str, data: Path, *more: str | Path) -> "subprocess.CompletedProcess[str]":
    return subprocess.run(
        command(url, data, *more), capture_output=True, text=True, timeout=PATIENCE, check=False, env=ENVIRONMENT
    )


def tables(data: Path) -> Table:
    return {path.name: path.read_bytes() for path in sorted(data.glob("flux_*.csv"))}


def rows(data: Path) -> list[dict[str, str]]:
    """Return the rows of all days under names without units."""
    found = []
    for text in tables(data).values():
        lines = csv.reader(io.StringIO(text.decode(), newline=""))
        names = [name.partition(" [")[0] for name in next(lines)]
        found += [dict(zip(names, cells, strict=True)) for cells in lines]
    return found


def waiting(data: Path) -> int:
    queue = data / "queue.jsonl"
    return sum("row" in json.loads(line) for line in queue.read_text().splitlines()) if queue.exists() else 0


def ship(folder: Path, interval: int, **question: str) -> Path:
    """Return a description like the one that comes with the bridge, with another interval."""
    text = re.sub(r"(?m)^interval = \d+", f"interval = {interval}", (SHIPBOARD / "ship.toml").read_text())
    for name, value in question.items():
        text = re.sub(rf'(?m)^{name} = "\w+"', f'{name} = "{value}"', text)
    path = folder / f"ship_{interval}.toml"
    path.write_text(text)
    return path


def sentence(body: str) -> str:
    checksum = 0
    for character in body:
        checksum ^= ord(character)
    return f"${body}*{checksum:02X}"


def log(folder: Path, *lines: str) -> Path:
    """Return a log of lines one second apart."""
    path = folder / "written.log"
    path.write_text(
        "".join(f"{BEGIN + timedelta(seconds=place):%Y-%m-%dT%H:%M:%S}Z {line}\n" for place, line in enumerate(lines))
    )
    return path
