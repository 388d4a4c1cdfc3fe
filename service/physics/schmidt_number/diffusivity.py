"""Diffusivities of the gases: measured ones, and those estimated from the size of the molecule."""

from typing import NamedTuple

import numpy as np

from service.physics import sources
from service.physics.constants import GAS_CONSTANT, ZERO_CELSIUS
from service.physics.declare import Array, relative_uncertainty, step
from service.physics.schmidt_number.viscosity import fresh_water_viscosity

SALT_EFFECT = 0.06  # fraction by which salinity 35 slows diffusion; Jähne et al. (1987), measured for He and H2
SEA_SALINITY = 35.0  # 1
HAYDUK_LAUDIE_FACTOR = 13.26e-5  # cm2 s-1; Hayduk and Laudie (1974), from memory
HAYDUK_LAUDIE_VISCOSITY = -1.14  # 1, exponent of the viscosity [cP]; many texts print -1.4
HAYDUK_LAUDIE_VOLUME = -0.589  # 1, exponent of the molar volume [cm3 mol-1]
WILKE_CHANG_FACTOR = 7.4e-8  # cm2 s-1; Wilke and Chang (1955), from memory
WILKE_CHANG_ASSOCIATION = 2.6  # 1, of water, the original one; later authors revise it to 2.26
WILKE_CHANG_VOLUME = -0.6  # 1, exponent of the molar volume [cm3 mol-1]
MOLAR_MASS_OF_WATER = 18.015  # g mol-1; IUPAC
SQUARE_CENTIMETRES = 1e-4  # m2 in one cm2
CENTIPOISE = 1000.0  # cP in one Pa s
JOULES_PER_KILOJOULE = 1000.0

ARRHENIUS = "D = A exp(-Ea / (R T))"


class Arrhenius(NamedTuple):
    """D = A exp(-Ea / (R T)): A in cm2 s-1, the activation energy Ea in kJ mol-1."""

    A: float
    activation_energy: float


class MolarVolume(NamedTuple):
    """The molar volume of the liquid at its normal boiling point, in cm3 mol-1."""

    at_boiling_point: float


@step(
    "diffusivity",
    source=sources.JAHNE_1987,
    formula="D = D_fresh (1 - 0.06 S/35)",
    note="measured for helium and hydrogen, taken for every gas",
)
def diffusivity(diffusivity_in_fresh_water: Array, salinity: Array) -> Array:
    """Return the diffusivity of the gas in this water from the one in fresh water.

    Parameters
    ----------
    diffusivity_in_fresh_water : (...) array
        [m2 s-1]
    salinity : (...) array
        Practical salinity. [1]

    Returns
    -------
    (...) array
        [m2 s-1]

    Notes
    -----
    Six percent at salinity 35, measured for helium and hydrogen; linear in salinity is common practice.

    References
    ----------
    Jähne et al. (1987). doi:10.1029/JC092iC10p10767
    """
    return diffusivity_in_fresh_water * (1.0 - SALT_EFFECT * (salinity / SEA_SALINITY))


def _arrhenius(coefficients: Arrhenius, water_temperature: Array) -> Array:
    energy = coefficients.activation_energy * JOULES_PER_KILOJOULE
    exponent = -energy / (GAS_CONSTANT * (water_temperature + ZERO_CELSIUS))
    return np.asarray(coefficients.A * SQUARE_CENTIMETRES * np.exp(exponent))


@step(
    "diffusivity_in_fresh_water",
    method="jahne-1987",
    source=sources.JAHNE_1987,
    equation="Table 4",
    formula=ARRHENIUS,
    valid={"water_temperature": (0.0, 35.0)},
    range_kind="data",
    uncertainty=relative_uncertainty(0.05, "author's estimate", "within about 5 % (from memory)"),
)
def jahne_1987(coefficients: Arrhenius, water_temperature: Array) -> Array:
    """Return the diffusivity of a gas in fresh water after Jähne, Heinz and Dietrich (1987).

    Parameters
    ----------
    coefficients : Arrhenius
        [cm2 s-1, kJ mol-1]
    water_temperature : (...) array
        [degC]

    Returns
    -------
    (...) array
        [m2 s-1]

    Notes
    -----
    Measured from 0 to 35 degC. NaN in, NaN out.

    References
    ----------
    Jähne et al. (1987). doi:10.1029/JC092iC10p10767
    """
    return _arrhenius(coefficients, water_temperature)


@step(
    "diffusivity_in_fresh_water",
    method="saltzman-1993",
    source=sources.SALTZMAN_1993,
    equation="the fit for pure water",
    formula=ARRHENIUS,
    valid={"water_temperature": (5.0, 30.0)},
    range_kind="data",
    note="range from memory",
)
def saltzman_1993_diffusivity(coefficients: Arrhenius, water_temperature: Array) -> Array:
    """Return the diffusivity of dimethyl sulphide in fresh water after Saltzman et al. (1993).

    Parameters
    ----------
    coefficients : Arrhenius
        [cm2 s-1, kJ mol-1]
    water_temperature : (...) array
        [degC]

    Returns
    -------
    (...) array
        [m2 s-1]

    Notes
    -----
    Measured from 5 to 30 degC (from memory). NaN in, NaN out.

    References
    ----------
    Saltzman et al. (1993). doi:10.1029/93JC01858
    """
    return _arrhenius(coefficients, water_temperature)


