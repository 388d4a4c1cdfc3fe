"""How a disequilibrium of carbon dioxide decays far from equilibrium, where its storage ratio changes on the way."""

from collections.abc import Callable

import numpy as np

from service.physics import sources
from service.physics.carbonate.solve import Acids
from service.physics.carbonate.system import MICRO, carbon_per_dioxide
from service.physics.carbonate.water_side import CO2
from service.physics.constants import METRES_PER_DAY
from service.physics.declare import Array, Remark, derived, step, term
from service.physics.equilibration import NO_OPEN_WATER

PANEL = 0.25  # in ln of the rest of the way in pH, over which one rule of Gauss holds
PANELS = 64  # so that 1e-7 of the way is left; from there on the decay is that of a small disequilibrium
NEWTON_STEPS = 3  # from a cubic start; each squares the error
GAUSS = np.polynomial.legendre.leggauss(5)
NODES, WEIGHTS = (GAUSS[0] + 1.0) / 2.0, GAUSS[1] / 2.0  # on the way from 0 to 1
Chemistry = Callable[[Array], tuple[Array, Array, Array]]

term("fugacity_at_equilibrium", "uatm", "fugacity in the water at which as much gas leaves as enters")
term("hydrogen_ion_at_equilibrium", "mol kg-1", "hydrogen ion at that fugacity and this alkalinity, total scale")
derived("hydrogen_ion_at_equilibrium", of="hydrogen_ion_by_fugacity", carbonate_fugacity="fugacity_at_equilibrium")

AT_EQUILIBRIUM = Remark(
    "the water is in equilibrium already: there is no disequilibrium to decay",
    ("hydrogen_ion", "hydrogen_ion_at_equilibrium"),
    np.equal,
    flag=4,
)


@step("fugacity_at_equilibrium", formula="f_water invasion / evasion", gases=CO2)
def fugacity_at_equilibrium(fugacity_in_water: Array, evasion: Array, invasion: Array) -> Array:
    """Return the fugacity in the water at which as much gas leaves as enters, bubbles and skin counted in.

    Parameters
    ----------
    fugacity_in_water : (...) array
        [uatm]
    evasion, invasion : (...) array
        [mmol m-2 d-1]

    Returns
    -------
    (...) array
        [uatm]
    """
    return fugacity_in_water * invasion / evasion


@step(
    "disequilibrium",
    method="nonlinear",
    way="times",
    gases=CO2,
    source=sources.DICKSON_2007,
    equation="chapter 2, the carbonate system at constant alkalinity",
    formula="(C - C_eq) / (C_0 - C_eq), dDIC/dt = -A K (C - C_eq) / h - ventilation_rate (DIC - DIC_eq), C = [CO2*]",
    remarks=(NO_OPEN_WATER, AT_EQUILIBRIUM),
    in_situ=True,
)
def nonlinear_course(
    times: Array,
    mixed_layer_depth: Array,
    open_water_fraction: Array,
    total_transfer_velocity: Array,
    ventilation_rate: Array,
    hydrogen_ion: Array,
    hydrogen_ion_at_equilibrium: Array,
    alkalinity: Array,
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
    """Return what is left at some times of a disequilibrium of carbon dioxide, at constant alkalinity.

    Parameters
    ----------
    times : (times, 1) array
        From the beginning. [d]
    mixed_layer_depth : (...) array
        [m]
    open_water_fraction : (...) array
        [1]
    total_transfer_velocity : (...) array
        [cm h-1]
    ventilation_rate : (...) array
        [d-1]
    hydrogen_ion, hydrogen_ion_at_equilibrium : (...) array
        [mol kg-1]
    alkalinity : (...) array
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
    (times, ...) array
        Of the dissolved carbon dioxide, and so of the fugacity. [1]

    Notes
    -----
    The equation has one variable and no time in it, so that time is an integral over the way from the first pH to the
    last: there the carbon dioxide and the total carbon at an alkalinity are explicit, and nothing is solved. Taken over
    the logarithm of the rest of the way the integrand hardly changes, and five nodes of Gauss in each of 64 panels of
    0.25 give the time to better than 1e-9 of itself; for a time asked for, Newton's method finds the place in its
    panel. Within 1e-9 of a stiff solver from 100 to 10,000 uatm. Temperature, salinity, alkalinity, air and wind stay
    as they are.

    References
    ----------
    Dickson et al. (2007), Guide to best practices for ocean CO2 measurements, chapter 2, for the system.
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
    K1, K2, total = carbonic_acid_constant, bicarbonate_constant, alkalinity * MICRO

    def chemistry(hydrogen: Array) -> tuple[Array, Array, Array]:
        """Return carbon dioxide, total carbon, and its change with ln of the hydrogen ion."""
        single = K1 / hydrogen
        double = single * K2 / hydrogen
        others, buffer = acids.alkalinity(hydrogen)
        charge = single + 2.0 * double
        dioxide = (total - others) / charge
        per_dioxide = carbon_per_dioxide(hydrogen, K1, K2)
        change = (buffer + dioxide * (single + 4.0 * double)) / charge
        return dioxide, dioxide * per_dioxide, change * per_dioxide - dioxide * charge

    exchange = open_water_fraction * total_transfer_velocity * METRES_PER_DAY / mixed_layer_depth
    return _decay(times, chemistry, hydrogen_ion, hydrogen_ion_at_equilibrium, exchange, ventilation_rate)


def _decay(times: Array, chemistry: Chemistry, first: Array, last: Array, exchange: Array, ventilation: Array) -> Array:
    """Return the rest of the disequilibrium at some times, by time as an integral over the way in ln H."""
    way = np.log(first / last)
    dioxide, carbon, _ = chemistry(last)

    def pace(passed: Array | float) -> tuple[Array, Array]:
        """Return days per unit of `passed`, minus ln of the rest of the way, and the disequilibrium there."""
        rest = way * np.exp(-passed)
        here, held, change = chemistry(last * np.exp(rest))
        loss = exchange * (here - dioxide) + ventilation * (held - carbon)
        return change * rest / loss, here - dioxide

    def span(begin: Array | float, width: Array | float) -> Array:
        """Return the days from a place to one a width further on."""
        parts = (weight * pace(begin + width * node)[0] for node, weight in zip(NODES, WEIGHTS, strict=True))
        return width * sum(parts, np.zeros(1))

    ends = [np.zeros_like(way * exchange)]
    for panel in range(PANELS):
        ends.append(ends[-1] + span(PANEL * panel, PANEL))
    table = np.stack(ends)
    at_once = np.broadcast_to(times, np.broadcast_shapes(times.shape, table.shape[1:]))
    panel = np.clip((table[:, np.newaxis] <= at_once).sum(axis=0) - 1, 0, PANELS - 1)
    begin = np.take_along_axis(table, panel, axis=0)
    width = np.take_along_axis(table, panel + 1, axis=0) - begin
    beyond = np.maximum(at_once - table[-1], 0.0)
    since = np.minimum(at_once, table[-1]) - begin
    place = PANEL * since / width
    for _ in range(NEWTON_STEPS):
        place = place - (span(PANEL * panel, place) - since) / pace(PANEL * panel + place)[0]
    days, left = pace(PANEL * panel + place)
    _, whole = pace(0.0)
    return np.asarray(left / whole * np.exp(-beyond / days))
