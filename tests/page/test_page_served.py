"""The page as it is served: what stands in its files, how large it is, and that it tells all the document tells."""

import gzip
import re
from pathlib import Path
from typing import Any

import pytest

from service.app import create_app
from service.config import Config
from service.errors import TYPES
from service.page.site import FIRST, FOLDER
from tests.api.api_document import DOCUMENT, parameters

CLIENT = create_app(Config()).test_client()
PAGE = CLIENT.get("/").text
REFERENCE = CLIENT.get("/reference").text
STATIC = sorted((FOLDER / "static").iterdir())
FIRST_VIEW = 150_000  # bytes
ADDRESS = re.compile(r"(?:https?:)?//[\w.-]+\.\w+[^\s\"'`)]*")
NAMED_ONLY = ("http://www.w3.org/2000/svg", "https://doi.org/")  # a name, and links that a person follows; no request
QUANTITIES = [path for path, item in DOCUMENT["paths"].items() if "x-quantity" in item]
NOT_OF_THE_PAGE = {"form", "errors", "nocache", "detail", "headers", "missing", "ignore", "strict"}


def folder() -> str:
    found = re.search(r'data-files="(/page/\w+/)"', PAGE)
    assert found
    return found.group(1)


def description() -> dict[str, Any]:
    told: dict[str, Any] = CLIENT.get(f"{folder()}description.json").get_json()
    return told


@pytest.mark.parametrize("path", ["/", "/?quantity=flux&gas=o2", "/reference"])
def test_a_page_is_open_html_under_a_strict_policy(path: str) -> None:
    answer = CLIENT.get(path)
    policy = answer.headers["Content-Security-Policy"]

    assert answer.status_code == 200
    assert answer.content_type == "text/html; charset=utf-8"
    assert policy.startswith("default-src 'none'; script-src 'self'; style-src 'self'")
    assert "unsafe" not in policy
    assert "http" not in policy
    assert answer.headers["Cache-Control"] == "no-cache"
    assert CLIENT.get(path, headers={"If-None-Match": answer.headers["ETag"]}).status_code == 304


def test_the_page_needs_no_token_and_the_service_still_does() -> None:
    guarded = create_app(Config(token="of-the-lab")).test_client()

    assert guarded.get("/").status_code == 200
    assert guarded.get("/reference").status_code == 200
    assert guarded.get(f"{folder()}start.js").status_code == 200
    assert guarded.get("/v1/gases").status_code == 401


@pytest.mark.parametrize("path", STATIC, ids=[path.name for path in STATIC])
def test_a_file_asks_no_other_machine(path: Path) -> None:
    found = [each for each in ADDRESS.findall(path.read_text(encoding="utf-8")) if not each.startswith(NAMED_ONLY)]

    assert found == []


@pytest.mark.parametrize("text", [PAGE, REFERENCE], ids=["page", "reference"])
def test_a_page_holds_neither_script_nor_style_nor_outside_address(text: str) -> None:
    assert not re.search(r"<style|\sstyle=|\son\w+=|<script(?![^>]*\ssrc=)", text)
    assert not [each for each in re.findall(r'(?:src|href)="([^"]*)"', text) if not each.startswith(("/", "#"))]


def test_the_first_view_is_small_also_where_nothing_is_compressed() -> None:
    styles = re.findall(r'rel="stylesheet" href="([^"]+)"', PAGE)
    files = [*styles, *(folder() + name for name in (*FIRST, "start.js", "icon.svg", "description.json"))]
    plain = len(PAGE.encode()) + sum(len(CLIENT.get(each).data) for each in files)

    assert len(styles) == 2
    assert plain < FIRST_VIEW


def test_every_file_that_the_first_view_loads_is_told_beforehand() -> None:
    seen, left = set[str](), ["start.js"]
    while left:
        text = (FOLDER / "static" / left.pop()).read_text(encoding="utf-8")
        new = set(re.findall(r'^import [^;]*from "\./([\w.]+)"', text, re.MULTILINE)) - seen
        seen |= new
        left += new

    assert seen == set(FIRST)


