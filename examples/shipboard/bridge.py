"""From a ship's instruments to a daily table of fluxes: averages what they say, asks the service, loses nothing.

    bridge.py sample.log                       a log, averaged and answered; the program ends with it
    bridge.py --follow data.log                a log that still grows
    bridge.py serial:/dev/ttyUSB0 udp:10110    instruments, recorded and averaged until the program is stopped

The ship is described in ship.toml. Exit status: 0 done, 1 refused by the service, 2 cannot run, 3 intervals wait.
"""

import argparse
import fcntl
import signal
import sys
import threading
import time
import tomllib
from collections.abc import Iterator
from contextlib import contextmanager, suppress
from dataclasses import dataclass
from datetime import timedelta
from pathlib import Path

from answers import Refused, Service, Unavailable
from averages import MEANS, Interval, stamp
from instruments import Analyser, Reader
from journal import Daily, Place, Queue
from log import Log, Recorder

BATCH = 10_000  # intervals in one request
SHORTEST_WAIT, LONGEST_WAIT = 1.0, 60.0  # s, before the service is asked again
LOOK = 0.25  # s, between two looks at a log that grows
DAY = 86_400  # s


@dataclass(frozen=True)
class Ship:
    """What ship.toml says."""

    url: str
    length: timedelta
    reader: Reader
    question: dict[str, str]


class Stop(Exception):
    """A reason to end, in one line, and the exit status."""

    def __init__(self, reason: str, status: int = 2) -> None:
        super().__init__(reason)
        self.status = status


class Bridge:
    """Averages a log, keeps the intervals in a queue, and empties it into the daily tables when the service answers."""

    def __init__(self, ship: Ship, queue: Queue, daily: Daily, log: Log) -> None:
        self.ship, self.queue, self.daily, self.log = ship, queue, daily, log
        self.service = Service(ship.url, ship.question)
        self.late = 0
        self._open: Interval | None = None
        self._until = queue.place.until
        self._ask_at = self._wait = 0.0
        self._told = ""
        queue.drop(daily.known(queue.rows))

    def average(self) -> None:
        """Average the lines that are there; an interval is kept as soon as a line of a later one is read."""
        for file, start, text in self.log.lines():
            line = self.ship.reader.read(text)
            if line.time is not None and stamp(line.time) < self._until:
                self.late += 1  # its interval is kept already: the clock was set back
                continue
            if line.time is not None and (self._open is None or line.time >= self._open.end):
                self.keep(file, start)
                self._open = Interval.around(line.time, self.ship.length)
            if self._open is None:
                continue
            if line.time is not None and line.time < self._open.start:
                self.late += 1
                continue
            self._open.add(line)

    def keep(self, file: str, offset: int) -> None:
        """Queue the open interval, and where the log goes on behind it."""
        if self._open is not None:
            self._until = stamp(self._open.end)
            self.queue.add(self._open.row(), Place(file, offset, self._until))
            self._open = None

    def deliver(self) -> None:
        """Ask for the intervals that wait, and move them to the daily tables."""
        while self.queue.rows and time.monotonic() >= self._ask_at:
            batch = self.queue.rows[:BATCH]
            try:
                header, lines = self.service.flux(batch)
            except (Unavailable, Refused) as error:
                self._wait = min(max(2 * self._wait, SHORTEST_WAIT, getattr(error, "wait", 0.0)), LONGEST_WAIT)
                self._ask_at = time.monotonic() + self._wait
                self._tell(f"{error}; what waits is kept in {self.queue.path.name}")
                if isinstance(error, Refused):
                    raise
                return
            self.daily.write(header, lines)
            self.queue.drop(row["time"] for row in batch)
            self._wait = 0.0
            if len(batch) > 1 or self._told:
                self._tell(f"{len(batch)} intervals answered in one batch")
            self._told = ""

    def finish(self) -> int:
        """Average a log to its end, ask once, and return the exit status."""
        self.average()
        self.keep(self.log.file, self.log.offset)
        self.deliver()
        if self.late:
            self._tell(f"{self.late} lines were of intervals that were kept before, and are left out")
        return 3 if self.queue.rows else 0

    def follow(self, stopped: threading.Event) -> int:
        """Average and ask until told to stop; what was refused is asked again, for the service may be mended."""
        while not stopped.is_set():
            self.average()
            with suppress(Refused):
                self.deliver()
            stopped.wait(LOOK)
        return 0

    def _tell(self, text: str) -> None:
        if text != self._told:
            print(f"bridge: {text}", file=sys.stderr, flush=True)
            self._told = text


