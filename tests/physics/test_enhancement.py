"""Reaction in the boundary layer and films of surfactant: figures from elsewhere, limits, and how they combine."""

from collections.abc import Mapping

import numpy as np
import pytest

from service.physics.declare import Array
from service.physics.enhancement import (
    hoover_berkshire_1969_factor,
    johnson_1982,
    suppressed_transfer_velocity,
    wanninkhof_1992_enhancement,
)
from tests.properties.questions import bits, compute

SEA: dict[str, float] = {"water_temperature": 20.0, "salinity": 35.0, "water_fugacity": 400.0, "alkalinity": 2300.0}
HOOVER_BERKSHIRE = {"chemical_enhancement": "hoover-berkshire-1969"}
WANNINKHOF = {"chemical_enhancement": "wanninkhof-1992"}
Values = Mapping[str, float | Array]


def enhanced(k: float | Array, chosen: Mapping[str, str], **more: float | Array) -> Array:
    """Return the transfer velocity with reaction, of the caller's own velocity in situ."""
    values = {**SEA, "given_transfer_velocity": k, **more}
    return compute("enhanced_transfer_velocity", {**chosen, "transfer_velocity": "given"}, "co2", values).popitem()[1]


def factor(k: Array, r: float = 0.037, H: float = 1e-8, K1: float = 1.42e-6, K2: float = 1.08e-9) -> Array:
    every = [np.array([number]) for number in (1.9e-9, r, H, K1, K2)]
    return hoover_berkshire_1969_factor(k, *every)


def rate(celsius: float, salinity: float, hydrogen_ion: float) -> float:
    return float(johnson_1982(*(np.array([number]) for number in (celsius, salinity, hydrogen_ion)))[0])


def test_carbon_dioxide_hydrates_at_0_037_a_second_at_25_degrees() -> None:
    without_hydroxide = rate(25.0, 35.0, 1.0)

    # Zeebe and Wolf-Gladrow (2001), after Johnson (1982), from memory; half of the last digit
    assert without_hydroxide == pytest.approx(0.037, abs=0.0005)


def test_hydroxide_takes_up_carbon_dioxide_as_fast_as_others_measured() -> None:
    water_ion_product = 10.0**-13.995  # mol2 L-2, pure water at 25 degC, handbooks
    hydrogen_ion = 1e-14
    rate_constant = (rate(25.0, 0.0, hydrogen_ion) - rate(25.0, 0.0, 1.0)) * hydrogen_ion / water_ion_product

    # Pinsent et al. (1956), from memory; 3.10e4, printed to three figures, leaves 17 % open
    assert rate_constant == pytest.approx(10.0 ** (13.635 - 2895.0 / 298.15), rel=0.17)


def test_the_rate_grows_with_warmth_and_with_ph() -> None:
    celsius, hydrogen_ion = np.linspace(0.0, 30.0, 31), np.logspace(-9.0, -6.0, 31)
    by_warmth = [rate(t, 35.0, 8e-9) for t in celsius]
    by_acid = [rate(20.0, 35.0, H) for H in hydrogen_ion]

    assert (np.diff(by_warmth) > 0.0).all()
    assert (np.diff(by_acid) < 0.0).all()


def test_the_factor_is_never_below_1_and_falls_to_1_with_the_transfer_velocity() -> None:
    k = np.logspace(-4.0, 4.0, 400)
    found = factor(k)

    assert (found >= 1.0).all()
    assert (np.diff(found) <= 0.0).all()
    assert found[-1] == pytest.approx(1.0, abs=1e-6)


def test_in_a_film_that_bicarbonate_cannot_limit_the_factor_is_that_of_a_fast_reaction() -> None:
    k, H = np.array([0.5, 2.0, 10.0]), 1e-11  # so alkaline that tau is 1
    hatta = np.sqrt(0.037 * 1.9e-9) / (k / 3.6e5)

    assert factor(k, H=H, K2=1e-9) == pytest.approx(hatta / np.tanh(hatta), rel=1e-4)  # the film theory of Hatta


