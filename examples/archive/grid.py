"""An invented gridded archive: what stands in it, how it is cut into pieces, and how a piece is opened."""

from dataclasses import dataclass
from pathlib import Path

import numpy as np
from numpy.typing import NDArray

Grid = NDArray[np.float64]
# The inputs of a flux that the archive has, each a file of (time, latitude, longitude). The service knows them by name.
INPUTS = ("water_temperature", "salinity", "wind_speed", "air_pressure", "water_partial_pressure", "air_mole_fraction")
QUESTION = {"gas": "co2", "parameterisation": "wanninkhof-2014", "pick": "flux"}
RESULTS = ("flux", "quality_flag")  # of the first the unit is mmol m-2 d-1
MISSING = 9  # the quality flag of what is missing, such as land


@dataclass(frozen=True)
class Piece:
    """Some steps of time, all latitudes and longitudes."""

    start: int
    stop: int


def pieces(steps: int, each: int) -> list[Piece]:
    """Return the pieces of an archive, in order."""
    return [Piece(start, min(start + each, steps)) for start in range(0, steps, each)]


def opened(folder: Path, name: str) -> Grid:
    """Open a file of the archive without reading it."""
    grid: Grid = np.load(folder / f"{name}.npy", mmap_mode="r")
    return grid


def created(folder: Path, name: str, shape: tuple[int, ...]) -> Grid:
    """Create a file of results that can be written piece by piece."""
    folder.mkdir(parents=True, exist_ok=True)
    grid: Grid = np.lib.format.open_memmap(folder / f"{name}.npy", "w+", np.float64, shape)
    return grid
