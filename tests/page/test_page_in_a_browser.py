"""A person at the page: gets a flux, takes it away, looks at pictures and evidence, by mouse or by keyboard alone."""

import json
import re
import shutil
import subprocess
import sys
import urllib.request
from collections.abc import Iterator
from pathlib import Path
from typing import Any

import pytest

from tests.clients.running import ENVIRONMENT, Service, until
from tests.page.looking import Look

pytestmark = pytest.mark.clients

QUESTION = "gas=co2&water_temperature=18.4&salinity=35.1&wind_speed=12 kn&water_fugacity=372&air_fugacity=415.5"
VIEWS = ("answer", "take", "pictures", "file", "checks")
RULES = ["wcag2a", "wcag2aa", "wcag21a", "wcag21aa", "wcag22aa", "best-practice"]
ONE_SECOND = 1000  # ms


def answered(address: str, query: str) -> float:
    with urllib.request.urlopen(f"{address}/v1/flux?{query.replace(' ', '%20')}") as response:
        return float(json.load(response)["results"]["flux"]["values"][0])


def test_a_first_time_user_gets_a_flux_from_what_is_on_the_screen(look: Look) -> None:
    page = look.open()
    page.get_by_role("button", name="Empty the fields").click()
    page.get_by_label("gas", exact=True).select_option(label="carbon dioxide, CO2")
    for name, value in (("water temperature", "18.4"), ("salinity", "35.1"), ("wind speed", "12")):
        page.get_by_label(name, exact=True).fill(value)
    page.get_by_label("unit of wind speed", exact=True).select_option("kn")
    page.get_by_role("combobox", name="What is known of the gas in the water").select_option("water_fugacity")
    page.get_by_label("water fugacity", exact=True).fill("372")
    page.get_by_role("combobox", name="What is known of the gas in the air").select_option("air_fugacity")
    page.get_by_label("air fugacity", exact=True).fill("415.5")

    assert look.value() == answered(look.address, QUESTION)
    assert "good" in page.inner_text(".quality-box")
    assert "Wanninkhof (2014), doi:10.4319/lom.2014.12.351" in page.inner_text("#answer-body")
    assert "wind height" in page.inner_text("#answer-body")
    assert look.complaints == []
    assert look.hosts == {look.address.removeprefix("http://")}


def test_a_link_tells_the_same_to_another_person(look: Look, browser: Any) -> None:
    page = look.open(f"/?quantity=flux&{QUESTION}&pick=all")
    first = look.value()
    page.get_by_label("salinity", exact=True).fill("30")
    page.wait_for_url("**salinity=30**")
    until(lambda: page.evaluate(f"document.querySelector('[data-result=flux]').dataset.value != '{first}'"))
    other = Look(browser, look.address)
    other.page.goto(page.url)

    assert other.value() == look.value() != first
    other.close()


def test_what_is_wrong_is_told_beside_its_field(look: Look) -> None:
    page = look.open(f"/?quantity=flux&{QUESTION}")
    page.get_by_label("salinity", exact=True).fill("salty")
    page.wait_for_selector("#in-salinity[aria-invalid]")

    assert "salty" in page.inner_text("#error-salinity")
    page.get_by_label("salinity", exact=True).fill("99")
    until(lambda: page.evaluate("document.getElementById('error-salinity').textContent.includes('60')"))
    assert "bad" in page.inner_text(".quality-box")
    page.get_by_label("salinity", exact=True).fill("35.1")
    until(lambda: page.evaluate("document.getElementById('error-salinity').textContent === ''"))
    assert look.value() == answered(look.address, QUESTION)


def run(line: list[str], folder: Path) -> str:
    done = subprocess.run(line, cwd=folder, env=ENVIRONMENT, capture_output=True, text=True, check=False, timeout=60)
    assert done.returncode == 0, done.stderr
    return done.stdout


def dois(address: str) -> set[str]:
    """Return those of every method and step of an answer."""
    with urllib.request.urlopen(f"{address}&detail=steps".replace(" ", "%20")) as response:
        answer = json.load(response)
    used = [*answer["steps"], *(each for of in answer["methods"].values() for each in of)]
    return {each["doi"] for each in used if each["doi"]}


