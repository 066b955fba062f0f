"""The demonstration lab, read and checked once, and the facts that a plan draws from it."""

from __future__ import annotations

from pathlib import Path

import pytest

from builder.checking.lab_check import check_lab
from builder.findings.plan.facts import PlanFacts
from builder.findings.plan.gather import gather, reference_only
from builder.records.lab import LabRecords

LAB = Path(__file__).resolve().parents[2]


@pytest.fixture(scope="session")
def records() -> LabRecords:
    """The records of the lab in the project, which has no errors."""
    found, problems = check_lab(LAB)
    assert found is not None, problems
    return found


@pytest.fixture(scope="session")
def lab_facts(records: LabRecords) -> PlanFacts:
    """Everything a plan knows, on the lab's own day."""
    assert records.settings.as_of is not None
    return gather(records, records.settings.as_of)


@pytest.fixture(scope="session")
def reference_facts(records: LabRecords) -> PlanFacts:
    """Published facts alone."""
    assert records.settings.as_of is not None
    return gather(reference_only(records), records.settings.as_of)
