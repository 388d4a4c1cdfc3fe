"""From a request's bytes to names and values as sent, whatever the content type says."""

import json
import re
from collections.abc import Iterable, Mapping
from dataclasses import dataclass
from io import BytesIO
from typing import Any
from urllib.parse import parse_qsl

import orjson
from flask import Request
from werkzeug.datastructures import MultiDict
from werkzeug.formparser import FormDataParser

from schemas.samples import Numbers, Text
from service.bodies import read_body, too_large
from service.config import Config
from service.csv_table import Table, TableError, open_table
from service.physics.faults import Fault, Refused
from service.places import Gate, Turn

TABLE_CODES = {
    "empty_body": "empty",
    "no_data_row": "empty",
    "encoding": "unreadable",
    "line_ends": "unreadable",
    "header": "table",
    "unclosed_quote": "table",
    "too_many_columns": "too_large",
    "name_too_long": "too_large",
    "not_a_number": "not_a_number",
}
FIELDS_LIMIT = 1000  # of a form
URL_ONLY = ("form", "errors", "nocache")
ERRORS = ("problem", "text")
FORM_START = re.compile(rb"\A[A-Za-z_][A-Za-z0-9_.%+-]*=")
EXAMPLE = '{"gas": "co2", "water_temperature": [18.4, 18.6], "salinity": [35.1, 35.0]}'


@dataclass(frozen=True, slots=True)
class Sent:
    """What a request holds: names with their values as sent, and a table where there is one."""

    kind: str
    raw: dict[str, Any]
    table: Table | None = None


def read(request: Request, config: Config, gate: Gate, turn: Turn) -> Sent:
    """Return what a request holds.

    Raises
    ------
    Refused
        With 400, 413 or 415 where the body cannot be read, 422 where a name is repeated.
    Busy
        Where there is no place for a body as large.
    """
    query = _single(request.args, "query")
    _check_errors(query.get("errors"))
    for name in URL_ONLY:
        query.pop(name, None)
    if request.method in ("GET", "HEAD"):
        return Sent("query", query)
    body = read_body(request, config, gate, turn)
    if not body.strip():
        if query:
            return Sent("query", query)
        raise Refused(Fault("empty", "body", "is empty, and so is the query; was Content-Length sent?"), status=400)
    sent = _recognise(request, body, config)
    both = sorted(set(query) & set(sent.raw))
    if both:
        raise Refused(
            *(Fault("repeated_name", name, "stands in the query and in the body: send it once") for name in both)
        )
    return Sent(sent.kind, {**sent.raw, **query}, sent.table)


def _single(pairs: MultiDict[str, str], place: str) -> dict[str, Any]:
    """Return parameters, refusing one that stands twice."""
    found: dict[str, Any] = {}
    for name, values in pairs.lists():
        if len(values) > 1 and name != "nocache":
            raise Refused(Fault("repeated_name", name[:100], f"stands {len(values)} times in the {place}"))
        found[name] = Text(values[0])
    return found


def _check_errors(asked: str | None) -> None:
    if asked not in (None, *ERRORS):
        allowed = ", ".join(ERRORS)
        raise Refused(Fault("unknown_option", "errors", f"must be one of {allowed}", allowed))


def _recognise(request: Request, body: bytes, config: Config) -> Sent:
    if request.mimetype == "multipart/form-data" and (found := _parts(body, request, config)):
        return _from_form(found, config)
    if _is_json(body):
        return Sent("json", _from_json(body, config))
    declared = request.mimetype == "application/x-www-form-urlencoded"
    if FORM_START.match(body) and (declared or b"\n" not in body.strip()) and (fields := _fields(body)):
        return _from_form(fields, config)
    if body.startswith(b"--"):
        reason = "looks like multipart, but its parts cannot be read: is the boundary in the Content-Type?"
        raise Refused(Fault("unreadable", "body", reason), status=400)
    if request.mimetype.endswith("json") and b"\n" not in body.strip():
        return Sent("json", _from_json(body, config))
    return Sent("csv", {}, _from_csv(body, config))


def _is_json(body: bytes) -> bool:
    return body[:1000].lstrip(b"\xef\xbb\xbf \t\r\n")[:1] in (b"{", b"[")


def _fields(body: bytes) -> dict[str, Any]:
    """Return the fields of a form; none where it is not UTF-8."""
    try:
        text = body.decode().rstrip("\r\n")
    except UnicodeDecodeError:
        return {}
    if text.count("&") >= FIELDS_LIMIT:
        raise Refused(Fault("too_large", "body", "holds too many fields", f"{FIELDS_LIMIT} fields"), status=413)
    return _single(MultiDict(parse_qsl(text, keep_blank_values=True)), "form")


def _parts(body: bytes, request: Request, config: Config) -> dict[str, Any]:
    """Return the fields and files of a multipart body; none where it cannot be read."""
    longest = max(config.csv_bytes, config.json_bytes)
    parser = FormDataParser(max_form_memory_size=longest, max_form_parts=FIELDS_LIMIT)
    _, fields, uploads = parser.parse(BytesIO(body), request.mimetype, len(body), request.mimetype_params)
    found = _single(fields, "form")
    for name, files in uploads.lists():
        content = files[0].read()
        for each in files:
            each.close()
        key = name if name in ("csv", "json") else "json" if _is_json(content) else "csv"
        if len(files) > 1 or key in found:
            raise Refused(Fault("repeated_name", name[:100], "stands twice in the form"))
        found[key] = content
    return found


