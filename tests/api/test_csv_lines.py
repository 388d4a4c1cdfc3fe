"""The lines of a CSV body: blank, ragged, quoted, in blocks of any size."""

import csv
import io
import math

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from service.csv_header import QUOTED_LINES
from service.csv_table import BLOCK_BYTES, open_table
from tests.api.csv_reading import MISSING, NOT_NUMBERS, NUMBERS, STRAY, answer, bits, read, read_one, refusal


def test_blank_lines_are_dropped_and_counted() -> None:
    body = b"a,b\n\n1,2\n  \n\t\n3,4\n\n5,6\n\n"
    for block in (read_one(body), read_one(body.replace(b"\n", b"\r\n")), read_one(body + b'"7"x,8\n')):
        assert block.lines[:3] == [b"1,2", b"3,4", b"5,6"]
        assert block.line_numbers[:3].tolist() == [3, 6, 8]
    single = read_one(b'a\n1\n\n ""\n""\n  \n2', [0])
    tabs = read_one(b"a\tb\n1\t2\n\t\n  \n", [0])

    assert single.line_numbers.tolist() == [2, 4, 5, 7]
    assert tabs.lines == [b"1\t2", b"\t"]


def test_a_block_of_nothing_but_blank_lines_is_passed_over() -> None:
    blocks = read(b"a,b\n1,2\n\n\n\n\n3,4\n", rows=2)

    assert [block.line_numbers.tolist() for block in blocks] == [[2], [7]]


def test_quoted_cells_may_have_delimiters_quotes_and_line_breaks() -> None:
    body = b'n,a,b\n"x,1",1,2\r\n"he said ""no""",3,4\n"two\r\nlines, ""2""",5,6\n"",7,8\n"""",9,"10"\nend,"11",12'
    for used in (body, body + b"\n" + STRAY + b",0,0"):
        block = read_one(used, [1, 2])

        assert block.columns[0][:6].tolist() == [1, 3, 5, 7, 9, 11]
        assert block.columns[1][:6].tolist() == [2, 4, 6, 8, 10, 12]
        assert block.lines[0] == b'"x,1",1,2'
        assert block.lines[2] == b'"two\r\nlines, ""2""",5,6'
        assert block.line_numbers[:6].tolist() == [2, 3, 4, 6, 7, 8]
        assert not set(block.bad) & set(range(6))


def test_a_number_broken_by_a_line_break_is_bad() -> None:
    for tail in (b"", STRAY + b",0\n"):
        block = read_one(b'a,b\n"1\n2",3\n4,5\n' + tail)

        assert block.bad[0] == "cell '1\\n2' in column a is not a number"


def test_lines_with_a_number_sign_are_data() -> None:
    assert read_one(b"a,b\n#1,2\n3,4\n").bad == {0: "cell '#1' in column a is not a number"}


@pytest.mark.parametrize("tail", [b"", STRAY + b",0\n"], ids=["arranged", "walked"])
def test_a_line_with_too_few_or_too_many_cells_is_bad_and_the_others_are_not(tail: bytes) -> None:
    block = read_one(b"a,b\n1,2\n3\n4,5,6\n7,8,\n9,10\n" + tail)

    assert [block.bad.get(row) for row in range(5)] == [
        None,
        "1 cell where the header has 2",
        "3 cells where the header has 2",
        "3 cells where the header has 2",
        None,
    ]
    assert bits(block.columns[1][:5]) == bits([2, math.nan, math.nan, math.nan, 10])


def test_lines_that_are_wrong_by_one_each_way_are_not_taken_for_right_ones() -> None:
    block = read_one(b"a,b,c\n1,2\n3,4,5,6\n7,8,9\n", [0, 1, 2])

    assert set(block.bad) == {0, 1}


def test_a_delimiter_at_the_end_of_header_and_lines_is_an_empty_column() -> None:
    assert read_one(b"a,b,\n1,2,\n").bad == {}


