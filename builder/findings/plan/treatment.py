"""A step that removes no target: a developer, a strip, a clean, for a fixed time."""

from __future__ import annotations

from dataclasses import replace

from builder.engine import UNKNOWN_SCHEDULE, Cut, Rank, Schedule, Span, Verdict
from builder.findings.plan.couples import couplings
from builder.findings.plan.evidence import Asked, Etching
from builder.findings.plan.exposures import Reaching, Timing, cases_of_treatment
from builder.findings.plan.facts import PlanFacts
from builder.findings.plan.judging import PlanCaps, judge, worst_of
from builder.findings.plan.option import gas_facts, is_through, phi_of, reaction_of, unstated
from builder.findings.plan.result import NoteCode, Option, Remark
from builder.findings.plan.row_order import ordered_rows
from builder.findings.plan.sample import PlanFilm, PlanSample, Stage, stages_of
from builder.records.terms import Role, Treatment

_UNKNOWN = Span(None, None, None)

WORKS_ON_RESIST = frozenset({Treatment.DEVELOP, Treatment.STRIP, Treatment.REWORK})
"""Treatments that are meant to dissolve resist: that it goes is no loss."""


def treatment_option(
    facts: PlanFacts, sample: PlanSample, removed: int, step: Treatment, etchant: str, time_s: float | None,
    asked: Asked,
) -> Option:  # fmt: skip
    """
    Return what a treatment does to every film that it reaches.

    The next target lies open in the mask's windows; what is below it is reached only through it.
    `removed` counts the targets that are gone. `time_s` None: the step states no time.
    """
    etching = Etching(facts.etchants[etchant], None)
    stage = _stage(sample, removed)
    timing = _fixed_timing(facts, etching, stage, time_s)
    plan, cut = timing.schedule, timing.cut
    reach = Reaching(facts, etching, asked, stage, timing)
    leaves_masks = step not in WORKS_ON_RESIST
    found = [
        replace(case, by_look=case.by_timer)  # in a fixed time there is nothing to look for
        for case in cases_of_treatment(reach, _open_films(sample, stage, removed), leaves_masks=leaves_masks)
    ]
    couples = couplings(reach, found)
    # The step sets the time, so no target's rate enters; but no own run has tried this chamber either.
    caps = PlanCaps(Rank.LITERATURE, couples.plan_caps, _UNKNOWN, _UNKNOWN)
    rows = ordered_rows(
        judge(reach, case, caps, couples.caps.get(case.film.film, ()), couples.lost.get(case.film.film))
        for case in found
    )
    best = Verdict.HOLDS if time_s is not None and not couples.plan_caps else Verdict.BORDERLINE
    return Option(
        recipe=None, etchant=etchant, method=reach.method, verdict=worst_of(rows, best),
        verdict_by_look=worst_of(rows, best, by_look=True), target=None, target_rank=Rank.NONE,
        target_band=None, schedule=plan, mode=None, undercut=_UNKNOWN, rows=rows,
        notes=(
            *_gas_notes(facts, etching, sample),
            *(Remark(NoteCode.HAZARD, {"words": words}) for words in etching.etchant.cautions),
            *couples.notes,
        ),
        unstated=tuple(unstated(reach, rows)), proven=False, hazard=etching.etchant.hazard,
        has_margin=False, phi=cut.nonuniformity, offset_s=0.0, overetch=0.0, caps=couples.plan_caps,
    )  # fmt: skip


def _stage(sample: PlanSample, removed: int) -> Stage:
    """The stage that comes next; after the last target, its edges and what is below it lie open."""
    stages = stages_of(sample)
    if removed < len(stages):
        return stages[removed]
    last = stages[-1]
    return replace(last, above=(last.target, *last.above))


def _open_films(sample: PlanSample, stage: Stage, removed: int) -> tuple[PlanFilm, ...]:
    """Films in the windows, top first: the next target and what is below it, or what the last one bared."""
    below = tuple(film for film in stage.below if film.role is not Role.TARGET)
    is_there = removed < len(stages_of(sample)) or not is_through(sample, stage.target)
    return (stage.target, *stage.below) if is_there else below


def _fixed_timing(facts: PlanFacts, etching: Etching, stage: Stage, time_s: float | None) -> Timing:
    thickness = stage.target.thickness_nm
    cut = Cut(
        depth_nm=thickness, thickness_nm=thickness, tolerance=0.0, nonuniformity=phi_of(facts, etching),
        offset_s=0.0, overetch=0.0, reaction_s=reaction_of(facts, etching), through=True,
    )  # fmt: skip
    if time_s is None:
        return Timing(None, cut, UNKNOWN_SCHEDULE)
    # Both clearings at the fixed time make the two exposures from the start equal to it.
    return Timing(None, cut, Schedule(time_s, time_s, time_s, None, time_s, None, None, None))


def _gas_notes(facts: PlanFacts, etching: Etching, sample: PlanSample) -> list[Remark]:
    return [
        Remark(NoteCode.GAS, {"words": fact.words}) for fact in gas_facts(etching, sample, facts.bond_words)
    ]
