"""The flux: what is answered, and what every input and option refuses."""

import pytest
from flask.testing import FlaskClient

from schemas.options import Choice
from schemas.vocabulary import quantity_inputs, request_fields
from service.physics.declare import QUANTITIES
from tests.api.questions import FLUX, address, body, faults, flux, number, problem, quality, values

INPUTS = quantity_inputs(QUANTITIES["flux"])
CHOICES = [name for name, field in request_fields(QUANTITIES["flux"]).items() if isinstance(field, Choice)]
MAIN = [
    "flux",
    "evasion",
    "invasion",
    "transfer_velocity",
    "schmidt_number",
    "wind_speed_10m",
    "solubility",
    "fugacity_in_water",
    "fugacity_in_air",
    "fugacity_difference",
]


def test_the_flux_is_three_metres_a_day_times_solubility_times_the_difference_of_fugacity(client: FlaskClient) -> None:
    # K0 per litre is 0.02839 mol kg-1 atm-1 (Weiss 1974; 0.1 %) times 1.02334 kg L-1, the density of sea water at
    # 25 degC and salinity 35 (TEOS-10); 12.5 cm h-1 are 3 m d-1.
    inputs = {"gas": "co2", "water_temperature": 25, "salinity": 35, "given_transfer_velocity": 12.5}
    answer = client.get(address("flux", inputs, water_fugacity=300, air_fugacity=400))

    assert number(answer, "flux") == pytest.approx(3.0 * 0.02839 * 1.02334 * (300 - 400), rel=1.5e-3)


def test_the_main_results_come_in_the_order_of_the_vocabulary(client: FlaskClient) -> None:
    answer = client.get(flux()).get_json()

    assert list(answer["results"]) == MAIN
    assert answer["results"]["flux"]["unit"] == "mmol m-2 d-1"
    assert answer["results"]["flux"]["standard_name"] == "surface_upward_mole_flux_of_carbon_dioxide"
    assert answer["results"]["solubility"]["unit"] == "mol L-1 atm-1"
    assert (answer["quantity"], answer["samples"], answer["service"]["name"]) == ("flux", 1, "catspaw")


def test_gas_leaves_water_where_its_fugacity_is_higher_there(client: FlaskClient) -> None:
    out = client.get(flux(water_mole_fraction=500))
    inwards = client.get(flux(water_mole_fraction=300))

    assert number(out, "flux") > 0 > number(inwards, "flux")
    assert number(inwards, "fugacity_difference") < 0


def test_downward_turns_the_sign_of_the_flux_alone(client: FlaskClient) -> None:
    upward, downward = client.get(flux()), client.get(flux(positive="downward"))

    assert number(downward, "flux") == -number(upward, "flux")
    assert [number(downward, name) for name in MAIN[1:]] == [number(upward, name) for name in MAIN[1:]]
    assert "downward" in downward.get_json()["results"]["flux"]["standard_name"]


def test_ice_lets_nothing_through_where_it_covers_all(client: FlaskClient) -> None:
    answer = client.get(flux(ice_fraction="0;0.5;1"))
    whole, half, none = values(answer, "evasion")

    assert whole is not None
    assert half == pytest.approx(whole / 2, rel=1e-12)
    assert none == 0


def test_answers_name_their_methods_with_doi_and_what_was_assumed(client: FlaskClient) -> None:
    answer = client.get(flux()).get_json()

    (method,) = answer["methods"]["transfer_velocity"]
    assert method == {"name": "wanninkhof-2014", "source": "Wanninkhof (2014)", "doi": "10.4319/lom.2014.12.351"}
    assert answer["assumed"]["ice_fraction"] == {"value": 0.0, "unit": "1"}
    assert answer["assumed"]["parameterisation"] == {"value": "wanninkhof-2014"}
    assert "air_pressure" not in answer["assumed"]


def test_a_brief_answer_has_neither_methods_nor_assumptions(client: FlaskClient) -> None:
    brief = client.get(flux(detail="brief"))

    assert not {"methods", "assumed"} & set(brief.get_json())
    assert values(brief, "flux") == values(client.get(flux()), "flux")


