"""The OpenAPI document, made from the declarations that drive the validation: what is new there appears here."""

from collections.abc import Mapping
from typing import Any

from apispec import APISpec
from apispec.ext.marshmallow import MarshmallowPlugin
from apispec.ext.marshmallow.openapi import OpenAPIConverter

from schemas import answers, catalogue
from schemas.answers import Described, Statuses, ref, schema
from schemas.examples import Example, quantity_examples
from schemas.needs import quantity_needs, quantity_results, quantity_sides
from schemas.parameters import Sent, own_fields, patterned, unit_lists, value_schemas
from schemas.vocabulary import request_fields
from service.physics.declare import QUANTITIES, Quantity
from service.physics.faults import CODES

ABOUT = """Air-water gas exchange: solubility, Schmidt number, transfer velocity, flux and equilibration time, each
number with its unit, quality flag, method and source.

Names are the same in queries, JSON, forms and CSV headers. A number may stand once, for all samples, or once per
sample. A POST body is recognised by its content: JSON, CSV, form or multipart; query parameters beside it hold for
every sample. `form`, `errors` and `nocache` are always read from the address. Every address takes HEAD where it takes
GET, and OPTIONS.

Of each input `x-unit` is the unit of a bare number, `x-units` the name in `x-unit-lists` of those it may be sent in,
`x-possible` the limits of the possible (a sample outside is flagged 4), `x-side` the inputs of which it is one. Of each
address `x-inputs` says what is needed, `x-sides` of what exactly one is sent, `x-results` what comes back, `x-examples`
what can be tried."""
TAGS = {
    "quantities": "What is computed.",
    "catalogue": "What there is: gases, methods, sources, units, checks.",
    "service": "The page and its reference, and whether the service is well.",
}
URL_ONLY: tuple[Described, ...] = (
    {
        "name": "form",
        "in": "query",
        "description": "how the answer is written; left out: as Accept says, else JSON, and CSV for CSV",
        "schema": {"type": "string", "enum": ["json", "csv", "number"]},
    },
    {
        "name": "errors",
        "in": "query",
        "description": "`text`, for a cell: a refusal is status 200 and one line, `ERROR name: reason`",
        "schema": {"type": "string", "enum": ["problem", "text"], "default": "problem"},
    },
    {
        "name": "nocache",
        "in": "query",
        "description": "ignored; any value, against caches on the way",
        "schema": {"type": "string"},
    },
)
STATUSES = {"get": (401, 405, 414, 422, 503), "post": (400, 401, 405, 413, 414, 415, 422, 503)}
ANYONE_OR_TOKEN: list[dict[str, list[str]]] = [{}, {"token": []}, {"password": []}]


def document(version: str, limits: Mapping[str, int], statuses: Statuses) -> dict[str, Any]:
    """Return the document.

    Parameters
    ----------
    version : str
        Of the service.
    limits : mapping
        Name to the most that is taken.
    statuses : mapping
        Every status of a problem document to its kind and title.

    Returns
    -------
    dict
        In the same order whenever it is made, so that its bytes do not change.
    """
    plugin = MarshmallowPlugin()
    specification = APISpec(
        title="Catspaw",
        version=version,
        openapi_version="3.1.0",
        info={
            "summary": "Air-water gas exchange on demand",
            "description": ABOUT,
            "license": {"name": "MIT", "identifier": "MIT"},
        },
        servers=[{"url": "/"}],
        security=ANYONE_OR_TOKEN,
        tags=[{"name": name, "description": text} for name, text in TAGS.items()],
        plugins=[plugin],
        **{"x-limits": dict(limits), "x-codes": CODES, "x-unit-lists": unit_lists()},
    )
    if plugin.converter is None:
        raise LookupError("apispec brings no converter of fields")
    plugin.converter.add_attribute_function(own_fields)  # type: ignore[no-untyped-call]  # apispec leaves it untyped
    _common(specification, statuses)
    for quantity in QUANTITIES.values():
        _quantity(specification, quantity, plugin.converter)
    for address in catalogue.addresses():
        _address(specification, address)
    return specification.to_dict()


