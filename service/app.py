"""The application: addresses, and what every answer carries."""

import hmac
import re
import secrets
from collections.abc import Callable

from flask import Flask, Request, Response, g, request
from werkzeug.exceptions import NotFound

from service import errors
from service.catalogue import install as install_catalogue
from service.compute import respond
from service.config import Config, service_version
from service.config import read as read_config
from service.evidence import install as install_evidence
from service.health import install as install_health
from service.page.site import install_page
from service.physics.declare import QUANTITIES, Quantity
from service.physics.faults import Fault, Refused
from service.places import Gate

REQUEST_ID = re.compile(r"[A-Za-z0-9._-]{1,64}\Z", re.ASCII)
NAMED, ROUTE = "catspaw.id", "catspaw.route"  # what the log and the counts are told
COMPUTED = "no-store"
NO_REFERRER = "no-referrer"
QUERY_BYTES = 8190
GUARDED = ("/v1", "/metrics")  # what a token guards


def create_app(config: Config | None = None) -> Flask:
    """Return the application."""
    settings = config or read_config()
    app = Flask("service", static_folder=None)
    app.url_map.strict_slashes = False
    app.url_map.merge_slashes = False
    limit = max(settings.csv_bytes, settings.json_bytes)
    app.config.update(
        MAX_CONTENT_LENGTH=limit + 1,  # one more than allowed, so that a body without a length is refused, not cut
        MAX_FORM_MEMORY_SIZE=limit,
        MAX_FORM_PARTS=1000,
    )
    errors.install(app)
    app.before_request(_begin(settings))
    app.after_request(_finish(settings))
    gate = Gate(settings)
    for quantity in QUANTITIES.values():
        view = _view(quantity, settings, gate)
        app.add_url_rule(f"/v1/{quantity.name}", quantity.name, view, methods=["GET", "POST"])
    install_catalogue(app, settings)
    install_evidence(app)
    install_page(app, settings)
    install_health(app)
    return app


def _view(quantity: Quantity, config: Config, gate: Gate) -> Callable[[], Response]:
    def view() -> Response:
        return respond(quantity, _this_request(), config, gate)

    return view


def _this_request() -> Request:
    """Return the request itself: its proxy looks it up at every turn."""
    found: Request = request._get_current_object()  # type: ignore[attr-defined]
    return found


def _begin(config: Config) -> Callable[[], Response | None]:
    def begin() -> Response | None:
        asked = _this_request()
        g.request_id = asked.environ[NAMED] = request_id(asked.headers.get("X-Request-ID", ""))
        asked.environ[ROUTE] = asked.url_rule.rule if asked.url_rule else None
        if asked.method == "OPTIONS":
            return _empty()
        if len(asked.query_string) > QUERY_BYTES:
            reason = f"is {len(asked.query_string)} bytes long, over the limit: send the values in the body of a POST"
            raise Refused(Fault("too_large", "query", reason, f"{QUERY_BYTES} bytes"), status=414)
        _check_encoding()
        if "//" in asked.environ.get("PATH_INFO", ""):  # the router forgives it at the start
            raise NotFound
        if config.token and asked.path.startswith(GUARDED) and not _knows(config.token):
            return errors.unauthorised()
        return None

    return begin


def request_id(asked: str) -> str:
    """Return the id that a request asks for where it is one, else a new one."""
    return asked if REQUEST_ID.match(asked) else secrets.token_hex(8)


def _check_encoding() -> None:
    """Refuse a query that is not UTF-8, which could not even be asked how errors are wanted."""
    try:
        request.query_string.decode()
    except UnicodeDecodeError as error:
        request.query_string = request.query_string.decode(errors="replace").encode()
        reason = "is not UTF-8: write characters beyond ASCII as in %C2%B0C"
        raise Refused(Fault("unreadable", "query", reason), status=400) from error


def _empty() -> Response:
    response = Response(status=204)
    del response.headers["Content-Type"]
    return response


def _knows(token: str) -> bool:
    """Tell whether a request brings the token: as a bearer, or as the password of any user."""
    sent = request.authorization
    brought = (sent.token if sent.type == "bearer" else sent.password) if sent else None
    return hmac.compare_digest((brought or "").encode(), token.encode())


def _finish(config: Config) -> Callable[[Response], Response]:
    always = [("Catspaw-Version", service_version()), ("X-Content-Type-Options", "nosniff")]
    if config.cors:
        exposed = "Catspaw-Version, Catspaw-Assumed, Catspaw-Methods, X-Request-ID"
        always += [("Access-Control-Allow-Origin", config.cors), ("Access-Control-Expose-Headers", exposed)]

    def finish(response: Response) -> Response:
        headers = response.headers
        told = [*always, ("X-Request-ID", g.get("request_id", ""))]
        if "Cache-Control" not in headers:
            told.append(("Cache-Control", COMPUTED))
        if "Referrer-Policy" not in headers:
            told.append(("Referrer-Policy", NO_REFERRER))
        headers.extend(told)  # one call costs less than one a header
        if config.cors and request.method == "OPTIONS":
            headers["Access-Control-Allow-Methods"] = "GET, HEAD, POST, OPTIONS"
            headers["Access-Control-Allow-Headers"] = "Content-Type, Authorization, X-Request-ID"
        return response

    return finish
