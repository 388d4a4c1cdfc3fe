"""The scripts of a page: each gets the same number and the same table, and says what went wrong."""

import re
import shutil
import subprocess
import sys
from dataclasses import dataclass, field
from pathlib import Path

import pytest

from tests.clients.running import ENVIRONMENT, EXAMPLES, PATIENCE, Relay, free_port

pytestmark = pytest.mark.clients
INGEST = EXAMPLES / "ingest"
STATIONS = INGEST / "stations.csv"
NO_TQDM = "flux.py needs tqdm: pip install -r examples/ingest/requirements.txt"


@dataclass(frozen=True)
class Script:
    """How a script is run, which programs that takes, and whether it shows the reason of a refusal."""

    name: str
    line: list[str]
    needs: tuple[str, ...]
    environment: dict[str, str] = field(default_factory=dict)
    shows_reason: bool = True


OCTAVE = ["octave-cli", "--quiet", "--no-init-file", "--path", str(INGEST), "--eval"]
SCRIPTS = [
    Script("python", [sys.executable, str(INGEST / "flux.py")], ()),
    Script("r", ["Rscript", "--vanilla", str(INGEST / "flux.R")], ("Rscript", "curl")),
    Script("octave", OCTAVE, ("octave-cli",), shows_reason=False),
    Script("node", ["node", str(INGEST / "flux.mjs")], ("node",)),
    Script("curl", ["bash", str(INGEST / "flux.sh")], ("bash", "curl", "awk")),
    Script("bash", ["bash", str(INGEST / "flux.sh")], ("bash", "awk"), {"CATSPAW_BASH_ALONE": "1"}),
]


def run(script: Script, url: str, folder: Path, file: Path | None = None) -> "subprocess.CompletedProcess[str]":
    for program in script.needs:
        if shutil.which(program) is None:
            pytest.skip(f"{program} is not installed")
    if script.name == "python":
        pytest.importorskip("tqdm", reason=NO_TQDM)
    given = [] if file is None else [str(file)]
    if script.name == "octave":
        given = [f"flux('{file}')" if file else "flux"]
    return subprocess.run(
        [*script.line, *given],
        capture_output=True,
        text=True,
        timeout=PATIENCE,
        check=False,
        cwd=folder,
        env=ENVIRONMENT | script.environment | {"CATSPAW_URL": url, "HOME": str(folder)},
    )


@pytest.fixture(params=SCRIPTS, ids=lambda script: script.name)
def script(request: pytest.FixtureRequest) -> Script:
    chosen: Script = request.param
    return chosen


def of_curl(url: str, question: str, *more: str) -> bytes:
    if shutil.which("curl") is None:
        pytest.skip("curl is not installed")
    return subprocess.run(
        ["curl", "--silent", "--fail-with-body", *more, f"{url}/v1/flux?gas=co2{question}"],
        capture_output=True,
        timeout=PATIENCE,
        check=True,
    ).stdout


def test_each_script_gets_the_same_number_to_the_last_digit(service: str, tmp_path: Path, script: Script) -> None:
    question = "&water_temperature=18.4&salinity=35.1&wind_speed=15%20kn&water_fugacity=372.4&air_fugacity=409.1"
    expected = of_curl(service, f"{question}&form=number").decode()
    done = run(script, service, tmp_path)
    told = re.search(r"one number: (\S+) mmol m-2 d-1", done.stdout)

    assert done.returncode == 0, done.stderr
    assert told is not None
    assert float(told[1]) == float(expected)


def test_each_script_keeps_the_same_table(service: str, tmp_path: Path, script: Script) -> None:
    run(script, service, tmp_path)

    assert (tmp_path / "stations_flux.csv").read_bytes() == of_curl(service, "", "--data-binary", f"@{STATIONS}")


def test_each_script_prints_the_same_summary_with_gaps_left_out(service: str, tmp_path: Path, script: Script) -> None:
    table = of_curl(service, "&headers=plain&pick=flux", "--data-binary", f"@{STATIONS}").decode().splitlines()[1:]
    flux = [float(cell) for cell in (line.split(",")[8] for line in table) if cell]
    mean = sum(flux) / len(flux)
    done = run(script, service, tmp_path)

    assert len(flux) == 4
    assert done.stdout.splitlines()[1] == (
        f"stations.csv: 6 rows answered, 4 with a flux, mean {mean:.4f} mmol m-2 d-1"
    )


