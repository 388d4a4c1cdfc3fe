"""The server: gunicorn with settings fit for loggers, spreadsheets and slow links."""

import gc
import signal
import time
from pathlib import Path
from typing import Any

from flask import Flask
from gunicorn.app.base import BaseApplication
from gunicorn.arbiter import Arbiter

from schemas.examples import quantity_examples
from service.app import create_app
from service.config import Config, strangers
from service.counts import SHARED_MEMORY, Counts, make_folder
from service.health import begin_to_stop
from service.memory import share_what_is_free
from service.physics.declare import QUANTITIES
from service.record import Recorder
from service.worker import Worker

LOOPBACK = ("127.", "localhost", "[::1]", "unix:")
TO_STOP = (signal.SIGTERM, signal.SIGQUIT, signal.SIGINT)
STUCK_SECONDS = 120  # a worker whose main loop does not turn for so long is replaced


class Master(Arbiter):  # type: ignore[misc]  # gunicorn ships no types
    """The process that starts and stops the workers."""

    drain_seconds = 0
    _stops_at: float | None = None

    def handle_term(self) -> None:
        """Begin to stop: not ready at once, gone when the drain is over, or at the second word."""
        begin_to_stop()
        if self._stops_at is not None or not self.drain_seconds:
            super().handle_term()
        self._stops_at = time.monotonic() + self.drain_seconds
        self.log.info("Not ready any more; stopping in %s s", self.drain_seconds)

    def spawn_worker(self) -> Any:
        """Start a worker; a word to stop that comes before it listens to any is kept until it does."""
        signal.pthread_sigmask(signal.SIG_BLOCK, TO_STOP)
        try:
            return super().spawn_worker()
        finally:
            signal.pthread_sigmask(signal.SIG_UNBLOCK, TO_STOP)

    def manage_workers(self) -> None:
        """Keep the number of workers, and stop when it is time."""
        super().manage_workers()
        if self._stops_at is not None and time.monotonic() >= self._stops_at:
            raise StopIteration


class Server(BaseApplication):  # type: ignore[misc]
    """The service under gunicorn."""

    def __init__(self, config: Config) -> None:
        self.config_of_service = config
        share_what_is_free()
        folder = make_folder() if config.metrics == "on" else None
        self.counts = Counts(folder) if folder else None
        super().__init__()

    def load_config(self) -> None:
        """Set what the service needs of gunicorn."""
        config = self.config_of_service
        Recorder.lines, Recorder.counts = config.log == "requests", self.counts
        Worker.slow_seconds, Master.drain_seconds = config.slow_seconds, config.drain_seconds
        settings: dict[str, Any] = {
            "bind": config.bind,
            "workers": config.workers,
            "worker_class": Worker,  # threads are for slow clients, workers for work
            "threads": config.threads,
            "logger_class": Recorder,
            "preload_app": True,  # warm before the first connection, and workers share its memory
            "keepalive": config.keepalive_seconds,  # loggers reuse a connection after minutes
            "limit_request_line": 8190,
            "graceful_timeout": config.graceful_seconds,
            "timeout": STUCK_SECONDS,
            "max_requests": config.max_requests,
            "max_requests_jitter": config.max_requests // 10,  # so that workers are not replaced all at once
            "forwarder_headers": "",  # no header of a client changes an address
            "forwarded_allow_ips": "",  # or a scheme
            "secure_scheme_headers": {},
            "control_socket_disable": True,
            "proc_name": "catspaw",
            "worker_tmp_dir": SHARED_MEMORY if Path(SHARED_MEMORY).is_dir() else None,
            "pre_fork": _before_fork,
            "post_worker_init": _listen_to_signals,
            "child_exit": self._after_worker,
            "on_exit": self._at_end,
        }
        for name, value in settings.items():
            if value is not None:
                self.cfg.set(name, value)

    def load(self) -> Flask:
        """Return the application, warm: every quantity has answered once."""
        app = create_app(self.config_of_service)
        client = app.test_client()
        token = {"Authorization": f"Bearer {self.config_of_service.token}"}
        for name in QUANTITIES:
            client.get(_first_example(name), headers=token).close()
        return app

    def run(self) -> None:
        """Serve until told to stop."""
        told = " ".join(f"{name}={value}" for name, value in self.config_of_service.told().items())
        master = Master(self)
        master.log.info("Settings: %s", told)
        master.run()

    def _after_worker(self, _: Any, worker: Any) -> None:
        if self.counts is not None:
            self.counts.take_over(worker.pid)

    def _at_end(self, _: Any) -> None:
        if self.counts is not None:
            self.counts.end()


def _before_fork(_: Any, __: Any) -> None:
    gc.freeze()  # what is there already stays shared: the collector does not touch it


def _listen_to_signals(_: Any) -> None:
    signal.pthread_sigmask(signal.SIG_UNBLOCK, TO_STOP)


def _first_example(name: str) -> str:
    return next(str(each["url"]) for each in quantity_examples(QUANTITIES[name]) if each["name"] == "get")


def warnings(config: Config) -> list[str]:
    """Return a line for everything about a configuration that is allowed and may not be meant."""
    lines = strangers()
    if not config.bind.startswith(LOOPBACK) and not config.token:
        lines.append(f"listening on {config.bind} without CATSPAW_TOKEN: anyone who reaches it may ask")
    return lines


def serve(config: Config) -> int:
    """Serve until told to stop."""
    Server(config).run()
    return 0
