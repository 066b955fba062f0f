"""
Strict YAML: JSON-like data only, with the place of every value and all faults at once.

A loader of our own over PyYAML's events, because the stock loader reads `NO` as false, `12:30` as
750 and `010` as 8, leaves `1e-3` as text, and keeps the last of two equal keys without a word.
"""

from __future__ import annotations

import re
from collections.abc import Iterator
from pathlib import Path
from typing import Protocol, cast

import yaml

from builder.problems import Problem, Severity
from builder.reading.raw import JsonValue, Place, Positions, Raw, join_pointer
from builder.reading.scalars import ScalarFault, plain_scalar
from builder.reading.text_files import VISIBLE, read_text

MAX_DEPTH = 64
"""Deepest nesting read; records nest about six deep."""

_FAST_LOADER = getattr(yaml, "CSafeLoader", yaml.SafeLoader)
_UNSEEN = re.compile(rf"[^\t\n\r{VISIBLE}]")


def read_yaml(path: Path, file: str) -> tuple[Raw | None, list[Problem]]:
    """
    Read one YAML (or JSON) file.

    `file` is the name shown in problems. Returns the data (None if there is none to go on with) and
    every problem found. Values that were refused stand as null and are listed in `Raw.unreadable`.
    """
    text = read_text(path, file)
    if isinstance(text, Problem):
        return None, [text]
    return read_yaml_text(text, file)


def read_yaml_text(text: str, file: str, *, pure_python: bool = False) -> tuple[Raw | None, list[Problem]]:
    """Read YAML from text, as `read_yaml`; `pure_python` takes the slow parser, with the same result."""
    if match := _UNSEEN.search(text):
        return None, [_unseen_character(text, match, file)]
    loader = yaml.SafeLoader if pure_python else _FAST_LOADER
    composer = _Composer(cast(Iterator[_Event], yaml.parse(text, loader)), file)
    try:
        data = composer.document()
    except yaml.YAMLError as error:
        return None, [*composer.problems, _syntax_problem(error, text, file)]
    except _GivenUpError:
        return None, composer.problems
    positions = Positions(composer.values, composer.keys)
    return Raw(data, positions, file, frozenset(composer.unreadable)), composer.problems


class _Mark(Protocol):
    """A place in the file, counted from 0."""

    line: int
    column: int


class _Event(Protocol):
    """A parser event; which of these attributes it has depends on its class."""

    start_mark: _Mark
    anchor: str | None
    tag: str | None
    implicit: tuple[bool, bool]
    style: str | None
    value: str


class _GivenUpError(Exception):
    """The rest of the file cannot be read; the reason is among the problems."""


