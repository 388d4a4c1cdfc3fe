"""A running service for the tests of clients, one for all of them."""

from collections.abc import Iterator

import pytest

from tests.clients.running import Service


@pytest.fixture(scope="session")
def service(tmp_path_factory: pytest.TempPathFactory) -> Iterator[str]:
    running = Service(tmp_path_factory.mktemp("service") / "log")
    running.start()
    yield running.url
    running.stop()
