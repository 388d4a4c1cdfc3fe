"""What there is: gases, methods and sources, told from their declarations."""

from collections.abc import Collection, Mapping
from typing import Any

import numpy as np

from service.physics.bibtex import bibtex
from service.physics.check import evidence
from service.physics.declare import (
    FAMILIES,
    GASES,
    STEPS,
    TERMS,
    Block,
    Gas,
    Limits,
    Source,
    Step,
    Uncertainty,
)
from service.physics.engine import plan, run
from service.physics.methods import (
    ALWAYS_GIVEN,
    GIVEN,
    TRANSFER_FAMILY,
    Chooser,
    default_method,
    methods_for,
    transfer_methods,
    wanting,
    ways_of,
)
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
            record["evidence"] = evidence(family.name, name, gas.name if step.needs_coefficients else None)
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
    """Return the inputs of a parameterisation beyond those of every one."""
    given = ways_of(transfer_methods()[name].results[0], name)
    choose = Chooser(_first_gas(name), given, {TRANSFER_FAMILY: name})
    leaves = choose.leaves(TRANSFER_FAMILY)
    return tuple(leaf for leaf in leaves if choose.constant(leaf) is None and leaf not in ALWAYS_GIVEN)


def _first_gas(name: str) -> Gas:
    family = FAMILIES[TRANSFER_FAMILY]
    return next(gas for gas in GASES.values() if name in methods_for(gas, family))


def _exponent(step: Step) -> float | str | None:
    """Return a method's Schmidt exponent, a word where it varies, None where k is no power of the Schmidt number."""
    if step.results[0] != FAMILIES[TRANSFER_FAMILY].results[0]:
        return None
    own = step.method in STEPS.get("schmidt_exponent", {})
    return step.supplies.get("schmidt_exponent", "depends on wind speed" if own else TERMS["schmidt_exponent"].default)


def parameterisation_record(name: str) -> dict[str, Any]:
    """Return a transfer velocity method with all that tells where it may be used."""
    step = transfer_methods()[name]
    return {
        "name": name,
        "water": list(step.water),
        "inputs": list(own_inputs(name)),
        "formula": step.formula,
        "schmidt_number_reference": step.supplies.get("reference_schmidt_number"),
        "schmidt_exponent": _exponent(step),
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
        "evidence": evidence(TRANSFER_FAMILY, name),
    }


def _made_for_wind(step: Step, wind_speed: float) -> bool:
    """Tell whether a wind at 10 m, and all that follows from it alone, is within a method's range."""
    known = {"wind_speed_10m": np.array([wind_speed])}
    for term, (low, high) in step.valid.items():
        found = plan((term,), frozenset(known), (), next(iter(GASES)))
        if set(found.leaves) <= set(known) and not low <= run(found, known)[found.keys[term]][0] <= high:
            return False
    return True


def parameterisations(
    water: str | None = None,
    wind_speed: float | None = None,
    gas: str | None = None,
    inputs: Collection[str] | None = None,
) -> list[dict[str, Any]]:
    """Return the transfer velocity methods that fit what is known, all where nothing is.

    Parameters
    ----------
    water : str, optional
        The kind of water they are made for.
    wind_speed : float, optional
        At 10 m, within their range. [m s-1]
    gas : str, optional
        For which they have coefficients.
    inputs : collection of str, optional
        What is at hand besides temperature and salinity; they need no more.
    """
    family = FAMILIES[TRANSFER_FAMILY]
    names = methods_for(GASES[gas], family) if gas else transfer_methods()

    def fits(name: str) -> bool:
        step = transfer_methods()[name]
        made_for_it = water is None or not step.water or water in step.water
        within = wind_speed is None or _made_for_wind(step, wind_speed)
        enough = inputs is None or not wanting(GASES[gas] if gas else _first_gas(name), inputs, name)
        return made_for_it and within and enough

    return [parameterisation_record(name) for name in sorted(names) if name != GIVEN and fits(name)]
