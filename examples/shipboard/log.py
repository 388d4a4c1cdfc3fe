"""The log: files of lines as they were received, which is all the bridge averages from, live or later."""

import os
import socket
import threading
from collections.abc import Callable, Iterator
from datetime import UTC, datetime
from pathlib import Path

import serial
from journal import sync_directory

DATAGRAM = 65535  # bytes, the longest there is
TICK = 1.0  # s
LONGEST_LINE = 1000  # bytes; what is longer is noise, and is cut there


class Log:
    """Reads whole lines of files, one file after the other, from a given place on."""

    def __init__(self, files: Callable[[], list[Path]], file: str, offset: int) -> None:
        self._files = files
        self.file, self.offset = file, offset

    def lines(self) -> Iterator[tuple[str, int, str]]:
        """Yield the file, the byte where a line begins, and the line, as far as there are whole lines."""
        while files := self._files():
            names = [path.name for path in files]
            if self.file not in names:
                self.file, self.offset = names[0], 0
            here = names.index(self.file)
            yield from self._of(files[here])
            if here + 1 == len(files):
                return
            self.file, self.offset = names[here + 1], 0

    def _of(self, path: Path) -> Iterator[tuple[str, int, str]]:
        with path.open("rb") as file:
            if os.fstat(file.fileno()).st_size < self.offset:  # emptied and begun anew
                self.offset = 0
            file.seek(self.offset)
            for line in file:
                if not line.endswith(b"\n"):
                    return
                start = self.offset
                self.offset += len(line)
                yield self.file, start, line.decode("ascii", errors="replace")


class Recorder:
    """Writes what serial ports and datagrams bring, each line behind its time, to a file for each day."""

    def __init__(self, directory: Path, sources: list[str], stopped: threading.Event) -> None:
        self.directory = directory
        self.failed: Exception | None = None
        self._sources, self._stopped = sources, stopped
        self._lock = threading.Lock()
        self._name = max((path.name for path in directory.glob("*.log")), default="")
        self._handle = -1
        self._threads: list[threading.Thread] = []

    def start(self) -> None:
        jobs = [(self._listen, (source,)) for source in self._sources]
        for job, arguments in [*jobs, (self._keep_time, ())]:
            thread = threading.Thread(target=self._guarded, args=(job, *arguments), daemon=True)
            thread.start()
            self._threads.append(thread)

    def join(self) -> None:
        for thread in self._threads:
            thread.join(5.0)

    def write(self, line: bytes) -> None:
        """Write a line behind the time; never into the file of a day that is over, even if the clock is set back."""
        text = bytes(byte for byte in line[:LONGEST_LINE].strip() if 32 <= byte < 127)
        with self._lock:
            now = datetime.now(UTC)
            name = max(self._name, f"{now:%Y-%m-%d}.log")
            if name != self._name or self._handle < 0:
                self._open(name)
            stamp = now.strftime("%Y-%m-%dT%H:%M:%S.%f")[:-3]
            os.write(self._handle, f"{stamp}Z ".encode() + text + b"\n")

    def _open(self, name: str) -> None:
        if self._handle >= 0:
            os.fsync(self._handle)
            os.close(self._handle)
        self._handle = os.open(self.directory / name, os.O_RDWR | os.O_APPEND | os.O_CREAT, 0o644)
        size = os.fstat(self._handle).st_size
        if size and os.pread(self._handle, 1, size - 1) != b"\n":
            os.write(self._handle, b"\n")  # ends a line that was not written to its end
        sync_directory(self.directory)
        self._name = name

    def _guarded(self, job: Callable[..., None], *arguments: str) -> None:
        try:
            job(*arguments)
        except (OSError, ValueError) as error:  # a port that is not there or went away, a full disk
            self.failed = error
            self._stopped.set()

    def _keep_time(self) -> None:
        """Write the time alone now and then, so that an interval ends though no instrument speaks; sync the file."""
        while not self._stopped.wait(TICK):
            self.write(b"")
            with self._lock:
                os.fsync(self._handle)

    def _listen(self, source: str) -> None:
        kind, _, rest = source.partition(":")
        if kind == "udp":
            self._datagrams(int(rest))
        else:
            self._serial(rest)

    def _datagrams(self, port: int) -> None:
        with socket.socket(socket.AF_INET, socket.SOCK_DGRAM) as receiver:
            receiver.setsockopt(socket.SOL_SOCKET, socket.SO_REUSEADDR, 1)
            receiver.bind(("", port))
            receiver.settimeout(0.5)
            while not self._stopped.is_set():
                try:
                    datagram = receiver.recv(DATAGRAM)
                except TimeoutError:
                    continue
                for line in datagram.splitlines():
                    self.write(line)

    def _serial(self, address: str) -> None:
        """Read a port, ``/dev/ttyUSB0`` or ``/dev/ttyUSB0@9600``; NMEA 0183 runs at 4800 baud."""
        port, _, baud = address.partition("@")
        waiting = b""
        with serial.serial_for_url(port, baudrate=int(baud or 4800), timeout=0.5) as device:
            while not self._stopped.is_set():
                waiting += device.read_until(b"\n", LONGEST_LINE)
                if waiting.endswith(b"\n") or len(waiting) >= LONGEST_LINE:
                    self.write(waiting)
                    waiting = b""
