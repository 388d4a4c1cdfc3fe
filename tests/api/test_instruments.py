"""What instruments report, as callers send it: every correction by name, and a sentence where one cannot be made."""

from collections.abc import Mapping

import pytest
from flask.testing import FlaskClient

from tests.api.questions import FLUX, address, faults, flux, number, problem, quality, rows, values

LAKE = {"gas": "ch4", "water": "lake", "parameterisation": "cole-caraco-1998", "water_temperature": 16.0}
LAKE |= {"salinity": 0.1, "wind_speed": 4.2, "air_pressure": 958.0, "air_mole_fraction": 2.0}
BOTTLE = {**LAKE, "water_mole_fraction": 21.0, "headspace_ratio": 0.5, "equilibrator_temperature": 21.5}
BOTTLE |= {"equilibrator_pressure": 962.0, "headspace_start_mole_fraction": 2.0}
ALL = {
    "barometer_height": 18,
    "wind_height": 23,
    "equilibrator_temperature": 18.9,
    "equilibrator_pressure": 1010.1,
    "subskin_temperature": 18.6,
    "skin_correction": "donlon-2002",
}
WET_AIR = {"air_mole_fraction": None, "air_mole_fraction_wet": 412, "air_temperature": 17, "relative_humidity": 78}
More = Mapping[str, object]


def reason(client: FlaskClient, more: More) -> str:
    return str(problem(client.get(flux(**more)))["errors"][0]["reason"])


# what is sent beside the usual inputs, the fault, and a word of the sentence that says what to send
CONTRADICTIONS: list[tuple[dict[str, object], tuple[str, str], str]] = [
    (
        {"water_mole_fraction": None, "water_fugacity": 380, "equilibrator_temperature": 18.9},
        ("unused", "equilibrator_temperature"),
        "water_mole_fraction or water_mole_fraction_wet: send that too",
    ),
    ({**WET_AIR, "air_temperature": None}, ("missing_input", "air_temperature"), "read without drying [degC]"),
    ({**WET_AIR, "relative_humidity": None}, ("missing_input", "relative_humidity"), "read without drying [%]"),
    ({"relative_humidity": 78}, ("unused", "relative_humidity"), "beside air_mole_fraction_wet: send that too"),
    ({"air_temperature": 17}, ("unused", "air_temperature"), "beside air_mole_fraction_wet: send that too"),
    ({**WET_AIR, "air_mole_fraction": 419}, ("two_ways", "air_mole_fraction and air_mole_fraction_wet"), "send one"),
    ({"water_mole_fraction_wet": 372}, ("two_ways", "water_mole_fraction and water_mole_fraction_wet"), "send one"),
    ({"headspace_ratio": 1}, ("missing_input", "equilibrator_temperature"), "is needed beside headspace_ratio"),
    (
        {"headspace_ratio": 1, "equilibrator_temperature": 20},
        ("missing_input", "equilibrator_pressure"),
        "is needed beside headspace_ratio",
    ),
    (
        {"headspace_start_mole_fraction": 2},
        ("unused", "headspace_start_mole_fraction"),
        "only beside headspace_ratio: send that too",
    ),
    ({"saturation_pressure": 1013}, ("unused", "saturation_pressure"), "only beside water_saturation: send that too"),
    ({"elevation": 410}, ("two_ways", "air_pressure and elevation"), "send one"),
    (
        {"air_pressure": None, "elevation": 410, "barometer_height": 3},
        ("unused", "barometer_height"),
        "only beside air_pressure: send that too",
    ),
    (
        {"skin_temperature": 18.1, "skin_correction": "donlon-2002"},
        ("two_ways", "skin_correction and skin_temperature"),
        "temperature of the interface: send one",
    ),
    (
        {"temperature_correction": "takahashi-2009"},
        ("unused", "temperature_correction"),
        "only beside equilibrator_temperature: send that too, or leave it out",
    ),
    (
        {"temperature_correction": "carbonate", "equilibrator_temperature": 18.9},
        ("missing_input", "alkalinity"),
        "total alkalinity",
    ),
    ({"carbonate_constants": "lueker-2000"}, ("unused", "carbonate_constants"), "changes nothing"),
    ({"chemical_enhancement": "hoover-berkshire-1969"}, ("missing_input", "alkalinity"), "total alkalinity"),
    (
        {"wind_speed": None, "wind_height": None, "given_transfer_velocity": 12, "wind_profile": "power-law"},
        ("unused", "wind_profile"),
        "changes nothing",
    ),
    (
        {"wind_speed": None, "wind_height": None, "given_transfer_velocity": 12, "skin_correction": "donlon-2002"},
        ("missing_input", "wind_speed"),
        "wind speed as measured",
    ),
]


