"""The application: addresses, and what every answer carries."""

import hmac
import re
import secrets
from collections.abc import Callable

from flask import Flask, Response, g, request
from werkzeug.exceptions import NotFound

from service import errors
from service.catalogue import install as install_catalogue
from service.compute import respond
from service.config import Config, service_version
from service.config import read as read_config
from service.evidence import install as install_evidence
from service.physics.declare import QUANTITIES, Quantity
from service.physics.faults import Fault, Refused

REQUEST_ID = re.compile(r"[A-Za-z0-9._-]{1,64}\Z", re.ASCII)
COMPUTED = "no-store"
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
    for quantity in QUANTITIES.values():
        app.add_url_rule(f"/v1/{quantity.name}", quantity.name, _view(quantity, settings), methods=["GET", "POST"])
    install_catalogue(app, settings)
    install_evidence(app)
    return app


def _view(quantity: Quantity, config: Config) -> Callable[[], Response]:
    def view() -> Response:
        return respond(quantity, request, config)

    return view


def _begin(config: Config) -> Callable[[], Response | None]:
    def begin() -> Response | None:
        asked = request.headers.get("X-Request-ID", "")
        g.request_id = asked if REQUEST_ID.match(asked) else secrets.token_hex(8)
        if request.method == "OPTIONS":
            return _empty()
        if len(request.query_string) > QUERY_BYTES:
            reason = f"is {len(request.query_string)} bytes long, over the limit: send the values in the body of a POST"
            raise Refused(Fault("too_large", "query", reason, f"{QUERY_BYTES} bytes"), status=414)
        _check_encoding()
        if "//" in request.environ.get("PATH_INFO", ""):  # the router forgives it at the start
            raise NotFound
        if config.token and request.path.startswith(GUARDED) and not _knows(config.token):
            return errors.unauthorised()
        return None

    return begin


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
    version = service_version()

    def finish(response: Response) -> Response:
        headers = response.headers
        headers["Catspaw-Version"] = version
        headers["X-Request-ID"] = g.get("request_id", "")
        headers["X-Content-Type-Options"] = "nosniff"
        if config.cors:
            headers["Access-Control-Allow-Origin"] = config.cors
            headers["Access-Control-Expose-Headers"] = "Catspaw-Version, Catspaw-Assumed, Catspaw-Methods, X-Request-ID"
            if request.method == "OPTIONS":
                headers["Access-Control-Allow-Methods"] = "GET, HEAD, POST, OPTIONS"
                headers["Access-Control-Allow-Headers"] = "Content-Type, Authorization, X-Request-ID"
        if "Cache-Control" not in headers:
            headers["Cache-Control"] = COMPUTED
        return response

    return finish
