"""The temperature of the interface, what hangs on it, and readings of undried air."""

from collections.abc import Mapping

import numpy as np
import pytest
from CoolProp import CoolProp

from service.physics.declare import Array
from service.physics.interface import donlon_2002
from tests.properties.questions import bits, compute

SEA: dict[str, float] = {
    "water_temperature": 18.4,
    "salinity": 35.1,
    "air_pressure": 1008.2,
    "barometer_height": 18.0,
    "wind_speed": 7.5,
    "wind_height": 23.0,
    "water_fugacity": 372.0,
    "air_mole_fraction": 419.0,
}
FLUX = ("flux", "evasion", "invasion", "fugacity_in_air", "solubility_per_litre", "transfer_velocity", "saturation")
COOL = {"skin": "donlon-2002"}
Values = Mapping[str, float | Array]


def found(values: Values, chosen: Mapping[str, str] | None = None, gas: str = "co2") -> dict[str, Array]:
    return compute(FLUX, chosen or {}, gas, values)


def one(term: str, values: Values, chosen: Mapping[str, str] | None = None, gas: str = "co2") -> Array:
    return compute(term, chosen or {}, gas, values)[term]


# m s-1, K: -0.14 - 0.30 exp(-U/3.7), Donlon et al. (2002); the value at 7 m s-1 was evaluated by others
COOL_SKINS = [(0.0, -0.44), (7.0, -0.18524), (1e3, -0.14)]


@pytest.mark.parametrize(("wind", "difference"), COOL_SKINS)
def test_the_cool_skin_is_that_of_donlon(wind: float, difference: float) -> None:
    assert donlon_2002(np.array([20.0]), np.array([wind])) - 20.0 == pytest.approx(difference, abs=5e-6)


def test_the_skin_is_never_warmer_and_comes_nearer_with_the_wind() -> None:
    skin = donlon_2002(np.array([20.0]), np.linspace(0.0, 25.0, 101))

    assert (np.diff(skin) > 0.0).all()
    assert (skin < 20.0).all()


def test_the_cool_skin_is_taken_off_the_temperature_below_it_at_the_wind_of_ten_metres() -> None:
    values = {**SEA, "subskin_temperature": 18.7}
    wind = one("wind_speed_10m", values)

    assert one("skin_temperature", values, COOL) == donlon_2002(np.array([18.7]), wind)
    assert one("skin_temperature", SEA, COOL) == donlon_2002(np.array([18.4]), wind)


@pytest.mark.parametrize("same", [{"subskin_temperature": 18.4}, {"skin_temperature": 18.4}, {}])
def test_without_a_skin_the_bulk_form_comes_out_bit_for_bit(same: dict[str, float]) -> None:
    f_water = np.linspace(250.0, 600.0, 50)
    values: Values = {**SEA, "water_fugacity": f_water}
    told = found({**values, **same}, {"skin": "none"})
    k, K0, f_air = told["transfer_velocity"] * 0.24, told["solubility_per_litre"], told["fugacity_in_air"]

    assert {name: bits(array) for name, array in told.items()} == {
        name: bits(array) for name, array in found(values).items()
    }
    assert bits(told["flux"]) == bits(k * K0 * f_water - k * K0 * f_air)


def test_a_cool_skin_raises_the_invasion_alone() -> None:
    bulk, cool = found(SEA), found(SEA, COOL)
    changed = [name for name in FLUX if not np.array_equal(bulk[name], cool[name])]

    assert changed == ["flux", "invasion", "fugacity_in_air"]
    assert cool["invasion"] > bulk["invasion"]


def test_a_cool_skin_raises_the_invasion_by_what_colder_water_dissolves() -> None:
    skin = one("skin_temperature", SEA, COOL)
    ratio = found(SEA, COOL)["invasion"] / found(SEA)["invasion"]
    K0 = [one("solubility_per_litre", {**SEA, "water_temperature": t})[0] for t in (18.4, skin[0])]

    # 2.5 % a kelvin for the solubility; the vapour and the virial coefficient add 0.15 % a kelvin
    assert ratio == pytest.approx(K0[1] / K0[0], rel=4e-4)
    assert ratio > K0[1] / K0[0]


def test_with_a_cool_skin_equal_fugacities_still_let_gas_in() -> None:
    f_air = found(SEA, COOL)["fugacity_in_air"]
    flux = found({**SEA, "water_fugacity": f_air}, COOL)["flux"]

    assert flux < 0.0


