"""Laws of the time to equilibrium: deep layers take longer, fast exchange takes less, logarithms relate the rest."""

import numpy as np
import pytest
from hypothesis import given

from service.physics.declare import GASES, Array
from tests.properties.questions import Values, ask_and_answer, samples

# Gases whose time depends on exchange alone: neither in the carbonate system nor radioactive.
INERT = [n for n, gas in GASES.items() if "storage_ratio" in gas.constants and "decay_constant" not in gas.constants]

layers = samples("water_temperature", wind_speed=(0.5, 20.0), mixed_layer_depth=(0.1, 1000.0))


def times(gas: str, values: Values, **more: Array | float) -> dict[str, Array]:
    """Return the results of an equilibration at salinity 35, where every gas has a Schmidt number."""
    return dict(ask_and_answer("equilibration", gas, {"salinity": 35.0, **values, **more}).outcome.results)


@pytest.mark.parametrize("gas", INERT)
@given(layer=layers, factor=samples(factor=(1.0, 10.0)))
def test_the_time_is_proportional_to_the_depth(gas: str, layer: dict[str, Array], factor: dict[str, Array]) -> None:
    one = times(gas, layer)
    other = times(gas, layer, mixed_layer_depth=layer["mixed_layer_depth"] * factor["factor"])

    assert other["equilibration_time"] == pytest.approx(factor["factor"] * one["equilibration_time"], rel=1e-13)
    assert np.array_equal(other["transfer_velocity"], one["transfer_velocity"])


@pytest.mark.parametrize("fraction", [0.0, 0.5, 0.95, 0.999999])
@given(layer=layers)
def test_the_times_are_logarithms_of_one_another(fraction: float, layer: dict[str, Array]) -> None:
    told = times("o2", layer, fraction=fraction)
    tau = told["equilibration_time"]

    assert told["half_time"] == pytest.approx(tau * np.log(2.0), rel=1e-15)
    assert told["time_to_fraction"] == pytest.approx(-tau * np.log1p(-fraction), rel=1e-14)
    assert 1.0 - np.exp(-told["time_to_fraction"] / tau) == pytest.approx(np.full(tau.size, fraction), abs=1e-15)


@pytest.mark.parametrize("gas", INERT)
def test_more_wind_never_makes_equilibrium_later(gas: str) -> None:
    values: Values = {"water_temperature": 12.0, "mixed_layer_depth": 40.0, "wind_speed": np.linspace(0.5, 20.0, 79)}
    tau = times(gas, values)["equilibration_time"]

    assert (np.diff(tau) < 0.0).all()


@pytest.mark.parametrize("gas", INERT)
@given(layer=layers, ice=samples(ice_fraction=(0.0, 0.99)))
def test_ice_lengthens_the_time_by_the_share_it_takes(gas: str, layer: dict[str, Array], ice: dict[str, Array]) -> None:
    open_water, iced = times(gas, layer), times(gas, layer | ice)
    share = 1.0 - ice["ice_fraction"]

    assert iced["equilibration_time"] * share == pytest.approx(open_water["equilibration_time"], rel=1e-13)
