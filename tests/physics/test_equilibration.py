"""The time in which a mixed layer comes into equilibrium."""

import math

import numpy as np
import pytest

from service.physics.equilibration import equilibration_rate, equilibration_time, half_time, time_to_fraction
from service.physics.judge import BAD
from tests.properties.questions import ask_and_answer

ONE = np.array([1.0])


def tau(k: float, h: float, open_water: float = 1.0, storage: float = 1.0, decay: float = 0.0) -> float:
    depth, share, velocity, ratio, decays, no_ventilation = (
        np.array([value]) for value in (h, open_water, k, storage, decay, 0.0)
    )
    rate = equilibration_rate(depth, share, velocity, ratio, decays, no_ventilation)
    return float(equilibration_time(rate)[0])


def test_20_cm_per_hour_over_40_m_is_8_days_and_a_third() -> None:
    # 40 m / (0.20 m/h 24 h/d), by hand; k is printed to two figures
    assert tau(k=20.0, h=40.0) == pytest.approx(8.3333, abs=5e-5)


def test_three_metres_per_day_over_100_m_is_about_33_days() -> None:
    assert tau(k=300.0 / 24.0, h=100.0) == pytest.approx(33.3, abs=0.5)  # common practice: about 33 days


def test_half_the_water_under_ice_doubles_the_time() -> None:
    assert tau(k=20.0, h=40.0, open_water=0.5) == 2.0 * tau(k=20.0, h=40.0)


def test_a_gas_that_is_stored_twentyfold_takes_twenty_times_as_long() -> None:
    assert tau(k=20.0, h=40.0, storage=20.0) == pytest.approx(20.0 * tau(k=20.0, h=40.0), rel=1e-15)


def test_half_the_disequilibrium_is_gone_after_the_half_time() -> None:
    time = half_time(np.array([10.0]))[0]

    assert math.exp(-time / 10.0) == pytest.approx(0.5, rel=1e-15)


FRACTIONS = [
    (0.0, 0.0),
    (0.5, math.log(2.0)),
    (1.0 - 1.0 / math.e, 1.0),
    (0.95, math.log(20.0)),
    (0.99, math.log(100.0)),
]


@pytest.mark.parametrize(("fraction", "times"), FRACTIONS)
def test_the_time_to_a_fraction_is_a_logarithm(fraction: float, times: float) -> None:
    assert time_to_fraction(ONE, np.array([fraction]))[0] == pytest.approx(times, rel=1e-14)


def test_the_time_to_95_percent_is_three_times_the_e_folding_time() -> None:
    assert time_to_fraction(ONE, np.array([0.95]))[0] == pytest.approx(3.0, abs=0.005)  # rule of thumb, ln 20


def test_a_gas_that_decays_is_gone_sooner() -> None:
    per_day = math.log(2.0) / 3.8232  # radon-222 has a half-life of 3.8232 d, handbook
    time = tau(k=20.0, h=40.0, decay=per_day / 86400.0)

    assert 1.0 / time == pytest.approx(1.0 / tau(k=20.0, h=40.0) + per_day, rel=1e-13)


def test_a_missing_depth_spoils_no_other_sample() -> None:
    layer = {**LAYER, "wind_speed": 8.0, "mixed_layer_depth": np.array([40.0, np.nan])}
    found = ask_and_answer("equilibration", "o2", layer).outcome.results["equilibration_time"]

    assert np.isnan(found).tolist() == [False, True]


LAYER: dict[str, float | np.ndarray] = {"water_temperature": 12.0, "salinity": 35.0, "mixed_layer_depth": 40.0}


def test_under_full_ice_there_is_no_time_and_the_reason_says_so() -> None:
    found = ask_and_answer("equilibration", "o2", {**LAYER, "wind_speed": 8.0, "ice_fraction": np.array([0.5, 1.0])})

    assert found.outcome.verdict.flags.tolist() == [1, BAD]
    assert np.isnan(found.outcome.results["equilibration_time"][1])
    assert "no open water" in found.outcome.verdict.reasons[1][0]


def test_in_a_calm_without_exchange_there_is_no_time() -> None:
    found = ask_and_answer("equilibration", "o2", {**LAYER, "wind_speed": np.array([8.0, 0.0])})

    assert found.outcome.verdict.flags[1] == BAD
    assert np.isnan(found.outcome.results["equilibration_time"][1])


def test_a_layer_without_depth_is_impossible() -> None:
    layer = {**LAYER, "wind_speed": 8.0, "mixed_layer_depth": np.array([40.0, 0.0, -1.0])}
    found = ask_and_answer("equilibration", "o2", layer)

    assert found.outcome.verdict.flags.tolist() == [1, BAD, BAD]
    assert "above 0 to 12000 m" in found.outcome.verdict.reasons[1][0]
