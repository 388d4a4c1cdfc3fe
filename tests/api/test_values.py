"""Every way of sending a value gives the same number, and everything that is no value is refused."""

import json
from typing import Any

import pytest
from flask.testing import FlaskClient

from tests.api.questions import FLUX, body, faults, flux, problem, quality, values

KNOT = 1852 / 3600  # m s-1, by definition

# One value in the unit of the input, as text: in a query, a form or a bracketed header.
TEXTS = ["7.5", "+7.5", "7.50", "75e-1", "0.75e1", "0.75E1", "7.5 m s-1", "7.5 m/s", "7.5m/s", "750 cm s-1", " 7.5 "]


@pytest.mark.parametrize("text", TEXTS)
def test_a_number_is_the_same_however_it_is_written(client: FlaskClient, text: str) -> None:
    written = values(client.get(flux(wind_speed=text)), "wind_speed_10m")

    assert written == pytest.approx(values(client.get(flux()), "wind_speed_10m"), rel=1e-15)


NOT_NUMBERS = ["calm", "1_0", "0x10", "inf", "-inf", "Infinity", "٧", "7.5.1", "--7", "7,5", "1e", "TRUE", "12:30"]


@pytest.mark.parametrize("text", NOT_NUMBERS)
def test_text_that_is_no_number_is_refused(client: FlaskClient, text: str) -> None:
    told = problem(client.get(flux(wind_speed=text)))
    (error,) = told["errors"]

    assert error["name"] == "wind_speed"
    assert error["code"] in ("not_a_number", "decimal_comma", "unit")
    assert error["allowed"]


MISSING_TEXTS = ["", "NA", "na", "NaN", "nan", "NAN", "null", "NULL", ";", "NA m s-1"]


@pytest.mark.parametrize("text", MISSING_TEXTS)
def test_a_missing_mark_in_a_query_is_a_missing_sample(client: FlaskClient, text: str) -> None:
    answer = client.get(flux(wind_speed=text))

    assert values(answer, "flux") == [None]
    assert quality(answer) == [(9, ["wind_speed is missing"])]


MISSING_VALUES = [
    None,
    "NA",
    "NaN",
    "nan",
    "null",
    "",
    [None],
    ["NA"],
    {"values": None},
    {"values": ["NaN"], "unit": "kn"},
]


@pytest.mark.parametrize("value", MISSING_VALUES, ids=str)
def test_a_missing_mark_in_json_is_a_missing_sample(client: FlaskClient, value: Any) -> None:
    answer = client.post("/v1/flux", data=body(wind_speed=value))

    assert quality(answer) == [(9, ["wind_speed is missing"])]


LISTS = ["7;8;9", "7;8;9;", "7; 8; 9", "7;8;9 m s-1", "7;8;9 m s-1;"]


@pytest.mark.parametrize("text", LISTS)
def test_a_list_is_parted_by_semicolons_of_which_one_may_trail(client: FlaskClient, text: str) -> None:
    answer = client.get(flux(wind_speed=text, wind_height=None))

    assert values(answer, "wind_speed_10m") == [7, 8, 9]


def test_a_gap_in_a_list_is_a_missing_sample(client: FlaskClient) -> None:
    answer = client.get(flux(wind_speed="7;;9", wind_height=None))

    assert values(answer, "wind_speed_10m") == [7, None, 9]


WRONG_LISTS = [("7 m s-1;8;9", 1), ("7;8 kn;9", 2), ("7;8;calm", 3)]


@pytest.mark.parametrize(("text", "sample"), WRONG_LISTS)
def test_in_a_list_every_entry_is_a_number_and_the_unit_stands_last(
    client: FlaskClient, text: str, sample: int
) -> None:
    told = problem(client.get(flux(wind_speed=text)))

    assert [(error["code"], error["sample"]) for error in told["errors"]] == [("not_a_number", sample)]


# One wind of 15 knots, as JSON has it.
IN_KNOTS = ["15 kn", "15 knots", "15.0 kt", {"values": [15], "unit": "kn"}, {"values": 15, "unit": "knots"}]


