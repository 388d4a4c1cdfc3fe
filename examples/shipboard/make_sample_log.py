"""Writes sample.log: a quarter of an hour around midnight aboard the Unbuilt, a ship that does not exist.

Every number is invented here. The same bytes come out each time.
"""

import math
import random
import sys
from datetime import UTC, datetime, timedelta
from pathlib import Path

START = datetime(2024, 4, 16, 23, 53, tzinfo=UTC)
SECONDS = 15 * 60
SEED = 20240416
WIND, WIND_FROM = 9.4, 251.0  # m s-1 and degrees, of the true wind
SPEED, COURSE = 5.1, 38.0  # m s-1 and degrees
KNOT = 1852 / 3600  # m s-1
SILENT = range(420, 550)  # s, in which the analyser does not speak
FELT_ALONE = 600  # s, from which on the anemometer tells the felt wind alone


def sentence(body: str) -> str:
    checksum = 0
    for character in body:
        checksum ^= ord(character)
    return f"${body}*{checksum:02X}"


def wind(second: int, noise: random.Random) -> list[str]:
    """Return the felt wind, and the true one while the anemometer knows the heading; angles are from the bow."""
    heading = bow(second)
    speed, direction = WIND + noise.gauss(0.0, 0.8), WIND_FROM + noise.gauss(0.0, 4.0)
    east = speed * math.sin(math.radians(direction)) + SPEED * math.sin(math.radians(COURSE))
    north = speed * math.cos(math.radians(direction)) + SPEED * math.cos(math.radians(COURSE))
    felt, felt_from = math.hypot(east, north), math.degrees(math.atan2(east, north))
    told = [f"WIMWV,{(felt_from - heading) % 360:.1f},R,{felt / KNOT:.1f},N,A"]
    if second < FELT_ALONE:
        told.append(f"WIMWV,{(direction - heading) % 360:.1f},T,{speed / KNOT:.1f},N,A")
    if noise.random() < 0.01:
        told = ["WIMWV,,R,,N,V", "WIMWV,,T,,N,V"]
    return [sentence(each) for each in told]


def bow(second: int) -> float:
    return (COURSE - 3.0 + 2.0 * math.sin(second / 40.0)) % 360.0


def position(second: int, time: datetime) -> str:
    latitude = 42.8 - second * SPEED * math.cos(math.radians(COURSE)) / 111_120  # degrees south
    longitude = 26.4 - second * SPEED * math.sin(math.radians(COURSE)) / 81_500  # degrees west

    def minutes(degrees: float, width: int) -> str:
        return f"{int(degrees):0{width}d}{degrees % 1 * 60:07.4f}"

    motion = f"{SPEED / KNOT:.1f},{COURSE:.1f}"
    where = f"{minutes(latitude, 2)},S,{minutes(longitude, 3)},W"
    return sentence(f"GPRMC,{time:%H%M%S},A,{where},{motion},{time:%d%m%y},,,A")


def analysed(second: int, noise: random.Random) -> str:
    if second % 300 >= 270:
        return "XCO2,CAL,18.9,1009.6,35.08,STD2"
    salinity = "" if noise.random() < 0.05 else f"{35.08 + noise.gauss(0, 0.004):.3f}"
    seawater = 384.0 + 6.0 * math.sin(second / 200.0) + noise.gauss(0, 0.3)
    return f"XCO2,{seawater:.2f},{18.86 + noise.gauss(0, 0.02):.2f},{1009.6 + noise.gauss(0, 0.1):.1f},{salinity},SEA"


def spoil(line: str, noise: random.Random) -> str:
    """Return a line as a bad cable brings it: one digit changed, or the end missing."""
    digits = [place for place, character in enumerate(line) if character.isdigit()]
    place = noise.choice(digits)
    return line[:place] if noise.random() < 0.3 else f"{line[:place]}{9 - int(line[place])}{line[place + 1 :]}"


def log() -> str:
    noise = random.Random(SEED)
    told = []
    for second in range(SECONDS):
        time = START + timedelta(seconds=second)
        lines: list[str] = []
        if second % 3 == 0:
            lines += [sentence(f"HEHDT,{bow(second):.1f},T"), *wind(second, noise)]
        if second % 10 == 0:
            lines.append(sentence(f"GPVTG,{COURSE:.1f},T,,M,{SPEED / KNOT:.1f},N,{SPEED * 3.6:.1f},K,A"))
            temperature = "" if noise.random() < 0.05 else f"{18.42 + 0.1 * math.sin(second / 300.0):.2f}"
            lines.append(sentence(f"YXMTW,{temperature},C"))
        if second % 30 == 0:
            lines.append(position(second, time))
            lines.append(sentence(f"WIXDR,P,{1.0082 + noise.gauss(0, 0.00002):.5f},B,BARO,C,14.2,C,AIR"))
        if second % 20 == 5 and second not in SILENT:
            lines.append(analysed(second, noise))
        for number, line in enumerate(lines):
            garbled = line.startswith("$") and noise.random() < 0.01
            told.append(f"{time:%Y-%m-%dT%H:%M:%S}.{number:03d}Z {spoil(line, noise) if garbled else line}\n")
    return "".join(told)


if __name__ == "__main__":
    target = Path(sys.argv[1]) if len(sys.argv) > 1 else Path(__file__).with_name("sample.log")
    target.write_bytes(log().encode())
