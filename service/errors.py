"""One problem document for everything that goes wrong, after RFC 9457."""

import logging
from collections.abc import Sequence
from typing import Any

import orjson
from flask import Flask, Response, g, request
from werkzeug.exceptions import HTTPException

from service.bodies import READ
from service.physics.faults import Fault, Refused
from service.places import Busy

LISTED = 20  # errors told in one document; the rest are counted
DOCUMENT_BYTES = 64 * 1024  # the longest problem document
LONGEST = 300  # characters of any text in a document
ALLOWED_LONGEST = 2000  # characters of a list of what is allowed
TYPES = {
    400: ("unreadable", "The request cannot be read"),
    401: ("unauthorised", "A token is needed"),
    404: ("not-found", "No such address"),
    405: ("method-not-allowed", "The address does not take this method"),
    408: ("too-slow", "The request did not come in time"),
    413: ("too-large", "The request is larger than the limit"),
    414: ("too-long", "The address is longer than the limit"),
    415: ("media-type", "The content encoding is not read"),
    417: ("expectation", "What the request expects cannot be met"),
    422: ("wrong", "The request is readable but wrong"),
    431: ("headers", "The headers are larger than the limit"),
    500: ("internal", "A fault of the service"),
    503: ("busy", "The service is busy"),
}
PROBLEM = "application/problem+json"
log = logging.getLogger("catspaw")


class BadSamples(Refused):
    """A request with bad samples that asked to be refused for them.

    Parameters
    ----------
    faults : sequence of Fault
        The first bad samples.
    bad, samples : int
        How many there are, of how many.
    """

    def __init__(self, faults: Sequence[Fault], bad: int, samples: int) -> None:
        super().__init__(*faults)
        self.more = bad - len(faults)
        self.detail = f"{bad} of {samples} samples have no result, and strict=1 was sent; the first: {_one(faults[0])}"


def cut(text: str, longest: int = LONGEST) -> str:
    """Return a text fit for a document: short, and without characters that no screen shows."""
    short = text if len(text) <= longest else text[: longest - 3] + "..."
    return short if short.isprintable() else "".join(c if c.isprintable() else ascii(c)[1:-1] for c in short)


def _told(fault: Fault) -> dict[str, Any]:
    entry: dict[str, Any] = {"code": fault.code, "name": cut(fault.name, 100), "reason": cut(fault.reason)}
    if fault.allowed is not None:
        entry["allowed"] = cut(fault.allowed, ALLOWED_LONGEST)
    if fault.sample is not None:
        entry["sample"] = fault.sample
    if fault.line is not None:
        entry["line"] = fault.line
    return entry


def _where(fault: Fault) -> str:
    return f" (line {fault.line})" if fault.line else f" (sample {fault.sample})" if fault.sample else ""


def _why(fault: Fault) -> str:
    """Return the reason of a fault with what is allowed, if it is not in the reason already."""
    reason, allowed = cut(fault.reason), fault.allowed
    if allowed is None or allowed in reason or "allowed: " in reason:
        return reason
    return f"{reason} (allowed: {cut(allowed)})"


def _one(fault: Fault) -> str:
    if fault.reason[:1].isupper():  # a sentence of its own
        return _why(fault)
    return f"{cut(fault.name, 100)}{_where(fault)} {_why(fault)}"


def sentence(faults: tuple[Fault, ...]) -> str:
    """Return what a technician can act on, in one line."""
    return _one(faults[0]) + (f"; and {len(faults) - 1} more" if len(faults) > 1 else "")


def problem(status: int, detail: str, faults: tuple[Fault, ...] = (), more: int = 0) -> Response:
    """Return a problem document, or one line of text where the caller asked for it."""
    if request.args.get("errors") == "text" and 400 <= status < 500 and status != 401:
        return Response(_line(detail, faults), 200, mimetype="text/plain")
    body = document(status, detail, g.get("request_id", ""), faults, more)
    return Response(body, status, mimetype=PROBLEM)


