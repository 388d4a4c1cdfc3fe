"""The addresses that tell what there is, in the words of the API document: what they take and what they answer."""

from collections.abc import Mapping
from dataclasses import dataclass
from typing import Any

from schemas.answers import TEXT, TEXT_OR_NONE, Described, list_of, map_of, record, schema
from schemas.samples import NUMBER
from service.physics.check import KINDS, RECORD, declared_methods
from service.physics.declare import GASES
from service.physics.methods import transfer_methods
from service.physics.sources import SOURCES
from service.physics.terms import WATERS

NUMBER_OR_NONE = {"type": ["number", "null"]}
TEXTS = list_of(TEXT)


@dataclass(frozen=True)
class Address:
    """A GET address: what it answers, what it takes beside ``errors`` and ``nocache``, and its answer's schema."""

    path: str
    operation: str
    summary: str
    answers: Mapping[str, Described]
    parameters: tuple[Described, ...] = ()
    tag: str = "catalogue"
    cached: bool = True
    statuses: tuple[int, ...] = (401, 405, 414, 422)
    checks_query: bool = True
    open_to_all: bool = False


def _parameter(name: str, description: str, **schema_: Any) -> Described:
    return {"name": name, "in": "query", "description": description, "schema": {"type": "string", **schema_}}


def _name(description: str, names: list[str]) -> Described:
    schema_ = {"type": "string", "enum": names}
    return {"name": "name", "in": "path", "required": True, "description": description, "schema": schema_}


def _json(answer: Described) -> dict[str, Described]:
    return {"application/json": answer}


def addresses() -> list[Address]:
    """Return every address beside the quantities."""
    methods = list(dict.fromkeys(method for _, method in declared_methods()))
    return [
        Address("/v1", "index", "What there is, with addresses and limits", _json(schema("Index"))),
        Address("/v1/gases", "gases", "Every gas", _json(record({"gases": list_of(schema("Gas"))}))),
        Address(
            "/v1/gases/{name}",
            "gas",
            "One gas, its methods with their ranges and sources",
            _json(schema("Gas")),
            (_name("the gas", list(GASES)),),
            statuses=(401, 404, 405, 414, 422),
        ),
        Address(
            "/v1/parameterisations",
            "parameterisations",
            "Transfer velocity methods, all or those that fit",
            _json(record({"parameterisations": list_of(schema("Parameterisation"))})),
            (
                _parameter("water", "made for this kind of water", enum=list(WATERS)),
                _parameter(
                    "wind_speed", "whose range holds this wind at 10 m [m s-1]", pattern=f"^(?:{NUMBER.pattern})$"
                ),
                _parameter("gas", "that can answer for this gas", enum=list(GASES)),
            ),
        ),
        Address(
            "/v1/parameterisations/{name}",
            "parameterisation",
            "One transfer velocity method, with all that tells where it may be used",
            _json(schema("Parameterisation")),
            (_name("the method", list(transfer_methods())),),
            statuses=(401, 404, 405, 414, 422),
        ),
        Address(
            "/v1/sources",
            "sources",
            "The bibliography",
            _json(record({"sources": list_of(schema("Source"))})) | {"application/x-bibtex": TEXT},
            (_parameter("form", "how it is written", enum=["json", "bibtex"], default="json"),),
        ),
        Address(
            "/v1/units", "units", "Units by dimension", _json(record({"dimensions": list_of(schema("Dimension"))}))
        ),
        Address(
            "/v1/checks",
            "checks",
            "Published figures, recomputed now by this installation",
            _json(record({"summary": map_of({}), "checks": list_of(schema("Check")), "service": schema("Service")}))
            | {"text/csv": TEXT},
            (
                _parameter("gas", "of this gas", enum=list(GASES)),
                _parameter("method", "that hold this method", **{"x-choices": methods}),
                _parameter("source", "printed in this source", enum=list(SOURCES)),
                _parameter("holds", "1 those that hold, 0 those that do not", enum=["1", "0"]),
                _parameter("form", "how they are written", enum=["json", "csv"], default="json"),
            ),
            cached=False,
        ),
        Address("/openapi.json", "document", "This document", _json({"type": "object"}), open_to_all=True),
        Address(
            "/reference",
            "reference",
            "This document, for reading and printing",
            {"text/html": TEXT},
            tag="service",
            statuses=(405,),
            checks_query=False,
            open_to_all=True,
        ),
        Address(
            "/",
            "page",
            "The page for people",
            {"text/html": TEXT},
            tag="service",
            statuses=(405,),
            checks_query=False,
            open_to_all=True,
        ),
        Address(
            "/metrics",
            "metrics",
            "Counts for monitoring, as Prometheus reads them; 404 where they are switched off",
            {"text/plain": TEXT},
            tag="service",
            cached=False,
            statuses=(401, 404, 405),
            checks_query=False,
        ),
        Address(
            "/healthz",
            "alive",
            "Whether the process lives",
            _json(record({"status": TEXT})),
            tag="service",
            cached=False,
            statuses=(405,),
            checks_query=False,
            open_to_all=True,
        ),
        Address(
            "/readyz",
            "ready",
            "Whether it takes requests",
            _json(record({"status": TEXT})),
            tag="service",
            cached=False,
            statuses=(405, 503),
            checks_query=False,
            open_to_all=True,
        ),
    ]


