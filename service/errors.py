"""One problem document for everything that goes wrong, after RFC 9457."""

import logging
from typing import Any

import orjson
from flask import Flask, Response, g, request
from werkzeug.exceptions import HTTPException

from service.physics.faults import Fault, Refused

LISTED = 20  # errors told in one document; the rest are counted
LONGEST = 300  # characters of any text in a document
ALLOWED_LONGEST = 2000  # characters of a list of what is allowed
TYPES = {
    400: ("unreadable", "The request cannot be read"),
    401: ("unauthorised", "A token is needed"),
    404: ("not-found", "No such address"),
    405: ("method-not-allowed", "The address does not take this method"),
    413: ("too-large", "The request is larger than the limit"),
    414: ("too-long", "The address is longer than the limit"),
    415: ("media-type", "The content encoding is not read"),
    422: ("wrong", "The request is readable but wrong"),
    500: ("internal", "A fault of the service"),
    503: ("busy", "The service is busy"),
}
log = logging.getLogger("catspaw")


def cut(text: str, longest: int = LONGEST) -> str:
    """Return a text short enough for a document."""
    return text if len(text) <= longest else text[: longest - 3] + "..."


def _told(fault: Fault) -> dict[str, Any]:
    entry: dict[str, Any] = {"code": fault.code, "name": cut(fault.name, 100), "reason": cut(fault.reason)}
    if fault.allowed is not None:
        entry["allowed"] = cut(fault.allowed, ALLOWED_LONGEST)
    if fault.sample is not None:
        entry["sample"] = fault.sample
    if fault.line is not None:
        entry["line"] = fault.line
    return entry


def sentence(faults: tuple[Fault, ...]) -> str:
    """Return what a technician can act on, in one line."""
    first = faults[0]
    where = f" (line {first.line})" if first.line else f" (sample {first.sample})" if first.sample else ""
    more = f"; and {len(faults) - 1} more" if len(faults) > 1 else ""
    return cut(" ".join(f"{first.name}{where} {first.reason}{more}".split()), 500)


def problem(status: int, detail: str, faults: tuple[Fault, ...] = ()) -> Response:
    """Return a problem document, or one line of text where the caller asked for it."""
    if request.args.get("errors") == "text" and 400 <= status < 500 and status != 401:
        name, _, reason = detail.partition(" ")
        line = f"ERROR {faults[0].name}: {faults[0].reason}" if faults else f"ERROR {name}: {reason}"
        return Response(cut(" ".join(line.split()), 500), 200, mimetype="text/plain")
    kind, title = TYPES.get(status, TYPES[500 if status >= 500 else 400])
    document: dict[str, Any] = {
        "type": f"/reference#{kind}",
        "title": title,
        "status": status,
        "detail": detail,
        "instance": g.get("request_id", ""),
    }
    if faults:
        document["errors"] = [_told(fault) for fault in faults[:LISTED]]
        if len(faults) > LISTED:
            document["more"] = len(faults) - LISTED
    return Response(orjson.dumps(document), status, mimetype="application/problem+json")


def install(app: Flask) -> None:
    """Answer every error of an application with a problem document."""

    @app.errorhandler(Refused)
    def refused(error: Refused) -> Response:
        return problem(error.status, sentence(error.faults), error.faults)

    @app.errorhandler(HTTPException)
    def http(error: HTTPException) -> Response:
        status = error.code or 500
        answer = problem(status, _http_detail(error, status))
        allowed = getattr(error, "valid_methods", None)
        if allowed:
            answer.headers["Allow"] = ", ".join(sorted(allowed))
        return answer

    @app.errorhandler(Exception)
    def last_resort(error: Exception) -> Response:
        log.exception("unforeseen fault in request %s", g.get("request_id", ""), exc_info=error)
        return problem(500, f"request {g.get('request_id', '')} met a fault of the service; its log says more")


def _http_detail(error: HTTPException, status: int) -> str:
    if status == 404:
        return f"address {cut(request.path, 100)} is not served; /v1 lists what is"
    if status == 405:
        return f"method {cut(request.method, 20)} is not taken here; see Allow"
    return cut(error.description or error.name)
