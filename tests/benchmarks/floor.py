"""The floor of every ratio: a Flask view that returns a document of three members, under the service's own server."""

import sys
from dataclasses import replace

import orjson
from flask import Flask, Response

from service.config import Config
from service.serve import Server


class FloorServer(Server):
    """The same server with the same settings, and next to nothing to do."""

    def load(self) -> Flask:
        """Return the least application that answers in JSON."""
        app = Flask("floor", static_folder=None)

        @app.get("/")
        def hello() -> Response:
            return Response(orjson.dumps({"name": "floor", "value": 1.5, "unit": "1"}), mimetype="application/json")

        return app


if __name__ == "__main__":
    FloorServer(replace(Config(), bind=sys.argv[1], workers=1)).run()
