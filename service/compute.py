"""The one view behind every quantity: read, check, plan, run, flag, write."""

from collections.abc import Iterable, Iterator, Mapping
from itertools import chain
from typing import Any

import numpy as np
from flask import Request as HttpRequest
from flask import Response
from numpy.typing import NDArray

from schemas.checked import Input, Request
from schemas.doubts import asked_of
from schemas.requests import SAMPLES_LIMIT, load
from schemas.series import TIME, series_of, wants_time
from schemas.vocabulary import UNCERTAIN, quantity_inputs
from service import writers
from service.columns import bind
from service.config import Config
from service.csv_blocks import joined
from service.csv_table import Block, Table, TableError
from service.csv_text import answer_header, answer_lines, number_cells
from service.errors import LISTED, BadSamples
from service.physics.answer import Answer, Unreadable, answer
from service.physics.declare import TERMS, Array, Quantity
from service.physics.faults import Fault, Refused
from service.physics.summary import Series
from service.physics.sureness import Asked
from service.places import SMALL_SAMPLES, Gate, Turn
from service.readers import Sent, read, refused_table
from service.summaries import summary_told

FORMS = ("json", "csv", "number")
CSV_TYPE, JSON_TYPE, NUMBER_TYPE = "text/csv; charset=utf-8", "application/json", "text/plain; charset=utf-8"
MONTE_CARLO = "monte-carlo"
SAMPLES = "catspaw.samples"  # what the log and the counts are told


def respond(quantity: Quantity, request: HttpRequest, config: Config, gate: Gate) -> Response:
    """Answer a request for a quantity; a large one waits for its turn."""
    with gate.turn() as turn:
        response, checked = _answered(quantity, request, config, turn, gate)
    if checked.options.get("detail") != "brief":
        assumed, methods = writers.header_text(checked.question)
        response.headers.extend([("Catspaw-Assumed", assumed), ("Catspaw-Methods", methods)])
    return response


def _answered(
    quantity: Quantity, request: HttpRequest, config: Config, turn: Turn, gate: Gate
) -> tuple[Response, Request]:
    form = _form_asked(request)
    sent = read(request, config, gate, turn)
    table = sent.table
    raw = bind(table.header, sent.raw, _column_names(quantity, sent.raw)) if table else _without_columns(sent.raw)
    checked = load(quantity, raw)
    form = form or _form_for(request, sent)
    if checked.series and form != "json":
        reason = f"is told in JSON, not in {form}: send form=json"
        raise Refused(Fault("unknown_option", "summary", reason, "form=json"))
    with_steps = checked.options.get("detail") == "steps"
    if with_steps and form != "json":
        told_in_json = f"steps are told in JSON, not in {form}: send form=json"
        raise Refused(Fault("unknown_option", "detail", told_in_json, "form=json"))
    rows = table.rows_at_most if table else checked.samples
    turn.large(rows > SMALL_SAMPLES or checked.options.get("uncertainty_method") == MONTE_CARLO)
    if table is None:
        values = {each.term: each.values for each in checked.inputs if each.values is not None}
        asked = asked_of(checked, {}, checked.samples)
        series = series_of(checked, checked.series.time.values) if checked.series else None
        told = answer(checked.question, values, checked.samples, with_steps=with_steps, asked=asked, series=series)
        response = _written(_strictly(told, checked), checked, form, asked, _more(told, checked, series, sent))
        request.environ[SAMPLES] = checked.samples
    elif form == "csv":
        response = _csv_behind(table, checked, request, gate)
    else:
        told, series, asked = _whole_table(table, checked)
        response = _written(told, checked, form, asked, _more(told, checked, series, sent))
        request.environ[SAMPLES] = told.samples
    return response, checked


def _column_names(quantity: Quantity, sent: Mapping[str, Any]) -> list[str]:
    """Return the inputs that a column may hold; what stands once for the request is never read from one."""
    names = [name for name in quantity_inputs(quantity) if TERMS[name].holds == "sample"]
    if wants_time(quantity, sent):
        names.append(TIME)
    return [*names, *(UNCERTAIN + name for name in names if name != TIME)]


