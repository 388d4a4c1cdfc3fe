"""What comes back, in the words of the API document: answers, problem documents and headers."""

from collections.abc import Mapping
from typing import Any

from schemas.vocabulary import request_fields
from service.physics.declare import FAMILIES, TERMS, Quantity
from service.physics.faults import CODES
from service.physics.judge import BAD, GOOD, MISSING, SUSPECT
from service.physics.question import known_names

Described = dict[str, Any]
Statuses = Mapping[int, tuple[str, str]]

TEXT = {"type": "string"}
TEXT_OR_NONE = {"type": ["string", "null"]}
NUMBERS = {"type": "array", "items": {"type": ["number", "null"]}}
OF_SAMPLES = {"type": "array", "items": {"type": ["number", "null", "array"], "items": {"type": ["number", "null"]}}}
PROBLEM = "application/problem+json"
FLAGS = {
    GOOD: "good",
    SUSPECT: "suspect: computed, but outside a method's range or with an assumption that matters",
    BAD: "bad: no result",
    MISSING: "missing: an input is missing, no result",
}
HEADERS_OF_STATUS = {401: "WWW-Authenticate", 405: "Allow", 503: "Retry-After"}


def ref(kind: str, name: str) -> Described:
    """Return a reference to a component."""
    return {"$ref": f"#/components/{kind}/{name}"}


def schema(name: str) -> Described:
    """Return a reference to a schema among the components."""
    return ref("schemas", name)


def list_of(items: Described) -> Described:
    """Return the schema of an array."""
    return {"type": "array", "items": items}


def map_of(values: Described) -> Described:
    """Return the schema of an object whose names are not known beforehand."""
    return {"type": "object", "additionalProperties": values}


def record(properties: Mapping[str, Described], optional: tuple[str, ...] = (), description: str = "") -> Described:
    """Return the schema of an object; a later version may add members, so that it is left open."""
    told: Described = {"type": "object", "description": description} if description else {"type": "object"}
    told["properties"] = dict(properties)
    told["required"] = [name for name in properties if name not in optional]
    return told


def answer_schemas() -> dict[str, Described]:
    """Return the schemas of what every answer holds."""
    return {
        "Result": record(
            {
                "values": OF_SAMPLES
                | {"description": "One per sample, of a course one list per sample; null where there is no result."},
                "unit": TEXT,
                "mass_of": TEXT | {"description": "Formula or symbol of what a mass is the mass of."},
                "standard_name": TEXT_OR_NONE | {"description": "CF standard name, where there is one."},
                "spread": OF_SAMPLES | {"description": "Sample standard deviation over the parameterisations."},
                "u": OF_SAMPLES | {"description": "Standard uncertainty; null where a method publishes none."},
                "u_inputs": OF_SAMPLES | {"description": "That from the inputs alone, where methods count too."},
                "u_total": OF_SAMPLES | {"description": "That within the parameterisations and between them."},
                "budget": map_of(OF_SAMPLES) | {"description": "Share of each input and method in u squared."},
                "interval": record({"low": OF_SAMPLES, "high": OF_SAMPLES}, description="Coverage interval."),
            },
            optional=("mass_of", "spread", "u", "u_inputs", "u_total", "budget", "interval"),
        ),
        "Summary": record(
            {
                "rule": TEXT | {"description": "How mean and integral are taken."},
                "results": map_of({"type": "object"})
                | {"description": "Mean, integral, with an area amount and mass, each with unit and uncertainty."},
                "samples": {"type": "integer"},
                "left_out": {"type": "integer"},
                "fraction_covered": {"type": ["number", "null"]},
                "gaps": {"type": "integer"},
            },
            optional=("samples", "left_out", "fraction_covered", "gaps"),
            description="Of a series; with several parameterisations their mean, and each by its name.",
        ),
        "Quality": record(
            {
                "flags": list_of({"type": "integer", "enum": sorted(FLAGS)})
                | {
                    "description": "IOC quality flags (UNESCO, IOC Manuals and Guides 54, vol. 3): "
                    + "; ".join(f"{flag} {meaning}" for flag, meaning in sorted(FLAGS.items()))
                    + "."
                },
                "reasons": list_of(list_of(TEXT)) | {"description": "Per sample, why it is flagged; may be empty."},
            }
        ),
        "MethodUsed": record(
            {
                "name": TEXT | {"description": "Author-year name."},
                "source": TEXT | {"description": "The publication."},
                "doi": TEXT_OR_NONE,
            }
        ),
        "Assumed": record(
            {"value": {"type": ["number", "string", "null"]}, "unit": TEXT},
            optional=("unit",),
            description="What was not sent and what was taken in its place.",
        ),
        "Service": record({"name": TEXT, "version": TEXT}),
    }


