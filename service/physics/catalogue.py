"""What there is: gases, methods and sources, told from their declarations."""

from collections.abc import Mapping
from typing import Any

from service.physics.bibtex import bibtex
from service.physics.declare import (
    COEFFICIENTS,
    DERIVED,
    FAMILIES,
    GASES,
    SIDES,
    STEPS,
    TERMS,
    Block,
    Gas,
    Limits,
    Source,
    Step,
    Uncertainty,
)
from service.physics.methods import GIVEN, TRANSFER_FAMILY, default_method, methods_for, transfer_methods
from service.physics.sources import SOURCES


def source_brief(source: Source | None) -> dict[str, Any] | None:
    """Return a source as answers name it."""
    return {"key": source.key, "source": source.citation, "doi": source.doi} if source else None


def source_record(source: Source) -> dict[str, Any]:
    """Return a source in full."""
    return {
        "key": source.key,
        "citation": source.citation,
        "authors": source.authors,
        "year": source.year,
        "title": source.title,
        "journal": source.journal,
        "volume": source.volume,
        "pages": source.pages,
        "doi": source.doi,
        "kind": source.kind,
        "note": source.note,
        "methods": methods_of(source),
    }


def methods_of(source: Source) -> list[str]:
    """Return the names of the methods that rest on a source."""
    found = {
        step.method or step.results[0]
        for by_method in STEPS.values()
        for ways in by_method.values()
        for step in ways
        if step.source is source
    }
    return sorted(found)


def bibliography(form: str = "json") -> list[dict[str, Any]] | str:
    """Return every source, as records or as BibTeX."""
    if form == "bibtex":
        return "\n\n".join(bibtex(source) for source in SOURCES.values()) + "\n"
    return [source_record(source) for source in SOURCES.values()]


def _ranges(ranges: Mapping[str, Limits]) -> dict[str, Any]:
    return {name: {"from": low, "to": high, "unit": TERMS[name].unit} for name, (low, high) in ranges.items()}


def _uncertainty(uncertainty: Uncertainty | None) -> dict[str, Any] | None:
    if uncertainty is None:
        return None
    return {
        "value": uncertainty.value,
        "relative": uncertainty.relative,
        "kind": uncertainty.kind,
        "stated": uncertainty.stated,
    }


def _method_record(step: Step, block: Block | None, default: bool) -> dict[str, Any]:
    return {
        "name": step.method,
        "default": default,
        "formula": step.formula,
        "equation": step.equation,
        "printed_in": block.printed_in if block else step.equation,
        "range": _ranges({**step.valid, **(block.valid if block else {})}),
        "range_kind": step.range_kind,
        "uncertainty": _uncertainty((block.uncertainty if block else None) or step.uncertainty),
        "assumed_mole_fraction": getattr(block.coefficients, "mole_fraction", None) if block else None,
        "note": (block.note if block else "") or step.note or None,
        "source": source_brief(step.source),
    }


def gas_record(gas: Gas) -> dict[str, Any]:
    """Return a gas with its methods, their ranges and sources."""
    methods: dict[str, list[dict[str, Any]]] = {}
    for family in FAMILIES.values():
        if family.name in (TRANSFER_FAMILY, "direction", "wind_profile"):
            continue
        for name in methods_for(gas, family):
            step, block = _leading(gas, family.results, name)
            record = _method_record(step, block, name == default_method(gas, family))
            methods.setdefault(family.option, []).append(record)
    return {
        "name": gas.name,
        "title": gas.title,
        "formula": gas.formula,
        "molar_mass": {"value": gas.molar_mass, "unit": "g mol-1"},
        "dry_air_mole_fraction": gas.dry_air or None,
        "mass_as_element": gas.element,
        "caution": gas.caution or None,
        "methods": methods,
    }


def _leading(gas: Gas, results: tuple[str, ...], method: str) -> tuple[Step, Block | None]:
    for result in results:
        for step in STEPS.get(result, {}).get(method, ()):
            block = gas.block(result, method)
            if block or not step.needs_coefficients:
                return step, block
    raise LookupError(method)


def own_inputs(name: str) -> tuple[str, ...]:
    """Return the inputs that a parameterisation needs beyond those of every one."""
    reached: set[str] = set()
    step = transfer_methods()[name]
    ahead = [parameter for parameter in step.parameters if parameter != COEFFICIENTS]
    while ahead:
        term = ahead.pop()
        if term in reached:
            continue
        reached.add(term)
        if term in DERIVED:
            ahead += [DERIVED[term].of, *DERIVED[term].replace.values()]
            continue
        if TERMS[term].is_input:
            continue
        by_method = STEPS.get(term, {})
        for steps in by_method.values():
            for each in steps[-1:]:
                ahead += [p for p in each.parameters if p != COEFFICIENTS]
    return tuple(t for t in TERMS if t in reached and TERMS[t].is_input and t not in _anyway())


def _anyway() -> set[str]:
    """Return the inputs that a caller is asked for whatever the parameterisation."""
    sides = {name for side in SIDES.values() for name in side.members}
    return sides | {
        "water_temperature",
        "salinity",
        "wind_height",
        "latitude",
        "longitude",
        "barometer_height",
    }


def parameterisation_record(name: str) -> dict[str, Any]:
    """Return a transfer velocity method with all that tells where it may be used."""
    step = transfer_methods()[name]
    return {
        "name": name,
        "water": list(step.water),
        "inputs": list(own_inputs(name)),
        "formula": step.formula,
        "schmidt_number_reference": step.supplies.get("reference_schmidt_number"),
        "schmidt_exponent": step.supplies.get("schmidt_exponent", "depends on wind speed"),
        "wind_averaging": step.wind_averaging,
        "range": _ranges(step.valid),
        "range_kind": step.range_kind,
        "recommended_range": _ranges(step.recommended),
        "uncertainty": _uncertainty(step.uncertainty),
        "default_for": ["ocean", "coastal"] if name == FAMILIES[TRANSFER_FAMILY].default else [],
        "replaced_by": step.replaced_by,
        "variant_of": step.variant_of,
        "note": step.note or None,
        "equation": step.equation,
        "source": source_brief(step.source),
    }


def parameterisations(
    water: str | None = None, wind_speed: float | None = None, gas: str | None = None
) -> list[dict[str, Any]]:
    """Return the transfer velocity methods that fit a water, a wind speed and a gas, all where none is given."""
    family = FAMILIES[TRANSFER_FAMILY]
    names = methods_for(GASES[gas], family) if gas else list(transfer_methods())
    found = []
    for name in sorted(names):
        if name == GIVEN:
            continue
        step = transfer_methods()[name]
        low, high = step.valid.get("wind_speed_10m", (float("-inf"), float("inf")))
        if water is not None and water not in step.water:
            continue
        if wind_speed is not None and not low <= wind_speed <= high:
            continue
        found.append(parameterisation_record(name))
    return found