def _without_columns(raw: dict[str, Any]) -> dict[str, Any]:
    """Return names and values as they are, refusing references to columns: there are none."""
    for name, value in raw.items():
        if isinstance(value, str) and value.startswith("@"):
            reason = f"{value[:60]!r} names a CSV column, but no CSV was sent: send the table as the body of a POST"
            raise Refused(Fault("column", name[:100], reason))
    return raw


def _form_asked(request: HttpRequest) -> str | None:
    asked = request.args.getlist("form")
    if not asked:
        return None
    if len(asked) > 1 or asked[0] not in FORMS:
        allowed = ", ".join(FORMS)
        raise Refused(Fault("unknown_option", "form", f"must be one of {allowed}", allowed))
    return asked[0]


def _form_for(request: HttpRequest, sent: Sent) -> str:
    """Return the form that Accept asks for, or that of the request itself; Accept never refuses."""
    own = "csv" if sent.kind == "csv" else "json"
    accepted = request.accept_mimetypes
    if not accepted or accepted.quality(f"{'text/csv' if own == 'csv' else JSON_TYPE}") > 0:
        return own
    for form, kind in (("json", JSON_TYPE), ("csv", "text/csv"), ("number", "text/plain")):
        if accepted.quality(kind) > 0:
            return form
    return own


def _strictly(answered: Answer, checked: Request, lines: NDArray[Any] | None = None) -> Answer:
    """Return the answer, or refuse it if it has bad samples and the request insists on good ones."""
    if checked.options.get("strict") == "1":
        _refuse_lost([(answered, lines)])
    return answered


def _refuse_lost(parts: Iterable[tuple[Answer, NDArray[Any] | None]]) -> None:
    """Refuse answers that have samples without result, naming the first of them by sample and line."""
    faults: list[Fault] = []
    bad = samples = 0
    for answered, lines in parts:
        verdict = answered.outcome.verdict
        lost = np.flatnonzero(verdict.lost)
        for row in lost[: LISTED - len(faults)].tolist():
            reason, line = "; ".join(verdict.reasons.get(row, [])), None if lines is None else int(lines[row])
            faults.append(Fault("bad_sample", "sample", reason, sample=samples + row + 1, line=line))
        bad, samples = bad + lost.size, samples + answered.samples
    if bad:
        raise BadSamples(faults, bad, samples)


def _more(answered: Answer, checked: Request, series: Series | None, sent: Sent) -> dict[str, Any]:
    """Return what JSON tells beside the results: the times as they were sent, the summary."""
    more = {TIME: sent.raw[TIME]} if TIME in sent.raw and sent.table is None else {}
    if series:
        more["summary"] = summary_told(answered, series, checked.options.get("mass_as", "gas"))
    return more


def _written(
    answered: Answer, checked: Request, form: str, asked: Asked | None, more: Mapping[str, Any] | None = None
) -> Response:
    options = checked.options
    if form == "json":
        told = writers.json_bytes(answered, options.get("detail", "full"), asked, _course(checked), more)
        return Response(told, mimetype=JSON_TYPE)
    if form == "csv":
        return Response(_csv_alone(answered, checked, asked), content_type=CSV_TYPE)
    first = answered.question.wanted[0].name
    if answered.outcome.results[first].ndim > 1:
        raise Refused(Fault("unknown_option", "form", f"number cannot hold the course of {first}", "json, csv"))
    lines = list(writers.number_lines(answered, options.get("decimal", "point")))
    if len(lines) == 1 and lines[0] == "NaN":
        reasons = "; ".join(answered.outcome.verdict.reasons.get(0, [])) or "no result"
        raise Refused(Fault("bad_sample", answered.question.wanted[0].name, f"has no number: {reasons}", sample=1))
    return Response("\n".join(lines), content_type=NUMBER_TYPE)


