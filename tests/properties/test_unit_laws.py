"""Units change how a number is written and never what it says."""

import numpy as np
import pytest

from service.physics.answer import answer
from service.physics.declare import GASES, QUANTITIES, TERMS, Gas, Term
from service.physics.question import ask
from service.physics.units import allowed, conversion
from tests.properties.questions import typical, typical_values

GAS = GASES["ch4"]  # with an element, so that every kind of mass can be asked for
INPUTS = [name for name, term in TERMS.items() if term.is_input]
RESULTS = [(quantity, name) for quantity in ("solubility", "flux") for name in QUANTITIES[quantity].results]


def of_gas(term: Term) -> Gas | None:
    return GAS if term.of_gas else None


def units_of(term: Term) -> list[str]:
    """Return every unit that can stand for a term, of those that this gas has a measure for."""
    found = []
    for unit in allowed(term.unit, dimension="salinity" if term.name == "salinity" else None):
        try:
            conversion(unit, term.unit, gas=of_gas(term))
        except ValueError:
            continue
        found.append(unit)
    return found


@pytest.mark.parametrize("name", INPUTS)
def test_a_number_comes_back_from_every_unit(name: str) -> None:
    term = TERMS[name]
    low, high = (limit if np.isfinite(limit) else 1e6 * np.sign(limit) for limit in term.possible)
    values = np.linspace(low, high, 41)
    scale = np.abs(values).max()
    for unit in units_of(term):
        change = conversion(unit, term.unit, gas=of_gas(term))

        # a product, a sum and their inverses: each rounds once, and the zero point adds its own size
        assert change.to_base(change.from_base(values)) == pytest.approx(
            values, rel=1e-15, abs=4e-16 * (scale + abs(change.offset))
        )
        assert change.scale(change.unscale(values)) == pytest.approx(values, rel=1e-15)


@pytest.mark.parametrize(("quantity", "name"), RESULTS)
def test_a_result_in_any_unit_is_the_result_in_its_own(quantity: str, name: str) -> None:
    values = {key: np.atleast_1d(value) for key, value in typical_values(quantity, GAS.name).items()}
    own = QUANTITIES[quantity].units.get(name, TERMS[name].unit)

    def in_unit(unit: str) -> float:
        question = ask(QUANTITIES[quantity], GAS, None, frozenset(values), (), (), (name,), ((name, unit),), "gas")
        return float(answer(question, values, 1).outcome.results[name][0])

    plain = conversion(own, TERMS[name].unit, gas=of_gas(TERMS[name]))
    for unit in units_of(TERMS[name]):
        change = conversion(unit, TERMS[name].unit, gas=of_gas(TERMS[name]))
        if change.basis != plain.basis:
            continue  # per litre instead of per kilogram is another number of the authors'

        expected = change.from_base(plain.to_base(np.array([in_unit(own)])))[0]
        assert in_unit(unit) == pytest.approx(expected, rel=1e-15)


@pytest.mark.parametrize("name", ["solubility", "equilibrium_concentration", "henry_constant"])
def test_per_litre_and_per_kilogram_differ_by_the_density(name: str) -> None:
    values = {key: np.atleast_1d(value) for key, value in typical_values("solubility", "o2").items()}
    per_kilogram = TERMS[name].unit
    per_litre = per_kilogram.replace("kg", "L")

    def in_unit(unit: str) -> float:
        question = ask(
            QUANTITIES["solubility"], GASES["o2"], None, frozenset(values), (), (), (name,), ((name, unit),), "gas"
        )
        return float(answer(question, values, 1).outcome.results[name][0])

    ratio = in_unit(per_litre) / in_unit(per_kilogram)
    expected = 1.0254 if name != "henry_constant" else 1.0 / 1.0254

    # sea water at 18.4 degC and salinity 35.1 has 1.0254 kg/L; authors' two fits may differ by 2e-4
    assert typical("salinity") == 35.1
    assert typical("water_temperature") == 18.4
    assert ratio == pytest.approx(expected, rel=3e-4)