def test_in_an_endless_film_bicarbonate_limits_the_factor() -> None:
    tau = 1.0 + 1e-8**2 / (1.42e-6 * 1.08e-9 + 1.42e-6 * 1e-8)

    assert factor(np.array([1e-9])) == pytest.approx(tau / (tau - 1.0), rel=1e-4)


def test_without_wind_nothing_passes_however_it_reacts() -> None:
    assert enhanced(np.array([0.0, 5.0]), HOOVER_BERKSHIRE)[0] == 0.0


def test_at_sea_the_reaction_adds_percents_in_a_breeze_and_little_in_a_gale() -> None:
    k = np.array([2.0, 10.0, 50.0])
    found = enhanced(k, HOOVER_BERKSHIRE, water_temperature=25.0) / k - 1.0

    assert 0.1 < found[0] < 1.0
    assert 0.005 < found[1] < 0.1
    assert 0.0 < found[2] < 0.005


def test_the_term_of_wanninkhof_1992_is_added_and_scaled_with_the_schmidt_number() -> None:
    k, celsius = np.array([0.0, 10.0]), np.array([20.0])

    # 2.5 (0.5246 + 1.6256e-2 t + 4.9946e-4 t^2) at 20 degC: evaluated by others
    assert wanninkhof_1992_enhancement(k, celsius, np.array([660.0])) - k == pytest.approx(2.6238, abs=5e-5)
    assert wanninkhof_1992_enhancement(k, celsius, np.array([2640.0])) - k == pytest.approx(1.3119, abs=5e-5)


def test_the_term_of_wanninkhof_1992_stands_inside_the_bracket() -> None:
    values = {"water_temperature": 20.0, "salinity": 35.0, "wind_speed": 6.0}
    chosen = {**WANNINKHOF, "transfer_velocity": "wanninkhof-1992"}
    found = compute(("enhanced_transfer_velocity", "schmidt_number"), chosen, "co2", values)
    printed = (2.6238 + 0.31 * 36.0) * (found["schmidt_number"] / 660.0) ** -0.5

    assert found["enhanced_transfer_velocity"] == pytest.approx(printed, abs=1e-4)


def test_both_say_much_the_same_of_a_light_wind() -> None:
    by_term, by_film = (enhanced(np.array([3.0]), chosen)[0] for chosen in (WANNINKHOF, HOOVER_BERKSHIRE))

    assert 3.0 < by_film < by_term < 3.0 + 2.7


@pytest.mark.parametrize("gas", ["co2", "o2"])
def test_none_leaves_the_transfer_velocity_as_it_is_bit_for_bit(gas: str) -> None:
    k = np.linspace(0.0, 60.0, 61)
    values: Values = {"water_temperature": 20.0, "salinity": 35.0, "given_transfer_velocity": k}
    found = compute("enhanced_transfer_velocity", {"transfer_velocity": "given"}, gas, values).popitem()[1]

    assert bits(found) == bits(k)


def test_a_suppression_is_the_percentage_that_the_caller_says() -> None:
    k = np.array([8.0, 20.0])

    assert bits(suppressed_transfer_velocity(k, np.array([0.0]))) == bits(k)
    assert suppressed_transfer_velocity(k, np.array([15.0])) == pytest.approx([6.8, 17.0], rel=1e-15)
    assert suppressed_transfer_velocity(k, np.array([100.0])).tolist() == [0.0, 0.0]


def test_a_film_acts_before_the_reaction_so_that_slower_transfer_is_enhanced_more() -> None:
    clean, film = (enhanced(10.0, HOOVER_BERKSHIRE, surfactant_suppression=s)[0] for s in (0.0, 30.0))

    assert film > 0.7 * clean
    assert film == enhanced(7.0, HOOVER_BERKSHIRE)[0]


def test_gaps_stay_gaps() -> None:
    k = np.array([5.0, np.nan])

    assert np.isnan(enhanced(k, HOOVER_BERKSHIRE)).tolist() == [False, True]
    assert np.isnan(enhanced(k, WANNINKHOF)).tolist() == [False, True]
