"""Requests made up from the API document, good ones and bad ones, against a running service."""

import socket
import subprocess
import sys
from pathlib import Path
from urllib.request import urlopen

import pytest

ROOT = Path(__file__).parents[2]
HOOKS = Path(__file__).with_name("made_up_requests.py")


def free_port() -> int:
    with socket.socket() as one:
        one.bind(("127.0.0.1", 0))
        port: int = one.getsockname()[1]
        return port


# Every edge of every parameter takes minutes where there are a hundred; elsewhere random ones, everywhere.
PASSES = {
    "every edge": ["--phases", "coverage", "--exclude-path-regex", "flux|equilibration|transfer|solubility|memory"],
    "at random": ["--phases", "examples,fuzzing", "--max-examples", "40"],
}


@pytest.mark.drills
@pytest.mark.parametrize("options", PASSES.values(), ids=PASSES)
def test_requests_generated_from_the_document_find_nothing(tmp_path: Path, options: list[str]) -> None:
    """What schemathesis makes of the document, good and bad, is answered as the document says.

    Not asked: that whatever fits the schema is accepted. Of two inputs for one side only the service can tell.
    """
    settings = tmp_path / "schemathesis.toml"
    settings.write_text('[parameters]\nerrors = "problem"\n')  # the other turns every refusal into a 200
    address = f"http://127.0.0.1:{free_port()}"
    serve = [sys.executable, "-m", "service", "serve", "--bind", address.removeprefix("http://")]
    run: list[str | Path] = [
        Path(sys.executable).with_name("schemathesis"),
        "--config-file",
        settings,
        "run",
        f"{address}/openapi.json",
    ]
    run += ["--mode", "all", "--exclude-checks", "positive_data_acceptance", "--generation-deterministic"]
    run += ["--continue-on-failure", "--suppress-health-check", "all", "--workers", "1"]
    with subprocess.Popen(serve, cwd=ROOT, stderr=subprocess.DEVNULL) as server:
        try:
            wait_for(f"{address}/readyz", server)
            done = subprocess.run(
                [*run, *options],
                capture_output=True,
                text=True,
                timeout=600,
                check=False,
                env={"SCHEMATHESIS_HOOKS": str(HOOKS), "PATH": "", "HOME": str(tmp_path)},
                cwd=tmp_path,
            )
        finally:
            server.terminate()

    assert done.returncode == 0, done.stdout[-5000:]
    assert " passed" in done.stdout


def wait_for(address: str, server: "subprocess.Popen[bytes]") -> None:
    """Poll until a server answers, or fail when it has ended."""
    while server.poll() is None:
        try:
            urlopen(address, timeout=5).close()
        except OSError:
            continue
        return
    pytest.fail("the server ended before it answered")
