"""The carbonate system as callers meet it: alkalinity with a partner as the water side, or beside another way."""

import pytest
from flask.testing import FlaskClient

from tests.api.questions import FLUX, address, faults, number, problem, quality, table, values

SEA = {name: value for name, value in FLUX.items() if name != "water_mole_fraction"}
PAIR = {"alkalinity": 2310, "dissolved_inorganic_carbon": 2050}
LAYER = {"gas": "co2", "salinity": 35, "given_transfer_velocity": 20, "mixed_layer_depth": 40}
DAYS_IN_A_MONTH = 365.2425 / 12


def told(client: FlaskClient, quantity: str, inputs: dict[str, object], **more: object) -> str:
    return str(problem(client.get(address(quantity, inputs, **more)))["errors"][0]["reason"])


def test_alkalinity_and_carbon_are_a_water_side(client: FlaskClient) -> None:
    answer = client.get(address("flux", SEA, **PAIR))
    same = client.get(address("flux", SEA, water_fugacity=number(answer, "fugacity_in_water")))

    assert quality(answer) == [(1, [])]
    assert 350 < number(answer, "fugacity_in_water") < 400
    assert number(answer, "flux") == number(same, "flux")
    assert set(answer.get_json()["methods"]) >= {"carbonate_constants", "total_boron", "boric_acid_constant"}
    assert {"carbonate_constants", "total_boron", "phosphate", "silicate"} <= set(answer.get_json()["assumed"])


def test_alkalinity_and_ph_are_a_water_side(client: FlaskClient) -> None:
    answer = client.get(address("flux", SEA, alkalinity=2310, ph=8.05))

    assert quality(answer) == [(1, [])]
    assert 350 < number(answer, "fugacity_in_water") < 450


@pytest.mark.parametrize("half", [{"dissolved_inorganic_carbon": 2050}, {"ph": 8.05}])
def test_half_a_pair_is_told_its_partner(client: FlaskClient, half: dict[str, float]) -> None:
    answer = client.get(address("flux", SEA, **half))

    assert faults(answer) == [("missing_input", "alkalinity")]
    assert f"is needed beside {next(iter(half))}" in told(client, "flux", SEA, **half)


def test_alkalinity_alone_is_told_what_else_to_send(client: FlaskClient) -> None:
    answer = client.get(address("flux", SEA, alkalinity=2310))

    assert faults(answer) == [("missing_input", "water_side")]
    assert "dissolved_inorganic_carbon with alkalinity" in told(client, "flux", SEA, alkalinity=2310)


TWICE = [
    {**PAIR, "water_fugacity": 400},
    {**PAIR, "ph": 8.05},
    {"alkalinity": 2310, "ph": 8.05, "water_partial_pressure": 400},
    {"alkalinity": "2.31 meq/L", "dissolved_inorganic_carbon": "2.05 mmol/L", "water_fugacity": 400},
]


@pytest.mark.parametrize("inputs", TWICE)
def test_a_pair_beside_another_way_is_refused(client: FlaskClient, inputs: dict[str, object]) -> None:
    assert faults(client.get(address("flux", SEA, **inputs)))[0][0] == "two_ways"


@pytest.mark.parametrize("beside", [{"alkalinity": 2310}, {"dissolved_inorganic_carbon": 2050}, {"ph": 8.05}])
def test_one_of_them_beside_another_way_serves_buffering(client: FlaskClient, beside: dict[str, float]) -> None:
    plain = client.get(address("flux", SEA, water_fugacity=390, pick="all"))
    with_it = client.get(address("flux", SEA, water_fugacity=390, pick="all", **beside))

    assert values(plain, "flux") == values(with_it, "flux")
    assert "revelle_factor" not in plain.get_json()["results"]
    assert 9 < number(with_it, "revelle_factor") < 12


def test_the_unit_of_alkalinity_may_count_charges_and_litres(client: FlaskClient) -> None:
    pick = "fugacity_in_water;density"
    per_litre = client.get(
        address("flux", SEA, alkalinity="2.31 meq/L", dissolved_inorganic_carbon="2050 umol/L", pick=pick)
    )
    density = number(per_litre, "density") / 1000
    per_kilogram = client.get(
        address("flux", SEA, alkalinity=2310 / density, dissolved_inorganic_carbon=2050 / density, pick=pick)
    )

    assert number(per_litre, "fugacity_in_water") == pytest.approx(number(per_kilogram, "fugacity_in_water"), rel=1e-12)