def _csv_alone(answered: Answer, checked: Request, asked: Asked | None) -> bytes:
    """Return a table of the inputs as they were understood and the results behind them."""
    options = checked.options
    shown = [each for each in checked.inputs if TERMS[each.term].holds != "course"]
    names = [f"{each.term} [{TERMS[each.term].unit}]" for each in shown]
    inputs = [np.broadcast_to(each.values, answered.samples) for each in shown if each.values is not None]
    numbers, texts = writers.csv_columns(answered)
    added = writers.csv_names(answered.question, options.get("headers", "units"), asked, _course(checked))
    header = ",".join([*names, *added])
    columns = [*inputs, *numbers]
    missing = options.get("missing", "").encode()
    first = number_cells(columns[0], missing)
    block = Block(1, first, np.arange(len(first)), [], {}, {})
    return header.encode() + b"\n" + answer_lines(block, ",", columns[1:], texts, missing)


class _Columns:
    """The inputs of a table: constants beside it and columns in it, block by block."""

    def __init__(self, table: Table, checked: Request) -> None:
        used = checked.question.used
        self.constants: dict[str, Array] = {
            each.term: each.values for each in checked.inputs if each.values is not None
        }
        self.columns: list[Input] = [each for each in checked.inputs if each.column is not None and each.term in used]
        leaves = {leaf for plan in checked.question.plans.values() for leaf in plan.leaves}
        self.doubts: list[Input] = [each for each in checked.doubts if each.column is not None and each.term in leaves]
        several = [name for name, array in self.constants.items() if array.size > 1]
        times = [name for name in (*self.constants, *self._summary_time(checked)) if TERMS[name].holds == "series"]
        if times:
            raise Refused(Fault("length", TIME, "stands once beside a table: name its column, time=@header"))
        if lists := [name for name in several if TERMS[name].holds != "course"]:
            raise Refused(
                *(Fault("length", name, "is a list beside a table: send one value, or a column") for name in lists)
            )
        self.checked = checked
        if checked.series and checked.series.time.column is not None:
            self.columns.append(checked.series.time)
        placed = {each.term: each.column for each in self.columns if each.column is not None}
        doubted = [each.column for each in self.doubts if each.column is not None]
        indices = [column.index for column in (*placed.values(), *doubted)]
        names = {term: table.header.names[column.index] for term, column in placed.items()}
        self.labels = {term: f"{term} (column {name})" for term, name in names.items() if term != name}
        nothing_yet = {each.term: np.zeros(1) for each in self.doubts}
        self.rows = table.rows_at_most
        self.asked = asked_of(checked, nothing_yet, self.rows)
        series = [each for each in self.columns if TERMS[each.term].holds == "series"]
        moments = {each.column.index: each.conversion.factor for each in series if each.column is not None}
        comma = checked.options.get("decimal") == "comma"
        self.blocks = table.blocks(indices, decimal_comma=comma, moments=moments)
        if series:  # it hangs together
            self.blocks = joined(self.blocks)

    @staticmethod
    def _summary_time(checked: Request) -> list[str]:
        """Return the time of a summary where it is no column."""
        return [TIME] if checked.series and checked.series.time.column is None else []

    def numbers(self, columns: list[Array]) -> tuple[dict[str, Array], dict[str, Array]]:
        """Return the inputs and the uncertainties that columns hold, in the unit of their term."""
        values, doubts = dict(self.constants), {}
        for each, column in zip(self.columns, columns, strict=False):
            is_time = TERMS[each.term].holds == "series"  # read as days already
            values[each.term] = column if is_time else each.conversion.to_base(column)
        for each, column in zip(self.doubts, columns[len(self.columns) :], strict=True):
            doubts[each.term] = each.conversion.scale(column)
        return values, doubts

    def unreadable(self, block: Block) -> Unreadable:
        """Return the rows of a block that could not be read, by the inputs in which they could not."""
        inputs: dict[str, list[int]] = {}
        for row, places in block.unread.items():
            for place in places:
                name = self.columns[place].term if place < len(self.columns) else ""
                inputs.setdefault(name, []).append(row)
        return Unreadable(block.bad, inputs)

    def answers(self) -> Iterator[tuple[Block, Answer]]:
        """Yield each block with its answer."""
        try:
            for block in self.blocks:
                values, doubts = self.numbers(block.columns)
                asked = asked_of(self.checked, doubts, self.rows)
                unreadable = self.unreadable(block)
                answered = answer(self.checked.question, values, len(block.lines), unreadable, self.labels, asked=asked)
                yield block, answered
        except TableError as error:
            raise refused_table(error) from error


