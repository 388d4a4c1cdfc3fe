"""Make up a gridded archive, the same bytes each time: python make_archive.py FOLDER [--steps 24 --size 90 180].

Everything in it is invented: smooth fields with some weather, and three continents that never were. It is written step
by step, so that it may be larger than memory: 400 steps of 720 by 1440 are 20 GB.
"""

import argparse
from pathlib import Path

import numpy as np
from grid import INPUTS, Grid, created


def fields(step: int, size: tuple[int, int]) -> dict[str, Grid]:
    """Return every input at one step of time, NaN over land."""
    latitude = np.deg2rad(np.linspace(-89.5, 89.5, size[0]))[:, np.newaxis]
    longitude = np.deg2rad(np.linspace(0.0, 360.0, size[1], endpoint=False))[np.newaxis, :]
    season = np.cos(2.0 * np.pi * step / 24.0)
    weather = np.random.default_rng([8660, step]).standard_normal(size)
    made = {
        "water_temperature": 28.0 * np.cos(latitude) ** 2 - 1.0 + 2.0 * season * np.sin(latitude) + 0.2 * weather,
        "salinity": 35.0 + np.cos(4.0 * latitude) + 0.3 * np.sin(longitude) + 0.05 * weather,
        "wind_speed": 7.0 + 3.0 * np.sin(2.0 * latitude) ** 2 + 1.5 * np.abs(weather),
        "air_pressure": 1013.0 - 10.0 * np.sin(latitude) ** 2 + 2.0 * weather,
        "water_partial_pressure": 370.0 + 30.0 * np.cos(3.0 * latitude + longitude) + 5.0 * season + 2.0 * weather,
        "air_mole_fraction": 415.0 + 3.0 * season * np.sin(latitude) + 0.1 * weather,
    }
    is_land = np.sin(3.0 * longitude) * np.cos(latitude) + 0.3 * np.sin(5.0 * latitude) > 0.75
    return {name: np.where(is_land, np.nan, np.broadcast_to(field, size).round(3)) for name, field in made.items()}


def make(folder: Path, steps: int, size: tuple[int, int]) -> None:
    """Write the archive."""
    files = {name: created(folder, name, (steps, *size)) for name in INPUTS}
    for step in range(steps):
        for name, field in fields(step, size).items():
            files[name][step] = field


def main() -> None:
    """Read the command line and write."""
    parser = argparse.ArgumentParser(description=__doc__.splitlines()[0])
    parser.add_argument("folder", type=Path)
    parser.add_argument("--steps", type=int, default=24)
    parser.add_argument("--size", type=int, nargs=2, default=(90, 180), metavar=("LATITUDES", "LONGITUDES"))
    asked = parser.parse_args()
    make(asked.folder, asked.steps, tuple(asked.size))


if __name__ == "__main__":
    main()
