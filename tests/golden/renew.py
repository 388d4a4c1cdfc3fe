"""Write the answers of this version to a set of requests: ``python tests/golden/renew.py``.

A request that is in the newest file stays in it; for a quantity, gas or method without one, one is added. The answers
to what was there before may differ only where the changelog's **Numbers** says so.
"""

import json
import re
import sys
from collections.abc import Iterator
from pathlib import Path
from typing import Any
from urllib.parse import urlencode

from flask.testing import FlaskClient

FOLDER = Path(__file__).parent
ROOT = FOLDER.parents[1]
if str(ROOT) not in sys.path:
    sys.path.insert(0, str(ROOT))

from schemas.examples import quantity_examples  # noqa: E402  the root is known only now
from service.app import create_app  # noqa: E402
from service.config import Config, service_version  # noqa: E402
from service.physics import check  # noqa: E402
from service.physics.declare import QUANTITIES  # noqa: E402
from service.physics.methods import transfer_methods  # noqa: E402
from tests.properties.questions import transfer_pairs, typical_values  # noqa: E402

EXAMPLES = ("get", "get-several", "get-methods", "json-several", "csv")
NOT_COMPARED = {"service", "reasons", "source", "doi", "standard_name"}  # words, and what the numbers do not hang on
METHOD = re.compile(r"(?:^|&)(\w+)=([a-z][\w-]*-\d{4}[\w-]*)")


def file_of(version: str) -> Path:
    """Return the file of a version."""
    return FOLDER / f"{version}.jsonl"


def newest() -> Path | None:
    """Return the file of the newest version."""
    found = sorted(FOLDER.glob("*.jsonl"), key=lambda path: [int(one) for one in re.findall(r"\d+", path.stem)])
    return found[-1] if found else None


def read(path: Path) -> list[dict[str, Any]]:
    """Return the requests and answers of a file."""
    return [json.loads(line) for line in path.read_text().splitlines()]


def requests() -> Iterator[tuple[str, str | None]]:
    """Yield address and body of a request for each quantity and form, each gas, each published method."""
    for quantity in QUANTITIES.values():
        for example in quantity_examples(quantity):
            if example["name"] in EXAMPLES:
                body = example.get("body")
                yield str(example["url"]), body if isinstance(body, str) or body is None else json.dumps(body)
    seen = set()
    for one in check.checks():
        key = (one.quantity, one.gas, one.methods)
        if one.quantity != check.STEP and key not in seen:
            seen.add(key)
            query = urlencode([*one.inputs.items(), ("pick", one.result), ("unit", one.unit)])
            yield f"/v1/{one.quantity}?{query}", None
    for method, gas in transfer_pairs():
        asked = typical_values("transfer-velocity", gas, method)
        water = next(iter(transfer_methods()[method].water), "ocean")
        query = urlencode({"gas": gas, "water": water, "parameterisation": method, **asked})
        yield f"/v1/transfer-velocity?{query}", None


def covers(address: str) -> tuple[str, ...]:
    """Return quantity, gas and methods of a request."""
    path, _, query = address.partition("?")
    gas = re.search(r"(?:^|&)gas=(\w+)", query)
    return (path, gas[1] if gas else "", *sorted(f"{name}={method}" for name, method in METHOD.findall(query)))


def told(client: FlaskClient, address: str, body: str | None) -> Any:
    """Return what is compared of an answer: numbers, units, flags, names of methods, assumptions."""
    answer = client.get(address) if body is None else client.post(address, data=body.encode())
    assert answer.status_code == 200, (address, answer.text)
    if answer.mimetype == "application/json":
        return _compared(answer.get_json())
    lines = [line.split(",") for line in answer.text.splitlines()]
    return [line[: lines[0].index("quality_reason")] for line in lines] if "quality_reason" in lines[0] else lines


def _compared(value: Any) -> Any:
    if isinstance(value, dict):
        return {name: _compared(each) for name, each in value.items() if name not in NOT_COMPARED}
    return [_compared(each) for each in value] if isinstance(value, list) else value


def main() -> None:
    """Write the file."""
    client = create_app(Config()).test_client()
    before = newest()
    kept = [(each["address"], each["body"]) for each in read(before)] if before else []
    known = {(covers(address), body is None) for address, body in kept}
    for address, body in requests():
        if not before or (covers(address), body is None) not in known:
            kept.append((address, body))
    lines = [{"address": address, "body": body, "answer": told(client, address, body)} for address, body in kept]
    text = "".join(json.dumps(line, separators=(",", ":")) + "\n" for line in lines)
    file_of(service_version()).write_text(text)
    sys.stdout.write(f"{len(lines)} requests in {file_of(service_version()).name}\n")


if __name__ == "__main__":
    main()
