"""The dissociation constants of carbonic acid, total scale: published sets, and the one the salinity asks for."""

import numpy as np
from numpy.typing import NDArray

from service.physics import sources
from service.physics.constants import LN_10, ZERO_CELSIUS
from service.physics.declare import Array, Remark, step

SEA_FROM = 19.0  # practical salinity; Lueker et al. (2000) measured from here
FRESH_BELOW = 1.0  # practical salinity; Millero (2010) fitted from here
LUEKER_TEMPERATURES = (2.0, 35.0)  # degC; Lueker et al. (2000)
MILLERO_TEMPERATURES = (0.0, 50.0)  # degC; Millero (2010)
RESULTS = ("carbonic_acid_constant", "bicarbonate_constant")
Pair = tuple[Array, Array]

# Lueker et al. (2000), as in Dickson et al. (2007), chapter 5: 1/T, constant, ln T, S, S^2
LUEKER_PK1 = (3633.86, -61.2172, 9.67770, -0.011555, 0.0001152)
LUEKER_PK2 = (471.78, 25.9290, -3.16967, -0.01781, 0.0001122)

# Millero (2010), total scale. In pure water: constant, 1/T, ln T; then constant with S^0.5, S, S^2; 1/T with S^0.5, S;
# ln T with S^0.5. From memory; they meet the sets on either side as the checks of this method state.
MILLERO_PURE_PK1 = (-126.34048, 6320.813, 19.568224)
MILLERO_PURE_PK2 = (-90.18333, 5143.692, 14.613358)
MILLERO_PK1 = (13.4051, 0.03185, -5.218e-5, -531.095, -5.7789, -2.0663)
MILLERO_PK2 = (21.5724, 0.1212, -3.714e-4, -798.292, -18.951, -3.403)

# Plummer and Busenberg (1982), Table 4, log10 K: constant, T, 1/T, log10 T, 1/T^2. From memory; checked at 25 degC.
PLUMMER_K1 = (-356.3094, -0.06091964, 21834.37, 126.8339, -1684915.0)
PLUMMER_K2 = (-107.8871, -0.03252849, 5151.79, 38.92561, -563713.9)


@step(
    *RESULTS,
    method="lueker-2000",
    source=sources.LUEKER_2000,
    equation="as in Dickson et al. (2007), chapter 5",
    formula="pK1 = 3633.86/T - 61.2172 + 9.67770 ln T - 0.011555 S + 0.0001152 S^2; pK2 = 471.78/T + 25.9290 - "
    "3.16967 ln T - 0.01781 S + 0.0001122 S^2",
    valid={"water_temperature": LUEKER_TEMPERATURES, "salinity": (19.0, 43.0)},
    note="The authors give 0.0055 and 0.0100 as standard deviations of pK1 and pK2 (from memory).",
)
def lueker_2000(water_temperature: Array, salinity: Array) -> Pair:
    """Return the dissociation constants of carbonic acid in sea water of Lueker et al. (2000).

    Parameters
    ----------
    water_temperature : (...) array
        [degC]
    salinity : (...) array
        Practical salinity. [1]

    Returns
    -------
    carbonic_acid_constant : (...) array
        K1, total scale. [mol kg-1]
    bicarbonate_constant : (...) array
        K2, total scale. [mol kg-1]

    Notes
    -----
    2 to 35 degC, salinity 19 to 43: data of Mehrbach et al. (1973) on the total scale. NaN in, NaN out.

    References
    ----------
    Lueker et al. (2000). doi:10.1016/S0304-4203(00)00022-0
    """
    T = water_temperature + ZERO_CELSIUS
    ln_T = np.log(T)

    def constant(coefficients: tuple[float, ...]) -> Array:
        a, b, c, d, e = coefficients
        return np.exp(-LN_10 * (a / T + b + c * ln_T + (d + e * salinity) * salinity))

    return constant(LUEKER_PK1), constant(LUEKER_PK2)


@step(
    *RESULTS,
    method="millero-2010",
    source=sources.MILLERO_2010,
    equation="total scale",
    formula="pK = pK0 + A + B/T + C ln T; pK0 in pure water; A of S^0.5, S and S^2, B of S^0.5 and S, C of S^0.5",
    valid={"water_temperature": MILLERO_TEMPERATURES, "salinity": (1.0, 50.0)},
)
def millero_2010(water_temperature: Array, salinity: Array) -> Pair:
    """Return the dissociation constants of carbonic acid in estuarine water of Millero (2010).

    Parameters
    ----------
    water_temperature : (...) array
        [degC]
    salinity : (...) array
        Practical salinity. [1]

    Returns
    -------
    carbonic_acid_constant : (...) array
        K1, total scale. [mol kg-1]
    bicarbonate_constant : (...) array
        K2, total scale. [mol kg-1]

    Notes
    -----
    0 to 50 degC, salinity 1 to 50: sea water diluted by pure water. River water has other salts: no set is made for
    it. NaN in, NaN out.

    References
    ----------
    Millero (2010). doi:10.1071/MF09254
    """
    T = water_temperature + ZERO_CELSIUS
    ln_T, root_S = np.log(T), np.sqrt(salinity)

    def constant(pure: tuple[float, ...], salt: tuple[float, ...]) -> Array:
        a, b, c, d, e, f = salt
        of_salt = (a * root_S + (b + c * salinity) * salinity) + (d * root_S + e * salinity) / T + f * root_S * ln_T
        return np.exp(-LN_10 * (pure[0] + pure[1] / T + pure[2] * ln_T + of_salt))

    return constant(MILLERO_PURE_PK1, MILLERO_PK1), constant(MILLERO_PURE_PK2, MILLERO_PK2)


