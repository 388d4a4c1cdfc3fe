"""The server: gunicorn with settings fit for loggers, spreadsheets and slow links."""

import sys
from typing import Any

from flask import Flask
from gunicorn.app.base import BaseApplication

from service.app import create_app
from service.config import Config

LOOPBACK = ("127.", "localhost", "[::1]", "unix:")


class Server(BaseApplication):  # type: ignore[misc]  # gunicorn ships no types
    """The service under gunicorn."""

    def __init__(self, config: Config) -> None:
        self.config_of_service = config
        super().__init__()

    def load_config(self) -> None:
        """Set what the service needs of gunicorn."""
        config = self.config_of_service
        settings: dict[str, Any] = {
            "bind": config.bind,
            "workers": config.workers,
            "worker_class": "gthread",  # threads are for slow clients, workers for work
            "threads": config.threads,
            "keepalive": 75,  # loggers reuse a connection after minutes
            "limit_request_line": 8190,
            "graceful_timeout": 30,
            "timeout": 120,
            "forwarder_headers": "",  # no header of a client changes an address
            "control_socket_disable": True,
            "proc_name": "catspaw",
            "worker_tmp_dir": "/dev/shm" if sys.platform == "linux" else None,
        }
        for name, value in settings.items():
            if value is not None and name in self.cfg.settings:
                self.cfg.set(name, value)

    def load(self) -> Flask:
        """Return the application."""
        return create_app(self.config_of_service)


def serve(config: Config) -> int:
    """Serve until told to stop."""
    if not config.bind.startswith(LOOPBACK) and not config.token:
        print(  # noqa: T201  before there is a log
            f"catspaw: listening on {config.bind} without CATSPAW_TOKEN: anyone who reaches it may ask",
            file=sys.stderr,
        )
    Server(config).run()
    return 0
