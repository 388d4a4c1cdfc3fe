"""A request that was checked: the question, its numbers, and how the answer is to be written."""

from collections.abc import Mapping
from dataclasses import dataclass, field
from typing import Any

from schemas.samples import Column
from service.physics.declare import Array
from service.physics.question import Question
from service.physics.units import Conversion


@dataclass(frozen=True, slots=True)
class Input:
    """An input of a checked request: how it becomes a term's number, and its numbers or its column."""

    term: str
    conversion: Conversion
    values: Array | None
    column: Column | None


@dataclass(frozen=True, slots=True)
class SeriesAsked:
    """What is asked of a summary: the times, the area, and the inputs whose error all samples share."""

    time: Input
    area: float | None
    common: frozenset[str]


@dataclass(frozen=True, slots=True)
class Request:
    """A checked request: the question, its inputs, and how the answer is to be written."""

    question: Question
    inputs: tuple[Input, ...]
    samples: int
    options: Mapping[str, Any]
    doubts: tuple[Input, ...] = ()
    correlations: Mapping[tuple[str, str], float] = field(default_factory=dict)
    series: SeriesAsked | None = None