@pytest.mark.parametrize(("name", "text"), [("alkalinity", "115 mg/L"), ("dissolved_inorganic_carbon", "24 mg/L")])
def test_a_mass_of_something_unsaid_is_refused(client: FlaskClient, name: str, text: str) -> None:
    assert faults(client.get(address("flux", SEA, **{**PAIR, name: text}))) == [("unit", name)]


NONE = [
    ({"alkalinity": 1, "ph": 9}, "flux"),
    ({"dissolved_inorganic_carbon": 2, "water_fugacity": 400}, "revelle_factor"),
]


@pytest.mark.parametrize(("inputs", "pick"), NONE)
def test_a_water_that_cannot_be_is_bad_with_a_reason(client: FlaskClient, inputs: dict[str, float], pick: str) -> None:
    answer = client.get(address("flux", SEA, **inputs, pick=pick))
    flag, reasons = quality(answer)[0]

    assert values(answer, pick) == [None]
    assert flag == 4
    assert "the carbonate system has no solution here" in reasons[0]


def test_a_missing_alkalinity_is_missing_and_no_more(client: FlaskClient) -> None:
    answer = client.get(address("flux", SEA, alkalinity="2310;NaN", dissolved_inorganic_carbon=2050))

    assert quality(answer) == [(1, []), (9, ["alkalinity is missing"])]


def test_other_gases_take_no_notice_of_carbon(client: FlaskClient) -> None:
    names = ["water_temperature", "salinity", "wind_speed", "water_saturation", *PAIR]
    rows: list[list[object]] = [[18.4, 35.1, 7.5, 98.0, 2310, 2050]]
    answer = client.post("/v1/flux?gas=o2", data=table(rows, names))

    assert answer.status_code == 200
    assert faults(client.get(address("flux", {**SEA, "gas": "o2", "air_mole_fraction": 209460}, **PAIR))) == [
        ("missing_input", "water_side")
    ]


def test_carbon_dioxide_needs_alkalinity_to_equilibrate(client: FlaskClient) -> None:
    inputs = {**LAYER, "water_temperature": 18, "water_fugacity": 400}

    assert faults(client.get(address("equilibration", inputs))) == [("missing_input", "alkalinity")]
    assert "0 for pure fresh water" in told(client, "equilibration", inputs)


def test_pure_fresh_water_stores_little_more_than_carbon_dioxide(client: FlaskClient) -> None:
    inputs = {**LAYER, "water_temperature": 25, "salinity": 0, "alkalinity": 0, "water_fugacity": 400}

    assert number(client.get(address("equilibration", inputs)), "storage_ratio") == pytest.approx(1.09, abs=0.005)


def test_the_sea_takes_two_to_seven_months(client: FlaskClient) -> None:
    times = {}
    for temperature in (5, 15, 25, 29):
        inputs = {**LAYER, "water_temperature": temperature, "alkalinity": 2300, "water_fugacity": 370}
        times[temperature] = number(client.get(address("equilibration", inputs)), "equilibration_time")
    inert = number(
        client.get(address("equilibration", {**LAYER, "gas": "ar", "water_temperature": 15})), "equilibration_time"
    )

    assert inert == pytest.approx(8.3, abs=0.05)
    assert list(times.values()) == sorted(times.values())
    assert 2 * DAYS_IN_A_MONTH < times[5] < 2.5 * DAYS_IN_A_MONTH
    assert 5 * DAYS_IN_A_MONTH < times[29] < 7 * DAYS_IN_A_MONTH


def test_the_equilibration_of_a_pair_needs_no_fugacity(client: FlaskClient) -> None:
    answer = client.get(address("equilibration", {**LAYER, "water_temperature": 10, **PAIR}, pick="all"))

    assert quality(answer) == [(1, [])]
    assert number(answer, "storage_ratio") * number(answer, "revelle_factor") > 50