def answer_schema(quantity: Quantity) -> Described:
    """Return the schema of a quantity's answer."""
    results = {
        "type": "object",
        "description": "The results wanted, in the order of `pick`; the main ones where nothing was picked.",
        "properties": {name: schema("Result") for name in known_names(quantity)},
        "additionalProperties": False,
    }
    outcome = record({"results": results, "quality": schema("Quality")})
    option = next((family.option for family in FAMILIES.values() if family.given_by), "")
    several = {
        "by_parameterisation": map_of(outcome)
        | {"description": "Each method's own outcome; the outer results are their mean, with its spread."}
    }
    told = request_fields(quantity)
    series = {"time": {"description": "As it was sent."}}
    if "summary" in told:
        series["summary"] = schema("Summary")
    course = {"times": record({"values": NUMBERS, "unit": TEXT}, description="Of the course, in days.")}
    properties: Described = {
        "quantity": {"const": quantity.name},
        **({"gas": TEXT} if quantity.of_gas else {}),
        "samples": {"type": "integer", "minimum": 1},
        **(course if any(TERMS[name].holds == "course" for name in told if name in TERMS) else {}),
        **outcome["properties"],
        **series,
        "uncertainty": {"type": "object", "description": "How uncertainty was propagated, where it was asked for."},
        **(several if option in request_fields(quantity) else {}),
        "methods": map_of(list_of(schema("MethodUsed"))) | {"description": "By what they answer."},
        "assumed": map_of(schema("Assumed")),
        "service": schema("Service"),
    }
    optional = ("by_parameterisation", "methods", "assumed", "times", "time", "summary", "uncertainty")
    return record(properties, optional=optional, description=quantity.title)


def problem_schema(statuses: Statuses) -> Described:
    """Return the schema of a problem document."""
    told = "; ".join(f"`{code}` {meaning}" for code, meaning in CODES.items())
    fault = record(
        {
            "code": {"type": "string", "enum": list(CODES), "description": f"One of a closed list: {told}."},
            "name": TEXT | {"description": "The input, option, column or part of the request."},
            "reason": TEXT,
            "allowed": TEXT | {"description": "What may stand there."},
            "sample": {"type": "integer", "minimum": 1, "description": "Which sample, from 1."},
            "line": {"type": "integer", "minimum": 1, "description": "Which line of a CSV body, from 1."},
        },
        optional=("allowed", "sample", "line"),
    )
    return record(
        {
            "type": {"type": "string", "enum": [f"/reference#{kind}" for kind, _ in statuses.values()]},
            "title": TEXT,
            "status": {"type": "integer", "enum": list(statuses)},
            "detail": TEXT | {"description": "A sentence that says what to mend."},
            "instance": TEXT | {"description": "The request id."},
            "errors": list_of(fault) | {"description": "The first of what is wrong."},
            "more": {"type": "integer", "minimum": 1, "description": "How many more are not listed."},
        },
        optional=("errors", "more"),
        description="What went wrong, after RFC 9457.",
    )


def headers() -> dict[str, Described]:
    """Return the headers that answers carry."""

    def header(description: str, required: bool = False) -> Described:
        return {"description": description, "schema": TEXT, **({"required": True} if required else {})}

    return {
        "Catspaw-Version": header("Version of the service.", required=True),
        "X-Request-ID": header(
            "The request's own id where it sent one of at most 64 letters, digits, dots, dashes and underscores; "
            "else one made for it.",
            required=True,
        ),
        "Catspaw-Assumed": header("What was assumed, `name=value unit`, parted by `; `."),
        "Catspaw-Methods": header("The methods used, `what=name`, parted by `; `."),
        "ETag": header("Changes only with the answer; send it back as If-None-Match."),
        "Allow": header("The methods that the address takes."),
        "Retry-After": header("Seconds after which to ask again."),
        "WWW-Authenticate": header("How to show a token."),
    }


def _headers(*names: str) -> Described:
    return {name: ref("headers", name) for name in ("Catspaw-Version", "X-Request-ID", *names)}


def problem_responses(statuses: Statuses) -> dict[str, Described]:
    """Return the responses that are problem documents, by status."""
    return {
        f"problem-{status}": {
            "description": title,
            "headers": _headers(*([HEADERS_OF_STATUS[status]] if status in HEADERS_OF_STATUS else [])),
            "content": {PROBLEM: {"schema": schema("Problem")}},
        }
        for status, (_, title) in statuses.items()
    }


def computed_response(quantity: Quantity) -> Described:
    """Return the response that holds a quantity's answer in each of its forms."""
    return {
        "description": "The answer. With `errors=text` also one line, `ERROR name: reason`, in place of a refusal.",
        "headers": _headers("Catspaw-Assumed", "Catspaw-Methods"),
        "content": {
            "application/json": {"schema": schema(f"Answer.{quantity.name}")},
            "text/csv": {
                "schema": TEXT
                | {
                    "description": "The lines that were sent, unchanged, with the results, `quality_flag` and "
                    "`quality_reason` behind them; without a table, the inputs as they were understood."
                }
            },
            "text/plain": {
                "schema": TEXT | {"description": "Bare numbers of the first picked result, one line per sample."}
            },
        },
    }


def told_response(description: str, content: Mapping[str, Described], cached: bool = True) -> Described:
    """Return the response of a catalogue address."""
    return {
        "description": description,
        "headers": _headers(*(["ETag"] if cached else [])),
        "content": {kind: {"schema": each} for kind, each in content.items()},
    }


NOT_MODIFIED: Described = {"description": "Not changed since the ETag that was sent.", "headers": _headers("ETag")}
