"""The invented year at a station, summed up by the script that comes with it."""

import re
import subprocess
import sys
from itertools import pairwise
from typing import Any

import pytest
import requests

from examples import budget_station
from tests.clients.running import ENVIRONMENT, EXAMPLES, PATIENCE, free_port

pytestmark = pytest.mark.clients


def run(url: str) -> subprocess.CompletedProcess[str]:
    return subprocess.run(
        [sys.executable, EXAMPLES / "budget_station.py", "--url", url],
        capture_output=True,
        text=True,
        timeout=PATIENCE,
        check=False,
        env=ENVIRONMENT,
    )


@pytest.fixture(scope="module")
def told(service: str) -> str:
    done = run(service)

    assert (done.returncode, done.stderr) == (0, "")
    return done.stdout


@pytest.fixture(scope="module")
def answer(service: str) -> Any:
    asked = {**budget_station.question(), **budget_station.doubts(), "parameterisation": budget_station.METHODS[0]}
    return requests.post(f"{service}/v1/flux", json=asked, timeout=PATIENCE).json()


def test_it_says_that_the_station_is_invented(told: str) -> None:
    assert told.startswith("INVENTED")


def test_the_gap_and_the_rows_left_out_are_told(told: str, answer: Any) -> None:
    summary = answer["summary"]
    missing = sum(value is None for value in answer["results"]["flux"]["values"])

    assert f"{summary['left_out']} left out; longest gap {len(budget_station.OUTAGE) + 1} d" in told
    assert summary["left_out"] == missing > 0


def test_the_mean_is_that_of_the_days_each_held_half_way_to_its_neighbours(answer: Any) -> None:
    """Sum up again by hand: weights from the days alone, with three median spacings of one day as the limit."""
    days = [day for day in range(365) if day not in budget_station.OUTAGE]
    pairs = [(d, f) for d, f in zip(days, answer["results"]["flux"]["values"], strict=True) if f is not None]
    total = covered = 0.0
    for (day, flux), (following, next_flux) in pairwise(pairs):
        half = (following - day if following - day <= 3 else 1.0) / 2.0
        total, covered = total + half * (flux + next_flux), covered + 2.0 * half

    assert answer["summary"]["covered"]["value"] == pytest.approx(covered)
    assert answer["summary"]["results"]["flux"]["mean"]["value"] == pytest.approx(total / covered, rel=1e-12)


def test_the_printed_year_is_the_mean_times_the_days_of_a_year(told: str, answer: Any) -> None:
    mean = answer["summary"]["results"]["flux"]["mean"]
    printed = re.search(r"^a year +(\S+) \+- (\S+) mol m-2 yr-1$", told, re.MULTILINE)

    assert printed is not None
    assert float(printed[1]) == pytest.approx(mean["value"] * 0.3652425, abs=0.005)  # the printed digits
    assert float(printed[2]) == pytest.approx(mean["u"] * 0.3652425, abs=0.005)


def test_the_shares_of_the_doubt_are_printed_the_largest_first_and_add_up(told: str) -> None:
    table = told.partition("what makes the doubt of the year")[2].partition("would shrink")[0]
    shares = [float(share) for share in re.findall(r"^ +(\S+)%", table, re.MULTILINE)]

    assert len(shares) >= 7
    assert shares == sorted(shares, reverse=True)
    assert sum(shares) == pytest.approx(100.0, abs=0.05 * len(shares))  # each is rounded to a tenth


def test_common_errors_outlast_the_days(answer: Any) -> None:
    mean = answer["summary"]["results"]["flux"]["mean"]

    assert mean["u_common"] > 10.0 * mean["u_independent"] > 0.0
    assert mean["u"] == pytest.approx((mean["u_common"] ** 2 + mean["u_independent"] ** 2) ** 0.5)


def test_every_parameterisation_stands_beside_their_mean(told: str) -> None:
    assert all(f"t  {name}" in told for name in budget_station.METHODS)
    assert "their mean; between them" in told


def test_without_a_service_one_line_says_so() -> None:
    done = run(f"http://127.0.0.1:{free_port()}")

    assert done.returncode == 2
    assert done.stdout == ""
    assert "is it running?" in done.stderr
