"""The temperature of the interface: below the skin, and of the skin itself."""

import numpy as np

from service.physics import sources
from service.physics.declare import Array, derived, same_as, stand_in, step

DONLON_OFFSET = -0.14  # K; Donlon et al. (2002)
DONLON_AMPLITUDE = -0.30  # K; Donlon et al. (2002)
DONLON_WIND = 3.7  # m s-1; Donlon et al. (2002)

# What is computed for the surface is computed for the water just below the skin, where its temperature is given.
stand_in("subskin_temperature", "water_temperature")
same_as("subskin_temperature", "water_temperature", in_situ=True)
same_as("skin_temperature", "subskin_temperature", method="none")
derived("solubility_at_skin", of="solubility", water_temperature="skin_temperature")
derived("solubility_per_litre_at_skin", of="solubility_per_litre", water_temperature="skin_temperature")


@step(
    "skin_temperature",
    method="donlon-2002",
    source=sources.DONLON_2002,
    equation="Eq. 2",
    formula="T_skin = T_sub - 0.14 - 0.30 exp(-U/3.7)",
    valid={"wind_speed_10m": (2.0, 20.0)},
    range_kind="data",
    note="Fitted at night, and by day from about 6 m s-1.",
)
def donlon_2002(subskin_temperature: Array, wind_speed_10m: Array) -> Array:
    """Return the skin temperature after Donlon et al. (2002), from their cool-skin difference.

    Parameters
    ----------
    subskin_temperature : (...) array
        Below the skin. [degC]
    wind_speed_10m : (...) array
        [m s-1]

    Returns
    -------
    (...) array
        [degC]

    Notes
    -----
    ``T_skin = T_sub - 0.14 - 0.30 exp(-U/3.7)``, at night or from about 6 m s-1. The data begin at 2 m s-1; 20 m s-1
    is common practice. NaN in, NaN out.

    References
    ----------
    Donlon et al. (2002). doi:10.1175/1520-0442(2002)015<0353:TIVOSS>2.0.CO;2
    """
    return subskin_temperature + DONLON_OFFSET + DONLON_AMPLITUDE * np.exp(-wind_speed_10m / DONLON_WIND)
