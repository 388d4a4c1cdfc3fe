"""The logger bridge: what it makes of a log, a serial port and datagrams."""

import os
import socket
import subprocess
import sys
from datetime import UTC, datetime, timedelta
from functools import partial
from pathlib import Path

import pytest

from tests.clients.running import ENVIRONMENT, PATIENCE, free_port, stopped_at_the_end, until
from tests.clients.shipboard import SAMPLE, SHIPBOARD, bridge, command, log, rows, sentence, ship, tables, waiting

pytest.importorskip("pynmea2", reason="the bridge needs pynmea2: pip install -r examples/shipboard/requirements.txt")
pytest.importorskip("serial", reason="the bridge needs pyserial: pip install -r examples/shipboard/requirements.txt")

pytestmark = pytest.mark.clients


def test_the_generator_writes_the_log_that_is_kept(tmp_path: Path) -> None:
    again = tmp_path / "again.log"
    subprocess.run([sys.executable, SHIPBOARD / "make_sample_log.py", again], check=True, timeout=PATIENCE)

    assert again.read_bytes() == SAMPLE.read_bytes()


def test_the_sample_makes_one_row_a_minute_in_the_table_of_its_day(undisturbed: Path) -> None:
    start = datetime(2024, 4, 16, 23, 53, tzinfo=UTC)
    expected = [f"{start + timedelta(minutes=minute):%Y-%m-%dT%H:%M:%SZ}" for minute in range(15)]

    assert [row["time"] for row in rows(undisturbed)] == expected
    assert sorted(tables(undisturbed)) == ["flux_2024-04-16.csv", "flux_2024-04-17.csv"]
    assert waiting(undisturbed) == 0


def test_minutes_with_all_readings_have_a_flux_and_the_others_a_reason(undisturbed: Path) -> None:
    needed = ("water_temperature", "salinity", "wind_speed", "air_pressure", "water_mole_fraction")
    told = rows(undisturbed)
    whole = [row for row in told if all(row[name] for name in needed)]

    assert len(whole) >= 8
    assert all(row["flux"] and row["quality_flag"] == "1" for row in whole)
    assert all(row["flux"] == "" and "is missing" in row["quality_reason"] for row in told if row not in whole)


def test_averages_are_near_what_the_sample_was_made_of(undisturbed: Path) -> None:
    """A true wind of 9.4 m/s from 251 degrees, a course of 38 degrees at 5.1 m/s; told to tenths of knots and degrees.

    A minute holds 20 winds that scatter by 0.8 m/s and 4 degrees; the mean lies within four of their standard errors.
    """
    for row in rows(undisturbed):
        if row["wind_speed"]:
            assert float(row["wind_speed"]) == pytest.approx(9.4, abs=4 * 0.8 / 20**0.5)
        if row["wind_from"]:
            assert float(row["wind_from"]) == pytest.approx(251.0, abs=4 * 4.0 / 20**0.5)
        assert float(row["course_over_ground"]) == pytest.approx(38.0, abs=0.05)
        assert float(row["speed_over_ground"]) == pytest.approx(5.1, abs=0.03)


def test_felt_wind_becomes_true_wind_by_the_service_or_not_at_all(undisturbed: Path) -> None:
    """The last five minutes of the sample tell the wind felt aboard alone, some 6 m/s, which must not pass for true."""
    last = rows(undisturbed)[-5:]
    speeds = [row["wind_speed"] for row in last]

    assert all(float(row["apparent_wind_speed"]) < 7.0 for row in last)
    assert speeds == [""] * 5 or all(abs(float(speed) - 9.4) < 4 * 0.8 / 20**0.5 for speed in speeds)


def test_run_again_it_adds_nothing(service: str, undisturbed: Path) -> None:
    before = tables(undisturbed)
    done = bridge(service, undisturbed)

    assert done.returncode == 0
    assert tables(undisturbed) == before


def test_a_refused_question_is_told_and_nothing_is_lost_until_it_is_mended(
    service: str, undisturbed: Path, tmp_path: Path
) -> None:
    refused = bridge(service, tmp_path, SAMPLE, "--ship", ship(tmp_path, 60, gas="helum"))
    kept = waiting(tmp_path)
    mended = bridge(service, tmp_path)

    assert (refused.returncode, kept) == (1, 15)
    assert "gas" in refused.stderr
    assert mended.returncode == 0
    assert tables(tmp_path) == tables(undisturbed)


