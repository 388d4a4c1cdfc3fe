"""The other acids of sea water: how much of each there is by salinity, and their dissociation constants."""

import numpy as np

from service.physics import sources
from service.physics.constants import ZERO_CELSIUS
from service.physics.declare import Array, step

CHLORINITY_PER_SALINITY = 1.0 / 1.80655
GUIDE = "as in Dickson et al. (2007), chapter 5"
SULPHATE_PER_CHLORINITY = 0.14 / 96.062  # mol kg-1; Morris and Riley (1966), as in Dickson et al. (2007)
FLUORIDE_PER_CHLORINITY = 0.000067 / 18.998  # mol kg-1; Riley (1965), as in Dickson et al. (2007)
UPPSTROM_BORON = 0.000232 / 10.811  # mol kg-1 per chlorinity; Uppstrom (1974), as in Dickson et al. (2007)
LEE_BORON = 0.0002414 / 10.811  # mol kg-1 per chlorinity; Lee et al. (2010), abstract


def _ionic_strength(salinity: Array) -> Array:
    """Return the ionic strength of sea water, Dickson et al. (2007), in mol kg-1 of water."""
    return np.asarray(19.924 * salinity / (1000.0 - 1.005 * salinity))


def _per_solution(salinity: Array) -> Array:
    """Return ln of the kilograms of water in a kilogram of solution: from a constant per water to one per solution."""
    return np.log1p(-0.001005 * salinity)


@step("boron", method="lee-2010", source=sources.LEE_2010, equation="abstract", formula="0.0002414/10.811 S/1.80655")
def lee_2010(salinity: Array) -> Array:
    """Return total boron after Lee et al. (2010).

    Parameters
    ----------
    salinity : (...) array
        Practical salinity. [1]

    Returns
    -------
    (...) array
        [mol kg-1]

    Notes
    -----
    The default: 139 samples of the open sea against 20 (from memory), and the ratio that synthesis products
    now use. It is 4 percent higher; from alkalinity and total carbon in surface sea water that makes the fugacity
    higher by about 1.5 percent. NaN in, NaN out.

    References
    ----------
    Lee et al. (2010). doi:10.1016/j.gca.2009.12.027
    """
    return LEE_BORON * CHLORINITY_PER_SALINITY * salinity


@step(
    "boron",
    method="uppstrom-1974",
    source=sources.UPPSTROM_1974,
    equation=GUIDE,
    formula="0.000232/10.811 S/1.80655",
)
def uppstrom_1974(salinity: Array) -> Array:
    """Return total boron after Uppström (1974).

    Parameters
    ----------
    salinity : (...) array
        Practical salinity. [1]

    Returns
    -------
    (...) array
        [mol kg-1]

    Notes
    -----
    What the Guide of 2007 uses. NaN in, NaN out.

    References
    ----------
    Uppström (1974). doi:10.1016/0011-7471(74)90074-6
    """
    return UPPSTROM_BORON * CHLORINITY_PER_SALINITY * salinity


@step("sulphate", source=sources.MORRIS_RILEY_1966, equation=GUIDE, formula="0.14/96.062 S/1.80655")
def sulphate(salinity: Array) -> Array:
    """Return total sulphate.

    Parameters
    ----------
    salinity : (...) array
        Practical salinity. [1]

    Returns
    -------
    (...) array
        [mol kg-1]

    References
    ----------
    Morris and Riley (1966). doi:10.1016/0011-7471(66)90601-2
    """
    return SULPHATE_PER_CHLORINITY * CHLORINITY_PER_SALINITY * salinity


@step("fluoride", source=sources.RILEY_1965, equation=GUIDE, formula="0.000067/18.998 S/1.80655")
def fluoride(salinity: Array) -> Array:
    """Return total fluoride.

    Parameters
    ----------
    salinity : (...) array
        Practical salinity. [1]

    Returns
    -------
    (...) array
        [mol kg-1]

    References
    ----------
    Riley (1965). doi:10.1016/0011-7471(65)90027-6
    """
    return FLUORIDE_PER_CHLORINITY * CHLORINITY_PER_SALINITY * salinity


