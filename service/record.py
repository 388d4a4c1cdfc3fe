"""What is kept of a request when it is answered: one line of JSON, and the counts."""

import os
from collections.abc import Mapping
from contextlib import suppress
from datetime import UTC, datetime, timedelta
from typing import Any, ClassVar

import orjson
from gunicorn.glogging import Logger

from service.counts import Counts
from service.errors import cut

STANDARD_OUTPUT = 1


class Recorder(Logger):  # type: ignore[misc]  # gunicorn ships no types
    """The server's log, with lines of its own for requests; neither bodies nor queries nor tokens are written."""

    lines: ClassVar[bool] = True
    counts: ClassVar[Counts | None] = None

    def access(self, response: Any, _: Any, environ: Mapping[str, Any], duration: timedelta) -> None:
        """Keep what is kept of a request that the application answered."""
        status = str(response.status or "")[:3]
        path = environ.get("PATH_INFO", "").encode("latin-1", "replace").decode("utf-8", "replace")
        self.keep(environ, path, status, response.sent, duration.total_seconds())

    def keep(self, environ: Mapping[str, Any], path: str, status: str, sent: int, seconds: float) -> None:
        """Write the line and count."""
        method = environ.get("REQUEST_METHOD", "")
        samples, received = environ.get("catspaw.samples", 0), environ.get("catspaw.bytes", 0)
        if self.counts is not None:
            self.counts.add(environ.get("catspaw.route"), method, status, seconds, (samples, received, sent))
        if self.lines:
            line = {
                "time": datetime.now(UTC),
                "id": environ.get("catspaw.id", ""),
                "client": environ.get("REMOTE_ADDR", ""),
                "method": cut(method, 20),
                "path": cut(path, 200),
                "status": int(status or 0),
                "samples": samples,
                "bytes_in": received,
                "bytes_out": sent,
                "seconds": round(seconds, 6),
            }
            with suppress(OSError):  # nobody reads it: that is no reason to fail a request
                os.write(STANDARD_OUTPUT, orjson.dumps(line, option=orjson.OPT_APPEND_NEWLINE))
