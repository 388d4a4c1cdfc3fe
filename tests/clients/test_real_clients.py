"""Real programs, typed the short way: the lines of the page of examples, and what else people type."""

import http.client
import re
import shutil
import subprocess
import sys
from collections.abc import Callable
from pathlib import Path

import pytest

from tests.clients.running import ENVIRONMENT, EXAMPLES, PATIENCE

pytestmark = pytest.mark.clients
STATIONS = EXAMPLES / "ingest" / "stations.csv"
NUMBER = (
    "gas=co2&water_temperature=18.4&salinity=35.1&wind_speed=7.7&water_fugacity=372.4&air_fugacity=409.1&form=number"
)
RESULT = "flux [mmol m-2 d-1]"
SECTION = re.compile(r"^### ([^\n]+)\n(.*?)(?=^##)", re.MULTILINE | re.DOTALL)
BLOCK = re.compile(r"^```(\w+)\n(.*?)\n```$", re.MULTILINE | re.DOTALL)
PROGRAMS = {"curl": "curl", "wget": "wget", "bash alone": "bash", "JavaScript": "node", "R": "Rscript"}
PROGRAMS |= {"Octave and MATLAB": "octave-cli"}

# How a line of the page is run so that what it gives can be read to the last digit.
AS_NUMBER: dict[str, Callable[[str], list[str]]] = {
    "sh": lambda line: ["bash", "-c", line],
    "python": lambda line: [sys.executable, "-c", f"import requests, urllib.request\nprint(repr({line}))"],
    "js": lambda line: ["node", "--input-type=module", "-e", f"console.log({line})"],
    "r": lambda line: ["Rscript", "--vanilla", "-e", f'cat(sprintf("%.17g", {line}))'],
    "octave": lambda line: ["octave-cli", "--quiet", "--no-init-file", "--eval", f"printf('%.17g', {line})"],
}
AS_FILE: dict[str, Callable[[str], list[str]]] = {
    "sh": lambda line: ["bash", "-c", line],
    "python": lambda line: [sys.executable, "-c", f"import requests, urllib.request\n{line}"],
    "js": lambda line: [
        "node",
        "--input-type=module",
        "-e",
        f'import {{ readFile, writeFile }} from "node:fs/promises"; {line}',
    ],
    "octave": lambda line: [
        "octave-cli",
        "--quiet",
        "--no-init-file",
        "--eval",
        f"{line} f = fopen('answered.csv', 'w'); fwrite(f, answered); fclose(f);",
    ],
}


def page() -> dict[str, list[tuple[str, str]]]:
    """Return the blocks of the page by client: language and line, the number first."""
    text = (EXAMPLES / "README.md").read_text()
    clients = text[text.index("## The clients") : text.index("## The invented cruise")] + "##"
    found = {title: BLOCK.findall(body) for title, body in SECTION.findall(clients)}
    return {title: blocks for title, blocks in found.items() if blocks and blocks[0][0] != "calc"}


PAGE = page()


def run(line: list[str], folder: Path) -> "subprocess.CompletedProcess[bytes]":
    return subprocess.run(
        line,
        capture_output=True,
        timeout=PATIENCE,
        check=False,
        cwd=folder,
        env=ENVIRONMENT | {"HOME": str(folder)},
    )


def needs(program: str | None) -> None:
    if program and shutil.which(program) is None:
        pytest.skip(f"{program} is not installed")


def at(line: str, service: str) -> str:
    port = service.rpartition(":")[2]
    return line.replace("127.0.0.1:8660", f"127.0.0.1:{port}").replace("127.0.0.1/8660", f"127.0.0.1/{port}")


def ask(service: str, method: str, path: str, body: bytes = b"") -> tuple[int, bytes]:
    """Return status and body as http.client of the standard library gets them, without a content type."""
    connection = http.client.HTTPConnection("127.0.0.1", int(service.rpartition(":")[2]), timeout=PATIENCE)
    try:
        connection.request(method, path, body or None)
        answer = connection.getresponse()
        return answer.status, answer.read()
    finally:
        connection.close()


@pytest.fixture(scope="module")
def number(service: str) -> float:
    status, body = ask(service, "GET", f"/v1/flux?{NUMBER}")
    assert status == 200, body
    return float(body)


@pytest.fixture(scope="module")
def answered(service: str) -> bytes:
    status, body = ask(service, "POST", "/v1/flux?gas=co2", STATIONS.read_bytes())
    assert status == 200, body
    return body


@pytest.fixture
def folder(tmp_path: Path) -> Path:
    """Return a folder with the examples in it, as the page has it."""
    (tmp_path / "examples").symlink_to(EXAMPLES)
    return tmp_path


def test_the_page_has_two_lines_for_each_client() -> None:
    assert len(PAGE) == 8
    assert {title: len(blocks) for title, blocks in PAGE.items()} == dict.fromkeys(PAGE, 2)


