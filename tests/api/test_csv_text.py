"""Results written behind the lines of a CSV body."""

import csv
import io

import numpy as np
import pytest

from service.csv_header import shown
from service.csv_table import open_table
from service.csv_text import answer_header, answer_lines
from tests.api.csv_reading import answer, bits, read_one


def test_results_stand_behind_the_untouched_lines() -> None:
    body = b'a [kn], n\r\n 1.50 ,"x, ""y"""\r\n\r\nNA,2031-05-01T00:00:00Z\r\nbad,\xc2\xb5'

    assert answer(body) == (
        b"a [kn], n,flux [mmol m-2 d-1],quality_flag,quality_reason\n"
        b' 1.50 ,"x, ""y""",1.5,1,\n'
        b"NA,2031-05-01T00:00:00Z,,1,\n"
        b"bad,\xc2\xb5,,4,cell 'bad' in column a is not a number\n"
    )


@pytest.mark.parametrize("tail", [b"", b'0,"1"x\n'], ids=["arranged", "walked"])
def test_results_stand_under_their_headers_in_every_row(tail: bytes) -> None:
    body = b'a,b\n1,2\n3\n4,5,6\n7,8,\n"9\n9",1\n10,"11\n12,13\n' + tail
    header, *rows = csv.reader(io.StringIO(answer(body).decode(), newline=""), strict=not tail)

    assert header == ["a", "b", "flux [mmol m-2 d-1]", "quality_flag", "quality_reason"]
    assert [row[2:] for row in rows[:7]] == [
        ["1.0", "1", ""],
        ["", "4", "1 cell where the header has 2"],
        ["", "4", "3 cells where the header has 2", "6"],
        ["", "4", "3 cells where the header has 2", ""],
        ["", "4", "cell '9\\n9' in column a is not a number"],
        ["", "4", "a quote that opens on line 8 is not closed"],
        ["12.0", "1", ""],
    ]
    assert [row[:2] for row in rows[:7]] == [
        *[["1", "2"], ["3", ""], ["4", "5"], ["7", "8"], ["9\n9", "1"], ["10", "11"], ["12", "13"]]
    ]


def test_missing_results_are_written_as_asked() -> None:
    block = read_one(b"a\n1\n2\n3\n", [0])
    results = np.array([1.5, np.nan, np.inf])

    assert answer_lines(block, ",", [results], [], b"") == b"1,1.5\n2,\n3,\n"
    assert answer_lines(block, ",", [results], [], b"NaN") == b"1,1.5\n2,NaN\n3,NaN\n"


def test_written_numbers_read_back_exactly_and_integers_have_no_point() -> None:
    numbers = np.array([0.1, -0.0, 1e16, 5e-324, 1.7976931348623157e308, 1 / 3, 123456789.0])
    block = read_one(b"a\n" + b"1\n" * len(numbers), [0])
    strided = np.repeat(numbers, 2)[::2]
    flags = np.full(len(numbers), 9)
    lines = answer_lines(block, ";", [numbers, strided], [flags], b"").decode().splitlines()

    assert bits([float(line.split(";")[1]) for line in lines]) == bits(numbers)
    assert [line.split(";")[1] for line in lines] == [line.split(";")[2] for line in lines]
    assert {line.split(";")[3] for line in lines} == {"9"}


def test_texts_and_headers_are_quoted_only_where_they_must_be() -> None:
    table = open_table(b"a;b\n1;2\n")
    (block,) = table.blocks([0])
    texts: list[list[str] | np.ndarray] = [
        ["plain, with comma"],
        ['two; "halves"'],
        ["two\nlines"],
        [""],
        np.array(["text"]),
    ]
    line = answer_lines(block, ";", [], texts, b"")
    header = answer_header(table.header, ["x [m s-1]", "y;z"])

    assert line == b'1;2;plain, with comma;"two; ""halves""";"two\nlines";;text\n'
    assert header == b'a;b;x [m s-1];"y;z"\n'


def test_a_cell_is_shown_cut_and_on_one_line() -> None:
    assert shown("a\tb\nµ\x1b\u202e") == "'a\\tb\\nµ\\x1b\\u202e'"
    assert shown("x" * 41) == f"'{'x' * 40}…'"
