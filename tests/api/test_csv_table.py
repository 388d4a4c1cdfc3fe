"""Reading a CSV body in blocks, and writing results behind its lines."""

import csv
import io
import math
import struct
from collections.abc import Sequence

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from service.csv_header import PIECE_BYTES, QUOTED_LINES, shown
from service.csv_table import BLOCK_BYTES, Block, Limits, TableError, open_table
from service.csv_text import answer_header, answer_lines

# Quotes out of place in one line make its whole block be walked cell by cell.
STRAY = b'"stray"quote'


def read(body: bytes, used: Sequence[int] = (0, 1), decimal_comma: bool = False, rows: int = 16384) -> list[Block]:
    return list(open_table(body).blocks(used, decimal_comma, rows))


def read_one(body: bytes, used: Sequence[int] = (0, 1), decimal_comma: bool = False) -> Block:
    (block,) = read(body, used, decimal_comma)
    return block


def refusal(body: bytes, used: Sequence[int] = (0, 1), decimal_comma: bool = False) -> TableError:
    with pytest.raises(TableError) as caught:
        read(body, used, decimal_comma)
    return caught.value


def bits(numbers: Sequence[float] | np.ndarray) -> list[bytes]:
    """Return what tells apart 0 and -0, and takes every NaN for the same."""
    return [b"NaN" if math.isnan(number) else struct.pack("<d", number) for number in numbers]


def answer(body: bytes, decimal_comma: bool = False, rows: int = 16384) -> bytes:
    """Return the first column as a result, a flag and the reason behind each line."""
    table = open_table(body)
    written = [answer_header(table.header, ["flux [mmol m-2 d-1]", "quality_flag", "quality_reason"])]
    for block in table.blocks([0], decimal_comma, rows):
        flags = np.array([4 if row in block.bad else 1 for row in range(len(block.lines))])
        reasons = [block.bad.get(row, "") for row in range(len(block.lines))]
        written.append(answer_lines(block, table.header.delimiter, block.columns, [flags, reasons], b""))
    return b"".join(written)


def test_a_header_cell_is_a_name_and_a_unit_in_brackets() -> None:
    header = open_table(b'wind_speed [kn],"salinity",  depth ,, x [a] [m s-1],y []\n1,2,3,4,5,6\n').header

    assert header.names == ("wind_speed", "salinity", "depth", "", "x [a]", "y")
    assert header.units == ("kn", None, None, None, "m s-1", "")
    assert header.raw[2] == "  depth "
    assert header.line_text == 'wind_speed [kn],"salinity",  depth ,, x [a] [m s-1],y []'


@pytest.mark.parametrize(
    ("line", "delimiter"),
    [(b"a,b", ","), (b"a;b", ";"), (b"a\tb", "\t"), (b'"a,,,b";c', ";"), (b"a", ","), (b"a,b;c;d", ";")],
)
def test_the_delimiter_is_what_the_header_has_most_of_outside_quotes(line: bytes, delimiter: str) -> None:
    table = open_table(line + b"\n" + delimiter.encode().join([b"1"] * 3) + b"\n")

    assert table.header.delimiter == delimiter


def test_a_byte_order_mark_carriage_returns_and_leading_blank_lines_are_no_part_of_the_header() -> None:
    table = open_table(b"\xef\xbb\xbf\r\n \r\na,b\r\n1,2\r\n")
    (block,) = table.blocks([0, 1])

    assert table.header.names == ("a", "b")
    assert table.header.line_text == "a,b"
    assert block.lines == [b"1,2"]
    assert block.first_line == 4


def test_a_quoted_header_cell_may_have_a_line_break() -> None:
    table = open_table(b'"wind\nspeed",b\n1,2\n')
    (block,) = table.blocks([0])

    assert table.header.names == ("wind\nspeed", "b")
    assert block.first_line == 3


