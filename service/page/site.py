"""The page for people at ``/``, the reference at ``/reference``, and the files they are made of."""

import gzip
import hashlib
import mimetypes
from functools import cached_property
from pathlib import Path
from typing import Any

import orjson
from flask import Blueprint, Flask, Response, render_template, request
from werkzeug.exceptions import NotFound

from schemas.document import document
from service.catalogue import limits
from service.config import Config, service_version
from service.errors import TYPES
from service.page.description import described
from service.page.reference import contents, pieces, unit_anchor

FOLDER = Path(__file__).parent
DESCRIPTION = "description.json"
FIRST = ("net.js", "state.js", "question.js", "form.js", "rows.js", "answer.js", "water.js", "dom.js", "numbers.js")
POLICY = "; ".join(
    (
        "default-src 'none'",
        "script-src 'self'",
        "style-src 'self'",
        "img-src 'self' data: blob:",
        "connect-src 'self'",
        "base-uri 'none'",
        "form-action 'none'",
        "frame-ancestors 'none'",
    )
)
TYPES_OF_FILES = {".js": "text/javascript", ".css": "text/css", ".svg": "image/svg+xml", ".json": "application/json"}
FOR_A_YEAR = "public, max-age=31536000, immutable"  # the folder's name changes with what is in it
ASK_AGAIN = "no-cache"


class Site:
    """The files of the page and what is made for it, each read or made once, when it is first asked for."""

    def __init__(self, config: Config) -> None:
        self._config = config
        self._packed: dict[str, tuple[bytes, bytes]] = {}

    @cached_property
    def files(self) -> dict[str, bytes]:
        """Return the files by name."""
        return {path.name: path.read_bytes() for path in sorted((FOLDER / "static").iterdir()) if path.is_file()}

    @cached_property
    def mark(self) -> str:
        """Return a name for this state of the files."""
        seen = hashlib.sha256(service_version().encode())
        for name, content in self.files.items():
            seen.update(name.encode() + b"\0" + content)
        return seen.hexdigest()[:12]

    @cached_property
    def document(self) -> dict[str, Any]:
        """Return the API document."""
        return document(service_version(), limits(self._config), TYPES)

    @cached_property
    def description(self) -> bytes:
        """Return what the page is built from."""
        return orjson.dumps(described(self.document))

    @cached_property
    def page(self) -> bytes:
        """Return the page."""
        return render_template("page.html", mark=self.mark, first=FIRST, version=service_version()).encode()

    @cached_property
    def reference(self) -> bytes:
        """Return the reference."""
        return render_template("reference.html", mark=self.mark, **contents(self.document)).encode()

    def packed(self, name: str, content: bytes) -> tuple[bytes, bytes]:
        """Return a content as it is and compressed, compressing it once."""
        if name not in self._packed:
            self._packed[name] = content, gzip.compress(content, mtime=0)
        return self._packed[name]

    def told(self, name: str, content: bytes, kind: str, keep: str = ASK_AGAIN) -> Response:
        """Return a file or page, compressed for those that can read it, or that it has not changed."""
        plain, small = self.packed(name, content)
        response = Response(plain, content_type=kind)
        if request.accept_encodings["gzip"] and len(small) < len(plain):
            response = Response(small, content_type=kind, headers={"Content-Encoding": "gzip"})
        response.headers["Vary"] = "Accept-Encoding"
        response.headers["Content-Security-Policy"] = POLICY
        response.headers["Referrer-Policy"] = "no-referrer"
        response.headers["Cache-Control"] = keep
        response.set_etag(hashlib.sha256(response.get_data()).hexdigest()[:32])
        response.make_conditional(request)
        return response


def install_page(app: Flask, config: Config) -> None:
    """Add the page, the reference and their files to an application."""
    site = Site(config)
    blueprint = Blueprint("page", __name__, template_folder=str(FOLDER / "templates"))
    blueprint.add_app_template_filter(pieces)
    blueprint.add_app_template_filter(unit_anchor)
    html = "text/html; charset=utf-8"

    @blueprint.get("/")
    def page() -> Response:
        return site.told("page", site.page, html)

    @blueprint.get("/reference")
    def reference() -> Response:
        return site.told("reference", site.reference, html)

    @blueprint.get("/page/<mark>/<name>")
    def file(mark: str, name: str) -> Response:
        if mark != site.mark:
            raise NotFound
        if name == DESCRIPTION:
            return site.told(name, site.description, "application/json")
        if name not in site.files:
            raise NotFound
        kind = TYPES_OF_FILES.get(Path(name).suffix) or mimetypes.guess_type(name)[0] or "application/octet-stream"
        return site.told(name, site.files[name], f"{kind}; charset=utf-8", FOR_A_YEAR)

    app.register_blueprint(blueprint)
