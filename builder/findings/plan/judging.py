"""From an exposure to a word: the loss, what is allowed, what caps it, what loses a film at any number."""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass, replace

from builder.engine import (
    Exposure,
    Grounds,
    Rank,
    RateBand,
    Span,
    Verdict,
    Word,
    allowed_mask,
    allowed_other,
    allowed_under,
    capped,
    film_word,
    loss,
    worst,
)
from builder.findings.plan.evidence import Evidence, family_members
from builder.findings.plan.exposures import ORGANIC, Case, Reaching
from builder.findings.plan.result import CapCode, FilmRow, LostCode, Remark
from builder.records.terms import Effect, Method, Role

_MASK_FAILURES = frozenset({Effect.PEELS, Effect.SWELLS, Effect.CRACKS})
_CHAMBER = frozenset({Method.PLASMA, Method.CYCLIC, Method.VAPOUR})


@dataclass(frozen=True, slots=True)
class PlanCaps:
    """What holds for every film of an option: the target's rank, and caps on the plan as a whole."""

    target_rank: Rank
    caps: tuple[Remark, ...]
    undercut: Span
    undercut_by_look: Span


def judge(
    reach: Reaching, case: Case, plan: PlanCaps, extra: Sequence[Remark], lost: Remark | None
) -> FilmRow:
    """Return the row of one film; `extra` caps and `lost` come from couples."""
    film = reach.film(case.film.film)
    known = reach.evidence(case.film.film)
    allowed = allowed_loss(reach, case)
    span = loss(known.band, case.by_timer, reach.timing.cut.nonuniformity, case.faces)
    span_look = loss(known.band, case.by_look, reach.timing.cut.nonuniformity, case.faces)
    word = _word(reach, case, case.by_timer, plan.target_rank, allowed)
    word_look = _word(reach, case, case.by_look, plan.target_rank, allowed)
    lost = lost or _lost(reach, case, known, plan.undercut)
    lost_look = lost
    if lost is not None and lost.code == LostCode.LINE:
        lost_look = _line_lost(reach, plan.undercut_by_look)
    caps = _distinct([*case.caps, *_caps(reach, case, known, plan), *plan.caps, *extra])
    return FilmRow(
        film=film.id, role=case.role, thickness_nm=case.film.thickness_nm, exposure=case.by_timer,
        loss=span, loss_by_look=span_look, allowed_nm=allowed,
        verdict=_final(word, case.by_timer, caps, lost),
        verdict_by_look=_final(word_look, case.by_look, caps, lost_look),
        ground=word.ground, ground_by_look=word_look.ground, rank=known.rank, effects=known.adverse,
        caps=caps, lost=lost, hint=known.hint, assumed=case.film.assumed, spent_nm=case.film.spent_nm,
    )  # fmt: skip


def _distinct(caps: Sequence[Remark]) -> tuple[Remark, ...]:
    return tuple(sorted({cap.key: cap for cap in caps}.values(), key=lambda cap: cap.key))


def allowed_loss(reach: Reaching, case: Case) -> float | None:
    """Return what a film may still lose, nm: as stated, or by the lab's default; None where neither says."""
    film = case.film
    stated = film.allowed_nm
    least = _least_mask_nm(reach, case)
    if film.may_vanish and math.isinf(least):
        return math.inf
    if film.spent_nm is None:
        return None
    if stated is None:
        stated = _default_allowance(reach, case)
    if stated is None:
        return None
    return max(0.0, min(stated, least) - film.spent_nm)


def _least_mask_nm(reach: Reaching, case: Case) -> float:
    """The mask on the target protects no longer than its thinnest place lasts, whatever it may lose, nm."""
    protects = case.role is Role.MASK and reach.method is not Method.LIFT_OFF
    if not protects or case.film not in reach.stage.masks[:1]:
        return math.inf
    return case.film.thickness_nm * (1 - case.film.tolerance)


def _default_allowance(reach: Reaching, case: Case) -> float | None:
    rules, thickness = reach.facts.defaults.allowance, case.film.thickness_nm
    if case.film.assumed:
        return None
    if case.role is Role.MASK:
        organic = reach.film(case.film.film).family in ORGANIC
        in_plasma = reach.method in (Method.PLASMA, Method.CYCLIC)
        return allowed_mask(thickness, rules, resist_in_plasma=organic and in_plasma)
    if case.next_to_target:
        return allowed_under(thickness, rules)
    return allowed_other(thickness, rules)


def _word(
    reach: Reaching, case: Case, exposure: Exposure | None, target_rank: Rank, allowed: float | None
) -> Word:
    """The word of one film; of a family, the worst word of the films that may be meant."""
    film = reach.film(case.film.film)
    members = family_members(reach.facts, reach.etching, film, reach.asked) if film.is_family else []
    known = [reach.evidence(film.id)] if not members else [*members, reach.evidence(film.id)]
    words = [_of_evidence(reach, case, exposure, target_rank, allowed, one) for one in known]
    return max(words, key=lambda word: word.verdict.order)


def _of_evidence(
    reach: Reaching,
    case: Case,
    exposure: Exposure | None,
    target_rank: Rank,
    allowed: float | None,
    known: Evidence,
) -> Word:
    any_loss = allowed is not None and math.isinf(allowed)
    lost_above = _lost_above(reach, case)
    grounds = Grounds(known.rank, target_rank, known.attacked, bool(known.adverse), known.limit_s)
    span = loss(known.band, exposure, reach.timing.cut.nonuniformity, case.faces)
    return film_word(span, exposure, grounds, None if any_loss else allowed, lost_above, any_loss=any_loss)


