"""Transfer velocities with bubbles and waves in them, where the solubility of the gas plays a part."""

import numpy as np

from service.physics import sources
from service.physics.constants import CM_PER_HOUR, GRAVITY, SECONDS_PER_DAY
from service.physics.declare import Array, step
from service.physics.transfer_velocity.reference import COMMON_RANGE, FRICTION_RANGE, REFERENCE, SEA, reference

K = "transfer_velocity_without_rain"
INJECTION = "bubble_injection_per_atmosphere"

WOOLF_1997_DIRECT = 1.57e-4  # 1, with the friction velocity in the air; Woolf (1997), from memory
WOOLF_1997_DIRECT_SCHMIDT = 600.0
WOOLF_1997_BUBBLES = 2450.0  # cm h-1; Woolf (1997), from memory
WOOLF_1997_SHAPE = (14.0, 1.2)  # 1, 1
WOOLF_1997_WHITECAPS = (3.84e-6, 3.41)  # whitecap fraction at 1 m s-1, exponent of the wind speed


@step(
    K,
    method="woolf-1997",
    source=sources.WOOLF_1997,
    equation="direct and bubble-mediated parts",
    formula="k = 1.57e-4 u* (600/Sc)^1/2 [m s-1] + 2450 W / (L (1 + (14 L Sc^-1/2)^(-1/1.2))^1.2) [cm h-1], "
    "W = 3.84e-6 U^3.41, L Ostwald",
    valid={"wind_speed_10m": COMMON_RANGE},
    range_kind="common practice",
    water=SEA,
    wind_averaging="short",
    note="Coefficients from memory. The supersaturation that bubbles sustain is not in it: see woolf-thorpe-1991.",
)
def woolf_1997(
    wind_speed_10m: Array, friction_velocity_air: Array, ostwald_coefficient: Array, schmidt_number: Array
) -> Array:
    """Return the transfer velocity of Woolf (1997), through the surface and through bubbles.

    Parameters
    ----------
    wind_speed_10m : (...) array
        [m s-1]
    friction_velocity_air : (...) array
        [m s-1]
    ostwald_coefficient : (...) array
        Water over air. [1]
    schmidt_number : (...) array
        [1]

    Returns
    -------
    (...) array
        [cm h-1]

    Notes
    -----
    Less soluble gases gain more from bubbles. No range is stated; 0 to 20 m s-1 is common practice. NaN in, NaN out.

    References
    ----------
    Woolf (1997). doi:10.1017/CBO9780511525025.007
    """
    direct = WOOLF_1997_DIRECT * friction_velocity_air * np.sqrt(WOOLF_1997_DIRECT_SCHMIDT / schmidt_number)
    return CM_PER_HOUR * direct + woolf_1997_bubbles(wind_speed_10m, ostwald_coefficient, schmidt_number)


def woolf_1997_bubbles(wind_speed_10m: Array, ostwald_coefficient: Array, schmidt_number: Array) -> Array:
    """Return the part of bubbles in the transfer velocity of Woolf (1997). [cm h-1]"""
    at_one, exponent = WOOLF_1997_WHITECAPS
    factor, power = WOOLF_1997_SHAPE
    whitecaps = at_one * wind_speed_10m**exponent
    inside = 1.0 + (factor * ostwald_coefficient / np.sqrt(schmidt_number)) ** (-1.0 / power)
    return np.asarray(WOOLF_1997_BUBBLES * whitecaps / (ostwald_coefficient * inside**power))


LIANG_2013_DIRECT = 1.3e-4  # 1, with the friction velocity in the air; Liang et al. (2013), from memory
LIANG_2013_SCHMIDT = 660.0
LIANG_2013_PARTIAL = (1.98e6, 2.76, -2.0 / 3.0)  # cm h-1 (m s-1)-2.76, exponents of u* in the water and of Sc/660
LIANG_2013_COMPLETE = (5.56, 3.86)  # mol m-2 s-1 (m s-1)-3.86, exponent of u* in the water
LIANG_2013_EXCESS = (1.5244, 1.06)  # fraction (m s-1)-1.06, exponent of u* in the water
EMERSON_2019_FACTOR = 0.29  # 1, on both bubble parts of Liang et al. (2013); Emerson et al. (2019), from memory
MMOL_PER_LITRE_ATMOSPHERE = 1.0e6  # mmol m-3 in one mol L-1


