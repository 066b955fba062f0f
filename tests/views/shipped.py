"""The demonstration lab and its findings, computed once for the tests of computed pages."""

from __future__ import annotations

import datetime
import functools

from builder.findings.computed import Computed, compute
from builder.records.lab import LabRecords
from tests.safety.shipped import shipped_records

DAY = datetime.date(2026, 11, 15)
RECIPES = sorted(shipped_records().etches)


@functools.cache
def lab() -> tuple[LabRecords, Computed]:
    """Return the records and what is computed from them."""
    records = shipped_records()
    return records, compute(records, DAY)