def test_a_refused_file_leaves_no_table_and_the_reason_is_shown(service: str, tmp_path: Path, script: Script) -> None:
    wrong = tmp_path / "wrong.csv"
    wrong.write_text("water_temperature,salinty\n18.4,35.1\n")
    done = run(script, service, tmp_path, wrong)

    assert done.returncode != 0
    assert not (tmp_path / "wrong_flux.csv").exists()
    if script.shows_reason:
        assert "salinity" in done.stderr


def test_without_a_service_each_script_fails_and_leaves_no_table(tmp_path: Path, script: Script) -> None:
    if script.name == "python":
        script = Script("python", [*script.line, "--tries", "0"], ())
    done = run(script, f"http://127.0.0.1:{free_port()}", tmp_path)

    assert done.returncode != 0
    assert done.stderr
    assert not list(tmp_path.glob("*_flux.csv"))


def python(url: str, folder: Path, *more: str) -> "subprocess.CompletedProcess[str]":
    pytest.importorskip("tqdm", reason=NO_TQDM)
    return subprocess.run(
        [sys.executable, str(INGEST / "flux.py"), *more],
        capture_output=True,
        text=True,
        timeout=PATIENCE,
        check=False,
        cwd=folder,
        env=ENVIRONMENT | {"CATSPAW_URL": url},
    )


def test_as_json_the_fluxes_are_those_of_the_table(service: str, tmp_path: Path) -> None:
    done = python(service, tmp_path, "--json")
    expected = of_curl(service, "&pick=flux", "--data-binary", f"@{STATIONS}").decode().splitlines()
    of_table = [line.split(",")[8] for line in expected]

    assert done.returncode == 0, done.stderr
    assert [line.split(",")[0] for line in (tmp_path / "stations_flux.csv").read_text().splitlines()] == of_table


@pytest.mark.parametrize("faults", [["503"], ["drop", "503"], ["", "drop"], ["", "503", "503"], ["", "cut", "drop"]])
def test_a_failure_on_the_way_is_tried_again(service: str, tmp_path: Path, faults: list[str]) -> None:
    with Relay(service).running() as relay:
        relay.faults = list(faults)
        done = python(relay.url, tmp_path)

    assert done.returncode == 0, done.stderr
    assert len(relay.requests) == 2 + len([fault for fault in faults if fault])
    assert (tmp_path / "stations_flux.csv").read_bytes() == of_curl(service, "", "--data-binary", f"@{STATIONS}")


def test_a_refusal_is_not_tried_again(service: str, tmp_path: Path) -> None:
    with Relay(service).running() as relay:
        done = python(relay.url, tmp_path, "--set", "salinty=3")

    assert done.returncode == 1
    assert len(relay.requests) == 2


def test_a_long_file_goes_in_pieces_and_comes_back_as_one_table(service: str, tmp_path: Path) -> None:
    """Quoted line ends lie at the 50,000th row, where the first piece ends."""
    header, *rows = STATIONS.read_text().splitlines()
    lines = [rows[number % len(rows)] for number in range(120_000)]
    lines[49_999] = '"Nowhere,\n""1"" (invented)",' + lines[49_999].partition(",")[2]
    long = tmp_path / "long.csv"
    long.write_text("\n".join([header, *lines]))
    with Relay(service).running() as relay:
        relay.faults = ["", "", "cut"]
        done = python(relay.url, tmp_path, str(long), "--set", "pick=flux")
    whole = of_curl(service, "&pick=flux", "--data-binary", f"@{long}")

    assert done.returncode == 0, done.stderr
    assert relay.requests.count(("POST", "/v1/flux")) == 4
    assert (tmp_path / "long_flux.csv").read_bytes() == whole
    assert "120000 rows answered, 80000 with a flux" in done.stdout
