"""Imports run one way: the web layer over the schemas over the physics, and never in a circle."""

import ast
import subprocess
import sys
from graphlib import CycleError, TopologicalSorter
from pathlib import Path

import pytest

ROOT = Path(__file__).parents[2]
PHYSICS, SCHEMAS, WEB = "service.physics", "schemas", "service"
ALLOWED = {
    PHYSICS: {"numpy", "gsw"},
    SCHEMAS: {"numpy", "marshmallow", "apispec"},
    WEB: {"numpy", "flask", "werkzeug", "orjson", "gunicorn", "marshmallow", "prometheus_client"},
}
BELOW = {PHYSICS: {PHYSICS}, SCHEMAS: {PHYSICS, SCHEMAS}, WEB: {PHYSICS, SCHEMAS, WEB}}


def module_name(path: Path) -> str:
    parts = path.relative_to(ROOT).with_suffix("").parts
    return ".".join(parts[:-1] if parts[-1] == "__init__" else parts)


MODULES = {module_name(path): path for top in (SCHEMAS, WEB) for path in sorted((ROOT / top).rglob("*.py"))}
PACKAGES = {name for name, path in MODULES.items() if path.name == "__init__.py"}


def imports(name: str, text: str) -> set[str]:
    """Return everything that a module imports, inside functions too, by the longest name that is a module."""
    package = name if name in PACKAGES else name.rpartition(".")[0]
    found: set[str] = set()
    for node in ast.walk(ast.parse(text)):
        if isinstance(node, ast.Import):
            found |= {alias.name for alias in node.names}
        elif isinstance(node, ast.ImportFrom):
            base = node.module or ""
            if node.level:
                above = package.split(".")[: len(package.split(".")) - node.level + 1]
                base = ".".join([*above, base] if base else above)
            for alias in node.names:
                whole = f"{base}.{alias.name}"
                found.add(whole if whole in MODULES else base)
    return found


def ours(imported: set[str]) -> set[str]:
    """Return the project modules among some imports; a package stands for every module in it."""
    found: set[str] = set()
    for name in imported & set(MODULES):
        found.add(name)
        if name in PACKAGES:
            found |= {each for each in MODULES if each.startswith(f"{name}.")}
    return found


def layer(name: str) -> str:
    return next(top for top in (PHYSICS, SCHEMAS, WEB) if name == top or name.startswith(f"{top}."))


IMPORTS = {name: imports(name, path.read_text(encoding="utf-8")) for name, path in MODULES.items()}


@pytest.mark.parametrize("name", MODULES)
def test_a_module_imports_only_from_its_own_layer_and_those_below(name: str) -> None:
    upwards = {other for other in IMPORTS[name] & set(MODULES) if layer(other) not in BELOW[layer(name)]}

    assert not upwards


@pytest.mark.parametrize("name", MODULES)
def test_a_module_imports_only_the_libraries_of_its_layer(name: str) -> None:
    tops = {other.partition(".")[0] for other in IMPORTS[name]}
    libraries = tops - set(sys.stdlib_module_names) - {SCHEMAS, WEB}

    assert libraries <= ALLOWED[layer(name)]


def test_no_project_modules_import_each_other_in_a_circle() -> None:
    graph = {name: ours(imported) - {name} - PACKAGES for name, imported in IMPORTS.items()}

    try:
        TopologicalSorter(graph).prepare()
    except CycleError as error:
        pytest.fail(f"circle: {' <- '.join(error.args[1])}")


@pytest.mark.parametrize(
    ("text", "expected"),
    [
        ("import flask", "flask"),
        ("from service.physics import sources", "service.physics.sources"),
        ("from service.physics.declare import step", "service.physics.declare"),
        ("from ..engine import plan", "service.physics.engine"),
        ("from . import forms", "service.physics.solubility.forms"),
        ("def late():\n    import schemas.requests", "schemas.requests"),
    ],
)
def test_the_walk_sees_every_way_of_importing(text: str, expected: str) -> None:
    assert imports("service.physics.solubility.marine", text) == {expected}


def test_the_physics_loads_neither_flask_nor_marshmallow() -> None:
    code = "import sys, service.physics.question; print(*sorted({name.partition('.')[0] for name in sys.modules}))"

    told = subprocess.run([sys.executable, "-c", code], capture_output=True, text=True, check=True, cwd=ROOT)

    loaded = set(told.stdout.split())
    assert "numpy" in loaded
    assert not loaded & {"flask", "werkzeug", "marshmallow", "schemas", "orjson", "apispec", "gunicorn"}
