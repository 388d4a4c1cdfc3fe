"""The polynomial in ascending powers, in which many coefficients are printed."""

import numpy as np

from service.physics.declare import Array


def polynomial(ascending: tuple[float, ...], x: Array) -> Array:
    """Return c0 + c1 x + c2 x^2 + ... by Horner's rule.

    Parameters
    ----------
    ascending : tuple of float
        Coefficients from the constant upwards. [X, X per unit of x, ...]
    x : (...) array
        [any]

    Returns
    -------
    (...) array
        [X]

    Examples
    --------
    >>> polynomial((1.0, 2.0, 3.0), np.array([2.0]))
    array([17.])
    """
    total = np.full_like(x, ascending[-1])
    for coefficient in ascending[-2::-1]:
        total *= x
        total += coefficient
    return total