def _from_form(found: dict[str, Any], config: Config) -> Sent:
    table, document = found.pop("csv", None), found.pop("json", None)
    if table is not None and document is not None:
        raise Refused(Fault("two_ways", "csv and json", "both hold a body: send one"))
    for name in URL_ONLY:
        if name in found:
            raise Refused(Fault("unknown_name", name, "is read from the address only: put it behind the ? there"))
    if table is not None:
        return Sent("csv", found, _from_csv(_bytes(table), config))
    if document is not None:
        values = _from_json(_bytes(document), config)
        if both := sorted(set(values) & set(found)):
            raise Refused(*(Fault("repeated_name", name, "stands in the form and in its json") for name in both))
        return Sent("json", {**values, **found})
    size = sum(len(value) for value in found.values())
    if size > config.json_bytes:
        raise too_large(size, config.json_bytes)
    return Sent("form", found)


def _bytes(part: str | bytes) -> bytes:
    return part if isinstance(part, bytes) else part.encode()


def _from_csv(body: bytes, config: Config) -> Table:
    if len(body) > config.csv_bytes:
        raise too_large(len(body), config.csv_bytes)
    try:
        return open_table(body)
    except TableError as error:
        raise refused_table(error) from error


def refused_table(error: TableError) -> Refused:
    """Return a table's fault as a refusal."""
    fault = Fault(TABLE_CODES[error.code], error.column or "csv", error.detail, line=error.line)
    return Refused(fault, status=error.status)


def _from_json(body: bytes, config: Config) -> dict[str, Any]:
    if len(body) > config.json_bytes:
        raise too_large(len(body), config.json_bytes)
    try:
        document = orjson.loads(body.removeprefix(b"\xef\xbb\xbf"))
    except orjson.JSONDecodeError as error:
        document = _lenient(body, error)
    if not isinstance(document, dict):
        what = "an array" if isinstance(document, list) else "not an object"
        raise Refused(Fault("unreadable", "body", f"is {what}: send one object, its values arrays of columns", EXAMPLE))
    if body.count(b'"') != 2 * _strings(document) or b"\\" in body:
        _refuse_repeated(body)
        return document
    return _with_numbers(document) if _is_plain(body, document) else document


def _is_plain(body: bytes, document: Mapping[str, Any]) -> bool:
    """Tell by counting whether the arrays of a document without text in them hold but numbers and null."""
    objects = [document, *(value for value in document.values() if isinstance(value, dict))]
    arrays = sum(isinstance(value, list) for each in objects for value in each.values())
    as_counted = body.count(b"[") == arrays and body.count(b"{") == len(objects)
    return as_counted and b"true" not in body and b"false" not in body


def _with_numbers(document: Mapping[str, Any]) -> dict[str, Any]:
    """Return a document with its arrays marked, so that their elements need not be looked at one by one."""
    marked: dict[str, Any] = {}
    for name, value in document.items():
        if isinstance(value, list):
            marked[name] = value if _begins_with_text(value) else Numbers(value)
        else:
            marked[name] = _with_numbers(value) if isinstance(value, dict) else value
    return marked


def _lenient(body: bytes, error: orjson.JSONDecodeError) -> Any:
    """Read JSON again with bare NaN as a missing mark, as several clients write it."""
    if b"NaN" in body:
        try:
            return json.loads(body, parse_constant=_constant, parse_int=float)
        except (ValueError, RecursionError):
            pass
    hint = "; a missing number is null" if b"Infinity" in body else ""
    reason = f"is not JSON: {str(error)[:120]}{hint}"
    raise Refused(Fault("unreadable", "body", reason), status=400) from error


def _constant(word: str) -> None:
    if word != "NaN":
        raise ValueError(word)


def _strings(document: Mapping[str, Any]) -> int:
    """Return how many strings a document and its objects hold, but no deeper; of arrays those that begin with one."""
    objects = [document, *(value for value in document.values() if isinstance(value, dict))]
    count = sum(len(each) for each in objects)
    for value in (value for each in objects for value in each.values()):
        if isinstance(value, str):
            count += 1
        elif _begins_with_text(value):
            count += sum(isinstance(element, str) for element in value)
    return count


def _begins_with_text(value: object) -> bool:
    return isinstance(value, list) and bool(value) and isinstance(value[0], str)


def _refuse_repeated(body: bytes) -> None:
    def pairs(found: Iterable[tuple[str, Any]]) -> dict[str, Any]:
        seen: dict[str, Any] = {}
        for name, value in found:
            if name in seen:
                raise Refused(Fault("repeated_name", name[:100], "stands twice in one object"))
            seen[name] = value
        return seen

    try:
        json.loads(body, object_pairs_hook=pairs, parse_int=float, parse_constant=_constant)
    except (RecursionError, ValueError) as error:
        raise Refused(Fault("unreadable", "body", "is JSON that nests too deep to be read"), status=400) from error