@pytest.mark.parametrize("body", [b"a,b\n1,2", b"a,b\r\n1,2\r\n", b"a\n1", "é,µ\n1,2\n".encode(), b"a,\n1,\n"])
def test_such_a_body_is_accepted(body: bytes) -> None:
    assert len(read_one(body, [0]).lines) == 1


@pytest.mark.parametrize(
    ("body", "status", "code", "line", "says"),
    [
        (b"", 400, "empty_body", None, "empty"),
        (b"\xef\xbb\xbf \r\n\t\n", 400, "empty_body", None, "empty"),
        (b"a,b", 422, "no_data_row", 1, "no data row"),
        (b"\n\na,b\n\n \n\t\n", 422, "no_data_row", 3, "no data row"),
        (b"water_temperature,salinity20,3522,35", 422, "no_data_row", 1, "--data-binary"),
        (b"water_temperature;salinity20.5;35.1", 422, "no_data_row", 1, "--data-binary"),
        ("a,b\n1,2\n".encode("utf-16"), 400, "encoding", 1, "CSV UTF-8"),
        ("a,b\n1,2\n".encode("utf-16-be"), 400, "encoding", 1, "CSV UTF-8"),
        ("a,b\n1,2\n".encode("utf-32"), 400, "encoding", 1, "CSV UTF-8"),
        (b"a,b\n1,2\n3,\0\n", 400, "encoding", 3, "NUL"),
        ("a,b\n1,2\n3,é\n".encode("latin-1"), 400, "encoding", 3, "latin-1"),
        (b"a,b\n1,2\n3,\xc3", 400, "encoding", 3, "latin-1"),
        (b"a,b\r1,2\r", 400, "line_ends", 1, "carriage return"),
        (b"a,b\r\n1,2\r\n3\r,4\r\n", 400, "line_ends", 3, "carriage return"),
        (b'a,"b\n1,2\n', 400, "unclosed_quote", 1, "not closed"),
        (b'a,"b"c\n1,2\n', 400, "header", 1, "cannot be read"),
        (b"n" * 101 + b"\n1\n", 422, "name_too_long", 1, "100 characters"),
        (b"a" + b",a" * 1088 + b"\n1\n", 422, "too_many_columns", 1, "1089 columns"),
    ],
)
def test_a_body_that_cannot_be_a_table_is_refused_with_its_line(
    body: bytes, status: int, code: str, line: int | None, says: str
) -> None:
    error = refusal(body)

    assert (error.status, error.code, error.line) == (status, code, line)
    assert says in error.detail
    assert str(error) == error.detail


def test_bytes_that_are_not_utf8_are_found_behind_a_character_that_two_pieces_share() -> None:
    start = b"a,b\n1," + b"x" * (PIECE_BYTES - 8) + "€".encode()

    assert open_table(start + b"\n2,\xc2\xb5\n")
    assert refusal(start + b"\n2,\xe9\n").line == 3
    assert refusal(start + b"\xe9\n2,3\n").line == 2


def test_names_and_columns_up_to_the_limits_are_accepted() -> None:
    limits = Limits(columns=2, name=3)

    assert open_table(b"abc [kn],b\n1,2\n", limits).header.names == ("abc", "b")
    with pytest.raises(TableError, match="3 columns; at most 2"):
        open_table(b"a,b,c\n1,2,3\n", limits)
    with pytest.raises(TableError, match="longer than 3 characters"):
        open_table(b"abcd,b\n1,2\n", limits)


