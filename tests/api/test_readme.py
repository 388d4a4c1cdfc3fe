"""What the README shows is what the service answers."""

import re
from pathlib import Path

import pytest
from flask.testing import FlaskClient

LAST_DIGITS = 1e-12  # relative: the vector units of processors round exp and log differently
README = (Path(__file__).parents[2] / "README.md").read_text(encoding="utf-8")


def approx(number: float) -> object:
    return pytest.approx(number, rel=LAST_DIGITS, abs=0.0)


def first_question() -> str:
    found = re.search(r"curl '(http://127\.0\.0\.1:8660)(/v1/flux\?[^']*form=number)'", README)
    assert found
    return found[2]


def test_the_first_question_of_the_readme_has_the_answer_it_shows(client: FlaskClient) -> None:
    shown = re.search(r"form=number'\n```\n\n```\n(\S+)\n```", README)

    assert shown
    assert float(client.get(first_question()).get_data(as_text=True)) == approx(float(shown[1]))


def test_the_numbers_of_the_json_that_the_readme_shows_are_those_of_the_answer(client: FlaskClient) -> None:
    results = client.get(first_question().replace("&form=number", "")).get_json()["results"]
    shown = dict(re.findall(r'"(\w+)": \{"values": \[([-\d.]+)\]', README))

    assert shown
    for name, text in shown.items():
        assert results[name]["values"][0] == approx(float(text))


def test_each_of_the_two_commands_is_a_single_line() -> None:
    commands = [line for line in README.splitlines() if line.startswith("python3 -m venv")]

    assert len(commands) == 2
    assert commands[0].endswith("catspaw serve")
    assert commands[1].endswith("pytest -q")
