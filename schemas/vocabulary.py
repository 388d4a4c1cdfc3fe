"""The names that a quantity knows: its inputs, its options, and what is told of the others."""

from collections.abc import Sequence
from functools import lru_cache
from typing import Any

from marshmallow import RAISE, Schema, fields

from schemas.options import Choice, Line, OptionNumber, Words
from schemas.samples import Measured
from schemas.series import series_fields
from service.physics.declare import DERIVED, FAMILIES, GASES, QUANTITIES, STEPS, TERMS, Family, Gas, Quantity
from service.physics.faults import Fault, Refused, unknown
from service.physics.methods import GIVEN, TRANSFER_FAMILY, methods_for, remarks_of
from service.physics.terms import WATERS

UNCERTAIN = "u_"  # before the name of an input: its standard uncertainty


@lru_cache(maxsize=32)
def quantity_terms(quantity: Quantity) -> frozenset[str]:
    """Return every term from which a quantity can be reached, by any method."""
    reached: set[str] = set()
    ahead = [*quantity.results, *quantity.more]
    while ahead:
        name = ahead.pop()
        if name in reached or name not in TERMS:
            continue
        reached.add(name)
        if name in DERIVED:
            ahead += [DERIVED[name].of, *DERIVED[name].replace.values()]
        if TERMS[name].per_litre:
            ahead.append(str(TERMS[name].per_litre))
        for step in (step for ways in STEPS.get(name, {}).values() for step in ways):
            ahead += [*step.parameters, *step.assumes, *([step.same_as] if step.same_as else [])]
            ahead += [name for remark in remarks_of(step) for name in remark.terms]
    return frozenset(reached)


@lru_cache(maxsize=32)
def quantity_inputs(quantity: Quantity) -> tuple[str, ...]:
    """Return the inputs of a quantity in the order of the vocabulary."""
    reached = quantity_terms(quantity)
    return tuple(name for name, term in TERMS.items() if term.is_input and name in reached)


@lru_cache(maxsize=32)
def quantity_families(quantity: Quantity) -> tuple[Family, ...]:
    """Return the families of methods that a quantity can use."""
    reached = quantity_terms(quantity)
    return tuple(family for family in FAMILIES.values() if reached & set(family.results))


def family_choices(family: Family, gas: Gas | None = None) -> list[str]:
    """Return the methods that an option takes, for one gas or for any."""
    gases = [gas] if gas else GASES.values()
    names = dict.fromkeys(name for each in gases for name in methods_for(each, family))
    return [name for name in names if name != GIVEN]


@lru_cache(maxsize=32)
def request_fields(quantity: Quantity) -> dict[str, fields.Field[Any]]:
    """Return the fields of a quantity's request by their names."""
    found: dict[str, fields.Field[Any]] = {}
    if quantity.of_gas:
        found |= {
            "gas": Choice(GASES, forgiving=True, required=True, metadata={"description": "the gas"}),
            "water": Choice(WATERS, metadata={"description": "the kind of water; never guessed"}),
        }
    for family in quantity_families(quantity):
        about = {"description": family.meaning}
        if family.name == TRANSFER_FAMILY:
            found[family.option] = Words(metadata=about | {"choices": [*family_choices(family), "all"]})
        else:
            found[family.option] = Choice(family_choices(family), metadata=about)
    found |= {
        "pick": Words(metadata={"description": "results wanted, in order; all for every one"}),
        "unit": Line(metadata={"description": "unit of the first picked result"}),
        "units": fields.Dict(keys=fields.String(), values=fields.String(), load_only=True),
        "mass_as": Choice(("gas", "element"), metadata={"description": "what a mass is the mass of"}),
        "detail": Choice(
            ("full", "brief", "steps"),
            metadata={"description": "brief leaves out methods and assumptions; steps adds the calculation in order"},
        ),
        "strict": Choice(("0", "1"), metadata={"description": "1 refuses a request with any bad sample"}),
        "decimal": Choice(("point", "comma", "whole"), metadata={"description": "how numbers are written"}),
        "headers": Choice(("units", "plain"), metadata={"description": "whether CSV headers carry units"}),
        "missing": Choice(("", "NaN"), metadata={"description": "what stands for no number in CSV"}),
        "ignore": Words(may_be_empty=True, metadata={"description": "CSV columns to leave out of account"}),
    }
    for name in quantity_inputs(quantity):
        found[name] = Measured(TERMS[name], metadata={"description": TERMS[name].meaning})
    return found | series_fields(quantity) | uncertainty_fields(quantity)


