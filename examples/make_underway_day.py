"""Writes a day of raw ship data: no such ship sailed, every number below is made up.

``python examples/make_underway_day.py [FILE]`` writes the same bytes each time (default: underway_day.csv beside it).
"""

import sys
from pathlib import Path

import numpy as np
from numpy.typing import NDArray

Array = NDArray[np.float64]

PLATFORM = "RV Unbuilt (invented)"
ROWS, SECONDS = 720, 120  # a row every two minutes
SEED = 20240420
START = np.datetime64("2024-04-20T00:00:00")
BRIDGE = 18.0  # m, height of the barometer
KNOT = 0.514444  # m s-1
HEADER = (
    "platform",
    "time",
    "latitude",
    "longitude",
    "heading",  # gyro compass, degrees true
    "COG",  # degrees true, over ground
    "SOG [kn]",
    "wind_rel_speed",  # m s-1, felt at 23 m
    "wind_rel_dir",  # degrees from the bow, clockwise, whence it comes
    "baro_hPa",  # on the bridge, at 18 m
    "SST_intake",  # at 5 m
    "SST_float",  # a thermistor that floats beside the ship, just below the skin
    "salinity",
    "T_equ",  # in the equilibrator
    "P_equ",  # hPa, in the equilibrator
    "xCO2_equ",  # dry
    "xCO2_air",  # dry
)


def noise(stream: int, window: int) -> Array:
    """Return smooth noise of zero mean and unit spread that remembers about `window` rows."""
    raw: NDArray[np.uint64] = np.random.PCG64([SEED, stream]).random_raw(ROWS + window - 1)
    kernel = np.hanning(window + 2)[1:-1]
    smooth: Array = np.convolve(raw / 2.0**64 - 0.5, kernel, mode="valid") / np.sqrt(np.sum(kernel**2) / 12.0)
    return smooth


def texts(values: Array, decimals: int) -> list[str]:
    """Return numbers as the logger prints them."""
    return [f"{value:.{decimals}f}" for value in (values + 0.0).tolist()]


def day() -> str:
    """Return the whole table."""
    hour = np.arange(ROWS) * SECONDS / 3600.0
    times = START + (np.arange(ROWS) * SECONDS).astype("timedelta64[s]")

    # Out to a station, five hours there with the bow in the wind, and back in a wide bend.
    station = 0.5 * (np.tanh((hour - 9.0) / 0.15) - np.tanh((hour - 14.0) / 0.15))
    leg = 68.0 + 172.0 * 0.5 * (1.0 + np.tanh((hour - 14.2) / 0.3)) + 1.5 * noise(1, 9)
    lull = np.exp(-(((hour - 14.5) / 2.2) ** 2))
    wind = np.maximum(9.0 + 1.6 * noise(2, 90) - 6.2 * lull + 0.5 * noise(3, 3), 0.4)  # at 23 m, over ground
    whence = 285.0 + 22.0 * np.sin(hour / 24.0 * 2.0 * np.pi) + 9.0 * noise(4, 60) + 3.0 * noise(5, 3)
    heading = leg + (whence - 360.0 - leg) * station + 1.0 * noise(6, 3)
    course = np.where(station > 0.5, whence - 180.0, leg + 3.0 + 1.5 * noise(7, 5))  # on station it drifts
    speed = 5.6 * (1.0 - station) + 0.25 * station + 0.1 * noise(8, 5) * (1.0 - station)  # m s-1

    # Whence wind and headway come, as arrows; their sum is whence the felt wind comes.
    felt = wind * np.exp(1j * np.radians(whence)) + speed * np.exp(1j * np.radians(course))
    from_bow = np.degrees(np.angle(felt)) - heading
    intake = 17.9 + 0.35 * noise(9, 200) + 0.02 * noise(10, 3)
    warm_layer = 1.3 * np.exp(-(((hour - 15.0) / 2.4) ** 2)) * np.exp(-wind / 3.5)
    surface = 1014.6 - 3.1 * np.sin(hour / 24.0 * np.pi) + 0.3 * noise(11, 120)
    warmed = 0.42 + 0.10 * noise(12, 60)
    in_water = 352.0 + 11.0 * noise(13, 150) + 0.6 * noise(14, 3)  # dry, at the temperature of the intake

    columns = {
        "latitude": texts(-42.1 + 0.005 * np.cumsum(speed * np.cos(np.radians(course))) / 4.6, 4),
        "longitude": texts(-25.8 + 0.005 * np.cumsum(speed * np.sin(np.radians(course))) / 3.4, 4),
        "heading": texts(heading % 360.0, 1),
        "COG": texts(course % 360.0, 1),
        "SOG [kn]": texts(speed / KNOT, 1),
        "wind_rel_speed": texts(np.abs(felt), 1),
        "wind_rel_dir": texts(np.round(from_bow) % 360.0, 0),
        "baro_hPa": texts(surface - 0.121 * BRIDGE + 0.05 * noise(15, 2), 1),
        "SST_intake": texts(intake, 3),
        "SST_float": texts(intake + warm_layer + 0.02 * noise(16, 3), 2),
        "salinity": texts(35.05 + 0.06 * noise(17, 150), 3),
        "T_equ": texts(intake + warmed, 3),
        "P_equ": texts(surface - 0.6 + 0.1 * noise(18, 5), 1),  # the laboratory, a little under the weather outside
        "xCO2_equ": texts(in_water * np.exp(0.0423 * warmed), 2),
        "xCO2_air": texts(420.6 + 0.25 * noise(19, 90), 2),
    }

    def mark(names: tuple[str, ...], start: int, length: int, text: str) -> None:
        for name in names:
            columns[name][start : start + length] = [text] * length

    for start in (90, 270, 450, 630):
        mark(("xCO2_equ", "xCO2_air"), start, 6, "CAL")  # the analyser reads its reference gases
    mark(("heading",), 333, 11, "NA")  # the compass was off
    mark(("T_equ",), 512, 4, "")
    lines = [",".join(HEADER)]
    stamps = [f"{moment}Z" for moment in times]
    lines += [",".join((PLATFORM, *cells)) for cells in zip(stamps, *columns.values(), strict=True)]
    return "\n".join(lines) + "\n"


if __name__ == "__main__":
    target = Path(sys.argv[1]) if len(sys.argv) > 1 else Path(__file__).with_name("underway_day.csv")
    target.write_bytes(day().encode())
    print(f"{target}: {ROWS} rows of an invented day")
