"""A plan: the steps to run in order, the inputs they need, and what the caller must be told of them."""

from collections.abc import Callable, Mapping
from dataclasses import dataclass
from typing import Any

from service.physics.declare import Array, Limits, Remark, Step


@dataclass(frozen=True, slots=True)
class Node:
    """A step placed in a plan: the function with its gas bound, and the keys of what goes in and out."""

    step: Step
    function: Callable[..., Any]
    arguments: tuple[str, ...]
    results: tuple[str, ...]


@dataclass(frozen=True, slots=True)
class Range:
    """Limits that a method states for one term, under the key at which the plan holds it."""

    step: Step
    term: str
    key: str
    limits: Limits
    recommended: bool


@dataclass(frozen=True, slots=True)
class Plan:
    """What leads from the inputs to what is wanted.

    Attributes
    ----------
    nodes : tuple of Node
        In the order in which they run.
    keys : mapping
        Wanted term to the key under which its value stands after the run.
    leaves : tuple of str
        Inputs that the steps need, given or not.
    defaults : mapping
        Those of them that were not given, with what is assumed.
    constants : mapping
        What the gas and the methods bring.
    missing : tuple of str
        What is neither given nor has a default nor can be computed.
    records : tuple of Step
        Every step used, those that only rename included.
    methods : mapping
        Family to the method chosen.
    ranges, remarks : tuple
        What the samples are judged by after the run.
    """

    nodes: tuple[Node, ...]
    keys: Mapping[str, str]
    leaves: tuple[str, ...]
    defaults: Mapping[str, float]
    constants: Mapping[str, Array]
    missing: tuple[str, ...]
    records: tuple[Step, ...]
    methods: Mapping[str, str]
    ranges: tuple[Range, ...]
    remarks: tuple[tuple[Remark, tuple[str, ...]], ...]
