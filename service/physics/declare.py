"""The records that declare the vocabulary, the published methods and the gases, and the registers that hold them."""

import inspect
from collections.abc import Callable, Mapping, Sequence
from dataclasses import dataclass, field, replace
from types import MappingProxyType
from typing import Any, Literal, TypeVar

import numpy as np
from numpy.typing import NDArray

Array = NDArray[np.float64]
Function = TypeVar("Function", bound=Callable[..., Any])

COEFFICIENTS = "coefficients"  # the parameter through which a step receives a gas's own coefficients


class DeclarationError(Exception):
    """A declaration contradicts another one, found at import."""


@dataclass(frozen=True, slots=True)
class Source:
    """A publication that numbers rest on."""

    key: str
    authors: str
    year: int
    title: str
    journal: str
    doi: str | None = None
    volume: str | None = None
    pages: str | None = None
    kind: Literal["article", "book", "report"] = "article"
    note: str | None = None

    @property
    def citation(self) -> str:
        """Return the author-year form used in answers, such as ``Wanninkhof (2014)``."""
        return f"{self.short_authors} ({self.year})"

    @property
    def short_authors(self) -> str:
        """Return the surnames as they stand in running text."""
        names = [name.split(",")[0].strip() for name in self.authors.split(";")]
        if len(names) > 2:
            return f"{names[0]} et al."
        return " and ".join(names)


@dataclass(frozen=True, slots=True)
class Uncertainty:
    """A published uncertainty, as stated and as one relative or absolute standard uncertainty."""

    value: float
    relative: bool
    kind: str
    stated: str
    source: Source | None = None


def relative_uncertainty(value: float, kind: str, stated: str, source: Source | None = None) -> Uncertainty:
    """Return a relative standard uncertainty, 0.20 for twenty percent."""
    return Uncertainty(value, True, kind, stated, source)


Limits = tuple[float, float]


@dataclass(frozen=True, slots=True)
class Term:
    """One word of the vocabulary: an input, a result or a number between them."""

    name: str
    unit: str
    meaning: str
    is_input: bool = False
    possible: Limits = (-np.inf, np.inf)
    above_lower_limit: bool = False
    default: float | None = None
    constant: float | None = None
    no_default_for_water: tuple[str, ...] = ()
    standard_name: str | None = None
    scale: float = 1.0
    holds: Literal["sample", "request", "series", "course"] = "sample"
    per_litre: str | None = None
    dimension: str | None = None
    example: float | None = None
    used_with: tuple[str, ...] = ()
    of_gas: bool = False


@dataclass(frozen=True, slots=True, eq=False)
class Remark:
    """A condition on the values of a step that a caller must be told of."""

    reason: str
    terms: tuple[str, ...]
    applies: Callable[..., NDArray[np.bool_]]
    flag: int = 3
    if_given: tuple[str, ...] = ()
    unless_given: tuple[str, ...] = ()


@dataclass(frozen=True, slots=True, eq=False)
class Step:
    """One calculation: which terms it gives, from which, by which published method."""

    results: tuple[str, ...]
    function: Callable[..., Any]
    parameters: tuple[str, ...]
    name: str
    method: str | None = None
    way: str | None = None
    beside: tuple[str, ...] = ()
    needs_given: tuple[str, ...] = ()
    gases: tuple[str, ...] = ()
    source: Source | None = None
    equation: str = ""
    formula: str = ""
    valid: Mapping[str, Limits] = field(default_factory=dict)
    recommended: Mapping[str, Limits] = field(default_factory=dict)
    range_kind: Literal["published", "data", "common practice"] = "published"
    uncertainty: Uncertainty | None = None
    supplies: Mapping[str, float] = field(default_factory=dict)
    water: tuple[str, ...] = ()
    wind_averaging: Literal["short", "second moment", "long-term"] | None = None
    variant_of: str | None = None
    in_all: bool = True
    replaced_by: str | None = None
    remarks: tuple[Remark, ...] = ()
    same_as: str | None = None
    in_situ: bool = False
    assumes_values: Mapping[str, float] = field(default_factory=dict)
    assumes: tuple[str, ...] = ()
    note: str = ""

    @property
    def needs_coefficients(self) -> bool:
        """Tell whether the step works only for gases that bring coefficients for it."""
        return COEFFICIENTS in self.parameters


@dataclass(frozen=True, slots=True, eq=False)
class Family:
    """All methods that answer one question; one of them is chosen for a request."""

    name: str
    option: str
    meaning: str
    results: tuple[str, ...]
    default: str | None = None
    given_by: str | None = None
    told: bool = False


@dataclass(frozen=True, slots=True)
class Block:
    """A gas's coefficients for one method, as printed there."""

    result: str
    method: str
    coefficients: Any
    printed_in: str
    valid: Mapping[str, Limits] = field(default_factory=dict)
    supplies: Mapping[str, float] = field(default_factory=dict)
    uncertainty: Uncertainty | None = None
    note: str = ""


@dataclass(frozen=True, slots=True, eq=False)
class Gas:
    """A gas: its identity, constants and coefficients, and the methods it uses by default."""

    name: str
    formula: str
    title: str
    molar_mass: float
    blocks: tuple[Block, ...]
    defaults: Mapping[str, str] = field(default_factory=dict)
    constants: Mapping[str, float] = field(default_factory=dict)
    element: str | None = None
    element_mass: float | None = None
    dry_air: str = ""
    caution: str = ""
    standard_names: Mapping[str, str] = field(default_factory=dict)

    def block(self, result: str, method: str | None) -> Block | None:
        """Return the coefficients for a result by a method, or None where the gas has none."""
        for candidate in self.blocks:
            if candidate.result == result and candidate.method == method:
                return candidate
        return None


