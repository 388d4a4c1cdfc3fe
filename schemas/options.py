"""The fields of what stands once in a request: a word out of a list, several words, a line, a number."""

from collections.abc import Iterable
from typing import Any

from marshmallow import ValidationError, fields

from schemas.samples import NUMBER
from service.physics.faults import Fault, unknown

ONCE = "stands once for the whole request, never as a list or a CSV column"


class Choice(fields.Field[str]):
    """One word out of a closed list; case, blanks and hyphens may be forgiven."""

    def __init__(self, choices: Iterable[str], forgiving: bool = False, **more: Any) -> None:
        super().__init__(**more)
        self.choices = tuple(choices)
        self.forgiving = forgiving

    def _deserialize(self, value: Any, attr: str | None, data: Any, **kwargs: Any) -> str:
        if type(value) is int:
            value = str(value)  # "strict": 1
        if not isinstance(value, str):
            allowed = ", ".join(self.choices)
            raise ValidationError([Fault("unknown_option", str(attr), f"must be one of {allowed}; it {ONCE}", allowed)])
        word = value.strip()
        if self.forgiving:
            word = "".join(word.lower().replace("-", "").replace("_", "").split())
        if word not in self.choices:
            fault = unknown(word, self.choices, f"one of {', '.join(self.choices)}")
            told = Fault("unknown_option", str(attr), f"{word[:100]!r} {fault.reason}", ", ".join(self.choices))
            raise ValidationError([told])
        return word


class Words(fields.Field[tuple[str, ...]]):
    """Several words: an array in JSON, parted by semicolons elsewhere; at least one, unless none does no harm."""

    def __init__(self, may_be_empty: bool = False, **more: Any) -> None:
        super().__init__(**more)
        self.may_be_empty = may_be_empty

    def _deserialize(self, value: Any, attr: str | None, data: Any, **kwargs: Any) -> tuple[str, ...]:
        words = value.split(";") if isinstance(value, str) else value
        if not isinstance(words, list) or not all(isinstance(word, str) for word in words):
            raise ValidationError([Fault("unknown_option", str(attr), "must be text or an array of texts")])
        kept = [word.strip() for word in words if word.strip()]
        if len(set(kept)) < len(kept):
            raise ValidationError([Fault("repeated_name", str(attr), "names one thing twice")])
        if not kept and not self.may_be_empty:
            raise ValidationError([Fault("unknown_option", str(attr), "is empty: name something, or leave it out")])
        return tuple(kept)


class Line(fields.Field[str]):
    """A short text."""

    def _deserialize(self, value: Any, attr: str | None, data: Any, **kwargs: Any) -> str:
        if not isinstance(value, str):
            raise ValidationError([Fault("unknown_option", str(attr), "must be text")])
        return value.strip()


class OptionNumber(fields.Field[float]):
    """One number within limits, whole where asked for."""

    def __init__(self, low: float, high: float, whole: bool = False, **more: Any) -> None:
        super().__init__(**more)
        self.low, self.high, self.whole = low, high, whole

    def _deserialize(self, value: Any, attr: str | None, data: Any, **kwargs: Any) -> float:
        if isinstance(value, str) and NUMBER.fullmatch(value.strip()):
            value = float(value)
        kind = "a whole number" if self.whole else "a number"
        allowed = f"{kind} from {self.low:g} to {self.high:g}"
        good = type(value) in (int, float) and self.low <= value <= self.high
        if not good or (self.whole and value != int(value)):
            raise ValidationError([Fault("unknown_option", str(attr), f"must be {allowed}; it {ONCE}", allowed)])
        return float(value)
