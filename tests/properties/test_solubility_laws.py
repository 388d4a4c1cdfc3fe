"""Laws of solubility and of Schmidt numbers: gases are driven out by salt and, most of them, by warmth."""

import numpy as np
import pytest

from service.physics.declare import FAMILIES, GASES, STEPS, Array
from service.physics.methods import default_method
from tests.properties.questions import Values, compute, methods_and_gases, stated_range

SOLUBILITY, SCHMIDT = "solubility", "schmidt_number"
FORMS = ("solubility", "solubility_per_litre")
SOLUBILITIES = methods_and_gases(SOLUBILITY)
SCHMIDT_NUMBERS = methods_and_gases(SCHMIDT)

NO_SALT = {
    "dacey-1984": "fitted to sea water alone: salinity does not enter, so that it can only be equal",
}
# Solubility passes through a minimum, and that of the light gases lies within or near what people measure.
MINIMUM_WITHIN_30_DEGREES = {  # degC, up to which the solubility falls in all water from fresh to salty
    ("jenkins-2019", "he"): 23.0,
    ("weiss-1971", "he"): 22.0,
}
NOT_FALLING_SCHMIDT: dict[tuple[str, str], str] = {}


def form_of(method: str, gas: str) -> str:
    """Return the form in which a gas has coefficients for a method."""
    return next(form for form in FORMS if GASES[gas].block(form, method) or method in STEPS[form])


def temperatures(form: str, method: str, gas: str) -> Array:
    low, high = stated_range(form, method, gas, "water_temperature")
    return np.linspace(max(low, 0.0), min(high, 30.0), 121)


def salinities(form: str, method: str, gas: str) -> Array:
    low, high = stated_range(form, method, gas, "salinity")
    return np.linspace(low, high, 81)


@pytest.mark.parametrize(("method", "gas"), SOLUBILITIES)
@pytest.mark.parametrize("result", FORMS)
def test_a_gas_is_less_soluble_in_saltier_water(method: str, gas: str, result: str) -> None:
    form = form_of(method, gas)
    for temperature in temperatures(form, method, gas)[::10]:
        values: Values = {"water_temperature": temperature, "salinity": salinities(form, method, gas)}
        change = np.diff(compute(result, {SOLUBILITY: method}, gas, values)[result])

        if method in NO_SALT and result == form:
            assert (change == 0.0).all()
        else:
            assert (change < 0.0).all(), temperature


@pytest.mark.parametrize(("method", "gas"), SOLUBILITIES)
@pytest.mark.parametrize("result", FORMS)
def test_a_gas_is_less_soluble_in_warmer_water(method: str, gas: str, result: str) -> None:
    form = form_of(method, gas)
    t = temperatures(form, method, gas)
    t = t[t <= MINIMUM_WITHIN_30_DEGREES.get((method, gas), np.inf)]
    for salinity in salinities(form, method, gas)[::16]:
        values: Values = {"water_temperature": t, "salinity": salinity}
        change = np.diff(compute(result, {SOLUBILITY: method}, gas, values)[result])

        assert (change < 0.0).all(), (salinity, t[:-1][change >= 0.0][:5])


@pytest.mark.parametrize(("method", "gas"), SOLUBILITIES)
def test_solubility_is_positive_and_its_forms_agree_through_the_density(method: str, gas: str) -> None:
    form = form_of(method, gas)
    t, S = np.meshgrid(temperatures(form, method, gas), salinities(form, method, gas))
    values: Values = {"water_temperature": t.ravel(), "salinity": S.ravel()}
    found = compute((*FORMS, "density"), {SOLUBILITY: method}, gas, values)
    per_kilogram, per_litre, density = found.values()

    assert (per_kilogram > 0.0).all()
    # where authors print both sets they differ by up to 1e-3 of their own fits and densities, most by 2e-4
    assert per_litre == pytest.approx(per_kilogram * density / 1000.0, rel=1e-3)


@pytest.mark.parametrize(("method", "gas"), SOLUBILITIES)
def test_the_methods_of_a_gas_agree_within_what_their_authors_claim(method: str, gas: str) -> None:
    default = default_method(GASES[gas], FAMILIES[SOLUBILITY])
    values: Values = {"water_temperature": np.array([5.0, 15.0, 25.0]), "salinity": 35.0}
    one, other = (compute(FORMS[0], {SOLUBILITY: name}, gas, values)[FORMS[0]] for name in (method, str(default)))

    assert one == pytest.approx(other, rel=0.03)  # the widest scatter between fits of the same gas


def schmidt_numbers(method: str, gas: str, salinity: float) -> Array:
    """Return the Schmidt numbers over the range of a method; NaN in water for which it is not offered."""
    low, high = stated_range(SCHMIDT, method, gas, "water_temperature")
    values: Values = {"water_temperature": np.linspace(low, high, 201), "salinity": salinity}
    return compute(SCHMIDT, {SCHMIDT: method}, gas, values)[SCHMIDT]


@pytest.mark.parametrize(("method", "gas"), SCHMIDT_NUMBERS)
def test_a_schmidt_number_is_positive_and_falls_with_temperature(method: str, gas: str) -> None:
    waters = [Sc for Sc in (schmidt_numbers(method, gas, S) for S in (0.0, 35.0)) if np.isfinite(Sc).any()]

    assert waters, "a number neither in fresh water nor in sea water"
    for Sc in waters:
        assert (Sc > 0.0).all()
        if (method, gas) not in NOT_FALLING_SCHMIDT:
            assert (np.diff(Sc) < 0.0).all()


@pytest.mark.parametrize(("method", "gas"), SCHMIDT_NUMBERS)
def test_a_schmidt_number_is_higher_in_sea_water_than_in_fresh(method: str, gas: str) -> None:
    fresh, sea = schmidt_numbers(method, gas, 0.0), schmidt_numbers(method, gas, 35.0)
    if np.isnan(fresh).all() or np.isnan(sea).all():
        pytest.skip("offered for one kind of water alone")

    assert (sea > fresh).all()


@pytest.mark.parametrize("gas", GASES)
def test_the_schmidt_number_at_20_degrees_is_of_the_known_order(gas: str) -> None:
    method = str(default_method(GASES[gas], FAMILIES[SCHMIDT]))
    Sc = compute(SCHMIDT, {SCHMIDT: method}, gas, {"water_temperature": 20.0, "salinity": 35.0})[SCHMIDT][0]

    assert 100.0 < Sc < 1500.0  # from the lightest to the heaviest gas in sea water
