"""Transfer velocities of streams from the turbulence that their flow makes: energy dissipation, surface renewal."""

import numpy as np

from service.physics import sources
from service.physics.constants import METRES_PER_DAY
from service.physics.declare import Array, step
from service.physics.gases.o2 import O2
from service.physics.schmidt_number.polynomials import Rows
from service.physics.schmidt_number.polynomials import wanninkhof_2014 as schmidt_number
from service.physics.transfer_velocity.reference import REFERENCE, SQUARE_ROOT, reference
from service.physics.transfer_velocity.scaling import takes_no_rain

ULSETH_2019_CALM = (3.10, 0.35)  # ln of k600 in m d-1, per ln of m2 s-3, below the break; Ulseth et al. (2019)
ULSETH_2019_STEEP = (6.43, 1.18)  # the same above the break, in steep streams that draw in air
ULSETH_2019_BREAK = 0.020  # m2 s-3
ULSETH_2019_GRAVITY = 9.81  # m s-2


@step(
    REFERENCE,
    method="ulseth-2019",
    source=sources.ULSETH_2019,
    equation="piecewise regression",
    formula="ln k600 = 3.10 + 0.35 ln eD (eD < 0.020), 6.43 + 1.18 ln eD, in m d-1, eD = g S V",
    supplies=reference(600.0),
    water=("stream",),
    note="At the break the upper line is 9 percent above the lower one.",
)
def ulseth_2019(flow_velocity: Array, slope: Array) -> Array:
    """Return the transfer velocity of a stream by Ulseth et al. (2019), from the energy that its fall dissipates.

    Parameters
    ----------
    flow_velocity : (...) array
        [m s-1]
    slope : (...) array
        Of the bed, fall over length. [1]

    Returns
    -------
    (...) array
        Transfer velocity at a Schmidt number of 600. [cm h-1]

    Notes
    -----
    ``ln k600 = 3.10 + 0.35 ln eD`` below ``eD = 0.020 m2 s-3`` and ``6.43 + 1.18 ln eD`` above, in m d-1. NaN in, NaN
    out.

    References
    ----------
    Ulseth et al. (2019). doi:10.1038/s41561-019-0324-8
    """
    dissipation = ULSETH_2019_GRAVITY * slope * flow_velocity
    calm, steep = (
        np.exp(intercept) * dissipation**exponent for intercept, exponent in (ULSETH_2019_CALM, ULSETH_2019_STEEP)
    )
    return np.asarray(np.where(dissipation < ULSETH_2019_BREAK, calm, steep) / METRES_PER_DAY)


OCONNOR_DOBBINS_1958 = (3.93, 0.5, -0.5)  # m d-1 at 20 degC, exponents of V and H: K2 H; O'Connor and Dobbins (1958)
OCONNOR_DOBBINS_1958_TEMPERATURE = 1.0241  # per degC, common practice in reaeration
OCONNOR_DOBBINS_1958_REFERENCE = 20.0  # degC


@step(
    REFERENCE,
    method="oconnor-dobbins-1958",
    source=sources.OCONNOR_DOBBINS_1958,
    equation="reaeration coefficient",
    formula="k = 3.93 V^0.5 H^-0.5 1.0241^(t-20) in m d-1, of oxygen; other gases by (Sc/Sc_o2)^-1/2 at t",
    supplies={"schmidt_exponent": SQUARE_ROOT},
    valid={"flow_velocity": (0.15, 0.49), "water_depth": (0.30, 9.14)},
    range_kind="common practice",
    water=("stream",),
    note="Made for oxygen. Its temperature factor takes the place of Schmidt number scaling. Range from memory.",
)
def oconnor_dobbins_1958(flow_velocity: Array, water_depth: Array, water_temperature: Array) -> Array:
    """Return the transfer velocity of oxygen in a stream by O'Connor and Dobbins (1958), from surface renewal.

    Parameters
    ----------
    flow_velocity : (...) array
        [m s-1]
    water_depth : (...) array
        Mean over the reach. [m]
    water_temperature : (...) array
        [degC]

    Returns
    -------
    (...) array
        Transfer velocity of oxygen in fresh water of this temperature. [cm h-1]

    Notes
    -----
    The reaeration coefficient ``K2 = 3.93 V^0.5 H^-1.5`` per day at 20 degC, times the depth, times
    ``1.0241^(t - 20)``. For oxygen in fresh water the result is that itself, so that its temperature factor takes the
    place of scaling with the Schmidt number; another gas, or a Schmidt number of 600 or 660, is scaled from oxygen's
    own at the same temperature. NaN in, NaN out.

    References
    ----------
    O'Connor and Dobbins (1958). doi:10.1061/TACEAT.0007609
    """
    coefficient, of_velocity, of_depth = OCONNOR_DOBBINS_1958
    warmer = water_temperature - OCONNOR_DOBBINS_1958_REFERENCE
    k = coefficient * flow_velocity**of_velocity * water_depth**of_depth
    return k * OCONNOR_DOBBINS_1958_TEMPERATURE**warmer / METRES_PER_DAY


def _rows_of_oxygen() -> Rows:
    block = O2.block("schmidt_number", "wanninkhof-2014")
    if block is None or not isinstance(block.coefficients, Rows):
        raise LookupError("oxygen has no Schmidt number by wanninkhof-2014")
    return block.coefficients


OXYGEN = _rows_of_oxygen()


@step(
    "reference_schmidt_number",
    method="oconnor-dobbins-1958",
    formula="Sc of oxygen in fresh water at t, after Wanninkhof (2014), Table 1",
)
def schmidt_number_of_oxygen(water_temperature: Array) -> Array:
    """Return the Schmidt number of oxygen in fresh water.

    Parameters
    ----------
    water_temperature : (...) array
        [degC]

    Returns
    -------
    (...) array
        [1]
    """
    return schmidt_number(OXYGEN, water_temperature, np.zeros_like(water_temperature))


takes_no_rain("ulseth-2019", "oconnor-dobbins-1958")
