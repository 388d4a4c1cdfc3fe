"""A running service for the tests of clients, one for all of them."""

from collections.abc import Iterator
from pathlib import Path

import pytest

from tests.clients.running import Service
from tests.clients.shipboard import bridge

collect_ignore = ["calc_office.py"]  # runs in another Python, that of the office


@pytest.fixture(scope="session")
def service(tmp_path_factory: pytest.TempPathFactory) -> Iterator[str]:
    running = Service(tmp_path_factory.mktemp("service") / "log")
    running.start()
    yield running.url
    running.stop()


@pytest.fixture(scope="session")
def undisturbed(service: str, tmp_path_factory: pytest.TempPathFactory) -> Path:
    """Return the folder of a bridge that nothing disturbed."""
    pytest.importorskip(
        "pynmea2", reason="the bridge needs pynmea2: pip install -r examples/shipboard/requirements.txt"
    )
    data = tmp_path_factory.mktemp("undisturbed")
    done = bridge(service, data)
    assert done.returncode == 0, done.stderr
    return data
