"""What is shipped to deploy with: the image's steps in a clean tree, the units, the front, the manifests, the pins."""

import json
import re
import shlex
import shutil
import subprocess
import sys
import tomllib
from collections.abc import Iterator
from pathlib import Path
from typing import Any

import pytest
import yaml
from packaging.requirements import Requirement

from service.config import VARIABLES, Config
from tests.drills.serving import BARE, ROOT, answers_of, served

pytestmark = pytest.mark.drills
DEPLOY = ROOT / "examples" / "deploy"
LOCK = ROOT / ".requirements.lock"
DOCKERFILE = (ROOT / "Dockerfile").read_text()
PYTHON = shlex.quote(sys.executable)


def instructions(stage: int) -> list[tuple[str, str]]:
    """Return the instructions of a stage of the Dockerfile, each a word and the rest."""
    lines = re.sub(r"\\\n", " ", DOCKERFILE).splitlines()
    parted = [line.split(" ", 1) for line in lines if line.strip() and not line.startswith("#")]
    starts = [at for at, line in enumerate(parted) if line[0] == "FROM"] + [len(parted)]
    return [(line[0], line[1]) for line in parted[starts[stage] : starts[stage + 1]]]


def words(text: str) -> list[str]:
    """Return an instruction in its JSON form as words."""
    found: list[str] = json.loads(text[text.index("[") :])
    return found


@pytest.fixture(scope="module")
def image(tmp_path_factory: pytest.TempPathFactory) -> Path:
    """Run the steps that build the image, every path under a folder of its own; return that folder."""
    top = tmp_path_factory.mktemp("image")
    clean, build = top / "context", top / "build"
    listed = subprocess.run(
        ["git", "ls-files", "-co", "--exclude-standard"], cwd=ROOT, capture_output=True, text=True, check=True
    )
    for name in listed.stdout.splitlines():
        if (ROOT / name).is_file() and not name.startswith(("tests/", "examples/")):
            (clean / name).parent.mkdir(parents=True, exist_ok=True)
            shutil.copyfile(ROOT / name, clean / name)
    build.mkdir()
    for word, rest in instructions(0):
        if word == "COPY":
            *sources, target = rest.split()
            for source in sources:
                into = build / (target if target != "./" else source)
                if (clean / source).is_dir():
                    shutil.copytree(clean / source, into)
                else:
                    shutil.copyfile(clean / source, into)
        elif word == "RUN":
            command = rest.replace("/opt/catspaw", str(top / "opt/catspaw"))
            command = re.sub(r"^pip\b", "python -m pip", command)
            command = re.sub(r"^python\b", PYTHON, command)
            done = subprocess.run(["sh", "-ec", command], cwd=build, capture_output=True, text=True, check=False)
            assert done.returncode == 0, f"{command}\n{done.stdout[-2000:]}{done.stderr[-2000:]}"
    return top


def test_the_image_serves_what_the_tree_serves(image: Path, tmp_path: Path) -> None:
    with served(tmp_path) as here:
        expected = answers_of(here)
    told = dict(instructions(1))
    command = words(told["CMD"])
    command[0] = str(image / "opt/catspaw/bin" / command[0])
    there = image / "run"
    there.mkdir()
    with served(there, command=command, environment=BARE) as one:
        assert answers_of(one) == expected
        check = [sys.executable, *words(told["HEALTHCHECK"])[1:]]
        check = [each.replace(":8660/", f":{one.port}/") for each in check]
        assert subprocess.run(check, check=False).returncode == 0
        assert one.stop() == 0
        assert subprocess.run(check, check=False, capture_output=True).returncode != 0


def test_the_image_holds_what_is_pinned_and_nothing_else(image: Path) -> None:
    (packages,) = (image / "opt/catspaw/lib").glob("python*/site-packages")
    installed = {path.name.partition("-")[0].replace("_", "-").lower() for path in packages.glob("*.dist-info")}

    assert installed == {*pinned(), "catspaw"}


def test_the_image_runs_as_nobody() -> None:
    told = dict(instructions(1))

    assert told["USER"] == "65534:65534"
    assert "RUN" not in told
    assert "--require-hashes" in DOCKERFILE


def pinned() -> dict[str, str]:
    """Return the pinned packages and their versions."""
    return dict(re.findall(r"^([A-Za-z0-9-]+)==(\S+)", LOCK.read_text(), re.MULTILINE))


def test_every_pin_has_sums_and_is_within_what_the_project_asks_for() -> None:
    project = tomllib.loads((ROOT / "pyproject.toml").read_text())["project"]
    blocks = re.split(r"\n(?=[A-Za-z])", LOCK.read_text())[1:]

    for block in blocks:
        assert re.search(r"--hash=sha256:[0-9a-f]{64}", block), block[:60]
    for text in project["dependencies"]:
        wanted = Requirement(text)
        assert wanted.specifier.contains(pinned()[wanted.name.lower()]), text