def _csv_behind(table: Table, checked: Request, request: HttpRequest, gate: Gate) -> Response:
    """Answer a table with a table, block by block; everything that can be refused is refused with the first."""
    header, options = table.header, checked.options
    gathered = _Columns(table, checked)
    added = writers.csv_names(checked.question, options.get("headers", "units"), gathered.asked, _course(checked))
    plain = {name.partition(" [")[0] for name in added}
    plain -= {
        name for name, raw in zip(header.names, header.raw, strict=True) if {name, raw} & {*options.get("ignore", ())}
    }
    if clash := [name for name in header.names if name in plain]:
        cure = "is also the name of a column to be written: rename it, or send ignore={} to pass it through as it is"
        raise Refused(*(Fault("collision", name, cure.format(name)) for name in clash))
    answers = gathered.answers()
    first = next(answers, None)
    missing = options.get("missing", "").encode()

    environ = request.environ  # the request itself is gone before its last line is written

    def lines(block: Block, answered: Answer) -> bytes:
        environ[SAMPLES] = environ.get(SAMPLES, 0) + answered.samples
        numbers, texts = writers.csv_columns(answered)
        return answer_lines(block, header.delimiter, numbers, texts, missing)

    head = answer_header(header, added)
    every: Iterable[tuple[Block, Answer]] = chain([first] if first else [], answers)
    if options.get("strict") == "1":
        every = list(every)
        _refuse_lost((each, block.line_numbers) for block, each in every)
        return Response(head + b"".join(lines(block, each) for block, each in every), content_type=CSV_TYPE)
    parts = chain([head], (lines(block, each) for block, each in every))
    if request.environ.get("SERVER_PROTOCOL") == "HTTP/1.0":
        return Response(b"".join(parts), content_type=CSV_TYPE)
    return Response(_in_turns(parts, gate, table.rows_at_most > SMALL_SAMPLES), content_type=CSV_TYPE)


def _in_turns(parts: Iterator[bytes], gate: Gate, is_large: bool) -> Iterator[bytes]:
    """Yield the parts of an answer, each made in a turn: a client that is slow to read them keeps nobody waiting."""
    while True:
        with gate.turn() as turn:
            turn.large(is_large, patient=True)
            part = next(parts, None)
        if part is None:
            return
        yield part


def _whole_table(table: Table, checked: Request) -> tuple[Answer, Series | None, Asked | None]:
    """Return the answer to a whole table at once, for forms that have no lines to stand behind, and its series."""
    gathered = _Columns(table, checked)
    (block,) = joined(gathered.blocks)
    samples = len(block.lines)
    if samples > SAMPLES_LIMIT:
        limit = f"{SAMPLES_LIMIT} samples"
        raise Refused(Fault("too_large", "csv", f"of {samples} rows is over the limit of this form", limit), status=413)
    values, doubts = gathered.numbers(block.columns)
    asked = asked_of(checked, doubts, samples)
    series = series_of(checked, values.pop(TIME)) if checked.series else None
    answered = answer(
        checked.question,
        values,
        samples,
        gathered.unreadable(block),
        gathered.labels,
        with_steps=checked.options.get("detail") == "steps",
        asked=asked,
        series=series,
    )
    return _strictly(answered, checked, block.line_numbers), series, asked


def _course(checked: Request) -> Array | None:
    """Return the times of a course, None where none is told."""
    return next((each.values for each in checked.inputs if TERMS[each.term].holds == "course"), None)
