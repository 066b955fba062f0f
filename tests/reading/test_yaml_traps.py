"""Every trap of YAML that turns what a person wrote into something else, one test a trap."""

from __future__ import annotations

from pathlib import Path

import pytest
import yaml
from hypothesis import given
from hypothesis import strategies as st

from builder.problems import Problem
from builder.reading.text_files import MAX_BYTES
from builder.reading.yaml_files import MAX_DEPTH, read_yaml, read_yaml_text


def value_of(text: str) -> object:
    """Return what the key `x` of a faultless file holds."""
    raw, problems = read_yaml_text(f"x: {text}\n", "f.yaml")
    assert problems == []
    assert raw is not None
    assert isinstance(raw.data, dict)
    return raw.data["x"]


def problem_of(text: str) -> Problem:
    """Return the only problem of a file."""
    _, problems = read_yaml_text(text, "f.yaml")
    assert len(problems) == 1, problems
    return problems[0]


@pytest.mark.parametrize("word", ["NO", "No", "no", "yes", "Y", "n", "on", "Off", "TRUE", "True", "FALSE"])
def test_a_gas_or_a_word_is_no_boolean(word: str) -> None:
    """NO is nitric oxide; only `true` and `false` are booleans."""
    assert value_of(word) == word


def test_only_the_json_booleans_are_booleans() -> None:
    """`true` and `false` in lower case."""
    assert value_of("true") is True
    assert value_of("false") is False


@pytest.mark.parametrize("word", ["12:30", "1:2:3", "190:20:30", "5:1"])
def test_a_time_or_a_ratio_is_no_number_to_base_sixty(word: str) -> None:
    """The stock loader makes 750 of 12:30."""
    assert value_of(word) == word


@pytest.mark.parametrize("word", ["010", "007", "-01", "00", "01.5"])
def test_a_leading_zero_is_refused(word: str) -> None:
    """010 is eight to one reader and ten to another."""
    problem = problem_of(f"x: {word}\n")
    assert problem.rule == "leading-zero"
    assert (problem.line, problem.column, problem.pointer) == (1, 4, "/x")


@pytest.mark.parametrize(
    ("word", "value"), [("1e-3", 0.001), ("1E3", 1000.0), ("1.0e3", 1000.0), ("-2.5", -2.5)]
)
def test_a_number_with_an_exponent_is_a_number(word: str, value: float) -> None:
    """The stock loader leaves 1e-3 and 1.0e3 as text."""
    assert value_of(word) == value


@pytest.mark.parametrize("word", ["0x10", "0o17", "0b11", "1_000", "+5", "1.", ".5", "1e", "٣"])
def test_what_is_no_json_number_is_text(word: str) -> None:
    """Hexadecimal, octal, grouped and half-written numbers stay what was written."""
    assert value_of(word) == word


@pytest.mark.parametrize("word", [".nan", ".NaN", ".inf", "-.inf", "+.INF", "1e999"])
def test_a_number_that_is_not_finite_is_refused(word: str) -> None:
    """Nothing that follows could compare with it."""
    assert problem_of(f"x: {word}\n").rule == "not-finite"


@pytest.mark.parametrize("word", ["9007199254740993", "-9007199254740993", "1" * 400])
def test_a_whole_number_beyond_exactness_is_refused(word: str) -> None:
    """The browser would round it."""
    assert problem_of(f"x: {word}\n").rule == "too-large"


def test_the_largest_exact_whole_number_is_taken() -> None:
    """2 to the 53rd is the boundary, and within it."""
    assert value_of("9007199254740992") == 2**53


@pytest.mark.parametrize("word", ["2026-01-02", "2026-01-02T03:04:05Z", "2026-01-02 03:04:05"])
def test_a_date_stays_text(word: str) -> None:
    """The schema judges it as text."""
    assert value_of(word) == word


@pytest.mark.parametrize("word", ["", "~", "null"])
def test_nothing_is_null(word: str) -> None:
    """A blank field is null, which the schema then refuses."""
    assert value_of(word) is None


@pytest.mark.parametrize("word", ["Null", "NULL", "None"])
def test_other_spellings_of_null_are_text(word: str) -> None:
    """Only JSON's null is null."""
    assert value_of(word) == word


