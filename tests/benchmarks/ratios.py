"""What requests cost, as ratios to the floor on the same machine: ``python tests/benchmarks/ratios.py``.

CPU time of the worker process, client and server on one keep-alive connection; the floor and the rows take turns, and
each figure is the median over the rounds. A row fails only beyond 1.5 times its bar, since machines differ. Linux only:
the CPU clock of another process is read through its process id.
"""

import http.client
import io
import os
import signal
import socket
import subprocess
import sys
import time
from collections.abc import Callable, Iterator
from contextlib import contextmanager
from dataclasses import dataclass
from pathlib import Path
from statistics import median
from typing import Any

import numpy as np
import orjson

HERE = Path(__file__).parent
ROUNDS = 7
TOLERANCE = 1.5  # a row fails beyond this many times its bar
SAMPLES, CSV_ROWS = 10_000, 200_000
ONE = {
    "gas": "co2",
    "water_temperature": 18.4,
    "salinity": 35.1,
    "wind_speed": 7.5,
    "water_partial_pressure": 372.0,
    "air_mole_fraction": 419.0,
}


@dataclass(frozen=True)
class Row:
    """One line of the table: a request, how often it is sent in a round, and the bar of its ratio."""

    title: str
    method: str
    path: str
    body: bytes | None
    repeats: int
    bar: float | None
    later: float | None = None


class Connection:
    """One keep-alive connection to a server, and the CPU clock of its worker."""

    def __init__(self, port: int, arbiter: int) -> None:
        self.client = http.client.HTTPConnection("127.0.0.1", port, timeout=120)
        children = Path(f"/proc/{arbiter}/task/{arbiter}/children").read_text().split()
        if len(children) != 1:
            raise RuntimeError(f"expected one worker, found {children}")
        self.clock = (~int(children[0]) << 3) | 2  # clock_getcpuclockid(3), as the kernel counts

    def send(self, row: Row) -> bytes:
        """Send a request and return the whole answer."""
        kind = "application/json" if (row.body or b"").startswith(b"{") else "text/csv"
        self.client.request(row.method, row.path, row.body, {"Content-Type": kind} if row.body else {})
        response = self.client.getresponse()
        content = response.read()
        if response.status != 200:
            raise RuntimeError(f"{row.title}: {response.status} {content[:300]!r}")
        return content

    def cost(self, row: Row) -> float:
        """Return the CPU seconds of the worker for one request."""
        before = time.clock_gettime(self.clock)
        for _ in range(row.repeats):
            self.send(row)
        return (time.clock_gettime(self.clock) - before) / row.repeats


def free_port() -> int:
    """Return a port that nothing listens on."""
    with socket.socket() as probe:
        probe.bind(("127.0.0.1", 0))
        return int(probe.getsockname()[1])


@contextmanager
def server(*command: str, port: int) -> Iterator[Connection]:
    """Run a server with one worker and yield a connection to it."""
    process = subprocess.Popen(
        [sys.executable, *command], stdout=subprocess.DEVNULL, stderr=subprocess.DEVNULL, cwd=HERE.parents[1]
    )
    try:
        deadline = time.monotonic() + 20.0
        while True:
            with socket.socket() as probe:
                if probe.connect_ex(("127.0.0.1", port)) == 0:
                    break
            if time.monotonic() > deadline or process.poll() is not None:
                raise RuntimeError(f"no server came up: {' '.join(command)}")
        while not Path(f"/proc/{process.pid}/task/{process.pid}/children").read_text().split():
            if time.monotonic() > deadline:
                raise RuntimeError("no worker came up")
        yield Connection(port, process.pid)
    finally:
        process.send_signal(signal.SIGTERM)
        process.wait(timeout=60)


def columns(samples: int) -> dict[str, list[float]]:
    """Return five inputs of an invented cruise, rounded as instruments print them; every sample is good."""
    rng = np.random.default_rng(8660)

    def numbers(low: float, high: float, decimals: int) -> list[float]:
        return [float(value) for value in np.round(rng.uniform(low, high, samples), decimals)]

    return {
        "water_temperature": numbers(2.0, 28.0, 3),
        "salinity": numbers(33.0, 37.0, 3),
        "wind_speed": numbers(4.0, 15.0, 2),
        "water_partial_pressure": numbers(300.0, 450.0, 2),
        "air_mole_fraction": numbers(415.0, 425.0, 2),
    }


