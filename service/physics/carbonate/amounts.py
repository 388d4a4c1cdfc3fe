"""What was measured per litre of water, per kilogram; the density is that at water_temperature."""

from service.physics.constants import LITRES_PER_CUBIC_METRE
from service.physics.declare import Array, step

FORMULA = "per litre over density"


@step("alkalinity", way="alkalinity_per_litre", formula=FORMULA, in_situ=True)
def alkalinity(alkalinity_per_litre: Array, density: Array) -> Array:
    """Return the alkalinity per kilogram.

    Parameters
    ----------
    alkalinity_per_litre : (...) array
        [umol L-1]
    density : (...) array
        At water_temperature; a sample titrated ten kelvin warmer is off by 0.1 to 0.3 percent. [kg m-3]

    Returns
    -------
    (...) array
        [umol kg-1]
    """
    return alkalinity_per_litre / (density / LITRES_PER_CUBIC_METRE)


@step("dissolved_inorganic_carbon", way="dissolved_inorganic_carbon_per_litre", formula=FORMULA, in_situ=True)
def dissolved_inorganic_carbon(dissolved_inorganic_carbon_per_litre: Array, density: Array) -> Array:
    """Return the total carbon per kilogram.

    Parameters
    ----------
    dissolved_inorganic_carbon_per_litre : (...) array
        [umol L-1]
    density : (...) array
        At water_temperature. [kg m-3]

    Returns
    -------
    (...) array
        [umol kg-1]
    """
    return dissolved_inorganic_carbon_per_litre / (density / LITRES_PER_CUBIC_METRE)


@step("phosphate", way="phosphate_per_litre", formula=FORMULA, in_situ=True)
def phosphate(phosphate_per_litre: Array, density: Array) -> Array:
    """Return the total phosphate per kilogram.

    Parameters
    ----------
    phosphate_per_litre : (...) array
        [umol L-1]
    density : (...) array
        At water_temperature. [kg m-3]

    Returns
    -------
    (...) array
        [umol kg-1]
    """
    return phosphate_per_litre / (density / LITRES_PER_CUBIC_METRE)


@step("silicate", way="silicate_per_litre", formula=FORMULA, in_situ=True)
def silicate(silicate_per_litre: Array, density: Array) -> Array:
    """Return the total silicate per kilogram.

    Parameters
    ----------
    silicate_per_litre : (...) array
        [umol L-1]
    density : (...) array
        At water_temperature. [kg m-3]

    Returns
    -------
    (...) array
        [umol kg-1]
    """
    return silicate_per_litre / (density / LITRES_PER_CUBIC_METRE)
