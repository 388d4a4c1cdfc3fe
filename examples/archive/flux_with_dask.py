"""Fluxes over an archive larger than memory, on this machine: python flux_with_dask.py FOLDER RESULTS [--piece 4].

Dask reads a piece of every input, the physics of the service answers for it, and the piece is written before more are
read: at no time are there more pieces in memory than threads. Catspaw must be installed beside it; no service runs.
"""

import argparse
from pathlib import Path
from typing import Any

import dask.array as da
import numpy as np
from dask.diagnostics.progress import ProgressBar
from grid import INPUTS, MISSING, QUESTION, RESULTS, Grid, created, opened

from service.physics.answer import answer
from service.physics.declare import GASES, QUANTITIES
from service.physics.question import ask

ASKED = ask(
    QUANTITIES["flux"],
    GASES[QUESTION["gas"]],
    water=None,
    given=frozenset(INPUTS),
    chosen=(),
    parameterisations=(QUESTION["parameterisation"],),
    pick=(QUESTION["pick"],),
    units=(),
    mass_as="gas",
)


def piece_of(folder: Path, name: str, block_info: dict[None, Any]) -> Grid:
    """Read a piece of an input."""
    start, stop = block_info[None]["array-location"][0]
    return np.array(opened(folder, name)[start:stop])


def answered(*inputs: Grid) -> Grid:
    """Return the results for a piece, one behind another on a new first axis; land costs nothing."""
    known = dict(zip(INPUTS, inputs, strict=True))
    at_sea = np.isfinite(sum(inputs))
    results = np.full((len(RESULTS), *at_sea.shape), np.nan)
    results[1] = MISSING
    if samples := int(at_sea.sum()):
        outcome = answer(ASKED, {name: field[at_sea] for name, field in known.items()}, samples).outcome
        results[0, at_sea] = outcome.results["flux"]
        results[1, at_sea] = outcome.verdict.flags
    return results


def compute(folder: Path, into: Path, piece: int) -> None:
    """Write the results of every piece."""
    shape = opened(folder, INPUTS[0]).shape
    chunks = da.core.normalize_chunks((piece, *shape[1:]), shape)
    made = {"dtype": np.float64, "meta": np.empty(0)}
    # Dask would copy an array that it is given, however large: it is given a way to read each piece.
    inputs = [da.map_blocks(piece_of, folder, name, chunks=chunks, **made) for name in INPUTS]
    results = da.map_blocks(answered, *inputs, new_axis=0, chunks=((len(RESULTS),), *chunks), **made)
    targets = [created(into, name, shape) for name in RESULTS]
    with ProgressBar():
        da.store([results[place] for place in range(len(RESULTS))], targets, lock=False)


def main() -> None:
    """Read the command line and compute."""
    parser = argparse.ArgumentParser(description=__doc__.splitlines()[0])
    parser.add_argument("folder", type=Path)
    parser.add_argument("results", type=Path)
    parser.add_argument("--piece", type=int, default=4, help="steps of time in a piece")
    asked = parser.parse_args()
    compute(asked.folder, asked.results, asked.piece)


if __name__ == "__main__":
    main()