@pytest.mark.parametrize(
    ("lines", "name"),
    [
        ([sentence("YXMTW,,C")], "water_temperature"),
        (["$YXMTW,12.4,C*16"], "water_temperature"),
        (["$YXMTW,12.4,C"], "water_temperature"),
        ([sentence("YXMTW,54.3,F")], "water_temperature"),
        ([sentence("WIMWV,214.8,T,,M,A")], "wind_speed"),
        ([sentence("WIMWV,,T,7.9,M,A")], "wind_speed"),
        ([sentence("WIMWV,214.8,T,7.9,M,V")], "wind_speed"),
        ([sentence("WIMWV,214.8,T,7.9,,A")], "wind_speed"),
        ([sentence("WIMWV,214.8,R,7.9,M,A")], "wind_speed"),
        ([sentence("WIMWV,214.8,R,7.9,M,A")], "apparent_wind_speed"),
        ([sentence("HEHDT,,T")], "heading"),
        ([sentence("GPVTG,,T,,M,0.0,N,0.0,K,A")], "speed_over_ground"),
        ([sentence("GPRMC,120000,V,,,,,0.0,0.0,160424,,,N")], "speed_over_ground"),
        ([sentence("WIXDR,P,,B,BARO")], "air_pressure"),
        ([sentence("WIXDR,P,1.01,B,OTHER")], "air_pressure"),
        (["XCO2,,18.9,1009.6,35.08,SEA"], "water_mole_fraction"),
        (["XCO2,CAL,18.9,1009.6,35.08,STD2"], "water_mole_fraction"),
        (["XCO2,38_4,18.9,1009.6,35.08,SEA"], "water_mole_fraction"),
        (["XCO2,384.0,18.9"], "water_mole_fraction"),
        (["XCO2,384.0,18.9,-999,35.08,SEA"], "equilibrator_pressure"),
    ],
)
def test_what_is_blank_void_or_garbled_is_missing_and_never_zero(
    service: str, tmp_path: Path, lines: list[str], name: str
) -> None:
    done = bridge(service, tmp_path, log(tmp_path, *lines))
    (row,) = rows(tmp_path)

    assert done.returncode == 0
    assert row[name] == ""
    assert (row["flux"], row["quality_flag"]) == ("", "9")


def test_a_spoilt_line_is_counted_and_costs_none_of_its_neighbours(service: str, tmp_path: Path) -> None:
    bridge(service, tmp_path, log(tmp_path, sentence("YXMTW,12.40,C"), "$YXMTW,99.9,C*00", "\x7f\x01noise"))
    (row,) = rows(tmp_path)

    assert (row["water_temperature"], row["lines_refused"]) == ("12.4", "2")


def test_directions_are_averaged_as_vectors_across_north(service: str, tmp_path: Path) -> None:
    """Headings of 350 and 10 degrees make 0, and a wind on the bow of both is one from north, half a per cent less."""
    lines = []
    for heading in (350.0, 10.0):
        lines += [
            sentence(f"HEHDT,{heading},T"),
            sentence("WIMWV,0.0,R,10.0,M,A"),
            sentence(f"GPVTG,{heading},T,,M,9,N,,K"),
        ]
    bridge(service, tmp_path, log(tmp_path, *lines))
    (row,) = rows(tmp_path)

    assert float(row["heading"]) % 360 == pytest.approx(0.0, abs=1e-4)
    assert float(row["course_over_ground"]) % 360 == pytest.approx(0.0, abs=1e-4)
    assert (float(row["apparent_wind_direction"]) + 180) % 360 - 180 == pytest.approx(0.0, abs=2e-4)
    assert float(row["apparent_wind_speed"]) == pytest.approx(10.0 * 0.984808, abs=1e-4)  # cosine of 10 degrees


def test_a_clock_set_back_makes_no_interval_twice(service: str, tmp_path: Path) -> None:
    path = log(tmp_path, *[sentence("YXMTW,12.40,C")] * 130)
    path.write_text(path.read_text() * 2)
    done = bridge(service, tmp_path, path)

    assert [row["time"][14:16] for row in rows(tmp_path)] == ["00", "01", "02"]
    assert "120 lines" in done.stderr