def table(rows: int) -> bytes:
    """Return a CSV table of eight columns, five of them inputs."""
    made = columns(rows)
    header = ",".join(["record", *made, "heading", "depth"])
    lines = [
        f"{number},{','.join(map(str, cells))},{number % 360},{4000 + number % 97}"
        for number, cells in enumerate(zip(*made.values(), strict=True))
    ]
    return "\n".join([header, *lines, ""]).encode()


def instruments(samples: int) -> dict[str, Any]:
    """Return the same cruise as its instruments report it, with every correction that needs no carbonate system."""
    made = columns(samples)
    celsius = np.array(made["water_temperature"])
    pressure = np.round(np.linspace(995.0, 1025.0, samples), 1)
    dry = {
        "water_mole_fraction": made.pop("water_partial_pressure"),
        "air_mole_fraction_wet": made.pop("air_mole_fraction"),
    }
    beside = {
        "air_temperature": celsius - 1.0,
        "relative_humidity": np.linspace(60.0, 95.0, samples),
        "air_pressure": pressure,
        "equilibrator_temperature": celsius + 0.4,
        "equilibrator_pressure": pressure + 1.5,
        "subskin_temperature": celsius + 0.1,
        "wind_speed_variance": np.linspace(0.0, 4.0, samples),
    }
    once = {"barometer_height": 18, "wind_height": 23, "surfactant_suppression": 10, "skin_correction": "donlon-2002"}
    return {
        "gas": "co2",
        **made,
        **dry,
        **{name: np.round(numbers, 3).tolist() for name, numbers in beside.items()},
        **once,
    }


def request_rows() -> list[Row]:
    """Return the requests of the table."""
    query = "&".join(f"{name}={value}" for name, value in ONE.items())
    many = {"gas": "co2", **columns(SAMPLES)}
    winds = many | {"wind_speed": [round(0.01 * (i % 1800), 2) for i in range(SAMPLES)]}
    storm = many | {"wind_speed": [round(20.5 + 0.001 * (i % 4000), 3) for i in range(SAMPLES)]}
    gaps = many | {"wind_speed": [None] * SAMPLES}
    every = instruments(SAMPLES)
    by_carbon = {
        "alkalinity": 2310,
        "temperature_correction": "carbonate",
        "chemical_enhancement": "hoover-berkshire-1969",
    }
    one, good, remarked, flagged, missing = map(orjson.dumps, (ONE, many, winds, storm, gaps))
    return [
        Row("one flux by GET", "GET", f"/v1/flux?{query}", None, 150, 2.5, 2.0),
        Row("one flux in JSON", "POST", "/v1/flux", one, 150, 2.5, 2.0),
        Row("10,000 x 5 in JSON, default results", "POST", "/v1/flux", good, 8, 40.0, 28.0),
        Row("10,000 x 5 in JSON, pick=flux", "POST", "/v1/flux?pick=flux", good, 8, 40.0, 16.0),
        Row("10,000 x 5 in JSON, winds of 0 to 18 m/s", "POST", "/v1/flux", remarked, 8, None),
        Row("10,000 x 5 in JSON, all suspect", "POST", "/v1/flux", flagged, 8, None),
        Row("10,000 x 5 in JSON, all missing", "POST", "/v1/flux", missing, 8, None),
        Row("10,000 in JSON, every correction", "POST", "/v1/flux", orjson.dumps(every), 8, None),
        Row("10,000 in JSON, those and carbonate", "POST", "/v1/flux", orjson.dumps(every | by_carbon), 8, None),
        Row("CSV of 200,000 x 8, default results", "POST", "/v1/flux?gas=co2", table(CSV_ROWS), 1, None),
    ]


FLOOR = Row("floor: three members", "GET", "/", None, 150, None)


def csv_floor(body: bytes, results: int) -> float:
    """Return the CPU seconds of reading a table with numpy and writing it back with some results behind it."""
    before = time.process_time()
    numbers = np.loadtxt(io.BytesIO(body), delimiter=",", skiprows=1, comments=None)
    lines = body.split(b"\n")[1:-1]
    cells = [
        orjson.dumps(np.ascontiguousarray(numbers[:, 1] * (index + 1.1)), option=orjson.OPT_SERIALIZE_NUMPY)
        for index in range(results)
    ]
    b"\n".join(map(b",".join, zip(lines, *[cell[1:-1].split(b",") for cell in cells], strict=True)))
    return time.process_time() - before


def start_cost(code: str) -> float:
    """Return the CPU seconds of a fresh interpreter that runs a piece of code."""
    before = os.times()
    subprocess.run([sys.executable, "-c", code], check=True, cwd=HERE.parents[1])
    after = os.times()
    return after.children_user + after.children_system - before.children_user - before.children_system