@step(
    *RESULTS,
    method="plummer-busenberg-1982",
    source=sources.PLUMMER_BUSENBERG_1982,
    equation="Table 4",
    formula="log10 K1 = -356.3094 - 0.06091964 T + 21834.37/T + 126.8339 log10 T - 1684915/T^2; log10 K2 = -107.8871 "
    "- 0.03252849 T + 5151.79/T + 38.92561 log10 T - 563713.9/T^2",
    valid={"water_temperature": (0.0, 90.0), "salinity": (0.0, 1.0)},
    note="At infinite dilution: the salt of a lake is left out of account.",
)
def plummer_busenberg_1982(water_temperature: Array) -> Pair:
    """Return the dissociation constants of carbonic acid in pure water of Plummer and Busenberg (1982).

    Parameters
    ----------
    water_temperature : (...) array
        [degC]

    Returns
    -------
    carbonic_acid_constant : (...) array
        K1 at infinite dilution. [mol kg-1]
    bicarbonate_constant : (...) array
        K2 at infinite dilution. [mol kg-1]

    Notes
    -----
    0 to 90 degC. At infinite dilution, where all pH scales are one; at an ionic strength of 0.01 mol kg-1 pK1 is lower
    by about 0.09. NaN in, NaN out.

    References
    ----------
    Plummer and Busenberg (1982), Table 4. doi:10.1016/0016-7037(82)90056-4
    """
    T = water_temperature + ZERO_CELSIUS
    log10_T = np.log10(T)

    def constant(coefficients: tuple[float, ...]) -> Array:
        a, b, c, d, e = coefficients
        return np.exp(LN_10 * (a + b * T + c / T + d * log10_T + e / T**2))

    return constant(PLUMMER_K1), constant(PLUMMER_K2)


def _outside(limits: tuple[float, float], temperature: Array) -> NDArray[np.bool_]:
    return (temperature < limits[0]) | (temperature > limits[1])


@step(
    *RESULTS,
    method="by-salinity",
    source=sources.LUEKER_2000,
    formula="lueker-2000 from salinity 19, millero-2010 from 1, plummer-busenberg-1982 below",
    valid={"salinity": (0.0, 43.0)},
    remarks=(
        Remark(
            "lueker-2000, the carbonate constants from salinity 19, were measured from 2 to 35 degC",
            ("salinity", "water_temperature"),
            lambda S, temperature: (S >= SEA_FROM) & _outside(LUEKER_TEMPERATURES, temperature),
        ),
        Remark(
            "millero-2010, the carbonate constants of brackish water, hold from 0 to 50 degC",
            ("salinity", "water_temperature"),
            lambda S, temperature: (S >= FRESH_BELOW) & (S < SEA_FROM) & _outside(MILLERO_TEMPERATURES, temperature),
        ),
    ),
    note="Steps at the two limits. At salinity 19, from 2 to 35 degC, pK1 falls by 0.010 to 0.014 and pK2 by 0.009 to "
    "0.021 into brackish water. At salinity 1, below which the salt is left out of account, pK1 rises by 0.12 to 0.15 "
    "and pK2 by 0.39 to 0.47 into fresh water: the fugacity from alkalinity and total carbon falls there by up to a "
    "third, and millero-2010, chosen by name, has no such step.",
)
def by_salinity(water_temperature: Array, salinity: Array) -> Pair:
    """Return the dissociation constants of carbonic acid of the set made for the salinity.

    Parameters
    ----------
    water_temperature : (...) array
        [degC]
    salinity : (...) array
        Practical salinity. [1]

    Returns
    -------
    carbonic_acid_constant : (...) array
        K1, total scale. [mol kg-1]
    bicarbonate_constant : (...) array
        K2, total scale. [mol kg-1]

    Notes
    -----
    A block that needs one set computes that one alone; each sample has the same number either way. The sets do not
    meet. At salinity 19 the pH from alkalinity and total carbon steps by up to 0.014 and the fugacity by up to 1.3
    percent, as much as the sets' own uncertainty. At salinity 1 it is the salt, which counts from there only: the pH
    steps by up to 0.3 and the fugacity by up to half of its lower value.

    References
    ----------
    Lueker et al. (2000), from salinity 19. doi:10.1016/S0304-4203(00)00022-0
    Millero (2010), from salinity 1. doi:10.1071/MF09254
    Plummer and Busenberg (1982), below. doi:10.1016/0016-7037(82)90056-4
    """
    if not (salinity < SEA_FROM).any():
        return lueker_2000(water_temperature, salinity)
    brackish = millero_2010(water_temperature, salinity)
    if (salinity < FRESH_BELOW).any():
        brackish = _below(FRESH_BELOW, salinity, plummer_busenberg_1982(water_temperature), brackish)
    if not (salinity >= SEA_FROM).any():
        return brackish
    return _below(SEA_FROM, salinity, brackish, lueker_2000(water_temperature, salinity))


def _below(limit: float, salinity: Array, low: Pair, high: Pair) -> Pair:
    under = salinity < limit
    return np.where(under, low[0], high[0]), np.where(under, low[1], high[1])