def test_a_duplicate_key_is_refused_and_the_first_value_kept() -> None:
    """The stock loader keeps the last of two without a word."""
    raw, problems = read_yaml_text("a: 1\nb: 2\na: 3\n", "f.yaml")
    assert [(problem.rule, problem.line, problem.column) for problem in problems] == [("duplicate-key", 3, 1)]
    assert "line 1" in problems[0].hint
    assert raw is not None
    assert raw.data == {"a": 1, "b": 2}


def test_quoting_does_not_hide_a_duplicate_key() -> None:
    """`a` and `"a"` are one key."""
    assert problem_of('a: 1\n"a": 2\n').rule == "duplicate-key"


def test_an_alias_and_its_anchor_are_refused() -> None:
    """A value that stands elsewhere cannot be placed, and aliases of aliases grow without bound."""
    raw, problems = read_yaml_text("a: &x [1]\nb: *x\n", "f.yaml")
    assert [problem.rule for problem in problems] == ["anchor", "alias"]
    assert raw is not None
    assert raw.is_unreadable("/b")


def test_a_merge_key_is_refused() -> None:
    """Its fields stand in another record."""
    assert problem_of("a: 1\n<<: {b: 2}\n").rule == "merge-key"


def test_a_quoted_merge_sign_is_an_ordinary_key() -> None:
    """Only the plain sign merges."""
    raw, problems = read_yaml_text('"<<": 1\n', "f.yaml")
    assert problems == []
    assert raw is not None
    assert raw.data == {"<<": 1}


@pytest.mark.parametrize(
    "tag", ["!!python/object/apply:os.system [true]", "!!int '5'", "!own x", "!!set {a}"]
)
def test_a_tag_is_refused(tag: str) -> None:
    """A tag would make the reader build what the file asks for."""
    _, problems = read_yaml_text(f"x: {tag}\n", "f.yaml")
    assert "tag" in {problem.rule for problem in problems}


def test_a_tab_for_indentation_is_named() -> None:
    """It looks like spaces, so the message must say it."""
    problem = problem_of("a:\n\tb: 1\n")
    assert problem.rule == "tab"
    assert problem.line == 2
    assert "spaces" in problem.hint


@pytest.mark.parametrize("key", ["12", "true", "null", "1.5", "~"])
def test_a_key_that_is_no_text_is_refused(key: str) -> None:
    """Keys are names."""
    assert problem_of(f"{key}: x\n").rule == "key-not-text"


def test_a_key_that_is_a_list_is_refused() -> None:
    """JSON has no such keys."""
    assert problem_of("? [a, b]\n: x\n").rule == "key-not-text"


def test_a_second_document_is_refused() -> None:
    """It would be passed over."""
    problem = problem_of("a: 1\n---\nb: 2\n")
    assert (problem.rule, problem.line) == ("many-documents", 2)


@pytest.mark.parametrize("text", ["", "# only a comment\n", "\n\n"])
def test_a_file_without_data_is_refused(text: str) -> None:
    """An empty record is a mistake."""
    assert problem_of(text).rule == "empty-file"


@pytest.mark.parametrize(
    "character", ["\u202e", "\u200b", "\u200f", "\xad", "\ufeff", "\x00", "\x1b", "\u2028", "\x85"]
)
def test_characters_that_cannot_be_seen_are_refused(character: str) -> None:
    """A mark that reorders the line, or a zero-width blank, hides what a record says."""
    _, problems = read_yaml_text(f"x: a{character}b\n", "f.yaml")
    assert [problem.rule for problem in problems] == ["control-character"]


def test_an_escaped_control_character_is_refused() -> None:
    """Double quotes can spell what the text itself must not hold."""
    assert problem_of('x: "a\\u202eb"\n').rule == "control-character"


def test_a_byte_order_mark_is_no_part_of_the_first_key(tmp_path: Path) -> None:
    """Some editors write one."""
    path = tmp_path / "f.yaml"
    path.write_bytes(b"\xef\xbb\xbfname: x\n")
    raw, problems = read_yaml(path, "f.yaml")
    assert problems == []
    assert raw is not None
    assert raw.data == {"name": "x"}


def test_what_is_not_utf_8_is_placed(tmp_path: Path) -> None:
    """The byte is named with line and column."""
    path = tmp_path / "f.yaml"
    path.write_bytes("a: x\nb: µm\n".encode("latin-1"))
    raw, (problem,) = read_yaml(path, "f.yaml")
    assert raw is None
    assert (problem.rule, problem.line, problem.column) == ("not-utf-8", 2, 4)


