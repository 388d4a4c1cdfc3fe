"""An archive in pieces, by Dask over the physics or by several services: the numbers of one service, bit for bit."""

import json
import subprocess
import sys
from collections.abc import Iterator
from pathlib import Path

import numpy as np
import pytest

from tests.drills.serving import ENVIRONMENT, ROOT, Served, served

pytestmark = pytest.mark.drills
ARCHIVE = ROOT / "examples" / "archive"
SIZE = ("--steps", "7", "--size", "24", "36")
INPUTS = ("water_temperature", "salinity", "wind_speed", "air_pressure", "water_partial_pressure", "air_mole_fraction")


def run(script: str, *words: str | Path, memory: int | None = None) -> str:
    """Run a script of the example, perhaps with so much memory that it can ask for. [bytes]"""
    command = [sys.executable, ARCHIVE / script, *words]
    if memory:
        command = ["prlimit", f"--data={memory}", *command]
    variables = {**ENVIRONMENT, "PYTHONPATH": str(ROOT), "OPENBLAS_NUM_THREADS": "1"}
    done = subprocess.run(command, capture_output=True, text=True, check=False, env=variables)
    assert done.returncode == 0, done.stderr[-2000:]
    return done.stdout + done.stderr


@pytest.fixture(scope="module")
def archive(tmp_path_factory: pytest.TempPathFactory) -> Path:
    folder = tmp_path_factory.mktemp("archive")
    run("make_archive.py", folder, *SIZE)
    return folder


@pytest.fixture(scope="module")
def services(tmp_path_factory: pytest.TempPathFactory) -> Iterator[list[Served]]:
    with (
        served(tmp_path_factory.mktemp("one"), workers=1) as one,
        served(tmp_path_factory.mktemp("other"), workers=1) as other,
    ):
        yield [one, other]


@pytest.fixture(scope="module")
def expected(archive: Path, services: list[Served]) -> dict[str, bytes]:
    """Ask one service for everything, land too, one step at a time."""
    found: dict[str, list[list[float]]] = {"flux": [], "quality_flag": []}
    grids = {name: np.load(archive / f"{name}.npy") for name in INPUTS}
    for step in range(7):
        values = {
            name: [None if np.isnan(one) else one for one in grid[step].ravel().tolist()]
            for name, grid in grids.items()
        }
        content = json.dumps({"gas": "co2", "parameterisation": "wanninkhof-2014", "pick": "flux", **values}).encode()
        status, _, told = services[0].ask("/v1/flux", content)
        assert status == 200, told[:500]
        answer = json.loads(told)
        found["flux"].append([np.nan if one is None else one for one in answer["results"]["flux"]["values"]])
        found["quality_flag"].append(answer["quality"]["flags"])
    shape = grids["salinity"].shape
    return {name: np.array(values, dtype=np.float64).reshape(shape).tobytes() for name, values in found.items()}


def results(folder: Path) -> dict[str, bytes]:
    return {name: np.load(folder / f"{name}.npy").tobytes() for name in ("flux", "quality_flag")}


def test_the_archive_is_the_same_bytes_each_time_and_has_land(archive: Path, tmp_path: Path) -> None:
    run("make_archive.py", tmp_path, *SIZE)

    for name in INPUTS:
        assert (tmp_path / f"{name}.npy").read_bytes() == (archive / f"{name}.npy").read_bytes()
    assert 0.05 < np.isnan(np.load(archive / "salinity.npy")).mean() < 0.5


def test_every_number_has_the_same_bits_whichever_way_it_was_computed(
    archive: Path, services: list[Served], expected: dict[str, bytes], tmp_path: Path
) -> None:
    urls = [word for one in services for word in ("--url", f"http://127.0.0.1:{one.port}")]
    shown = run("flux_with_dask.py", archive, tmp_path / "dask", "--piece", "2")
    run("flux_with_replicas.py", archive, tmp_path / "replicas", *urls, "--piece", "3")

    assert results(tmp_path / "dask") == expected
    assert results(tmp_path / "replicas") == expected
    assert "100% Completed" in shown
    assert all(sum(line["path"] == "/v1/flux" for line in one.lines) > 0 for one in services)


def test_a_service_that_is_gone_costs_nothing(
    archive: Path, services: list[Served], expected: dict[str, bytes], tmp_path: Path
) -> None:
    run(
        "flux_with_replicas.py",
        archive,
        tmp_path,
        "--url",
        f"http://127.0.0.1:{services[1].port}",
        "--url",
        "http://127.0.0.1:9",
    )

    assert results(tmp_path) == expected


def test_an_archive_larger_than_the_memory_that_may_be_used_is_computed(tmp_path: Path) -> None:
    """Some 400 MB of input and 130 of results, with memory for the libraries and a few pieces."""
    run("make_archive.py", tmp_path / "large", "--steps", "130", "--size", "180", "360")
    size = sum(path.stat().st_size for path in (tmp_path / "large").iterdir())
    run("flux_with_dask.py", tmp_path / "large", tmp_path / "results", "--piece", "1", memory=350_000_000)
    flux = np.load(tmp_path / "results" / "flux.npy", mmap_mode="r")

    assert size > 400_000_000
    assert flux.shape == (130, 180, 360)
    assert np.isfinite(flux[-1]).mean() > 0.5
