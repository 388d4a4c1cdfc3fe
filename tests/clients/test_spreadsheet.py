"""Spreadsheets: live cells and the macro in LibreOffice Calc under two locales, and the limits of Excel."""

import csv
import io
import json
import re
import shutil
import subprocess
import sys
from dataclasses import dataclass
from pathlib import Path
from typing import Any

import pytest
import requests

from tests.clients.running import ENVIRONMENT, EXAMPLES

pytestmark = pytest.mark.clients
SPREADSHEET = EXAMPLES / "spreadsheet"
PATIENCE = 240  # s, for an office to start, answer and end
EXCEL_ADDRESS, EXCEL_ANSWER = 2048, 32_767  # characters, Microsoft's page on WEBSERVICE
LOCALES = {"en-US": "1.5", "de-DE": "1,5"}
FORMULA = re.compile(r"```calc\n(.*?)```", re.DOTALL)
ADDRESS = re.compile(r"http://127\.0\.0\.1:8660[^\s\"'`)]+")


@dataclass(frozen=True)
class Office:
    """What an office found in the workbook."""

    locale: str
    url: str
    found: dict[str, Any]


def office_python() -> str:
    """Return a Python that can speak to the office, or skip."""
    if shutil.which("soffice") is None:
        pytest.skip("LibreOffice is not installed: apt-get install libreoffice-calc python3-uno")
    for candidate in (sys.executable, "/usr/bin/python3"):
        if subprocess.run([candidate, "-c", "import uno"], capture_output=True, check=False).returncode == 0:
            return candidate
    pytest.skip("no Python here can speak to LibreOffice: apt-get install python3-uno")


def formulas(page: str, url: str) -> list[str]:
    text = (EXAMPLES / page).read_text().replace("http://127.0.0.1:8660", url)
    return [line for block in FORMULA.findall(text) for line in block.splitlines()]


@pytest.fixture(scope="module", params=LOCALES)
def office(request: pytest.FixtureRequest, service: str, tmp_path_factory: pytest.TempPathFactory) -> Office:
    python = office_python()
    folder = tmp_path_factory.mktemp(request.param)
    workbook = folder / "flux.ods"
    subprocess.run([sys.executable, SPREADSHEET / "make_workbook.py", "--url", service, workbook], check=True)
    asked = formulas("README.md", service) + formulas("spreadsheet/formulas.md", service)
    done = subprocess.run(
        [python, Path(__file__).with_name("calc_office.py"), workbook, request.param, SPREADSHEET / "flux.bas", *asked],
        capture_output=True,
        text=True,
        timeout=PATIENCE,
        check=False,
        env=ENVIRONMENT | {"HOME": str(folder)},
    )
    assert done.returncode == 0, done.stderr
    return Office(request.param, service, json.loads(done.stdout))


def number(url: str, **question: object) -> float:
    asked = {name: "" if value is None else str(value) for name, value in question.items()}
    answer = requests.get(f"{url}/v1/flux", params={"gas": "co2", "form": "number", **asked}, timeout=60)
    assert answer.status_code == 200, answer.text
    return float(answer.text)


def flux(url: str, row: list[Any]) -> float:
    names = ("water_temperature", "salinity", "wind_speed", "water_fugacity", "air_fugacity")
    return number(url, **dict(zip(names, row[1:6], strict=True)))


def test_the_script_writes_the_workbook_that_is_kept(tmp_path: Path) -> None:
    again = tmp_path / "again.ods"
    subprocess.run([sys.executable, SPREADSHEET / "make_workbook.py", again], check=True)

    assert again.read_bytes() == (SPREADSHEET / "flux.ods").read_bytes()


def test_the_office_writes_decimals_as_its_locale_does(office: Office) -> None:
    assert office.found["decimal"] == LOCALES[office.locale]


def test_live_cells_hold_the_number_that_any_other_client_gets(office: Office) -> None:
    rows = [row for row in office.found["live"] if row[3] != ""]

    assert len(rows) == 3
    assert [row[6] for row in rows] == [flux(office.url, row) for row in rows]


def test_a_live_cell_follows_a_changed_input(office: Office) -> None:
    before, after = office.found["live"][0], office.found["changed"][0]

    assert (before[1], after[1]) == (18.4, 19.5)
    assert after[6] == flux(office.url, after) != before[6]


def test_a_row_with_a_gap_shows_the_reason_and_no_number(office: Office) -> None:
    (row,) = [row for row in office.found["live"] if row[3] == ""]

    assert row[6] == ""
    assert row[7].startswith("ERROR ")
    assert "wind_speed is missing" in row[7]


def test_the_formulas_of_the_pages_hold_numbers(office: Office) -> None:
    """All but the two whose answer is text: the one for errors, and the list."""
    asked = formulas("README.md", "") + formulas("spreadsheet/formulas.md", "")
    found = dict(zip(asked, office.found["formulas"], strict=True))
    single = next(value for formula, value in found.items() if "/v1/flux" in formula)

    assert single == number(
        office.url, water_temperature=18.4, salinity=35.1, wind_speed=7.7, water_fugacity=372.4, air_fugacity=409.1
    )
    for formula, value in found.items():
        text = formula.startswith("=WEBSERVICE")
        assert isinstance(value, str if text else float), f"{formula}: {value!r}"


def test_the_button_runs_the_macro(office: Office) -> None:
    assert "Standard.Flux.SendRange" in office.found["button"]