@pytest.mark.parametrize("value", IN_KNOTS, ids=str)
def test_a_unit_in_json_stands_in_a_string_or_beside_the_values(client: FlaskClient, value: Any) -> None:
    answer = client.post("/v1/flux", data=body(wind_speed=value, wind_height=10))

    assert values(answer, "wind_speed_10m") == [pytest.approx(15 * KNOT, rel=1e-15)]


NUMBERS = [7, 7.0, [7], [7.0], {"values": [7]}, {"values": 7}]


@pytest.mark.parametrize("value", NUMBERS, ids=str)
def test_a_number_and_an_array_of_one_are_the_same(client: FlaskClient, value: Any) -> None:
    answer = client.post("/v1/flux", data=body(wind_speed=value, wind_height=10))

    assert values(answer, "wind_speed_10m") == [7.0]


# What is no value in JSON, and the code that says so.
WRONG_JSON = [
    ("7", "not_a_number"),
    ("calm", "not_a_number"),
    (True, "not_a_number"),
    ([7, False], "not_a_number"),
    ([7, "8"], "not_a_number"),
    ([7, "8 kn"], "not_a_number"),
    ([[7]], "not_a_number"),
    ([{"values": 7}], "not_a_number"),
    ([], "length"),
    ({}, "not_a_number"),
    ({"value": 7}, "not_a_number"),
    ({"values": [7], "unit": 3}, "unit"),
    ({"values": [7], "units": "kn"}, "not_a_number"),
    ({"values": "7 kn"}, "not_a_number"),
    ({"values": {"values": 7}}, "not_a_number"),
    ("7 furlongs", "unit"),
    ("7 degC", "unit"),
    ({"values": [7], "unit": ""}, "unit"),
]


@pytest.mark.parametrize(("value", "code"), WRONG_JSON, ids=str)
def test_json_that_is_no_value_is_refused(client: FlaskClient, value: Any, code: str) -> None:
    assert faults(client.post("/v1/flux", data=body(wind_speed=value))) == [(code, "wind_speed")]


def test_an_object_that_is_no_value_is_refused_with_the_form_it_should_have(client: FlaskClient) -> None:
    told = problem(client.post("/v1/flux", data=body(wind_speed={"value": 7})))

    assert '"values"' in told["detail"]


def test_a_bad_element_is_named_by_its_place(client: FlaskClient) -> None:
    told = problem(client.post("/v1/flux", data=body(wind_speed=[7, None, "gust", 8, "lull"])))

    assert [(error["sample"], error["reason"]) for error in told["errors"]] == [
        (3, "'gust' is not a number"),
        (5, "'lull' is not a number"),
    ]


def test_arrays_have_one_length_but_for_those_of_one(client: FlaskClient) -> None:
    fits = client.post("/v1/flux", data=body(wind_speed=[7, 8, 9], salinity=[35], water_temperature=[18, 19, 20]))
    short = problem(client.post("/v1/flux", data=body(wind_speed=[7, 8], salinity=[35, 35, 35])))

    assert fits.get_json()["samples"] == 3
    assert [(error["code"], error["name"]) for error in short["errors"]] == [("length", "wind_speed")]
    assert "1 or 3" in short["errors"][0]["allowed"]


def test_a_decimal_comma_is_refused_with_its_cures(client: FlaskClient) -> None:
    told = problem(client.get(flux(wind_speed="7,5")))

    assert told["errors"][0]["code"] == "decimal_comma"
    assert "decimal=comma" in told["detail"]
    assert ";" in told["detail"]


def test_decimal_commas_are_read_where_they_are_announced(client: FlaskClient) -> None:
    commas = {name: str(value).replace(".", ",") for name, value in FLUX.items()}
    answer = client.get(flux(**commas, decimal="comma"))

    assert answer.data == client.get(flux()).data


POINTS = ["7.5", "1.234,5"]


@pytest.mark.parametrize("text", POINTS)
def test_a_decimal_point_among_decimal_commas_is_refused_not_guessed(client: FlaskClient, text: str) -> None:
    told = problem(client.get(flux(**{**FLUX, "air_pressure": "1008,2"}, decimal="comma") + f"&elevation={text}"))

    assert told["errors"][0]["code"] == "decimal_comma"


def test_a_plus_that_became_a_blank_is_explained(client: FlaskClient) -> None:
    told = problem(client.get("/v1/schmidt-number?gas=co2&salinity=35&water_temperature=1.8e+1"))

    assert "%2B" in told["detail"]