def _lost_above(reach: Reaching, case: Case) -> float:
    """
    Return the loss beyond which a film without an allowance is lost, nm.

    A film too thin for a default is not better off than the thinnest one that has a default.
    """
    left = max(0.0, case.film.thickness_nm - (case.film.spent_nm or 0.0))
    if case.film.assumed:
        return left
    least = reach.facts.defaults.allowance.none_below_nm
    of_least = _default_allowance(reach, replace(case, film=replace(case.film, thickness_nm=least)))
    return left if of_least is None else min(left, of_least)


def _final(word: Word, exposure: Exposure | None, caps: Sequence[Remark], lost: Remark | None) -> Verdict:
    if lost is not None:
        return Verdict.LOST
    if any(cap.code == CapCode.BACK for cap in caps):
        # What covers the back decides, and nobody said what does: neither safe nor lost.
        return Verdict.UNMEASURED if exposure is None else Verdict.BORDERLINE
    return capped(word.verdict) if caps else word.verdict


def _lost(reach: Reaching, case: Case, known: Evidence, undercut: Span) -> Remark | None:
    if case.role is Role.MASK:
        failing = [effect for effect in known.adverse if effect in _MASK_FAILURES]
        if failing:
            return Remark(LostCode.MASK_FAILS, {"effect": str(failing[0])})
        if line := _line_lost(reach, undercut):
            return line
    if case.film.is_critical and Effect.ROUGHENS in known.adverse:
        return Remark(LostCode.ROUGHENED)
    return None


def _line_lost(reach: Reaching, undercut: Span) -> Remark | None:
    """A line etched under from both edges by its whole width stands on nothing."""
    line = reach.stage.sample.line_nm
    if line is None or undercut.low is None or line > 2 * undercut.low:
        return None
    return Remark(LostCode.LINE, {"line_nm": line, "undercut_nm": undercut.low})


def _caps(reach: Reaching, case: Case, known: Evidence, plan: PlanCaps) -> list[Remark]:
    caps = []
    if known.adverse:
        caps.append(Remark(CapCode.ADVERSE, {"effect": str(known.adverse[0])}))
    if known.conflict and known.single:
        caps.append(Remark(CapCode.CONFLICT))
    if reach.film(case.film.film).is_family:
        caps.append(Remark(CapCode.FAMILY))
    if case.film.spent_nm is None:
        caps.append(Remark(CapCode.EARLIER_LOSS))
    if reach.method in _CHAMBER and known.rank is Rank.LITERATURE and plan.target_rank is not Rank.OWN:
        caps.append(Remark(CapCode.PUBLISHED_CHAMBER))
    if case.role is Role.MASK:
        caps += _mask_caps(reach, case, plan)
    return caps


def _mask_caps(reach: Reaching, case: Case, plan: PlanCaps) -> list[Remark]:
    caps = _line_caps(reach, plan.undercut)
    recipe = reach.etching.recipe
    if reach.method in (Method.PLASMA, Method.CYCLIC):
        if recipe is None or not recipe.cooled:
            caps.append(Remark(CapCode.HEAT))
    else:
        caps += _adhesion_caps(reach, case)
    return caps


def _adhesion_caps(reach: Reaching, case: Case) -> list[Remark]:
    recipe, stop_s = reach.etching.recipe, reach.timing.schedule.latest_stop_s
    held = [
        mask.longest_s
        for mask in (() if recipe is None else recipe.masks)
        if mask.film == case.film.film and case.lies_on in mask.on
    ]
    on = case.lies_on or ""
    if held and stop_s is not None and max(held) >= stop_s:
        return []
    caps = [Remark(CapCode.ADHESION, {"on": on})]
    if held:
        caps = [Remark(CapCode.ADHESION_TIME, {"on": on, "held_s": max(held), "stop_s": stop_s})]
    # A mask that was seen to protect so long has shown that it lets nothing through.
    if reach.is_porous(case.film.film):
        caps.append(Remark(CapCode.BARRIER, {"film": case.film.film, "under": on}))
    return caps


def _line_caps(reach: Reaching, undercut: Span) -> list[Remark]:
    line = reach.stage.sample.line_nm
    if line is None or reach.method is Method.LIFT_OFF:
        return []
    recipe = reach.etching.recipe
    if undercut.high is None:
        return [Remark(CapCode.UNDERCUT_UNKNOWN)]
    if line <= 2 * undercut.high:
        return [Remark(CapCode.LINE, {"line_nm": line, "undercut_nm": undercut.high})]
    if recipe is None or recipe.ratio is None:
        return [Remark(CapCode.UNDERCUT_ASSUMED)]
    return []


def worst_of(rows: Sequence[FilmRow], best: Verdict, *, by_look: bool = False) -> Verdict:
    """Return the worst word of the rows, and never better than `best`."""
    return worst((row.verdict_by_look if by_look else row.verdict for row in rows), best)


def scaled(band: RateBand | None, ratio: Span) -> RateBand | None:
    """Return a rate sideways: each end times that of the ratio; None where the ratio is unknown."""
    if band is None or ratio.low is None:
        return None
    mid = None if band.mid is None or ratio.mid is None else band.mid * ratio.mid
    high = None if band.high is None or ratio.high is None else band.high * ratio.high
    return RateBand(band.low * ratio.low, mid, high)


def without_offset(exposure: Exposure | None, offset_s: float) -> Exposure | None:
    """Return an exposure less the time in which nothing is etched."""
    if exposure is None:
        return None
    mid = None if exposure.mid_s is None else max(0.0, exposure.mid_s - offset_s)
    return replace(
        exposure,
        low_s=max(0.0, exposure.low_s - offset_s),
        mid_s=mid,
        high_s=max(0.0, exposure.high_s - offset_s),
    )
