"""One etch for one target on one sample: its times, every film's word, and what a reader must know beside."""

from __future__ import annotations

import math
import re
from collections.abc import Iterator, Sequence

from builder.engine import (
    Cut,
    Rank,
    RateBand,
    Span,
    Verdict,
    end_mode,
    loss,
    open_by_look,
    open_by_timer,
    schedule,
)
from builder.engine.plan_rules import GOOD_MARGIN, ISOTROPIC_UNDERCUT, RUN_SPAN
from builder.findings.plan.caps_of_plan import plan_caps, windows_of_runs
from builder.findings.plan.couples import couplings
from builder.findings.plan.defaults import default_phi
from builder.findings.plan.evidence import Asked, Etching, Evidence, evidence
from builder.findings.plan.exposures import Reaching, Timing, cases, later_targets
from builder.findings.plan.facts import EtchFacts, GasFact, PlanFacts
from builder.findings.plan.judging import PlanCaps, judge, scaled, without_offset, worst_of
from builder.findings.plan.result import (
    CapCode,
    FilmRow,
    LaterTarget,
    NoteCode,
    Option,
    Remark,
    UnstatedCode,
)
from builder.findings.plan.row_order import ordered_rows
from builder.findings.plan.sample import PlanFilm, PlanSample, Stage, depth_in
from builder.records.terms import Method, Role, State, Status


def plan_option(facts: PlanFacts, etching: Etching, stage: Stage, asked: Asked) -> Option:
    """Return what one etch does to a sample, whatever its verdict."""
    known = evidence(facts, etching, stage.target.film, asked)
    timing = timing_of(facts, etching, stage, known)
    reach = Reaching(facts, etching, asked, stage, timing)
    undercut, undercut_look = undercuts(reach)
    found = cases(reach)
    couples = couplings(reach, found)
    caps = (*plan_caps(reach, known), *couples.plan_caps)
    plan = PlanCaps(known.rank, caps, undercut, undercut_look)
    rows = ordered_rows(
        judge(reach, case, plan, couples.caps.get(case.film.film, ()), couples.lost.get(case.film.film))
        for case in found
    )
    best = Verdict.HOLDS if known.rank.can_hold and not caps else Verdict.BORDERLINE
    best = best if timing.schedule.known else Verdict.UNMEASURED
    verdict = worst_of(rows, best)
    recipe = etching.recipe
    return Option(
        recipe=None if recipe is None else recipe.id, etchant=etching.etchant.id, method=reach.method,
        verdict=verdict, verdict_by_look=worst_of(rows, best, by_look=True),
        target=stage.target.film, target_rank=known.rank, target_band=known.band, schedule=timing.schedule,
        mode=end_mode(
            timing.schedule, holds_by_timer=verdict is Verdict.HOLDS,
            endpoint=recipe is not None and recipe.endpoint,
        ),
        undercut=undercut, rows=rows,
        notes=tuple(_distinct([*_notes(reach, known), *couples.notes])),
        unstated=tuple(_distinct(unstated(reach, rows))),
        proven=recipe is not None and recipe.status is Status.PROVEN and known.rank is Rank.OWN,
        hazard=etching.etchant.hazard, has_margin=_has_margin(rows),
        phi=timing.cut.nonuniformity, offset_s=timing.cut.offset_s, overetch=timing.cut.overetch,
        later=tuple(_later(reach)), caps=caps, bares=_bared(stage),
    )  # fmt: skip


def _bared(stage: Stage) -> str | None:
    """Return the film that shows when the target has cleared, None where it does not or nothing is listed."""
    return stage.below[0].film if stage.below and is_through(stage.sample, stage.target) else None


def _later(reach: Reaching) -> Iterator[LaterTarget]:
    for case in later_targets(reach):
        film, phi = case.film, reach.timing.cut.nonuniformity
        lost = loss(reach.evidence(film.film).band, case.by_timer, phi)
        yield LaterTarget(film.film, film.thickness_nm, lost.high)