@step(
    "diffusivity_in_fresh_water",
    method="king-saltzman-1995",
    source=sources.KING_SALTZMAN_1995,
    equation="the fit for pure water",
    formula=ARRHENIUS,
    valid={"water_temperature": (5.0, 25.0)},
    range_kind="data",
    note="range from memory",
)
def king_saltzman_1995_diffusivity(coefficients: Arrhenius, water_temperature: Array) -> Array:
    """Return the diffusivity of sulphur hexafluoride in fresh water after King and Saltzman (1995).

    Parameters
    ----------
    coefficients : Arrhenius
        [cm2 s-1, kJ mol-1]
    water_temperature : (...) array
        [degC]

    Returns
    -------
    (...) array
        [m2 s-1]

    Notes
    -----
    Measured from 5 to 25 degC (from memory). NaN in, NaN out.

    References
    ----------
    King and Saltzman (1995). doi:10.1029/94JC03313
    """
    return _arrhenius(coefficients, water_temperature)


@step(
    "diffusivity_in_fresh_water",
    method="zheng-1998",
    source=sources.ZHENG_1998,
    equation="the fits for pure water",
    formula=ARRHENIUS,
    valid={"water_temperature": (0.0, 30.0)},
    range_kind="data",
    note="range from memory",
)
def zheng_1998_diffusivity(coefficients: Arrhenius, water_temperature: Array) -> Array:
    """Return the diffusivity of chlorofluorocarbon 11 or 12 in fresh water after Zheng et al. (1998).

    Parameters
    ----------
    coefficients : Arrhenius
        [cm2 s-1, kJ mol-1]
    water_temperature : (...) array
        [degC]

    Returns
    -------
    (...) array
        [m2 s-1]

    Notes
    -----
    Measured from 0 to 30 degC (from memory). NaN in, NaN out.

    References
    ----------
    Zheng et al. (1998). doi:10.1029/97JC02761
    """
    return _arrhenius(coefficients, water_temperature)


@step(
    "diffusivity_in_fresh_water",
    method="wilke-chang-1955",
    source=sources.WILKE_CHANG_1955,
    equation="the correlation",
    formula="D = 7.4e-8 (2.6 M)^(1/2) T / (mu V^0.6) in cm2 s-1: M of water, mu of pure water in cP, V in cm3 mol-1",
    valid={"water_temperature": (0.0, 40.0)},
    range_kind="common practice",
    uncertainty=relative_uncertainty(0.10, "author's estimate", "about 10 % on average (from memory)"),
)
def wilke_chang_1955(coefficients: MolarVolume, water_temperature: Array) -> Array:
    """Return the diffusivity of a gas in fresh water by the correlation of Wilke and Chang (1955).

    Parameters
    ----------
    coefficients : MolarVolume
        [cm3 mol-1]
    water_temperature : (...) array
        [degC]

    Returns
    -------
    (...) array
        [m2 s-1]

    Notes
    -----
    With the association parameter 2.6 of the original. It fails for helium, neon and hydrogen, whose molecules are too
    light and small, and is not offered for them. NaN in, NaN out.

    References
    ----------
    Wilke and Chang (1955). doi:10.1002/aic.690010222
    """
    viscosity = fresh_water_viscosity(water_temperature) * CENTIPOISE
    kelvin = water_temperature + ZERO_CELSIUS
    solvent = WILKE_CHANG_FACTOR * np.sqrt(WILKE_CHANG_ASSOCIATION * MOLAR_MASS_OF_WATER) * kelvin / viscosity
    return np.asarray(solvent * coefficients.at_boiling_point**WILKE_CHANG_VOLUME * SQUARE_CENTIMETRES)


@step(
    "diffusivity_in_fresh_water",
    method="hayduk-laudie-1974",
    source=sources.HAYDUK_LAUDIE_1974,
    equation="the correlation",
    formula="D = 13.26e-5 mu^-1.14 V^-0.589 in cm2 s-1: mu of pure water in cP, V in cm3 mol-1",
    valid={"water_temperature": (0.0, 40.0)},
    range_kind="common practice",
    uncertainty=relative_uncertainty(0.06, "author's estimate", "about 6 % on average (from memory)"),
)
def hayduk_laudie_1974(coefficients: MolarVolume, water_temperature: Array) -> Array:
    """Return the diffusivity of a gas in fresh water by the correlation of Hayduk and Laudie (1974).

    Parameters
    ----------
    coefficients : MolarVolume
        [cm3 mol-1]
    water_temperature : (...) array
        [degC]

    Returns
    -------
    (...) array
        [m2 s-1]

    Notes
    -----
    The exponent of the viscosity is 1.14; many texts print 1.4, which is 16 percent off at 0 degC. It fails for helium,
    neon and hydrogen and is not offered for them. NaN in, NaN out.

    References
    ----------
    Hayduk and Laudie (1974). doi:10.1002/aic.690200329
    """
    viscosity = fresh_water_viscosity(water_temperature) * CENTIPOISE
    solvent = HAYDUK_LAUDIE_FACTOR * viscosity**HAYDUK_LAUDIE_VISCOSITY
    return np.asarray(solvent * coefficients.at_boiling_point**HAYDUK_LAUDIE_VOLUME * SQUARE_CENTIMETRES)
