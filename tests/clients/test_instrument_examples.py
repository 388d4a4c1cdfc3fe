"""The invented day of raw readings and the invented rack of bottles, taken to fluxes by the scripts beside them."""

import csv
import io
import re
import statistics
import subprocess
import sys
import urllib.request
from dataclasses import dataclass
from pathlib import Path
from urllib.parse import urlencode

import numpy as np
import pytest
import scipy.constants
from CoolProp import CoolProp

from tests.clients.running import ENVIRONMENT, EXAMPLES, PATIENCE, free_port

DAY, RACK = EXAMPLES / "underway_day.csv", EXAMPLES / "headspace_rack.csv"
LINE = re.compile(r"  (\S.*?) +(-?\d+\.\d{3}) +([+-]\d+\.\d{3}) +([+-]\d+\.\d) %")
Rows = list[dict[str, str]]


@dataclass(frozen=True)
class Run:
    """What came of a script."""

    status: int
    told: str
    complaint: str


def script(name: str, *more: object) -> Run:
    done = subprocess.run(
        [sys.executable, EXAMPLES / name, *map(str, more)],
        capture_output=True,
        text=True,
        timeout=PATIENCE,
        check=False,
        env=ENVIRONMENT,
    )
    return Run(done.returncode, done.stdout, done.stderr)


def table(text: str) -> Rows:
    return list(csv.DictReader(io.StringIO(text, newline="")))


@pytest.fixture(scope="module")
def output(tmp_path_factory: pytest.TempPathFactory) -> Path:
    return tmp_path_factory.mktemp("day") / "answered.csv"


@pytest.fixture(scope="module")
def day(service: str, output: Path) -> Run:
    return script("correct_underway.py", "--url", service, "--output", output)


@pytest.fixture(scope="module")
def rows(day: Run, output: Path) -> Rows:
    assert day.status == 0
    return table(output.read_text())


@pytest.fixture(scope="module")
def lines(day: Run) -> dict[str, tuple[float, float, float]]:
    """Return mean, shift and percent of each line of the report."""
    return {name: (float(mean), float(shift), float(percent)) for name, mean, shift, percent in LINE.findall(day.told)}


@pytest.fixture(scope="module")
def rack(service: str) -> Run:
    return script("headspace_bottles.py", "--url", service)


@pytest.fixture(scope="module")
def bottles(rack: Run) -> dict[str, dict[str, list[str]]]:
    """Return the cells of each bottle by gas: ppm, dissolved, saturation, flux, flag and what follows it."""
    found: dict[str, dict[str, list[str]]] = {}
    for part in rack.told.split("\n\n")[1:4]:
        gas = part.partition(":")[0]
        of = [line.split(maxsplit=6) for line in part.splitlines() if re.match(r"  [A-D]\d ", line)]
        found[gas] = {name: cells for name, *cells in of}
    return found


def test_the_generator_writes_the_day_that_is_kept(tmp_path: Path) -> None:
    again = script("make_underway_day.py", tmp_path / "again.csv")

    assert again.status == 0
    assert (tmp_path / "again.csv").read_bytes() == DAY.read_bytes()


@pytest.mark.parametrize(("path", "column"), [(DAY, "platform"), (RACK, "station")])
def test_every_row_says_that_it_is_invented(path: Path, column: str) -> None:
    assert {row[column].endswith("(invented)") for row in table(path.read_text())} == {True}


def test_both_scripts_succeed_without_a_complaint(day: Run, rack: Run) -> None:
    assert (day.status, day.complaint) == (0, "")
    assert (rack.status, rack.complaint) == (0, "")


def test_the_true_wind_of_the_day_is_the_sum_of_two_arrows(rows: Rows) -> None:
    good = [row for row in rows if row["true_wind_speed [m s-1]"]]

    def column(name: str) -> np.ndarray:
        return np.array([float(row[name]) for row in good])

    felt = column("wind_rel_speed") * np.exp(1j * np.radians(column("heading") + column("wind_rel_dir")))
    headway = column("SOG [kn]") * 1852.0 / 3600.0 * np.exp(1j * np.radians(column("COG")))

    assert len(good) == len(rows) - 11
    np.testing.assert_allclose(column("true_wind_speed [m s-1]"), np.abs(felt - headway), rtol=1e-12)


