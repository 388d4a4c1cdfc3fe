"""What may be asked of a quantity: one schema each, built from the declarations."""

from collections.abc import Iterable, Mapping
from typing import Any

from marshmallow import ValidationError

from schemas.checked import Input, Request
from schemas.doubts import check_doubts, with_correlations
from schemas.options import ONCE
from schemas.samples import Reading
from schemas.series import AREA, TIME, check_course, check_order, check_shared, reads_time, series_asked
from schemas.vocabulary import (
    UNCERTAIN,
    family_choices,
    quantity_families,
    quantity_inputs,
    refuse_strangers,
    request_fields,
    schema_of,
)
from service.physics.declare import (
    FAMILIES,
    GASES,
    NO_GAS,
    TERMS,
    Family,
    Gas,
    Quantity,
)
from service.physics.engine import plan
from service.physics.faults import Fault, Refused, unknown
from service.physics.methods import (
    TRANSFER_FAMILY,
    applicable,
    comparable,
    method_by_input,
    wanting,
)
from service.physics.question import ask, known_names
from service.physics.units import UnitError, conversion

SAMPLES_LIMIT = 100_000
CORRELATION = "correlation."


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
    correlations = {name: raw[name] for name in raw if name.startswith(CORRELATION)}
    sent = {name: value for name, value in raw.items() if not name.startswith(("unit.", CORRELATION))}
    known = request_fields(quantity)
    strangers = [name for name in sent if name not in known or name == "units"]
    refuse_strangers(quantity, strangers)
    inputs = quantity_inputs(quantity)
    if not reads_time(inputs, sent):
        sent.pop(TIME, None)  # it passes through
    sent = {name: [None] if value is None and name in inputs else value for name, value in sent.items()}
    try:
        loaded = schema_of(quantity, frozenset(sent)).load(sent)
    except ValidationError as error:
        raise Refused(*_faults(error)) from error
    request = _request(quantity, loaded, units)
    request = with_correlations(request, correlations) if correlations else request
    check_shared(request)
    return request


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
    gas = GASES[loaded["gas"]] if quantity.of_gas else NO_GAS
    readings = {name: value for name, value in loaded.items() if isinstance(value, Reading)}
    doubtful = {name: readings.pop(name) for name in list(readings) if name.startswith(UNCERTAIN)}
    options = {name: value for name, value in loaded.items() if not isinstance(value, Reading)}
    water, mass_as = options.get("water"), options.get("mass_as", "gas")
    known = quantity_inputs(quantity)
    apart = [name for name in (TIME, AREA) if name in readings and name not in known]
    beside = {name: _input(name, readings.pop(name), gas, mass_as) for name in apart}
    inputs = [_input(name, reading, gas, mass_as) for name, reading in readings.items()]
    doubts = [_doubt(name, reading, inputs, gas, mass_as) for name, reading in doubtful.items()]
    time = beside.get(TIME) or next((each for each in inputs if each.term == TIME), None)
    samples = _samples([*inputs, *([time] if TIME in beside and time else [])], doubts)
    check_course(inputs, samples)
    check_order(time, samples)
    series = series_asked(options, time, beside.get(AREA), [each.term for each in doubts])
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
    check_doubts(question, doubts)
    return Request(question, tuple(inputs), samples, options, tuple(doubts), series=series)


def _all_that_apply(gas: Gas, water: str, given: frozenset[str], inputs: Iterable[Input]) -> tuple[str, ...]:
    """Return the methods that `all` stands for, refusing where the inputs suffice for none."""
    averaging = next((each.values for each in inputs if each.term == "wind_averaging"), None)
    duration = None if averaging is None else float(averaging[0])
    if names := applicable(gas, water, given, duration):
        return names
    every = comparable(gas, water, given, duration)
    wanted = dict.fromkeys(term for name in every for term in wanting(gas, given, name))
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
    try:
        change = conversion(
            reading.unit if reading.unit is not None else term.unit,
            term.unit,
            gas=gas if term.of_gas else None,
            mass_as=mass_as,
            dimension=term.dimension,
        )
    except UnitError as error:
        raise Refused(Fault("unit", name, str(error), ", ".join(error.allowed[:40]))) from error
    except ValueError as error:
        raise Refused(Fault("unit", name, str(error))) from error
    other = term.per_litre if change.basis == "per_litre" and term.per_litre else None
    values = None if reading.values is None else change.to_base(reading.values)
    return Input(other or name, change, values, reading.column)


def _doubt(name: str, reading: Reading, inputs: Iterable[Input], gas: Gas, mass_as: str) -> Input:
    """Return a standard uncertainty in the unit of its input: converted by scale alone, an offset has no meaning."""
    of = name.removeprefix(UNCERTAIN)
    sent = next((each for each in inputs if each.term.removesuffix("_per_litre") == of), None)
    unit = reading.unit if reading.unit is not None else sent.conversion.unit if sent else None
    told = _input(of, Reading(None, unit, reading.column), gas, mass_as)
    if sent is not None and told.term != sent.term:
        raise Refused(Fault("unit", name, f"is per another amount of water than {of}", sent.conversion.unit))
    values = None if reading.values is None else told.conversion.scale(reading.values)
    return Input(told.term, told.conversion, values, reading.column)


def _samples(inputs: Iterable[Input], doubts: Iterable[Input]) -> int:
    samples = (each for each in inputs if TERMS[each.term].holds != "course")
    lengths = {each.term: each.values.size for each in samples if each.values is not None}
    lengths |= {UNCERTAIN + each.term: each.values.size for each in doubts if each.values is not None}
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
        if TERMS[name.removeprefix(UNCERTAIN)].holds == "request" and size > 1:
            faults.append(Fault("length", name, ONCE))
    columns = (each.term for each in inputs if each.column is not None)
    faults += [Fault("column", name, ONCE) for name in columns if TERMS[name].holds == "request"]
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
    if not names:
        return ()
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