@pytest.mark.parametrize(("more", "fault", "word"), CONTRADICTIONS)
def test_what_contradicts_or_is_missing_is_told_with_what_to_send(
    client: FlaskClient, more: dict[str, object], fault: tuple[str, str], word: str
) -> None:
    assert faults(client.get(flux(**more)))[0] == fault
    assert word in reason(client, more)


WITHOUT_CONTRADICTION: list[dict[str, object]] = [
    {**WET_AIR},
    {"equilibrator_temperature": 18.9, "temperature_correction": "takahashi-2009"},
    {"temperature_correction": "by-salinity"},  # the default may be named where nothing depends on it
    {"skin_temperature": 18.1, "skin_correction": "none"},
    {"subskin_temperature": 18.6, "skin_temperature": 18.4},
    {"subskin_temperature": 18.6, "skin_correction": "donlon-2002"},
    {"air_pressure": None, "elevation": 410},
    {"wind_height": None, "wind_profile": "power-law"},  # at 10 m every profile returns what is sent
    {"alkalinity": 2310, "chemical_enhancement": "hoover-berkshire-1969", "carbonate_constants": "lueker-2000"},
    {"given_transfer_velocity": 12, "chemical_enhancement": "wanninkhof-1992", "wind_speed": None, "wind_height": None},
    {"given_transfer_velocity": 12, "skin_correction": "donlon-2002"},
]


@pytest.mark.parametrize("more", WITHOUT_CONTRADICTION)
def test_what_belongs_together_is_answered(client: FlaskClient, more: dict[str, object]) -> None:
    assert number(client.get(flux(**more)), "flux") < 0.0


def test_inland_water_without_a_pressure_is_told_both_ways_of_giving_it(client: FlaskClient) -> None:
    without = {name: value for name, value in BOTTLE.items() if name != "air_pressure"}
    answer = client.get(address("flux", without))

    assert faults(answer) == [("missing_input", "air_pressure")]
    assert problem(answer)["errors"][0]["reason"] == "has no default for water lake: send it, or elevation"
    assert quality(client.get(address("flux", without, elevation=478)))[0][0] == 3


def test_an_unused_option_is_refused_beside_a_table_too(client: FlaskClient) -> None:
    body = "water_temperature,salinity,wind_speed,water_mole_fraction,air_mole_fraction\n18.4,35.1,7.5,380,419\n"
    answer = client.post("/v1/flux?gas=co2&temperature_correction=takahashi-2009", data=body)

    assert faults(answer) == [("unused", "temperature_correction")]


# each correction, how it is left out by name, and the sign of what it does to a flux into the water
LEFT_OUT = [
    ({"barometer_height": 0}, -1),
    ({"wind_height": 10}, +1),
    ({"temperature_correction": "none"}, -1),
    ({"equilibrator_pressure": 1008.2}, 0),
    ({"skin_correction": "none"}, -1),
    ({"subskin_temperature": 18.4}, 0),
]


@pytest.mark.parametrize(("more", "sign"), LEFT_OUT)
def test_every_correction_can_be_left_out_by_name(client: FlaskClient, more: More, sign: int) -> None:
    every = number(client.get(flux(**ALL)), "flux")
    without = number(client.get(flux(**{**ALL, **more})), "flux")

    assert every != without
    assert sign == 0 or (every - without) * sign > 0.0


def test_all_corrections_left_out_are_the_plain_question(client: FlaskClient) -> None:
    nothing = {
        "barometer_height": 0,
        "equilibrator_temperature": FLUX["water_temperature"],
        "equilibrator_pressure": FLUX["air_pressure"],
        "subskin_temperature": FLUX["water_temperature"],
        "skin_correction": "none",
        "surfactant_suppression": 0,
        "chemical_enhancement": "none",
        "wind_speed_variance": 0,
    }
    plain, without = client.get(flux()), client.get(flux(**nothing))

    assert {name: values(without, name) for name in plain.get_json()["results"]} == {
        name: told["values"] for name, told in plain.get_json()["results"].items()
    }


