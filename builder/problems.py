"""What is wrong with the data, as values: one `Problem` a fault, in a stable order."""

from __future__ import annotations

import difflib
import enum
import json
import unicodedata
from collections.abc import Iterable
from dataclasses import dataclass

_CUTOFF = 0.72
"""Least likeness of a suggestion; below it, two-letter ids such as `au` and `ag` would suggest each other."""


class Severity(enum.StrEnum):
    """How grave a problem is: an error stops the build, a notice does not."""

    ERROR = "error"
    NOTICE = "notice"


@dataclass(frozen=True)
class Problem:
    """
    One fault in the data, with the place to mend it.

    `line` and `column` count from 1; 0 means the whole file (or folder). `pointer` is the JSON
    pointer of the value ("" for the whole record). `rule` is a stable hyphenated name. `hint` is a
    second clause ("did you mean ..."), or empty.
    """

    file: str
    line: int
    column: int
    pointer: str
    severity: Severity
    rule: str
    message: str
    hint: str = ""


def sorted_problems(problems: Iterable[Problem]) -> list[Problem]:
    """Return the problems without repeats, ordered by file, line, column, rule and message."""
    return sorted(set(problems), key=_order)


def _order(problem: Problem) -> tuple[str, int, int, str, str, str, str]:
    return (
        problem.file,
        problem.line,
        problem.column,
        problem.rule,
        problem.message,
        problem.pointer,
        problem.hint,
    )


def has_errors(problems: Iterable[Problem]) -> bool:
    """Tell whether any of the problems is an error (notices do not stop a build)."""
    return any(problem.severity is Severity.ERROR for problem in problems)


def format_text(problem: Problem) -> str:
    """Return the problem as one line, `file:line:column: severity rule: message; hint`."""
    place = problem.file
    if problem.line > 0:
        place = f"{place}:{problem.line}:{problem.column}"
    return _one_line(f"{place}: {problem.severity} {problem.rule}: {_sentence(problem)}")


def format_json(problems: Iterable[Problem]) -> str:
    """Return the problems as a JSON list of objects with the fields of `Problem`, in the given order."""
    rows = [
        {
            "file": _encodable(problem.file),
            "line": problem.line,
            "column": problem.column,
            "pointer": problem.pointer,
            "severity": str(problem.severity),
            "rule": problem.rule,
            "message": problem.message,
            "hint": problem.hint,
        }
        for problem in problems
    ]
    return json.dumps(rows, indent=2, ensure_ascii=True)


def format_github(problem: Problem) -> str:
    """Return the problem as a workflow command, which shows it beside the changed line of a review."""
    fields = [f"file={_command_field(problem.file)}"]
    if problem.line > 0:
        fields += [f"line={problem.line}", f"col={problem.column}"]
    fields.append(f"title={_command_field(problem.rule)}")
    return f"::{problem.severity} {','.join(fields)}::{_command_data(_sentence(problem))}"


def did_you_mean(word: str, known: Iterable[str]) -> str | None:
    """
    Return the known name most like `word`, or None if none is like it.

    Case, hyphens, underscores, spaces and the height of digits (SiO\u2082, SiO2) make no difference.
    """
    by_form: dict[str, str] = {}
    for name in sorted(known):
        by_form.setdefault(_form(name), name)
    form = _form(word)
    if form in by_form:
        return by_form[form]
    close = difflib.get_close_matches(form, by_form, n=1, cutoff=_CUTOFF)
    return by_form[close[0]] if close else None


def suggestion(word: str, known: Iterable[str]) -> str:
    """Return `did you mean "name"?` for the known name most like `word`, or an empty hint."""
    name = did_you_mean(word, known)
    return "" if name is None else f'did you mean "{name}"?'


def _form(name: str) -> str:
    letters = unicodedata.normalize("NFKC", name).casefold()
    return "".join(letter for letter in letters if letter.isalnum())


def _sentence(problem: Problem) -> str:
    return f"{problem.message}; {problem.hint}" if problem.hint else problem.message


def _one_line(text: str) -> str:
    # Record text is a stranger's: a line break would forge a second problem, an escape code would
    # repaint the terminal, a direction mark would reorder the line.
    return "".join(_shown(letter) for letter in _encodable(text))


def _shown(letter: str) -> str:
    if unicodedata.category(letter) in {"Cc", "Cf", "Zl", "Zp"}:
        return letter.encode("unicode_escape").decode("ascii")
    return letter


def _encodable(text: str) -> str:
    # File names may hold bytes that are no text; printing those would fail.
    return text.encode("utf-8", "backslashreplace").decode("utf-8")


def _command_data(text: str) -> str:
    escaped = _encodable(text).replace("%", "%25")
    return _one_line(escaped.replace("\r", "%0D").replace("\n", "%0A"))


def _command_field(text: str) -> str:
    return _command_data(text).replace(":", "%3A").replace(",", "%2C")
