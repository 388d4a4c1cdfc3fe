"""The carbonate system solved for its hydrogen ion: from total carbon to fugacity, and from that to total carbon."""

import numpy as np
from numpy.typing import NDArray

from service.physics import sources
from service.physics.carbonate.solve import Acids, hydrogen_by_carbon, hydrogen_by_carbon_dioxide
from service.physics.declare import Array, Remark, step

MICRO = 1.0e-6  # mol in one umol
UNSOLVED = "the carbonate system has no solution here"


def no_number(result: Array, *inputs: Array) -> NDArray[np.bool_]:
    """Tell where there is no number though every input is one."""
    missing = np.isnan(result)
    for each in inputs:
        missing = missing & np.isfinite(each)
    return missing


@step(
    "hydrogen_ion_by_carbon",
    source=sources.DICKSON_2007,
    equation="chapter 2, total alkalinity",
    formula="[HCO3-] + 2 [CO3--] + [B(OH)4-] + [OH-] + [HPO4--] + 2 [PO4---] + [SiO(OH)3-] - [H+]_F - [HSO4-] - [HF] "
    "- [H3PO4] = A_T, solved for [H+] from total carbon",
)
def hydrogen_ion_by_carbon(
    alkalinity: Array,
    carbonate_carbon: Array,
    carbonic_acid_constant: Array,
    bicarbonate_constant: Array,
    boric_acid_constant: Array,
    boron: Array,
    water_ion_product: Array,
    bisulphate_constant: Array,
    sulphate: Array,
    hydrogen_fluoride_constant: Array,
    fluoride: Array,
    phosphoric_acid_constant: Array,
    dihydrogen_phosphate_constant: Array,
    hydrogen_phosphate_constant: Array,
    silicic_acid_constant: Array,
    phosphate: Array,
    silicate: Array,
) -> Array:
    """Return the hydrogen ion of a water from its alkalinity and its total carbon.

    Parameters
    ----------
    alkalinity, carbonate_carbon : (...) array
        [umol kg-1]
    carbonic_acid_constant, bicarbonate_constant, boric_acid_constant, boron : (...) array
        [mol kg-1]
    water_ion_product : (...) array
        [mol2 kg-2]
    bisulphate_constant, sulphate, hydrogen_fluoride_constant, fluoride : (...) array
        [mol kg-1]
    phosphoric_acid_constant, dihydrogen_phosphate_constant, hydrogen_phosphate_constant : (...) array
        [mol kg-1]
    silicic_acid_constant : (...) array
        [mol kg-1]
    phosphate, silicate : (...) array
        [umol kg-1]

    Returns
    -------
    (...) array
        Total scale, to better than 1e-10 in pH. [mol kg-1]
    """
    acids = Acids(
        boric_acid_constant,
        boron,
        water_ion_product,
        bisulphate_constant,
        sulphate,
        hydrogen_fluoride_constant,
        fluoride,
        phosphoric_acid_constant,
        dihydrogen_phosphate_constant,
        hydrogen_phosphate_constant,
        silicic_acid_constant,
        phosphate * MICRO,
        silicate * MICRO,
    )
    carbon = carbonate_carbon * MICRO
    return hydrogen_by_carbon(alkalinity * MICRO, carbon, carbonic_acid_constant, bicarbonate_constant, acids)


@step(
    "hydrogen_ion_by_fugacity",
    source=sources.DICKSON_2007,
    equation="chapter 2, total alkalinity",
    formula="the same balance of alkalinity, solved for [H+] from [CO2*] = K0 f",
)
def hydrogen_ion_by_fugacity(
    alkalinity: Array,
    carbonate_fugacity: Array,
    solubility: Array,
    carbonic_acid_constant: Array,
    bicarbonate_constant: Array,
    boric_acid_constant: Array,
    boron: Array,
    water_ion_product: Array,
    bisulphate_constant: Array,
    sulphate: Array,
    hydrogen_fluoride_constant: Array,
    fluoride: Array,
    phosphoric_acid_constant: Array,
    dihydrogen_phosphate_constant: Array,
    hydrogen_phosphate_constant: Array,
    silicic_acid_constant: Array,
    phosphate: Array,
    silicate: Array,
) -> Array:
    """Return the hydrogen ion of a water from its alkalinity and its fugacity of carbon dioxide.

    Parameters
    ----------
    alkalinity : (...) array
        [umol kg-1]
    carbonate_fugacity : (...) array
        [uatm]
    solubility : (...) array
        [mol kg-1 atm-1]
    carbonic_acid_constant, bicarbonate_constant, boric_acid_constant, boron : (...) array
        [mol kg-1]
    water_ion_product : (...) array
        [mol2 kg-2]
    bisulphate_constant, sulphate, hydrogen_fluoride_constant, fluoride : (...) array
        [mol kg-1]
    phosphoric_acid_constant, dihydrogen_phosphate_constant, hydrogen_phosphate_constant : (...) array
        [mol kg-1]
    silicic_acid_constant : (...) array
        [mol kg-1]
    phosphate, silicate : (...) array
        [umol kg-1]

    Returns
    -------
    (...) array
        Total scale, to better than 1e-10 in pH. [mol kg-1]
    """
    acids = Acids(
        boric_acid_constant,
        boron,
        water_ion_product,
        bisulphate_constant,
        sulphate,
        hydrogen_fluoride_constant,
        fluoride,
        phosphoric_acid_constant,
        dihydrogen_phosphate_constant,
        hydrogen_phosphate_constant,
        silicic_acid_constant,
        phosphate * MICRO,
        silicate * MICRO,
    )
    dioxide = solubility * carbonate_fugacity * MICRO
    return hydrogen_by_carbon_dioxide(alkalinity * MICRO, dioxide, carbonic_acid_constant, bicarbonate_constant, acids)


