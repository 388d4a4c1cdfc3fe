"""The bytes of a request: whole, of the length announced, unpacked, and within the limits."""

import zlib

from flask import Request, Response, after_this_request
from gunicorn.http.errors import ParseException
from werkzeug.exceptions import ClientDisconnected

from service.config import MEBIBYTE, Config
from service.memory import give_back_what_is_free
from service.physics.faults import Fault, Refused
from service.places import SMALL_BODY, SMALL_BYTES, Gate, Turn

PLAIN, PACKED = ("", "identity"), ("gzip", "x-gzip")
GZIP_START = b"\x1f\x8b"
RATIO = 250  # most bytes that one packed byte may stand for, after the first MEBIBYTE; tables reach some 20
PIECE = 64 * 1024
GZIP_MEMBER = 31  # what zlib calls one gzip member with its header and check sum
READ = "gzip, identity"


def read_body(request: Request, config: Config, gate: Gate, turn: Turn) -> bytes:
    """Return the body of a request, unpacked; a large one leaves with a turn.

    Raises
    ------
    Refused
        With 400 where it is cut short or packed wrongly, 413 where it is over a limit, 415 where it is packed in a
        way that is not read.
    Busy
        Where there is no room for it.
    """
    encoding = request.headers.get("Content-Encoding", "").strip().lower()
    if encoding not in PLAIN + PACKED:
        reason = f"{encoding[:40]!r} is not read: send the body as it is, or gzip"
        raise Refused(Fault("media_type", "Content-Encoding", reason, READ), status=415)
    limit = max(config.csv_bytes, config.json_bytes)
    body = _whole(request, limit, gate)
    request.environ["catspaw.bytes"] = len(body)
    if (body and encoding in PACKED) or body.startswith(GZIP_START):
        turn.large(len(body) * RATIO > MEBIBYTE)
        body = unpacked(body, limit)
        turn.end()
        _make_room(gate, len(body))
    turn.large(len(body) > SMALL_BYTES)
    return body


def _whole(request: Request, limit: int, gate: Gate) -> bytes:
    """Return the bytes as they came, refusing a body of another length than announced."""
    announced = request.content_length
    if announced is not None and announced > limit:
        raise too_large(announced, limit)
    is_chunked = "HTTP_TRANSFER_ENCODING" in request.environ
    _make_room(gate, limit if announced is None and is_chunked else announced or 0)
    try:
        body = request.get_data(cache=True, parse_form_data=False)
    except (OSError, ParseException, ClientDisconnected) as error:
        told = f": {announced} bytes were announced" if announced is not None else ", or its chunks are wrong"
        reason = f"could not be read to its end: it was cut short or came too slowly{told}"
        raise Refused(Fault("cut_short", "body", reason), status=400) from error
    if len(body) > limit:
        raise too_large(len(body), limit)
    if announced is not None and len(body) < announced:
        reason = f"was cut short: {announced} bytes announced, {len(body)} came"
        raise Refused(Fault("cut_short", "body", reason), status=400)
    return body


def _make_room(gate: Gate, size: int) -> None:
    """Take room for a large body, to be given back when its answer is sent."""
    if size <= SMALL_BODY:
        return
    taken = gate.room.take(size)

    def give_back() -> None:
        gate.room.give(taken)
        give_back_what_is_free()

    @after_this_request
    def at_its_end(response: Response) -> Response:
        response.call_on_close(give_back)
        return response


def too_large(size: int, limit: int) -> Refused:
    """Return the refusal of a body over the limit."""
    return Refused(Fault("too_large", "body", f"of {size} bytes is over the limit", f"{limit} bytes"), status=413)


def unpacked(body: bytes, limit: int) -> bytes:
    """Return what a gzip body holds, stopping as soon as it is more than a limit or swells like no table does.

    Raises
    ------
    Refused
        With 400 where it is not gzip or ends too early, 413 where it is over a limit.
    """
    pieces: list[bytes] = []
    size = position = 0
    stream = zlib.decompressobj(wbits=GZIP_MEMBER)
    while position < len(body) or not stream.eof:
        rest = body[position : position + PIECE]
        if stream.eof:  # one member behind another is gzip, too
            stream = zlib.decompressobj(wbits=GZIP_MEMBER)
        try:
            piece = stream.decompress(rest, PIECE)
        except zlib.error as error:
            reason = "is gzip that is damaged" if pieces else "is not gzip, though it says so, or is damaged"
            raise Refused(Fault("unreadable", "body", f"{reason}: pack it again"), status=400) from error
        position += len(rest) - len(stream.unused_data if stream.eof else stream.unconsumed_tail)
        size += len(piece)
        if not (piece or rest or stream.eof):
            reason = "is gzip that ends too early: it was cut short before it was sent, or on the way"
            raise Refused(Fault("cut_short", "body", reason), status=400)
        if size > limit:
            raise Refused(Fault("too_large", "body", "is over the limit when unpacked", f"{limit} bytes"), status=413)
        if size > MEBIBYTE + RATIO * position:
            reason = f"swells more than {RATIO} times when unpacked: send it as it is"
            raise Refused(Fault("too_large", "body", reason, f"{RATIO} bytes for each packed byte"), status=413)
        pieces.append(piece)
    return b"".join(pieces)
