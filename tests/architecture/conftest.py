"""What the tests of the house share: registers in which a test may declare what it likes."""

import gc
from collections.abc import Callable, Iterator
from functools import _lru_cache_wrapper

import pytest

from service.physics import declare

REGISTERS = [name for name, value in vars(declare).items() if name.isupper() and isinstance(value, dict)]


def forget_what_was_derived() -> None:
    """Empty every cache of the project, since all of them are derived from the registers."""
    for each in gc.get_objects():
        if isinstance(each, _lru_cache_wrapper) and each.__module__.startswith(("service", "schemas")):
            each.cache_clear()


@pytest.fixture
def registers() -> Iterator[Callable[[], None]]:
    """Let a test declare what it likes and forget it afterwards; call what is given after declaring."""
    kept = {name: dict(getattr(declare, name)) for name in REGISTERS}
    kept["STEPS"] = {
        result: {method: list(ways) for method, ways in by_method.items()}
        for result, by_method in declare.STEPS.items()
    }
    forget_what_was_derived()
    yield forget_what_was_derived
    for name, before in kept.items():
        register = getattr(declare, name)
        register.clear()
        register.update(before)
    forget_what_was_derived()
