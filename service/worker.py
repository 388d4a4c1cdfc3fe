"""A threaded worker that lets go of slow clients, stops without losing a request, and speaks of errors in JSON.

It rests on the names of gunicorn's threaded worker; the drills fail where a new version of it changes them.
"""

import errno
import select
import socket
import struct
import time
from concurrent.futures import Future
from typing import Any

from gunicorn import util
from gunicorn.http import wsgi
from gunicorn.http.errors import (
    ConfigurationProblem,
    ExpectationFailed,
    InvalidHeader,
    InvalidResponseHeader,
    InvalidResponseHeaderName,
    LimitRequestHeaders,
    LimitRequestLine,
    ParseException,
)
from gunicorn.http.parser import RequestParser
from gunicorn.http.unreader import SocketUnreader
from gunicorn.workers import gthread

from service.app import COMPUTED, NO_REFERRER, request_id
from service.config import service_version
from service.errors import PROBLEM, cut, document
from service.physics.faults import Fault

WAIT_FOR_FIRST_BYTE = 0.1  # s; then a silent connection waits without a thread
LINGER, LINGER_SLOW = 2.0, 0.2  # s; how long a client may take to close its side, so that it reads the last answer
LEAST_RATE = 500  # bytes per second, below which a client that keeps sending is cut off
OWN_FAULTS = (ConfigurationProblem, InvalidResponseHeader, InvalidResponseHeaderName)
REASONS = {408: "Request Timeout", 414: "URI Too Long", 417: "Expectation Failed", 431: "Headers Too Large"}
ACCEPTED_AT_ONCE = 4096  # most connections that a stopping worker takes out of the queue


class TooSlow(ParseException):  # type: ignore[misc]  # gunicorn ships no types
    """A client that sends too little in too long."""


class Paced(SocketUnreader):  # type: ignore[misc]
    """What a client sends, read for as long as it keeps up a rate.

    Parameters
    ----------
    sock : socket
        The connection.
    seconds : float
        What it may take to send nothing. [s]
    """

    def __init__(self, sock: socket.socket, seconds: float) -> None:
        super().__init__(sock)
        self._poll = select.poll()
        self._poll.register(sock, select.POLLIN)
        self._seconds = seconds
        self.gave_up = False
        self.start()

    def start(self) -> None:
        """Begin to wait for a request."""
        self._deadline = time.monotonic() + self._seconds

    def chunk(self, size_hint: int | None = None) -> bytes:
        """Return the next bytes.

        Raises
        ------
        TooSlow
            Where they do not come in time.
        """
        left = self._deadline - time.monotonic()
        if left <= 0 or not self._poll.poll(left * 1000):
            self.gave_up = True
            raise TooSlow(f"nothing, or less than {LEAST_RATE} bytes/s, came for {self._seconds:g} s")
        found: bytes = super().chunk(size_hint)
        self._deadline += len(found) / LEAST_RATE
        return found


class Answer(wsgi.Response):  # type: ignore[misc]
    """An answer that does not tell what serves it."""

    def default_headers(self) -> list[str]:
        """Return the headers of every answer."""
        return [line for line in super().default_headers() if not line.startswith("Server:")]

    def write(self, arg: bytes) -> None:
        """Send a part of the answer to a client that keeps reading."""
        try:
            super().write(arg)
        except BlockingIOError as error:
            raise ConnectionResetError(errno.ECONNRESET, "the client does not read") from error


wsgi.Response = Answer  # the one that the server makes answers with


