"""The demonstration lab, read and checked once."""

from __future__ import annotations

from collections.abc import Sequence
from pathlib import Path

import pytest

from builder.checking.lab_check import check_lab
from builder.problems import Problem
from builder.records.lab import LabRecords

LAB = Path(__file__).resolve().parents[2]


@pytest.fixture(scope="session")
def checked() -> tuple[LabRecords | None, Sequence[Problem]]:
    """The records and the problems of the lab in the project."""
    return check_lab(LAB)


@pytest.fixture(scope="session")
def records(checked: tuple[LabRecords | None, Sequence[Problem]]) -> LabRecords:
    """The records of the lab in the project, which has no errors."""
    found, problems = checked
    assert found is not None, problems
    return found
