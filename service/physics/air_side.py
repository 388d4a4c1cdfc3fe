"""The resistance to transfer on the air side of the interface."""

import numpy as np

from service.physics import sources
from service.physics.declare import Array, same_as, step

DUCE_INTERCEPT = 770.0  # 1; Duce et al. (1991), from memory
DUCE_SLOPE = 45.0  # (g mol-1)^(-1/3); Duce et al. (1991), from memory
CM_PER_HOUR = 3.6e5  # cm h-1 in one m s-1

same_as("total_transfer_velocity", "enhanced_transfer_velocity", method="none")


@step(
    "air_side_transfer_velocity",
    source=sources.DUCE_1991,
    formula="k_a = U10 / (770 + 45 M^(1/3))",
)
def duce_1991(wind_speed_10m: Array, molar_mass: Array) -> Array:
    """Return the transfer velocity on the air side after Duce et al. (1991).

    Parameters
    ----------
    wind_speed_10m : (...) array
        [m s-1]
    molar_mass : (...) array
        Of the gas. [g mol-1]

    Returns
    -------
    (...) array
        [cm h-1]

    References
    ----------
    Duce et al. (1991). doi:10.1029/91GB01778
    """
    return CM_PER_HOUR * wind_speed_10m / (DUCE_INTERCEPT + DUCE_SLOPE * np.cbrt(molar_mass))


@step(
    "total_transfer_velocity",
    method="duce-1991",
    source=sources.DUCE_1991,
    formula="1/K = 1/k_w + L/k_a",
)
def total_transfer_velocity(
    enhanced_transfer_velocity: Array, air_side_transfer_velocity: Array, ostwald_coefficient: Array
) -> Array:
    """Return the transfer velocity with the resistances of water and air in series.

    Parameters
    ----------
    enhanced_transfer_velocity : (...) array
        On the water side. [cm h-1]
    air_side_transfer_velocity : (...) array
        [cm h-1]
    ostwald_coefficient : (...) array
        Water over air. [1]

    Returns
    -------
    (...) array
        [cm h-1]

    References
    ----------
    Duce et al. (1991). doi:10.1029/91GB01778
    """
    k_w, k_a, L = enhanced_transfer_velocity, air_side_transfer_velocity, ostwald_coefficient
    both = k_a + L * k_w
    return np.where(both > 0.0, k_w * k_a / np.where(both > 0.0, both, 1.0), 0.0 * both)
