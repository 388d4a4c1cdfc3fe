"""The forms in which a solubility is told, and concentrations in equilibrium."""

from service.physics.constants import (
    GAS_CONSTANT_LITRE_ATM,
    LITRES_PER_CUBIC_METRE,
    MOLAR_VOLUME_IDEAL,
    ZERO_CELSIUS,
)
from service.physics.declare import Array, step


@step("solubility_per_litre", formula="K0 density")
def solubility_per_litre(solubility: Array, density: Array) -> Array:
    """Return K0 per litre from K0 per kilogram, where the authors give only the latter.

    Parameters
    ----------
    solubility : (...) array
        [mol kg-1 atm-1]
    density : (...) array
        [kg m-3]

    Returns
    -------
    (...) array
        [mol L-1 atm-1]
    """
    return solubility * density / LITRES_PER_CUBIC_METRE


@step("solubility", formula="K0 (per litre) / density")
def solubility(solubility_per_litre: Array, density: Array) -> Array:
    """Return K0 per kilogram from K0 per litre, where the authors give only the latter.

    Parameters
    ----------
    solubility_per_litre : (...) array
        [mol L-1 atm-1]
    density : (...) array
        [kg m-3]

    Returns
    -------
    (...) array
        [mol kg-1 atm-1]
    """
    return solubility_per_litre * LITRES_PER_CUBIC_METRE / density


@step("bunsen_coefficient", formula="K0 (per litre) 22.414 L mol-1")
def bunsen_coefficient(solubility_per_litre: Array) -> Array:
    """Return the Bunsen coefficient: litres of ideal gas at 0 degC and 1 atm in a litre of water.

    Parameters
    ----------
    solubility_per_litre : (...) array
        [mol L-1 atm-1]

    Returns
    -------
    (...) array
        [1]
    """
    return solubility_per_litre * MOLAR_VOLUME_IDEAL


@step("ostwald_coefficient", formula="K0 (per litre) R T")
def ostwald_coefficient(solubility_per_litre: Array, water_temperature: Array) -> Array:
    """Return the Ostwald coefficient: concentration in the water over concentration in the gas phase.

    Parameters
    ----------
    solubility_per_litre : (...) array
        [mol L-1 atm-1]
    water_temperature : (...) array
        [degC]

    Returns
    -------
    (...) array
        [1]
    """
    return solubility_per_litre * GAS_CONSTANT_LITRE_ATM * (water_temperature + ZERO_CELSIUS)


@step("henry_constant", formula="1 / K0")
def henry_constant(solubility: Array) -> Array:
    """Return Henry's constant as fugacity over concentration.

    Parameters
    ----------
    solubility : (...) array
        [mol kg-1 atm-1]

    Returns
    -------
    (...) array
        [atm kg mol-1]
    """
    return 1.0 / solubility


@step("henry_constant_per_litre", formula="1 / K0 (per litre)")
def henry_constant_per_litre(solubility_per_litre: Array) -> Array:
    """Return Henry's constant per volume as fugacity over concentration.

    Parameters
    ----------
    solubility_per_litre : (...) array
        [mol L-1 atm-1]

    Returns
    -------
    (...) array
        [atm L mol-1]
    """
    return 1.0 / solubility_per_litre


@step("equilibrium_concentration", formula="K0 f_air")
def equilibrium_concentration(solubility_at_skin: Array, fugacity_in_air: Array) -> Array:
    """Return the concentration in equilibrium with the air, per kilogram.

    Parameters
    ----------
    solubility_at_skin : (...) array
        At the interface. [mol kg-1 atm-1]
    fugacity_in_air : (...) array
        [uatm]

    Returns
    -------
    (...) array
        [umol kg-1]
    """
    return solubility_at_skin * fugacity_in_air


@step("equilibrium_concentration_per_litre", formula="K0 (per litre) f_air")
def equilibrium_concentration_per_litre(solubility_per_litre_at_skin: Array, fugacity_in_air: Array) -> Array:
    """Return the concentration in equilibrium with the air, per litre.

    Parameters
    ----------
    solubility_per_litre_at_skin : (...) array
        At the interface. [mol L-1 atm-1]
    fugacity_in_air : (...) array
        [uatm]

    Returns
    -------
    (...) array
        [umol L-1]
    """
    return solubility_per_litre_at_skin * fugacity_in_air
