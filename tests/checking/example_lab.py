"""The lab that example records are put into, one at a time, and what the check says of them then."""

from __future__ import annotations

import datetime
import functools
import re
from collections.abc import Iterator
from dataclasses import dataclass
from pathlib import Path, PurePosixPath

from builder.checking.lab_check import ShapedFile, check_records, shape
from builder.checking.schema_files import Schemas
from builder.problems import Problem
from builder.reading.csv_files import read_csv
from builder.reading.lab_tree import Kind, LabFiles, Origin, RawFile, find_shipped, read_lab
from builder.reading.yaml_files import read_yaml

EXAMPLES = Path(__file__).resolve().parents[1] / "example_records"
AS_OF = datetime.date(2026, 6, 1)
_STANDS_AT = re.compile(r"# stands at: (recipes/\S+)")


@dataclass(frozen=True)
class Example:
    """
    One example: a file, or a folder of files that stand together.

    The name is that of the rule; a second example of a rule is called `RULE--VARIANT`.
    """

    path: Path

    @property
    def rule(self) -> str:
        """The rule it shows, broken or kept."""
        return self.path.stem.partition("--")[0]

    @property
    def kind(self) -> str:
        """The kind of record, by its folder."""
        return self.path.parent.name

    def files(self) -> Iterator[tuple[Path, str]]:
        """Yield each file with the place it stands at in a lab."""
        if self.path.is_dir():
            for path in sorted(self.path.rglob("*.*")):
                yield path, path.relative_to(self.path).as_posix()
        else:
            yield self.path, _place(self.path)


def examples(folder: str) -> list[Example]:
    """Return every example below `valid` or `invalid`."""
    return [Example(path) for path in sorted((EXAMPLES / folder).glob("*/*"))]


def _place(path: Path) -> str:
    head = path.read_bytes()[:300].decode("utf-8", "replace")
    match = _STANDS_AT.search(head)
    return match[1] if match else f"recipes/{path.parent.name}/{path.name.replace('--', '-')}"


@functools.cache
def _schemas() -> Schemas:
    return Schemas(find_shipped().schemas)


@functools.cache
def _base() -> tuple[LabFiles, dict[str, ShapedFile]]:
    files = read_lab(EXAMPLES / "lab", columns=_schemas().run_columns())
    return files, {file.raw.file: shape(file, _schemas()) for file in files.files}


def problems_with(example: Example | None) -> list[Problem]:
    """Return every problem of the example lab with the example's files put in (or none)."""
    files, shaped = _base()
    shaped = dict(shaped)
    problems = list(files.problems)
    unread = []
    for path, place in example.files() if example else ():
        kind = _kind(place)
        if kind is Kind.RUNS:
            raw, faults = read_csv(path, place, _schemas().run_columns())
        else:
            raw, faults = read_yaml(path, place)
        problems += faults
        if raw is None:
            unread.append((str(kind), PurePosixPath(place).stem))
        else:
            file = RawFile(kind, PurePosixPath(place).stem, Origin.LAB, raw)
            shaped[place] = shape(file, _schemas())
    _, found = check_records(shaped.values(), problems, unread, AS_OF)
    return list(found)


def _kind(place: str) -> Kind:
    parts = PurePosixPath(place).parts
    return Kind(parts[1] if len(parts) > 2 else PurePosixPath(place).stem)
