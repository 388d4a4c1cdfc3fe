"""The configuration: every setting, its default, its limits, and where it is read from."""

import difflib
import os
import re
from collections.abc import Mapping
from dataclasses import dataclass, field, fields
from importlib.metadata import PackageNotFoundError, version
from typing import Any

MEBIBYTE = 1024 * 1024
PREFIX = "CATSPAW_"
ADDRESS = re.compile(r"(?:(?P<host>[A-Za-z0-9.-]+|\[[0-9A-Fa-f:.]+\]):(?P<port>[0-9]{1,5})|unix:/.+)\Z", re.ASCII)
ORIGIN = re.compile(r"(?:\*|https?://[A-Za-z0-9.-]+(?::[0-9]{1,5})?)?\Z", re.ASCII)
TOKEN = re.compile(r"[\x21-\x7e]{0,1000}\Z", re.ASCII)
HIDDEN = "(hidden)"


class ConfigurationError(ValueError):
    """A setting that cannot be used, told in one line."""


def _number(default: int, low: int, high: int, meaning: str) -> Any:
    return field(default=default, metadata={"low": low, "high": high, "meaning": meaning})


def _text(default: str, pattern: "re.Pattern[str]", allowed: str, meaning: str) -> Any:
    return field(default=default, metadata={"pattern": pattern, "allowed": allowed, "meaning": meaning})


def _choice(default: str, other: str, meaning: str) -> Any:
    return _text(default, re.compile(rf"(?:{default}|{other})\Z"), f"{default} or {other}", meaning)


@dataclass(frozen=True, slots=True)
class Config:
    """Settings of the service; each is read from ``CATSPAW_<NAME>``."""

    bind: str = _text("127.0.0.1:8660", ADDRESS, "HOST:PORT or unix:/path", "address to listen on")
    workers: int = _number(2, 1, 256, "worker processes; as many as there are cores")
    threads: int = _number(64, 1, 1024, "threads of a worker; each serves one slow client")
    token: str = _text("", TOKEN, "at most 1000 visible ASCII characters", "what a caller must show; none if empty")
    cors: str = _text("*", ORIGIN, "* or https://host or nothing", "the web origin that may read answers")
    csv_bytes: int = _number(128 * MEBIBYTE, 1000, 2048 * MEBIBYTE, "the longest CSV body, unpacked")
    json_bytes: int = _number(16 * MEBIBYTE, 1000, 256 * MEBIBYTE, "the longest JSON or form body, unpacked")
    slots: int = _number(2, 1, 64, "large requests that a worker computes at once")
    wait_seconds: int = _number(10, 1, 300, "how long a large request waits for a slot before 503")
    slow_seconds: int = _number(20, 1, 3600, "how long a client may take to send nothing or to take nothing")
    keepalive_seconds: int = _number(75, 0, 3600, "how long an idle connection is kept")
    graceful_seconds: int = _number(30, 1, 3600, "how long a stop waits for requests in flight")
    drain_seconds: int = _number(0, 0, 3600, "how long /readyz says 503 before a stop begins")
    max_requests: int = _number(0, 0, 10**9, "requests after which a worker is replaced; 0 for never")
    log: str = _choice("requests", "none", "one line of JSON for each request on standard output")
    metrics: str = _choice("on", "off", "whether /metrics is served")

    def told(self) -> dict[str, str]:
        """Return every setting as its variable and its value, the token hidden."""
        values = {f"{PREFIX}{each.name.upper()}": str(getattr(self, each.name)) for each in fields(self)}
        return values | {f"{PREFIX}TOKEN": HIDDEN if self.token else ""}


VARIABLES = {f"{PREFIX}{each.name.upper()}": each for each in fields(Config)}


def read(environment: Mapping[str, str] | None = None) -> Config:
    """Return the configuration of an environment.

    Raises
    ------
    ConfigurationError
        Naming the variable whose value cannot be used, with what can be.
    """
    found = os.environ if environment is None else environment
    values: dict[str, str | int] = {}
    for variable, each in VARIABLES.items():
        if variable not in found:
            continue
        text, told = found[variable].strip(), each.metadata
        if "pattern" in told:
            if not told["pattern"].match(text) or not _is_port(each.name, text):
                shown = HIDDEN if each.name == "token" else ascii(text[:100])
                raise ConfigurationError(f"{variable} must be {told['allowed']}, not {shown}")
            values[each.name] = text
        else:
            low, high = told["low"], told["high"]
            if not (text.isascii() and text.isdigit() and len(text) < 20 and low <= int(text) <= high):
                reason = f"must be a whole number from {low} to {high}, not {text[:100]!a}"
                raise ConfigurationError(f"{variable} {reason}")
            values[each.name] = int(text)
    return Config(**values)  # type: ignore[arg-type]  # each value has the type of its field


def _is_port(name: str, text: str) -> bool:
    """Tell whether the port of an address is one; true of everything that is no address."""
    return name != "bind" or text.startswith("unix:") or int(text.rpartition(":")[2]) < 65536


def strangers(environment: Mapping[str, str] | None = None) -> list[str]:
    """Return a line for each variable that looks like a setting and is none.

    A warning, not an error: orchestrators put variables of their own under the name of a service.
    """
    found = os.environ if environment is None else environment
    lines = []
    for name in sorted(name for name in found if name.startswith(PREFIX) and name not in VARIABLES):
        near = difflib.get_close_matches(name, VARIABLES, 1, 0.8)
        lines.append(f"{name} is no setting{f': did you mean {near[0]}?' if near else ''}")
    return lines


def service_version() -> str:
    """Return the version of the installed distribution."""
    try:
        return version("catspaw")
    except PackageNotFoundError:
        return "0+uninstalled"
