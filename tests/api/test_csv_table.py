"""The header of a CSV body, and its cells as numbers."""

import math

import numpy as np
import pytest

from service.csv_header import PIECE_BYTES, shown
from service.csv_table import Limits, TableError, open_table
from tests.api.csv_reading import MISSING, NOT_NUMBERS, NUMBERS, STRAY, bits, read, read_one, refusal


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