@step(
    "boric_acid_constant",
    source=sources.DICKSON_1990_BORATE,
    equation=GUIDE,
    formula="ln KB = (-8966.90 - 2890.53 S^0.5 - 77.942 S + 1.728 S^1.5 - 0.0996 S^2)/T + 148.0248 + 137.1942 S^0.5 "
    "+ 1.62142 S - (24.4344 + 25.085 S^0.5 + 0.2474 S) ln T + 0.053105 S^0.5 T",
)
def boric_acid_constant(water_temperature: Array, salinity: Array) -> Array:
    """Return the dissociation constant of boric acid of Dickson (1990).

    Parameters
    ----------
    water_temperature : (...) array
        [degC]
    salinity : (...) array
        Practical salinity. [1]

    Returns
    -------
    (...) array
        Total scale. [mol kg-1]

    Notes
    -----
    0 to 45 degC, salinity 5 to 45; there is no boron to speak of where it is lower.

    References
    ----------
    Dickson (1990). doi:10.1016/0198-0149(90)90004-F
    """
    T, root_S = water_temperature + ZERO_CELSIUS, np.sqrt(salinity)
    over_T = -8966.90 - 2890.53 * root_S + (-77.942 + 1.728 * root_S - 0.0996 * salinity) * salinity
    constant = 148.0248 + 137.1942 * root_S + 1.62142 * salinity
    of_logarithm = 24.4344 + 25.085 * root_S + 0.2474 * salinity
    return np.exp(over_T / T + constant - of_logarithm * np.log(T) + 0.053105 * root_S * T)


@step(
    "water_ion_product",
    source=sources.MILLERO_1995,
    equation=GUIDE,
    formula="ln KW = 148.9652 - 13847.26/T - 23.6521 ln T + (118.67/T - 5.977 + 1.0495 ln T) S^0.5 - 0.01615 S",
)
def water_ion_product(water_temperature: Array, salinity: Array) -> Array:
    """Return the ion product of water of Millero (1995).

    Parameters
    ----------
    water_temperature : (...) array
        [degC]
    salinity : (...) array
        Practical salinity. [1]

    Returns
    -------
    (...) array
        Total scale. [mol2 kg-2]

    References
    ----------
    Millero (1995). doi:10.1016/0016-7037(94)00354-O
    """
    T, root_S = water_temperature + ZERO_CELSIUS, np.sqrt(salinity)
    ln_T = np.log(T)
    pure = 148.9652 - 13847.26 / T - 23.6521 * ln_T
    return np.exp(pure + (118.67 / T - 5.977 + 1.0495 * ln_T) * root_S - 0.01615 * salinity)


@step(
    "bisulphate_constant",
    source=sources.DICKSON_1990_SULPHATE,
    equation=GUIDE,
    formula="ln KS = -4276.1/T + 141.328 - 23.093 ln T + (-13856/T + 324.57 - 47.986 ln T) I^0.5 + (35474/T - 771.54 + "
    "114.723 ln T) I - 2698/T I^1.5 + 1776/T I^2 + ln(1 - 0.001005 S)",
)
def bisulphate_constant(water_temperature: Array, salinity: Array) -> Array:
    """Return the dissociation constant of the bisulphate ion of Dickson (1990), which ties the pH scales together.

    Parameters
    ----------
    water_temperature : (...) array
        [degC]
    salinity : (...) array
        Practical salinity. [1]

    Returns
    -------
    (...) array
        Free scale. [mol kg-1]

    References
    ----------
    Dickson (1990). doi:10.1016/0021-9614(90)90074-Z
    """
    T, strength = water_temperature + ZERO_CELSIUS, _ionic_strength(salinity)
    ln_T, root = np.log(T), np.sqrt(strength)
    pure = -4276.1 / T + 141.328 - 23.093 * ln_T
    of_root = -13856.0 / T + 324.57 - 47.986 * ln_T - 2698.0 / T * strength
    of_strength = 35474.0 / T - 771.54 + 114.723 * ln_T + 1776.0 / T * strength
    return np.exp(pure + of_root * root + of_strength * strength + _per_solution(salinity))


