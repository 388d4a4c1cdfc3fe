"""The addresses that tell whether the service is well: alive, ready, and what it has done."""

import mmap
from collections.abc import Callable

from flask import Flask, Response

from service import counts
from service.errors import problem
from service.physics.faults import Fault

JSON = "application/json"
STOPPING = mmap.mmap(-1, 1)  # shared with the workers, which are forked from the process that is told to stop


def begin_to_stop() -> None:
    """Let every worker say that it is not ready."""
    STOPPING[0] = 1


def alive() -> Response:
    """Answer ``/healthz``."""
    return Response(b'{"status":"alive"}', mimetype=JSON)


def ready() -> Response:
    """Answer ``/readyz``."""
    if STOPPING[0]:
        reason = "is about to stop: ask another one, or this one again later"
        answer = problem(503, f"service {reason}", (Fault("busy", "service", reason),))
        answer.headers["Retry-After"] = "5"
        return answer
    return Response(b'{"status":"ready"}', mimetype=JSON)


def metrics() -> Response:
    """Answer ``/metrics``."""
    told = counts.exposition()
    if told is None:
        reason = "is not served: CATSPAW_METRICS is off, or there is no writable memory or folder to count in"
        return problem(404, f"/metrics {reason}", (Fault("not_found", "/metrics", reason),))
    return Response(told, content_type=counts.CONTENT_TYPE)


def install(app: Flask) -> None:
    """Add the addresses to an application."""
    views: dict[str, Callable[[], Response]] = {"/healthz": alive, "/readyz": ready, "/metrics": metrics}
    for rule, view in views.items():
        app.add_url_rule(rule, f"health {rule}", view, methods=["GET"])
