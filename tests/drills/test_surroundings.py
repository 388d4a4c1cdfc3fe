"""Other clocks, languages, users and file systems: the service starts, and every byte of its answers is the same."""

import os
import shutil
import subprocess
import sys
from pathlib import Path

import pytest

from tests.drills.serving import BARE, ENVIRONMENT, SERVE, answers_of, served

pytestmark = pytest.mark.drills
NOBODY = "65534"
SURROUNDINGS: dict[str, dict[str, str]] = {
    "as it is": {},
    "another time zone": {"TZ": "Pacific/Apia"},
    "decimal commas": {"LC_ALL": "de_DE.UTF-8", "LANG": "de_DE.UTF-8"},
    "ASCII": {"LC_ALL": "C", "PYTHONUTF8": "0", "PYTHONCOERCECLOCALE": "0"},
    "hashes 0": {"PYTHONHASHSEED": "0"},
    "hashes 1": {"PYTHONHASHSEED": "1"},
    "no home": {"HOME": "/nonexistent", "TMPDIR": "/nonexistent"},
    "optimised": {"PYTHONOPTIMIZE": "2"},
}


@pytest.fixture(scope="module")
def expected(tmp_path_factory: pytest.TempPathFactory) -> dict[str, bytes]:
    with served(tmp_path_factory.mktemp("expected")) as one:
        return answers_of(one)


@pytest.mark.parametrize("variables", SURROUNDINGS.values(), ids=SURROUNDINGS)
def test_the_surroundings_change_no_byte(tmp_path: Path, expected: dict[str, bytes], variables: dict[str, str]) -> None:
    with served(tmp_path, environment={**ENVIRONMENT, **variables}) as one:
        assert answers_of(one) == expected
        assert one.stop() == 0


def test_without_an_environment_the_service_is_the_same(tmp_path: Path, expected: dict[str, bytes]) -> None:
    with served(tmp_path, environment=BARE) as one:
        assert answers_of(one) == expected


def test_a_strict_mask_of_files_changes_nothing(tmp_path: Path, expected: dict[str, bytes]) -> None:
    with served(tmp_path, command=["sh", "-c", 'umask 077; exec "$@"', "sh", *SERVE]) as one:
        assert answers_of(one) == expected
        assert one.ask("/metrics")[0] == 200


as_root = pytest.mark.skipif(os.geteuid() != 0, reason="only root can become somebody else")


def can(*command: str) -> bool:
    if shutil.which(command[0]) is None:
        return False
    return subprocess.run(command, capture_output=True, check=False).returncode == 0


@as_root
def test_a_user_who_owns_nothing_can_run_it(tmp_path: Path, expected: dict[str, bytes]) -> None:
    """The interpreter must be readable for that user, which it is not where it lives in root's home."""
    become = (
        "setpriv",
        f"--reuid={NOBODY}",
        f"--regid={NOBODY}",
        "--clear-groups",
        "--no-new-privs",
        "--bounding-set=-all",
    )
    if not can(*become, sys.executable, "-c", "import service.serve"):
        pytest.skip("nobody cannot read the interpreter here")
    with served(tmp_path, command=[*become, *SERVE]) as one:
        assert answers_of(one) == expected
        assert one.ask("/metrics")[0] == 200
        assert one.stop() == 0


READ_ONLY = 'mount -o remount,bind,ro / && { ! touch /tmp/x-$$ 2>/dev/null; } && exec "$@"'


@as_root
def test_on_a_file_system_that_cannot_be_written_nothing_changes(tmp_path: Path, expected: dict[str, bytes]) -> None:
    """Of all places only the shared memory can be written, as in a container with a read-only root."""
    inside = ("unshare", "--mount", "--propagation", "private", "sh", "-c")
    prepare = f"mount --bind / / && cd {os.getcwd()} && mount -t tmpfs none /dev/shm && {READ_ONLY}"
    if not can(*inside, prepare, "sh", "true"):
        pytest.skip("no file system of its own can be had here")
    with served(tmp_path, command=[*inside, prepare, "sh", *SERVE]) as one:
        assert answers_of(one) == expected
        assert one.ask("/metrics")[0] == 200


def test_where_nothing_can_be_counted_the_rest_is_served(tmp_path: Path, expected: dict[str, bytes]) -> None:
    with served(tmp_path, {"METRICS": "off", "LOG": "none"}) as one:
        status, _, told = one.ask("/metrics")

        assert answers_of(one) == expected
        assert (status, b"CATSPAW_METRICS" in told) == (404, True)
        assert one.lines == []


def test_output_that_nobody_reads_stops_no_request(tmp_path: Path, expected: dict[str, bytes]) -> None:
    with served(tmp_path, command=["sh", "-c", 'exec "$@" >&-', "sh", *SERVE]) as one:
        assert answers_of(one) == expected


def test_a_token_guards_the_service_and_is_never_written(tmp_path: Path) -> None:
    with served(tmp_path, {"TOKEN": "s3cret-word"}) as one:
        unknown = one.ask("/v1/gases")
        metrics = one.ask("/metrics")
        known = one.ask("/v1/gases", headers={"Authorization": "Bearer s3cret-word"})
        for path in ("/v1/gases?s3cret=s3cret-word", "/v1/s3cret"):
            one.ask(path, headers={"Authorization": "Bearer s3cret-word"})
        lines, said = one.lines, one.said

    assert [unknown[0], metrics[0], known[0]] == [401, 401, 200]
    assert "s3cret-word" not in str(lines) + said
    assert "CATSPAW_TOKEN=(hidden)" in said
