"""The same input gives the same numbers, bit for bit, however it is sent and whatever it is sent with."""

import csv
import io
import json
import struct
from functools import partialmethod
from typing import Any

import pytest
from flask.testing import FlaskClient
from hypothesis import given, settings
from hypothesis import strategies as st

from service.csv_table import Table
from tests.api.questions import FLUX, PER_SAMPLE, QUESTIONS, address, number, rows, table, values

MAIN = ["flux", "evasion", "invasion", "transfer_velocity", "schmidt_number", "wind_speed_10m", "solubility"]


def bits(numbers: Any) -> list[bytes]:
    return [struct.pack("<d", float(each)) for each in numbers]


def sample(wind: float, temperature: float, salinity: float, height: float, pressure: float) -> dict[str, Any]:
    return {
        **FLUX,
        "wind_speed": wind,
        "water_temperature": temperature,
        "salinity": salinity,
        "wind_height": height,
        "air_pressure": pressure,
    }


SAMPLES = st.builds(
    sample,
    st.floats(0, 30),
    st.floats(-1, 35),
    st.floats(5, 40),
    st.sampled_from([10.0, 18.0]) | st.floats(2, 50),
    st.floats(900, 1050),
)


def by_all_ways(client: FlaskClient, inputs: dict[str, Any], result: str) -> list[list[bytes]]:
    """Return a result of one sample by GET, JSON, form, CSV and bare number."""
    query = {name: repr(value) if isinstance(value, float) else value for name, value in inputs.items()}
    content = table([[query[name] for name in PER_SAMPLE]])
    asked = {"pick": result}
    (row,) = rows(client.post("/v1/flux", query_string={"gas": "co2", **asked}, data=content))
    cell = next(value for name, value in row.items() if name.startswith(f"{result} ["))
    return [
        bits(values(client.get("/v1/flux", query_string={**query, **asked}), result)),
        bits(values(client.post("/v1/flux", data=json.dumps({**inputs, **asked})), result)),
        bits(values(client.post("/v1/flux", data={**query, **asked}), result)),
        bits([cell]),
        bits([client.get("/v1/flux", query_string={**query, **asked, "form": "number"}).text]),
        bits([client.get("/v1/flux", query_string={**query, **asked, "form": "number", "decimal": "whole"}).text]),
    ]


@settings(max_examples=40)
@given(SAMPLES, st.sampled_from(MAIN))
def test_one_sample_has_the_same_numbers_by_every_way(client: FlaskClient, inputs: dict[str, Any], result: str) -> None:
    first, *others = by_all_ways(client, inputs, result)

    assert others == [first] * 5


@settings(max_examples=30)
@given(st.lists(SAMPLES, min_size=2, max_size=40))
def test_a_sample_has_the_same_numbers_alone_and_in_a_batch(client: FlaskClient, inputs: list[dict[str, Any]]) -> None:
    batch = {"gas": "co2", **{name: [each[name] for each in inputs] for name in PER_SAMPLE}}
    together = client.post("/v1/flux", data=json.dumps(batch))
    alone = [client.post("/v1/flux", data=json.dumps(each)) for each in inputs[:3]]

    for name in MAIN:
        assert bits(values(together, name)[:3]) == bits(number(each, name) for each in alone)


@pytest.mark.parametrize("quantity", QUESTIONS)
def test_every_quantity_has_the_same_numbers_by_every_way(client: FlaskClient, quantity: str) -> None:
    inputs = QUESTIONS[quantity]
    by_json = client.post(f"/v1/{quantity}", json=inputs)
    names = [name for name in inputs if name != "gas"]
    content = table([[inputs[name] for name in names]], names)
    (row,) = rows(client.post(f"/v1/{quantity}?gas={inputs['gas']}", data=content))
    by_table = {name.partition(" [")[0]: cell for name, cell in row.items()}

    assert client.get(address(quantity, inputs)).data == by_json.data
    assert client.post(f"/v1/{quantity}", data={k: str(v) for k, v in inputs.items()}).data == by_json.data
    for name in by_json.get_json()["results"]:
        assert bits([by_table[name]]) == bits(values(by_json, name))


def test_a_sample_has_the_same_numbers_in_any_block(client: FlaskClient, monkeypatch: pytest.MonkeyPatch) -> None:
    lines = [[18.4 + i / 7, 35.1 - i / 9, 1008.2, 0.3 * i, 10 + i % 3, 380.0 + i, 419.0] for i in range(101)]
    whole = client.post("/v1/flux?gas=co2", data=table(lines)).data
    blocks = Table.blocks
    for size in (1, 7, 64):
        monkeypatch.setattr(Table, "blocks", partialmethod(blocks, rows=size))

        assert client.post("/v1/flux?gas=co2", data=table(lines)).data == whole


def test_a_table_and_arrays_have_the_same_numbers_over_several_blocks(client: FlaskClient) -> None:
    count = 40_000
    winds = [round(0.0007 * i, 4) for i in range(count)]
    content = "wind_speed\n" + "\n".join(map(str, winds)) + "\n"
    rest = {name: value for name, value in FLUX.items() if name != "wind_speed"} | {"pick": "flux"}
    by_table = client.post("/v1/flux", query_string=rest, data=content)
    by_json = client.post("/v1/flux", data=json.dumps({**rest, "wind_speed": winds}))
    found = [row[1] for row in list(csv.reader(io.StringIO(by_table.text)))[1:]]

    assert bits(found) == bits(values(by_json, "flux"))
    assert values(client.post("/v1/flux", query_string=rest | {"form": "json"}, data=content), "flux") == values(
        by_json, "flux"
    )


def test_columns_may_stand_in_any_order(client: FlaskClient) -> None:
    forwards = client.post("/v1/flux?gas=co2", data=table())
    names = PER_SAMPLE[::-1]
    backwards = client.post("/v1/flux?gas=co2", data=table([[row[n] for n in names] for row in rows(forwards)], names))

    assert [row["flux [mmol m-2 d-1]"] for row in rows(forwards)] == [
        row["flux [mmol m-2 d-1]"] for row in rows(backwards)
    ]


@settings(max_examples=60)
@given(SAMPLES, st.floats(0, 1), st.floats(50, 2000))
def test_the_flux_is_the_product_of_the_printed_intermediates(
    client: FlaskClient, inputs: dict[str, Any], ice: float, water: float
) -> None:
    question = {**inputs, "ice_fraction": ice, "water_mole_fraction": water, "pick": "all"}
    answer = client.post("/v1/flux", data=json.dumps(question))
    velocity = (1 - ice) * number(answer, "total_transfer_velocity") * 24 / 100  # m d-1
    factor = velocity * number(answer, "solubility")
    evasion, invasion = number(answer, "evasion"), number(answer, "invasion")
    bound = 1e-12 * max(evasion, invasion)  # relative to the larger one-way flux: their difference may vanish

    assert evasion == pytest.approx(factor * number(answer, "fugacity_in_water"), abs=bound)
    assert invasion == pytest.approx(factor * number(answer, "fugacity_in_air"), abs=bound)
    assert number(answer, "flux") == evasion - invasion
    assert number(answer, "flux") == pytest.approx(factor * number(answer, "fugacity_difference"), abs=bound)