class _Composer:
    """Builds plain data from parser events, noting places and problems on the way."""

    def __init__(self, events: Iterator[_Event], file: str) -> None:
        self.problems: list[Problem] = []
        self.values: dict[str, Place] = {}
        self.keys: dict[str, Place] = {}
        self.unreadable: set[str] = set()
        self._events = events
        self._file = file

    def document(self) -> JsonValue:
        """Return the data of the only document in the file."""
        next(self._events)  # the start of the stream
        event = next(self._events)
        if isinstance(event, yaml.StreamEndEvent):
            self._refuse(event, "", "empty-file", "the file holds no data")
            raise _GivenUpError
        data = self._node(next(self._events), "", 0)
        next(self._events)  # the end of the document
        event = next(self._events)
        if not isinstance(event, yaml.StreamEndEvent):
            words = "a second document starts here"
            self._refuse(event, "", "many-documents", words, "keep one record in a file")
        return data

    def _node(self, event: _Event, pointer: str, depth: int) -> JsonValue:
        mark = event.start_mark
        self.values[pointer] = (mark.line + 1, mark.column + 1)
        kind: type[object] = type(event)
        if kind is yaml.AliasEvent:
            words = f"*{event.anchor} repeats another value"
            self._refuse(event, pointer, "alias", words, "write the value out")
            self.unreadable.add(pointer)
            return None
        self._refuse_properties(event, pointer)
        if kind is yaml.ScalarEvent:
            return self._scalar(event, pointer)
        if depth >= MAX_DEPTH:
            self._refuse(event, pointer, "too-deep", f"values are nested more than {MAX_DEPTH} deep")
            raise _GivenUpError
        if kind is yaml.MappingStartEvent:
            return self._mapping(pointer, depth)
        return self._sequence(pointer, depth)

    def _sequence(self, pointer: str, depth: int) -> JsonValue:
        items: list[JsonValue] = []
        for event in self._events:
            if _is(event, yaml.SequenceEndEvent):
                break
            items.append(self._node(event, f"{pointer}/{len(items)}", depth + 1))
        return items

    def _mapping(self, pointer: str, depth: int) -> JsonValue:
        fields: dict[str, JsonValue] = {}
        for event in self._events:
            if _is(event, yaml.MappingEndEvent):
                break
            key = self._key(event, pointer, depth)
            if key is None:
                self._discard(next(self._events), pointer, depth)
                continue
            child = join_pointer(pointer, key)
            mark = event.start_mark
            if key in fields:
                hint = f"first given in line {self.keys[child][0]}"
                self._refuse(event, child, "duplicate-key", f'"{key}" is given twice', hint)
                self._discard(next(self._events), child, depth)
                continue
            self.keys[child] = (mark.line + 1, mark.column + 1)
            fields[key] = self._node(next(self._events), child, depth + 1)
        return fields

    def _key(self, event: _Event, pointer: str, depth: int) -> str | None:
        """Return the text of a key, or None after a problem; the events of the key are used up."""
        if not _is(event, yaml.ScalarEvent):
            self._refuse(event, pointer, "key-not-text", "a key must be plain text")
            if not _is(event, yaml.AliasEvent):
                self._discard(event, pointer, depth)
            return None
        key = event.value
        self._refuse_properties(event, pointer)
        if event.implicit[0] and event.tag is None:
            if key == "<<":
                self._refuse(event, pointer, "merge-key", "<< merges another record", "write the fields out")
                return None
            if not isinstance(plain_scalar(key), str):
                words = f"the key {key or '(empty)'} is not text"
                self._refuse(event, pointer, "key-not-text", words, "quote it")
                return None
        return None if self._has_control(event, pointer) else key

    def _scalar(self, event: _Event, pointer: str) -> JsonValue:
        text = event.value
        if event.tag is not None or self._has_control(event, pointer):
            self.unreadable.add(pointer)
            return None
        if not event.implicit[0]:
            return text
        value = plain_scalar(text)
        if isinstance(value, ScalarFault):
            self._refuse(event, pointer, value.rule, value.message, value.hint)
            self.unreadable.add(pointer)
            return None
        return value

    def _refuse_properties(self, event: _Event, pointer: str) -> None:
        if event.anchor is not None:
            words = f"&{event.anchor} names a value for repetition"
            self._refuse(event, pointer, "anchor", words, "remove it")
        if event.tag is not None:
            self._refuse(event, pointer, "tag", f"the tag {event.tag} is not allowed", "remove it")

    def _has_control(self, event: _Event, pointer: str) -> bool:
        # Only double quotes can spell such characters; elsewhere they were refused in the text.
        if event.style != '"' or not (match := _UNSEEN.search(event.value)):
            return False
        self._refuse(event, pointer, "control-character", f"the text holds the character {_code(match[0])}")
        return True

    def _discard(self, event: _Event, pointer: str, depth: int) -> None:
        """Read a value that has no place in the data, for its problems only."""
        values, keys, unreadable = self.values, self.keys, self.unreadable
        self.values, self.keys, self.unreadable = {}, {}, set()
        self._node(event, pointer, depth + 1)
        self.values, self.keys, self.unreadable = values, keys, unreadable

    def _refuse(self, event: _Event, pointer: str, rule: str, message: str, hint: str = "") -> None:
        mark = event.start_mark
        place = (mark.line + 1, mark.column + 1)
        self.problems.append(Problem(self._file, *place, pointer, Severity.ERROR, rule, message, hint))


def _is(event: object, kind: type[object]) -> bool:
    return type(event) is kind


def _unseen_character(text: str, match: re.Match[str], file: str) -> Problem:
    before = text[: match.start()]
    line, column = before.count("\n") + 1, len(before.rpartition("\n")[2]) + 1
    message = f"the file holds the character {_code(match[0])}, which cannot be seen"
    return Problem(file, line, column, "", Severity.ERROR, "control-character", message, "remove it")


def _code(character: str) -> str:
    return f"U+{ord(character):04X}"


def _syntax_problem(error: yaml.YAMLError, text: str, file: str) -> Problem:
    mark = getattr(error, "problem_mark", None) or getattr(error, "context_mark", None)
    words = getattr(error, "problem", None) or "the file is no YAML"
    if mark is None:
        return Problem(file, 1, 1, "", Severity.ERROR, "syntax", str(words))
    lines = text.splitlines() or [""]
    line = lines[mark.line] if mark.line < len(lines) else ""
    character = line[mark.column : mark.column + 1]
    rule = "tab" if character == "\t" else "syntax"
    hint = _syntax_hint(str(words), line, character)
    return Problem(file, mark.line + 1, mark.column + 1, "", Severity.ERROR, rule, str(words), hint)


def _syntax_hint(words: str, line: str, character: str) -> str:
    if character == "\t":
        return "indent with spaces, not with a tab"
    if re.search(r"[:-] +[>|]", line):
        return 'put text that starts with ">" or "|" in quotes'
    if "mapping values" in words:
        return 'put text that holds ": " in quotes'
    if character and character in "%@`":
        return f"put text that starts with {character} in quotes"
    return ""
