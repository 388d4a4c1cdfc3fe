"""Laws of the flux: nothing where both sides are in equilibrium, out where the water has more, in where the air has."""

import numpy as np
import pytest
from hypothesis import given

from service.physics.declare import GASES, STEPS, Array
from tests.properties.questions import Values, ask_and_answer, samples, transfer_pairs, typical_values

PAIRS = transfer_pairs("co2", "o2", "he", "dms")
INJECTS = set(STEPS.get("bubble_injection", {}))  # methods whose bubbles dissolve: water gains gas at equilibrium too
HELD_BACK_BY_AIR = {name for name, gas in GASES.items() if gas.defaults.get("air_side", "none") != "none"}
FUGACITY = (0.0, 5000.0)

seas = samples("water_temperature", "wind_speed")
sides = samples("water_temperature", "wind_speed", water_fugacity=FUGACITY, air_fugacity=FUGACITY)


def flux_of(gas: str, values: Values, direction: str = "upward", **more: Array) -> dict[str, Array]:
    """Return the results of a flux at salinity 35, where every gas has a Schmidt number."""
    found = ask_and_answer("flux", gas, {"salinity": 35.0, **values, **more}, direction=direction)
    return dict(found.outcome.results)


@pytest.mark.parametrize("gas", GASES)
@given(sea=samples("water_temperature", "wind_speed", water_fugacity=FUGACITY))
def test_there_is_no_flux_at_equal_fugacities(gas: str, sea: dict[str, Array]) -> None:
    told = flux_of(gas, sea, air_fugacity=sea["water_fugacity"])

    assert (told["flux"] == 0.0).all()
    assert (told["fugacity_difference"] == 0.0).all()
    assert np.array_equal(told["evasion"], told["invasion"])


@pytest.mark.parametrize("gas", GASES)
@given(sea=sides)
def test_gas_goes_from_the_higher_fugacity_to_the_lower(gas: str, sea: dict[str, Array]) -> None:
    told = flux_of(gas, sea)
    water, air = sea["water_fugacity"], sea["air_fugacity"]
    clearly = (np.abs(water - air) > 1e-6 * (water + air)) & (told["transfer_velocity"] > 1e-6)

    assert (told["evasion"] >= 0.0).all()
    assert (told["invasion"] >= 0.0).all()
    assert (told["flux"] * (water - air) >= 0.0).all()
    assert (told["flux"][clearly] != 0.0).all()
    assert np.array_equal(told["flux"], told["evasion"] - told["invasion"])


@pytest.mark.parametrize("gas", GASES)
@given(sea=sides)
def test_the_direction_changes_the_sign_of_the_flux_and_of_nothing_else(gas: str, sea: dict[str, Array]) -> None:
    upward, downward = flux_of(gas, sea), flux_of(gas, sea, direction="downward")

    assert np.array_equal(downward.pop("flux"), -upward.pop("flux"))
    assert all(np.array_equal(downward[name], upward[name]) for name in upward)


@pytest.mark.parametrize("gas", GASES)
@given(sea=sides)
def test_the_flux_is_the_product_of_what_is_told_beside_it(gas: str, sea: dict[str, Array]) -> None:
    told = flux_of(gas, sea)
    difference = told["fugacity_in_water"] - told["fugacity_in_air"]
    product = 0.24 * told["transfer_velocity"] * told["solubility"] * difference
    # evasion and invasion are each rounded, and their difference may be small beside them; the last is for subnormals
    rounding = 1e-14 * (told["evasion"] + told["invasion"]) + 1e-300

    if gas in HELD_BACK_BY_AIR:
        assert (np.abs(told["flux"]) <= np.abs(product) + rounding).all()
    else:
        assert (np.abs(told["flux"] - product) <= 1e-12 * np.abs(product) + rounding).all()


@pytest.mark.parametrize("gas", GASES)
@given(sea=sides, ice=samples(ice_fraction=(0.0, 1.0)))
def test_ice_takes_its_share_of_the_flux_and_leaves_the_rest(
    gas: str, sea: dict[str, Array], ice: dict[str, Array]
) -> None:
    open_water, iced = flux_of(gas, sea), flux_of(gas, sea | ice)
    share = 1.0 - ice["ice_fraction"]

    for name in ("evasion", "invasion"):
        assert iced[name] == pytest.approx(share * open_water[name], rel=1e-13, abs=1e-300)
    assert np.array_equal(iced["transfer_velocity"], open_water["transfer_velocity"])


@pytest.mark.parametrize("gas", GASES)
@given(sea=samples("water_temperature", "wind_speed", "air_pressure", air_mole_fraction=(1e-3, 1e4)))
def test_water_with_the_fugacity_of_the_air_exchanges_nothing(gas: str, sea: dict[str, Array]) -> None:
    one = np.ones_like(sea["wind_speed"])
    air = flux_of(gas, sea, water_fugacity=one)["fugacity_in_air"]
    told = flux_of(gas, sea, water_fugacity=air)

    assert (told["flux"] == 0.0).all()
    assert np.array_equal(told["fugacity_in_water"], told["fugacity_in_air"])


@pytest.mark.parametrize(("method", "gas"), PAIRS)
def test_at_equal_fugacities_only_bubbles_that_dissolve_give_a_flux(method: str, gas: str) -> None:
    fugacity = np.linspace(0.0, 1000.0, 11)
    values = typical_values("flux", gas, method, given=("water_fugacity", "air_fugacity"))
    values |= {"water_fugacity": fugacity, "air_fugacity": fugacity}
    told = ask_and_answer("flux", gas, values, method).outcome.results

    assert (told["evasion"][1:] > 0.0).all()
    if method in INJECTS:
        assert (told["flux"][1:] < 0.0).all()
    else:
        assert (told["flux"] == 0.0).all()


@pytest.mark.parametrize("gas", GASES)
def test_the_flux_is_proportional_to_the_transfer_velocity_unless_the_air_holds_it_back(gas: str) -> None:
    values: dict[str, float | Array] = {
        "salinity": 35.0,
        "water_temperature": 12.0,
        "given_transfer_velocity": np.linspace(0.0, 40.0, 9),
        "water_fugacity": 500.0,
        "air_fugacity": 400.0,
    }
    if gas in HELD_BACK_BY_AIR:
        values["wind_speed"] = 8.0
    flux = ask_and_answer("flux", gas, values, pick=("flux",)).outcome.results["flux"]
    rises = np.diff(flux)

    assert flux[0] == 0.0
    if gas in HELD_BACK_BY_AIR:
        assert (np.diff(rises) < 0.0).all(), "the air holds back the more, the faster the water is"
    else:
        assert rises == pytest.approx(np.full(8, rises[0]), rel=1e-12)
    assert (rises > 0.0).all()
