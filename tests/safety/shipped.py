"""The shipped records and the demonstration lab, checked once for all tests of safety."""

from __future__ import annotations

import functools
from pathlib import Path

from builder.checking.lab_check import check_lab
from builder.problems import format_text, has_errors
from builder.records.lab import LabRecords

ROOT = Path(__file__).resolve().parents[2]


@functools.cache
def shipped_records() -> LabRecords:
    """Return all records; an error among them fails the test that asks."""
    records, problems = check_lab(ROOT)
    assert records is not None, [format_text(one) for one in problems if has_errors([one])]
    return records
