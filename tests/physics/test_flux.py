"""The flux through the surface, part by part."""

import numpy as np
import pytest

from service.physics.flux import (
    evasion,
    flux_downward,
    flux_upward,
    fugacity_difference,
    invasion,
    open_water_fraction,
)
from tests.properties.questions import ask_and_answer


def arrays(*values: float) -> list[np.ndarray]:
    return [np.array([value]) for value in values]


def test_the_evasion_is_the_product_of_its_factors_in_the_stated_units() -> None:
    # 10 cm/h is 2.4 m/d; 0.03 mol/(L atm) times 100 uatm is 3 mmol/m3
    assert evasion(*arrays(1.0, 10.0, 0.03, 100.0))[0] == pytest.approx(7.2, rel=1e-15)


def test_the_invasion_takes_the_gas_of_bubbles_with_it() -> None:
    assert invasion(*arrays(0.5, 10.0, 0.03, 100.0, 4.0))[0] == pytest.approx(0.5 * 7.2 + 0.5 * 4.0, rel=1e-15)


def test_a_published_flux_comes_out_by_hand() -> None:
    # common practice: k 20 cm/h, K0 0.0347 mol/(L atm) (co2 at 18.5 degC), 50 uatm: 8.3 mmol m-2 d-1
    flux = flux_upward(evasion(*arrays(1.0, 20.0, 0.0347, 450.0)), evasion(*arrays(1.0, 20.0, 0.0347, 400.0)))

    assert flux[0] == pytest.approx(8.328, rel=1e-12)


@pytest.mark.parametrize(("out", "into", "expected"), [(5.0, 3.0, 2.0), (3.0, 5.0, -2.0), (4.0, 4.0, 0.0)])
def test_upward_is_out_of_the_water_and_downward_its_negative(out: float, into: float, expected: float) -> None:
    assert flux_upward(*arrays(out, into))[0] == expected
    assert flux_downward(*arrays(out, into))[0] == -expected


def test_the_fugacity_difference_is_water_minus_air_whatever_counts_as_positive() -> None:
    values = {"water_temperature": 18.0, "salinity": 35.0, "wind_speed": 7.0, "water_fugacity": 350.0}
    told = [
        ask_and_answer("flux", "co2", {**values, "air_fugacity": 400.0}, direction=direction).outcome.results
        for direction in ("upward", "downward")
    ]

    assert fugacity_difference(*arrays(350.0, 400.0))[0] == -50.0
    assert [each["fugacity_difference"][0] for each in told] == [-50.0, -50.0]
    assert told[0]["flux"][0] < 0.0 < told[1]["flux"][0]


@pytest.mark.parametrize(("ice", "expected"), [(0.0, 1.0), (0.25, 0.75), (1.0, 0.0)])
def test_ice_leaves_the_rest_open(ice: float, expected: float) -> None:
    assert open_water_fraction(np.array([ice]))[0] == expected


def test_under_full_ice_the_flux_is_zero_and_good() -> None:
    values = {"water_temperature": -1.0, "salinity": 33.0, "wind_speed": 7.0, "ice_fraction": 1.0}
    found = ask_and_answer("flux", "co2", {**values, "water_fugacity": 350.0, "air_fugacity": 400.0}).outcome

    assert found.results["flux"][0] == 0.0
    assert found.verdict.flags[0] == 1
    assert found.results["transfer_velocity"][0] > 0.0


@pytest.mark.parametrize("function", [flux_upward, flux_downward, fugacity_difference])
def test_samples_broadcast_against_a_single_value(function: object) -> None:
    assert callable(function)
    found = function(np.array([1.0, 2.0, np.nan]), np.array([1.0]))

    assert found.shape == (3,)
    assert np.isnan(found[2])
