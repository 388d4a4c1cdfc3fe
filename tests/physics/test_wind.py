"""The wind at 10 m, the friction velocity and the moments of a wind that is not steady."""

from collections.abc import Callable

import numpy as np
import pytest
from numpy.typing import NDArray
from scipy.optimize import brentq
from scipy.special import gammaln
from scipy.stats import weibull_min

from service.physics import wind, wind_moments, wind_profiles
from service.physics.declare import Array

Profile = Callable[[Array, Array], Array]
PROFILES: list[Profile] = [
    wind.smith_1988,
    wind_profiles.large_pond_1981,
    wind_profiles.constant_drag,
    wind_profiles.power_law,
]
FRICTION: list[Callable[[Array], Array]] = [
    wind.smith_1988_friction_velocity,
    wind_profiles.large_pond_1981_friction_velocity,
    wind_profiles.constant_drag_friction_velocity,
]
WINDS = np.array([0.0, 0.01, 0.4, 0.5, 1.7, 3.6, 7.5, 11.0, 18.3, 25.0, 40.0])
TEN = np.array([10.0])


def named(functions: list[Callable[..., Array]]) -> list[str]:
    return [function.__name__ for function in functions]


@pytest.mark.parametrize("profile", PROFILES, ids=named([*PROFILES]))
def test_the_wind_at_ten_metres_returns_bit_for_bit(profile: Profile) -> None:
    assert np.array_equal(profile(WINDS, TEN), WINDS)


@pytest.mark.parametrize("profile", PROFILES, ids=named([*PROFILES]))
def test_the_wind_grows_with_height(profile: Profile) -> None:
    moving = WINDS[WINDS > 0.0]

    assert (profile(moving, np.array([23.0])) < moving).all()
    assert (profile(moving, np.array([2.0])) > moving).all()


@pytest.mark.parametrize("profile", PROFILES, ids=named([*PROFILES]))
def test_samples_do_not_depend_on_their_neighbours(profile: Profile) -> None:
    together = profile(WINDS, np.array([18.0]))
    alone = [profile(WINDS[place : place + 1], np.array([18.0]))[0] for place in range(WINDS.size)]

    assert together.tolist() == alone


@pytest.mark.parametrize("profile", PROFILES, ids=named([*PROFILES]))
def test_heights_and_winds_broadcast_and_gaps_stay_gaps(profile: Profile) -> None:
    heights = np.array([[5.0], [10.0], [np.nan]])
    found = profile(np.array([3.0, np.nan, 9.0]), heights)

    assert found.shape == (3, 3)
    assert np.isnan(found).tolist() == [[False, True, False], [False, True, False], [True, True, True]]


def roughness(friction: float) -> float:
    return 0.011 * friction**2 / 9.81 + 0.11 * 1.5e-5 / friction


@pytest.mark.parametrize("height", [2.0, 10.0, 23.0, 50.0])
@pytest.mark.parametrize("speed", [0.5, 1.0, 5.0, 12.0, 30.0, 60.0])
def test_the_fixed_steps_of_smith_1988_lead_to_the_root(speed: float, height: float) -> None:
    root = brentq(lambda u: u * np.log(height / roughness(u)) - 0.40 * speed, 1e-4 * speed, 0.2 * speed, xtol=1e-15)
    at_ten = speed * np.log(10.0 / roughness(root)) / np.log(height / roughness(root))

    # 1e-13 leaves room for some hundred roundings
    assert wind.smith_1988(np.array([speed]), np.array([height])) == pytest.approx(at_ten, rel=1e-13)


@pytest.mark.parametrize(("speed", "drag"), [(5.0, 1.032e-3), (10.0, 1.297e-3), (20.0, 1.803e-3)])
def test_the_neutral_drag_of_smith_1988_comes_out(speed: float, drag: float) -> None:
    friction = wind.smith_1988_friction_velocity(np.array([speed]))

    assert (friction / speed) ** 2 == pytest.approx(drag, abs=0.5e-6)  # half of the last digit given


@pytest.mark.parametrize(("speed", "drag"), [(2.0, 1.2e-3), (7.0, 1.2e-3), (15.0, 1.465e-3)])
def test_the_drag_of_large_and_pond_comes_out(speed: float, drag: float) -> None:
    assert wind_profiles.large_pond_1981_drag(np.array([speed])) == pytest.approx(drag, rel=1e-15)


@pytest.mark.parametrize("speed", [1.0, 8.0, 10.9, 16.0, 25.0, 60.0])
def test_the_fixed_steps_of_large_and_pond_lead_to_the_root(speed: float) -> None:
    height = 23.0

    def residue(at_ten: float) -> float:
        drag = float(wind_profiles.large_pond_1981_drag(np.array(at_ten)))
        return float(at_ten * (1.0 + np.sqrt(drag) / 0.40 * np.log(height / 10.0)) - speed)

    root = brentq(residue, 0.5 * speed, speed, xtol=1e-14)

    assert wind_profiles.large_pond_1981(np.array([speed]), np.array([height])) == pytest.approx(root, rel=1e-12)


