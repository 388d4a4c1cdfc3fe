"""A new gas, a new parameterisation: one entry each, and everything else follows."""

import json
from collections.abc import Callable
from typing import Any

import numpy as np
import pytest
from flask.testing import FlaskClient

from service.app import create_app
from service.physics.declare import Array, Block, Gas, Source, gas, step
from service.physics.schmidt_number.polynomials import Rows
from service.physics.solubility.forms import Weiss

SOURCE = Source(
    key="invented-1999", authors="Invented, A.", year=1999, title="A paper that does not exist", journal="Nowhere"
)
GAS, METHOD = "zephyrine", "invented-1999"
QUESTION = {
    "gas": GAS,
    "parameterisation": METHOD,
    "water": "lake",
    "water_temperature": "20",
    "salinity": "0",
    "air_pressure": "1000",
    "wind_speed": "4",
    "water_fugacity": "500",
    "air_fugacity": "400",
}


def add_a_gas() -> None:
    """Do what DEVELOPERS.md asks of a new gas: one record."""
    gas(
        Gas(
            name=GAS,
            formula="Zp2",
            title="an invented gas",
            molar_mass=100.0,
            constants={"storage_ratio": 1.0},
            blocks=(
                Block("solubility", "weiss-1974", Weiss(-60.0, 90.0, 23.0, 0.0, 0.0, 0.0), printed_in="nowhere"),
                Block(
                    "solubility_per_litre", "weiss-1974", Weiss(-60.0, 90.0, 23.0, 0.0, 0.0, 0.0), printed_in="nowhere"
                ),
                Block("schmidt_number", "wanninkhof-2014", Rows(sea=(600.0,), fresh=(600.0,)), printed_in="nowhere"),
            ),
        )
    )


def add_a_parameterisation() -> None:
    """Do what DEVELOPERS.md asks of a new parameterisation: one function under its record."""

    @step(
        "transfer_velocity_at_reference",
        method=METHOD,
        source=SOURCE,
        equation="Eq. 3",
        formula="k600 = 0.25 U^2",
        supplies={"reference_schmidt_number": 600.0, "schmidt_exponent": 0.5},
        valid={"wind_speed_10m": (0.0, 15.0)},
        water=("lake",),
        wind_averaging="short",
    )
    def invented_1999(wind_speed_10m: Array) -> Array:
        return 0.25 * wind_speed_10m**2


@pytest.fixture
def client(registers: Callable[[], None]) -> FlaskClient:
    add_a_gas()
    add_a_parameterisation()
    registers()
    return create_app().test_client()


def get(client: FlaskClient, address: str, **query: str) -> Any:
    response = client.get(address, query_string=query)
    assert response.status_code == 200, response.text
    return json.loads(response.data)


def test_a_new_gas_stands_in_the_catalogue_with_its_methods(client: FlaskClient) -> None:
    found = {record["name"]: record for record in get(client, "/v1/gases")["gases"]}

    assert found[GAS]["title"] == "an invented gas"
    assert [each["name"] for each in found[GAS]["methods"]["solubility_method"]] == ["weiss-1974"]
    assert get(client, f"/v1/gases/{GAS}") == found[GAS]


def test_a_new_parameterisation_stands_in_the_catalogue_for_its_water_alone(client: FlaskClient) -> None:
    lakes = {
        record["name"]: record for record in get(client, "/v1/parameterisations", water="lake")["parameterisations"]
    }
    seas = {record["name"] for record in get(client, "/v1/parameterisations", water="ocean")["parameterisations"]}

    assert lakes[METHOD]["formula"] == "k600 = 0.25 U^2"
    assert lakes[METHOD]["range"]["wind_speed_10m"]["to"] == 15.0
    assert METHOD not in seas
    assert get(client, f"/v1/parameterisations/{METHOD}") == lakes[METHOD]


def test_a_new_gas_and_a_new_parameterisation_answer_a_flux(client: FlaskClient) -> None:
    answer = get(client, "/v1/flux", **QUESTION)
    solubility = np.exp(-60.0 + 90.0 / 2.9315 + 23.0 * np.log(2.9315))
    told = {name: result["values"][0] for name, result in answer["results"].items()}

    assert told["transfer_velocity"] == pytest.approx(0.25 * 16.0, rel=1e-14)
    assert told["solubility"] == pytest.approx(solubility, rel=1e-13)
    assert told["flux"] == pytest.approx(0.24 * 4.0 * solubility * 100.0, rel=1e-12)
    assert answer["quality"]["flags"] == [1]
    assert [each["name"] for each in answer["methods"]["transfer_velocity"]] == [METHOD]


@pytest.mark.parametrize(
    "quantity", ["solubility", "schmidt-number", "transfer-velocity", "equilibration"], ids=lambda name: name
)
def test_every_quantity_takes_the_new_gas(client: FlaskClient, quantity: str) -> None:
    needs = {"gas": GAS, "water_temperature": "20", "salinity": "35"}
    if quantity in ("transfer-velocity", "equilibration"):
        needs["wind_speed"] = "4"
    if quantity == "equilibration":
        needs["mixed_layer_depth"] = "40"

    answer = get(client, f"/v1/{quantity}", **needs)

    assert all(result["values"][0] is not None for result in answer["results"].values())


def test_a_new_range_flags_without_being_told_elsewhere(client: FlaskClient) -> None:
    answer = get(client, "/v1/flux", **{**QUESTION, "wind_speed": "16"})

    assert answer["quality"]["flags"] == [3]
    assert "0 to 15 m s-1" in answer["quality"]["reasons"][0][0]


def test_a_misspelling_is_pointed_to_the_new_names(client: FlaskClient) -> None:
    misspelt = client.get("/v1/flux", query_string={**QUESTION, "gas": "zephyrin", "parameterisation": "invented-1998"})
    alone = client.get("/v1/flux", query_string={**QUESTION, "parameterisation": "invented-1998"})

    assert f"did you mean {GAS}?" in misspelt.text
    assert f"did you mean {METHOD}?" in alone.text


def test_all_parameterisations_of_a_water_take_the_new_one_in(client: FlaskClient) -> None:
    answer = get(client, "/v1/flux", **{**QUESTION, "parameterisation": "all"})

    assert METHOD in answer["by_parameterisation"]


def test_the_api_document_lists_the_new_gas_and_the_new_parameterisation(client: FlaskClient) -> None:
    document = get(client, "/openapi.json")
    if "/v1/flux" not in document.get("paths", {}):
        pytest.skip("pending: the API document does not describe the quantities yet")
    text = json.dumps(document)

    assert f'"{GAS}"' in text
    assert f'"{METHOD}"' in text


def test_nothing_of_this_is_left_for_other_tests() -> None:
    plain = create_app().test_client()

    assert plain.get(f"/v1/gases/{GAS}").status_code == 404
    assert plain.get(f"/v1/parameterisations/{METHOD}").status_code == 404
    assert plain.get("/v1/flux", query_string=QUESTION).status_code == 422
