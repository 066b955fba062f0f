"""What the planner says of the samples: some plans hold, and the traps are not called safe."""

from __future__ import annotations

import pytest

from builder.engine import Verdict
from builder.findings.plan.facts import PlanFacts
from builder.findings.plan.gather import gather
from builder.findings.plan.planning import plan
from builder.findings.plan.result import Option
from builder.findings.plan.sample import plan_sample
from builder.records.lab import LabRecords

CONFIDENCE = 0.90


@pytest.fixture(scope="module")
def facts(records: LabRecords) -> PlanFacts:
    """The facts of the lab on its own day."""
    assert records.settings.as_of is not None
    return gather(records, records.settings.as_of)


def _options(records: LabRecords, facts: PlanFacts, name: str) -> list[Option]:
    sample = records.samples[name]
    planned = plan(facts, plan_sample(sample, facts.defaults), sample.steps, confidence=CONFIDENCE)
    return [option for stage in planned.stages for option in stage.options]


@pytest.mark.parametrize(
    ("name", "recipe"),
    [
        ("first-oxide-window", "oxide-bhf"),
        ("aluminium-lines", "aluminium-pan"),
        ("gold-on-titanium", "gold-ki-i2"),
        ("nitride-on-oxide", "nitride-hot-phosphoric"),
        ("soi-plate-release", "oxide-hf-vapour"),
    ],
)
def test_a_plan_holds_where_everything_was_run(
    records: LabRecords, facts: PlanFacts, name: str, recipe: str
) -> None:
    """Own runs of target, mask and what is below, and a mask seen to stay on."""
    verdicts = {option.recipe: option.verdict for option in _options(records, facts, name)}
    assert verdicts[recipe] is Verdict.HOLDS


@pytest.mark.parametrize(
    "name",
    [
        "boron-membrane-in-koh",
        "chip-on-silicon-carrier",
        "fine-lines-in-thick-oxide",
        "gold-on-chromium",
        "gold-on-nickel",
        "gold-pads-in-bhf",
        "gold-pads-titanium-named",
        "oxide-on-polyimide",
        "oxide-over-thin-tin",
        "platinum-near-hf-dip",
        "pressure-membrane-3",
        "silicon-membrane-timed",
    ],
)
def test_no_plan_of_a_trap_holds(records: LabRecords, facts: PlanFacts, name: str) -> None:
    """Each of these samples has a snare, and something to say of it."""
    options = _options(records, facts, name)
    assert options
    assert all(option.verdict is not Verdict.HOLDS for option in options)


@pytest.mark.parametrize(
    ("name", "recipe"),
    [
        ("gold-on-nickel", "gold-ki-i2"),
        ("gold-pads-titanium-named", "oxide-bhf"),
        ("pressure-membrane-3", "oxide-bhf"),
        ("platinum-near-hf-dip", "oxide-hf-10-1"),
        ("fine-lines-in-thick-oxide", "oxide-bhf"),
    ],
)
def test_a_known_loss_is_called_lost(records: LabRecords, facts: PlanFacts, name: str, recipe: str) -> None:
    """Nickel at gold, titanium, aluminium pads, a line narrower than the undercut."""
    verdicts = {option.recipe: option.verdict for option in _options(records, facts, name)}
    assert verdicts[recipe] is Verdict.LOST


def test_the_pads_are_lost_in_the_developer(records: LabRecords, facts: PlanFacts) -> None:
    """Before any etch begins."""
    first = _options(records, facts, "aluminium-pads-through-developer")[0]
    assert (first.etchant, first.verdict) == ("tmah-2-38", Verdict.LOST)