def uncertain_inputs(quantity: Quantity) -> tuple[str, ...]:
    """Return the inputs that may have a standard uncertainty: all but times."""
    return tuple(name for name in quantity_inputs(quantity) if TERMS[name].holds in ("sample", "request"))


def uncertainty_fields(quantity: Quantity) -> dict[str, fields.Field[Any]]:
    """Return the fields that tell what is uncertain, and how it is to be propagated."""
    found: dict[str, fields.Field[Any]] = {
        "u_methods": Choice(
            ("1", "0", "spread"),
            metadata={"description": "whether the published uncertainty of the methods counts; spread: not that of k"},
        ),
        "u_unpublished": OptionNumber(
            0.0, 1000.0, metadata={"description": "relative standard uncertainty of methods that publish none [%]"}
        ),
        "uncertainty_method": Choice(
            ("first-order", "monte-carlo"), metadata={"description": "how uncertainties are propagated"}
        ),
        "draws": OptionNumber(100, 1_000_000, True, metadata={"description": "draws of the Monte Carlo"}),
        "seed": OptionNumber(0, 2**32 - 1, True, metadata={"description": "seed of the Monte Carlo"}),
        "coverage": OptionNumber(
            0.01, 0.9999, metadata={"description": "probability of the coverage interval to be told"}
        ),
    }
    for name in uncertain_inputs(quantity):
        about = {"description": f"standard uncertainty of {name}, in the unit in which it is sent"}
        found[UNCERTAIN + name] = Measured(TERMS[name], prefix=UNCERTAIN, metadata=about)
    return found


@lru_cache(maxsize=1024)
def schema_of(quantity: Quantity, names: frozenset[str]) -> Schema:
    """Return the schema of the fields that a request names, so that a short request costs little."""
    known = request_fields(quantity)
    chosen = {name: field for name, field in known.items() if name in names or field.required}
    return Schema.from_dict(chosen, name=quantity.name)(unknown=RAISE)


NAME_LIMIT = 100  # characters
TOLD = 20  # unknown names that are told in full


def _unknown_name(quantity: Quantity, name: str) -> Fault:
    known = request_fields(quantity)
    if len(name) > NAME_LIMIT:
        reason = f"is a name of {len(name)} characters: no name is longer than {NAME_LIMIT}"
        return Fault("unknown_name", name[:NAME_LIMIT], reason)
    if name in ("form", "errors", "nocache"):
        return Fault("unknown_name", name, "is read from the address only: put it behind the ? there")
    for other in QUANTITIES.values():
        if name in request_fields(other) and name not in known:
            return Fault("unknown_name", name, f"is an input of {other.name}, not of {quantity.name}")
    names = [each for each in known if each != "units"]
    return unknown(name, (*names, "form", "errors", "nocache"), f"a name that {quantity.name} knows")


def refuse_strangers(quantity: Quantity, names: Sequence[str]) -> None:
    """Refuse unknown names: the first with a hint at what may be meant, the others counted."""
    told = [_unknown_name(quantity, name) for name in names[:TOLD]]
    rest = [Fault("unknown_name", name[:NAME_LIMIT], "is not known") for name in names[TOLD:]]
    if told:
        raise Refused(*told, *rest)