def timing_of(facts: PlanFacts, etching: Etching, stage: Stage, known: Evidence) -> Timing:
    """Return the times at which the target clears, with what fixes them."""
    recipe, target = etching.recipe, stage.target
    depth, through = depth_in(stage.sample, target), is_through(stage.sample, target)
    left, tolerance = left_of(target)
    band = known.band
    if target.spent_nm is None and band is not None:
        # Half of what may be left is no likely thickness, so no time is likely either.
        band = RateBand(band.low, None, band.high)
    cut = Cut(
        depth_nm=left if through or depth is None else depth,
        thickness_nm=left,
        tolerance=tolerance,
        nonuniformity=phi_of(facts, etching),
        offset_s=0.0 if recipe is None else recipe.offset_s,
        overetch=0.0 if recipe is None else recipe.overetch,
        reaction_s=reaction_of(facts, etching),
        through=through,
    )
    return Timing(band, cut, schedule(band, cut))


def is_through(sample: PlanSample, target: PlanFilm) -> bool:
    """Tell whether the whole target is removed."""
    depth = depth_in(sample, target)
    return depth is None or depth >= target.thickness_nm


def left_of(target: PlanFilm) -> tuple[float, float]:
    """
    Return the middle of what is left of a target, nm, and the half-width around it as a fraction.

    Earlier steps took between nothing and their worst loss, or nobody knows how much.
    """
    if target.spent_nm == 0:
        return target.thickness_nm, target.tolerance
    most = target.thickness_nm * (1 + target.tolerance)
    least = 0.0
    if target.spent_nm is not None:
        least = max(0.0, target.thickness_nm * (1 - target.tolerance) - target.spent_nm)
    return (most + least) / 2, (most - least) / (most + least)


def phi_of(facts: PlanFacts, etching: Etching) -> float:
    """Return the non-uniformity of an etch: the recipe's, else the lab's default for its method."""
    if etching.recipe is not None:
        return etching.recipe.phi
    etchant = etching.etchant
    return default_phi(facts.defaults, etchant.method, gas_bubbles=etchant.gas_bubbles)


def reaction_of(facts: PlanFacts, etching: Etching) -> float:
    """Return the time from seeing the end to stopping, s."""
    in_plasma = etching.etchant.state is State.PLASMA
    return facts.defaults.reaction_plasma_s if in_plasma else facts.defaults.reaction_wet_s


def undercuts(reach: Reaching) -> tuple[Span, Span]:
    """Return the way of one mask edge, nm, by timer and by look; unknown where no ratio is on record."""
    ratio, timing = _ratio(reach), reach.timing
    band = scaled(timing.band, ratio)
    ways = []
    for exposure in (open_by_timer(timing.schedule), open_by_look(timing.schedule, timing.cut)):
        etching_time = without_offset(exposure, timing.cut.offset_s)
        ways.append(loss(band, etching_time, timing.cut.nonuniformity))
    return ways[0], ways[1]


def is_isotropic(reach: Reaching) -> bool:
    """Tell whether an etch is on record as going sideways as fast as down."""
    recipe = reach.etching.recipe
    return reach.etching.etchant.isotropic if recipe is None else recipe.isotropic


def _ratio(reach: Reaching) -> Span:
    recipe = reach.etching.recipe
    if reach.method is Method.LIFT_OFF:
        return Span(None, None, None)
    if recipe is not None and recipe.ratio is not None:
        return Span(recipe.ratio.low, recipe.ratio.mid, recipe.ratio.high)
    if is_isotropic(reach):
        return Span(ISOTROPIC_UNDERCUT, ISOTROPIC_UNDERCUT, ISOTROPIC_UNDERCUT)
    return Span(None, None, None)


def _notes(reach: Reaching, known: Evidence) -> Iterator[Remark]:
    recipe, target = reach.etching.recipe, reach.stage.target
    if recipe is not None:
        if target.film not in recipe.targets:
            yield Remark(NoteCode.NOT_A_TARGET, {"film": target.film})
        if recipe.status is Status.DRAFT:
            yield Remark(NoteCode.DRAFT)
        yield from _time_note(reach, recipe)
    if known.conflict:
        yield Remark(NoteCode.CONFLICT)
    if known.far:
        yield Remark(NoteCode.FAR)
    own = None if recipe is None else recipe.own.get(target.film)
    if known.rank is Rank.OWN and own is not None and own.stale_days is not None:
        yield Remark(NoteCode.STALE, {"film": target.film, "days": own.stale_days})
    if known.all_temperatures:
        yield Remark(NoteCode.ALL_TEMPERATURES)
    if is_isotropic(reach) and (recipe is None or recipe.ratio is None) and reach.stage.masks:
        yield Remark(NoteCode.UNDERCUT_ASSUMED)
    for fact in gas_facts(reach.etching, reach.stage.sample, reach.facts.bond_words):
        yield Remark(NoteCode.GAS, {"words": fact.words})
    for words in (*(recipe.cautions if recipe else ()), *reach.etching.etchant.cautions):
        yield Remark(NoteCode.HAZARD, {"words": words})


