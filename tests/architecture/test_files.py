"""Files are short, the top level is closed, and every module opens with a sentence."""

import ast
import re
import subprocess
from pathlib import Path

import pytest

ROOT = Path(__file__).parents[2]
LONGEST = 400
REASON = re.compile(r"\blong(er)?\b[^.]*\bbecause\b", re.DOTALL)  # how a docstring excuses a long file
TOP_LEVEL = {"README.md", "DEVELOPERS.md", "pyproject.toml", "service", "schemas", "tests", "Dockerfile", "examples"}


def tracked() -> list[str]:
    if not (ROOT / ".git").exists():
        pytest.skip("not a checkout: the files of the project cannot be told from others")
    told = subprocess.run(["git", "ls-files"], capture_output=True, text=True, check=True, cwd=ROOT)
    return [name for name in told.stdout.splitlines() if (ROOT / name).exists()]


SOURCES = sorted(path for top in ("service", "schemas", "tests", "examples") for path in (ROOT / top).rglob("*.py"))


def names(paths: list[Path]) -> list[str]:
    return [str(path.relative_to(ROOT)) for path in paths]


@pytest.mark.parametrize("path", SOURCES, ids=names(SOURCES))
def test_a_file_is_short_or_says_why_not(path: Path) -> None:
    text = path.read_text(encoding="utf-8")
    excuse = REASON.search(ast.get_docstring(ast.parse(text)) or "")

    assert len(text.splitlines()) <= LONGEST or excuse


@pytest.mark.parametrize("path", SOURCES, ids=names(SOURCES))
def test_a_module_opens_with_a_sentence(path: Path) -> None:
    text = path.read_text(encoding="utf-8")
    if path.name == "__init__.py":
        assert not text.strip(), "package files are empty"
        return
    opening = (ast.get_docstring(ast.parse(text)) or "").split("\n\n")[0]

    assert re.fullmatch(r"[A-Z].+[.:]", opening, re.DOTALL)


def test_the_top_level_holds_only_what_belongs_there() -> None:
    found = {name.partition("/")[0] for name in tracked()}

    assert {name for name in found if not name.startswith(".")} <= TOP_LEVEL


def test_no_file_is_kept_that_tools_make() -> None:
    made = [name for name in tracked() if re.search(r"(__pycache__|\.egg-info|\.pyc$|\.venv/|\.hypothesis/)", name)]

    assert not made