def test_copied_calls_run_and_give_the_same_digits(look: Look, tmp_path: Path) -> None:
    look.context.grant_permissions(["clipboard-read", "clipboard-write"])
    page = look.open(f"/?quantity=flux&{QUESTION}")
    shown = look.value()
    page.get_by_role("link", name="Take away").click()

    def copied(title: str) -> str:
        page.get_by_role("button", name=f"Copy: {title}", exact=True).click()
        until(lambda: page.evaluate("navigator.clipboard.readText().then(Boolean)"))
        return str(page.evaluate("navigator.clipboard.readText()"))

    assert json.loads(run(["sh", "-c", copied("curl")], tmp_path))["results"]["flux"]["values"] == [shown]
    assert run([sys.executable, "-c", copied("Python")], tmp_path).strip() == f"[{shown!r}] [1]"
    with urllib.request.urlopen(copied("Address")) as response:
        assert json.load(response)["results"]["flux"]["values"] == [shown]
    (tmp_path / "samples.csv").write_text(look.snippet("csv-for-several-samples"))
    run(["sh", "-c", copied("curl, the CSV")], tmp_path)
    assert str(shown) in (tmp_path / "answered.csv").read_text()
    assert set(re.findall(r"doi = {(.*)}", copied("Bibliography"))) == dois(f"{look.address}/v1/flux?{QUESTION}")


def test_the_copied_line_of_r_gives_the_same_digits(look: Look, tmp_path: Path) -> None:
    if shutil.which("Rscript") is None:
        pytest.skip("R is not here: apt-get install r-base-core")
    page = look.open(f"/?quantity=flux&{QUESTION}")
    shown = look.value()
    page.get_by_role("link", name="Take away").click()
    (tmp_path / "flux.R").write_text(look.snippet("r"))

    assert float(run(["Rscript", "flux.R"], tmp_path).split()[1]) == shown


def test_a_cell_has_no_text_longer_than_an_office_takes(look: Look) -> None:
    page = look.open(f"/?quantity=flux&{QUESTION}&wind_height=18&ice_fraction=0.25&latitude=-42.5&longitude=171.25")
    page.get_by_role("link", name="Take away").click()
    for name, parting in (("spreadsheet-cell", ","), ("spreadsheet-cell-decimal-comma-office", ";")):
        formula = look.snippet(name)

        assert formula.startswith('=NUMBERVALUE(WEBSERVICE("http://')
        assert formula.endswith(f'){parting}".")')
        assert max(len(each) for each in formula.split('"')) < 255


def test_pictures_are_drawn_pointed_at_and_saved(look: Look, tmp_path: Path) -> None:
    page = look.open(f"/?quantity=flux&{QUESTION}&water=ocean#pictures")
    page.wait_for_selector(".method.chosen .line")
    page.get_by_role("button", name="Show wanninkhof-2014 in the picture").focus()

    assert page.locator(".method").count() >= 10
    assert page.locator(".method.pointed .band").count() == 1
    assert "your wind" in page.inner_text("#pictures")
    assert page.locator("#pictures figure svg").count() == 3
    picture = look.saved("Save transfer-velocity-co2-ocean as SVG", tmp_path)
    assert picture.read_text().startswith("<svg")
    assert "class=" not in picture.read_text()
    assert look.saved("Save transfer-velocity-co2-ocean as PNG", tmp_path).read_bytes().startswith(b"\x89PNG")
    assert look.complaints == []


def test_a_hundred_thousand_rows_are_answered_and_drawn(look: Look, long_file: Path, tmp_path: Path) -> None:
    page = look.open("/?quantity=flux&gas=co2#file")
    page.set_input_files("#file-field", long_file)
    page.get_by_role("button", name="Answer 100,000 lines").click()
    page.wait_for_selector("#summary", timeout=120_000)
    lines = look.saved("Save the answered CSV", tmp_path).read_text().splitlines()

    assert len(lines) == 100_001
    assert sum(line.endswith(",9,wind_speed is missing") for line in lines) == 100
    assert "100,000" in page.inner_text("#summary")
    assert "mean over time" in page.inner_text("#summary")
    assert len(page.get_attribute("#file svg .mean", "d")) > 1000
    assert len(page.get_attribute("#file svg .strip-9", "d")) > 100
    assert look.complaints == []
    assert look.hosts == {look.address.removeprefix("http://")}


def test_a_long_file_can_be_stopped_and_what_is_there_is_kept(look: Look, long_file: Path, tmp_path: Path) -> None:
    page = look.open("/?quantity=flux&gas=co2#file")
    page.set_input_files("#file-field", long_file)
    page.get_by_role("button", name="Answer 100,000 lines").click()
    until(lambda: page.evaluate("/^[1-9]/.test(document.querySelector('.doing [role=status]').textContent)"))
    page.get_by_role("button", name="Stop").click()
    page.wait_for_selector("text=Stopped")

    assert 1 < len(look.saved("Save the answered CSV", tmp_path).read_text().splitlines()) < 100_001