def _time_note(reach: Reaching, recipe: EtchFacts) -> Iterator[Remark]:
    """A time far from those of the runs, where no depth series shows that the rate stays."""
    own, stop = recipe.own.get(reach.stage.target.film), reach.timing.schedule.latest_stop_s
    if own is None or stop is None or own.induction_s is not None:
        return
    if not RUN_SPAN[0] * own.times.low <= stop <= RUN_SPAN[1] * own.times.high:
        yield Remark(
            NoteCode.TIME_OUTSIDE_RUNS, {"stop_s": stop, "low_s": own.times.low, "high_s": own.times.high}
        )


def gas_facts(etching: Etching, sample: PlanSample, bond_words: str) -> list[GasFact]:
    """Return what the etchant, the films it reaches and the bond do to a person, forbidden ones first."""
    films = [*sample.layers, *sample.exposed, *([sample.back] if sample.back else [])]
    facts: list[GasFact] = []
    for film in films:
        own = (etching.recipe.gas if etching.recipe else etching.etchant.alone).get(film.film, ())
        facts += [
            fact
            for fact in (*own, *etching.etchant.gas.get(film.film, ()))
            if film.thickness_nm > fact.from_nm or fact.from_nm == 0
        ]
    if sample.bond is not None and bond_words and re.search(bond_words, sample.bond, re.IGNORECASE):
        facts += etching.etchant.bond
    return sorted(dict.fromkeys(facts), key=lambda fact: (not fact.forbidden, fact.words))


def unstated(reach: Reaching, rows: Sequence[FilmRow]) -> Iterator[Remark]:
    sample = reach.stage.sample
    if reach.reaches_back and sample.back is None and not sample.back_protected:
        yield Remark(UnstatedCode.BACK)
    if reach.reaches_back and sample.edge is None and any(row.role is Role.UNDER for row in rows):
        yield Remark(UnstatedCode.EDGE)
    for row in rows:
        for cap in row.caps:
            if cap.code == CapCode.UNDER_NOBLE:
                yield Remark(UnstatedCode.UNDER_NOBLE, {"film": cap.params["film"]})
        # What an earlier step took is not known there, and no allowance would help.
        if row.allowed_nm is None and not row.assumed and row.spent_nm is not None:
            yield Remark(UnstatedCode.ALLOWED, {"film": row.film})
    if reach.asked.temperature_k is None and reach.etching.temperature is None:
        yield Remark(UnstatedCode.TEMPERATURE)
    if sample.line_nm is None and reach.stage.masks and is_isotropic(reach):
        yield Remark(UnstatedCode.LINE)
    if sample.load_cm2 is None and reach.etching.etchant.state is State.PLASMA:
        yield Remark(UnstatedCode.LOAD)
    if sample.window_nm is None and windows_of_runs(reach) is not None:
        yield Remark(UnstatedCode.WINDOW)
    if sample.through_wafer and sample.carrier is None and not reach.stage.below:
        yield Remark(UnstatedCode.STOP)


def _has_margin(rows: Sequence[FilmRow]) -> bool:
    """Tell whether every film may lose at least twice what it loses at worst."""
    return all(
        row.allowed_nm is not None
        and row.loss.high is not None
        and (math.isinf(row.allowed_nm) or row.allowed_nm >= GOOD_MARGIN * row.loss.high)
        for row in rows
    )


def _distinct(remarks: Iterator[Remark] | Sequence[Remark]) -> list[Remark]:
    return list({remark.key: remark for remark in remarks}.values())
