"""Properties of the water and of the air upon it: density, vapour pressure, pressure at the surface."""

import gsw
import numpy as np

from service.physics import sources
from service.physics.constants import (
    ABSOLUTE_SALINITY_PER_PRACTICAL,
    DRY_AIR_GAS_CONSTANT,
    GRAVITY,
    STANDARD_ATMOSPHERE,
    VAPOUR_DENSITY_DEFICIT,
    ZERO_CELSIUS,
)
from service.physics.declare import Array, Remark, same_as, step
from service.physics.solubility.forms import vapour_pressure_atm

BRACKISH_LIMIT = 2.0  # practical salinity below which the position tells nothing of the composition
SEA_LEVEL_TEMPERATURE = 288.15  # K; ICAO standard atmosphere
LAPSE_RATE = 0.0065  # K m-1; ICAO standard atmosphere, to 11 km


@step("absolute_salinity", formula="S_A = S 35.16504/35")
def reference_salinity(salinity: Array) -> Array:
    """Return Absolute Salinity for the reference composition.

    Parameters
    ----------
    salinity : (...) array
        Practical salinity. [1]

    Returns
    -------
    (...) array
        [g kg-1]
    """
    return salinity * ABSOLUTE_SALINITY_PER_PRACTICAL


@step(
    "absolute_salinity",
    way="latitude",
    source=sources.IOC_SCOR_IAPSO_2010,
    equation="section 2.5",
    formula="S_A by the TEOS-10 atlas of composition; S 35.16504/35 below salinity 2",
)
def absolute_salinity(salinity: Array, latitude: Array, longitude: Array) -> Array:
    """Return Absolute Salinity at a position, by the TEOS-10 atlas.

    Parameters
    ----------
    salinity : (...) array
        Practical salinity. [1]
    latitude : (...) array
        North positive. [degree]
    longitude : (...) array
        East positive. [degree]

    Returns
    -------
    (...) array
        [g kg-1]

    Notes
    -----
    Below salinity 2 the position is ignored: the atlas is one of the sea.
    """
    at_position = gsw.SA_from_SP(salinity, 0.0, longitude, latitude)
    return np.where(salinity < BRACKISH_LIMIT, reference_salinity(salinity), at_position)


@step(
    "density",
    source=sources.IOC_SCOR_IAPSO_2010,
    equation="section 2.8",
    formula="in-situ density at the surface, TEOS-10 Gibbs function",
)
def density(absolute_salinity: Array, water_temperature: Array) -> Array:
    """Return the density of the water at the surface.

    Parameters
    ----------
    absolute_salinity : (...) array
        [g kg-1]
    water_temperature : (...) array
        ITS-90. [degC]

    Returns
    -------
    (...) array
        [kg m-3]
    """
    return np.asarray(gsw.rho_t_exact(absolute_salinity, water_temperature, 0.0))


@step(
    "water_vapour_pressure",
    source=sources.WEISS_PRICE_1980,
    equation="Eq. 10",
    formula="ln p_w = 24.4543 - 67.4509 (100/T) - 4.8489 ln(T/100) - 0.000544 S, in atm",
)
def water_vapour_pressure(water_temperature: Array, salinity: Array) -> Array:
    """Return the pressure of water vapour in equilibrium with the water.

    Parameters
    ----------
    water_temperature : (...) array
        ITS-90. [degC]
    salinity : (...) array
        Practical salinity. [1]

    Returns
    -------
    (...) array
        [hPa]

    References
    ----------
    Weiss and Price (1980), Eq. 10. doi:10.1016/0304-4203(80)90024-9
    """
    return vapour_pressure_atm(water_temperature, salinity) * STANDARD_ATMOSPHERE


@step(
    "surface_pressure",
    way="barometer_height",
    formula="P0 = P exp(g h / (R_d T_v)), air saturated at water_temperature",
    in_situ=True,
)
def surface_pressure(
    air_pressure: Array, barometer_height: Array, water_temperature: Array, water_vapour_pressure: Array
) -> Array:
    """Return the air pressure at the water surface from that at the barometer.

    Parameters
    ----------
    air_pressure : (...) array
        At the barometer. [hPa]
    barometer_height : (...) array
        Above the water. [m]
    water_temperature : (...) array
        Stands for the temperature of the air between. [degC]
    water_vapour_pressure : (...) array
        [hPa]

    Returns
    -------
    (...) array
        [hPa]

    Notes
    -----
    Hydrostatic, isothermal. Ten kelvin between air and water move the result by 4e-5 at a height of 10 m. At height
    0 the input returns bit for bit.
    """
    virtual = (water_temperature + ZERO_CELSIUS) / (1.0 - VAPOUR_DENSITY_DEFICIT * water_vapour_pressure / air_pressure)
    return air_pressure * np.exp(GRAVITY * barometer_height / (DRY_AIR_GAS_CONSTANT * virtual))


same_as("surface_pressure", "air_pressure", assumes=("barometer_height",))


@step(
    "surface_pressure",
    way="elevation",
    source=sources.ICAO_1993,
    formula="P = 1013.25 (1 - 0.0065 z / 288.15)^5.2559",
    remarks=(
        Remark(
            "the pressure is that of the standard atmosphere at this elevation, not measured",
            ("elevation",),
            np.isfinite,
        ),
    ),
)
def icao_1993(elevation: Array) -> Array:
    """Return the pressure of the ICAO standard atmosphere at an elevation.

    Parameters
    ----------
    elevation : (...) array
        Of the water above sea level. [m]

    Returns
    -------
    (...) array
        [hPa]

    Notes
    -----
    To 11 km. Weather moves the true pressure by 1 to 3 percent around it. NaN in, NaN out.

    References
    ----------
    ICAO (1993), Doc 7488.
    """
    exponent = GRAVITY / (DRY_AIR_GAS_CONSTANT * LAPSE_RATE)
    return STANDARD_ATMOSPHERE * (1.0 - LAPSE_RATE * elevation / SEA_LEVEL_TEMPERATURE) ** exponent