def test_lines_that_come_after_their_interval_was_written_are_left_out_and_counted(
    service: str, tmp_path: Path
) -> None:
    """The first run ends the minute with the log; a minute once written stays as it is."""
    path = log(tmp_path, *[sentence("YXMTW,12.40,C")] * 50)
    lines = path.read_text().splitlines(keepends=True)
    path.write_text("".join(lines[:40]))
    bridge(service, tmp_path, path)
    written = tables(tmp_path)
    path.write_text("".join(lines))
    done = bridge(service, tmp_path, path)

    assert tables(tmp_path) == written
    assert "10 lines" in done.stderr


def test_a_second_bridge_on_the_same_folder_is_turned_away(service: str, tmp_path: Path) -> None:
    growing = tmp_path / "growing.log"
    growing.write_text("")
    first = subprocess.Popen(
        command(service, tmp_path, growing, "--follow"), stderr=subprocess.DEVNULL, env=ENVIRONMENT
    )
    with stopped_at_the_end(first):
        until(lambda: (tmp_path / "lock").exists())
        until(lambda: bridge(service, tmp_path).returncode == 2)
        second = bridge(service, tmp_path)

    assert "another bridge" in second.stderr


def test_datagrams_are_recorded_and_answered_and_the_tables_can_be_made_again_from_the_record(
    service: str, tmp_path: Path
) -> None:
    """Killed once on the way; the record's last second or two are not over when the bridge is stopped."""
    port = free_port()
    description = ship(tmp_path, 1)
    arguments = command(service, tmp_path, f"udp:{port}", "--ship", description)
    text = f"{sentence('YXMTW,12.40,C')}\r\n{sentence('HEHDT,271.0,T')}\r\n".encode()
    with socket.socket(socket.AF_INET, socket.SOCK_DGRAM) as sender:

        def arrives(wanted: int) -> bool:
            sender.sendto(text, ("127.0.0.1", port))
            return sum(row["water_temperature"] == "12.4" for row in rows(tmp_path)) >= wanted

        with stopped_at_the_end(subprocess.Popen(arguments, stderr=subprocess.DEVNULL, env=ENVIRONMENT)):
            until(partial(arrives, 2), pause=0.1)
        with stopped_at_the_end(subprocess.Popen(arguments, stderr=subprocess.DEVNULL, env=ENVIRONMENT)) as process:
            until(partial(arrives, 4), pause=0.1)
            process.terminate()
            status = process.wait(PATIENCE)
    record = sorted((tmp_path / "log").iterdir())
    bridge(service, tmp_path / "again", *record, "--ship", description)
    written, again = rows(tmp_path), rows(tmp_path / "again")

    assert status == 0
    assert any(line.endswith(f"Z {sentence('HEHDT,271.0,T')}") for line in record[0].read_text().splitlines())
    assert written == again[: len(written)]
    assert len(again) - len(written) <= 2


def test_a_serial_port_is_read_like_a_log(service: str, tmp_path: Path) -> None:
    instrument, port = os.openpty()
    arguments = command(service, tmp_path, f"serial:{os.ttyname(port)}", "--ship", ship(tmp_path, 1))
    with stopped_at_the_end(subprocess.Popen(arguments, stderr=subprocess.DEVNULL, env=ENVIRONMENT)):

        def arrives() -> bool:
            os.write(instrument, f"{sentence('YXMTW,12.40,C')}\r\n".encode())
            return any(row["water_temperature"] == "12.4" for row in rows(tmp_path))

        until(arrives, pause=0.1)
    os.close(instrument)
    os.close(port)

    assert all(row["water_temperature"] in ("12.4", "") for row in rows(tmp_path))


def test_a_port_that_is_not_there_is_told_in_one_line(service: str, tmp_path: Path) -> None:
    done = bridge(service, tmp_path, "serial:/dev/no_such_port")

    assert done.returncode == 2
    assert done.stderr.count("\n") == 1
    assert "no_such_port" in done.stderr


@pytest.mark.parametrize(
    ("wrong", "told"),
    [("interval = 7", "must divide a day"), ("interval = sixty", "cannot use"), ("", "cannot use")],
)
def test_a_description_that_cannot_be_used_is_told_in_one_line(
    service: str, tmp_path: Path, wrong: str, told: str
) -> None:
    description = ship(tmp_path, 60)
    description.write_text(description.read_text().replace("interval = 60", wrong))
    done = bridge(service, tmp_path, SAMPLE, "--ship", description)

    assert done.returncode == 2
    assert done.stderr.count("\n") == 1
    assert told in done.stderr
