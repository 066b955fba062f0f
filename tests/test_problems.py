"""Problems as values: order, one line each, suggestions."""

from __future__ import annotations

import json

import pytest
from hypothesis import given
from hypothesis import strategies as st

from builder.problems import (
    Problem,
    Severity,
    did_you_mean,
    format_github,
    format_json,
    format_text,
    has_errors,
    sorted_problems,
    suggestion,
)


def problem(**changes: object) -> Problem:
    """Return a problem with some fields changed."""
    fields: dict[str, object] = {
        "file": "recipes/etches/oxide-bhf.yaml",
        "line": 14,
        "column": 11,
        "pointer": "/etchant",
        "severity": Severity.ERROR,
        "rule": "unknown-id",
        "message": 'there is no etchant "bhf-51"',
        "hint": 'did you mean "bhf-5-1"?',
    }
    return Problem(**{**fields, **changes})  # type: ignore[arg-type]


def test_a_problem_is_one_line_with_place_severity_rule_message_and_hint() -> None:
    """The form an editor can jump to."""
    assert format_text(problem()) == (
        "recipes/etches/oxide-bhf.yaml:14:11: error unknown-id: "
        'there is no etchant "bhf-51"; did you mean "bhf-5-1"?'
    )


def test_a_problem_of_a_whole_file_has_no_line() -> None:
    """Line 0 would send an editor nowhere."""
    assert format_text(problem(line=0, column=0, hint="")).startswith("recipes/etches/oxide-bhf.yaml: error ")


@pytest.mark.parametrize("letter", ["\n", "\r", "\x1b", "\u2028", "\u202e", "\x85"])
def test_text_of_a_record_cannot_break_the_line(letter: str) -> None:
    """A line break would forge a second problem, an escape would repaint the terminal."""
    shown = format_text(problem(message=f"a{letter}b"))
    assert letter not in shown
    assert len(shown.splitlines()) == 1


def test_problems_are_sorted_by_place_and_each_comes_once() -> None:
    """Numbers as numbers: line 9 before line 10."""
    nine, ten = problem(line=9), problem(line=10)
    other = problem(file="a.yaml", line=99)
    assert sorted_problems([ten, other, nine, ten]) == [other, nine, ten]


def test_notices_are_no_errors() -> None:
    """They do not stop a build."""
    notice = problem(severity=Severity.NOTICE)
    assert not has_errors([notice])
    assert has_errors([notice, problem()])


def test_json_holds_every_field() -> None:
    """For other programs."""
    (row,) = json.loads(format_json([problem()]))
    assert row == {
        "file": "recipes/etches/oxide-bhf.yaml",
        "line": 14,
        "column": 11,
        "pointer": "/etchant",
        "severity": "error",
        "rule": "unknown-id",
        "message": 'there is no etchant "bhf-51"',
        "hint": 'did you mean "bhf-5-1"?',
    }


def test_a_review_command_escapes_what_would_end_it() -> None:
    """Percent, line breaks, colons and commas have a meaning there."""
    line = format_github(problem(file="a,b:c.yaml", message="50 %\nof it", hint=""))
    assert line == "::error file=a%2Cb%3Ac.yaml,line=14,col=11,title=unknown-id::50 %25%0Aof it"


@pytest.mark.parametrize(
    ("word", "known", "expected"),
    [
        ("bhf-51", ["bhf-5-1", "hf-49"], "bhf-5-1"),
        ("SiO₂", ["sio2", "sin"], "sio2"),
        ("Sio-2", ["sio2"], "sio2"),
        ("tempreature", ["temperature", "time"], "temperature"),
        ("au", ["ag"], None),
        ("xyz", ["temperature"], None),
        ("x", [], None),
    ],
)
def test_the_likeliest_name_is_suggested_or_none(word: str, known: list[str], expected: str | None) -> None:
    """A wild guess is worse than none."""
    assert did_you_mean(word, known) == expected
    assert suggestion(word, known) == ("" if expected is None else f'did you mean "{expected}"?')


@given(st.text(), st.text(), st.integers(0, 10**6))
def test_any_text_is_printed_on_one_line(message: str, file: str, line: int) -> None:
    """Whatever a record or a file name holds."""
    found = problem(message=message, file=file, line=line)
    for shown in (format_text(found), format_github(found)):
        assert len(shown.splitlines()) == 1
        shown.encode("utf-8")
    assert json.loads(format_json([found]))[0]["line"] == line
