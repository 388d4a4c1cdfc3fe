"""What changes the transfer velocity beside the wind: reaction in the boundary layer, and films of surfactant."""

import numpy as np

from service.physics import sources
from service.physics.constants import ZERO_CELSIUS
from service.physics.declare import Array, Remark, family, input_term, same_as, step, term
from service.physics.polynomial import polynomial

CM_PER_HOUR = 3.6e5  # cm h-1 in one m s-1

input_term(
    "surfactant_suppression",
    "%",
    "fall of the transfer velocity by surfactants, the caller's own estimate",
    possible=(0.0, 100.0),
    scale=10.0,
    example=15.0,
)
term("suppressed_transfer_velocity", "cm h-1", "transfer velocity under a film of surfactants")
term("enhanced_transfer_velocity", "cm h-1", "transfer velocity with reaction in the boundary layer")
term("hydration_rate", "s-1", "rate at which carbon dioxide reacts with water and hydroxide")
term("enhancement_factor", "1", "transfer velocity with reaction over that without")
family(
    "chemical_enhancement",
    "chemical_enhancement",
    "reaction of carbon dioxide in the boundary layer",
    ("enhanced_transfer_velocity",),
    default="none",
)

same_as("suppressed_transfer_velocity", "transfer_velocity")
same_as("enhanced_transfer_velocity", "suppressed_transfer_velocity", method="none")


@step(
    "suppressed_transfer_velocity",
    way="surfactant_suppression",
    formula="k (1 - suppression/100)",
    remarks=(
        Remark(
            "the suppression by surfactants is the caller's own estimate, not a published one",
            ("surfactant_suppression",),
            lambda suppression: suppression > 0.0,
            flag=1,
        ),
    ),
)
def suppressed_transfer_velocity(transfer_velocity: Array, surfactant_suppression: Array) -> Array:
    """Return the transfer velocity lowered by the caller's own percentage.

    Parameters
    ----------
    transfer_velocity : (...) array
        Of a clean surface. [cm h-1]
    surfactant_suppression : (...) array
        [%]

    Returns
    -------
    (...) array
        [cm h-1]
    """
    return transfer_velocity * (1.0 - surfactant_suppression / 100.0)


WANNINKHOF_1992_FACTOR = 2.5  # cm h-1; Wanninkhof (1992), Eq. 8
WANNINKHOF_1992_ENHANCEMENT = (0.5246, 1.6256e-2, 4.9946e-4)  # 1 per power of degC; Wanninkhof (1992), Eq. 8
REFERENCE_SCHMIDT = 660.0


@step(
    "enhanced_transfer_velocity",
    method="wanninkhof-1992",
    gases=("co2",),
    source=sources.WANNINKHOF_1992,
    equation="Eq. 8",
    formula="k + 2.5 (0.5246 + 1.6256e-2 t + 4.9946e-4 t^2) (Sc/660)^-1/2",
    valid={"water_temperature": (0.0, 30.0), "salinity": (30.0, 40.0)},
    range_kind="data",
)
def wanninkhof_1992_enhancement(
    suppressed_transfer_velocity: Array, water_temperature: Array, schmidt_number: Array
) -> Array:
    """Return the transfer velocity with the chemical enhancement of Wanninkhof (1992).

    Parameters
    ----------
    suppressed_transfer_velocity : (...) array
        Without reaction. [cm h-1]
    water_temperature : (...) array
        [degC]
    schmidt_number : (...) array
        [1]

    Returns
    -------
    (...) array
        [cm h-1]

    Notes
    -----
    The term stands inside the bracket, ``k = [2.5 (...) + 0.3 U^2] (Sc/660)^-1/2``, so it is added, scaled with the
    Schmidt number. For sea water. NaN in, NaN out.

    References
    ----------
    Wanninkhof (1992), Eq. 8. doi:10.1029/92JC00188
    """
    still = WANNINKHOF_1992_FACTOR * polynomial(WANNINKHOF_1992_ENHANCEMENT, water_temperature)
    return suppressed_transfer_velocity + still / np.sqrt(schmidt_number / REFERENCE_SCHMIDT)


JOHNSON_WATER = (1246.98, -6.19e4, -183.0)  # ln s-1: constant, per T, per ln T; Johnson (1982)
JOHNSON_HYDROXIDE = (-930.13, 3.10e4, 140.9, 0.110)  # ln mol kg-1 s-1: and per S^1/2; Johnson (1982), r2 KW


