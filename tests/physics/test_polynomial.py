"""The polynomial in ascending powers."""

import numpy as np
import pytest

from service.physics.polynomial import polynomial

CASES: list[tuple[tuple[float, ...], float, float]] = [
    ((7.0,), 3.0, 7.0),
    ((0.0, 1.0), 3.0, 3.0),
    ((1.0, 2.0, 3.0), 2.0, 17.0),
    ((1.0, 0.0, 0.0, -1.0), -2.0, 9.0),
    ((2.5, 1.5), 0.0, 2.5),
]


@pytest.mark.parametrize(("ascending", "x", "expected"), CASES)
def test_coefficients_ascend_from_the_constant(ascending: tuple[float, ...], x: float, expected: float) -> None:
    assert polynomial(ascending, np.array([x]))[0] == expected


def test_it_agrees_with_a_general_purpose_library() -> None:
    ascending, x = (2116.8, -136.25, 4.7353, -0.092307, 0.0007555), np.linspace(-2.0, 40.0, 85)

    # five terms of alternating sign, up to 2e3 in size: a few roundings of that size
    assert polynomial(ascending, x) == pytest.approx(np.polynomial.Polynomial(ascending)(x), abs=1e-11)


@pytest.mark.parametrize("shape", [(1,), (5,), (2, 3), (0,)])
def test_the_shape_is_that_of_the_argument(shape: tuple[int, ...]) -> None:
    assert polynomial((1.0, 2.0), np.zeros(shape)).shape == shape


def test_a_missing_number_stays_missing_and_spoils_no_other() -> None:
    found = polynomial((1.0, 2.0), np.array([1.0, np.nan, 3.0]))

    assert found.tolist()[::2] == [3.0, 7.0]
    assert np.isnan(found[1])


def test_the_argument_is_left_as_it_was() -> None:
    x = np.array([1.0, 2.0])
    polynomial((1.0, 2.0, 3.0), x)

    assert x.tolist() == [1.0, 2.0]
