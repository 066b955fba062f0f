"""Strict CSV: a header, comma-separated rows of text, and the line and column of every field."""

from __future__ import annotations

import re
from dataclasses import dataclass
from pathlib import Path

from builder.problems import Problem, Severity, suggestion
from builder.reading.raw import JsonValue, Place, Positions, Raw, join_pointer
from builder.reading.text_files import VISIBLE, read_text

_FIELD = re.compile(r'[ \t]*"((?:[^"]|"")*)"[ \t]*|([^",]*)')
_UNSEEN = re.compile(rf"[^\t{VISIBLE}]")


@dataclass(frozen=True)
class Columns:
    """The columns a table may have, and those of them it must have."""

    known: tuple[str, ...]
    required: frozenset[str] = frozenset()


@dataclass(frozen=True)
class _Cell:
    text: str
    column: int


def read_csv(path: Path, file: str, columns: Columns | None = None) -> tuple[Raw | None, list[Problem]]:
    """
    Read one CSV file; `file` is the name shown in problems.

    The data is a list of rows, each a dict of text by column name; a blank field is left out of its
    row, for blank means not stated. `/12/before_nm` is the field of the thirteenth row. With
    `columns`, unknown and missing columns are problems; without, any are taken.
    """
    text = read_text(path, file)
    if isinstance(text, Problem):
        return None, [text]
    return read_csv_text(text, file, columns)


def read_csv_text(text: str, file: str, columns: Columns | None = None) -> tuple[Raw | None, list[Problem]]:
    """Read CSV from text, as `read_csv`. Lines before the header that start with `#` are comments."""
    lines = [line.removesuffix("\r") for line in text.split("\n")]
    start = next((index for index, line in enumerate(lines) if not _is_comment(line)), len(lines))
    table = _Table(file)
    if start == len(lines):
        table.refuse((0, 0), "", "empty-file", "the file holds no header")
        return None, table.problems
    names = table.header(lines[start], start + 1, columns)
    if names is not None:
        for index in range(start + 1, len(lines)):
            if lines[index].strip():
                table.row(lines[index], index + 1, names)
        table.leave_to_header(names, columns)
    comments = tuple(line.strip().removeprefix("#").strip() for line in lines[:start] if line.strip())
    return table.raw(comments) if names is not None else None, table.problems


def _is_comment(line: str) -> bool:
    return not line.strip() or line.lstrip().startswith("#")


class _Table:
    """Gathers rows, places and problems of one table."""

    def __init__(self, file: str) -> None:
        self.problems: list[Problem] = []
        self._file = file
        self._rows: list[JsonValue] = []
        self._places: dict[str, Place] = {}
        self._unreadable: set[str] = set()

    def raw(self, comments: tuple[str, ...]) -> Raw:
        """Return what was gathered."""
        return Raw(self._rows, Positions(self._places), self._file, frozenset(self._unreadable), comments)

    def header(self, line: str, number: int, columns: Columns | None) -> list[str | None] | None:
        """Return the column names (None for a refused column), or None if there is no usable header."""
        cells = self._cells(line, number, "")
        if cells is None:
            return None
        self._places[""] = (number, 1)
        if len(cells) == 1 and re.search(r"[;\t]", line):
            hint = "save the table with commas between fields"
            words = "the fields are not separated by commas"
            self.refuse((number, 1), "", "not-comma-separated", words, hint)
            return None
        names = [self._column_name(cell, number, cells[:index], columns) for index, cell in enumerate(cells)]
        for missing in _missing(names, columns):
            self.refuse((number, 1), "", "missing-column", f'the column "{missing}" is missing')
        return names

    def row(self, line: str, number: int, names: list[str | None]) -> None:
        """Add one row, in line `number` of the file."""
        pointer = f"/{len(self._rows)}"
        self._places[pointer] = (number, 1)
        fields: dict[str, JsonValue] = {}
        self._rows.append(fields)
        cells = self._cells(line, number, pointer)
        if cells is None:
            self._unreadable.add(pointer)
            return
        if len(cells) != len(names):
            hint = "comments belong above the header" if line.lstrip().startswith("#") else ""
            words = f"the row has {len(cells)} fields, the header has {len(names)}"
            self.refuse((number, 1), pointer, "ragged-row", words, hint)
            self._unreadable.add(pointer)
            return
        for name, cell in zip(names, cells, strict=True):
            if name is None:
                continue
            self._places[join_pointer(pointer, name)] = (number, cell.column)
            if cell.text:
                fields[name] = cell.text

    def leave_to_header(self, names: list[str | None], columns: Columns | None) -> None:
        """Note that a missing column is the header's fault, so that no row is blamed for it."""
        missing = _missing(names, columns)
        self._unreadable.update(
            join_pointer(f"/{index}", name) for index in range(len(self._rows)) for name in missing
        )

    def refuse(self, place: Place, pointer: str, rule: str, message: str, hint: str = "") -> None:
        """Note a problem."""
        self.problems.append(Problem(self._file, *place, pointer, Severity.ERROR, rule, message, hint))

    def _column_name(
        self, cell: _Cell, number: int, before: list[_Cell], columns: Columns | None
    ) -> str | None:
        place = (number, cell.column)
        if not cell.text:
            self.refuse(place, "", "unnamed-column", "a column has no name")
        elif any(other.text == cell.text for other in before):
            self.refuse(place, "", "duplicate-column", f'the column "{cell.text}" is given twice')
        elif columns is not None and cell.text not in columns.known:
            hint = suggestion(cell.text, columns.known)
            self.refuse(place, "", "unknown-column", f'there is no column "{cell.text}"', hint)
        else:
            return cell.text
        return None

    def _cells(self, line: str, number: int, pointer: str) -> list[_Cell] | None:
        """Return the fields of a line, or None after a problem."""
        if match := _UNSEEN.search(line):
            words = f"the line holds the character U+{ord(match[0]):04X}, which cannot be seen"
            self.refuse((number, match.start() + 1), pointer, "control-character", words, "remove it")
            return None
        cells = _split(line)
        if isinstance(cells, int):
            hint = 'a quoted field ends on its line; a quote inside it is written ""'
            self.refuse((number, cells), pointer, "stray-quote", "a quotation mark is out of place", hint)
            return None
        return cells


def _split(line: str) -> list[_Cell] | int:
    """Return the fields of a line, or the column where a quotation mark is out of place."""
    cells: list[_Cell] = []
    start = 0
    while match := _FIELD.match(line, start):
        end = match.end()
        if end < len(line) and line[end] != ",":
            return end + 1
        quoted, bare = match[1], match[2]
        # Blanks around a field are no part of it, and its place is where its text starts.
        text = (bare if quoted is None else quoted.replace('""', '"')).strip()
        cells.append(_Cell(text, start + 1 + len(match[0]) - len(match[0].lstrip())))
        if end == len(line):
            break
        start = end + 1
    return cells


def _missing(names: list[str | None], columns: Columns | None) -> list[str]:
    return [] if columns is None else sorted(columns.required.difference(name for name in names if name))