def physics_cost(samples: int, repeats: int) -> float:
    """Return the seconds of running the plan of a flux with its default results, nothing read or written."""
    from service.physics.declare import GASES, QUANTITIES
    from service.physics.engine import run
    from service.physics.question import ask

    question = ask(QUANTITIES["flux"], GASES["co2"], None, frozenset(ONE) - {"gas"}, (), (), (), (), "gas")
    steps = next(iter(question.plans.values()))
    values = {name: np.array(numbers) for name, numbers in columns(samples).items()}
    return _timed(lambda: run(steps, values), repeats)


def _timed(action: Callable[[], Any], repeats: int) -> float:
    before = time.process_time()
    for _ in range(repeats):
        action()
    return (time.process_time() - before) / repeats


class Report:
    """The table, line by line, and whether a line is beyond what is let pass."""

    def __init__(self) -> None:
        self.failed = False
        print(f"{'':42}{'cost':>12}{'ratio':>8}{'bar':>7}{'later':>7}  verdict")

    def line(
        self, title: str, cost: float, ratio: float | None = None, bar: float | None = None, later: float | None = None
    ) -> None:
        """Print one line: cost in seconds, ratio, its bar now and later."""
        verdict = ""
        if ratio is not None and bar is not None:
            beyond = ratio > TOLERANCE * bar
            self.failed |= beyond
            verdict = "FAILS" if beyond else "over" if ratio > bar else "holds"
            if later is not None and ratio <= later:
                verdict = "holds the later bar"
        shown = f"{cost * 1e6:,.0f} us" if cost < 0.01 else f"{cost * 1e3:,.1f} ms"
        cells = "".join(f"{'' if n is None else format(n, '.2f'):>{w}}" for n, w in ((ratio, 8), (bar, 7), (later, 7)))
        print(f"{title:42}{shown:>12}{cells}  {verdict}".rstrip(), flush=True)


def main() -> int:
    """Measure, print the table, and return 1 if a row is beyond what is let pass."""
    rows, floor_port, port = request_rows(), free_port(), free_port()
    costs: dict[str, list[float]] = {row.title: [] for row in (FLOOR, *rows)}
    big = rows[-1].body or b""
    reference: list[float] = []
    ours = ("-m", "service", "serve", "--workers", "1", "--bind", f"127.0.0.1:{port}")
    theirs = (str(HERE / "floor.py"), f"127.0.0.1:{floor_port}")
    with server(*theirs, port=floor_port) as least, server(*ours, port=port) as service:
        for row in rows[:-1]:
            service.send(row)
        least.cost(FLOOR)
        for _ in range(ROUNDS):
            for row in rows[:-1]:
                costs[FLOOR.title].append(least.cost(FLOOR))
                costs[row.title].append(service.cost(row))
        for _ in range(3):
            costs[rows[-1].title].append(service.cost(rows[-1]))
            reference.append(csv_floor(big, 10))
    cost = {title: median(found) for title, found in costs.items()}
    report, floor = Report(), cost[FLOOR.title]
    report.line(FLOOR.title, floor, 1.0)
    for row in rows[:-1]:
        report.line(row.title, cost[row.title], cost[row.title] / floor, row.bar, row.later)
    good = cost[rows[2].title]
    for row, bar in zip(rows[4:9], (2.0, 2.0, 2.0, 3.0, 6.0), strict=True):
        report.line(f"{row.title.rpartition(', ')[2]}, over good", cost[row.title], cost[row.title] / good, bar)
    plain = median(reference)
    report.line("np.loadtxt and writing ten results", plain, 1.0)
    report.line(rows[-1].title, cost[rows[-1].title], cost[rows[-1].title] / plain, 1.5)
    for samples, repeats in ((1, 2000), (SAMPLES, 100)):
        spent = median(physics_cost(samples, repeats) for _ in range(ROUNDS))
        report.line(f"physics alone, {samples:,} samples", spent, spent / floor)
    libraries = median(start_cost("import flask, numpy, gsw, marshmallow, orjson") for _ in range(5))
    report.line("import of the libraries", libraries, 1.0)
    whole = median(start_cost("from service.app import create_app; create_app()") for _ in range(5))
    report.line("import and start of the service", whole, whole / libraries, 2.0)
    return 1 if report.failed else 0


if __name__ == "__main__":
    sys.exit(main())
