"""How long the dissolved gas of the mixed layer would last: its stock over the one-way flux, and over the net flux."""

import numpy as np

from service.physics.declare import Array, Remark, step


@step("gas_stock", formula="C h")
def gas_stock(concentration_in_water_per_litre: Array, mixed_layer_depth: Array) -> Array:
    """Return the dissolved gas in the mixed layer under an area of its surface.

    Parameters
    ----------
    concentration_in_water_per_litre : (...) array
        Of the gas itself; for carbon dioxide not total carbon. [umol L-1]
    mixed_layer_depth : (...) array
        [m]

    Returns
    -------
    (...) array
        [mmol m-2]

    Notes
    -----
    1 umol L-1 is 1 mmol m-3, so that there is no factor.
    """
    return concentration_in_water_per_litre * mixed_layer_depth


@step(
    "turnover_one_way",
    formula="C h / evasion",
    remarks=(Remark("nothing leaves the water: there is no turnover", ("evasion",), lambda e: e == 0.0, flag=4),),
)
def turnover_one_way(gas_stock: Array, evasion: Array) -> Array:
    """Return the time in which as much gas leaves the water as it holds, whatever comes back.

    Parameters
    ----------
    gas_stock : (...) array
        [mmol m-2]
    evasion : (...) array
        [mmol m-2 d-1]

    Returns
    -------
    (...) array
        The residence time of a molecule; for an inert gas that of the layer's equilibration. [d]
    """
    return gas_stock / evasion


@step(
    "turnover_net",
    formula="C h / |evasion - invasion|",
    remarks=(
        Remark("no net flux: the stock lasts for ever", ("evasion", "invasion"), lambda out, back: out == back, flag=4),
    ),
)
def turnover_net(gas_stock: Array, evasion: Array, invasion: Array) -> Array:
    """Return the time in which the net flux, in or out, would carry as much gas as the water holds.

    Parameters
    ----------
    gas_stock : (...) array
        [mmol m-2]
    evasion, invasion : (...) array
        [mmol m-2 d-1]

    Returns
    -------
    (...) array
        Without bound as the water comes to equilibrium, and so never a residence time. [d]
    """
    return gas_stock / np.abs(evasion - invasion)
