"""Fluxes over an archive from several services: python flux_with_replicas.py FOLDER RESULTS --url URL [--url URL ...].

Each answers every request alike and keeps nothing, so that a piece may go to any of them, and to another one where one
is busy or gone. With a front before them one --url is enough. Python's own library is all that it needs, and numpy.
"""

import argparse
import json
import os
import sys
import time
import urllib.error
import urllib.request
from collections.abc import Iterator
from concurrent.futures import FIRST_COMPLETED, Future, ThreadPoolExecutor, wait
from itertools import cycle
from pathlib import Path

import numpy as np
from grid import INPUTS, MISSING, QUESTION, RESULTS, Grid, Piece, created, opened, pieces

TRIES = 10
AT_MOST = 100_000  # samples of a request in JSON


def ask(address: str, content: bytes) -> dict[str, list[float | None]]:
    """Return flux and flags of some samples from one service."""
    headers = {"Content-Type": "application/json"}
    if token := os.environ.get("CATSPAW_TOKEN"):
        headers["Authorization"] = f"Bearer {token}"
    request = urllib.request.Request(f"{address}/v1/flux", content, headers)
    with urllib.request.urlopen(request, timeout=120) as answer:
        told = json.load(answer)
    return {"flux": told["results"]["flux"]["values"], "quality_flag": told["quality"]["flags"]}


def ask_one_of(addresses: Iterator[str], content: bytes) -> dict[str, list[float | None]]:
    """Return the answer of the first service that gives one; a refusal is nobody's to repeat."""
    for attempt in range(TRIES):
        try:
            return ask(next(addresses), content)
        except urllib.error.HTTPError as refused:
            if refused.code != 503:
                raise SystemExit(f"refused: {refused.read().decode()[:500]}") from refused
            pause = float(refused.headers.get("Retry-After", "1"))
        except (OSError, json.JSONDecodeError):
            pause = 0.1 * 2**attempt
        time.sleep(min(pause, 10.0))
    raise SystemExit(f"no service answered after {TRIES} tries")


def answered(inputs: dict[str, Grid], addresses: Iterator[str]) -> dict[str, Grid]:
    """Return the results for a piece; only what is at sea is sent."""
    at_sea = np.isfinite(sum(inputs.values()))
    results = {"flux": np.full(at_sea.shape, np.nan), "quality_flag": np.full(at_sea.shape, float(MISSING))}
    places = np.flatnonzero(at_sea)
    for start in range(0, places.size, AT_MOST):
        some = places[start : start + AT_MOST]
        values = {name: field.flat[some].tolist() for name, field in inputs.items()}
        told = ask_one_of(addresses, json.dumps({**QUESTION, **values}).encode())
        for name in RESULTS:
            results[name].flat[some] = np.array(told[name], dtype=np.float64)  # None becomes NaN
    return results


def compute(folder: Path, into: Path, urls: list[str], each: int) -> None:
    """Write the results of every piece; no more pieces are in memory than are under way."""
    files = {name: opened(folder, name) for name in INPUTS}
    shape = files[INPUTS[0]].shape
    targets = {name: created(into, name, shape) for name in RESULTS}
    turns = cycle(urls)
    parts, done = pieces(shape[0], each), 0

    def work(part: Piece) -> None:
        inputs = {name: np.array(file[part.start : part.stop]) for name, file in files.items()}
        for name, grid in answered(inputs, turns).items():
            targets[name][part.start : part.stop] = grid

    under_way: set[Future[None]] = set()
    with ThreadPoolExecutor(2 * len(urls)) as pool:
        for part in [*parts, *[None] * (2 * len(urls))]:
            if part is not None:
                under_way.add(pool.submit(work, part))
            if under_way and (part is None or len(under_way) >= 2 * len(urls)):
                finished, under_way = wait(under_way, return_when=FIRST_COMPLETED)
                for one in finished:
                    one.result()
                done += len(finished)
                sys.stderr.write(f"\r{done} of {len(parts)} pieces")
    sys.stderr.write("\n")


def main() -> None:
    """Read the command line and compute."""
    parser = argparse.ArgumentParser(description=__doc__.splitlines()[0])
    parser.add_argument("folder", type=Path)
    parser.add_argument("results", type=Path)
    parser.add_argument("--url", action="append", help="of a service; may be repeated")
    parser.add_argument("--piece", type=int, default=1, help="steps of time in a piece")
    asked = parser.parse_args()
    compute(asked.folder, asked.results, asked.url or ["http://127.0.0.1:8660"], asked.piece)


if __name__ == "__main__":
    main()