@pytest.mark.parametrize("friction", FRICTION, ids=named([*FRICTION]))
def test_the_friction_velocity_grows_with_the_wind_from_nothing(friction: Callable[[Array], Array]) -> None:
    winds = np.linspace(0.0, 40.0, 2001)
    found = friction(winds)

    assert found[0] == 0.0
    assert (np.diff(found) > 0.0).all()
    assert np.isnan(friction(np.array([np.nan]))).all()


def test_very_weak_winds_have_the_drag_of_half_a_metre_per_second() -> None:
    weak = np.array([1e-6, 0.1, 0.3, 0.499])
    at_half = wind.smith_1988_friction_velocity(np.array([0.5]))[0] / 0.5
    ratio = wind.smith_1988(np.array([0.5]), np.array([20.0]))[0] / 0.5

    assert wind.smith_1988_friction_velocity(weak) / weak == pytest.approx(at_half, rel=1e-14)
    assert wind.smith_1988(weak, np.array([20.0])) / weak == pytest.approx(ratio, rel=1e-14)
    assert wind.smith_1988(np.zeros(1), np.array([20.0])) == 0.0


SHAPES = np.array([0.5, 0.7, 1.0, 1.3, 1.8, 2.0, 2.5, 3.6, 10.0, 100.0])


def test_the_logarithm_of_the_gamma_function_is_that_of_scipy() -> None:
    arguments = np.concatenate([np.linspace(1.0, 8.0, 1401), [0.3, 20.0, 170.0]])

    assert wind_moments.ln_gamma(arguments) == pytest.approx(
        gammaln(arguments), rel=1e-13, abs=5e-14
    )  # a difference of numbers near 13


@pytest.mark.parametrize("shape", SHAPES)
def test_the_moments_of_a_weibull_distribution_are_those_of_scipy(shape: float) -> None:
    distribution = weibull_min(shape)
    mean = distribution.moment(1)
    second = wind_moments.second_moment_by_weibull(np.array([7.0]), np.array([shape]))
    third = wind_moments.third_moment_by_weibull(np.array([7.0]), np.array([shape]))

    assert second == pytest.approx(49.0 * distribution.moment(2) / mean**2, rel=1e-12)
    assert third == pytest.approx(343.0 * distribution.moment(3) / mean**3, rel=1e-12)


def test_a_rayleigh_distribution_gives_its_published_factors() -> None:
    one, rayleigh = np.ones(1), np.array([2.0])

    assert wind_moments.second_moment_by_weibull(one, rayleigh) == pytest.approx(1.27, abs=0.005)
    assert wind_moments.third_moment_by_weibull(one, rayleigh) == pytest.approx(1.91, abs=0.005)
    assert wind_moments.second_moment_by_weibull(one, rayleigh) == pytest.approx(4.0 / np.pi, rel=1e-13)
    assert wind_moments.third_moment_by_weibull(one, rayleigh) == pytest.approx(6.0 / np.pi, rel=1e-13)


def by_variance(at_ten: NDArray[np.float64], measured: NDArray[np.float64], variance: float) -> tuple[Array, Array]:
    spread = np.array([variance])
    return (
        wind_moments.second_moment_by_variance(at_ten, measured, spread),
        wind_moments.third_moment_by_variance(at_ten, measured, spread),
    )


def test_the_moments_by_variance_are_those_of_the_winds_themselves() -> None:
    winds = np.array([3.0, 5.0, 7.0, 9.0, 11.0])  # symmetric, so that the skewness is 0
    mean = np.array([winds.mean()])
    second, third = by_variance(mean, mean, winds.var())

    assert second == pytest.approx((winds**2).mean(), rel=1e-14)
    assert third == pytest.approx((winds**3).mean(), rel=1e-14)


def test_the_variance_is_brought_to_ten_metres_with_the_wind() -> None:
    winds = np.array([3.0, 5.0, 7.0, 9.0, 11.0])
    mean = np.array([winds.mean()])
    second, third = by_variance(0.9 * mean, mean, winds.var())

    assert second == pytest.approx(((0.9 * winds) ** 2).mean(), rel=1e-14)
    assert third == pytest.approx(((0.9 * winds) ** 3).mean(), rel=1e-14)


def test_without_a_variance_the_moments_are_powers() -> None:
    second, third = by_variance(WINDS, WINDS, 0.0)

    assert np.array_equal(second, wind_moments.second_moment(WINDS))
    assert np.array_equal(third, wind_moments.third_moment(WINDS))


def test_a_gap_in_the_wind_or_the_variance_stays_a_gap() -> None:
    wind_or_gap, spread = np.array([np.nan, 5.0, 0.0]), np.array([4.0, np.nan, 4.0])
    second = wind_moments.second_moment_by_variance(wind_or_gap, wind_or_gap, spread)

    assert np.isnan(second).tolist() == [True, True, False]