def test_the_macro_writes_the_answer_of_the_whole_range_beside_it(office: Office) -> None:
    header, *rows = office.found["batch"]
    gap = header.index("")
    sent = io.StringIO()
    csv.writer(sent, lineterminator="\n").writerows([row[:gap] for row in [header, *rows]])
    answer = requests.post(f"{office.url}/v1/flux?gas=co2", data=sent.getvalue().encode(), timeout=60).text
    names, *expected = csv.reader(io.StringIO(answer))
    written = [name for name in header[gap + 1 :] if name]

    assert office.found["status"] == "200 rows answered"
    assert written == names[gap:]
    for row, wanted in zip(rows, expected, strict=True):
        for name, cell, text in zip(written, row[gap + 1 :], wanted[gap:], strict=False):
            assert cell == (text if name == "quality_reason" or not text else float(text)), (row[0], name)


def test_the_macro_leaves_the_result_of_a_gap_empty_and_not_zero(office: Office) -> None:
    header, *rows = office.found["batch"]
    wind, result = header.index("wind_speed [kn]"), header.index("flux [mmol m-2 d-1]")
    gaps = [row for row in rows if row[wind] == ""]

    assert len(gaps) == 5
    assert {row[result] for row in gaps} == {""}
    assert all(row[result] != "" for row in rows if row not in gaps)


def test_the_macro_tells_why_a_question_was_refused(office: Office) -> None:
    assert office.found["refused"].startswith("ERROR gas: ")


def test_the_macro_for_excel_reads_and_writes_cells_like_the_other(office: Office) -> None:
    """Its functions on texts alone, in the VBA mode of this office; what speaks to Excel cannot run here."""
    assert office.found["twin"] == {
        "SplitLine": ["a", "b,c", "", 'd "e"'],
        "CellText": ["1.5", "-0.000015", "plain", '"a,""b"""'],
        "CellValue": [1.5, -1.5e-05, ""],
    }


def test_the_macro_for_excel_names_its_content_type_and_never_converts_by_locale() -> None:
    source = (SPREADSHEET / "flux.bas").read_text()

    assert re.search(r'setRequestHeader "Content-Type", "text/csv', source)
    assert "CDbl(" not in source
    assert "CStr(value)" in source.partition("vbDouble")[2]  # of texts alone: numbers went by Str before


def test_every_address_on_the_pages_fits_into_excel() -> None:
    found = [each for page in EXAMPLES.rglob("*.md") for each in ADDRESS.findall(page.read_text())]

    assert len(found) > 10
    assert max(map(len, found)) <= EXCEL_ADDRESS


def test_a_live_cell_of_the_workbook_fits_into_excel_with_the_longest_numbers() -> None:
    text = (SPREADSHEET / "make_workbook.py").read_text()
    names = re.search(r"INPUTS = \((.*?)\)", text)
    assert names is not None
    longest = "-1.2345678901234567E-300"
    address = "http://a-host-with-a-long-name.example:65535/v1/flux?form=number&errors=text&gas=cfc113"
    address += "".join(f"&{name}={longest}" for name in re.findall(r'"(\w+)"', names[1]))

    assert len(address) <= EXCEL_ADDRESS


def test_a_hundred_rows_of_two_inputs_fit_into_excel_both_ways(service: str) -> None:
    temperatures = [round(17.5 + 0.01 * row, 2) for row in range(100)]
    salinities = [round(34.9 + 0.01 * row, 2) for row in range(100)]
    address = (
        f"{service}/v1/solubility?gas=o2&form=number&water_temperature={';'.join(map(str, temperatures))}"
        f"&salinity={';'.join(map(str, salinities))}"
    )
    answer = requests.get(address, timeout=60).text
    one = requests.get(
        f"{service}/v1/solubility?gas=o2&form=number&water_temperature={temperatures[41]}&salinity={salinities[41]}",
        timeout=60,
    ).text

    assert len(address) <= EXCEL_ADDRESS
    assert len(answer) <= EXCEL_ANSWER
    assert len(answer.split("\n")) == 100
    assert answer.split("\n")[41] == one


GOOD = "gas=co2&water_temperature=18.4&salinity=35.1&wind_speed=7.7&water_fugacity=372.4&air_fugacity=409.1"
MISTAKES = [
    "",
    GOOD.replace("co2", "helum"),
    GOOD.replace("salinity=35.1&", ""),
    GOOD.replace("salinity", "salinty"),
    GOOD.replace("18.4", "18,4"),
    GOOD.replace("18.4", "warm"),
    GOOD.replace("18.4", "#VALUE!"),
    GOOD.replace("7.7", ""),
    GOOD.replace("7.7", "7.7 furlongs"),
    GOOD.replace("18.4", "1804"),
]


@pytest.mark.parametrize("question", MISTAKES)
def test_a_mistake_can_be_read_in_a_cell_that_shows_no_errors(service: str, question: str) -> None:
    plain = requests.get(f"{service}/v1/flux?form=number&{question}", timeout=60)
    told = requests.get(f"{service}/v1/flux?form=number&errors=text&{question}", timeout=60)

    assert plain.status_code in range(400, 500)
    assert told.status_code == 200
    assert re.fullmatch(r"ERROR [^\n]+", told.text)
    assert len(told.text) <= EXCEL_ANSWER
