"""The addresses that tell what there is: gases, methods, sources, units, limits, and whether the service is well."""

import hashlib
from collections.abc import Callable, Collection, Iterable
from functools import cache
from typing import Any

import orjson
from flask import Flask, Response, request

from schemas.document import document
from schemas.requests import SAMPLES_LIMIT
from schemas.samples import NUMBER
from schemas.vocabulary import quantity_inputs
from service.bodies import RATIO
from service.config import Config, service_version
from service.errors import TYPES
from service.physics import catalogue
from service.physics.declare import GASES, QUANTITIES
from service.physics.faults import Fault, Refused, nearest, unknown
from service.physics.methods import transfer_methods
from service.physics.quantities import TRANSFER_VELOCITY
from service.physics.terms import WATERS
from service.physics.units import listing
from service.places import SMALL_SAMPLES

JSON = "application/json"
LISTS = ("gases", "parameterisations", "sources", "units", "checks")


def _told(content: bytes | str, kind: str = JSON) -> Response:
    """Return an answer that does not change between versions, with its ETag."""
    body = content.encode() if isinstance(content, str) else content
    response = Response(body, mimetype=kind)
    response.set_etag(hashlib.sha256(body).hexdigest()[:32])
    response.headers["Cache-Control"] = "no-cache"
    response.make_conditional(request)
    return response


def _json(value: Any) -> Response:
    return _told(orjson.dumps(value))


def parameters(known: Iterable[str]) -> dict[str, str]:
    """Return the query's parameters, refusing unknown and repeated ones."""
    allowed = (*known, "errors", "nocache")
    found: dict[str, str] = {}
    for name, values in request.args.lists():
        if name not in allowed:
            raise Refused(unknown(name, allowed))
        if len(values) > 1 and name != "nocache":
            raise Refused(Fault("repeated_name", name, f"stands {len(values)} times in the query"))
        found[name] = values[0]
    return found


def one_of(name: str, value: str | None, choices: Collection[str]) -> str | None:
    """Return a value of a closed list, or None where there is none, refusing others."""
    if value is not None and value not in choices:
        near = nearest(value[:100], choices)
        hint = f": did you mean {near}?" if near else ""
        listed = ", ".join(choices)
        raise Refused(
            Fault("unknown_option", name, f"{value[:100]!r} is not known here{hint or f': {listed}'}", listed)
        )
    return value


def _inputs_at_hand(value: str | None) -> list[str] | None:
    """Return the inputs that a caller has, parted by semicolons, refusing what is none."""
    if value is None:
        return None
    names = [name.strip() for name in value.split(";") if name.strip()]
    known = quantity_inputs(TRANSFER_VELOCITY)
    if strangers := [name for name in names if name not in known]:
        faults = (unknown(name, known, "an input of a transfer velocity") for name in strangers)
        raise Refused(*(Fault("unknown_option", "inputs", f"{f.name} {f.reason}", f.allowed) for f in faults))
    return names


def _not_found(name: str, known: Iterable[str], what: str) -> Refused:
    fault = unknown(name, known, what)
    return Refused(Fault("not_found", fault.name, fault.reason, ", ".join(known)), status=404)


def limits(config: Config) -> dict[str, Any]:
    """Return the limits of a request."""
    return {
        "csv_bytes": config.csv_bytes,
        "json_bytes": config.json_bytes,
        "samples": SAMPLES_LIMIT,
        "query_bytes": 8190,
        "name_characters": 100,
        "cell_characters": 1000,
        "columns_used": 64,
        "columns_passed": 1024,
        "unpacked_ratio": RATIO,
        "large_samples": SMALL_SAMPLES,
        "large_at_once": config.slots,
        "wait_seconds": config.wait_seconds,
    }


def install(app: Flask, config: Config) -> None:
    """Add the catalogue's addresses to an application."""
    for rule, view in _views(config).items():
        app.add_url_rule(rule, f"catalogue {rule}", view, methods=["GET"])


def _views(config: Config) -> dict[str, Callable[..., Response]]:
    def index() -> Response:
        parameters(())
        return _json(
            {
                "name": "catspaw",
                "version": service_version(),
                "quantities": {
                    each.name: {"address": f"/v1/{each.name}", "answers": each.title} for each in QUANTITIES.values()
                },
                "catalogue": {name: f"/v1/{name}" for name in LISTS},
                "document": "/openapi.json",
                "limits": limits(config),
            }
        )

    def gases() -> Response:
        parameters(())
        return _json({"gases": [catalogue.gas_record(gas) for gas in GASES.values()]})

    def gas(name: str) -> Response:
        parameters(())
        if name not in GASES:
            raise _not_found(name, GASES, "a gas")
        return _json(catalogue.gas_record(GASES[name]))

    def parameterisations() -> Response:
        asked = parameters(("water", "wind_speed", "gas", "inputs"))
        wind = asked.get("wind_speed")
        if wind is not None and not NUMBER.fullmatch(wind):
            raise Refused(Fault("not_a_number", "wind_speed", f"{wind[:60]!r} is not a number", "a number in m s-1"))
        found = catalogue.parameterisations(
            one_of("water", asked.get("water"), WATERS),
            float(wind) if wind is not None else None,
            one_of("gas", asked.get("gas"), GASES),
            _inputs_at_hand(asked.get("inputs")),
        )
        return _json({"parameterisations": found})

    def parameterisation(name: str) -> Response:
        parameters(())
        if name not in transfer_methods():
            raise _not_found(name, transfer_methods(), "a parameterisation")
        return _json(catalogue.parameterisation_record(name))

    def sources() -> Response:
        form = one_of("form", parameters(("form",)).get("form", "json"), ("json", "bibtex"))
        content = catalogue.bibliography(form or "json")
        return _told(content, "application/x-bibtex") if isinstance(content, str) else _json({"sources": content})

    def units() -> Response:
        parameters(())
        return _json({"dimensions": listing()})

    @cache
    def openapi_bytes() -> bytes:
        return orjson.dumps(document(service_version(), limits(config), TYPES))

    def openapi() -> Response:
        parameters(())
        return _told(openapi_bytes())

    return {
        "/v1": index,
        "/v1/gases": gases,
        "/v1/gases/<name>": gas,
        "/v1/parameterisations": parameterisations,
        "/v1/parameterisations/<name>": parameterisation,
        "/v1/sources": sources,
        "/v1/units": units,
        "/openapi.json": openapi,
    }