@pytest.mark.parametrize("tail", [b"", b'"1"x,0\n'], ids=["arranged", "walked"])
def test_a_cell_over_the_limit_makes_its_row_bad_counted_in_characters(tail: bytes) -> None:
    right, wrong = "µ" * 1000, "µ" * 1001
    block = read_one(f'a,n\n1,{right}\n2,{wrong}\n3,"{right}"\n4,"{wrong}"\n'.encode() + tail, [0])

    assert [row for row in range(4) if row in block.bad] == [1, 3]
    assert block.bad[1] == f"cell '{'µ' * 40}…' is longer than 1000 characters"
    assert bits(block.columns[0][:4]) == bits([1, math.nan, 3, math.nan])


def test_a_line_longer_than_a_block_is_one_bad_row() -> None:
    blocks = read(b"a,b\n1,2\n" + b"1" * (BLOCK_BYTES + 1) + b"\n3,4\n")

    assert [block.line_numbers.tolist() for block in blocks] == [[2], [3], [4]]
    assert [block.bad for block in blocks] == [{}, {0: f"the line is longer than {BLOCK_BYTES} bytes"}, {}]


@pytest.mark.parametrize(
    ("line", "reason"),
    [
        (b'1,"2"x', "text follows the closing quote of cell '\"2\"x'"),
        (b'1,"2" ', "text follows the closing quote of cell '\"2\" '"),
        (b'1,5" pipe', "cell '5\" pipe' in column b is not a number"),
        (b'1,"2', "a quote that opens on line 3 is not closed"),
        (b'1,"2""', "a quote that opens on line 3 is not closed"),
        (b'1,"', "a quote that opens on line 3 is not closed"),
        (b'"1,2', "a quote that opens on line 3 is not closed"),
    ],
)
def test_a_quote_out_of_place_makes_its_own_line_bad(line: bytes, reason: str) -> None:
    for end in (b"\n", b"\r\n"):
        block = read_one(end.join([b"a,b", b"0,0", line, b"3,4", b"5,6"]))

        assert block.bad == {1: reason}
        assert block.lines == [b"0,0", line, b"3,4", b"5,6"]
        assert bits(block.columns[1]) == bits([0, math.nan, 4, 6])


def test_a_stray_quote_does_not_pair_with_one_lines_later() -> None:
    block = read_one(b'n,a\n"x",1\n"x,2\n"x",3\n"x","4\n"x",5\n', [1])

    assert [block.bad.get(row, "")[:7] for row in range(5)] == ["", "a quote", "", "a quote", ""]
    assert bits(block.columns[0]) == bits([1, math.nan, 3, math.nan, 5])


def test_a_quote_in_the_midst_of_a_passed_cell_is_text() -> None:
    block = read_one(b'n,a\n5" pipe,1\n2" "x",2\n', [1])

    assert block.columns[0].tolist() == [1, 2]
    assert block.bad == {}


def test_a_quote_that_would_swallow_many_lines_refuses_the_table_in_the_first_block_only() -> None:
    body = b'a,b\n1,2\n3,"4\n' + b"5,6\n" * (QUOTED_LINES + 1)
    error = refusal(body)
    blocks = read(body, rows=1)

    assert (error.status, error.code, error.line) == (400, "unclosed_quote", 3)
    assert blocks[1].bad == {0: "a quote that opens on line 3 is not closed"}
    assert sum(len(block.lines) for block in blocks) == QUOTED_LINES + 3
    assert all(not block.bad for block in blocks[2:])


def test_a_quoted_cell_of_a_hundred_lines_is_read_and_a_longer_one_is_not() -> None:
    head = b"n,a\n0,1\n"
    block = read_one(head + b'"' + b"x\n" * QUOTED_LINES + b'",2\n3,4\n', [1])

    assert block.columns[0].tolist() == [1, 2, 4]
    assert refusal(head + b'"' + b"x\n" * (QUOTED_LINES + 1) + b'",2\n', [1]).line == 3


