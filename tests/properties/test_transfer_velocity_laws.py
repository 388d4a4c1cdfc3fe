"""Laws that every transfer velocity obeys: it grows with the wind and scales with the Schmidt number."""

import numpy as np
import pytest

from service.physics.declare import GASES, TERMS, Array
from service.physics.methods import TRANSFER_FAMILY, methods_for_water, transfer_methods
from tests.properties.questions import compute, stated_range, sufficient, transfer_pairs, typical

NORMALISED = ("transfer_velocity_600", "transfer_velocity_660")
PAIRS = transfer_pairs("co2", "o2", "he", "dms")
METHODS = list(dict.fromkeys(method for method, _ in PAIRS))

# Methods that truly break a law, each with its reason.
NOT_MONOTONIC: dict[str, str] = {}
WITHOUT_EXPONENT: dict[str, str] = dict.fromkeys(
    ("woolf-1997", "liang-2013", "emerson-2019", "stanley-2009"),
    "transfer through the surface and through bubbles scale each in its own way, and are added",
)
NEGATIVE: dict[str, str] = {}


def first_gas(method: str) -> str:
    return next(gas for name, gas in PAIRS if name == method)


def winds_of(method: str) -> Array:
    """Return winds over the whole range of a method, one every 2 cm/s."""
    leading = transfer_methods()[method]
    low, high = leading.valid.get("wind_speed_10m", (0.0, 20.0))
    return np.linspace(low, min(high, TERMS["wind_speed"].possible[1]), 1 + int(50 * (high - low)))


@pytest.mark.parametrize("method", METHODS)
@pytest.mark.parametrize("result", NORMALISED)
def test_the_transfer_velocity_at_one_schmidt_number_never_falls_with_rising_wind(method: str, result: str) -> None:
    if method in NOT_MONOTONIC:
        pytest.skip(NOT_MONOTONIC[method])
    k = compute(result, {TRANSFER_FAMILY: method}, first_gas(method), {"wind_speed": winds_of(method)})[result]

    falls = np.diff(np.broadcast_to(k, winds_of(method).shape)) < 0.0
    assert not falls.any(), winds_of(method)[:-1][falls][:5]


@pytest.mark.parametrize("method", METHODS)
def test_the_transfer_velocity_is_never_negative_in_the_range_of_its_method(method: str) -> None:
    if method in NEGATIVE:
        pytest.skip(NEGATIVE[method])
    found = compute(NORMALISED, {TRANSFER_FAMILY: method}, first_gas(method), {"wind_speed": winds_of(method)})

    assert all((k >= 0.0).all() for k in found.values())
    assert any((k > 0.0).any() for k in found.values())


@pytest.mark.parametrize(("method", "gas"), PAIRS)
def test_the_transfer_velocity_scales_with_the_schmidt_number(method: str, gas: str) -> None:
    if method in WITHOUT_EXPONENT:
        pytest.skip(WITHOUT_EXPONENT[method])
    wanted = ("transfer_velocity", *NORMALISED, "schmidt_number", "schmidt_exponent")
    rng = np.random.default_rng(600)
    values = {"water_temperature": rng.uniform(0.0, 30.0, 60), "wind_speed": rng.uniform(0.0, 20.0, 60)}
    found = compute(wanted, {TRANSFER_FAMILY: method}, gas, {**values, "salinity": 35.0})
    k, k600, k660, Sc, n = (found[name] for name in wanted)

    # two powers and a quotient of doubles: 1e-13 leaves room for some hundred roundings
    assert ((n > 0.0) & (n <= 1.0)).all()
    assert k == pytest.approx(k600 * (Sc / 600.0) ** -n, rel=1e-13)
    assert k600 == pytest.approx(k660 * (600.0 / 660.0) ** -n, rel=1e-13)


@pytest.mark.parametrize("gas", GASES)
@pytest.mark.parametrize("result", NORMALISED)
def test_the_normalised_transfer_velocity_is_the_same_for_every_gas(gas: str, result: str) -> None:
    chosen = {TRANSFER_FAMILY: "wanninkhof-2014"}
    values = {"wind_speed": np.linspace(0.0, 20.0, 41)}

    assert np.array_equal(compute(result, chosen, gas, values)[result], compute(result, chosen, "co2", values)[result])


@pytest.mark.parametrize("method", METHODS)
def test_a_method_says_for_which_water_it_is_and_in_what_range(method: str) -> None:
    leading, gas = transfer_methods()[method], first_gas(method)
    by_wind = "wind_speed" in sufficient(("transfer_velocity_600",), ((TRANSFER_FAMILY, method),), gas, ()).leaves

    assert leading.water
    assert leading.valid or not by_wind
    assert leading.formula
    assert all(low < high for low, high in leading.valid.values())
    assert any(method in methods_for_water(record, leading.water[0]) for record in GASES.values())


@pytest.mark.parametrize("method", METHODS)
def test_the_recommended_range_lies_within_the_range(method: str) -> None:
    leading = transfer_methods()[method]
    for name, (low, high) in leading.recommended.items():
        within = leading.valid.get(name, (-np.inf, np.inf))

        assert within[0] <= low < high <= within[1]


@pytest.mark.parametrize("exempt", [NOT_MONOTONIC, WITHOUT_EXPONENT, NEGATIVE], ids=["wind", "exponent", "sign"])
def test_an_exception_is_that_of_a_method_that_exists(exempt: dict[str, str]) -> None:
    assert set(exempt) <= set(METHODS)


def test_typical_inputs_lie_in_the_range_of_the_default_method() -> None:
    low, high = stated_range("transfer_velocity_at_reference", "wanninkhof-2014", "co2", "wind_speed_10m")

    assert low <= typical("wind_speed") <= high