def test_results_come_as_picked_and_in_that_order(client: FlaskClient) -> None:
    answer = client.get(flux(pick="saturation;flux"))

    assert list(answer.get_json()["results"]) == ["saturation", "flux"]


def test_pick_all_adds_the_less_usual_results_to_the_main_ones(client: FlaskClient) -> None:
    names = list(client.get(flux(pick="all")).get_json()["results"])

    assert names[: len(MAIN)] == MAIN
    assert {"saturation", "concentration_in_water", "equilibrium_concentration", "density"} <= set(names)


def test_units_are_chosen_for_the_first_result_and_for_others_by_name(client: FlaskClient) -> None:
    plain = client.get(flux())
    answer = client.get(flux(**{"unit": "mol m-2 yr-1", "unit.solubility": "mol/(m³ Pa)"}))

    assert number(answer, "flux") == pytest.approx(number(plain, "flux") * 365.2425 / 1000, rel=1e-14)
    assert number(answer, "solubility") == pytest.approx(number(plain, "solubility") * 1000 / 101325, rel=1e-14)
    assert answer.get_json()["results"]["solubility"]["unit"] == "mol m-3 Pa-1"


def test_a_mass_is_of_the_gas_or_of_its_element_and_says_which(client: FlaskClient) -> None:
    gas = client.get(flux(unit="g m-2 d-1"))
    element = client.get(flux(unit="g m-2 d-1", mass_as="element"))

    assert gas.get_json()["results"]["flux"]["mass_of"] == "CO2"
    assert element.get_json()["results"]["flux"]["mass_of"] == "C"
    # 12.011 and 44.009 g mol-1, to the digits of the standard atomic weights
    assert number(element, "flux") / number(gas, "flux") == pytest.approx(12.011 / 44.009, rel=1e-4)


def test_several_parameterisations_give_their_mean_and_spread(client: FlaskClient) -> None:
    names = ["wanninkhof-2014", "ho-2006", "nightingale-2000"]
    answer = client.get(flux(parameterisation=names))
    single = [number(client.get(flux(parameterisation=name)), "flux") for name in names]
    mean = sum(single) / 3
    spread = (sum((each - mean) ** 2 for each in single) / 2) ** 0.5

    assert number(answer, "flux") == pytest.approx(mean, rel=1e-14)
    assert answer.get_json()["results"]["flux"]["spread"] == [pytest.approx(spread, rel=1e-9)]
    inner = answer.get_json()["by_parameterisation"]
    assert [inner[name]["results"]["flux"]["values"][0] for name in names] == single
    assert [inner[name]["quality"]["flags"] for name in names] == [[1], [1], [1]]


def test_an_array_of_parameterisations_is_the_same_as_one_with_semicolons(client: FlaskClient) -> None:
    names = ["ho-2006", "wanninkhof-2014"]

    assert (
        client.post("/v1/flux", data=body(parameterisation=names)).data == client.get(flux(parameterisation=names)).data
    )


def test_one_parameterisation_that_fails_leaves_the_mean_to_the_others(client: FlaskClient) -> None:
    answer = client.get(flux(parameterisation="all", water="ocean", wind_speed="7;500"))

    assert values(answer, "flux")[1] is None
    assert values(answer, "flux")[0] is not None
    assert quality(answer)[1][0] == 4


def test_all_parameterisations_need_the_kind_of_water_and_stand_alone(client: FlaskClient) -> None:
    assert faults(client.get(flux(parameterisation="all"))) == [("unknown_option", "parameterisation")]
    assert faults(client.get(flux(parameterisation="all;ho-2006", water="ocean"))) == [
        ("unknown_option", "parameterisation")
    ]


def test_the_default_method_of_a_gas_that_gives_its_share_of_air_needs_no_air_side(client: FlaskClient) -> None:
    inputs = {"gas": "o2", "water_temperature": 18, "salinity": 35, "wind_speed": 7, "water_concentration": 230}
    answer = client.get(address("flux", inputs))

    assert number(answer, "flux") < 0
    assert "air_mole_fraction" in answer.get_json()["assumed"]


@pytest.mark.parametrize("name", INPUTS)
def test_text_in_an_input_is_refused_by_its_name(client: FlaskClient, name: str) -> None:
    assert ("not_a_number", name) in faults(client.get(flux(**{name: "calm"})))