def test_what_is_read_does_not_depend_on_the_size_of_blocks() -> None:
    body = (
        b'a,b,n\n1,2,x\n\n3,,"two\nlines"\n4,err,\n5,6\n7,8,9,10\n"11","12.5",5" pipe\n13,"1"x,\n'
        + b"14,1e-3,0\n\n\n" * 40
    )
    whole = read_one(body)
    for rows in (1, 2, 3, 5, 17):
        blocks = read(body, rows=rows)

        assert max(len(block.lines) for block in blocks) <= rows
        assert [line for block in blocks for line in block.lines] == whole.lines
        assert np.concatenate([block.line_numbers for block in blocks]).tolist() == whole.line_numbers.tolist()
        assert all(block.first_line == block.line_numbers[0] for block in blocks)
        for column in range(2):
            assert bits(np.concatenate([block.columns[column] for block in blocks])) == bits(whole.columns[column])
        bad = [block.bad.get(row) for block in blocks for row in range(len(block.lines))]
        assert bad == [whole.bad.get(row) for row in range(len(whole.lines))]
        assert answer(body, rows=rows) == answer(body)


def test_columns_come_in_the_order_asked_for() -> None:
    block = read_one(b"a,b,c\n1,2,3\n", [2, 0, 2])

    assert [column.tolist() for column in block.columns] == [[3], [1], [3]]


plain_cells = st.one_of(
    st.sampled_from(NUMBERS + NOT_NUMBERS + MISSING),
    st.floats(allow_nan=False, allow_infinity=False).map(repr),
    st.decimals(-10_000, 10_000, places=3).map(str),
    st.text(st.characters(codec="utf-8", exclude_characters="\0\r"), max_size=8),
)
tables = st.lists(st.lists(plain_cells, min_size=3, max_size=3), min_size=1, max_size=20)


@settings(derandomize=True, deadline=None, max_examples=300)
@given(table=tables, delimiter=st.sampled_from(",;\t"), end=st.sampled_from(["\n", "\r\n"]), quote_all=st.booleans())
def test_arranged_and_walked_blocks_agree_with_a_plain_reading_bit_for_bit(
    table: list[list[str]], delimiter: str, end: str, quote_all: bool
) -> None:
    text = io.StringIO()
    csv.writer(
        text, delimiter=delimiter, lineterminator=end, quoting=csv.QUOTE_ALL if quote_all else csv.QUOTE_MINIMAL
    ).writerows([["a", "b", "c"], ["0", "0", "0"], *table])
    body = text.getvalue().encode()
    header = open_table(body).header.line_text.encode()
    arranged = read_one(body, [0, 1, 2])
    walked = read_one(body + (STRAY + delimiter.encode() * 2), [0, 1, 2])
    rows = len(arranged.lines)

    assert rows == len(table) + 1
    assert walked.lines[:rows] == arranged.lines
    assert end.encode().join([header, *arranged.lines, b""]) == body
    assert walked.line_numbers[:rows].tolist() == arranged.line_numbers.tolist()
    assert {row: reason for row, reason in walked.bad.items() if row < rows} == arranged.bad
    for index, (column, again) in enumerate(zip(arranged.columns, walked.columns, strict=True)):
        wanted = [0.0] + [plain_reading(row[index]) for row in table]
        whole = [max(map(len, row)) <= 1000 for row in [["0"], *table]]
        assert bits(column) == bits([w if ok else math.nan for w, ok in zip(wanted, whole, strict=True)])
        assert bits(again[:rows]) == bits(column)


def plain_reading(cell: str) -> float:
    """Return the number in a cell by the plainest means: ``float`` less what it takes too much."""
    text = cell.strip(" \t\n\r\v\f")
    if not text.isascii() or "_" in text or text != text.strip():
        return math.nan
    try:
        number = float(text)
    except ValueError:
        return math.nan
    return number if math.isfinite(number) else math.nan