def test_the_carbonate_correction_is_chosen_by_name_and_needs_alkalinity(client: FlaskClient) -> None:
    inputs = {**FLUX, "equilibrator_temperature": 19.4, "temperature_correction": "carbonate"}
    answer = client.get(address("flux", inputs, alkalinity=2310))
    takahashi = client.get(address("flux", {**inputs, "temperature_correction": "takahashi-1993"}))

    assert quality(answer) == [(1, [])]
    assert number(answer, "fugacity_in_water") == pytest.approx(number(takahashi, "fugacity_in_water"), rel=0.002)
    assert faults(client.get(address("flux", inputs))) == [("missing_input", "alkalinity")]


def test_brackish_water_with_alkalinity_is_corrected_without_a_flag(client: FlaskClient) -> None:
    inputs = {**FLUX, "salinity": 8, "equilibrator_temperature": 19.4}
    without, with_it = (client.get(address("flux", {**inputs, **more})) for more in ({}, {"alkalinity": 1500}))

    assert quality(without)[0][0] == 3
    assert "send alkalinity" in quality(without)[0][1][0]
    assert quality(with_it) == [(1, [])]
    assert number(with_it, "fugacity_in_water") < number(without, "fugacity_in_water")


def test_polar_sea_water_with_alkalinity_is_not_held_to_constants_it_does_not_use(client: FlaskClient) -> None:
    inputs = {**FLUX, "water_temperature": -1.2, "equilibrator_temperature": -0.4, "alkalinity": 2310}
    by_default = client.get(address("flux", inputs))
    by_carbonate = client.get(address("flux", {**inputs, "temperature_correction": "carbonate"}))

    assert not [reason for _, reasons in quality(by_default) for reason in reasons if "lueker" in reason]
    assert [reason for _, reasons in quality(by_carbonate) for reason in reasons if "lueker-2000" in reason]


def test_the_constants_can_be_chosen(client: FlaskClient) -> None:
    lake = {**SEA, "salinity": 0.3, "water": "lake", "parameterisation": "cole-caraco-1998"}
    inputs = {**lake, "alkalinity": 1500, "dissolved_inorganic_carbon": 1550}
    fresh = client.get(address("flux", inputs))
    brackish = client.get(address("flux", inputs, carbonate_constants="millero-2010"))

    assert fresh.get_json()["methods"]["carbonate_constants"][0]["name"] == "by-salinity"
    assert number(brackish, "fugacity_in_water") > number(fresh, "fugacity_in_water")
    assert "range of millero-2010" in quality(brackish)[0][1][0]


def test_a_bottle_with_alkalinity_is_balanced_over_carbon(client: FlaskClient) -> None:
    inputs = {
        **FLUX,
        "salinity": 0.1,
        "water": "lake",
        "parameterisation": "cole-caraco-1998",
        "water_mole_fraction": 1500,
        "equilibrator_temperature": 21.0,
        "equilibrator_pressure": 990,
        "headspace_ratio": 0.5,
    }
    without, with_it = (client.get(address("flux", {**inputs, **more})) for more in ({}, {"alkalinity": 1500}))

    assert quality(without)[0][0] == 3
    assert quality(with_it) == [(1, [])]
    assert number(with_it, "fugacity_in_water") != number(without, "fugacity_in_water")


def test_many_samples_give_what_each_gives_alone(client: FlaskClient) -> None:
    alkalinity, carbon = [2310.0, 50.0, 0.0, 1500.0], [2050.0, 80.0, 20.0, 1480.0]
    salinity = [35.1, 0.0, 0.0, 12.0]
    together = client.get(
        address(
            "flux", {**SEA, "salinity": salinity}, alkalinity=alkalinity, dissolved_inorganic_carbon=carbon, pick="all"
        )
    )
    alone = [
        client.get(address("flux", {**SEA, "salinity": S}, alkalinity=A, dissolved_inorganic_carbon=C, pick="all"))
        for S, A, C in zip(salinity, alkalinity, carbon, strict=True)
    ]

    for name in ("flux", "fugacity_in_water", "revelle_factor"):
        assert values(together, name) == [number(each, name) for each in alone]