def test_a_file_is_compressed_for_those_who_read_that_and_kept_under_its_mark() -> None:
    plain = CLIENT.get(f"{folder()}start.js")
    small = CLIENT.get(f"{folder()}start.js", headers={"Accept-Encoding": "gzip"})

    assert plain.data == gzip.decompress(small.data) == (FOLDER / "static" / "start.js").read_bytes()
    assert small.headers["Content-Encoding"] == "gzip"
    assert small.headers["Vary"] == "Accept-Encoding"
    assert "immutable" in plain.headers["Cache-Control"]
    assert plain.content_type == "text/javascript; charset=utf-8"


@pytest.mark.parametrize("path", ["/page/0/start.js", "{}../page.html", "{}none.js", "{}..%2Fsite.py", "/page/"])
def test_nothing_else_is_served(path: str) -> None:
    assert CLIENT.get(path.format(folder())).status_code == 404


@pytest.mark.parametrize("path", QUANTITIES)
def test_every_input_and_option_of_the_document_can_be_told_on_the_page(path: str) -> None:
    told = description()
    quantity = told["quantities"][DOCUMENT["paths"][path]["x-quantity"]]
    for name, about in parameters(path.removeprefix("/v1/")).items():
        if name.startswith("unit."):
            assert told["results"][name[5:]]["units"] == about["x-units"]
        elif "x-uncertainty-of" in about:
            assert about["x-uncertainty-of"] in quantity["takes"]
            assert about["x-uncertainty-of"] not in quantity["certain"]
        else:
            page = quantity["own"].get(name, told["names"][name])
            assert name in quantity["takes"]
            assert page["description"] == about["description"]
            assert page.get("unit") == about.get("x-unit")
            assert page.get("default") == about["schema"].get("default")
            assert page.get("choices") == about.get("x-choices", about["schema"].get("enum"))


def test_what_the_page_keeps_from_the_person_is_only_how_an_answer_is_written() -> None:
    text = (FOLDER / "static" / "question.js").read_text(encoding="utf-8")
    kept = re.search(r"OF_THE_FORM = \[(.*?)\]", text)

    assert kept
    assert set(re.findall(r'"(\w+)"', kept.group(1))) == NOT_OF_THE_PAGE


def test_the_reference_has_an_anchor_for_every_kind_of_problem() -> None:
    for kind, title in TYPES.values():
        assert f'<tr id="{kind}">' in REFERENCE
        assert title in REFERENCE


def test_the_reference_tells_every_address_name_code_and_limit() -> None:
    names = {name for path in QUANTITIES for name in parameters(path.removeprefix("/v1/"))}
    printed = {name for name in names if not name.startswith(("unit.", "u_"))} | {"u_methods", "u_unpublished"}

    for path in DOCUMENT["paths"]:
        assert f"<code>{path}</code>" in REFERENCE
    for name in printed:
        assert f'id="name-{name}"' in REFERENCE
    for code in DOCUMENT["x-codes"]:
        assert f'id="code-{code}"' in REFERENCE
    for name, value in DOCUMENT["x-limits"].items():
        assert f"<code>{name}</code>" in REFERENCE
        assert f"{value:,}" in REFERENCE


def test_the_anchors_of_the_reference_are_there_and_are_one_each() -> None:
    anchors = re.findall(r'\sid="([^"]+)"', REFERENCE)
    wanted = set(re.findall(r'href="#([^"]+)"', REFERENCE))

    assert len(anchors) == len(set(anchors))
    assert wanted <= set(anchors)


def test_the_service_makes_nothing_of_the_page_until_it_is_asked_for_it(monkeypatch: pytest.MonkeyPatch) -> None:
    made: list[str] = []

    def make(*_: Any) -> dict[str, Any]:
        made.append("document")
        return DOCUMENT

    monkeypatch.setattr("service.page.site.document", make)
    client = create_app(Config()).test_client()
    client.get("/v1/schmidt-number?gas=co2&water_temperature=20&salinity=35")

    assert made == []
    assert client.get("/reference").status_code == 200
    assert made == ["document"]
