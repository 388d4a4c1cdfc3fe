"""Numbers for a cell: they read back exactly, and no office takes them for another number."""

import re
import struct

import pytest
from flask.testing import FlaskClient
from hypothesis import example, given
from hypothesis import strategies as st

from service.writers import number_text
from tests.api.questions import FLUX, body, faults, flux, number, problem

FINITE = st.floats(allow_nan=False, allow_infinity=False)
EXACTLY_THREE = re.compile(r"[.,]\d{3}(?!\d)")
POINT = re.compile(r"-?\d+(\.\d+)?(e[+-]\d+)?", re.ASCII)
WHOLE = re.compile(r"-?\d+E-?\d+", re.ASCII)


def bits(value: float) -> bytes:
    return struct.pack("<d", value)


@given(FINITE)
@example(1.234)
@example(-0.125)
@example(1.234e-5)
@example(1.234e300)
@example(0.0)
@example(-0.0)
@example(5e-324)
@example(1e16)
@example(1e22)
@example(12.0)
@example(1.7976931348623157e308)
def test_a_number_reads_back_exactly_and_never_has_exactly_three_decimals(value: float) -> None:
    text = number_text(value)

    assert bits(float(text)) == bits(value)
    assert POINT.fullmatch(text)
    assert not EXACTLY_THREE.search(text)


@given(st.integers(-(10**9), 10**9), st.integers(-30, 30))
def test_numbers_with_three_decimals_get_a_fourth(thousandths: int, exponent: int) -> None:
    value = float(f"{thousandths / 1000!r}e{exponent}")

    assert float(number_text(value)) == value
    assert not EXACTLY_THREE.search(number_text(value))


@given(FINITE)
@example(0.123456)
@example(1e22)
@example(-1234.0)
@example(5e-324)
@example(0.0)
@example(1.7976931348623157e308)
def test_a_whole_number_with_an_exponent_reads_back_exactly(value: float) -> None:
    text = number_text(value, "whole")

    assert float(text) == value
    assert WHOLE.fullmatch(text)


def test_the_whole_form_is_that_of_the_documents() -> None:
    assert number_text(0.123456, "whole") == "123456E-6"
    assert number_text(1.234) == "1.2340"
    assert number_text(1.234e-5) == "1.2340e-05"


def test_one_sample_is_one_number_without_newline_or_unit(client: FlaskClient) -> None:
    answer = client.get(flux(form="number"))

    assert answer.mimetype == "text/plain"
    assert answer.data.isascii()
    assert float(answer.text) == number(client.get(flux()), "flux")
    assert answer.text == answer.text.strip()


def test_several_samples_are_one_number_a_line_in_order(client: FlaskClient) -> None:
    lines = client.get(flux(form="number", wind_speed="7;8;9")).text.split("\n")

    assert [float(line) for line in lines] == [number(client.get(flux(wind_speed=wind)), "flux") for wind in (7, 8, 9)]


def test_the_number_is_of_the_first_picked_result_in_its_unit(client: FlaskClient) -> None:
    answer = client.get(flux(form="number", pick="transfer_velocity;flux", unit="m d-1"))

    assert float(answer.text) == pytest.approx(number(client.get(flux()), "transfer_velocity") * 0.24, rel=1e-14)


def test_several_parameterisations_give_the_number_of_their_mean(client: FlaskClient) -> None:
    methods = "ho-2006;wanninkhof-2014"

    assert float(client.get(flux(form="number", parameterisation=methods)).text) == number(
        client.get(flux(parameterisation=methods)), "flux"
    )


def test_a_sample_without_result_among_several_is_nan(client: FlaskClient) -> None:
    lines = client.get(flux(form="number", wind_speed="7;NA;-3")).text.split("\n")

    assert float(lines[0]) != 0
    assert lines[1:] == ["NaN", "NaN"]


NO_RESULT = ["NA", "-3", ""]


@pytest.mark.parametrize("wind", NO_RESULT)
def test_one_sample_without_result_is_refused_with_the_reason(client: FlaskClient, wind: str) -> None:
    told = problem(client.get(flux(form="number", wind_speed=wind)))

    assert told["errors"][0]["code"] == "bad_sample"
    assert "wind_speed" in told["detail"]


def test_whole_numbers_are_asked_for_by_decimal(client: FlaskClient) -> None:
    whole = client.get(flux(form="number", decimal="whole")).text

    assert WHOLE.fullmatch(whole)
    assert float(whole) == number(client.get(flux()), "flux")


def test_a_decimal_comma_in_the_question_leaves_the_answer_with_a_point(client: FlaskClient) -> None:
    commas = {name: str(value).replace(".", ",") for name, value in FLUX.items()}
    answer = client.get(flux(**commas, decimal="comma", form="number"))

    assert float(answer.text) == number(client.get(flux()), "flux")


def test_a_json_body_and_a_table_can_be_answered_with_numbers(client: FlaskClient) -> None:
    answer = client.post("/v1/flux?form=number", data=body(wind_speed=[7, 8]))

    assert answer.text == client.get(flux(form="number", wind_speed="7;8")).text


FORMS = ["xml", "JSON", "", "json;csv"]


@pytest.mark.parametrize("form", FORMS)
def test_an_unknown_form_is_refused(client: FlaskClient, form: str) -> None:
    assert faults(client.get(flux(form=form))) == [("unknown_option", "form")]