NUMBERS = [
    *[
        "12",
        "-12.5",
        "+3",
        ".5",
        "5.",
        "-.5",
        "007",
        "0",
        "-0",
        "1e3",
        "1E-3",
        "-1.5e+05",
        " 12 ",
        "\t7",
        "  -1 ",
        " " * 30 + "12" + " " * 17,
    ],
    *["0.1", "123456789012345", "12345678901234.5", "0.123456789012345", "9007199254740993", "1e-400"],
    *["0.30000000000000004", "123456789012345678901234567890", "2.2250738585072011e-308", "5e-324"],
    *["1.7976931348623157e308", "00000000000000000000001.5", "-0.000", "-0e5", "4.35", "1" * 300, "0." + "3" * 998],
]
NOT_NUMBERS = [
    *["abc", "1_0", "0x10", "inf", "-Infinity", "+nan", "nan(1)", "1 2", "--1", "+-1", "-", "+", ".", "-."],
    *[
        "1e",
        "e5",
        "1e5.0",
        "1.2.3",
        "1d5",
        "٣",
        "１",
        "−5",
        "\u00a012",
        "12°",
        "true",
        "[1]",
        "{}",
        "#",
        "1/2",
        "12:30",
    ],
    *["12345678901234567890x", "N/A", "none", "-NA", "1e400", "-1e400", "9" * 400],
]
MISSING = ["", " ", "  ", " " * 40, "NA", "na", "NaN", "nan", "NAN", "null", "NULL", " Null "]


@pytest.mark.parametrize("stray", [b"", STRAY + b",0\n"], ids=["arranged", "walked"])
@pytest.mark.parametrize("quote", [b"%b", b'"%b"'], ids=["bare", "quoted"])
@pytest.mark.parametrize("text", NUMBERS)
def test_a_number_cell_is_read_as_the_nearest_double(text: str, quote: bytes, stray: bytes) -> None:
    block = read_one(b"a,b\n%b,1\n%b" % (quote % text.encode(), stray))

    assert bits(block.columns[0][:1]) == bits([float(text)])
    assert 0 not in block.bad


@pytest.mark.parametrize("stray", [b"", STRAY + b",0\n"], ids=["arranged", "walked"])
@pytest.mark.parametrize("quote", [b"%b", b'"%b"'], ids=["bare", "quoted"])
@pytest.mark.parametrize("text", NOT_NUMBERS)
def test_any_other_cell_is_bad_and_quoted_in_the_reason(text: str, quote: bytes, stray: bytes) -> None:
    block = read_one(b"a,b\n%b,1\n2,3\n%b" % (quote % text.encode(), stray))

    assert math.isnan(block.columns[0][0])
    assert block.bad[0].startswith(f"cell {shown(text)} in column a is ")
    assert bits(block.columns[1][:2]) == bits([1.0, 3.0])
    assert 1 not in block.bad


@pytest.mark.parametrize("stray", [b"", STRAY + b",0\n"], ids=["arranged", "walked"])
@pytest.mark.parametrize("quote", [b"%b", b'"%b"'], ids=["bare", "quoted"])
@pytest.mark.parametrize("text", MISSING)
def test_a_missing_mark_is_nan_and_not_bad(text: str, quote: bytes, stray: bytes) -> None:
    block = read_one(b"a,b\n1,%b\n%b" % (quote % text.encode(), stray))

    assert math.isnan(block.columns[1][0])
    assert 0 not in block.bad


def test_a_number_beyond_the_doubles_is_too_large_and_not_infinite() -> None:
    block = read_one(b"a,b\n1,1e400\n1,2\n")

    assert block.bad == {0: "cell '1e400' in column b is too large"}


def test_a_column_without_any_cell_filled_is_missing_throughout() -> None:
    for mark in (b"", b"NA"):
        block = read_one(b"a,b\n" + (b"1,%b\n" % mark) * 100)

        assert np.isnan(block.columns[1]).all()
        assert block.bad == {}


def test_gaps_beside_each_other_and_at_both_ends_of_a_line_stay_where_they_are() -> None:
    block = read_one(b"a,b,c,d\n,,,\n,1,,\n1,,,2\n,,NA,\n", [0, 1, 2, 3])

    assert [list(np.isnan(column)) for column in block.columns] == [
        [True, True, False, True],
        [True, False, True, True],
        [True, True, True, True],
        [True, True, False, True],
    ]
    assert block.bad == {}


def test_several_bad_cells_of_a_row_are_all_told() -> None:
    block = read_one(b"a,\nx,y\n1,2\n")

    assert block.bad == {0: "cell 'x' in column a is not a number; cell 'y' in column 2 is not a number"}


