"""Writes the invented cruise: no such ship sailed, no such coast exists, every number below is made up.

``python examples/make_cruise.py [FILE]`` writes the same bytes each time (default: underway_cruise.csv beside it).
"""

import sys
from pathlib import Path

import numpy as np
from numpy.typing import NDArray

Array = NDArray[np.float64]

PLATFORM = "RV Unbuilt (invented)"
ROWS = 2000
SEED = 20240416
START = np.datetime64("2024-04-16T05:00:00")
OUTAGE = (1240, 2700)  # row before which the logger was off, and for how many seconds
HEADER = (
    "platform",
    "time",
    "latitude",
    "longitude",
    "SST",  # at the hull
    "water_temperature [degC]",  # in the laboratory, after the pump and the pipe have warmed it
    "salinity",
    "wind_speed [kn]",  # true wind, at 18 m
    "baro_hPa",  # at 12 m
    "xCO2_sea",  # dry, already corrected from the equilibrator to SST
    "xCO2_air",  # dry
    "flow_L_min",
)


def uniform(stream: int, size: int) -> Array:
    """Return numbers from 0 to 1: the raw stream is what numpy promises never to change."""
    raw: NDArray[np.uint64] = np.random.PCG64([SEED, stream]).random_raw(size)
    return raw / 2.0**64


def noise(stream: int, window: int) -> Array:
    """Return smooth noise of zero mean and unit spread that remembers about `window` rows."""
    kernel = np.hanning(window + 2)[1:-1]
    centred = uniform(stream, ROWS + window - 1) - 0.5
    smooth: Array = np.convolve(centred, kernel, mode="valid") / np.sqrt(np.sum(kernel**2) / 12.0)
    return smooth


def bump(row: Array, centre: float, width: float) -> Array:
    """Return a bell of height 1."""
    return np.exp(-(((row - centre) / width) ** 2))


def plateau(row: Array, start: float, end: float, slope: float) -> Array:
    """Return 1 between two rows and 0 outside, with soft shoulders."""
    return 0.5 * (np.tanh((row - start) / slope) - np.tanh((row - end) / slope))


def texts(values: Array, decimals: int) -> list[str]:
    """Return numbers as the logger prints them."""
    return [f"{value:.{decimals}f}" for value in values.tolist()]


def cruise() -> str:
    """Return the whole file."""
    row = np.arange(ROWS, dtype=np.float64)
    steps = np.floor(60.0 + 61.0 * uniform(1, ROWS))  # 60 to 120 s
    steps[0] = 0.0
    steps[OUTAGE[0]] = OUTAGE[1]
    seconds = np.cumsum(steps)
    hour = 5.0 + seconds / 3600.0
    times = [f"{START + np.timedelta64(int(each), 's')}Z" for each in seconds]

    river = plateau(row, 860, 1010, 26)  # 1 in the river mouth
    bloom = plateau(row, 380, 640, 50) + 0.8 * plateau(row, 1330, 1560, 60)
    squall = bump(row, 1700, 15)
    calm = plateau(row, 1120, 1200, 12)
    storm = bump(row, 1700, 260)

    afternoon = np.sin(2.0 * np.pi * (hour - 10.0) / 24.0)
    sst = 14.2 - 2.1 * plateau(row, 300, 1600, 120) + 1.6 * river + 0.18 * afternoon + 0.08 * noise(2, 60)
    salinity = 34.85 - 0.9 * plateau(row, 500, 1450, 130) + 0.03 * noise(3, 40)
    salinity = 2.8 + (salinity - 2.8) * (1.0 - river) + 0.15 * river * (noise(4, 25) + 1.5)
    freshness = np.maximum(1.0 - salinity / 34.85, 0.0)
    xco2_sea = 381.0 - 46.0 * bloom + 5.0 * noise(5, 90) + 0.8 * noise(6, 5) + 230.0 * freshness**1.6
    xco2_air = 419.2 + 0.35 * noise(7, 120) + 3.5 * river * (1.0 - 0.6 * afternoon) + 0.05 * noise(8, 3)
    baro = 1017.5 - 11.0 * storm - 1.5 * squall + 0.7 * noise(9, 300) + 0.08 * noise(10, 2)
    steady = 16.0 + 3.5 * noise(11, 160) + 6.0 * storm - 7.0 * river
    wind = np.abs(steady * (1.0 - 0.93 * calm) + 26.5 * squall + 1.0 * noise(12, 4) * (1.0 - 0.7 * calm))
    flow = 2.4 + 0.05 * noise(13, 8)

    # Out of the open sea, in to the mouth of the river, out again along another line, at about seven knots.
    shoreward = np.interp(row, [0, 820, 930, 1040, 1999], [0.0, 1.0, 1.04, 1.0, 0.02])
    along = np.interp(row, [0, 820, 1040, 1999], [0.0, 0.0, 0.0, 1.0])
    latitude = -42.80 + 1.35 * shoreward - 0.55 * along + 0.0004 * noise(14, 6)
    longitude = -26.40 + 2.35 * shoreward + 0.35 * along + 0.0004 * noise(15, 6)

    baro[1430:1470] = np.where(uniform(16, 40) < 0.25, 0.0, 3.0)  # a loose plug
    baro[1470:1500] = 399.5 + 1.5 * noise(17, 3)[:30]  # half-way back: some readings are just possible

    columns = {
        "latitude": texts(latitude, 5),
        "longitude": texts(longitude, 5),
        "SST": texts(sst, 3),
        "water_temperature [degC]": texts(sst + 0.34 + 0.02 * noise(18, 5), 3),
        "salinity": texts(salinity, 3),
        "wind_speed [kn]": texts(wind, 1),
        "baro_hPa": texts(baro, 1),
        "xCO2_sea": texts(xco2_sea, 2),
        "xCO2_air": texts(xco2_air, 2),
        "flow_L_min": texts(flow, 2),
    }

    def blank(names: tuple[str, ...], start: int, end: int, mark: str = "") -> None:
        for name in names:
            columns[name][start:end] = [mark] * (end - start)

    blank(("xCO2_sea", "flow_L_min"), 700, 772)  # the water pump was off
    blank(("xCO2_sea", "xCO2_air"), 1600, 1640)  # the analyser was off
    blank(("wind_speed [kn]",), 250, 280, "NA")
    blank(("salinity",), 1085, 1088, "NaN")
    blank(("latitude", "longitude"), 560, 570)  # no fix
    for start in (120, 520, 1290, 1850):  # the analyser reads its reference gases
        blank(("xCO2_sea", "xCO2_air"), start, start + 4, "CAL")
    for lost in np.floor(uniform(19, 12) * ROWS).astype(int).tolist():
        blank(("SST",), lost, lost + 1)

    lines = [",".join(HEADER)]
    lines += [",".join((PLATFORM, *cells)) for cells in zip(times, *columns.values(), strict=True)]
    return "\n".join(lines) + "\n"


if __name__ == "__main__":
    target = Path(sys.argv[1]) if len(sys.argv) > 1 else Path(__file__).with_name("underway_cruise.csv")
    target.write_bytes(cruise().encode())
    print(f"{target}: {ROWS} rows of an invented cruise")
