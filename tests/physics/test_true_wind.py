"""The true wind: identities of vectors, which hold whatever the ship does."""

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from service.physics.declare import Array
from service.physics.true_wind import (
    smith_1999,
    true_wind_direction,
    true_wind_speed,
    wind_direction_over_water,
    wind_over_water,
    wind_speed_over_water,
)

ROUNDING = 1e-9  # m s-1 and degree: some roundings of sums of about 100
angles = st.floats(0.0, 360.0, exclude_max=True)
speeds = st.floats(0.0, 40.0)
same_every_time = settings(derandomize=True, deadline=None)
Motion = tuple[float, float, float]  # heading, course over ground, speed over ground


def arrays(*numbers: float) -> list[Array]:
    return [np.array([number]) for number in numbers]


def true(speed: float, direction: float, motion: Motion, zero_line: float = 0.0) -> tuple[float, float]:
    """Return speed and direction of the true wind."""
    heading, course, over_ground = motion
    vector = smith_1999(*arrays(speed, direction, zero_line, heading, course, over_ground))
    return float(true_wind_speed(*vector)[0]), float(true_wind_direction(*vector)[0])


def felt(speed: float, direction: float, motion: Motion) -> tuple[float, float]:
    """Return what an anemometer with its zero line at the bow feels of a wind, in complex numbers from the north."""
    heading, course, over_ground = motion
    wind = -speed * np.exp(1j * np.radians(direction))
    apparent = wind - over_ground * np.exp(1j * np.radians(course))
    return float(abs(apparent)), float(np.degrees(np.angle(-apparent)) - heading)


def apart(one: float, other: float) -> float:
    """Return the angle between two directions."""
    return abs((one - other + 180.0) % 360.0 - 180.0)


# felt speed and direction, heading, course, ship's speed: true speed and direction, all by hand
BY_HAND = [
    ((10.0, 37.0), (120.0, 0.0, 0.0), (10.0, 157.0)),  # at anchor: turned by the heading, no more
    ((10.0, 350.0), (20.0, 123.0, 0.0), (10.0, 10.0)),
    ((15.0, 0.0), (90.0, 90.0, 5.0), (10.0, 90.0)),  # head wind: the ship's speed is taken off
    ((5.0, 180.0), (90.0, 90.0, 5.0), (10.0, 270.0)),  # following wind: it is added
    ((8.0, 0.0), (213.0, 213.0, 8.0), (0.0, 0.0)),  # a calm: all that is felt is the ship's own
    ((5.0, 0.0), (0.0, 0.0, 10.0), (5.0, 180.0)),  # slower than the ship, from astern
    ((10.0, 90.0), (0.0, 0.0, 10.0), (10.0 * np.sqrt(2.0), 135.0)),  # felt abeam, so from behind the beam
    ((10.0, 270.0), (0.0, 0.0, 10.0), (10.0 * np.sqrt(2.0), 225.0)),  # the same to port
    ((10.0, 0.0), (90.0, 0.0, 5.0), (np.sqrt(125.0), 90.0 + np.degrees(np.arctan(0.5)))),  # drifting sideways, north
]


@pytest.mark.parametrize(("apparent", "motion", "expected"), BY_HAND)
def test_the_true_wind_is_what_a_drawing_gives(
    apparent: tuple[float, float], motion: Motion, expected: tuple[float, float]
) -> None:
    speed, direction = true(*apparent, motion)

    assert speed == pytest.approx(expected[0], abs=ROUNDING)
    assert speed < ROUNDING or apart(direction, expected[1]) < ROUNDING


@same_every_time
@given(speeds, angles, angles, angles, st.floats(0.0, 15.0))
def test_a_wind_that_was_felt_on_any_ship_comes_back(
    speed: float, direction: float, heading: float, course: float, over_ground: float
) -> None:
    motion = (heading, course, over_ground)
    found = true(*felt(speed, direction, motion), motion)

    assert found[0] == pytest.approx(speed, abs=ROUNDING)
    assert speed < 1e-3 or apart(found[1], direction) < 1e-6  # of a weak wind the direction is lost in the sum


@same_every_time
@given(speeds, angles, angles, angles, st.floats(0.0, 15.0), angles)
def test_turning_ship_and_course_turns_the_wind(
    speed: float, direction: float, heading: float, course: float, over_ground: float, turn: float
) -> None:
    before = true(speed, direction, (heading, course, over_ground))
    after = true(speed, direction, (heading + turn, course + turn, over_ground))

    assert after[0] == pytest.approx(before[0], abs=ROUNDING)
    assert before[0] < 1e-3 or apart(after[1], before[1] + turn) < 1e-6