def test_a_warm_layer_changes_what_leaves_the_water_and_leaves_the_equilibrator_alone() -> None:
    values = {name: value for name, value in SEA.items() if name != "water_fugacity"}
    values |= {"water_mole_fraction": 380.0, "equilibrator_temperature": 19.0}
    intake, warm = (found({**values, **more}) for more in ({}, {"subskin_temperature": 19.4}))
    f = [one("fugacity_in_water", {**values, **more}) for more in ({}, {"subskin_temperature": 19.4})]
    at_19_4 = {**SEA, "water_temperature": 19.4}

    assert f[0] == f[1]
    assert warm["solubility_per_litre"] == one("solubility_per_litre", at_19_4) < intake["solubility_per_litre"]
    assert warm["transfer_velocity"] == one("transfer_velocity", at_19_4) > intake["transfer_velocity"]


def test_the_pressure_at_the_surface_is_one_number_whatever_the_skin() -> None:
    plain = one("surface_pressure", SEA)
    values = {**SEA, "subskin_temperature": 25.0, "skin_temperature": 24.0}
    wanted = ("surface_pressure", "partial_pressure_in_air", "vapour_pressure_at_interface")
    told = compute(wanted, {}, "co2", values)
    dry = (plain - told["vapour_pressure_at_interface"]) / 1013.25

    assert told["surface_pressure"] == plain
    assert told["partial_pressure_in_air"] == pytest.approx(419.0 * dry, rel=1e-14)


def wet(humidity: float | Array, celsius: float | Array = 15.0, x: float = 412.0) -> Array:
    values = {**SEA, "air_mole_fraction_wet": x, "relative_humidity": humidity, "air_temperature": celsius}
    return one("dry_mole_fraction_in_air", {name: v for name, v in values.items() if name != "air_mole_fraction"})


def test_a_reading_in_air_without_humidity_is_the_dry_one_bit_for_bit() -> None:
    assert wet(0.0) == 412.0


def test_the_dry_mole_fraction_grows_with_humidity_and_warmth() -> None:
    assert (np.diff(wet(np.linspace(0.0, 100.0, 11))) > 0.0).all()
    assert (np.diff(wet(80.0, np.linspace(-20.0, 35.0, 12))) > 0.0).all()


@pytest.mark.parametrize("celsius", [5.0, 15.0, 30.0])
def test_the_vapour_at_the_mast_is_that_of_pure_water_at_the_temperature_of_the_air(celsius: float) -> None:
    vapour = 0.8 * CoolProp.PropsSI("P", "T", celsius + 273.15, "Q", 0, "Water") / 100.0
    pressure = one("surface_pressure", SEA)

    # up to 4 % of vapour, whose two formulations differ by 0.15 % of it
    assert wet(80.0, celsius) == pytest.approx(412.0 / (1.0 - vapour / pressure), rel=7e-5)


def test_a_wet_and_a_dry_reading_of_one_air_give_one_flux() -> None:
    told = wet(78.0)
    values = {**SEA, "air_mole_fraction_wet": 412.0, "relative_humidity": 78.0, "air_temperature": 15.0}
    flux = found({name: value for name, value in values.items() if name != "air_mole_fraction"})["flux"]

    assert flux == found({**SEA, "air_mole_fraction": told})["flux"]


@pytest.mark.parametrize("gas", ["o2", "ch4"])
def test_a_percentage_of_saturation_comes_back_as_it_was_sent(gas: str) -> None:
    values = {name: value for name, value in SEA.items() if name != "water_fugacity"} | {"water_saturation": 96.5}
    at_one_atmosphere = {**values, "saturation_pressure": 1013.25}

    assert found(values, gas=gas)["saturation"] == pytest.approx(96.5, rel=1e-14)
    assert found(at_one_atmosphere, gas=gas)["saturation"] > 96.6  # of the lower pressure that there is


def test_percent_of_oxygen_at_one_atmosphere_is_of_the_printed_saturation() -> None:
    values = {**SEA, "water_saturation": 100.0, "saturation_pressure": 1013.25}
    wanted = {name: value for name, value in values.items() if name not in ("water_fugacity", "air_mole_fraction")}
    standard = {"water_temperature": 18.4, "salinity": 35.1, "air_pressure": 1013.25}

    assert one("concentration_in_water", wanted, gas="o2") == pytest.approx(
        one("equilibrium_concentration", standard, gas="o2"), rel=1e-14
    )


@pytest.mark.parametrize("skin", ["none", "donlon-2002"])
def test_a_percentage_of_saturation_knows_of_no_skin(skin: str) -> None:
    values = {name: value for name, value in SEA.items() if name != "water_fugacity"} | {"water_saturation": 96.5}
    told, bulk = found(values, {"skin": skin}, "o2"), found(values, gas="o2")

    assert told["saturation"] == pytest.approx(96.5, rel=1e-14)
    assert told["evasion"] == bulk["evasion"]