def test_random_decimals_are_read_as_the_nearest_double() -> None:
    random = np.random.default_rng(8660)
    texts = []
    for _ in range(50_000):
        digits = "".join(random.choice(list("0123456789"), size=random.integers(1, 20)))
        place = random.integers(0, len(digits) + 1)
        point = random.choice([".", ""])
        texts.append(random.choice(["", "-", "+"]) + digits[:place] + point + digits[place:])
    body = "a\n" + "\n".join(texts) + "\n"
    found = np.concatenate([block.columns[0] for block in read(body.encode(), [0])])

    assert bits(found) == bits([float(text) for text in texts])


def test_with_a_decimal_comma_a_comma_is_the_point_whatever_the_delimiter() -> None:
    texts = [b"12,5", b"-,5", b"5,", b"1,5e3", b"7", b"0,30000000000000004", b"NA", b""]
    for delimiter in (b";", b"\t"):
        block = read_one(b"a%bb\n" % delimiter + b"".join(b"%b%b1\n" % (t, delimiter) for t in texts), [0], True)
        assert bits(block.columns[0]) == bits([12.5, -0.5, 5.0, 1500.0, 7.0, 0.30000000000000004, math.nan, math.nan])
        assert block.bad == {}
    block = read_one(b'a,b\n"1,5","0,000015"\n', decimal_comma=True)

    assert [column[0] for column in block.columns] == [1.5, 0.000015]


def test_the_other_decimal_sign_is_bad_and_the_reason_names_the_cure() -> None:
    point = read_one(b"a;b\n12,5;1\n1;1\n")
    comma = read_one(b"a;b\n12.5;1\n0.30000000000000004;1\n1;1\n", decimal_comma=True)

    assert point.bad == {0: "cell '12,5' in column a is not a number (a decimal comma? send decimal=comma)"}
    assert comma.bad[0] == "cell '12.5' in column a is not a number (a decimal point? decimal=comma was sent)"
    assert np.isnan(comma.columns[0][:2]).all()
    assert set(comma.bad) == {0, 1}


@pytest.mark.parametrize(
    ("body", "decimal_comma", "says"),
    [
        (b"a,b\n1,ab\n2,c\n", False, "cell 'ab' on line 2 is not a number; none of the first 2 rows has"),
        (b"a,b\n\n1,ab\n", False, "cell 'ab' on line 3 is not a number."),
        (b"a;b\n1;2,5\n3;4,5\n", False, "send decimal=comma"),
        (b"a;b\n1;2.5\n", True, "decimal=comma was sent"),
        (b"a,b\n1\n2,ab\n", False, "cell 'ab' on line 3"),
    ],
)
def test_a_column_with_nothing_but_bad_cells_in_the_first_block_refuses_the_table(
    body: bytes, decimal_comma: bool, says: str
) -> None:
    error = refusal(body, decimal_comma=decimal_comma)

    assert (error.status, error.code, error.column) == (422, "not_a_number", "b")
    assert says in error.detail


@pytest.mark.parametrize("body", [b"a,b\n1,x\n2,3\n", b"a,b\n1,x\n2,\n", b"a,b\n1,2,3\n", b"a,b\n1\n"])
def test_one_readable_or_missing_cell_or_only_ragged_lines_do_not_refuse_it(body: bytes) -> None:
    assert read_one(body).bad


def test_a_column_that_turns_bad_after_the_first_block_is_flagged_row_by_row() -> None:
    blocks = read(b"a,b\n1,2\n3,4\n5,x\n6,y\n", rows=2)

    assert [sorted(block.bad) for block in blocks] == [[], [0, 1]]


def test_unused_columns_are_never_judged() -> None:
    block = read_one("time,a,note\n2031-05-01,1,é_x\n2031-05-02,2,inf\n".encode(), [1])

    assert bits(block.columns[0]) == bits([1.0, 2.0])
    assert block.bad == {}


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