def catalogue_schemas() -> dict[str, Described]:
    """Return the schemas of what the catalogue answers."""
    source = record({"key": TEXT, "source": TEXT, "doi": TEXT_OR_NONE}) | {"type": ["object", "null"]}
    return {
        "Index": record(
            {
                "name": TEXT,
                "version": TEXT,
                "quantities": map_of(record({"address": TEXT, "answers": TEXT})),
                "catalogue": map_of(TEXT),
                "document": TEXT,
                "limits": map_of({"type": "integer"}),
            }
        ),
        "SourceBrief": source,
        "Ranges": map_of(record({"from": NUMBER_OR_NONE, "to": NUMBER_OR_NONE, "unit": TEXT}))
        | {"description": "Limits by term; what is outside is computed and flagged 3."},
        "PublishedUncertainty": record(
            {"value": {"type": "number"}, "relative": {"type": "boolean"}, "kind": TEXT, "stated": TEXT}
        )
        | {"type": ["object", "null"]},
        "Method": record(
            {
                "name": TEXT,
                "default": {"type": "boolean"},
                "formula": TEXT,
                "range": schema("Ranges"),
                "range_kind": TEXT,
                "uncertainty": schema("PublishedUncertainty"),
                "source": schema("SourceBrief"),
            }
        ),
        "Gas": record(
            {
                "name": TEXT,
                "title": TEXT,
                "formula": TEXT,
                "molar_mass": record({"value": {"type": "number"}, "unit": TEXT}),
                "dry_air_mole_fraction": TEXT_OR_NONE,
                "mass_as_element": TEXT_OR_NONE,
                "caution": TEXT_OR_NONE,
                "methods": map_of(list_of(schema("Method"))) | {"description": "By the option that chooses them."},
            }
        ),
        "Parameterisation": record(
            {
                "name": TEXT,
                "water": list_of({"type": "string", "enum": list(WATERS)}),
                "inputs": TEXTS,
                "formula": TEXT,
                "schmidt_number_reference": NUMBER_OR_NONE,
                "schmidt_exponent": {"type": ["number", "string", "null"]},
                "wind_averaging": TEXT_OR_NONE,
                "range": schema("Ranges"),
                "range_kind": TEXT,
                "recommended_range": schema("Ranges"),
                "uncertainty": schema("PublishedUncertainty"),
                "default_for": TEXTS,
                "replaced_by": TEXT_OR_NONE,
                "variant_of": TEXT_OR_NONE,
                "note": TEXT_OR_NONE,
                "equation": TEXT,
                "source": schema("SourceBrief"),
            }
        ),
        "Source": record(
            {
                "key": TEXT,
                "citation": TEXT,
                "authors": TEXT,
                "year": {"type": "integer"},
                "title": TEXT,
                "journal": TEXT,
                "doi": TEXT_OR_NONE,
                "methods": TEXTS,
            }
        ),
        "Dimension": record(
            {
                "name": TEXT,
                "base": TEXT,
                "units": list_of(
                    record(
                        {"unit": TEXT, "factor": {"type": "number"}, "offset": {"type": "number"}, "also": TEXTS},
                        description="Number times factor plus offset is the number in the base unit.",
                    )
                ),
            }
        ),
        "Check": record(
            {name: {} for name in RECORD}
            | {
                "published": {"type": "number"},
                "computed": NUMBER_OR_NONE,
                "holds": {"type": "boolean"},
                "kind": {"type": "string", "enum": list(KINDS)},
            }
        ),
    }