def test_a_file_that_is_too_large_is_not_read(tmp_path: Path) -> None:
    """A record has a few kilobytes."""
    path = tmp_path / "f.yaml"
    path.write_bytes(b"#" * (MAX_BYTES + 1))
    raw, (problem,) = read_yaml(path, "f.yaml")
    assert raw is None
    assert problem.rule == "file-too-large"


def test_a_missing_file_is_a_problem_and_no_traceback(tmp_path: Path) -> None:
    """It may vanish between listing and reading."""
    raw, (problem,) = read_yaml(tmp_path / "none.yaml", "none.yaml")
    assert raw is None
    assert (problem.rule, problem.line) == ("unreadable-file", 0)


def test_nesting_without_end_is_refused() -> None:
    """Deep nesting would exhaust the stack."""
    assert problem_of("x: " + "[" * (MAX_DEPTH + 1) + "]" * (MAX_DEPTH + 1)).rule == "too-deep"
    raw, problems = read_yaml_text("[" * MAX_DEPTH + "]" * MAX_DEPTH, "f.yaml")
    assert problems == []
    assert raw is not None


@pytest.mark.parametrize(
    ("text", "word"), [("x: a: b\n", "quotes"), ("x: @y\n", "quotes"), ("x: > 5 nm\n", "quotes")]
)
def test_a_syntax_fault_says_how_to_mend_it(text: str, word: str) -> None:
    """The parser's words alone help nobody at a bench."""
    problem = problem_of(text)
    assert problem.rule == "syntax"
    assert word in problem.hint


def test_all_faults_of_a_file_are_found_in_one_run() -> None:
    """One run, all mistakes."""
    _, problems = read_yaml_text("a: 010\nb: .nan\nc: !x y\na: 1\n", "f.yaml")
    assert [problem.rule for problem in problems] == ["leading-zero", "not-finite", "tag", "duplicate-key"]


def test_places_count_from_one_and_follow_pointers() -> None:
    """Line and column of a value, of its key, and of what does not exist."""
    raw, _ = read_yaml_text("a:\n  - {b/c: x}\n", "f.yaml")
    assert raw is not None
    assert raw.positions.value("/a/0/b~1c") == (2, 11)
    assert raw.positions.key("/a/0/b~1c") == (2, 6)
    assert raw.positions.value("/a/0/none") == (2, 5)


def test_json_is_read_as_it_is() -> None:
    """A sample may be written as JSON."""
    raw, problems = read_yaml_text('{"a": [1, 2.5, true, null, "x"]}', "f.json")
    assert problems == []
    assert raw is not None
    assert raw.data == {"a": [1, 2.5, True, None, "x"]}


JSON = st.recursive(
    st.none()
    | st.booleans()
    | st.integers(-(2**53), 2**53)
    | st.floats(allow_nan=False, allow_infinity=False)
    | st.text(st.characters(min_codepoint=32, max_codepoint=126)),
    lambda inner: (
        st.lists(inner, max_size=4)
        | st.dictionaries(st.text("abcdefg_", min_size=1, max_size=5), inner, max_size=4)
    ),
    max_leaves=12,
)


@given(JSON)
def test_what_a_careful_writer_writes_is_read_back(data: object) -> None:
    """PyYAML quotes what its own loader would misread; we must read the same data."""
    text = yaml.safe_dump({"x": data}, default_style='"' if isinstance(data, str) else None)
    raw, _ = read_yaml_text(text, "f.yaml")
    if "!!" in text:  # double quotes force a tag on what is no text
        return
    assert raw is not None
    assert isinstance(raw.data, dict)
    assert raw.data["x"] == data


@given(st.text(max_size=60))
def test_no_text_ends_in_a_traceback(text: str) -> None:
    """Whatever is written, there is data or a problem, and both parsers agree on which and on the data."""
    fast, fast_problems = read_yaml_text(text, "f.yaml")
    assert fast is not None or fast_problems
    slow, slow_problems = read_yaml_text(text, "f.yaml", pure_python=True)
    if "\t" in text:  # of a tab after a value the slow parser is stricter than the YAML standard
        assert slow is not None or slow_problems
        return
    assert (fast and fast.data) == (slow and slow.data)
    assert bool(fast_problems) == bool(slow_problems)
