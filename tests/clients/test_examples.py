"""The invented cruise, sent to a running service by the script that comes with it."""

import csv
import io
import re
import statistics
import subprocess
import sys
from contextlib import suppress
from dataclasses import dataclass
from pathlib import Path

import pytest

from tests.clients.running import ENVIRONMENT, EXAMPLES, PATIENCE, free_port

CRUISE = EXAMPLES / "underway_cruise.csv"
HIGHEST_STEADY_WIND = 35.0  # kn at 18 m, below 20 m s-1 at 10 m by any profile
SQUALL = 44.0  # kn at 18 m, above 20 m s-1 at 10 m by any profile


@dataclass(frozen=True)
class Run:
    """What came of the script."""

    status: int
    told: str
    complaint: str
    answered: bytes


def ingest(url: str, output: Path, *more: str) -> Run:
    done = subprocess.run(
        [sys.executable, EXAMPLES / "ingest_cruise.py", "--url", url, "--output", output, *more],
        capture_output=True,
        text=True,
        timeout=PATIENCE,
        check=False,
        env=ENVIRONMENT,
    )
    return Run(done.returncode, done.stdout, done.stderr, output.read_bytes() if output.exists() else b"")


@pytest.fixture(scope="module")
def run(service: str, tmp_path_factory: pytest.TempPathFactory) -> Run:
    return ingest(service, tmp_path_factory.mktemp("run") / "answered.csv")


@pytest.fixture(scope="module")
def rows(run: Run) -> list[dict[str, str]]:
    return list(csv.DictReader(io.StringIO(run.answered.decode(), newline="")))


def number(cell: str) -> float:
    with suppress(ValueError):
        return float(cell)
    return float("nan")


def test_the_generator_writes_the_file_that_is_kept(tmp_path: Path) -> None:
    again = tmp_path / "again.csv"
    subprocess.run([sys.executable, EXAMPLES / "make_cruise.py", again], check=True, timeout=PATIENCE)

    assert again.read_bytes() == CRUISE.read_bytes()


def test_every_row_of_the_cruise_says_that_it_is_invented() -> None:
    lines = CRUISE.read_text().splitlines()[1:]

    assert len(lines) == 2000
    assert all("(invented)" in line.split(",")[0] for line in lines)


def test_the_script_succeeds_without_a_complaint(run: Run) -> None:
    assert (run.status, run.complaint) == (0, "")


def test_every_line_comes_back_in_place_with_its_bytes_unchanged(run: Run) -> None:
    sent, answered = CRUISE.read_bytes().splitlines(), run.answered.splitlines()

    assert len(answered) == len(sent)
    assert all(after.startswith(before + b",") for before, after in zip(sent, answered, strict=True))


def test_a_gap_in_a_needed_input_is_flagged_missing(rows: list[dict[str, str]]) -> None:
    needed = ("SST", "salinity", "wind_speed [kn]", "baro_hPa", "xCO2_sea", "xCO2_air")
    gaps = {i for i, row in enumerate(rows) if any(row[name] in ("", "NA", "NaN") for name in needed)}
    flagged = {i for i, row in enumerate(rows) if row["quality_flag"] == "9"}

    assert gaps
    assert flagged == gaps


def test_an_impossible_barometer_and_a_word_for_a_number_are_flagged_bad(rows: list[dict[str, str]]) -> None:
    bad = {i for i, row in enumerate(rows) if number(row["baro_hPa"]) < 400.0 or row["xCO2_sea"] == "CAL"}
    missing = {i for i, row in enumerate(rows) if row["quality_flag"] == "9"}
    flagged = {i for i, row in enumerate(rows) if row["quality_flag"] == "4"}

    assert any(row["xCO2_sea"] == "CAL" for row in rows)
    assert any(number(row["baro_hPa"]) < 400.0 for row in rows)
    assert flagged == bad - missing


