"""An oracle of its own: every "holds" is traced to a number in the raw files, read without our reader."""

from __future__ import annotations

import csv
from pathlib import Path

import pytest
import yaml
from hypothesis import given, settings
from hypothesis import strategies as st

from builder.engine import Verdict
from builder.findings.plan.evidence import Asked
from builder.findings.plan.facts import PlanFacts
from builder.findings.plan.planning import plan
from builder.findings.plan.result import Option
from builder.findings.plan.sample import plan_sample
from builder.findings.plan.treatment import treatment_option
from builder.records.lab import LabRecords
from builder.records.terms import Treatment
from tests.findings.conftest import LAB
from tests.findings.worlds import Shipped, World, shipped_worlds

Pair = tuple[str, str]


def _own_pairs() -> set[Pair]:
    """Recipes with the films that their run files measured."""
    pairs = set()
    for path in (LAB / "recipes" / "runs").glob("*.csv"):
        lines = [line for line in path.read_text(encoding="utf-8").splitlines() if not line.startswith("#")]
        pairs |= {(path.stem, row["film"]) for row in csv.DictReader(lines) if row["before_nm"]}
    return pairs


def _literature_pairs(folder: Path) -> set[Pair]:
    """Etchants with the films of which a number was read in a text that quotes its source."""
    pairs = set()
    for path in folder.glob("rates/*.yaml"):
        record = yaml.load(path.read_text(encoding="utf-8"), yaml.BaseLoader)
        for entry in record["rates"]:
            is_number = "rate" in entry or {"detection_limit", "tested_time"} <= set(entry)
            if entry["rank"] == "literature" and entry["trust"] == "read" and is_number:
                pairs.add((record["etchant"], entry["film"]))
    return pairs


OWN = _own_pairs()
LITERATURE = _literature_pairs(LAB / "recipes" / "reference") | _literature_pairs(LAB / "recipes")


def unfounded(option: Option) -> list[str]:
    """Return every film that holds without a number of its own, or with no number for the target."""
    found = []
    for row in option.rows:
        if Verdict.HOLDS not in (row.verdict, row.verdict_by_look):
            continue
        for film in (row.film, option.target):
            is_own = (option.recipe, film) in OWN
            # A treatment removes no target: its time is that of the step.
            if film is not None and not is_own and (option.etchant, film) not in LITERATURE:
                found.append(
                    f"{option.recipe or option.etchant}: {row.film} holds, of {film} there is no number"
                )
    return found


def test_every_holds_of_the_samples_rests_on_a_number(records: LabRecords, lab_facts: PlanFacts) -> None:
    """Of this film in this etch, and of the target too."""
    options = [
        option
        for sample in records.samples.values()
        for stage in plan(
            lab_facts, plan_sample(sample, lab_facts.defaults), sample.steps, confidence=0.90
        ).stages
        for option in stage.options
    ]
    assert [line for option in options for line in unfounded(option)] == []
    held = [row for option in options for row in option.rows if row.verdict is Verdict.HOLDS]
    assert len(held) >= 20  # else there was nothing to trace


@pytest.fixture(scope="session")
def shipped(lab_facts: PlanFacts) -> st.SearchStrategy[World]:
    """Random samples in the recipes of the lab."""
    return shipped_worlds(Shipped(lab_facts))


@settings(max_examples=300, derandomize=True, deadline=None)
@given(data=st.data())
def test_every_holds_of_a_random_sample_rests_on_a_number(
    shipped: st.SearchStrategy[World], data: st.DataObject
) -> None:
    """By timer and by look, in a recipe or in an etchant alone."""
    assert unfounded(data.draw(shipped).option()) == []


@pytest.mark.parametrize("treatment", list(Treatment))
def test_no_treatment_holds_a_film_without_a_number(
    records: LabRecords, lab_facts: PlanFacts, treatment: Treatment
) -> None:
    """Every etchant as a treatment of one minute, on the films of the first sample."""
    seen = plan_sample(records.samples["pressure-membrane-3"], lab_facts.defaults)
    for etchant in lab_facts.etchants:
        option = treatment_option(lab_facts, seen, 0, treatment, etchant, 60.0, Asked(0.90, None))
        assert unfounded(option) == []
