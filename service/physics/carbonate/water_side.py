"""What alkalinity tells beside carbon, pH or a fugacity: the carbon dioxide of a water, and how much it stores."""

import numpy as np

from service.physics import sources
from service.physics.carbonate.system import UNSOLVED, carbon_per_dioxide, no_number
from service.physics.constants import LN_10
from service.physics.declare import Array, Remark, same_as, step

CO2 = ("co2",)
BESIDE = ("alkalinity",)
CARBON_WAYS = ("dissolved_inorganic_carbon", "dissolved_inorganic_carbon_per_litre")

# The pair as the water side: alkalinity with total carbon, or with pH.
for _way in CARBON_WAYS:
    same_as("fugacity_in_water", "fugacity_of_water_side", way=_way, beside=BESIDE, gases=CO2, in_situ=True)


@step(
    "fugacity_in_water",
    way="ph",
    beside=BESIDE,
    gases=CO2,
    formula="f = (A_T - other_alkalinity) / (K0 (K1/[H+] + 2 K1 K2/[H+]^2))",
    remarks=(
        Remark(
            f"{UNSOLVED}: at this pH the water has more alkalinity without any carbon",
            ("alkalinity", "other_alkalinity"),
            np.less,
            4,
        ),
    ),
    in_situ=True,
)
def fugacity_from_ph(
    alkalinity: Array,
    other_alkalinity: Array,
    hydrogen_ion: Array,
    carbonic_acid_constant: Array,
    bicarbonate_constant: Array,
    solubility: Array,
) -> Array:
    """Return the fugacity of carbon dioxide in the water from its alkalinity and pH.

    Parameters
    ----------
    alkalinity, other_alkalinity : (...) array
        [umol kg-1]
    hydrogen_ion, carbonic_acid_constant, bicarbonate_constant : (...) array
        [mol kg-1]
    solubility : (...) array
        [mol kg-1 atm-1]

    Returns
    -------
    (...) array
        NaN where the other acids make more alkalinity than there is. [uatm]
    """
    of_carbonate = alkalinity - other_alkalinity
    charge = carbonic_acid_constant / hydrogen_ion * (1.0 + 2.0 * bicarbonate_constant / hydrogen_ion)
    return np.where(of_carbonate >= 0.0, of_carbonate, np.nan) / (solubility * charge)


# The hydrogen ion, from whatever is given.
same_as("hydrogen_ion", "hydrogen_ion_of_water_side", gases=CO2, in_situ=True)
for _way in CARBON_WAYS:
    same_as("hydrogen_ion", "hydrogen_ion_of_pair", way=_way, beside=BESIDE, gases=CO2, in_situ=True)


@step("hydrogen_ion", way="ph", gases=CO2, formula="10^-pH", in_situ=True)
def hydrogen_ion_from_ph(ph: Array) -> Array:
    """Return the hydrogen ion from the pH.

    Parameters
    ----------
    ph : (...) array
        Total scale, at water_temperature. [1]

    Returns
    -------
    (...) array
        Total scale. [mol kg-1]
    """
    return np.exp(-LN_10 * ph)


def hydrogen_ion_from_carbon(
    dissolved_inorganic_carbon: Array,
    concentration_in_water: Array,
    carbonic_acid_constant: Array,
    bicarbonate_constant: Array,
) -> Array:
    """Return the hydrogen ion from total carbon and the dissolved carbon dioxide, where no alkalinity is known.

    Parameters
    ----------
    dissolved_inorganic_carbon, concentration_in_water : (...) array
        [umol kg-1]
    carbonic_acid_constant, bicarbonate_constant : (...) array
        [mol kg-1]

    Returns
    -------
    (...) array
        Total scale; NaN where the carbon dioxide alone is more than the total. [mol kg-1]
    """
    K1, K2 = carbonic_acid_constant, bicarbonate_constant
    rest = dissolved_inorganic_carbon / concentration_in_water - 1.0
    rest = np.where(rest > 0.0, rest, np.nan)
    return (K1 + np.sqrt(K1 * K1 + 4.0 * K1 * K2 * rest)) / (2.0 * rest)


for _way in CARBON_WAYS:
    step(
        "hydrogen_ion",
        way=_way,
        gases=CO2,
        formula="DIC / [CO2*] = 1 + K1/[H+] + K1 K2/[H+]^2, solved for [H+]",
        in_situ=True,
    )(hydrogen_ion_from_carbon)


@step(
    "storage_ratio",
    gases=CO2,
    source=sources.EGLESTON_2010,
    equation="buffer factors by derivation from the same balances",
    formula="dDIC/d[CO2*] at constant alkalinity = 1 + K1/[H+] + K1 K2/[H+]^2 - C a^2 / (C (K1/[H+] + 4 K1 K2/[H+]^2) "
    "+ other_buffer), a = K1/[H+] + 2 K1 K2/[H+]^2, C = [CO2*]",
    remarks=(Remark(UNSOLVED, ("hydrogen_ion", "concentration_in_water", "carbonic_acid_constant"), no_number, 4),),
    in_situ=True,
)
def storage_ratio(
    hydrogen_ion: Array,
    concentration_in_water: Array,
    carbonic_acid_constant: Array,
    bicarbonate_constant: Array,
    other_buffer: Array,
) -> Array:
    """Return how much more total carbon than carbon dioxide the water takes up, at constant alkalinity.

    Parameters
    ----------
    hydrogen_ion : (...) array
        [mol kg-1]
    concentration_in_water : (...) array
        CO2*. [umol kg-1]
    carbonic_acid_constant, bicarbonate_constant : (...) array
        [mol kg-1]
    other_buffer : (...) array
        [umol kg-1]

    Returns
    -------
    (...) array
        About 8 to 25 in sea water; 1.09 in pure water at 25 degC and 400 uatm. [1]

    References
    ----------
    Egleston et al. (2010), for the buffer factors. doi:10.1029/2008GB003407
    """
    single = carbonic_acid_constant / hydrogen_ion
    double = single * bicarbonate_constant / hydrogen_ion
    charge = single + 2.0 * double
    lost = concentration_in_water * charge * charge
    return 1.0 + single + double - lost / (concentration_in_water * (single + 4.0 * double) + other_buffer)


@step(
    "revelle_factor",
    gases=CO2,
    source=sources.EGLESTON_2010,
    formula="dln f / dln DIC at constant alkalinity = DIC / [CO2*] / storage_ratio",
    in_situ=True,
)
def revelle_factor(
    hydrogen_ion: Array, carbonic_acid_constant: Array, bicarbonate_constant: Array, storage_ratio: Array
) -> Array:
    """Return the relative change of the fugacity over that of total carbon, at constant alkalinity.

    Parameters
    ----------
    hydrogen_ion, carbonic_acid_constant, bicarbonate_constant : (...) array
        [mol kg-1]
    storage_ratio : (...) array
        [1]

    Returns
    -------
    (...) array
        About 8 in warm to 15 in cold sea water. [1]

    References
    ----------
    Egleston et al. (2010). doi:10.1029/2008GB003407
    """
    return carbon_per_dioxide(hydrogen_ion, carbonic_acid_constant, bicarbonate_constant) / storage_ratio
