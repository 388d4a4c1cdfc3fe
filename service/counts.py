"""What the service has done, counted over all its workers, for Prometheus.

The workers count in files that they share through memory. The client library is loaded only where they are made: it
chooses how to count when it is loaded.
"""

import fcntl
import os
import shutil
import tempfile
from collections.abc import Iterator
from contextlib import contextmanager, suppress
from functools import lru_cache
from pathlib import Path
from typing import Any

CONTENT_TYPE = "text/plain; version=0.0.4; charset=utf-8"
FOLDER_VARIABLE = "PROMETHEUS_MULTIPROC_DIR"  # where the client library looks for it
SHARED_MEMORY = "/dev/shm"
PREFIX, ALIVE, LOCK = "catspaw-counts-", "alive", "lock"
KINDS = ("counter", "histogram")
SECONDS = (0.005, 0.01, 0.025, 0.05, 0.075, 0.1, 0.25, 0.5, 0.75, 1.0, 2.5, 5.0, 7.5, 10.0)  # as OpenTelemetry has them
METHODS = frozenset({"GET", "HEAD", "POST", "OPTIONS"})
OTHER = "other"


class Counts:
    """The counts of one server and its workers.

    Parameters
    ----------
    folder : path
        Where they are kept, as :func:`make_folder` made it.
    """

    def __init__(self, folder: Path) -> None:
        os.environ[FOLDER_VARIABLE] = str(folder)
        from prometheus_client import CollectorRegistry, Counter, Histogram

        self.folder = folder
        self._alive = open(folder / ALIVE, "rb")  # noqa: SIM115  held for as long as the processes live
        fcntl.flock(self._alive, fcntl.LOCK_SH)
        mine: dict[str, Any] = {"registry": CollectorRegistry()}
        place = ("route", "method")
        self.requests = Counter("catspaw_requests", "Requests answered", (*place, "status"), **mine)
        duration = ("catspaw_request_duration_seconds", "From the head of a request to its last byte")
        self.seconds = Histogram(*duration, place, buckets=SECONDS, **mine)
        self.samples = Counter("catspaw_samples", "Samples computed", place, **mine)
        self.received = Counter("catspaw_request_bytes", "Bytes of bodies received, as sent", place, **mine)
        self.sent = Counter("catspaw_response_bytes", "Bytes of bodies sent", place, **mine)
        self._of_place = lru_cache(256)(self._find_place)
        self._of_status = lru_cache(1024)(self.requests.labels)

    def _find_place(self, route: str, method: str) -> tuple[Any, ...]:
        return tuple(each.labels(route, method) for each in (self.seconds, self.samples, self.received, self.sent))

    def add(self, route: str | None, method: str, status: str, seconds: float, amounts: tuple[int, int, int]) -> None:
        """Count a request.

        Parameters
        ----------
        route : str or None
            The rule of its address, None where there is none: nothing that a caller makes up becomes a label.
        method, status : str
            As HTTP has them.
        seconds : float
            What it took. [s]
        amounts : tuple of int
            Samples, bytes received, bytes sent.
        """
        place = (route or OTHER, method if method in METHODS else OTHER)
        duration, *totals = self._of_place(*place)
        self._of_status(*place, status).inc()
        duration.observe(seconds)
        for total, amount in zip(totals, amounts, strict=True):
            if amount:
                total.inc(amount)

    def take_over(self, pid: int) -> None:
        """Add what an ended worker counted to what all ended ones did, so that its files do not stay."""
        from prometheus_client import mmap_dict

        kept: Any = mmap_dict.MmapedDict  # the library leaves it untyped
        with _locked(self.folder, fcntl.LOCK_EX):
            for kind in KINDS:
                left = self.folder / f"{kind}_{pid}.db"
                if not left.exists():
                    continue
                ended = kept(str(self.folder / f"{kind}_ended.db"))
                for key, value, _, _ in kept.read_all_values_from_file(str(left)):
                    ended.write_value(key, ended.read_value(key)[0] + value, 0.0)
                ended.close()
                left.unlink()

    def end(self) -> None:
        """Remove the files."""
        self._alive.close()
        shutil.rmtree(self.folder, ignore_errors=True)


def make_folder() -> Path | None:
    """Return a new folder to count in, in memory if there is a place, or None where nothing can be written."""
    for place in (SHARED_MEMORY, None):
        with suppress(OSError):
            parent = Path(place or tempfile.gettempdir())  # which fails where there is none
            for old in parent.glob(f"{PREFIX}*"):
                _remove_if_left(old)
            folder = Path(tempfile.mkdtemp(prefix=PREFIX, dir=parent))
            for name in (ALIVE, LOCK):
                (folder / name).touch()
            return folder
    return None


def _remove_if_left(folder: Path) -> None:
    """Remove a folder whose processes were killed, so that none is there to remove it."""
    with suppress(OSError), (folder / ALIVE).open("rb") as alive:
        fcntl.flock(alive, fcntl.LOCK_EX | fcntl.LOCK_NB)
        shutil.rmtree(folder, ignore_errors=True)


def exposition() -> bytes | None:
    """Return all counts as text for Prometheus, or None where nothing is counted."""
    folder = os.environ.get(FOLDER_VARIABLE)
    if not folder or not Path(folder, LOCK).exists():
        return None
    from prometheus_client import CollectorRegistry, generate_latest
    from prometheus_client.multiprocess import MultiProcessCollector

    registry = CollectorRegistry()
    MultiProcessCollector(registry, path=folder)  # type: ignore[no-untyped-call]  # the library leaves it untyped
    with _locked(Path(folder), fcntl.LOCK_SH):
        return generate_latest(registry)


@contextmanager
def _locked(folder: Path, how: int) -> Iterator[None]:
    with (folder / LOCK).open("rb") as lock:
        fcntl.flock(lock, how)
        yield
