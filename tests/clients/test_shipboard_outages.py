"""The logger bridge loses and doubles nothing: killed at any moment, the service away, answers cut."""

import random
import subprocess
import sys
from collections.abc import Iterator
from contextlib import suppress
from functools import partial
from pathlib import Path

import pytest

from tests.clients.running import ENVIRONMENT, PATIENCE, Relay, Service, stopped_at_the_end, until
from tests.clients.shipboard import SAMPLE, bridge, command, rows, ship, tables, waiting

pytest.importorskip("pynmea2", reason="the bridge needs pynmea2: pip install -r examples/shipboard/requirements.txt")
pytest.importorskip("serial", reason="the bridge needs pyserial: pip install -r examples/shipboard/requirements.txt")

pytestmark = pytest.mark.clients
KILLED = -9


@pytest.fixture(scope="module")
def finely(service: str, tmp_path_factory: pytest.TempPathFactory) -> Path:
    """Return the tables of the sample at intervals of five seconds."""
    data = tmp_path_factory.mktemp("finely")
    done = bridge(service, data, SAMPLE, "--ship", ship(data, 5))
    assert done.returncode == 0, done.stderr
    return data


@pytest.fixture
def own_service(tmp_path: Path) -> Iterator[Service]:
    running = Service(tmp_path / "service.log")
    yield running
    running.stop()


@pytest.mark.parametrize("seed", range(3))
def test_killed_at_random_moments_it_writes_every_interval_once(
    service: str, finely: Path, tmp_path: Path, seed: int
) -> None:
    """A moment is told by how much has been written, so that it does not depend on the speed of the machine."""
    moments = random.Random(seed)
    data, description = tmp_path / "data", ship(tmp_path, 5)
    kills = 0
    while True:
        enough = written(data) + moments.randrange(1, 12_000)  # bytes, of some 90,000
        process = subprocess.Popen(
            command(service, data, SAMPLE, "--ship", description), stderr=subprocess.DEVNULL, env=ENVIRONMENT
        )
        with stopped_at_the_end(process):
            until(partial(ended_or_wrote, process, data, enough), pause=0.0005)
            process.kill()
            status = process.wait(PATIENCE)
        if status != KILLED:
            break
        kills += 1

    assert status == 0
    assert kills >= 5
    assert tables(data) == tables(finely)
    assert waiting(data) == 0


def written(data: Path) -> int:
    """Return how many bytes are in the queue and the tables."""
    total = 0
    for path in (data / "queue.jsonl", *data.glob("flux_*.csv")):
        with suppress(FileNotFoundError):
            total += path.stat().st_size
    return total


def ended_or_wrote(process: "subprocess.Popen[bytes]", data: Path, enough: int) -> bool:
    return process.poll() is not None or written(data) >= enough


KILL_AT = """
import os, runpy, signal, sys
left = int(sys.argv.pop(1))
def counted(name):
    real = getattr(os, name)
    def call(*arguments):
        global left
        left -= 1
        if left == 0:
            if name == "write":
                real(arguments[0], bytes(arguments[1])[: len(arguments[1]) // 2])
            os.kill(os.getpid(), signal.SIGKILL)
        return real(*arguments)
    setattr(os, name, call)
for name in ("write", "fsync", "replace", "open", "truncate"):
    counted(name)
sys.path.insert(0, os.path.dirname(sys.argv[1]))
sys.argv.pop(0)
runpy.run_path(sys.argv[0], run_name="__main__")
"""


def test_killed_at_each_of_its_steps_on_the_disk_it_writes_every_interval_once(service: str, tmp_path: Path) -> None:
    """A write is cut in the middle. Each kill is followed by a whole run, into a folder of its own."""
    description = ship(tmp_path, 300)
    bridge(service, tmp_path / "whole", SAMPLE, "--ship", description)
    expected = tables(tmp_path / "whole")
    killed = 0
    while True:
        data = tmp_path / f"killed_{killed + 1}"
        _, script, *more = command(service, data, SAMPLE, "--ship", description)
        wrapped = [sys.executable, "-c", KILL_AT, str(killed + 1), script, *more]
        status = subprocess.run(wrapped, capture_output=True, timeout=PATIENCE, check=False, env=ENVIRONMENT).returncode
        if status == 0:
            break
        killed += 1

        assert status == KILLED
        assert bridge(service, data, SAMPLE, "--ship", description).returncode == 0
        assert tables(data) == expected
        assert waiting(data) == 0
    assert killed >= 20  # four intervals in the queue, two tables, the queue exchanged


def test_without_a_service_intervals_wait_and_are_sent_in_one_batch_later(
    own_service: Service, undisturbed: Path, tmp_path: Path
) -> None:
    first = bridge(own_service.url, tmp_path)
    kept = waiting(tmp_path)
    own_service.start()
    with Relay(own_service.url).running() as relay:
        second = bridge(relay.url, tmp_path)

    assert (first.returncode, kept) == (3, 15)
    assert "no answer" in first.stderr
    assert second.returncode == 0
    assert relay.requests.count(("POST", "/v1/flux")) == 1
    assert tables(tmp_path) == tables(undisturbed)


def goes_on(data: Path, answered: list[dict[str, str]], queued: int, is_up: bool) -> bool:
    return len(rows(data)) > len(answered) if is_up else waiting(data) > queued


def test_a_log_that_grows_while_the_service_stops_and_starts_and_the_bridge_is_killed_loses_nothing(
    own_service: Service, finely: Path, tmp_path: Path
) -> None:
    growing, description = tmp_path / "sample.log", ship(tmp_path, 5)
    lines = SAMPLE.read_bytes().splitlines(keepends=True)
    arguments = command(own_service.url, tmp_path, growing, "--follow", "--ship", description)
    growing.write_bytes(b"")
    chance = random.Random(7)
    stages = 8
    for stage in range(stages):
        if stage in (0, 5):
            own_service.start()
        if stage == 2:
            own_service.stop()
        part = lines[len(lines) * stage // stages : len(lines) * (stage + 1) // stages]
        with stopped_at_the_end(subprocess.Popen(arguments, stderr=subprocess.DEVNULL, env=ENVIRONMENT)) as process:
            with growing.open("ab") as file:
                for line in part:
                    place = chance.randrange(len(line))
                    file.write(line[:place])
                    file.flush()
                    file.write(line[place:])
            until(partial(goes_on, tmp_path, rows(tmp_path), waiting(tmp_path), stage not in (2, 3, 4)))
            assert process.poll() is None
    done = bridge(own_service.url, tmp_path, growing, "--ship", description)

    assert done.returncode == 0
    assert tables(tmp_path) == tables(finely)


@pytest.mark.parametrize("fault", ["503", "drop", "cut"])
def test_half_an_answer_or_none_is_asked_for_again(service: str, undisturbed: Path, tmp_path: Path, fault: str) -> None:
    with Relay(service).running() as relay:
        relay.faults = [fault]
        first = bridge(relay.url, tmp_path)
        between = tables(tmp_path)
        second = bridge(relay.url, tmp_path)

    assert (first.returncode, between) == (3, {})
    assert second.returncode == 0
    assert tables(tmp_path) == tables(undisturbed)