def document(status: int, detail: str, instance: str, faults: tuple[Fault, ...] = (), more: int = 0) -> bytes:
    """Return a problem document of bounded length.

    Parameters
    ----------
    status : int
        Of the answer.
    detail : str
        A sentence on what to do.
    instance : str
        The id of the request.
    faults : tuple of Fault
        What is wrong; the first are listed.
    more : int
        How many there are beside these.
    """
    kind, title = TYPES.get(status, TYPES[500 if status >= 500 else 400])
    head: dict[str, Any] = {
        "type": f"/reference#{kind}",
        "title": title,
        "status": status,
        "detail": detail,
        "instance": instance,
    }
    told = [_told(fault) for fault in faults[:LISTED]]
    body = _document(head, told, more + len(faults) - len(told))
    while len(body) > DOCUMENT_BYTES:
        told.pop()
        body = _document(head, told, more + len(faults) - len(told))
    return body


def _document(head: dict[str, Any], told: list[dict[str, Any]], more: int) -> bytes:
    listed: dict[str, Any] = {"errors": told} if told else {}
    return orjson.dumps(head | listed | ({"more": more} if more else {}))


def _line(detail: str, faults: tuple[Fault, ...]) -> str:
    """Return an error as one line for a cell: the name, and what is wrong with it."""
    if not faults:
        name, _, reason = detail.partition(" ")
        return f"ERROR {name}: {reason}"
    more = f"; and {len(faults) - 1} more" if len(faults) > 1 else ""
    return f"ERROR {cut(faults[0].name, 100)}{_where(faults[0])}: {_why(faults[0])}{more}"


def unauthorised() -> Response:
    """Return the refusal of a request without the token."""
    reason = "is needed: send it as Authorization: Bearer TOKEN, or as the password of any user"
    answer = problem(401, f"a token {reason}")
    answer.headers["WWW-Authenticate"] = 'Bearer realm="catspaw", Basic realm="catspaw"'
    return answer


def install(app: Flask) -> None:
    """Answer every error of an application with a problem document."""

    @app.errorhandler(Refused)
    def refused(error: Refused) -> Response:
        if isinstance(error, BadSamples):
            return problem(error.status, error.detail, error.faults, error.more)
        answer = problem(error.status, sentence(error.faults), error.faults)
        if error.status == 415:
            answer.headers["Accept-Encoding"] = READ
        return answer

    @app.errorhandler(Busy)
    def busy(error: Busy) -> Response:
        reason = f"waited {error.seconds} s for {error.what}: send the same request again later"
        answer = problem(503, f"request {reason}", (Fault("busy", "request", reason),))
        answer.headers["Retry-After"] = str(error.seconds)
        return answer

    @app.errorhandler(HTTPException)
    def http(error: HTTPException) -> Response:
        fault = _http_fault(error)
        answer = problem(error.code or 500, sentence((fault,)), (fault,))
        allowed = getattr(error, "valid_methods", None)
        if allowed:
            answer.headers["Allow"] = ", ".join(sorted(allowed))
        return answer

    @app.errorhandler(Exception)
    def last_resort(error: Exception) -> Response:
        log.exception("unforeseen fault in request %s", g.get("request_id", ""), exc_info=error)
        reason = f"{g.get('request_id', '')} met a fault of the service; its log says more"
        return problem(500, f"request {reason}", (Fault("internal", "request", reason),))


def _http_fault(error: HTTPException) -> Fault:
    if error.code == 404:
        return Fault("not_found", "address", f"{cut(request.path, 100)} is not served; /v1 lists what is")
    if error.code == 405:
        allowed = ", ".join(sorted(getattr(error, "valid_methods", None) or ()))
        return Fault("method", "method", f"{cut(request.method, 20)} is not taken here", allowed)
    if error.code == 413:
        return Fault("too_large", "body", "is over a limit; /v1 lists them")
    return Fault("internal" if (error.code or 500) >= 500 else "unreadable", "request", error.description or error.name)
