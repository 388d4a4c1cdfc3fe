"""The true wind over the wire, and from there into the flux."""

import pytest
from flask.testing import FlaskClient

from tests.api.questions import address, faults, number, problem, quality, rows, values

SHIP = {"apparent_wind_speed": 15, "apparent_wind_direction": 0, "heading": 90}
SHIP |= {"course_over_ground": 90, "speed_over_ground": 5}
CURRENT = {"current_speed": 1, "current_direction": 270}
LOG = """time,apparent_wind_speed [kn],apparent_wind_direction,heading,cog,sog [kn],SST,salinity,xsea
2031-05-04T00:00:00Z,22.1,34,210,214,10.5,18.4,35.1,381
2031-05-04T00:01:00Z,21.7,,210,214,10.5,18.4,35.1,381
2031-05-04T00:02:00Z,22.6,36,211,214,10.4,18.4,35.1,380
"""
MOTION = "course_over_ground=@cog&speed_over_ground=@sog"


def test_a_head_wind_loses_the_ships_speed(client: FlaskClient) -> None:
    answer = client.get(address("true-wind", SHIP))

    assert number(answer, "true_wind_speed") == pytest.approx(10.0, abs=1e-12)
    assert number(answer, "true_wind_direction") == pytest.approx(90.0, abs=1e-12)
    assert quality(answer) == [(1, [])]
    assert list(answer.get_json()["results"]) == ["true_wind_speed", "true_wind_direction"]
    assert answer.get_json()["assumed"] == {"anemometer_zero_line": {"value": 0.0, "unit": "degree"}}
    assert "gas" not in answer.get_json()


def test_the_source_and_the_standard_names_are_told(client: FlaskClient) -> None:
    told = client.get(address("true-wind", SHIP)).get_json()

    assert told["methods"]["true_wind_eastward"][0]["source"].startswith("Smith et al. (1999)")
    assert told["results"]["true_wind_speed"]["standard_name"] == "wind_speed"
    assert told["results"]["true_wind_direction"]["standard_name"] == "wind_from_direction"


def test_a_current_that_is_sent_brings_the_wind_over_the_water(client: FlaskClient) -> None:
    answer = client.get(address("true-wind", SHIP, **CURRENT))

    assert number(answer, "true_wind_speed") == pytest.approx(10.0, abs=1e-12)
    assert number(answer, "wind_speed_over_water") == pytest.approx(9.0, abs=1e-12)  # it flows with the wind
    assert number(answer, "wind_direction_over_water") == pytest.approx(90.0, abs=1e-12)


def test_the_vector_is_there_to_be_averaged(client: FlaskClient) -> None:
    answer = client.get(address("true-wind", SHIP, pick="all"))

    assert number(answer, "true_wind_eastward") == pytest.approx(-10.0, abs=1e-12)
    assert number(answer, "true_wind_northward") == pytest.approx(0.0, abs=1e-12)


@pytest.mark.parametrize("absent", ["heading", "course_over_ground", "speed_over_ground", "apparent_wind_direction"])
def test_what_is_missing_is_told_with_its_convention(client: FlaskClient, absent: str) -> None:
    answer = client.get(address("true-wind", {name: value for name, value in SHIP.items() if name != absent}))

    assert faults(answer) == [("missing_input", absent)]
    assert problem(answer)["errors"][0]["reason"].startswith("is needed: ")


@pytest.mark.parametrize("half", CURRENT)
def test_half_a_current_is_refused(client: FlaskClient, half: str) -> None:
    other = next(name for name in CURRENT if name != half)
    answer = client.get(address("true-wind", SHIP, **{half: CURRENT[half]}))

    assert faults(answer) == [("unused", half)]
    assert f"only beside {other}" in problem(answer)["errors"][0]["reason"]


def test_a_gas_is_not_of_a_wind(client: FlaskClient) -> None:
    assert faults(client.get(address("true-wind", SHIP, gas="co2"))) == [("unknown_name", "gas")]


def test_knots_radians_and_headings_beyond_a_turn_are_read(client: FlaskClient) -> None:
    more = {"apparent_wind_speed": "29.157667 kn", "speed_over_ground": "18 km/h", "heading": "1.5707963268 rad"}
    answer = client.get(address("true-wind", {**SHIP, **more}))
    beyond = client.get(address("true-wind", {**SHIP, "heading": 450, "course_over_ground": -270}))

    assert number(answer, "true_wind_speed") == pytest.approx(10.0, abs=1e-6)
    assert number(beyond, "true_wind_speed") == pytest.approx(10.0, abs=1e-12)


def test_an_impossible_direction_is_bad(client: FlaskClient) -> None:
    answer = client.get(address("true-wind", SHIP, heading="90;999"))

    assert values(answer, "true_wind_speed")[1] is None
    assert quality(answer)[1] == (4, ["heading 999 is impossible: -360 to 720 degree"])


def test_the_answered_table_feeds_the_flux(client: FlaskClient) -> None:
    wind = client.post(f"/v1/true-wind?{MOTION}", data=LOG)
    query = "gas=co2&water_temperature=@SST&wind_speed=@true_wind_speed&wind_height=23&water_mole_fraction=@xsea"
    answer = client.post(
        f"/v1/flux?{query}&air_mole_fraction=419&ignore=quality_flag;quality_reason", data=wind.get_data()
    )
    told = rows(answer)
    alone = client.get(
        address(
            "flux",
            {"gas": "co2", "water_temperature": 18.4, "salinity": 35.1, "water_mole_fraction": 381},
            wind_speed=rows(wind)[0]["true_wind_speed [m s-1]"],
            wind_height=23,
            air_mole_fraction=419,
        )
    )

    assert [row["quality_flag"] for row in told] == ["1", "9", "1"]
    assert told[1]["quality_reason"] == "wind_speed (column true_wind_speed) is missing"
    assert float(told[0]["flux [mmol m-2 d-1]"]) == number(alone, "flux")


def test_without_ignoring_the_flags_of_the_first_answer_the_second_says_how(client: FlaskClient) -> None:
    wind = client.post(f"/v1/true-wind?{MOTION}", data=LOG)
    query = "gas=co2&water_temperature=@SST&wind_speed=@true_wind_speed&water_mole_fraction=@xsea&air_mole_fraction=419"
    answer = client.post(f"/v1/flux?{query}", data=wind.get_data())

    assert faults(answer) == [("collision", "quality_flag"), ("collision", "quality_reason")]
    assert "ignore=quality_flag" in problem(answer)["errors"][0]["reason"]
