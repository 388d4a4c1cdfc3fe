"""The configuration: every setting, its default, and where it is read from."""

import os
from collections.abc import Mapping
from dataclasses import dataclass, fields
from importlib.metadata import PackageNotFoundError, version

MEBIBYTE = 1024 * 1024


class ConfigurationError(ValueError):
    """A setting that cannot be used, told in one line."""


@dataclass(frozen=True, slots=True)
class Config:
    """Settings of the service; each is read from ``CATSPAW_<NAME>``."""

    bind: str = "127.0.0.1:8660"
    workers: int = 2
    threads: int = 16
    token: str = ""
    cors: str = "*"
    csv_bytes: int = 128 * MEBIBYTE
    json_bytes: int = 16 * MEBIBYTE


def read(environment: Mapping[str, str] | None = None) -> Config:
    """Return the configuration of an environment.

    Raises
    ------
    ConfigurationError
        Naming the variable whose value cannot be used.
    """
    found = os.environ if environment is None else environment
    values: dict[str, str | int] = {}
    for field in fields(Config):
        name = f"CATSPAW_{field.name.upper()}"
        if name not in found:
            continue
        text = found[name].strip()
        if field.type is int or field.type == "int":
            if not (text.isascii() and text.isdigit() and int(text) > 0):
                raise ConfigurationError(f"{name} must be a whole number above zero, not {text!r}")
            values[field.name] = int(text)
        else:
            values[field.name] = text
    return Config(**values)  # type: ignore[arg-type]  # each value has the type of its field


def service_version() -> str:
    """Return the version of the installed distribution."""
    try:
        return version("catspaw")
    except PackageNotFoundError:
        return "0+uninstalled"