def _common(specification: APISpec, statuses: Statuses) -> None:
    """Put what several addresses share among the components."""
    shared = value_schemas() | answers.answer_schemas() | catalogue.catalogue_schemas()
    for name, described in {**shared, "Problem": answers.problem_schema(statuses)}.items():
        specification.components.schema(name, described)
    for name, described in answers.headers().items():
        specification.components.header(name, described)
    for name, described in answers.problem_responses(statuses).items():
        specification.components.response(name, described)
    specification.components.response("not-modified", answers.NOT_MODIFIED)
    specification.components.security_scheme("token", {"type": "http", "scheme": "bearer"})
    specification.components.security_scheme("password", {"type": "http", "scheme": "basic"})


def _shared(specification: APISpec, parameter: Described, component: str = "") -> Any:
    """Return a parameter by reference where every address has the same, else as it is."""
    name, known = component or parameter["name"], specification.components.parameters
    if name not in known:
        specification.components.parameter(name, parameter["in"], parameter)
    return name if known[name] == parameter else parameter


def _member(specification: APISpec, name: str, member: Described) -> Described:
    known = specification.components.schemas
    if name not in known:
        specification.components.schema(name, member)
    return schema(name) if known[name] == member else member


def _problems(statuses: tuple[int, ...]) -> Described:
    return {str(status): ref("responses", f"problem-{status}") for status in statuses}


def _quantity(specification: APISpec, quantity: Quantity, converter: OpenAPIConverter) -> None:
    """Add the address of a quantity."""
    sent = Sent(quantity, request_fields(quantity), converter)
    parameters, examples = sent.parameters(), quantity_examples(quantity)
    specification.components.schema(f"Answer.{quantity.name}", answers.answer_schema(quantity))
    body = {
        "type": "object",
        "properties": {name: _member(specification, name, member) for name, member in sent.members().items()},
        "patternProperties": patterned(quantity),
        "additionalProperties": False,
    }
    specification.components.schema(f"Request.{quantity.name}", body)
    name = quantity.name.replace("-", "_")
    about = {"tags": ["quantities"], "summary": quantity.title}
    answer = ref("responses", f"answer-{quantity.name}")
    specification.components.response(f"answer-{quantity.name}", answers.computed_response(quantity))
    needed = [
        _shared(specification, p | {"required": True}, f"needed-{p['name']}")
        for p in parameters
        if p["name"] in sent.required
    ]
    operations: dict[str, Any] = {
        "get": {
            **about,
            "operationId": f"get_{name}",
            "parameters": needed,
            "responses": {"200": answer, **_problems(STATUSES["get"])},
        },
        "post": {
            **about,
            "operationId": f"post_{name}",
            "requestBody": _body(quantity, examples),
            "responses": {"200": answer, **_problems(STATUSES["post"])},
        },
        "x-quantity": quantity.name,
        "x-inputs": quantity_needs(quantity),
        "x-sides": quantity_sides(quantity),
        "x-results": quantity_results(quantity),
        "x-examples": examples,
    }
    every = [_shared(specification, each) for each in (*parameters, *URL_ONLY)]
    specification.path(f"/v1/{quantity.name}", operations=operations, parameters=every)


def _body(quantity: Quantity, examples: list[Example]) -> Described:
    """Describe the bodies that a quantity takes; what each needs may also stand in the query."""
    content: dict[str, Described] = {
        "application/json": {"schema": schema(f"Request.{quantity.name}")},
        "text/csv": {"schema": {"type": "string"}},
        "application/x-www-form-urlencoded": {"schema": schema("Form")},
        "multipart/form-data": {"schema": schema("Form")},
    }
    for each in examples:
        if "body" in each:
            told = {"summary": each["summary"], "value": each["body"], "x-url": each["url"]}
            content[each["content_type"]].setdefault("examples", {})[each["name"]] = told
    return {
        "description": "One of these, told apart by the content.",
        "required": False,
        "content": content,
    }


def _address(specification: APISpec, address: catalogue.Address) -> None:
    """Add an address of the catalogue."""
    url_only = URL_ONLY[1:] if address.checks_query else ()
    text = {"text/plain": {"type": "string"}} if address.checks_query else {}
    answer = answers.told_response(address.summary, {**address.answers, **text}, address.cached)
    operation: dict[str, Any] = {
        "tags": [address.tag],
        "summary": address.summary,
        "operationId": f"get_{address.operation}",
        "parameters": [
            _shared(specification, each) if each in URL_ONLY else each for each in (*address.parameters, *url_only)
        ],
        "responses": {
            "200": answer,
            **({"304": ref("responses", "not-modified")} if address.cached else {}),
            **_problems(address.statuses),
        },
    }
    if address.open_to_all:
        operation["security"] = []
    specification.path(address.path, operations={"get": operation})
