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


@pytest.mark.drills
def test_requests_generated_from_the_document_find_nothing(tmp_path: Path) -> None:
    """What schemathesis makes of the document, good and bad, is answered as the document says.

    Not asked: that whatever fits the schema is accepted. Of two inputs for one side only the service can tell.
    """
    settings = tmp_path / "schemathesis.toml"
    settings.write_text('[parameters]\nerrors = "problem"\n')  # the other turns every refusal into a 200
    port = free_port()
    command = [sys.executable, "-m", "service", "serve", "--bind", f"127.0.0.1:{port}"]
    with subprocess.Popen(command, cwd=ROOT, stderr=subprocess.DEVNULL) as server:
        try:
            wait_for(f"http://127.0.0.1:{port}/readyz", server)
            done = subprocess.run(
                [
                    *(Path(sys.executable).with_name("schemathesis"), "--config-file", settings, "run"),
                    *("--phases", "examples,coverage,fuzzing", "--mode", "all", "--generation-deterministic"),
                    *("--exclude-checks", "positive_data_acceptance", "--max-examples", "10", "--workers", "4"),
                    *(
                        "--suppress-health-check",
                        "all",
                        "--continue-on-failure",
                        f"http://127.0.0.1:{port}/openapi.json",
                    ),
                ],
                capture_output=True,
                text=True,
                timeout=900,
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