def test_what_was_not_read_is_listed_with_what_is_taken_for_it(client: FlaskClient) -> None:
    plain, with_both = (client.get(flux(**more)).get_json()["assumed"] for more in ({}, ALL))
    saturation = client.get(flux(gas="o2", water_mole_fraction=None, air_mole_fraction=None, water_saturation=98))

    assert plain["equilibrator_temperature"] == {"value": "water_temperature"}
    assert plain["equilibrator_pressure"] == {"value": "surface_pressure"}
    assert not {"equilibrator_temperature", "equilibrator_pressure"} & set(with_both)
    assert with_both["temperature_correction"] == {"value": "by-salinity"}
    assert saturation.get_json()["assumed"]["saturation_pressure"] == {"value": "surface_pressure"}
    assert "equilibrator_temperature=water_temperature" in client.get(flux()).headers["Catspaw-Assumed"]


def test_a_bottle_tells_concentration_saturation_and_flux(client: FlaskClient) -> None:
    pick = "concentration_in_water;saturation;flux;fugacity_in_water"
    answer = client.get(address("flux", BOTTLE, pick=pick, **{"unit.concentration_in_water": "nmol/L"}))

    assert quality(answer) == [(1, [])]
    assert 300 < number(answer, "concentration_in_water") < 500  # 19 umol/mol more in half the volume is 380 nmol/L
    assert number(answer, "saturation") > 1000
    assert number(answer, "flux") > 0


def test_a_bottle_of_fresh_water_without_alkalinity_is_flagged_for_carbon_dioxide_alone(client: FlaskClient) -> None:
    more = {"water_mole_fraction": 900, "air_mole_fraction": 420, "headspace_start_mole_fraction": 420}
    carbon = client.get(address("flux", {**BOTTLE, "gas": "co2", **more}))
    nitrous = client.get(
        address("flux", {**BOTTLE, "gas": "n2o", "water_mole_fraction": 0.5, "air_mole_fraction": 0.3})
    )

    assert quality(carbon)[0][0] == 3
    assert "send alkalinity" in " ".join(quality(carbon)[0][1])
    assert quality(nitrous)[0][0] == 1


UNITS = [
    ("water_concentration", "13.5 umol/kg", "0.5941215 mg/kg"),
    ("water_concentration", "13.5 umol/L", "0.5941215 mg/L"),
    ("water_mole_fraction", "380 ppm", "0.038 %"),
    ("equilibrator_temperature", "66.02 degF", "18.9 degC"),
    ("equilibrator_pressure", "1010.1 mbar", "101.01 kPa"),
    ("barometer_height", "59.05511811 ft", "18 m"),
]


@pytest.mark.parametrize(("name", "one", "other"), UNITS)
def test_the_same_reading_in_two_units_is_the_same_flux(client: FlaskClient, name: str, one: str, other: str) -> None:
    base: dict[str, object] = {"water_mole_fraction": None} if name == "water_concentration" else {}
    told = [number(client.get(flux(**{**base, name: text})), "fugacity_difference") for text in (one, other)]

    assert told[0] == pytest.approx(told[1], rel=1e-6)


def test_a_table_of_instruments_is_corrected_row_by_row(client: FlaskClient) -> None:
    names = "SST,salinity,baro,Tequ,Pequ,wind,xco2"
    lines = ["18.4,35.1,1008.2,18.9,1010.1,7.5,380", "18.4,35.1,1008.2,,1010.1,7.5,380"]
    query = "gas=co2&water_temperature=@SST&air_pressure=@baro&barometer_height=18&equilibrator_temperature=@Tequ"
    query += "&equilibrator_pressure=@Pequ&wind_speed=@wind&wind_height=23&water_mole_fraction=@xco2"
    query += "&air_mole_fraction=419&skin_correction=donlon-2002"
    told = rows(client.post(f"/v1/flux?{query}", data="\n".join([names, *lines, ""])))
    alone = client.get(flux(**{**ALL, "subskin_temperature": None}))

    assert float(told[0]["flux [mmol m-2 d-1]"]) == number(alone, "flux")
    assert [row["quality_flag"] for row in told] == ["1", "9"]
    assert told[1]["quality_reason"] == "equilibrator_temperature (column Tequ) is missing"