@step("other_alkalinity", "other_buffer", formula="the balance of alkalinity without bicarbonate and carbonate")
def other_alkalinity(
    hydrogen_ion: Array,
    boric_acid_constant: Array,
    boron: Array,
    water_ion_product: Array,
    bisulphate_constant: Array,
    sulphate: Array,
    hydrogen_fluoride_constant: Array,
    fluoride: Array,
    phosphoric_acid_constant: Array,
    dihydrogen_phosphate_constant: Array,
    hydrogen_phosphate_constant: Array,
    silicic_acid_constant: Array,
    phosphate: Array,
    silicate: Array,
) -> tuple[Array, Array]:
    """Return the alkalinity of all acids but carbonic, and how much it falls as the hydrogen ion rises.

    Parameters
    ----------
    hydrogen_ion : (...) array
        [mol kg-1]
    boric_acid_constant, boron : (...) array
        [mol kg-1]
    water_ion_product : (...) array
        [mol2 kg-2]
    bisulphate_constant, sulphate, hydrogen_fluoride_constant, fluoride : (...) array
        [mol kg-1]
    phosphoric_acid_constant, dihydrogen_phosphate_constant, hydrogen_phosphate_constant : (...) array
        [mol kg-1]
    silicic_acid_constant : (...) array
        [mol kg-1]
    phosphate, silicate : (...) array
        [umol kg-1]

    Returns
    -------
    other_alkalinity : (...) array
        [umol kg-1]
    other_buffer : (...) array
        Its negative derivative by ln of the hydrogen ion. [umol kg-1]
    """
    acids = Acids(
        boric_acid_constant,
        boron,
        water_ion_product,
        bisulphate_constant,
        sulphate,
        hydrogen_fluoride_constant,
        fluoride,
        phosphoric_acid_constant,
        dihydrogen_phosphate_constant,
        hydrogen_phosphate_constant,
        silicic_acid_constant,
        phosphate * MICRO,
        silicate * MICRO,
    )
    alkalinity, buffer = acids.alkalinity(hydrogen_ion)
    return alkalinity / MICRO, buffer / MICRO


def carbon_per_dioxide(hydrogen: Array, K1: Array, K2: Array) -> Array:
    """Return total carbon over CO2*."""
    return np.asarray(1.0 + K1 / hydrogen * (1.0 + K2 / hydrogen))


@step(
    "fugacity_by_carbon",
    formula="f = DIC / (K0 (1 + K1/[H+] + K1 K2/[H+]^2))",
    remarks=(
        Remark(UNSOLVED, ("hydrogen_ion_by_carbon", "alkalinity", "carbonate_carbon", "solubility"), no_number, 4),
    ),
)
def fugacity_by_carbon(
    carbonate_carbon: Array,
    hydrogen_ion_by_carbon: Array,
    carbonic_acid_constant: Array,
    bicarbonate_constant: Array,
    solubility: Array,
) -> Array:
    """Return the fugacity of carbon dioxide in a water of known total carbon.

    Parameters
    ----------
    carbonate_carbon : (...) array
        [umol kg-1]
    hydrogen_ion_by_carbon, carbonic_acid_constant, bicarbonate_constant : (...) array
        [mol kg-1]
    solubility : (...) array
        [mol kg-1 atm-1]

    Returns
    -------
    (...) array
        [uatm]
    """
    ratio = carbon_per_dioxide(hydrogen_ion_by_carbon, carbonic_acid_constant, bicarbonate_constant)
    return carbonate_carbon / (solubility * ratio)


@step(
    "carbon_by_fugacity",
    formula="DIC = K0 f (1 + K1/[H+] + K1 K2/[H+]^2)",
    remarks=(
        Remark(UNSOLVED, ("hydrogen_ion_by_fugacity", "alkalinity", "carbonate_fugacity", "solubility"), no_number, 4),
    ),
)
def carbon_by_fugacity(
    carbonate_fugacity: Array,
    hydrogen_ion_by_fugacity: Array,
    carbonic_acid_constant: Array,
    bicarbonate_constant: Array,
    solubility: Array,
) -> Array:
    """Return the total carbon of a water in equilibrium with a fugacity of carbon dioxide.

    Parameters
    ----------
    carbonate_fugacity : (...) array
        [uatm]
    hydrogen_ion_by_fugacity, carbonic_acid_constant, bicarbonate_constant : (...) array
        [mol kg-1]
    solubility : (...) array
        [mol kg-1 atm-1]

    Returns
    -------
    (...) array
        [umol kg-1]
    """
    ratio = carbon_per_dioxide(hydrogen_ion_by_fugacity, carbonic_acid_constant, bicarbonate_constant)
    return solubility * carbonate_fugacity * ratio