def liang_2013_partial(friction_velocity_water: Array, schmidt_number: Array) -> Array:
    """Return the transfer velocity of bubbles that dissolve in part, after Liang et al. (2013). [cm h-1]"""
    coefficient, exponent, of_schmidt = LIANG_2013_PARTIAL
    scaled = (schmidt_number / LIANG_2013_SCHMIDT) ** of_schmidt
    return np.asarray(coefficient * friction_velocity_water**exponent * scaled)


def liang_2013_excess(friction_velocity_water: Array) -> Array:
    """Return the supersaturation to which bubbles that dissolve in part lead, after Liang et al. (2013). [fraction]"""
    coefficient, exponent = LIANG_2013_EXCESS
    return np.asarray(coefficient * friction_velocity_water**exponent)


def liang_2013_complete(friction_velocity_water: Array) -> Array:
    """Return the gas of bubbles that dissolve whole, per mole fraction, after Liang et al. (2013). [mol m-2 s-1]"""
    coefficient, exponent = LIANG_2013_COMPLETE
    return np.asarray(coefficient * friction_velocity_water**exponent)


def _liang(direct: Array, water: Array, schmidt_number: Array, factor: float) -> Array:
    scaled = np.sqrt(LIANG_2013_SCHMIDT / schmidt_number)
    through_surface = CM_PER_HOUR * LIANG_2013_DIRECT * direct * scaled
    return through_surface + factor * liang_2013_partial(water, schmidt_number)


def _liang_injection(water: Array, schmidt_number: Array, solubility: Array, factor: float) -> Array:
    complete = liang_2013_complete(water) * 1000.0 * SECONDS_PER_DAY
    velocity = liang_2013_partial(water, schmidt_number) / CM_PER_HOUR * SECONDS_PER_DAY
    partial = velocity * liang_2013_excess(water) * solubility * MMOL_PER_LITRE_ATMOSPHERE
    return factor * (complete + partial)


@step(
    K,
    method="liang-2013",
    source=sources.LIANG_2013,
    equation="surface and bubble terms",
    formula="k = 1.3e-4 u*a (660/Sc)^1/2 [m s-1] + 1.98e6 u*w^2.76 (Sc/660)^-2/3 [cm h-1], u*w = u*a (1.2/rho)^1/2",
    valid={"friction_velocity_air": FRICTION_RANGE},
    range_kind="common practice",
    water=SEA,
    wind_averaging="short",
    note="Coefficients from memory. Takes friction_velocity where it is sent, else that of the wind profile.",
)
def liang_2013(friction_velocity_air: Array, friction_velocity_water: Array, schmidt_number: Array) -> Array:
    """Return the transfer velocity of Liang et al. (2013), through the surface and through bubbles.

    Parameters
    ----------
    friction_velocity_air : (...) array
        [m s-1]
    friction_velocity_water : (...) array
        [m s-1]
    schmidt_number : (...) array
        [1]

    Returns
    -------
    (...) array
        [cm h-1]

    Notes
    -----
    Bubbles that dissolve whole, and the excess pressure in the others, are in the bubble injection. NaN in, NaN out.

    References
    ----------
    Liang et al. (2013). doi:10.1002/gbc.20080
    """
    return _liang(friction_velocity_air, friction_velocity_water, schmidt_number, 1.0)


@step(
    INJECTION,
    method="liang-2013",
    source=sources.LIANG_2013,
    equation="bubble terms",
    formula="5.56 u*w^3.86 [mol m-2 s-1 atm-1] + k_b K0 1.5244 u*w^1.06, k_b the bubble part of k",
)
def liang_2013_injection(
    friction_velocity_water: Array, schmidt_number: Array, solubility_per_litre_at_skin: Array
) -> Array:
    """Return what bubbles inject by Liang et al. (2013).

    Parameters
    ----------
    friction_velocity_water : (...) array
        [m s-1]
    schmidt_number : (...) array
        [1]
    solubility_per_litre_at_skin : (...) array
        [mol L-1 atm-1]

    Returns
    -------
    (...) array
        Per partial pressure of the gas in the air. [mmol m-2 d-1 atm-1]

    Notes
    -----
    Bubbles that dissolve whole in proportion to the share of the gas, and the excess pressure of those that dissolve
    in part. NaN in, NaN out.

    References
    ----------
    Liang et al. (2013). doi:10.1002/gbc.20080
    """
    return _liang_injection(friction_velocity_water, schmidt_number, solubility_per_litre_at_skin, 1.0)


