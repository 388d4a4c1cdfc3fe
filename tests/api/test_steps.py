"""The calculation in its order, with the value after each step, so that a disagreement is found in a minute."""

from typing import Any

import pytest
from flask.testing import FlaskClient

from tests.api.questions import FLUX, address, faults, flux, number, problem, quality, table

INSTRUMENTS = {
    "barometer_height": 18,
    "wind_height": 23,
    "equilibrator_temperature": 18.9,
    "equilibrator_pressure": 1010.1,
    "skin_correction": "donlon-2002",
    "surfactant_suppression": 10,
}
Step = dict[str, Any]


def steps(client: FlaskClient, **more: Any) -> list[Step]:
    found: list[Step] = client.get(flux(detail="steps", **more)).get_json()["steps"]
    return found


def value(told: list[Step], name: str, **at: str) -> float:
    """Return the value of a step, evaluated with some terms in the place of others."""
    (found,) = [each for each in told if each["name"] == name and each.get("evaluated_with", {}) == at]
    (number,) = found["values"]
    return float(number)


def test_every_input_stands_first_as_sent_or_assumed(client: FlaskClient) -> None:
    told = steps(client, **INSTRUMENTS)
    sent = [each["name"] for each in told if each["formula"] == "as sent"]
    assumed = [each["name"] for each in told if each["formula"] == "assumed"]
    length = len(sent) + len(assumed)

    assert set(sent) == {*FLUX, *INSTRUMENTS} - {"gas", "skin_correction"}
    assert assumed == ["ice_fraction"]
    assert {each["formula"] for each in told[:length]} == {"as sent", "assumed"}


def test_every_step_has_unit_formula_and_the_source_of_its_method(client: FlaskClient) -> None:
    for each in steps(client, **INSTRUMENTS, alkalinity=2310, chemical_enhancement="hoover-berkshire-1969"):
        assert {"name", "values", "unit", "method", "formula", "source", "doi"} <= set(each)
        assert each["unit"], each["name"]
        assert each["formula"], each["name"]
        assert each["source"] or each["method"] in (None, "upward"), each["name"]


def test_the_steps_come_in_the_order_in_which_each_needs_the_one_before(client: FlaskClient) -> None:
    names = [each["name"] for each in steps(client, **INSTRUMENTS)]
    order = [
        ["wind_speed_10m", "transfer_velocity_at_reference", "suppressed_transfer_velocity", "evasion", "flux"],
        ["partial_pressure_at_equilibrator", "fugacity_at_equilibrator", "temperature_factor", "fugacity_in_water"],
        ["wind_speed_10m", "skin_temperature", "partial_pressure_in_air", "fugacity_in_air", "invasion", "flux"],
        ["surface_pressure", "partial_pressure_in_air"],
    ]

    for chain in order:
        assert [names.index(name) for name in chain] == sorted(names.index(name) for name in chain)


def test_the_water_side_can_be_computed_again_by_hand_from_its_steps(client: FlaskClient) -> None:
    told = steps(client, **INSTRUMENTS)
    in_equilibrator = {"water_temperature": "equilibrator_temperature"}
    vapour = value(told, "water_vapour_pressure", **in_equilibrator)
    p = value(told, "water_mole_fraction") * (value(told, "equilibrator_pressure") - vapour) / 1013.25
    coefficient = value(
        told,
        "fugacity_coefficient",
        surface_pressure="equilibrator_pressure",
        partial_pressure_in_air="partial_pressure_at_equilibrator",
        **in_equilibrator,
    )

    assert value(told, "partial_pressure_at_equilibrator") == pytest.approx(p, rel=1e-14)
    assert value(told, "fugacity_at_equilibrator") == pytest.approx(p * coefficient, rel=1e-14)
    assert value(told, "fugacity_in_water") == pytest.approx(
        p * coefficient * value(told, "temperature_factor"), rel=1e-14
    )


def test_the_flux_can_be_computed_again_by_hand_from_its_steps(client: FlaskClient) -> None:
    told = steps(client, **INSTRUMENTS)
    k = value(told, "suppressed_transfer_velocity") * 0.24  # m d-1
    evasion = k * value(told, "solubility_per_litre") * value(told, "fugacity_in_water")
    at_skin = value(told, "solubility_per_litre", water_temperature="skin_temperature")
    invasion = k * at_skin * value(told, "fugacity_in_air")

    assert value(told, "evasion") == pytest.approx(evasion, rel=1e-14)
    assert value(told, "invasion") == pytest.approx(invasion, rel=1e-14)
    assert value(told, "flux") == pytest.approx(evasion - invasion, rel=1e-12)


