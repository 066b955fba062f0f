"""Ten questions that practitioners bring, as samples of the lab: the word, and the reason in words."""

from __future__ import annotations

from collections.abc import Callable

import pytest

from builder.engine import Rank, Verdict
from builder.findings.plan.facts import PlanFacts
from builder.findings.plan.planning import plan, verdict_of
from builder.findings.plan.result import Option, Plan
from builder.findings.plan.sample import plan_sample
from builder.records.lab import LabRecords
from builder.records.terms import Barrier, Role
from builder.views.plan_words import excluded_words, note_words, reason, unstated_words
from tests.findings.fact_builder import row_of

Planned = Callable[[str], Plan]


@pytest.fixture
def planned(records: LabRecords, lab_facts: PlanFacts) -> Planned:
    """Return the plan of a sample of the lab by its name."""

    def made(name: str) -> Plan:
        sample = records.samples[name]
        return plan(lab_facts, plan_sample(sample, lab_facts.defaults), sample.steps, confidence=0.90)

    return made


def _by(plan_of: Plan, recipe: str, stage: int = 0) -> Option:
    (option,) = [one for one in plan_of.stages[stage].options if one.recipe == recipe]
    return option


def test_gold_pads_lift_in_buffered_hf_although_only_gold_is_named(planned: Planned) -> None:
    """The titanium that is usual under gold goes from its edge; the plan asks what the gold stands on."""
    made = planned("gold-pads-in-bhf")
    assert verdict_of(made) is not Verdict.HOLDS
    option = _by(made, "oxide-bhf")
    titanium = row_of(option, "ti")
    assert (option.verdict, titanium.verdict, titanium.assumed) == (Verdict.LOST, Verdict.LOST, True)
    assert reason(titanium) == "said to be attacked"
    assert "what lies under au (on: a film, or none)" in [unstated_words(item) for item in option.unstated]
    # Told in full, it is the same answer.
    assert row_of(_by(planned("gold-pads-titanium-named"), "oxide-bhf"), "ti").verdict is Verdict.LOST


def test_a_thin_nitride_stop_is_better_off_by_looking(planned: Planned) -> None:
    """By the timer the fast places wait for the slowest possible rate, by looking for the last place only."""
    made = planned("oxide-behind-thin-tin")
    option = _by(made, "oxide-bhf")
    row = row_of(option, "tin")
    assert (option.verdict, option.verdict_by_look) == (Verdict.BORDERLINE, Verdict.HOLDS)
    assert row.rank is Rank.LITERATURE
    assert reason(row) == "at worst 7.7\N{NO-BREAK SPACE}nm of 7.0\N{NO-BREAK SPACE}nm allowed"
    # Under a pinholed oxide looking does not help: the nitride may be wet from the start.
    via = row_of(_by(planned("oxide-over-thin-tin"), "oxide-pecvd-bhf"), "tin")
    assert (via.verdict, via.verdict_by_look) == (Verdict.BORDERLINE, Verdict.BORDERLINE)


def test_fine_lines_lose_their_footing_and_the_back_its_oxide(planned: Planned) -> None:
    """Two micrometres down are two micrometres in from both sides of a line of three."""
    option = _by(planned("fine-lines-in-thick-oxide"), "oxide-bhf")
    assert option.verdict is Verdict.LOST
    mask = reason(row_of(option, "resist-positive-a"))
    assert mask.startswith("a line of 3.0\N{NO-BREAK SPACE}µm loses at least")
    assert mask.endswith("and stands on nothing")
    back = row_of(option, "sio2-thermal-wet", Role.BACK)
    assert back.verdict is Verdict.LOST
    assert "2.0\N{NO-BREAK SPACE}µm (all of it)" in reason(back)


def test_a_boron_doped_stop_is_not_judged_by_plain_silicon(planned: Planned) -> None:
    """A statement that it resists is all there is of it, so it is never more than borderline."""
    made = planned("boron-membrane-in-koh")
    assert verdict_of(made) is Verdict.BORDERLINE
    option = _by(made, "silicon-koh")
    row = row_of(option, "si-p-plus-plus")
    assert option.target_rank is Rank.OWN
    assert (row.rank, row.loss.high, row.verdict) == (Rank.STATEMENT, None, Verdict.BORDERLINE)
    assert reason(row) == "said to withstand it; nobody measured how well"