def test_rows_that_cannot_be_answered_are_flagged_and_no_others(rows: Rows) -> None:
    for row in rows:
        calibrating, blank = row["xCO2_equ"] == "CAL", row["T_equ"] == "" or row["heading"] == "NA"

        assert row["quality_flag"] in (("4",) if calibrating else ("9",) if blank else ("1", "3"))
        assert bool(row["flux [mmol m-2 d-1]"]) == (row["quality_flag"] in ("1", "3"))


def test_the_printed_mean_is_that_of_the_answered_rows(day: Run, rows: Rows) -> None:
    flux = [float(row["flux [mmol m-2 d-1]"]) for row in rows if row["flux [mmol m-2 d-1]"]]
    printed = re.search(r"with all corrections +(\S+)", day.told)

    assert printed is not None
    assert float(printed[1]) == pytest.approx(statistics.fmean(flux), abs=0.0005)  # printed to three decimals


def test_every_line_is_the_mean_with_all_corrections_less_what_it_says(
    day: Run, lines: dict[str, tuple[float, float, float]]
) -> None:
    (every,) = (float(text) for text in re.findall(r"with all corrections +(\S+)", day.told))
    left_out, instead = day.told.partition("done differently")[::2]

    assert len(LINE.findall(left_out)) == 8
    assert len(LINE.findall(instead)) == 5
    for name, (mean, shift, percent) in lines.items():
        difference = every - mean if name in left_out else mean - every

        assert shift == pytest.approx(difference, abs=0.0016)  # three numbers printed to three decimals
        assert percent == pytest.approx(100.0 * shift / abs(every), abs=0.06)


def test_the_corrections_move_the_flux_as_physics_has_it(lines: dict[str, tuple[float, float, float]]) -> None:
    shift = {name: moved for name, (_, moved, _) in lines.items()}
    percent = {name: share for name, (_, _, share) in lines.items()}

    assert shift["height of the anemometer"] > 0.0  # it blows harder at 23 m, and the flux is into the water
    assert shift["height of the barometer"] < 0.0  # more pressure at the surface, more gas in the air
    assert shift["warmth of the equilibrator"] < 0.0  # 0.4 K too warm, 1.8 % too much in the water
    assert shift["cool skin"] < 0.0  # the skin dissolves more than the water below it
    assert 5.0 < -percent["warmth of the equilibrator"] < 10.0  # 1.8 % of 350 uatm, of a difference of 72
    assert 2.0 < -percent["cool skin"] < 4.0
    assert percent["all of these"] == max(percent.values())


def test_a_line_is_what_the_service_answers_without_that_correction(
    service: str, lines: dict[str, tuple[float, float, float]]
) -> None:
    def asked(quantity: str, body: bytes, **question: str) -> bytes:
        query = urlencode(question)
        with urllib.request.urlopen(f"{service}/v1/{quantity}?{query}", body, timeout=PATIENCE) as response:
            content: bytes = response.read()
            return content

    wind = {"apparent_wind_speed": "@wind_rel_speed", "apparent_wind_direction": "@wind_rel_dir"}
    wind |= {"course_over_ground": "@COG", "speed_over_ground": "@SOG", "pick": "true_wind_speed"}
    flux = {"gas": "co2", "water_temperature": "@SST_intake", "subskin_temperature": "@SST_float"}
    flux |= {"wind_speed": "@true_wind_speed", "wind_height": "23", "air_pressure": "@baro_hPa"}
    flux |= {"barometer_height": "18", "water_mole_fraction": "@xCO2_equ", "air_mole_fraction": "@xCO2_air"}
    flux |= {"equilibrator_temperature": "@T_equ", "equilibrator_pressure": "@P_equ", "pick": "flux"}
    with_wind = asked("true-wind", DAY.read_bytes(), **wind)
    answered = asked("flux", with_wind, **flux, ignore="quality_flag;quality_reason").decode()
    without_skin = [float(row["flux [mmol m-2 d-1]"]) for row in table(answered) if row["flux [mmol m-2 d-1]"]]

    assert lines["cool skin"][0] == pytest.approx(statistics.fmean(without_skin), abs=0.0005)


def test_a_row_is_shown_step_by_step(service: str, rows: Rows) -> None:
    shown = script("correct_underway.py", "--url", service, "--row", 300)
    (flux,) = re.findall(r"^  flux +(\S+) mmol", shown.told, re.MULTILINE)

    assert shown.status == 0
    assert float(flux) == pytest.approx(float(rows[299]["flux [mmol m-2 d-1]"]), rel=1e-6)
    for name in ("wind_speed_10m", "temperature_factor", "skin_temperature", "surface_pressure", "fugacity_in_air"):
        assert re.search(rf"^  {name} ", shown.told, re.MULTILINE)