TEMPERATURES = ["18.4 degC", "18.4 °C", "291.55 K", "65.12 degF", "18.4 celsius"]


@pytest.mark.parametrize("text", TEMPERATURES)
def test_temperatures_have_a_zero_point_of_their_own(client: FlaskClient, text: str) -> None:
    answer = client.get(flux(water_temperature=text))

    assert values(answer, "schmidt_number") == pytest.approx(values(client.get(flux()), "schmidt_number"), rel=1e-13)


GASES = ["co2", "CO2", "Co 2", "c-o-2", " co2 "]


@pytest.mark.parametrize("gas", GASES)
def test_case_blanks_and_hyphens_of_a_gas_do_not_matter(client: FlaskClient, gas: str) -> None:
    assert client.get(flux(gas=gas)).data == client.get(flux()).data


WRONG_GASES = ["co3", "carbon dioxide", "", "co2;o2"]


@pytest.mark.parametrize("gas", WRONG_GASES)
def test_an_unknown_gas_is_refused_with_those_known(client: FlaskClient, gas: str) -> None:
    told = problem(client.get(flux(gas=gas)))

    assert [(error["code"], error["name"]) for error in told["errors"]] == [("unknown_option", "gas")]
    assert "co2" in told["errors"][0]["allowed"]


# In JSON, what stands once for the request is one word, or 0 and 1 as numbers.
WRONG_OPTIONS: list[tuple[str, Any]] = [
    ("gas", ["co2"]),
    ("gas", None),
    ("water", 5),
    ("strict", True),
    ("strict", 2),
    ("pick", [1]),
    ("pick", []),
    ("pick", ["flux", "flux"]),
    ("parameterisation", {}),
    ("parameterisation", None),
    ("unit", ["mol m-2 d-1"]),
    ("unit.flux", 1),
    ("missing", None),
    ("decimal", "dot"),
]


@pytest.mark.parametrize(("name", "value"), WRONG_OPTIONS, ids=str)
def test_an_option_that_is_no_word_is_refused(client: FlaskClient, name: str, value: Any) -> None:
    assert [each for _, each in faults(client.post("/v1/flux", data=body(**{name: value})))] == [name]


@pytest.mark.parametrize("value", ["1", 1])
def test_a_switch_in_json_is_text_or_number(client: FlaskClient, value: Any) -> None:
    assert client.post("/v1/flux", data=body(strict=value)).status_code == 200
    assert (
        problem(client.post("/v1/flux", data=body(strict=value, wind_speed=None)))["errors"][0]["code"] == "bad_sample"
    )


EMPTY_OPTIONS = ["parameterisation", "pick", "water", "strict", "positive"]


@pytest.mark.parametrize("name", EMPTY_OPTIONS)
def test_an_option_left_empty_is_refused_rather_than_taken_for_its_default(client: FlaskClient, name: str) -> None:
    assert faults(client.get(flux(**{name: ""}))) == [("unknown_option", name)]


def test_a_value_given_twice_is_refused_in_whatever_way(client: FlaskClient) -> None:
    assert faults(client.get(flux() + "&salinity=35")) == [("repeated_name", "salinity")]
    assert faults(client.post("/v1/flux?salinity=35", data=body())) == [("repeated_name", "salinity")]
    assert faults(client.post("/v1/flux", data=body()[:-1] + b', "salinity": 35}')) == [("repeated_name", "salinity")]
    assert faults(client.post("/v1/flux?salinity=35", data={"salinity": "35", "gas": "co2"})) == [
        ("repeated_name", "salinity")
    ]
    form = [("salinity", "35"), ("salinity", "34")]
    assert faults(client.post("/v1/flux", data="&".join("=".join(pair) for pair in form))) == [
        ("repeated_name", "salinity")
    ]


def test_a_query_beside_a_body_holds_for_every_sample(client: FlaskClient) -> None:
    rest = {name: value for name, value in FLUX.items() if name not in ("gas", "salinity")}
    rest["wind_speed"] = [7, 8]
    answer = client.post("/v1/flux?gas=co2&salinity=35.1", data=json.dumps(rest))

    assert values(answer, "flux") == values(client.get(flux(wind_speed="7;8")), "flux")