@step(
    K,
    method="emerson-2019",
    source=sources.EMERSON_2019,
    equation="bubble terms of Liang et al. (2013) times 0.29",
    formula="k = 1.3e-4 u*a (660/Sc)^1/2 [m s-1] + 0.29 1.98e6 u*w^2.76 (Sc/660)^-2/3 [cm h-1]",
    valid={"friction_velocity_air": FRICTION_RANGE},
    range_kind="common practice",
    water=SEA,
    wind_averaging="short",
    variant_of="liang-2013",
    note="The factor is from memory. Takes friction_velocity where it is sent, else that of the wind profile.",
)
def emerson_2019(friction_velocity_air: Array, friction_velocity_water: Array, schmidt_number: Array) -> Array:
    """Return the transfer velocity of Liang et al. (2013) with the bubbles of Emerson et al. (2019).

    Parameters
    ----------
    friction_velocity_air : (...) array
        [m s-1]
    friction_velocity_water : (...) array
        [m s-1]
    schmidt_number : (...) array
        [1]

    Returns
    -------
    (...) array
        [cm h-1]

    Notes
    -----
    Measured nitrogen asks for fewer bubbles: both bubble terms are multiplied by 0.29. NaN in, NaN out.

    References
    ----------
    Emerson et al. (2019). doi:10.1029/2018JC014786
    """
    return _liang(friction_velocity_air, friction_velocity_water, schmidt_number, EMERSON_2019_FACTOR)


@step(
    INJECTION,
    method="emerson-2019",
    source=sources.EMERSON_2019,
    equation="bubble terms of Liang et al. (2013) times 0.29",
    formula="0.29 times that of liang-2013",
)
def emerson_2019_injection(
    friction_velocity_water: Array, schmidt_number: Array, solubility_per_litre_at_skin: Array
) -> Array:
    """Return what bubbles inject by Emerson et al. (2019).

    Parameters
    ----------
    friction_velocity_water : (...) array
        [m s-1]
    schmidt_number : (...) array
        [1]
    solubility_per_litre_at_skin : (...) array
        [mol L-1 atm-1]

    Returns
    -------
    (...) array
        Per partial pressure of the gas in the air. [mmol m-2 d-1 atm-1]

    References
    ----------
    Emerson et al. (2019). doi:10.1029/2018JC014786
    """
    return _liang_injection(friction_velocity_water, schmidt_number, solubility_per_litre_at_skin, EMERSON_2019_FACTOR)


REICHL_DEIKE_2020_DIRECT = 1.55e-4  # 1, A_NB; Reichl and Deike (2020), from memory
REICHL_DEIKE_2020_BUBBLES = 1.2e-5  # s2 m-2, A_B, +- 0.2e-5; from memory


@step(
    REFERENCE,
    method="reichl-deike-2020",
    source=sources.REICHL_DEIKE_2020,
    equation="non-bubble and bubble parts",
    formula="k660 = 1.55e-4 u* + 1.2e-5 / L u*^(5/3) (g Hs)^(2/3) [m s-1], u* in the air, L Ostwald",
    supplies=reference(660.0),
    valid={"friction_velocity_air": FRICTION_RANGE},
    range_kind="common practice",
    water=SEA,
    wind_averaging="short",
    note="Coefficients from memory; A_B is 1.2e-5 +- 0.2e-5 s2 m-2. Takes friction_velocity where it is sent.",
)
def reichl_deike_2020(
    friction_velocity_air: Array, significant_wave_height: Array, ostwald_coefficient: Array
) -> Array:
    """Return the transfer velocity of Reichl and Deike (2020), with bubbles by the height of the waves.

    Parameters
    ----------
    friction_velocity_air : (...) array
        [m s-1]
    significant_wave_height : (...) array
        [m]
    ostwald_coefficient : (...) array
        Water over air. [1]

    Returns
    -------
    (...) array
        Transfer velocity at a Schmidt number of 660. [cm h-1]

    Notes
    -----
    NaN in, NaN out.

    References
    ----------
    Reichl and Deike (2020). doi:10.1029/2020GL087267
    """
    waves = friction_velocity_air ** (5.0 / 3.0) * (GRAVITY * significant_wave_height) ** (2.0 / 3.0)
    direct = REICHL_DEIKE_2020_DIRECT * friction_velocity_air
    return CM_PER_HOUR * (direct + REICHL_DEIKE_2020_BUBBLES * waves / ostwald_coefficient)
