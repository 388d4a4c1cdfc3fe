"""Solubilities published as K0: carbon dioxide, nitrous oxide, the halocarbons and dimethyl sulphide."""

import numpy as np

from service.physics import sources
from service.physics.constants import ZERO_CELSIUS
from service.physics.declare import Array, relative_uncertainty, step
from service.physics.solubility.forms import InverseTemperature, Weiss, kelvin_1968, weiss

BOTH_FORMS = ("solubility", "solubility_per_litre")


@step(
    forms=BOTH_FORMS,
    method="weiss-1974",
    source=sources.WEISS_1974,
    equation="Eq. 12, Table I",
    formula="ln K0 = A1 + A2 (100/T) + A3 ln(T/100) + S (B1 + B2 (T/100) + B3 (T/100)^2)",
    valid={"water_temperature": (-1.0, 40.0), "salinity": (0.0, 40.0)},
    uncertainty=relative_uncertainty(0.002, "author's estimate", "0.2 % (from memory)"),
)
def weiss_1974(coefficients: Weiss, water_temperature: Array, salinity: Array) -> Array:
    """Return the solubility of carbon dioxide after Weiss (1974).

    Parameters
    ----------
    coefficients : Weiss
        For mol kg-1 atm-1 or mol L-1 atm-1.
    water_temperature : (...) array
        Taken as it is, without conversion to IPTS-68, as the Guide of Dickson et al. (2007) does. [degC]
    salinity : (...) array
        Practical salinity. [1]

    Returns
    -------
    (...) array
        K0 in the coefficients' unit. [mol kg-1 atm-1 or mol L-1 atm-1]

    Notes
    -----
    Valid from -1 to 40 degC and salinity 0 to 40. Conversion to IPTS-68 would move it by 1.4e-4. NaN in, NaN out.

    References
    ----------
    Weiss (1974), Eq. 12 and Table I. doi:10.1016/0304-4203(74)90015-2
    """
    return weiss(coefficients, water_temperature + ZERO_CELSIUS, salinity)


@step(
    forms=BOTH_FORMS,
    method="weiss-price-1980",
    source=sources.WEISS_PRICE_1980,
    equation="Eq. 12, Table 2",
    formula="ln K0 = A1 + A2 (100/T) + A3 ln(T/100) + S (B1 + B2 (T/100) + B3 (T/100)^2)",
    valid={"water_temperature": (0.0, 40.0), "salinity": (0.0, 40.0)},
)
def weiss_price_1980(coefficients: Weiss, water_temperature: Array, salinity: Array) -> Array:
    """Return the solubility of nitrous oxide after Weiss and Price (1980).

    Parameters
    ----------
    coefficients : Weiss
        For mol kg-1 atm-1 or mol L-1 atm-1.
    water_temperature : (...) array
        ITS-90, converted to IPTS-68. [degC]
    salinity : (...) array
        Practical salinity. [1]

    Returns
    -------
    (...) array
        K0 in the coefficients' unit. [mol kg-1 atm-1 or mol L-1 atm-1]

    Notes
    -----
    Valid from 0 to 40 degC and salinity 0 to 40. NaN in, NaN out.

    References
    ----------
    Weiss and Price (1980), Table 2. doi:10.1016/0304-4203(80)90024-9
    """
    return weiss(coefficients, kelvin_1968(water_temperature), salinity)


@step(
    forms=BOTH_FORMS,
    method="warner-weiss-1985",
    source=sources.WARNER_WEISS_1985,
    equation="Table 5",
    formula="ln K0 = A1 + A2 (100/T) + A3 ln(T/100) + S (B1 + B2 (T/100) + B3 (T/100)^2)",
    valid={"water_temperature": (0.0, 40.0), "salinity": (0.0, 40.0)},
    uncertainty=relative_uncertainty(0.015, "author's estimate", "about 1.5 % (from memory)"),
)
def warner_weiss_1985(coefficients: Weiss, water_temperature: Array, salinity: Array) -> Array:
    """Return the solubility of trichlorofluoromethane or dichlorodifluoromethane after Warner and Weiss (1985).

    Parameters
    ----------
    coefficients : Weiss
        For mol kg-1 atm-1 or mol L-1 atm-1.
    water_temperature : (...) array
        ITS-90, converted to IPTS-68. [degC]
    salinity : (...) array
        Practical salinity. [1]

    Returns
    -------
    (...) array
        K0 in the coefficients' unit. [mol kg-1 atm-1 or mol L-1 atm-1]

    Notes
    -----
    Valid from 0 to 40 degC and salinity 0 to 40. NaN in, NaN out.

    References
    ----------
    Warner and Weiss (1985), Table 5. doi:10.1016/0198-0149(85)90099-8
    """
    return weiss(coefficients, kelvin_1968(water_temperature), salinity)


@step(
    forms=BOTH_FORMS,
    method="bullister-2002",
    source=sources.BULLISTER_2002,
    equation="Table 3",
    formula="ln K0 = A1 + A2 (100/T) + A3 ln(T/100) + S (B1 + B2 (T/100) + B3 (T/100)^2)",
    valid={"water_temperature": (0.0, 40.0), "salinity": (0.0, 40.0)},
    uncertainty=relative_uncertainty(0.02, "author's estimate", "about 2 % (from memory)"),
)
def bullister_2002(coefficients: Weiss, water_temperature: Array, salinity: Array) -> Array:
    """Return the solubility of sulphur hexafluoride after Bullister, Wisegarver and Menzia (2002).

    Parameters
    ----------
    coefficients : Weiss
        For mol kg-1 atm-1 or mol L-1 atm-1.
    water_temperature : (...) array
        ITS-90. [degC]
    salinity : (...) array
        Practical salinity. [1]

    Returns
    -------
    (...) array
        K0 in the coefficients' unit. [mol kg-1 atm-1 or mol L-1 atm-1]

    Notes
    -----
    Valid from 0 to 40 degC and salinity 0 to 40. NaN in, NaN out.

    References
    ----------
    Bullister et al. (2002), Table 3. doi:10.1016/S0967-0637(01)00051-6
    """
    return weiss(coefficients, water_temperature + ZERO_CELSIUS, salinity)


@step(
    "solubility_per_litre",
    method="dacey-1984",
    source=sources.DACEY_1984,
    equation="sea-water fit",
    formula="ln H = 12.64 - 3547/T, H in L atm mol-1, K0 = 1/H",
    valid={"water_temperature": (0.0, 32.0), "salinity": (30.0, 40.0)},
    range_kind="data",
    note="A fit to sea water: it does not depend on salinity, and a sample under salinity 30 is flagged.",
)
def dacey_1984(coefficients: InverseTemperature, water_temperature: Array) -> Array:
    """Return the solubility of dimethyl sulphide in sea water after Dacey et al. (1984).

    Parameters
    ----------
    coefficients : InverseTemperature
        For H in L atm mol-1.
    water_temperature : (...) array
        Taken as it is. [degC]

    Returns
    -------
    (...) array
        K0. [mol L-1 atm-1]

    Notes
    -----
    ``H = exp(12.64 - 3547/T)`` in L atm mol-1. Fitted to sea water; salinity does not enter. NaN in, NaN out.

    References
    ----------
    Dacey, Wakeham and Howes (1984). doi:10.1029/GL011i010p00991
    """
    return np.exp(-(coefficients.intercept + coefficients.slope / (water_temperature + ZERO_CELSIUS)))