def run(ship: Ship, sources: list[str], data: Path, follow: bool) -> int:
    """Run until the log ends, or the program is told to stop; return the exit status."""
    live = [source for source in sources if source.partition(":")[0] in ("serial", "udp")]
    if live and len(live) < len(sources):
        raise Stop("a log and instruments cannot be read at once: instruments are recorded to a log of their own")
    stopped = threading.Event()
    for number in (signal.SIGTERM, signal.SIGINT):
        signal.signal(number, lambda *_: stopped.set())
    with alone(data):
        queue = Queue(data / "queue.jsonl")
        if not live:
            log = Log(lambda: [Path(each) for each in sources], queue.place.file, queue.place.offset)
            bridge = Bridge(ship, queue, Daily(data), log)
            return bridge.follow(stopped) if follow else bridge.finish()
        folder = data / "log"
        folder.mkdir(exist_ok=True)
        log = Log(lambda: sorted(folder.glob("*.log")), queue.place.file, queue.place.offset)
        recorder = Recorder(folder, live, stopped)
        recorder.start()
        status = Bridge(ship, queue, Daily(data), log).follow(stopped)
        recorder.join()
        if recorder.failed:
            raise Stop(f"recording ended: {recorder.failed}")
        return status


@contextmanager
def alone(data: Path) -> Iterator[None]:
    """Hold a folder against a second bridge, which would write every interval again."""
    data.mkdir(parents=True, exist_ok=True)
    with (data / "lock").open("w") as lock:
        try:
            fcntl.flock(lock, fcntl.LOCK_EX | fcntl.LOCK_NB)
        except BlockingIOError:
            raise Stop(f"another bridge writes to {data}") from None
        yield


def read_ship(path: Path, url: str | None) -> Ship:
    """Return what the description of a ship says."""
    try:
        said = tomllib.loads(path.read_text())
        seconds = int(said["interval"])
        analyser = said["analyser"]
        question = {name: str(value) for name, value in said["question"].items()}
        layout = Analyser(analyser["starts"], tuple(analyser["cells"]), frozenset(analyser["missing"]))
        transducers = dict(said["transducers"])
        address = url or str(said["url"])
    except (OSError, tomllib.TOMLDecodeError, KeyError, TypeError, ValueError) as error:
        raise Stop(f"cannot use {path}: {type(error).__name__} {error}") from error
    if seconds < 1 or DAY % seconds:
        raise Stop(f"{path}: interval must divide a day of {DAY} s, and {seconds} s does not")
    if unknown := [name for name in (*layout.cells, *transducers.values()) if name and name not in MEANS]:
        raise Stop(f"{path}: {', '.join(unknown)} is not averaged here; what is: {', '.join(MEANS)}")
    return Ship(address, timedelta(seconds=seconds), Reader(layout, transducers), question)


def arguments() -> argparse.Namespace:
    here = Path(__file__).parent
    parser = argparse.ArgumentParser(description="From a ship's instruments to a daily table of fluxes.")
    parser.add_argument("source", nargs="+", help="a log, or serial:PORT[@BAUD], udp:PORT")
    parser.add_argument("--follow", action="store_true", help="the log still grows: go on until stopped")
    parser.add_argument("--ship", type=Path, default=here / "ship.toml", help="description (default: beside this file)")
    parser.add_argument("--data", type=Path, default=Path("data"), help="folder of the tables (default: %(default)s)")
    parser.add_argument("--url", help="of the service (default: as the description says)")
    return parser.parse_args()


if __name__ == "__main__":
    try:
        options = arguments()
        ship = read_ship(options.ship, options.url)
        sys.exit(run(ship, options.source, options.data, options.follow))
    except (Stop, Refused, OSError) as error:
        print(f"bridge: {error}", file=sys.stderr)
        sys.exit(getattr(error, "status", 1 if isinstance(error, Refused) else 2))
