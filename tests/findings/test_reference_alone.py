"""A plan by published facts alone: whatever a lab adds, alters or invents, the answer is the same."""

from __future__ import annotations

from dataclasses import replace
from typing import TypeVar

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from builder.findings.plan.facts import PlanFacts
from builder.findings.plan.gather import gather, reference_only
from builder.findings.plan.planning import plan
from builder.findings.plan.sample import plan_sample
from builder.records.lab import LabRecords
from builder.records.terms import CoupleEffect, Effect, Origin
from builder.views.plan_json import plan_data

T = TypeVar("T")
LAB_RECORD = {"origin": Origin.LAB}


def _altered(records: LabRecords, choice: st.DataObject) -> LabRecords:
    """The lab with its runs gone, doubled or kept, and with facts of its own invented from published ones."""
    etchants = sorted(records.rates)
    rates, statements, couples = dict(records.rates), dict(records.statements), dict(records.couples)
    for etchant in choice.draw(st.lists(st.sampled_from(etchants), max_size=4, unique=True)):
        mine = tuple(replace(fact, **LAB_RECORD) for fact in rates[etchant])
        rates[etchant] = (*mine, *rates[etchant]) if choice.draw(st.booleans()) else (*rates[etchant], *mine)
    for etchant in choice.draw(st.lists(st.sampled_from(sorted(statements)), max_size=4, unique=True)):
        effect = choice.draw(st.sampled_from(Effect))
        mine_said = tuple(replace(fact, effect=effect, **LAB_RECORD) for fact in statements[etchant])
        statements[etchant] = (*statements[etchant], *mine_said)
    for name in choice.draw(st.lists(st.sampled_from(sorted(couples)), max_size=3, unique=True)):
        effect_of = choice.draw(st.sampled_from(CoupleEffect))
        couples[f"invented-{name}"] = replace(couples[name], effect=effect_of, **LAB_RECORD)
    runs = choice.draw(st.sampled_from(({}, records.runs, {id: one * 2 for id, one in records.runs.items()})))
    etches = choice.draw(st.sampled_from(({}, records.etches)))
    return replace(
        records, rates=rates, statements=statements, couples=couples, runs=runs, etches=etches, spread=None
    )


@settings(max_examples=200, derandomize=True, deadline=None)
@given(data=st.data())
def test_nothing_of_the_lab_is_left(records: LabRecords, data: st.DataObject) -> None:
    """What a plan is gathered from is the same to the last record."""
    assert reference_only(_altered(records, data)) == reference_only(records)


def test_the_facts_name_no_recipe_and_no_run(reference_facts: PlanFacts, lab_facts: PlanFacts) -> None:
    """The demonstration lab's own etchants stay as names without facts; the defaults stay."""
    assert (reference_facts.etches, reference_facts.refused) == ({}, {})
    assert reference_facts.defaults == lab_facts.defaults
    of_lab = [one for id, one in reference_facts.etchants.items() if id.endswith("-lab")]
    assert of_lab and all(not one.rows and not one.said for one in of_lab)
    assert lab_facts.etches


@pytest.mark.parametrize("name", ["first-oxide-window", "gold-on-nickel", "soi-plate-release"])
def test_an_etchant_alone_is_one_option_without_a_recipe(
    records: LabRecords, reference_facts: PlanFacts, name: str
) -> None:
    """For every etchant, even where nothing tells the time; its answer is no lab's."""
    sample = plan_sample(records.samples[name], reference_facts.defaults)
    for etchant in reference_facts.etchants:
        data = plan_data(plan(reference_facts, sample, confidence=0.90, etchant=etchant))
        (option,) = data["options"]  # type: ignore[misc]
        assert (option["recipe"], option["etchant"]) == (None, etchant)
        assert "own" not in {option["target"]["rank"], *(row["rank"] for row in option["films"])}


def test_an_invented_rate_enters_a_recipe_but_not_an_etchant_alone(
    records: LabRecords, reference_facts: PlanFacts
) -> None:
    """Gold in buffered HF, invented: the lab's own plans know it, the published facts stay as they were."""
    assert records.settings.as_of is not None
    published = records.rates["bhf-5-1"]
    invented = replace(published[0], film="au", **LAB_RECORD)
    altered = replace(records, rates={**records.rates, "bhf-5-1": (*published, invented)})
    whole = gather(altered, records.settings.as_of)
    assert "au" in whole.etchants["bhf-5-1"].rows
    assert gather(reference_only(altered), records.settings.as_of) == reference_facts
