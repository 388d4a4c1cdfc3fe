"""What every transfer velocity method states: its water, its range, and how it scales with the Schmidt number."""

import numpy as np

from service.physics.declare import Array, Limits

SEA = ("ocean", "coastal")
COMMON_RANGE: Limits = (0.0, 20.0)  # m s-1, common practice where authors state none
FRICTION_RANGE: Limits = (0.0, 0.85)  # m s-1 in the air, what 20 m s-1 make by the drag of Smith (1988)
SQUARE_ROOT = 0.5  # Schmidt exponent of a wavy surface without bubbles
REFERENCE = "transfer_velocity_at_reference"


def reference(schmidt: float, exponent: float = SQUARE_ROOT) -> dict[str, float]:
    """Return what a method brings for scaling: its reference Schmidt number and its exponent."""
    return {"reference_schmidt_number": schmidt, "schmidt_exponent": exponent}


def moments(ascending: tuple[float, ...], *powers: Array) -> Array:
    """Return c0 + c1 <U> + c2 <U^2> + ..., from the mean, the second moment and so on, as many as are given.

    Parameters
    ----------
    ascending : tuple of float
        Coefficients from the constant upwards. [cm h-1 per power of m s-1]
    *powers : (...) arrays
        The mean wind speed and its higher moments, in order. [m s-1, m2 s-2, ...]

    Returns
    -------
    (...) array
        [cm h-1]
    """
    total = np.full_like(powers[0], ascending[0])
    for coefficient, power in zip(ascending[1:], powers, strict=True):
        total = total + coefficient * power
    return total