def test_the_river_mouth_and_the_squall_are_flagged_suspect(rows: list[dict[str, str]]) -> None:
    with_flux = [row for row in rows if row["flux [mmol m-2 d-1]"]]
    river = [row for row in with_flux if float(row["salinity"]) < 5.0]
    squall = [row for row in with_flux if float(row["wind_speed [kn]"]) > SQUALL]

    assert river
    assert squall
    assert {row["quality_flag"] for row in river + squall} == {"3"}


def test_ordinary_rows_are_flagged_good_whether_or_not_there_is_a_position(rows: list[dict[str, str]]) -> None:
    ordinary = [
        row
        for row in rows
        if row["quality_flag"] not in ("4", "9")
        and float(row["salinity"]) >= 5.0
        and float(row["wind_speed [kn]"]) < HIGHEST_STEADY_WIND
        and float(row["baro_hPa"]) > 870.0  # hPa, the lowest ever measured at sea level
    ]

    assert len(ordinary) > 1000
    assert any(row["latitude"] == "" for row in ordinary)
    assert {row["quality_flag"] for row in ordinary} == {"1"}


def test_results_stand_in_exactly_the_rows_flagged_good_or_suspect(rows: list[dict[str, str]]) -> None:
    assert all(bool(row["flux [mmol m-2 d-1]"]) == (row["quality_flag"] in ("1", "3")) for row in rows)


@pytest.mark.parametrize(("title", "flags"), [("all with a flux", "13"), ("good alone (flag 1)", "1")])
def test_the_printed_means_are_those_of_the_answered_columns(
    run: Run, rows: list[dict[str, str]], title: str, flags: str
) -> None:
    kept = [row for row in rows if row["quality_flag"] in flags]
    flux = [float(row["flux [mmol m-2 d-1]"]) for row in kept]
    k = [float(row["transfer_velocity [cm h-1]"]) for row in kept]
    wind = [float(row["wind_speed_10m [m s-1]"]) for row in kept]
    line = next(line for line in run.told.splitlines() if line.strip().startswith(title))
    printed = line.strip().removeprefix(title).split()

    assert printed[0] == f"{statistics.fmean(flux):.2f}"
    assert printed[1:4] == [f"{min(flux):.2f}", "to", f"{max(flux):.2f}"]
    assert printed[4:7] == [f"{statistics.fmean(k):.1f}", f"{statistics.fmean(wind):.1f}", str(len(kept))]


def test_the_report_counts_the_rows_of_each_flag(run: Run, rows: list[dict[str, str]]) -> None:
    table = run.told.partition("quality flag (IOC)\n")[2].partition("\n\n")[0]
    printed = {line.split()[0]: int(line.split()[1]) for line in table.splitlines()}
    flags = [row["quality_flag"] for row in rows]

    assert printed == {flag: flags.count(flag) for flag in ("1", "3", "4", "9")}


def test_the_readme_shows_what_the_script_prints(run: Run) -> None:
    """Only the first line, with the address, and the last, with the seconds, differ from run to run."""
    shown = re.search(r"## What it prints\n\n```\n(.*?)\n```", (EXAMPLES / "README.md").read_text(), re.DOTALL)

    assert shown is not None
    assert shown[1].splitlines()[1:-1] == run.told.splitlines()[1:-1]


def test_without_a_service_one_line_says_so(tmp_path: Path) -> None:
    run = ingest(f"http://127.0.0.1:{free_port()}", tmp_path / "none.csv")

    assert run.status == 2
    assert run.complaint.count("\n") == 1
    assert "is it running?" in run.complaint
    assert run.answered == b""


def test_a_refusal_is_told_in_the_words_of_the_service(service: str, tmp_path: Path) -> None:
    run = ingest(service, tmp_path / "none.csv", "--set", "ignore=")

    assert run.status == 1
    assert "ignore=water_temperature" in run.complaint
    assert run.answered == b""
