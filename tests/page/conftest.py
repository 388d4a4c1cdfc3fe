"""A running service and a browser that looks at it; without the browser its tests are skipped with a word on why."""

from collections.abc import Iterator
from pathlib import Path
from shutil import which
from typing import Any

import pytest

from tests.clients.running import Service
from tests.page.looking import Look

CHROMIUM = which("chromium")
SWITCHES = [
    "--no-sandbox",
    "--disable-gpu",
    "--disable-quic",
    "--no-first-run",
    "--disable-background-networking",
    "--disable-component-update",
    "--disable-sync",
]


@pytest.fixture(scope="session")
def address(tmp_path_factory: pytest.TempPathFactory) -> Iterator[str]:
    running = Service(tmp_path_factory.mktemp("page") / "log")
    running.start()
    yield running.url
    running.stop()


@pytest.fixture(scope="session")
def browser() -> Iterator[Any]:
    playwright = pytest.importorskip(
        "playwright.sync_api", reason="the page is driven by playwright: pip install playwright"
    )
    if CHROMIUM is None:
        pytest.skip("the page is looked at in chromium: apt-get install chromium")
    with playwright.sync_playwright() as running:
        chromium = running.chromium.launch(executable_path=CHROMIUM, args=SWITCHES)
        yield chromium
        chromium.close()


@pytest.fixture
def look(browser: Any, address: str) -> Iterator[Look]:
    """Return a page that notes every request it makes and everything it complains of."""
    looking = Look(browser, address)
    yield looking
    looking.close()


@pytest.fixture(scope="session")
def long_file(tmp_path_factory: pytest.TempPathFactory) -> Path:
    """Return a hundred thousand samples, invented."""
    path = tmp_path_factory.mktemp("file") / "invented.csv"
    lines = ["time,station,water_temperature [degC],salinity,wind_speed [m s-1],water_fugacity,air_fugacity"]
    for at in range(100_000):
        day, minute = divmod(at, 1440)
        wind = "" if at % 1000 == 999 else f"{4 + at % 97 / 10}"
        lines.append(
            f"2031-{1 + day // 28:02d}-{1 + day % 28:02d}T{minute // 60:02d}:{minute % 60:02d}:00Z,"
            f"invented,{10 + at % 500 / 50},35,{wind},{360 + at % 80},415"
        )
    path.write_text("\n".join(lines) + "\n", encoding="utf-8")
    return path
