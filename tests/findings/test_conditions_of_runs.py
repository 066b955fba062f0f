"""What was measured under other conditions, or not at all, never becomes "holds"."""

from __future__ import annotations

from dataclasses import replace

import pytest

from builder.engine import Rank, Verdict
from builder.findings.plan.facts import PlanFacts, Span
from builder.findings.plan.planning import plan, verdict_of
from builder.findings.plan.result import CapCode, Option, Plan
from builder.findings.plan.sample import PlanSample, plan_sample
from builder.records.lab import LabRecords
from builder.records.samples import SequenceStep
from builder.records.terms import Treatment

RECIPE = "oxide-bhf"


@pytest.fixture
def window(records: LabRecords, lab_facts: PlanFacts) -> PlanSample:
    """Return the one sample of the lab that holds in buffered HF."""
    return plan_sample(records.samples["first-oxide-window"], lab_facts.defaults)


def _option(facts: PlanFacts, sample: PlanSample, recipe: str = RECIPE) -> Option:
    made = plan(facts, sample, confidence=0.90)
    (option,) = [one for one in made.stages[0].options if one.recipe == recipe]
    return option


def _with_runs_at(facts: PlanFacts, ran: Span | None, recipe: Span | None) -> PlanFacts:
    """The same facts with every run of the recipe at another temperature, and the recipe too."""
    etch = facts.etches[RECIPE]
    own = {film: replace(fact, temperature=ran) for film, fact in etch.own.items()}
    changed = replace(etch, own=own, temperature=recipe)
    return replace(facts, etches={**facts.etches, RECIPE: changed})


def test_the_sample_holds_before_anything_is_changed(lab_facts: PlanFacts, window: PlanSample) -> None:
    """Without this the tests below could not fail."""
    assert _option(lab_facts, window).verdict is Verdict.HOLDS


def test_runs_at_no_known_temperature_answer_no_temperature(lab_facts: PlanFacts, window: PlanSample) -> None:
    """Neither the runs nor the recipe say how warm it was, and 60 degrees Celsius are asked for."""
    facts = _with_runs_at(lab_facts, None, None)
    asked = replace(window, temperature=Span(low=333.15, high=333.15))
    assert _option(facts, asked).target_rank is not Rank.OWN


def test_runs_far_from_the_temperature_of_the_recipe_do_not_count(
    lab_facts: PlanFacts, window: PlanSample
) -> None:
    """The recipe is held at 20 degrees Celsius, and the runs were at 45."""
    facts = _with_runs_at(lab_facts, Span(low=318.15, high=318.15), Span(low=293.15, high=293.15))
    option = _option(facts, window)
    assert option.target_rank is not Rank.OWN
    assert option.verdict is not Verdict.HOLDS


def test_a_limit_on_heat_needs_an_etch_of_known_temperature(lab_facts: PlanFacts, window: PlanSample) -> None:
    """A recipe that does not say how warm it is cannot be cool enough."""
    facts = _with_runs_at(lab_facts, None, None)
    option = _option(facts, replace(window, hottest_k=303.15))
    assert option.verdict is Verdict.BORDERLINE
    assert CapCode.HEAT_LIMIT in {cap.code for cap in option.caps}


@pytest.mark.parametrize(("window_nm", "is_capped"), [(10_000.0, True), (60_000.0, False), (1e6, True)])
def test_an_opening_unlike_those_of_the_runs_is_borderline(
    records: LabRecords, lab_facts: PlanFacts, window_nm: float, is_capped: bool
) -> None:
    """The runs of the standard deep etch that count were in openings of 100 um."""
    sample = plan_sample(records.samples["chip-on-silicon-carrier"], lab_facts.defaults)
    option = _option(lab_facts, replace(sample, window_nm=window_nm), "silicon-deep")
    assert (CapCode.WINDOW in {cap.code for cap in option.caps}) is is_capped


def test_a_mask_that_may_vanish_still_has_to_last(lab_facts: PlanFacts, window: PlanSample) -> None:
    """Half a nanometre of resist that nobody needs afterwards protects nothing."""
    mask, *rest = window.layers
    for thin in (
        replace(mask, thickness_nm=0.5, allowed_nm=float("inf")),
        replace(mask, tolerance=1 - 1e-4, allowed_nm=mask.thickness_nm),
    ):
        sample = replace(window, layers=(thin, *rest))
        assert _option(lab_facts, sample).verdict is not Verdict.HOLDS


def _sequence(facts: PlanFacts, sample: PlanSample, treat: Treatment) -> Plan:
    return plan(facts, sample, (SequenceStep(treat=treat), SequenceStep(etch=RECIPE)), confidence=0.90)


def test_a_treatment_with_nobody_knows_what_is_unmeasured(lab_facts: PlanFacts, window: PlanSample) -> None:
    """A rinse is one in water; a developer without a name may take anything."""
    assert _sequence(lab_facts, window, Treatment.RINSE).holds
    developed = _sequence(lab_facts, window, Treatment.DEVELOP)
    assert verdict_of(developed) is Verdict.UNMEASURED
    assert not developed.holds


def test_what_lies_under_a_pad_that_vanishes_is_reached(lab_facts: PlanFacts, window: PlanSample) -> None:
    """A thin oxide pad may go; the aluminium of the stack under it then lies open."""
    mask, target, under = window.layers
    aluminium = replace(under, film="al-si", thickness_nm=500.0)
    pad = replace(target, thickness_nm=20.0, allowed_nm=float("inf"), on="al-si")
    sample = replace(window, layers=(mask, target, under, aluminium), exposed=(pad,))
    assert _option(lab_facts, sample).verdict is Verdict.LOST


def test_a_depth_is_counted_through_all_targets(lab_facts: PlanFacts, window: PlanSample) -> None:
    """300 nm through 100 nm of one film leave 200 nm for the next, and none for a film below that."""
    mask, target, under = window.layers
    first, second = replace(target, thickness_nm=100.0), replace(target, thickness_nm=400.0)
    deep = replace(window, layers=(mask, first, second, under), depth_nm=300.0)
    _, stage = plan(lab_facts, deep, confidence=0.90).stages
    alone = replace(window, layers=(mask, replace(target, thickness_nm=400.0), under), depth_nm=200.0)
    (option,) = [one for one in stage.options if one.recipe == RECIPE]
    assert option.schedule.latest_stop_s == pytest.approx(_option(lab_facts, alone).schedule.latest_stop_s)
    shallow = replace(deep, depth_nm=80.0)
    assert len(plan(lab_facts, shallow, confidence=0.90).stages) == 1