class Worker(gthread.ThreadWorker):  # type: ignore[misc]
    """The worker."""

    slow_seconds = 20

    def handle(self, conn: Any) -> Any:
        """Serve a request, and end its connection here: a client that does not close would hold up the main loop."""
        if conn.parser is None:
            self._prepare(conn)
        else:
            conn.parser.unreader.start()
        if not conn.initialized and not conn.data_ready and not conn.wait_for_data(WAIT_FOR_FIRST_BYTE):
            return gthread._DEFER
        result = super().handle(conn)
        if result is False:
            conn.has_ended = True
            util.close_graceful(conn.sock, LINGER_SLOW if conn.parser.unreader.gave_up else LINGER)
        return result

    def _prepare(self, conn: Any) -> None:
        """Set the clocks of a new connection: of what the client sends, and of what it takes."""
        no_progress = struct.pack("@ll", self.slow_seconds, 0)
        conn.sock.setsockopt(socket.SOL_SOCKET, socket.SO_SNDTIMEO, no_progress)
        conn.parser = RequestParser(self.cfg, conn.sock, conn.client)
        conn.parser.unreader = Paced(conn.sock, self.slow_seconds)

    def finish_request(self, conn: Any, fs: "Future[Any]") -> None:
        """Put a connection back, or forget one that has ended."""
        if getattr(conn, "has_ended", False):
            self.nr_conns -= 1
        else:
            super().finish_request(conn, fs)

    def handle_request(self, request: Any, conn: Any) -> Any:
        """Serve a request that can be read."""
        if request.version >= (1, 1) and not any(name == "HOST" for name, _ in request.headers):
            raise InvalidHeader("Host is missing", req=request)  # RFC 9112, 3.2
        return super().handle_request(request, conn)

    def set_accept_enabled(self, enabled: bool) -> None:
        """Begin or cease to accept; a stopping worker first takes what already waits, and then leaves the queue."""
        if self.alive or enabled:
            super().set_accept_enabled(enabled)
            return
        for listener in self.sockets:
            if listener.sock is not None:
                self._accept_waiting(listener)
        super().set_accept_enabled(False)
        for listener in self.sockets:
            listener.close()

    def _accept_waiting(self, listener: Any) -> None:
        listener.setblocking(False)
        for _ in range(ACCEPTED_AT_ONCE):
            before = self.nr_conns
            self.accept(listener)
            if self.nr_conns == before:
                return

    def _cap_keepalive(self, deadline: float) -> None:
        """Let connections without a request end soon, so that a silent one does not hold up a stop."""
        super()._cap_keepalive(deadline)
        for conn in self.pending_conns:
            conn.timeout = min(conn.timeout, deadline)

    def handle_error(self, request: Any, client: socket.socket, address: Any, error: Exception) -> None:
        """Answer what never became a request of the application."""
        named = request_id("")
        if isinstance(error, ParseException) and not isinstance(error, OWN_FAULTS):
            status, fault = _fault(error)
        else:
            self.log.error("unforeseen fault in request %s", named, exc_info=error)
            status = 500
            fault = Fault("internal", "request", f"{named} met a fault of the service; its log says more")
        body = document(status, f"{fault.name} {cut(fault.reason)}", named, (fault,))
        environ = {
            "catspaw.id": named,
            "REQUEST_METHOD": getattr(request, "method", None) or "",
            "REMOTE_ADDR": address[0] if isinstance(address, tuple) else "",
        }
        self.log.keep(environ, getattr(request, "path", None) or "", str(status), len(body), 0.0)
        head = {
            "Connection": "close",
            "Content-Type": PROBLEM,
            "Content-Length": len(body),
            "Cache-Control": COMPUTED,
            "Catspaw-Version": service_version(),
            "Referrer-Policy": NO_REFERRER,
            "X-Content-Type-Options": "nosniff",
            "X-Request-ID": named,
        }
        lines = "".join(f"{name}: {value}\r\n" for name, value in head.items())
        reason = REASONS.get(status, "Bad Request" if status < 500 else "Internal Server Error")
        try:
            util.write_nonblock(client, f"HTTP/1.1 {status} {reason}\r\n{lines}\r\n".encode() + body)
        except OSError:
            self.log.debug("a client left before it was told of its error")


def _fault(error: ParseException) -> tuple[int, Fault]:
    """Return status and fault of what cannot be read as HTTP."""
    more = f"({cut(str(error), 200)})"
    if isinstance(error, TooSlow):
        return 408, Fault("cut_short", "request", f"did not come in time: send it faster, or in smaller parts {more}")
    if isinstance(error, LimitRequestLine):
        return 414, Fault("too_large", "address", f"is too long: send the values in the body of a POST {more}")
    if isinstance(error, LimitRequestHeaders):
        return 431, Fault("too_large", "headers", f"are too many or too long {more}")
    if isinstance(error, ExpectationFailed):
        return 417, Fault("unreadable", "Expect", f"can only be 100-continue {more}")
    return 400, Fault("unreadable", "request", f"is not HTTP as it should be {more}")
