"""What may be asked of a quantity: one schema each, built from the declarations."""

from collections.abc import Container, Iterable, Mapping, Sequence
from dataclasses import dataclass
from functools import lru_cache
from typing import Any

from marshmallow import RAISE, Schema, ValidationError, fields

from schemas.samples import Column, Measured, Reading
from service.physics.declare import (
    DERIVED,
    FAMILIES,
    GASES,
    QUANTITIES,
    STEPS,
    TERMS,
    Array,
    Family,
    Gas,
    Quantity,
)
from service.physics.engine import plan
from service.physics.faults import Fault, Refused, unknown
from service.physics.methods import (
    GIVEN,
    TRANSFER_FAMILY,
    applicable,
    method_by_input,
    methods_for,
    methods_for_water,
    remarks_of,
    wanting,
)
from service.physics.question import Question, ask, known_names
from service.physics.terms import WATERS
from service.physics.units import Conversion, UnitError, conversion

SAMPLES_LIMIT = 100_000
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


@dataclass(frozen=True, slots=True)
class Input:
    """An input of a checked request: how it becomes a term's number, and its numbers or its column."""

    term: str
    conversion: Conversion
    values: Array | None
    column: Column | None


@dataclass(frozen=True, slots=True)
class Request:
    """A checked request: the question, its inputs, and how the answer is to be written."""

    question: Question
    inputs: tuple[Input, ...]
    samples: int
    options: Mapping[str, Any]


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
    found: dict[str, fields.Field[Any]] = {
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
    return found


@lru_cache(maxsize=1024)
def _schema(quantity: Quantity, names: frozenset[str]) -> Schema:
    """Return the schema of the fields that a request names, so that a short request costs little."""
    known = request_fields(quantity)
    chosen = {name: field for name, field in known.items() if name in names or field.required}
    return Schema.from_dict(chosen, name=quantity.name)(unknown=RAISE)


NAME_LIMIT = 100  # characters
TOLD = 20  # unknown names that are told in full

# Words that belong to this vocabulary but to parts of it that do not answer yet: refused, never ignored.
_PARTS = {
    "the course in time": "times",
    "a summary of a series": "summary area",
    "uncertainty": "u_methods u_unpublished uncertainty_method draws seed coverage",
    "a wind that varies within its averaging time": "wind_averaging wind_speed_variance weibull_shape",
    "a reading without drying": "air_mole_fraction_wet water_mole_fraction_wet air_temperature relative_humidity",
    "an equilibrator apart from the water": "equilibrator_temperature equilibrator_pressure temperature_correction",
    "a closed headspace": "headspace_ratio headspace_start_mole_fraction",
    "saturation as the water side": "water_saturation saturation_pressure",
    "the carbonate system": "alkalinity dissolved_inorganic_carbon ph carbonate_constants",
    "the skin of the water": "subskin_temperature skin_temperature skin_correction",
}
NOT_SERVED = {name: part for part, names in _PARTS.items() for name in names.split()}


def not_served(name: str, known: Container[str]) -> str | None:
    """Return the part of the vocabulary that a name belongs to, if that part does not answer yet."""
    if name in known:
        return None
    return NOT_SERVED.get(name) or ("uncertainty" if name.startswith(("u_", "correlation.")) else None)


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
    if part := not_served(name, known):
        return Fault("unknown_name", name, f"is not served yet ({part}): leave it out")
    names = [each for each in known if each != "units"]
    return unknown(name, (*names, "form", "errors", "nocache"), f"a name that {quantity.name} knows")


def _refuse_strangers(quantity: Quantity, names: Sequence[str]) -> None:
    """Refuse unknown names: the first with a hint at what may be meant, the others counted."""
    told = [_unknown_name(quantity, name) for name in names[:TOLD]]
    rest = [Fault("unknown_name", name[:NAME_LIMIT], "is not known") for name in names[TOLD:]]
    if told:
        raise Refused(*told, *rest)


def load(quantity: Quantity, raw: Mapping[str, Any]) -> Request:
    """Check a request and plan its answer.

    Parameters
    ----------
    quantity : Quantity
        What is asked for.
    raw : mapping
        Names as sent to values as sent: texts, JSON values, or `Column` for those that a table holds.

    Returns
    -------
    Request

    Raises
    ------
    Refused
        Naming what is wrong, and what is allowed.
    """
    units = {name.removeprefix("unit."): raw[name] for name in raw if name.startswith("unit.")}
    sent = {name: value for name, value in raw.items() if not name.startswith("unit.")}
    known = request_fields(quantity)
    strangers = [name for name in sent if name not in known or name == "units"]
    _refuse_strangers(quantity, strangers)
    inputs = quantity_inputs(quantity)
    sent = {name: [None] if value is None and name in inputs else value for name, value in sent.items()}
    try:
        loaded = _schema(quantity, frozenset(sent)).load(sent)
    except ValidationError as error:
        raise Refused(*_faults(error)) from error
    return _request(quantity, loaded, units)


def _faults(error: ValidationError) -> list[Fault]:
    found: list[Fault] = []
    for name, messages in error.messages_dict.items():
        for message in messages if isinstance(messages, list) else [messages]:
            if isinstance(message, Fault):
                found.append(message)
            elif "required" in str(message):
                found.append(Fault("missing_input", name, "is needed", ", ".join(GASES) if name == "gas" else None))
            elif "null" in str(message):
                found.append(Fault("unknown_option", name, "is null: an option has a value, or is left out"))
            else:
                found.append(Fault("unknown_option", name, str(message)))
    return found


def _request(quantity: Quantity, loaded: dict[str, Any], units: Mapping[str, Any]) -> Request:
    gas = GASES[loaded["gas"]]
    readings = {name: value for name, value in loaded.items() if isinstance(value, Reading)}
    options = {name: value for name, value in loaded.items() if not isinstance(value, Reading)}
    water, mass_as = options.get("water"), options.get("mass_as", "gas")
    inputs = [_input(name, reading, gas, mass_as) for name, reading in readings.items()]
    samples = _samples(inputs)
    given = frozenset(each.term for each in inputs)
    _check_position(given)
    pick = options.get("pick", ())
    pick = known_names(quantity) if pick == ("all",) else pick
    _check_pick(quantity, pick, units)
    if "unit" in options:
        first = pick[0] if pick else quantity.results[0]
        if first in units:
            raise Refused(Fault("two_ways", "unit", f"and unit.{first} both give the unit of {first}"))
        units = {**units, first: options["unit"]}
    chosen = {}
    for family in quantity_families(quantity):
        if family.name != TRANSFER_FAMILY and family.option in options:
            chosen[family.name] = _method(family, gas, options[family.option])
    names = _parameterisations(gas, water, options.get("parameterisation", ()))
    if water and names == ("all",):
        names = _all_that_apply(gas, water, given, inputs)
    if options.get("pick") == ("all",):
        own = method_by_input(given)
        ways = [{**chosen, TRANSFER_FAMILY: name} for name in names or ((own[0],) if own else ())] or [chosen]
        pick = tuple(name for name in pick if all(_can(quantity, gas, given, way, name) for way in ways))
    question = ask(
        quantity,
        gas,
        water,
        given,
        tuple(sorted(chosen.items())),
        names,
        pick,
        tuple(sorted(units.items())),
        mass_as,
        frozenset(each.term for each in inputs if each.column is not None),
    )
    return Request(question, tuple(inputs), samples, options)


def _all_that_apply(gas: Gas, water: str, given: frozenset[str], inputs: Iterable[Input]) -> tuple[str, ...]:
    """Return the methods that `all` stands for, refusing where the inputs suffice for none."""
    averaging = next((each.values for each in inputs if each.term == "wind_averaging"), None)
    names = applicable(gas, water, given, None if averaging is None else float(averaging[0]))
    if names:
        return names
    for_water = methods_for_water(gas, water)
    wanted = dict.fromkeys(term for name in for_water for term in wanting(gas, given, name))
    told = f"all: no method for water {water} has its inputs; between them they need {', '.join(wanted)}"
    raise Refused(Fault("missing_input", FAMILIES[TRANSFER_FAMILY].option, told, ", ".join(wanted)))


def _check_position(given: frozenset[str]) -> None:
    found = given & {"latitude", "longitude"}
    if len(found) == 1:
        absent = next(iter({"latitude", "longitude"} - found))
        raise Refused(Fault("missing_input", absent, f"is needed beside {next(iter(found))}: send both or neither"))


def _can(quantity: Quantity, gas: Gas, given: frozenset[str], chosen: Mapping[str, str], name: str) -> bool:
    if name in quantity.results and name not in quantity.needs_side:
        return True
    return not plan((name,), given, tuple(sorted(chosen.items())), gas.name).missing


def _input(name: str, reading: Reading, gas: Gas, mass_as: str) -> Input:
    term = TERMS[name]
    dimension = "salinity" if name == "salinity" else None
    try:
        change = conversion(
            reading.unit if reading.unit is not None else term.unit,
            term.unit,
            gas=gas if term.of_gas else None,
            mass_as=mass_as,
            dimension=dimension,
        )
    except UnitError as error:
        raise Refused(Fault("unit", name, str(error), ", ".join(error.allowed[:40]))) from error
    except ValueError as error:
        raise Refused(Fault("unit", name, str(error))) from error
    other = term.per_litre if change.basis == "per_litre" and term.per_litre else None
    values = None if reading.values is None else change.to_base(reading.values)
    return Input(other or name, change, values, reading.column)


def _samples(inputs: Iterable[Input]) -> int:
    lengths = {each.term: each.values.size for each in inputs if each.values is not None}
    longest = max(lengths.values(), default=1)
    if longest > SAMPLES_LIMIT:
        raise Refused(
            Fault(
                "too_large",
                "samples",
                f"{longest} samples are more than {SAMPLES_LIMIT}: send CSV, or in parts",
            )
        )
    faults = [
        Fault("length", name, f"holds {size} values where another input holds {longest}", f"1 or {longest}")
        for name, size in lengths.items()
        if size not in (1, longest)
    ]
    for name, size in lengths.items():
        if TERMS[name].holds == "request" and size > 1:
            faults.append(Fault("length", name, ONCE))
    if faults:
        raise Refused(*faults)
    return longest


def _check_pick(quantity: Quantity, pick: Iterable[str], units: Mapping[str, Any]) -> None:
    known = known_names(quantity)
    faults = [
        Fault(
            "unknown_option",
            "pick",
            f"{name[:100]!r} {unknown(name, known, 'a result of this quantity').reason}",
            ", ".join(known),
        )
        for name in pick
        if name not in known
    ]
    for name, unit in units.items():
        if name not in known:
            faults.append(unknown(f"unit.{name}", [f"unit.{each}" for each in known]))
        elif not isinstance(unit, str):
            faults.append(Fault("unit", f"unit.{name}", "must be text"))
    if faults:
        raise Refused(*faults)


def _method(family: Family, gas: Gas, name: str) -> str:
    choices = family_choices(family, gas)
    if name not in choices:
        raise Refused(
            Fault(
                "unknown_option",
                family.option,
                f"{name} has no coefficients for {gas.name}",
                ", ".join(choices),
            )
        )
    return name


def _parameterisations(gas: Gas, water: str | None, names: tuple[str, ...]) -> tuple[str, ...]:
    family = FAMILIES[TRANSFER_FAMILY]
    choices = family_choices(family, gas)
    faults = []
    for name in names:
        if name not in choices and name != "all":
            reason = unknown(name, choices, "a parameterisation; /v1/parameterisations lists them").reason
            faults.append(Fault("unknown_option", family.option, f"{name[:100]!r} {reason}", ", ".join(choices)))
    if "all" in names and (len(names) > 1 or water is None):
        faults.append(Fault("unknown_option", family.option, "all stands alone, and needs water"))
    if faults:
        raise Refused(*faults)
    return names
