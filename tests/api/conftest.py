"""The application under its test client, and property tests that try the same examples every time."""

import pytest
from flask import Flask
from flask.testing import FlaskClient
from hypothesis import HealthCheck, settings

from service.app import create_app
from service.config import Config

settings.register_profile(
    "same every time",
    derandomize=True,
    deadline=None,
    suppress_health_check=[HealthCheck.function_scoped_fixture],  # the client keeps nothing between examples
)
settings.load_profile("same every time")


@pytest.fixture(scope="session")
def app() -> Flask:
    """Return an application with the default configuration, whatever the environment says."""
    return create_app(Config())


@pytest.fixture
def client(app: Flask) -> FlaskClient:
    """Return a client of it."""
    return app.test_client()


@pytest.fixture(scope="session")
def small() -> FlaskClient:
    """Return a client of an application with small limits."""
    return create_app(Config(csv_bytes=4000, json_bytes=2000)).test_client()
