"""The planner's data of the shipped records, and its model in a bare page of a real browser."""

from __future__ import annotations

import datetime
from collections.abc import Callable, Iterator
from dataclasses import dataclass
from pathlib import Path
from typing import Any

import pytest
from playwright.sync_api import Browser, Page

from builder.checking.lab_check import check_lab
from builder.findings.plan.facts import PlanFacts
from builder.findings.plan.gather import gather, reference_only
from builder.records.lab import LabRecords
from builder.views.planner_data import planner_data
from builder.views.planner_page import MODEL_SCRIPTS
from tests.browser import ROOT

TODAY = datetime.date(2026, 11, 15)
SCRIPTS = ROOT / "docs" / "assets" / "planner"
TYPEAHEAD = ROOT / "docs" / "assets" / "javascripts" / "typeahead.js"
ANSWERS = Path(__file__).with_name("answers.js")


@dataclass(frozen=True)
class PlannerLab:
    """The shipped records as both engines see them."""

    records: LabRecords
    facts: PlanFacts
    reference: PlanFacts


@pytest.fixture(scope="session")
def lab() -> PlannerLab:
    """The shipped lab's facts, as of a fixed day."""
    records, _ = check_lab(ROOT)
    assert records is not None
    return PlannerLab(records, gather(records, TODAY), gather(reference_only(records), TODAY))


@pytest.fixture(scope="session")
def data(lab: PlannerLab) -> dict[str, Any]:
    """The planner's data of the shipped lab."""
    return planner_data(lab.records, lab.facts, lab.reference)


@pytest.fixture(scope="module")
def model(browser: Browser) -> Iterator[Page]:
    """A bare page that holds the planner's model and nothing else."""
    page = browser.new_page()
    for name in MODEL_SCRIPTS:
        page.add_script_tag(path=SCRIPTS / f"{name}.js")
    page.add_script_tag(path=ANSWERS)
    yield page
    page.close()


@pytest.fixture
def with_data(model: Page, data: dict[str, Any]) -> Callable[[dict[str, Any]], Page]:
    """Gives the model data in which some facts are replaced."""

    def give(replaced: dict[str, Any]) -> Page:
        given = {**data, "facts": {**data["facts"], **replaced}}
        model.evaluate("(given) => { window.data = etchwright.data.read(given); }", given)
        return model

    return give
