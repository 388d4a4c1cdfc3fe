"""The transfer velocity and the bubbles of Stanley et al. (2009), from noble gases in the Sargasso Sea."""

import numpy as np

from service.physics import sources
from service.physics.constants import (
    CM_PER_HOUR,
    GAS_CONSTANT,
    GRAVITY,
    PASCALS_PER_HECTOPASCAL,
    SECONDS_PER_DAY,
    STANDARD_ATMOSPHERE,
    ZERO_CELSIUS,
)
from service.physics.declare import Array, step
from service.physics.transfer_velocity.ocean_radiocarbon import wanninkhof_1992
from service.physics.transfer_velocity.reference import COMMON_RANGE, SEA

STANLEY_2009_DIFFUSIVE = 0.97  # 1, on Wanninkhof (1992); Stanley et al. (2009), from memory
STANLEY_2009_COMPLETE = 9.1e-11  # s2 m-2, A_c, +- 1.3e-11; from memory
STANLEY_2009_PARTIAL = 2.3e-3  # s2 m-2, A_p, +- 1.5e-3; from memory
STANLEY_2009_ONSET = 2.27  # m s-1, the wind speed under which there are no bubbles
STANLEY_2009_DIFFUSIVITY = 1.0  # m2 s-1, D_0, a normalisation
STANLEY_2009_DEPTH = (-0.55, 0.15)  # m, m per m s-1: how deep bubbles go; 0 where that is negative
SCHMIDT = 660.0
ATMOSPHERE = STANDARD_ATMOSPHERE * PASCALS_PER_HECTOPASCAL  # Pa


def stanley_2009_complete(wind_speed_10m: Array, pressure: Array, temperature: Array) -> Array:
    """Return the gas of bubbles that dissolve whole, from its partial pressure [Pa] at a temperature [degC].

    In mol m-2 s-1; nothing below a wind of 2.27 m s-1.
    """
    per_pascal = STANLEY_2009_COMPLETE / (GAS_CONSTANT * (temperature + ZERO_CELSIUS))
    return np.asarray(per_pascal * _onset(wind_speed_10m) * pressure)


def _onset(wind_speed_10m: Array) -> Array:
    return np.asarray(np.maximum(wind_speed_10m - STANLEY_2009_ONSET, 0.0) ** 3)


def _partial(wind_speed_10m: Array, kinematic_viscosity: Array, schmidt_number: Array) -> Array:
    """Return the velocity of bubbles that dissolve in part, before the solubility. [m s-1]"""
    diffusivity = kinematic_viscosity / schmidt_number
    scaled = (diffusivity / STANLEY_2009_DIFFUSIVITY) ** (2.0 / 3.0)
    return np.asarray(STANLEY_2009_PARTIAL * _onset(wind_speed_10m) * scaled)


@step(
    "transfer_velocity_without_rain",
    method="stanley-2009",
    source=sources.STANLEY_2009,
    equation="diffusive exchange and partially dissolving bubbles",
    formula="k = 0.97 0.31 <U^2> (Sc/660)^-1/2 [cm h-1] + 2.3e-3 (U - 2.27)^3 (D/1 m2 s-1)^(2/3) 273.15/T [m s-1]",
    valid={"wind_speed_10m": COMMON_RANGE},
    range_kind="common practice",
    water=SEA,
    wind_averaging="short",
    note="Coefficients from memory: A_c 9.1e-11 +- 1.3e-11, A_p 2.3e-3 +- 1.5e-3 s2 m-2; its alpha taken as Bunsen's.",
)
def stanley_2009(
    wind_speed_10m: Array,
    wind_speed_10m_second_moment: Array,
    schmidt_number: Array,
    kinematic_viscosity: Array,
    water_temperature: Array,
) -> Array:
    """Return the transfer velocity of Stanley et al. (2009), through the surface and through bubbles.

    Parameters
    ----------
    wind_speed_10m : (...) array
        [m s-1]
    wind_speed_10m_second_moment : (...) array
        [m2 s-2]
    schmidt_number : (...) array
        [1]
    kinematic_viscosity : (...) array
        Gives the diffusivity by way of the Schmidt number. [m2 s-1]
    water_temperature : (...) array
        [degC]

    Returns
    -------
    (...) array
        [cm h-1]

    Notes
    -----
    The flux of partially dissolving bubbles, ``A_p (U - 2.27)^3 beta (D/D0)^(2/3) (P_b x - P_w) / (R T)``, is parted
    into an exchange in proportion to the difference of partial pressures, here, and the excess pressure of the
    bubbles, in the bubble injection. With Bunsen's coefficient beta the solubility cancels but for 273.15/T. No range
    is stated; 0 to 20 m s-1 is common practice. NaN in, NaN out.

    References
    ----------
    Stanley et al. (2009).
    """
    diffusive = STANLEY_2009_DIFFUSIVE * wanninkhof_1992(wind_speed_10m_second_moment)
    by_bubbles = _partial(wind_speed_10m, kinematic_viscosity, schmidt_number)
    cooled = ZERO_CELSIUS / (water_temperature + ZERO_CELSIUS)
    return diffusive * np.sqrt(SCHMIDT / schmidt_number) + CM_PER_HOUR * by_bubbles * cooled


@step(
    "bubble_injection_per_atmosphere",
    method="stanley-2009",
    source=sources.STANLEY_2009,
    equation="completely dissolving bubbles; excess pressure of partially dissolving ones",
    formula="9.1e-11 (U - 2.27)^3 / (R T) + 2.3e-3 (U - 2.27)^3 beta (D/1 m2 s-1)^(2/3) (rho g z / (P - p_w)) / (R T), "
    "z = 0.15 U - 0.55 m",
)
def stanley_2009_injection(
    wind_speed_10m: Array,
    schmidt_number: Array,
    kinematic_viscosity: Array,
    water_temperature: Array,
    bunsen_coefficient: Array,
    density: Array,
    surface_pressure: Array,
    water_vapour_pressure: Array,
) -> Array:
    """Return what bubbles inject by Stanley et al. (2009).

    Parameters
    ----------
    wind_speed_10m : (...) array
        [m s-1]
    schmidt_number : (...) array
        [1]
    kinematic_viscosity : (...) array
        [m2 s-1]
    water_temperature : (...) array
        [degC]
    bunsen_coefficient : (...) array
        [1]
    density : (...) array
        [kg m-3]
    surface_pressure : (...) array
        [hPa]
    water_vapour_pressure : (...) array
        [hPa]

    Returns
    -------
    (...) array
        Per partial pressure of the gas in the air. [mmol m-2 d-1 atm-1]

    Notes
    -----
    Below 2.27 m s-1 there are no bubbles; below 3.7 m s-1, where the depth of bubbles would be negative, no excess
    pressure. NaN in, NaN out.

    References
    ----------
    Stanley et al. (2009).
    """
    surface, deeper = STANLEY_2009_DEPTH
    depth = np.maximum(surface + deeper * wind_speed_10m, 0.0)
    dry = PASCALS_PER_HECTOPASCAL * (surface_pressure - water_vapour_pressure)
    excess = density * GRAVITY * depth / dry
    partial = _partial(wind_speed_10m, kinematic_viscosity, schmidt_number) * bunsen_coefficient * excess
    per_pascal = partial / (GAS_CONSTANT * (water_temperature + ZERO_CELSIUS))
    complete = stanley_2009_complete(wind_speed_10m, ATMOSPHERE * np.ones_like(wind_speed_10m), water_temperature)
    return (complete + per_pascal * ATMOSPHERE) * 1000.0 * SECONDS_PER_DAY