def test_the_published_figures_stand_beside_the_computed_ones(look: Look) -> None:
    page = look.open("/#checks")
    page.wait_for_selector(".checks-table tbody tr")
    page.get_by_label("Words, such as a method or an author").fill("weiss (1974)")

    assert "hold" in page.inner_text("#checks")
    assert "Weiss (1974)" in page.inner_text(".checks-table tbody tr")
    assert page.locator(".checks-table .measure .dot").count() > 0


def test_an_example_of_the_reference_runs(look: Look) -> None:
    page = look.open("/reference#wrong")
    page.get_by_role("button", name="Run example get of flux", exact=True).click()
    page.wait_for_selector(".answered")

    assert '"quantity": "flux"' in page.inner_text(".answered")
    assert look.complaints == []


def audit(page: Any) -> list[str]:
    axe = pytest.importorskip("axe_playwright_python.sync_playwright", reason="pip install axe-playwright-python").Axe()
    found = axe.run(page, options={"runOnly": {"type": "tag", "values": RULES}}).response["violations"]
    return [f"{each['id']}: {node['html'][:200]} {node['failureSummary']}" for each in found for node in each["nodes"]]


@pytest.mark.parametrize("scheme", ["light", "dark"])
@pytest.mark.parametrize("width", [360, 1280])
def test_an_audit_of_accessibility_finds_nothing(
    browser: Any, address: str, scheme: str, width: int, long_file: Path
) -> None:
    looking = Look(browser, address, scheme, width)
    for view in VIEWS:
        page = looking.open(f"/?quantity=flux&{QUESTION}&u_methods=1&check_gas=ar#{view}")
        if view == "file":
            page.set_input_files("#file-field", long_file)
            page.wait_for_selector("button.go")
        for each in page.query_selector_all("details:not([open]) > summary"):
            if each.is_visible():
                each.click()

        assert audit(page) == []
        assert page.evaluate("document.documentElement.scrollWidth") <= width
    looking.open("/reference")

    assert audit(looking.page) == []
    assert looking.page.evaluate("document.documentElement.scrollWidth") <= width
    looking.close()


def test_all_of_it_can_be_done_by_keyboard_alone(look: Look) -> None:
    page = look.open(f"/?quantity=flux&{QUESTION}")
    before = look.value()

    def tab_to(selector: str) -> None:
        for _ in range(200):
            page.keyboard.press("Tab")
            if page.evaluate("wanted => document.activeElement.matches(wanted)", selector):
                outline = page.evaluate("getComputedStyle(document.activeElement).outlineStyle")
                assert outline != "none"
                return
        raise AssertionError(f"{selector} cannot be reached by Tab")

    tab_to("#in-wind_speed")
    page.keyboard.type("9")
    until(lambda: page.evaluate(f"document.querySelector('[data-result=flux]').dataset.value != '{before}'"))
    page.evaluate("document.activeElement.blur()")
    tab_to('a[href="#pictures"]')
    page.keyboard.press("Enter")
    page.wait_for_selector(".method .line")
    tab_to("[aria-label='Show ho-2006 in the picture']")

    assert page.locator(".method.pointed[data-method='ho-2006']").count() == 1


def test_the_first_view_is_there_within_a_second(look: Look) -> None:
    look.open()  # by now the service has made what it makes once
    look.page.goto(f"{look.address}/?quantity=flux&{QUESTION}")
    look.value()
    shown = look.page.evaluate("performance.now()")
    sizes = "performance.getEntriesByType('resource').reduce((sum, each) => sum + each.transferSize, 0)"

    assert shown < ONE_SECOND
    assert look.page.evaluate(sizes) < 150_000


@pytest.fixture
def guarded(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> Iterator[str]:
    monkeypatch.setitem(ENVIRONMENT, "CATSPAW_TOKEN", "of-the-lab")
    running = Service(tmp_path / "log")
    running.start()
    yield running.url
    running.stop()


def test_a_token_is_asked_for_and_kept_in_memory_alone(browser: Any, guarded: str) -> None:
    looking = Look(browser, guarded)
    page = looking.open(f"/?quantity=flux&{QUESTION}")
    page.get_by_label("This service asks for its token").fill("wrong")
    page.keyboard.press("Enter")
    page.get_by_label("That was not its token").fill("of-the-lab")
    page.keyboard.press("Enter")

    assert looking.value() < 0
    assert page.evaluate("localStorage.length + sessionStorage.length + document.cookie.length") == 0
    assert "of-the-lab" not in page.url
    page.get_by_role("link", name="Take away").click()
    assert "$CATSPAW_TOKEN" in looking.snippet("curl")
    assert "of-the-lab" not in page.content()
    looking.close()
