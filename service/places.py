"""Places that are few: for large requests at work at once, and for the bytes of large bodies held at once."""

import threading
from collections.abc import Iterator
from contextlib import contextmanager

from service.config import MEBIBYTE, Config

SMALL_SAMPLES = 1_000  # a request of no more never waits
SMALL_BYTES = 100_000  # a body of no more is read into numbers without waiting: some 1,000 rows of ten columns
SMALL_BODY = MEBIBYTE // 2  # a body of no more is held without waiting
BODIES = 3  # of the longest kind that a worker holds at once


class Busy(Exception):
    """No place became free in time.

    Parameters
    ----------
    what : str
        What there was no place for.
    seconds : int
        How long it was waited for, and so after how long to ask again.
    """

    def __init__(self, what: str, seconds: int) -> None:
        super().__init__(what)
        self.what = what
        self.seconds = seconds


class Places:
    """So many places, of which a request takes one or more and gives them back."""

    def __init__(self, total: int, what: str, seconds: int) -> None:
        self._free = total
        self._total = total
        self._change = threading.Condition()
        self._what = what
        self._seconds = seconds

    def take(self, count: int = 1, patient: bool = False) -> int:
        """Take places, waiting for them, and return how many; a patient caller waits as long as it takes.

        Raises
        ------
        Busy
            Where they do not become free in time.
        """
        wanted = min(count, self._total)
        with self._change:
            if not self._change.wait_for(lambda: self._free >= wanted, None if patient else self._seconds):
                raise Busy(self._what, self._seconds)
            self._free -= wanted
        return wanted

    def give(self, count: int) -> None:
        """Give places back."""
        with self._change:
            self._free += count
            self._change.notify_all()


class Turn:
    """One request's place among those that compute at once: none while it is small, taken at most once."""

    def __init__(self, slots: Places) -> None:
        self._slots = slots
        self._held = 0

    def large(self, is_large: bool = True, patient: bool = False) -> None:
        """Wait for a place where the request is large and has none yet.

        Raises
        ------
        Busy
            Where none becomes free in time.
        """
        if is_large and not self._held:
            self._held = self._slots.take(patient=patient)

    def end(self) -> bool:
        """Give the place back, and tell whether there was one."""
        held, self._held = self._held, 0
        if held:
            self._slots.give(held)
        return bool(held)


class Gate:
    """What a worker's requests share: its computing slots and its room for bodies."""

    def __init__(self, config: Config) -> None:
        self.slots = Places(config.slots, "computing the large requests before this one", config.wait_seconds)
        longest = max(config.csv_bytes, config.json_bytes)
        self.room = Places(BODIES * longest, "reading the large bodies before this one", config.wait_seconds)

    @contextmanager
    def turn(self) -> Iterator[Turn]:
        """Yield a turn that ends with the block."""
        turn = Turn(self.slots)
        try:
            yield turn
        finally:
            turn.end()
