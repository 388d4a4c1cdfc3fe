"""What can be wrong with a question, told so that the person who asked can mend it."""

from collections.abc import Iterable
from dataclasses import dataclass
from difflib import get_close_matches

CODES = {
    "unknown_name": "a name that is not in the vocabulary of this quantity",
    "repeated_name": "a name given twice",
    "unused": "an input that the chosen methods do not use",
    "missing_input": "an input that is needed and was not sent",
    "two_ways": "two ways of giving what may be given once",
    "unknown_option": "a value that an option does not take",
    "unit": "a unit that is unknown or of another dimension",
    "not_a_number": "text where a number is expected",
    "decimal_comma": "a comma in a number",
    "length": "arrays of unequal length, or of none",
    "order": "times that do not increase",
    "near_miss": "a CSV header that is nearly the name of an input",
    "collision": "a CSV header that is also the name of a column to be written",
    "column": "a CSV column that is named but not there",
    "table": "a CSV table that cannot be read as one",
    "empty": "no content",
    "unreadable": "content that cannot be read",
    "cut_short": "fewer bytes than announced",
    "too_large": "more than a limit allows",
    "media_type": "a content encoding that is not read",
    "bad_sample": "a sample without a result, under strict=1",
    "not_found": "no such address or name",
    "method": "an HTTP method that the address does not take",
    "busy": "no free place in time; the same request may be sent again",
    "internal": "a fault of the service",
}


@dataclass(frozen=True, slots=True)
class Fault:
    """One thing that is wrong: its code, where it is, why, and what is allowed."""

    code: str
    name: str
    reason: str
    allowed: str | None = None
    sample: int | None = None
    line: int | None = None


class Refused(Exception):
    """A question that cannot be answered as asked."""

    def __init__(self, *faults: Fault, status: int = 422) -> None:
        super().__init__("; ".join(f"{fault.name}: {fault.reason}" for fault in faults[:3]))
        self.faults = faults
        self.status = status


def nearest(name: str, known: Iterable[str]) -> str | None:
    """Return the known name that a misspelt one most resembles, or None."""
    plain = name.strip().lower().replace(" ", "_").replace("-", "_")
    return next(iter(get_close_matches(plain, list(known), n=1, cutoff=0.75)), None)


def unknown(name: str, known: Iterable[str], what: str = "a name that this address knows") -> Fault:
    """Return the fault of an unknown name, with the nearest known one."""
    shown = name[:100]
    near = nearest(shown, known)
    hint = f"did you mean {near}?" if near else None
    return Fault("unknown_name", shown, f"is not {what}" + (f"; {hint}" if hint else ""), allowed=near)