@same_every_time
@given(speeds, angles, angles, angles, st.floats(0.0, 15.0), angles)
def test_where_the_zero_line_lies_does_not_matter_if_it_is_told(
    speed: float, direction: float, heading: float, course: float, over_ground: float, zero_line: float
) -> None:
    motion = (heading, course, over_ground)
    found, expected = true(speed, direction - zero_line, motion, zero_line), true(speed, direction, motion)

    assert found[0] == pytest.approx(expected[0], abs=ROUNDING)
    assert expected[0] < 1e-3 or apart(found[1], expected[1]) < 1e-6


@same_every_time
@given(speeds, angles, angles, angles, st.floats(0.0, 15.0))
def test_the_true_wind_is_within_the_ships_speed_of_the_felt_one(
    speed: float, direction: float, heading: float, course: float, over_ground: float
) -> None:
    assert abs(true(speed, direction, (heading, course, over_ground))[0] - speed) <= over_ground + ROUNDING


@same_every_time
@given(angles, angles)
def test_a_direction_is_from_0_to_below_360(east: float, north: float) -> None:
    for vector in ((east, north), (-east, north), (1e-300, -1.0), (-1e-300, -1.0), (0.0, 0.0), (-0.0, -0.0)):
        assert 0.0 <= true_wind_direction(*arrays(*vector))[0] < 360.0


def test_a_calm_has_direction_0_and_a_gap_has_none() -> None:
    east, north = np.array([0.0, np.nan, 1.0]), np.array([0.0, 1.0, np.nan])

    assert np.array_equal(true_wind_direction(east, north), [0.0, np.nan, np.nan], equal_nan=True)
    assert np.array_equal(true_wind_speed(east, north), [0.0, np.nan, np.nan], equal_nan=True)


def test_the_mean_of_north_west_and_north_east_is_north_by_vectors_and_not_by_angles() -> None:
    motion = (0.0, 0.0, 0.0)
    east, north = (
        np.array([smith_1999(*arrays(8.0, angle, 0.0, *motion))[axis][0] for angle in (315.0, 45.0)]) for axis in (0, 1)
    )
    of_vectors = true_wind_direction(east[:1] + east[1:], north[:1] + north[1:])[0]

    assert apart(of_vectors, 0.0) < ROUNDING
    assert np.mean([315.0, 45.0]) == 180.0


# current's speed and where it flows to, under 10 m s-1 from the north: speed and direction over the water
CURRENTS = [
    ((0.0, 77.0), (10.0, 0.0)),
    ((1.0, 180.0), (9.0, 0.0)),  # flows with the wind
    ((1.0, 0.0), (11.0, 0.0)),  # flows against it
    ((1.0, 90.0), (np.sqrt(101.0), np.degrees(np.arctan(0.1)))),  # flows east: the wind comes from east of north
]


@pytest.mark.parametrize(("current", "expected"), CURRENTS)
def test_a_current_is_taken_off_the_wind(current: tuple[float, float], expected: tuple[float, float]) -> None:
    vector = wind_over_water(*arrays(0.0, -10.0, *current))

    assert wind_speed_over_water(*vector)[0] == pytest.approx(expected[0], abs=ROUNDING)
    assert apart(wind_direction_over_water(*vector)[0], expected[1]) < ROUNDING


def test_a_current_of_1_at_a_wind_of_7_moves_a_quadratic_velocity_by_30_percent() -> None:
    against, along = (wind_speed_over_water(*wind_over_water(*arrays(0.0, -7.0, 1.0, to)))[0] for to in (0.0, 180.0))

    assert (against / 7.0) ** 2 - 1.0 == pytest.approx(0.31, abs=0.005)
    assert 1.0 - (along / 7.0) ** 2 == pytest.approx(0.27, abs=0.005)


def test_samples_stand_apart() -> None:
    generator = np.random.default_rng(4)
    inputs = [generator.uniform(0.0, top, 40) for top in (20.0, 360.0, 360.0, 360.0, 360.0, 8.0)]
    together = true_wind_direction(*smith_1999(*inputs))
    alone = [true_wind_direction(*smith_1999(*(each[row : row + 1] for each in inputs)))[0] for row in range(40)]

    assert together.tolist() == alone
