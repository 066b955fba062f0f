"""A lab's folder to records and problems: read, compare with the schemas, build, apply the rules."""

from __future__ import annotations

import dataclasses
import datetime
from collections.abc import Iterable, Sequence
from dataclasses import dataclass
from pathlib import Path

from builder.checking.rule import Checked
from builder.checking.rules import RULES, WHOLE_RULES
from builder.checking.schema import check_shape
from builder.checking.schema_files import Schemas
from builder.checking.whole_records import whole_files
from builder.problems import Problem, Severity, has_errors, sorted_problems
from builder.reading.lab_tree import Kind, RawFile, Shipped, find_shipped, read_lab
from builder.records.lab import CheckedFile, LabRecords, build_lab
from builder.records.terms import Origin

_NO_SETTINGS = Problem(
    "recipes/reference/lab.yaml",
    0,
    0,
    "",
    Severity.ERROR,
    "no-reference",
    "the shipped settings are missing or cannot be used",
    "install the program again",
)


@dataclass(frozen=True)
class ShapedFile:
    """A file that was read, with its faults against the schema of its kind."""

    file: RawFile
    problems: tuple[Problem, ...]


def check_lab(
    lab_dir: Path | None, as_of: datetime.date | None = None, shipped: Shipped | None = None
) -> tuple[LabRecords | None, Sequence[Problem]]:
    """
    Read and check a lab and the shipped reference (without `lab_dir` the latter alone).

    Returns the records and every problem, sorted.

    The records are None if a problem is an error: a plan without the broken fact might call
    something safe. `as_of` None means the day of the lab's settings, else that of the clock.
    """
    shipped = find_shipped() if shipped is None else shipped
    schemas = Schemas(shipped.schemas)
    files = read_lab(lab_dir, columns=schemas.run_columns(), shipped=shipped)
    shaped = [shape(file, schemas) for file in files.files]
    return check_records(shaped, files.problems, files.unread, as_of)


def shape(file: RawFile, schemas: Schemas) -> ShapedFile:
    """Return the file with its faults against the schema of its kind."""
    return ShapedFile(file, tuple(check_shape(file.kind, file.raw, schemas)))


def check_records(
    shaped: Iterable[ShapedFile],
    problems: Iterable[Problem] = (),
    unread: Iterable[tuple[str, str]] = (),
    as_of: datetime.date | None = None,
) -> tuple[LabRecords | None, Sequence[Problem]]:
    """
    Apply the rules across records to files whose shape is known, as `check_lab`.

    `problems` are those of reading; `unread` are kind and id of files that gave no data at all.
    """
    shaped = tuple(shaped)
    found = [*problems, *(problem for item in shaped for problem in item.problems)]
    # A value that was refused stands as null, so its file is unfit although its shape may be right.
    refused = {problem.file for problem in found if has_errors([problem])}
    fit = [item.file for item in shaped if item.file.raw.file not in refused]
    if not any(_is_shipped_settings(file) for file in fit):
        return None, sorted_problems([*found, _NO_SETTINGS])
    unfit = [(str(item.file.kind), item.file.id) for item in shaped if item.file.raw.file in refused]
    records = build_lab(_checked_file(file) for file in fit)
    checked = Checked(
        records=records,
        raws={item.file.raw.file: item.file.raw for item in shaped},
        kinds={item.file.raw.file: str(item.file.kind) for item in shaped},
        broken=frozenset([*unread, *unfit]),
        today=as_of or records.settings.as_of or datetime.date.today(),
    )
    for rule in RULES:
        found += rule.problems(checked)
    if has_errors(found):
        whole = build_lab(_checked_file(file) for file in whole_files(fit))
        checked = dataclasses.replace(checked, records=whole)
    for rule in WHOLE_RULES:
        found += rule.problems(checked)
    return None if has_errors(found) else records, sorted_problems(found)


def _is_shipped_settings(file: RawFile) -> bool:
    return file.kind is Kind.LAB and Origin(str(file.origin)) is Origin.REFERENCE


def _checked_file(file: RawFile) -> CheckedFile:
    return CheckedFile(str(file.kind), file.id, Origin(str(file.origin)), file.raw.file, file.raw.data)
