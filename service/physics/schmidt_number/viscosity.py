"""The viscosity of the water."""

import numpy as np

from service.physics import sources
from service.physics.declare import Array, relative_uncertainty, step
from service.physics.polynomial import polynomial

SALT_LINEAR = (1.541, 1.998e-2, -9.52e-5)  # A, in powers of temperature [degC]; Sharqawy et al. (2010), Eq. 22
SALT_SQUARE = (7.974, -7.561e-2, 4.724e-4)  # B, likewise
GRAMS_PER_KILOGRAM = 1000.0


def fresh_water_viscosity(water_temperature: Array) -> Array:
    """Return the dynamic viscosity of pure water after Sharqawy et al. (2010), Eq. 23.

    Parameters
    ----------
    water_temperature : (...) array
        [degC]

    Returns
    -------
    (...) array
        [Pa s]

    Notes
    -----
    From 0 to 180 degC, within 0.05 percent of IAPWS 2008 (the authors' figure, from memory). The coefficient is 0.157;
    a variant with 0.156 is in circulation, which is 0.6 percent too viscous at 20 degC. NaN in, NaN out.
    """
    return 4.2844e-5 + 1.0 / (0.157 * (water_temperature + 64.993) ** 2 - 91.296)


@step(
    "kinematic_viscosity",
    source=sources.SHARQAWY_2010,
    equation="Eqs. 22 and 23",
    formula="nu = mu_w (1 + A s + B s^2) / density, s Absolute Salinity in kg/kg",
    valid={"water_temperature": (0.0, 180.0), "absolute_salinity": (0.0, 150.0)},
    uncertainty=relative_uncertainty(0.015, "author's estimate", "1.5 %"),
)
def sharqawy_2010(absolute_salinity: Array, water_temperature: Array, density: Array) -> Array:
    """Return the kinematic viscosity of the water after Sharqawy, Lienhard and Zubair (2010).

    Parameters
    ----------
    absolute_salinity : (...) array
        [g kg-1]
    water_temperature : (...) array
        [degC]
    density : (...) array
        [kg m-3]

    Returns
    -------
    (...) array
        [m2 s-1]

    Notes
    -----
    Their dynamic viscosity over the density of TEOS-10. Valid from 0 to 180 degC and 0 to 0.15 kg/kg. NaN in, NaN out.

    References
    ----------
    Sharqawy et al. (2010), Eqs. 22 and 23. doi:10.5004/dwt.2010.1079
    """
    s = absolute_salinity / GRAMS_PER_KILOGRAM
    A = polynomial(SALT_LINEAR, water_temperature)
    B = polynomial(SALT_SQUARE, water_temperature)
    dynamic = fresh_water_viscosity(water_temperature) * (1.0 + s * (A + B * s))
    return np.asarray(dynamic / density)