def test_gold_decides_over_the_nickel_below_it(planned: Planned) -> None:
    """Whatever nickel alone does in iodide."""
    option = _by(planned("gold-on-nickel"), "gold-ki-i2")
    row = row_of(option, "ni")
    assert (option.verdict, row.verdict) == (Verdict.LOST, Verdict.LOST)
    assert reason(row).startswith("au touching ni: nickel in contact with gold is attacked")


def test_columnar_platinum_does_not_shield_titanium(planned: Planned, lab_facts: PlanFacts) -> None:
    """Sputtered platinum near an HF dip: titanium is lost, and no plan with HF holds."""
    made = planned("platinum-near-hf-dip")
    assert verdict_of(made) is Verdict.LOST
    assert lab_facts.films["pt"].barrier is Barrier.COLUMNAR
    titanium = row_of(_by(made, "oxide-hf-10-1"), "ti")
    assert reason(titanium).startswith("even the mild end takes")
    assert reason(row_of(_by(made, "oxide-bhf"), "ti")) == "said to be attacked"


def test_aluminium_pads_go_in_the_developer_and_its_rework(planned: Planned) -> None:
    """Before the etch begins, and twice; nobody knows how much is left for the etch."""
    made = planned("aluminium-pads-through-developer")
    assert verdict_of(made) is Verdict.LOST
    developers = [stage for stage in made.stages if stage.treat == "develop"]
    assert [row_of(stage.options[0], "al-si").verdict for stage in developers] == [Verdict.LOST] * 2
    assert reason(row_of(developers[0].options[0], "al-si")) == "said to be attacked"
    rework = next(stage for stage in made.stages if stage.treat == "rework").options[0]
    assert "nobody knows what an earlier step has taken" in reason(row_of(rework, "al-si"))


def test_aluminium_stays_out_of_chlorine_without_a_strip_in_the_tool(planned: Planned) -> None:
    """The gate recipe is left out by rule; the aluminium recipe, with its strip in the tool, is not."""
    made = planned("poly-gate-beside-aluminium")
    why = {item.recipe: excluded_words(item.reason) for item in made.stages[0].excluded}
    assert why["poly-rie-chlorine"].startswith("not allowed: Aluminium")
    assert "no passivation or strip before the rinse" in why["poly-rie-chlorine"]
    assert not [one for one in made.stages[0].options if one.recipe == "poly-rie-chlorine"]
    with_strip = planned("aluminium-without-strip")
    assert _by(with_strip, "aluminium-rie").verdict is Verdict.HOLDS
    # What a solvent does to the lines afterwards is another step, and nobody measured it.
    assert row_of(with_strip.stages[1].options[0], "al-cu").verdict is Verdict.UNMEASURED


def test_a_solvent_swells_the_polymer_under_an_oxide(planned: Planned) -> None:
    """The etch is one question, the strip another."""
    made = planned("oxide-on-polyimide")
    assert verdict_of(made) is not Verdict.HOLDS
    row = row_of(made.stages[1].options[0], "polyimide")
    assert row.verdict is Verdict.BORDERLINE
    assert "on record: it swells" in reason(row)


def test_a_chip_on_a_silicon_carrier_is_far_from_what_was_run(planned: Planned) -> None:
    """Half a square centimetre is no wafer; the cap names both loads, and lies on every film."""
    made = planned("chip-on-silicon-carrier")
    assert verdict_of(made) is Verdict.BORDERLINE
    option = _by(made, "silicon-deep")
    assert option.rows and all(
        "a load of 0.500\N{NO-BREAK SPACE}cm² is far from that of the runs, 16.0\N{NO-BREAK SPACE}cm²"
        in reason(row)
        for row in option.rows
    )
    assert any("nobody has shown that the rate stays the same" in note_words(note) for note in option.notes)