@step(
    "hydrogen_fluoride_constant",
    source=sources.PEREZ_FRAGA_1987,
    equation=GUIDE,
    formula="ln KF = 874/T - 9.68 + 0.111 S^0.5",
)
def hydrogen_fluoride_constant(water_temperature: Array, salinity: Array) -> Array:
    """Return the dissociation constant of hydrogen fluoride of Pérez and Fraga (1987).

    Parameters
    ----------
    water_temperature : (...) array
        [degC]
    salinity : (...) array
        Practical salinity. [1]

    Returns
    -------
    (...) array
        Total scale. [mol kg-1]

    Notes
    -----
    9 to 33 degC, salinity 10 to 40; of no weight in the alkalinity of natural water.

    References
    ----------
    Pérez and Fraga (1987). doi:10.1016/0304-4203(87)90036-3
    """
    return np.exp(874.0 / (water_temperature + ZERO_CELSIUS) - 9.68 + 0.111 * np.sqrt(salinity))


@step(
    "phosphoric_acid_constant",
    "dihydrogen_phosphate_constant",
    "hydrogen_phosphate_constant",
    source=sources.MILLERO_1995,
    equation=GUIDE,
    formula="ln K1P = -4576.752/T + 115.525 - 18.453 ln T + (-106.736/T + 0.69171) S^0.5 + (-0.65643/T - 0.01844) S; "
    "ln K2P = -8814.715/T + 172.0883 - 27.927 ln T + (-160.340/T + 1.3566) S^0.5 + (0.37335/T - 0.05778) S; "
    "ln K3P = -3070.75/T - 18.141 + (17.27039/T + 2.81197) S^0.5 + (-44.99486/T - 0.09984) S",
)
def phosphoric_acid_constants(water_temperature: Array, salinity: Array) -> tuple[Array, Array, Array]:
    """Return the three dissociation constants of phosphoric acid of Millero (1995).

    Parameters
    ----------
    water_temperature : (...) array
        [degC]
    salinity : (...) array
        Practical salinity. [1]

    Returns
    -------
    phosphoric_acid_constant : (...) array
        Total scale. [mol kg-1]
    dihydrogen_phosphate_constant : (...) array
        Total scale. [mol kg-1]
    hydrogen_phosphate_constant : (...) array
        Total scale. [mol kg-1]

    References
    ----------
    Millero (1995). doi:10.1016/0016-7037(94)00354-O
    """
    T, S, root_S = water_temperature + ZERO_CELSIUS, salinity, np.sqrt(salinity)
    ln_T = np.log(T)
    first = -4576.752 / T + 115.525 - 18.453 * ln_T + (-106.736 / T + 0.69171) * root_S + (-0.65643 / T - 0.01844) * S
    second = -8814.715 / T + 172.0883 - 27.927 * ln_T + (-160.340 / T + 1.3566) * root_S + (0.37335 / T - 0.05778) * S
    third = -3070.75 / T - 18.141 + (17.27039 / T + 2.81197) * root_S + (-44.99486 / T - 0.09984) * S
    return np.exp(first), np.exp(second), np.exp(third)


@step(
    "silicic_acid_constant",
    source=sources.MILLERO_1995,
    equation=GUIDE,
    formula="ln KSi = -8904.2/T + 117.385 - 19.334 ln T + (-458.79/T + 3.5913) I^0.5 + (188.74/T - 1.5998) I + "
    "(-12.1652/T + 0.07871) I^2 + ln(1 - 0.001005 S)",
)
def silicic_acid_constant(water_temperature: Array, salinity: Array) -> Array:
    """Return the dissociation constant of silicic acid of Millero (1995).

    Parameters
    ----------
    water_temperature : (...) array
        [degC]
    salinity : (...) array
        Practical salinity. [1]

    Returns
    -------
    (...) array
        Total scale. [mol kg-1]

    References
    ----------
    Millero (1995). doi:10.1016/0016-7037(94)00354-O
    """
    T, strength = water_temperature + ZERO_CELSIUS, _ionic_strength(salinity)
    pure = -8904.2 / T + 117.385 - 19.334 * np.log(T)
    of_strength = 188.74 / T - 1.5998 + (-12.1652 / T + 0.07871) * strength
    return np.exp(pure + (-458.79 / T + 3.5913) * np.sqrt(strength) + of_strength * strength + _per_solution(salinity))
