"""What schemathesis is told of the service: how a table is sent, and what a question lacks to be a whole one."""

from collections.abc import Mapping
from typing import Any
from urllib.parse import parse_qsl, urlsplit

import schemathesis
from schemathesis import Case, HookContext, SerializationContext


@schemathesis.serializer("text/csv")
def table(_: SerializationContext, value: Any) -> bytes:
    return str(value).encode("utf-8", "replace")


def without_rivals(wanted: Mapping[str, Any], sent: Mapping[str, Any], sides: list[dict[str, Any]]) -> dict[str, Any]:
    """Return what is wanted and not sent, without inputs that another one of their side stands for."""
    rivals = {name: set(side["members"]) for side in sides for name in side["members"]}
    return {name: value for name, value in wanted.items() if not rivals.get(name, {name}) & set(sent)}


@schemathesis.hook
def before_call(_: HookContext, case: "Case[Any]", __: dict[str, Any]) -> None:
    """Add the inputs of the first example that are not there, so that more questions come as far as an answer.

    The gas is left alone in a query: without it a request is wrong, and meant to be.
    """
    item = case.operation.schema.raw_schema["paths"][case.operation.path]
    examples = {each["name"]: each for each in item.get("x-examples", ())}
    if case.method == "GET" and "get" in examples:
        wanted = dict(parse_qsl(urlsplit(examples["get"]["url"]).query))
        wanted.pop("gas", None)
        case.query = {**without_rivals(wanted, case.query or {}, item["x-sides"]), **(case.query or {})}
    elif isinstance(case.body, dict) and case.media_type == "application/json" and "json" in examples:
        sent = {**(case.query or {}), **case.body}
        case.body = {**without_rivals(examples["json"]["body"], sent, item["x-sides"]), **case.body}