def test_the_air_side_can_be_computed_again_by_hand_from_its_steps(client: FlaskClient) -> None:
    told = steps(client, **INSTRUMENTS)
    at_skin = {"water_temperature": "skin_temperature"}
    dry = value(told, "surface_pressure") - value(told, "water_vapour_pressure", **at_skin)
    names = [each["name"] for each in told]

    assert value(told, "partial_pressure_in_air") == pytest.approx(419.0 * dry / 1013.25, rel=1e-14)
    assert names.count("surface_pressure") == 1


def test_every_result_is_among_the_steps_and_is_what_it_is_without_them(client: FlaskClient) -> None:
    answer = client.get(flux(detail="steps", **INSTRUMENTS))
    told = answer.get_json()["steps"]
    plain = client.get(flux(**INSTRUMENTS))

    for name in set(plain.get_json()["results"]) - {"solubility"}:  # told per litre, under the name that says so
        assert value(told, name) == number(answer, name) == number(plain, name)
    assert value(told, "solubility_per_litre") == number(answer, "solubility")


def test_what_was_left_out_is_no_step(client: FlaskClient) -> None:
    with_it, without = steps(client, **INSTRUMENTS), steps(client)
    corrections = {"skin_temperature", "suppressed_transfer_velocity", "surface_pressure"}

    assert corrections <= {each["name"] for each in with_it}
    assert not corrections & {each["name"] for each in without}
    assert value(without, "temperature_factor") == 1.0


def test_a_branch_that_no_sample_took_is_not_told(client: FlaskClient) -> None:
    """From salinity 20 the equilibrator's temperature is corrected without the carbonate system."""
    inputs = {"equilibrator_temperature": 18.9, "alkalinity": "2310;1500"}
    sea = steps(client, **{**inputs, "alkalinity": 2310})
    both = steps(client, **inputs, salinity="35.1;8")

    assert not [each["name"] for each in sea if each["values"] == [None]]
    assert "hydrogen_ion_by_carbon" not in [each["name"] for each in sea]
    assert [each["values"][0] for each in both if each["name"] == "fugacity_by_carbon"] == [None]
    assert all(each["values"][1] for each in both if each["name"] == "fugacity_by_carbon")


def test_a_bad_sample_has_no_steps_and_spoils_none(client: FlaskClient) -> None:
    told = steps(client, water_temperature="18.4;99")
    by_name = {each["name"]: each["values"] for each in told}

    assert all(len(each["values"]) in (1, 2) for each in told)
    assert by_name["flux"] == [value(steps(client), "flux"), None]


def test_a_request_without_any_good_sample_still_tells_its_steps(client: FlaskClient) -> None:
    assert "flux" in [each["name"] for each in steps(client, water_temperature=99)]


def test_every_parameterisation_tells_its_own_steps(client: FlaskClient) -> None:
    names = ["wanninkhof-2014", "nightingale-2000"]
    answer = client.get(flux(detail="steps", parameterisation=";".join(names))).get_json()

    assert "steps" not in answer
    for name in names:
        own = answer["by_parameterisation"][name]
        assert [each["method"] for each in own["steps"] if each["name"] == "transfer_velocity_at_reference"] == [name]
        assert value(own["steps"], "flux") == own["results"]["flux"]["values"][0]


@pytest.mark.parametrize("form", ["csv", "number"])
def test_steps_are_told_in_json_alone(client: FlaskClient, form: str) -> None:
    answer = client.get(flux(detail="steps", form=form))

    assert faults(answer) == [("unknown_option", "detail")]
    assert "send form=json" in problem(answer)["errors"][0]["reason"]


def test_a_table_tells_its_steps_in_json(client: FlaskClient) -> None:
    refused = client.post("/v1/flux?gas=co2&detail=steps", data=table())
    answer = client.post("/v1/flux?gas=co2&detail=steps&form=json", data=table())
    told = {each["name"]: each["values"] for each in answer.get_json()["steps"]}

    assert faults(refused) == [("unknown_option", "detail")]
    assert [flag for flag, _ in quality(answer)] == [1, 1]
    assert told["flux"] == answer.get_json()["results"]["flux"]["values"]


def test_the_carbonate_system_and_the_wind_show_their_steps_too(client: FlaskClient) -> None:
    pair = {"water_mole_fraction": None, "alkalinity": 2310, "dissolved_inorganic_carbon": 2050}
    carbonate = {each["name"] for each in steps(client, **pair)}
    ship: dict[str, Any] = {"apparent_wind_speed": 15, "apparent_wind_direction": 0, "heading": 90}
    ship |= {"course_over_ground": 90, "speed_over_ground": 5, "detail": "steps"}
    wind = client.get(address("true-wind", ship)).get_json()["steps"]

    assert {
        "carbonic_acid_constant",
        "boric_acid_constant",
        "hydrogen_ion_by_carbon",
        "fugacity_by_carbon",
    } <= carbonate
    assert [each["name"] for each in wind][-3:] == [
        *("true_wind_northward", "true_wind_speed", "true_wind_direction"),
    ]
