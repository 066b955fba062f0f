"""Faults of shape: each at its place, in words, with the likeliest remedy."""

from __future__ import annotations

from builder.checking.schema import check_shape
from builder.checking.schema_files import Schemas
from builder.problems import Problem, sorted_problems
from builder.reading.lab_tree import find_shipped
from builder.reading.yaml_files import read_yaml_text

SCHEMAS = Schemas(find_shipped().schemas)
FILM = "name: Example\nfamily: oxide\nclass: film\nbarrier: dense\n"


def problems_of(kind: str, text: str) -> list[Problem]:
    """Return the faults of shape of one file."""
    raw, _ = read_yaml_text(text, "f.yaml")
    assert raw is not None
    return sorted_problems(check_shape(kind, raw, SCHEMAS))


def test_every_fault_of_a_file_is_found_and_placed() -> None:
    """In one run, by line and column."""
    text = "name:\nfamily: oxid\nclass: film\nbariier: dense\ndensity: 2.2 g\n"
    found = [
        (problem.line, problem.column, problem.rule, problem.pointer)
        for problem in problems_of("films", text)
    ]
    assert found == [
        (1, 1, "missing-field", ""),
        (1, 6, "empty-field", "/name"),
        (2, 9, "unknown-word", "/family"),
        (4, 1, "unknown-field", "/bariier"),
        (5, 10, "unit-mismatch", "/density"),
    ]


def test_a_misspelt_field_or_word_gets_a_suggestion() -> None:
    """Among the fields that are not given yet, among the words that are allowed."""
    problems = problems_of("films", FILM.replace("barrier", "bariier").replace("oxide", "oxid"))
    hints = {problem.rule: problem.hint for problem in problems}
    assert hints["unknown-field"] == 'did you mean "barrier"?'
    assert hints["unknown-word"] == 'did you mean "oxide"?'


def test_each_missing_field_is_named() -> None:
    """One problem each."""
    missing = {problem.message for problem in problems_of("films", "name: x\n")}
    assert missing == {f'the field "{name}" is missing' for name in ("family", "class", "barrier")}


def test_a_bare_number_where_a_quantity_belongs_needs_a_unit() -> None:
    """1400 of what?"""
    (problem,) = problems_of("films", FILM + "density: 2.2\n")
    assert (problem.rule, problem.line, problem.column) == ("unit-missing", 5, 10)
    assert "g/cm3" in problem.hint


def test_a_choice_is_judged_by_its_open_side_and_names_the_words() -> None:
    """`back` is a film, or the word protected."""
    layers = "layers: [{film: si-100, thickness: 1 um, role: target}]\n"
    (problem,) = problems_of("samples", layers + "back: {film: si-100, thickness: 5}\n")
    assert (problem.rule, problem.pointer) == ("unit-missing", "/back/thickness")
    (problem,) = problems_of("samples", layers + "back: covered\n")
    assert (problem.rule, problem.pointer) == ("wrong-type", "/back")
    assert problem.hint == 'or write "protected"'
    assert problems_of("samples", layers + "back: protected\n") == []


def test_what_could_not_be_read_has_no_second_problem() -> None:
    """Its fault was reported by the reader."""
    raw, faults = read_yaml_text(FILM + "refractive_index: .nan\n", "f.yaml")
    assert raw is not None
    assert [fault.rule for fault in faults] == ["not-finite"]
    assert check_shape("films", raw, SCHEMAS) == []


def test_a_record_that_is_no_group_of_fields() -> None:
    """A list, a word, nothing."""
    for text in ("- a\n", "gold\n", "12\n"):
        assert [problem.rule for problem in problems_of("films", text)] == ["wrong-type"]


def test_an_unknown_unit_of_a_setting_lists_some() -> None:
    """A setting may measure many things."""
    text = "limits: {pressure: {min: 5 mTor}, power: {max: 100}}\n"
    problems = {problem.pointer: problem for problem in problems_of("tools", text) if problem.pointer}
    assert problems["/limits/pressure/min"].rule == "unit-unknown"
    assert 'did you mean "mTorr"' in problems["/limits/pressure/min"].hint
    assert (
        "mTorr" in problems["/limits/power/max"].hint or problems["/limits/power/max"].rule == "unit-missing"
    )


def test_run_columns_are_those_of_the_schema() -> None:
    """In the order of the schema, with those that every table needs."""
    columns = SCHEMAS.run_columns()
    assert columns.known[:3] == ("date", "wafer", "film")
    assert columns.required == {"date", "wafer", "film", "time_s", "before_nm", "after_nm", "u_nm"}