NO_GAS = Gas("", "", "no gas", 1.0, ())  # stands where a quantity is not one of a gas


@dataclass(frozen=True, slots=True)
class Derived:
    """A term that is another one evaluated with some of its inputs replaced."""

    of: str
    replace: Mapping[str, str]


@dataclass(frozen=True, slots=True)
class Side:
    """A set of inputs of which exactly one way is given."""

    name: str
    members: tuple[str, ...]
    meaning: str
    beside: Mapping[str, str] = field(default_factory=dict)


@dataclass(frozen=True, slots=True, eq=False)
class Quantity:
    """What one address answers: its results, the main ones first."""

    name: str
    title: str
    results: tuple[str, ...]
    more: tuple[str, ...] = ()
    needs_side: Mapping[str, str] = field(default_factory=dict)
    units: Mapping[str, str] = field(default_factory=dict)
    of_gas: bool = True
    series: bool = False  # the answer to a sample depends on those before it
    summaries: tuple[str, ...] = ()  # results of which a mean and an integral over time are told


TERMS: dict[str, Term] = {}
STEPS: dict[str, dict[str | None, list[Step]]] = {}
FAMILIES: dict[str, Family] = {}
FAMILY_OF: dict[str, Family] = {}
DERIVED: dict[str, Derived] = {}
STAND_INS: dict[str, str] = {}
AVERAGING: dict[str, tuple[Remark, ...]] = {}
SIDES: dict[str, Side] = {}
GASES: dict[str, Gas] = {}
QUANTITIES: dict[str, Quantity] = {}


def _file(register: dict[str, Any], name: str, record: Any) -> None:
    if name in register:
        raise DeclarationError(f"{name} is declared twice")
    register[name] = record


def term(name: str, unit: str, meaning: str, **more: Any) -> Term:
    """Declare a result or an intermediate number."""
    record = Term(name, unit, meaning, **more)
    _file(TERMS, name, record)
    return record


def input_term(name: str, unit: str, meaning: str, **more: Any) -> Term:
    """Declare a number that a caller may send."""
    return term(name, unit, meaning, is_input=True, **more)


def family(
    name: str,
    option: str,
    meaning: str,
    results: Sequence[str],
    default: str | None = None,
    given_by: str | None = None,
    told: bool = False,
) -> None:
    """Declare a family of methods.

    Parameters
    ----------
    name, option, meaning : str
        Its own name, the option that chooses a member, and what its members answer.
    results : sequence of str
        Terms that its members give, the leading one first.
    default : str, optional
        The member used where neither the caller nor the gas names one.
    given_by : str, optional
        The side whose members stand for a method.
    told : bool
        Whether the default is listed among what was assumed.
    """
    record = Family(name, option, meaning, tuple(results), default, given_by, told)
    _file(FAMILIES, name, record)
    for result in results:
        _file(FAMILY_OF, result, record)


def side(name: str, members: Sequence[str], meaning: str, **beside: str) -> None:
    """Declare inputs of which exactly one may be given; a member with another input beside it counts only with it."""
    _file(SIDES, name, Side(name, tuple(members), meaning, MappingProxyType(beside)))


def derived(name: str, of: str, **replace: str) -> None:
    """Declare a term as another one with some of its inputs replaced by other terms."""
    _file(DERIVED, name, Derived(of, MappingProxyType(replace)))


def stand_in(term: str, other: str) -> None:
    """Declare that a term takes the place of another one, but in steps that are `in_situ`."""
    _file(STAND_INS, other, term)


def averaging(kind: str, *remarks: Remark) -> None:
    """Declare what is remarked on wherever a method made for winds averaged in one way is used."""
    _file(AVERAGING, kind, remarks)


def gas(record: Gas) -> Gas:
    """File a gas; its molar mass is one of its constants."""
    constants = {"molar_mass": record.molar_mass, **record.constants}
    record = replace(record, constants=constants)
    _file(GASES, record.name, record)
    return record


def quantity(record: Quantity) -> Quantity:
    """File a quantity."""
    _file(QUANTITIES, record.name, record)
    return record


def _add(record: Step, result: str) -> None:
    ways = STEPS.setdefault(result, {}).setdefault(record.method, [])
    if any((other.way, other.beside, other.gases) == (record.way, record.beside, record.gases) for other in ways):
        raise DeclarationError(f"{result} by {record.method or record.name} is declared twice")
    ways.append(record)


def step(
    *results: str, forms: Sequence[str] = (), method: str | None = None, **more: Any
) -> Callable[[Function], Function]:
    """File the function below as a step; the function itself is returned unchanged.

    Parameters
    ----------
    *results : str
        The term, or the terms of a tuple, that the function returns.
    forms : sequence of str
        Terms that the same function gives with different coefficients, one at a time.
    method : str, optional
        Author-year name; a step without one is a definition.
    **more
        The other fields of `Step`.
    """

    def file(function: Function) -> Function:
        parameters = tuple(inspect.signature(function).parameters)
        groups: list[tuple[str, ...]] = [(form,) for form in forms] or [results]
        for each in groups:
            record = Step(each, function, parameters, name=function.__name__, method=method, **more)
            for result in each:
                _add(record, result)
        return function

    return file


def same_as(
    result: str,
    other: str,
    *,
    method: str | None = None,
    way: str | None = None,
    assumes: Sequence[str] = (),
    **more: Any,
) -> None:
    """Declare that a term equals another one, with what is assumed thereby."""
    record = Step(
        (result,),
        _identity,
        (other,),
        name="same_as",
        method=method,
        way=way,
        same_as=other,
        assumes=tuple(assumes),
        **more,
    )
    _add(record, result)


def _identity(value: Array) -> Array:
    return value
