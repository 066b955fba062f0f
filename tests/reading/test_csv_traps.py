"""Every trap of CSV, one test a trap."""

from __future__ import annotations

import csv
import io
from pathlib import Path

import pytest
from hypothesis import given
from hypothesis import strategies as st

from builder.problems import Problem
from builder.reading.csv_files import Columns, read_csv, read_csv_text

COLUMNS = Columns(("date", "film", "time_s", "note"), frozenset({"date", "film"}))


def rows_of(text: str) -> object:
    """Return the rows of a faultless table."""
    raw, problems = read_csv_text(text, "f.csv", COLUMNS)
    assert problems == []
    assert raw is not None
    return raw.data


def problem_of(text: str) -> Problem:
    """Return the only problem of a table."""
    _, problems = read_csv_text(text, "f.csv", COLUMNS)
    assert len(problems) == 1, problems
    return problems[0]


def test_fields_stay_text_and_a_blank_one_is_left_out() -> None:
    """010 and NO are what was written; blank means not stated."""
    assert rows_of("date,film,time_s,note\n010,NO,,1e-3\n") == [{"date": "010", "film": "NO", "note": "1e-3"}]


def test_blanks_around_a_field_are_no_part_of_it() -> None:
    """A blank after the comma is common."""
    assert rows_of("date , film\n a ,\tb \n") == [{"date": "a", "film": "b"}]


def test_a_quoted_field_may_hold_commas_and_quotes() -> None:
    """As the format says (RFC 4180)."""
    assert rows_of('date,film\n"a, ""b""",c\n') == [{"date": 'a, "b"', "film": "c"}]


@pytest.mark.parametrize("row", ['a"b,c', '"a"b,c', '"a,c'])
def test_a_quotation_mark_out_of_place_is_refused(row: str) -> None:
    """The stock reader would swallow the lines that follow."""
    problem = problem_of(f"date,film\n{row}\nx,y\n")
    assert (problem.rule, problem.line) == ("stray-quote", 2)


@pytest.mark.parametrize("row", ["a", "a,b,c"])
def test_a_row_of_another_length_is_refused(row: str) -> None:
    """Its fields may stand in the wrong columns."""
    problem = problem_of(f"date,film\n{row}\n")
    assert (problem.rule, problem.line, problem.pointer) == ("ragged-row", 2, "/0")


@pytest.mark.parametrize("separator", [";", "\t"])
def test_another_separator_is_named_once(separator: str) -> None:
    """Spreadsheets of some countries write semicolons."""
    assert problem_of(f"date{separator}film\na{separator}b\n").rule == "not-comma-separated"


def test_an_unknown_column_suggests_the_known_one() -> None:
    """A column that is passed over in silence is lost data."""
    problem = problem_of("date,film,tme_s\na,b,1\n")
    assert (problem.rule, problem.line, problem.column) == ("unknown-column", 1, 11)
    assert "time_s" in problem.hint


def test_a_missing_column_blames_the_header_alone() -> None:
    """A hundred rows would else say the same."""
    raw, problems = read_csv_text("date\na\nb\n", "f.csv", COLUMNS)
    assert [(problem.rule, problem.line) for problem in problems] == [("missing-column", 1)]
    assert raw is not None
    assert raw.is_unreadable("/1/film")


def test_a_column_given_twice_is_refused() -> None:
    """One of the two would win without a word."""
    assert problem_of("date,film,date\na,b,c\n").rule == "duplicate-column"


def test_a_column_without_name_is_refused() -> None:
    """It holds numbers nobody can read."""
    assert problem_of("date,film,\na,b,c\n").rule == "unnamed-column"


def test_comments_stand_above_the_header_only() -> None:
    """A comment below is a row, and says so."""
    raw, problems = read_csv_text("# one\n\n# two\ndate,film\na,b\n", "f.csv", COLUMNS)
    assert problems == []
    assert raw is not None
    assert raw.comments == ("one", "two")
    assert raw.data == [{"date": "a", "film": "b"}]
    assert "above the header" in problem_of("date,film\n# no, a, b\n").hint


def test_blank_lines_between_rows_are_passed_over_and_lines_stay_true() -> None:
    """Line numbers count them."""
    raw, _ = read_csv_text("date,film\n\na,b\n\n", "f.csv", COLUMNS)
    assert raw is not None
    assert raw.positions.value("/0/film") == (3, 3)


def test_line_ends_of_every_system_are_taken() -> None:
    """A spreadsheet writes CR LF."""
    assert rows_of("date,film\r\na,b\r\n") == [{"date": "a", "film": "b"}]


@pytest.mark.parametrize("text", ["", "# nothing\n"])
def test_a_table_without_header_is_refused(text: str) -> None:
    """There is nothing to tell what a field means."""
    assert problem_of(text).rule == "empty-file"


def test_a_character_that_cannot_be_seen_is_refused() -> None:
    """It would hide in a name."""
    assert problem_of("date,film\na,b\u202ec\n").rule == "control-character"


def test_a_byte_order_mark_is_no_part_of_the_first_column(tmp_path: Path) -> None:
    """Spreadsheets write one."""
    path = tmp_path / "f.csv"
    path.write_bytes(b"\xef\xbb\xbfdate,film\na,b\n")
    raw, problems = read_csv(path, "f.csv", COLUMNS)
    assert problems == []
    assert raw is not None
    assert raw.data == [{"date": "a", "film": "b"}]


def test_what_is_not_utf_8_is_placed(tmp_path: Path) -> None:
    """As for YAML."""
    path = tmp_path / "f.csv"
    path.write_bytes("date,film\na,µ\n".encode("latin-1"))
    raw, (problem,) = read_csv(path, "f.csv", COLUMNS)
    assert raw is None
    assert (problem.rule, problem.line, problem.column) == ("not-utf-8", 2, 3)


FIELD = st.text(st.characters(min_codepoint=33, max_codepoint=126), min_size=1, max_size=8)


@given(st.lists(st.tuples(FIELD, FIELD), min_size=1, max_size=5))
def test_what_the_standard_writer_writes_is_read_back(rows: list[tuple[str, str]]) -> None:
    """Python's own csv module is the other reader of the format."""
    stream = io.StringIO()
    writer = csv.writer(stream, lineterminator="\n")
    writer.writerow(["date", "film"])
    writer.writerows(rows)
    assert rows_of(stream.getvalue()) == [{"date": first, "film": second} for first, second in rows]