needs = {
    name: pytest.mark.skipif(shutil.which(name) is None, reason=f"{name} is not installed")
    for name in ("nginx", "systemd-analyze")
}


@needs["systemd-analyze"]
def test_the_units_are_valid_and_give_little_away(tmp_path: Path) -> None:
    for path in (DEPLOY / "systemd").iterdir():
        text = path.read_text().replace("/opt/catspaw/.venv/bin/catspaw", sys.executable)
        (tmp_path / path.name).write_text(text)
    units = [str(path) for path in tmp_path.iterdir()]
    verified = subprocess.run(["systemd-analyze", "verify", *units], capture_output=True, text=True, check=False)
    judged = subprocess.run(
        ["systemd-analyze", "security", "--offline=yes", "--threshold=15", str(tmp_path / "catspaw.service")],
        capture_output=True,
        text=True,
        check=False,
    )

    assert (verified.returncode, verified.stderr) == (0, "")
    assert judged.returncode == 0, judged.stdout[-500:]  # exposure of at most 1.5 of 10


@needs["nginx"]
@pytest.mark.parametrize("upstream", ["upstream.conf", "upstream.compose.conf"])
def test_the_front_is_valid(tmp_path: Path, upstream: str) -> None:
    nginx = DEPLOY / "nginx"
    hosts = (nginx / upstream).read_text().replace("server catspaw:", "server 127.0.0.1:")
    (tmp_path / "upstream.conf").write_text(hosts)
    (tmp_path / "nginx.conf").write_text(
        f"pid {tmp_path}/pid;\nevents {{}}\nhttp {{ include {tmp_path}/upstream.conf; include {nginx}/front.conf; }}\n"
    )
    command = ["nginx", "-t", "-q", "-c", f"{tmp_path}/nginx.conf", "-e", f"{tmp_path}/error"]
    done = subprocess.run(command, capture_output=True, text=True, check=False)

    assert done.returncode == 0, done.stderr


def documents(path: Path) -> Iterator[dict[str, Any]]:
    yield from yaml.safe_load_all(path.read_text())


def test_the_settings_in_the_manifests_are_settings() -> None:
    texts = [path.read_text() for path in DEPLOY.rglob("*") if path.suffix in {".yaml", ".service"}]
    named = {name for text in [*texts, DOCKERFILE] for name in re.findall(r"CATSPAW_[A-Z_]+", text)}

    assert named
    assert named <= set(VARIABLES)


def test_the_manifests_are_valid() -> None:
    kubernetes_validate = pytest.importorskip("kubernetes_validate")  # its schemas are too large to install everywhere
    version = kubernetes_validate.latest_version()
    for each in documents(DEPLOY / "kubernetes" / "catspaw.yaml"):
        kubernetes_validate.validate(each, version, strict=True)


def test_the_cluster_gets_two_replicas_probed_scaled_and_bare() -> None:
    found = {each["kind"]: each for each in documents(DEPLOY / "kubernetes" / "catspaw.yaml")}
    deployment, scaler = found["Deployment"]["spec"], found["HorizontalPodAutoscaler"]["spec"]
    pod = deployment["template"]["spec"]
    (container,) = pod["containers"]
    labels = deployment["template"]["metadata"]["labels"]
    drain = next(int(each["value"]) for each in container["env"] if each["name"] == "CATSPAW_DRAIN_SECONDS")

    assert set(found) == {"Deployment", "Service", "HorizontalPodAutoscaler", "PodDisruptionBudget"}
    assert deployment["replicas"] == scaler["minReplicas"] == 2
    assert scaler["scaleTargetRef"]["name"] == found["Deployment"]["metadata"]["name"]
    for selector in (
        deployment["selector"]["matchLabels"],
        found["Service"]["spec"]["selector"],
        found["PodDisruptionBudget"]["spec"]["selector"]["matchLabels"],
    ):
        assert selector == labels
    for probe in ("startupProbe", "readinessProbe", "livenessProbe"):
        assert container[probe]["httpGet"]["port"] == container["ports"][0]["name"]
    assert container["securityContext"]["readOnlyRootFilesystem"]
    assert pod["securityContext"]["runAsNonRoot"]
    assert pod["terminationGracePeriodSeconds"] > drain + Config().graceful_seconds


def test_compose_gets_two_replicas_behind_the_front() -> None:
    (told,) = documents(DEPLOY / "compose.yaml")
    service, front = told["services"]["catspaw"], told["services"]["front"]

    assert (DEPLOY / service["build"]["context"]).resolve() == ROOT
    assert service["deploy"]["replicas"] == 2
    assert service["read_only"]
    assert service["cap_drop"] == ["ALL"]
    assert all(each.startswith("127.0.0.1:") for each in front["ports"])
    assert "ports" not in service
    for volume in front["volumes"]:
        assert (DEPLOY / volume.partition(":")[0]).is_file()