def test_methane_in_a_bottle_is_the_balance_done_by_hand(bottles: dict[str, dict[str, list[str]]]) -> None:
    celsius, hectopascal, ratio, ppm, air = 21.4, 961.2, 0.5, 11.9, 2.02  # bottle A1
    vapour = CoolProp.PropsSI("P", "T", celsius + 273.15, "Q", 0, "Water") / 100.0
    dry = (hectopascal - vapour) / 1013.25  # atm
    # compilations of Henry's law: 1.4e-3 mol L-1 atm-1 at 25 degC, 1700 K; known to 5 %
    K0 = 1.4e-3 * np.exp(1700.0 * (1.0 / (celsius + 273.15) - 1.0 / 298.15))
    gas = 1.0 / (scipy.constants.R / scipy.constants.atm * 1e3 * (celsius + 273.15))  # mol L-1 atm-1
    dissolved = 1e3 * dry * (K0 * ppm + ratio * gas * (ppm - air))  # nmol L-1

    assert float(bottles["ch4"]["A1"][1]) == pytest.approx(dissolved, rel=0.005)  # 5 % of the tenth that was dissolved


def test_each_bad_bottle_is_flagged_for_the_gases_that_it_spoils(bottles: dict[str, dict[str, list[str]]]) -> None:
    flags = {gas: {name: cells[4] for name, cells in of.items() if cells[4] != "1"} for gas, of in bottles.items()}

    assert flags == {
        "ch4": {"B3": "9", "D3": "4"},
        "n2o": {"B3": "9", "D3": "4"},
        "co2": {"B3": "9", "D2": "9", "D3": "4"},
    }
    assert all(cells[1:4] == ["-"] * 3 for of in bottles.values() for cells in of.values() if cells[4] in "49")


def test_the_rack_is_supersaturated_and_bottles_of_a_station_agree(
    rack: Run, bottles: dict[str, dict[str, list[str]]]
) -> None:
    for of in bottles.values():
        for cells in of.values():
            assert cells[4] in "49" or (float(cells[2]) > 100.0 and float(cells[3]) > 0.0)
    of_pier = [float(bottles["n2o"][name][3]) for name in ("A1", "A2", "A3")]
    printed = re.findall(r"pier \(invented\) +dissolved \S+ \S+ +flux (\S+) \+-(\S+)", rack.told)[1]

    assert float(printed[0]) == pytest.approx(statistics.fmean(of_pier), rel=1e-3)
    assert float(printed[1]) == pytest.approx(statistics.stdev(of_pier), rel=0.05)


def test_what_was_assumed_and_what_alkalinity_did_is_told(rack: Run) -> None:
    (there, here, percent) = re.search(r"mean flux (\S+) instead of (\S+) .*\((\S+) %\)", rack.told).groups()  # type: ignore[union-attr]

    assert rack.told.count("  assumed: ") == 3
    assert "carbonate_constants=by-salinity" in rack.told
    assert float(percent) == pytest.approx(100.0 * (float(there) / float(here) - 1.0), abs=0.06)
    assert "every bottle flagged 3" in rack.told


@pytest.mark.parametrize("name", ["correct_underway.py", "headspace_bottles.py"])
def test_the_readme_shows_what_the_scripts_print(day: Run, rack: Run, name: str) -> None:
    section = (EXAMPLES / "README.md").read_text().partition(f"examples/{name}\n```")[2]
    shown = re.search(r"```\n(.*?)\n```", section, re.DOTALL)
    told = {"correct_underway.py": day.told, "headspace_bottles.py": rack.told}[name]

    assert shown is not None
    assert shown[1] in told


@pytest.mark.parametrize("name", ["correct_underway.py", "headspace_bottles.py"])
def test_a_script_says_in_one_line_why_it_ends(service: str, tmp_path: Path, name: str) -> None:
    nobody = script(name, "--url", f"http://127.0.0.1:{free_port()}")
    no_file = script(name, tmp_path / "none.csv", "--url", service)
    refused = script(name, "--url", service, "--set", "parameterisation=nobody-1900")

    assert [run.status for run in (nobody, no_file, refused)] == [2, 2, 1]
    assert all(run.complaint.count("\n") == 1 for run in (nobody, no_file, refused))
    assert all("Traceback" not in run.complaint for run in (nobody, no_file, refused))
    assert "nobody-1900" in refused.complaint
