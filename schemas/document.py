"""The OpenAPI document, made from the same declarations as the validation."""

from typing import Any


def document(version: str, limits: dict[str, Any]) -> dict[str, Any]:
    """Return the document."""
    return {
        "openapi": "3.1.0",
        "info": {"title": "Catspaw", "version": version},
        "paths": {},
        "x-limits": limits,
    }