@pytest.mark.parametrize("client", PAGE)
def test_the_line_on_the_page_gets_the_same_number_to_the_last_digit(
    service: str, number: float, folder: Path, client: str
) -> None:
    needs(PROGRAMS.get(client))
    language, line = PAGE[client][0]
    done = run(AS_NUMBER[language](at(line, service)), folder)

    assert done.returncode == 0, done.stderr
    assert float(done.stdout) == number


@pytest.mark.parametrize("client", PAGE)
def test_the_line_on_the_page_sends_the_file_and_gets_the_same_table(
    service: str, answered: bytes, folder: Path, client: str
) -> None:
    needs(PROGRAMS.get(client))
    language, line = PAGE[client][1]
    if language == "r":
        needs("curl")
        show = f'{at(line, service)}\ncat(sprintf("%.17g\\n", answered[["{RESULT}"]]), sep = "")'
        done = run(["Rscript", "--vanilla", "-e", show], folder)
        place = answered.decode().splitlines()[0].split(",").index(RESULT)
        expected = [line.split(",")[place] for line in answered.decode().splitlines()[1:]]

        assert done.returncode == 0, done.stderr
        assert [float(value) if value != "NA" else "" for value in done.stdout.decode().split()] == [
            float(value) if value else "" for value in expected
        ]
        return
    done = run(AS_FILE[language](at(line, service)), folder)

    assert done.returncode == 0, done.stderr
    assert (folder / "answered.csv").read_bytes() == answered


U = "http://127.0.0.1:8660/v1/flux?gas=co2"
F = "examples/ingest/stations.csv"
OTHER_WAYS = {
    "curl -F as a file": f"curl -s -F file=@{F} '{U}'",
    "curl -F as a field": f"curl -s -F 'csv=<{F}' '{U}'",
    "curl --data-urlencode": f"curl -s --data-urlencode csv@{F} '{U}'",
    "curl -T in chunks": f"curl -s -X POST -T - '{U}' < {F}",
    "curl over HTTP/1.0": f"curl -s --http1.0 --data-binary @{F} '{U}'",
    "curl that waits for 100 Continue": f"curl -s -H 'Expect: 100-continue' --data-binary @{F} '{U}'",
    "curl with text/plain": f"curl -s -H 'Content-Type: text/plain' --data-binary @{F} '{U}'",
    "curl with no content type": f"curl -s -H 'Content-Type:' --data-binary @{F} '{U}'",
    "curl with a wrong content type": f"curl -s -H 'Content-Type: application/json' --data-binary @{F} '{U}'",
    "curl and a slash too many": f"curl -s --data-binary @{F} '{U.replace('?', '/?')}'",
    "curl with CRLF": f"sed 's/$/\\r/' {F} | curl -s --data-binary @- '{U}'",
    "wget with a header": f"wget -qO - --header='Content-Type: text/csv' --post-file={F} '{U}'",
    "requests files=": f'{sys.executable} -c \'import requests; print(end=requests.post("{U}", '
    f'files={{"file": open("{F}", "rb")}}).text)\'',
    "requests data= as text": f'{sys.executable} -c \'import requests; print(end=requests.post("{U}", '
    f'data=open("{F}").read()).text)\'',
    "node with a string": 'node --input-type=module -e \'import { readFileSync } from "node:fs"; process.stdout.write('
    f'await (await fetch("{U}", {{ method: "POST", body: readFileSync("{F}", "utf8") }})).text())\'',
    "node with a form": 'node --input-type=module -e \'import { readFileSync } from "node:fs"; '
    f'const f = new FormData(); f.append("file", new Blob([readFileSync("{F}")]), "s.csv"); process.stdout.write('
    f'await (await fetch("{U}", {{ method: "POST", body: f }})).text())\'',
}


@pytest.mark.parametrize("way", OTHER_WAYS)
def test_other_ways_of_sending_the_file_get_the_same_table(
    service: str, answered: bytes, folder: Path, way: str
) -> None:
    line = at(OTHER_WAYS[way], service)
    for program in ("curl", "wget", "node"):
        needs(program if re.search(rf"\b{program} ", line) else None)
    done = run(["bash", "-c", line], folder)

    assert done.returncode == 0, done.stderr
    assert done.stdout == answered


def test_curl_that_strips_line_ends_is_told_what_to_type(service: str, folder: Path) -> None:
    needs("curl")
    done = run(["bash", "-c", at(f"curl -s -w '\\n%{{http_code}}' -d @{F} '{U}'", service)], folder)
    text, _, status = done.stdout.decode().rpartition("\n")

    assert status.startswith("4")
    assert "--data-binary" in text


def test_a_head_has_the_headers_of_a_get_and_no_body(service: str, folder: Path) -> None:
    needs("curl")
    done = run(["bash", "-c", at(f"curl -sI 'http://127.0.0.1:8660/v1/flux?{NUMBER}'", service)], folder)
    head, _, body = done.stdout.partition(b"\r\n\r\n")

    assert head.split()[1] == b"200"
    assert b"text/plain" in head
    assert body == b""