@pytest.mark.parametrize("name", INPUTS)
def test_a_unit_of_another_kind_is_refused_with_those_allowed(client: FlaskClient, name: str) -> None:
    told = problem(client.get(flux(**{name: "1 furlong2"})))

    assert [(each["code"], each["name"]) for each in told["errors"]] == [("unit", name)]
    assert told["errors"][0]["allowed"]
    assert "furlong2" in told["detail"]


@pytest.mark.parametrize("name", CHOICES)
def test_a_word_that_an_option_does_not_take_is_refused_with_those_it_takes(client: FlaskClient, name: str) -> None:
    told = problem(client.get(flux(**{name: "perhaps"})))

    assert [(each["code"], each["name"]) for each in told["errors"]] == [("unknown_option", name)]
    assert "'perhaps'" in told["detail"]


@pytest.mark.parametrize("name", ["parameterisation", "pick"])
def test_a_method_or_result_that_is_not_there_is_refused_by_its_name(client: FlaskClient, name: str) -> None:
    told = problem(client.get(flux(**{name: "nobody-1900"})))

    assert [(each["code"], each["name"]) for each in told["errors"]] == [("unknown_option", name)]
    assert "'nobody-1900'" in told["detail"]


NEEDED = ["gas", "water_temperature", "salinity", "wind_speed"]


@pytest.mark.parametrize("name", NEEDED)
def test_a_needed_input_that_is_absent_is_named(client: FlaskClient, name: str) -> None:
    assert faults(client.get(flux(wind_height=None, **{name: None}))) == [("missing_input", name)]


SIDES = {"water_mole_fraction": "water_side", "air_mole_fraction": "air_side"}


@pytest.mark.parametrize("name", SIDES)
def test_a_missing_side_names_the_ways_of_giving_it(client: FlaskClient, name: str) -> None:
    told = problem(client.get(flux(**{name: None})))

    assert [(each["code"], each["name"]) for each in told["errors"]] == [("missing_input", SIDES[name])]
    assert name in told["detail"]
    assert name.replace("mole_fraction", "fugacity") in told["detail"]


TWO_WAYS = [
    {"water_fugacity": 370},
    {"water_partial_pressure": 370},
    {"water_concentration": 12},
    {"air_fugacity": 400},
    {"air_partial_pressure": 400},
]


@pytest.mark.parametrize("more", TWO_WAYS, ids=lambda more: next(iter(more)))
def test_two_ways_of_giving_a_side_are_refused_by_both_names(client: FlaskClient, more: dict[str, float]) -> None:
    ((code, name),) = faults(client.get(flux(**more)))

    assert code == "two_ways"
    assert next(iter(more)) in name
    assert "mole_fraction" in name


def test_ones_own_transfer_velocity_takes_the_place_of_a_parameterisation(client: FlaskClient) -> None:
    told = faults(client.get(flux(given_transfer_velocity=12, parameterisation="ho-2006")))

    assert told == [("two_ways", "given_transfer_velocity")]


def test_a_position_is_both_numbers_or_neither(client: FlaskClient) -> None:
    assert faults(client.get(flux(latitude=-41))) == [("missing_input", "longitude")]
    assert faults(client.get(flux(longitude=176))) == [("missing_input", "latitude")]
    assert client.get(flux(latitude=-41, longitude=176)).status_code == 200


def test_another_water_than_the_sea_has_no_default_method(client: FlaskClient) -> None:
    told = problem(client.get(flux(water="lake", salinity=0)))

    assert ("missing_input", "parameterisation") in [(each["code"], each["name"]) for each in told["errors"]]
    assert "cole-caraco-1998" in told["detail"]


def test_fresh_water_without_its_kind_is_suspect_under_a_method_made_for_the_sea(client: FlaskClient) -> None:
    ((flag, reasons),) = quality(client.get(flux(salinity=0.1)))

    assert flag == 3
    assert any("say which water" in reason for reason in reasons)


def test_the_question_of_these_tests_names_no_method(client: FlaskClient) -> None:
    assert set(FLUX) <= {"gas", *INPUTS}
    assert quality(client.get(flux())) == [(1, [])]