@step(
    "hydration_rate",
    gases=("co2",),
    source=sources.JOHNSON_1982,
    formula="r = r1 + r2 KW/[H+], ln r1 = 1246.98 - 6.19e4/T - 183.0 ln T, "
    "ln r2 KW = -930.13 + 3.10e4/T + 140.9 ln T + 0.110 S^1/2",
)
def johnson_1982(water_temperature: Array, salinity: Array, hydrogen_ion: Array) -> Array:
    """Return the rate of hydration of carbon dioxide in sea water after Johnson (1982).

    Parameters
    ----------
    water_temperature : (...) array
        [degC]
    salinity : (...) array
        Practical salinity. [1]
    hydrogen_ion : (...) array
        Total scale. [mol kg-1]

    Returns
    -------
    (...) array
        [s-1]

    References
    ----------
    Johnson (1982). doi:10.4319/lo.1982.27.5.0849
    """
    T = water_temperature + ZERO_CELSIUS
    constant, per_kelvin, per_log = JOHNSON_WATER
    water = np.exp(constant + per_kelvin / T + per_log * np.log(T))
    constant, per_kelvin, per_log, per_root = JOHNSON_HYDROXIDE
    hydroxide = np.exp(constant + per_kelvin / T + per_log * np.log(T) + per_root * np.sqrt(salinity))
    return water + hydroxide / hydrogen_ion


@step(
    "enhancement_factor",
    gases=("co2",),
    source=sources.HOOVER_BERKSHIRE_1969,
    equation="Eq. 22",
    formula="a = tau / [(tau - 1) + tanh(Q z)/(Q z)], tau = 1 + [H+]^2/(K1 K2 + K1 [H+]), Q = (r tau/D)^1/2, z = D/k",
)
def hoover_berkshire_1969_factor(
    suppressed_transfer_velocity: Array,
    diffusivity: Array,
    hydration_rate: Array,
    hydrogen_ion: Array,
    carbonic_acid_constant: Array,
    bicarbonate_constant: Array,
) -> Array:
    """Return the factor by which reaction raises the transfer velocity, after Hoover and Berkshire (1969).

    Parameters
    ----------
    suppressed_transfer_velocity : (...) array
        Without reaction. [cm h-1]
    diffusivity : (...) array
        Of carbon dioxide. [m2 s-1]
    hydration_rate : (...) array
        [s-1]
    hydrogen_ion : (...) array
        [mol kg-1]
    carbonic_acid_constant : (...) array
        K1. [mol kg-1]
    bicarbonate_constant : (...) array
        K2. [mol kg-1]

    Returns
    -------
    (...) array
        Never below 1. [1]

    Notes
    -----
    A stagnant film of thickness D/k: the factor falls to 1 as k grows and rises to tau/(tau - 1) as k falls to 0, where
    the enhanced velocity is 0 as k is. NaN in, NaN out.

    References
    ----------
    Hoover and Berkshire (1969), Eq. 22. doi:10.1029/JB074i002p00456
    """
    H, K1, K2 = hydrogen_ion, carbonic_acid_constant, bicarbonate_constant
    tau = 1.0 + H * H / (K1 * K2 + K1 * H)
    film = diffusivity / (suppressed_transfer_velocity / CM_PER_HOUR)
    Qz = np.sqrt(hydration_rate * tau / diffusivity) * film
    return tau / ((tau - 1.0) + np.tanh(Qz) / Qz)


@step(
    "enhanced_transfer_velocity",
    method="hoover-berkshire-1969",
    gases=("co2",),
    source=sources.HOOVER_BERKSHIRE_1969,
    equation="Eq. 22",
    formula="k enhancement_factor",
)
def hoover_berkshire_1969(suppressed_transfer_velocity: Array, enhancement_factor: Array) -> Array:
    """Return the transfer velocity with reaction in the boundary layer, after Hoover and Berkshire (1969).

    Parameters
    ----------
    suppressed_transfer_velocity : (...) array
        Without reaction. [cm h-1]
    enhancement_factor : (...) array
        [1]

    Returns
    -------
    (...) array
        [cm h-1]

    References
    ----------
    Hoover and Berkshire (1969), Eq. 22. doi:10.1029/JB074i002p00456
    """
    return suppressed_transfer_velocity * enhancement_factor
