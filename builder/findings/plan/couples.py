"""Films of different metals, or metal and semiconductor, wet at once: a battery that no rate table knows."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass
from itertools import combinations

from builder.findings.plan.exposures import Case, Reaching
from builder.findings.plan.facts import CoupleFact, PlanFacts
from builder.findings.plan.result import CapCode, LostCode, NoteCode, Remark
from builder.findings.plan.sample import PlanFilm
from builder.records.terms import CoupleEffect, Electrical, Role


@dataclass(frozen=True, slots=True)
class Coupling:
    """What couples do to the films of one option, by film id; `notes` concern the target."""

    caps: dict[str, list[Remark]]
    lost: dict[str, Remark]
    plan_caps: tuple[Remark, ...]
    notes: tuple[Remark, ...]


def couplings(reach: Reaching, found: list[Case]) -> Coupling:
    """Return the caps and losses of every pair that is wet at the same time."""
    result = Coupling({}, {}, (), ())
    if not reach.is_wet:
        return result
    kept = {case.film.film for case in found}
    target = reach.stage.target.film
    plan_caps: list[Remark] = []
    notes: list[Remark] = []
    wet = sorted({*kept, target, *(film.film for film in _later_targets(reach))})
    supposed = _supposed(found)
    for pair in combinations(wet, 2):
        if not _is_battery(reach.facts, pair) or supposed.issuperset(pair):
            continue
        record = couple_of(reach.facts, pair, reach.etching.etchant.id)
        if record is None:
            cap = Remark(CapCode.COUPLE, {"one": pair[0], "other": pair[1]})
            touched = [film for film in pair if film in kept]
            for film in touched:
                result.caps.setdefault(film, []).append(cap)
            plan_caps += [] if touched else [cap]
        else:
            _apply(record, pair, kept, result, plan_caps, notes)
    return Coupling(result.caps, result.lost, tuple(plan_caps), tuple(notes))


def _supposed(found: list[Case]) -> set[str]:
    """Adhesion layers that may lie under a noble metal: one or another of them, so never a pair."""
    named = {case.film.film for case in found if not case.film.assumed}
    return {
        case.film.film for case in found if any(cap.code == CapCode.UNDER_NOBLE for cap in case.caps)
    } - named


def couple_of(facts: PlanFacts, pair: tuple[str, str], etchant: str) -> CoupleFact | None:
    """Return the record of two films in an etchant, whichever is named first; the gravest of several."""
    records = [
        couple for couple in facts.couples if set(couple.films) == set(pair) and etchant in couple.etchants
    ]
    gravity = {CoupleEffect.NONE: 0, CoupleEffect.UNDERCUT: 1, CoupleEffect.ATTACKS: 2}
    return max(records, key=lambda couple: gravity[couple.effect], default=None)


def _later_targets(reach: Reaching) -> Iterator[PlanFilm]:
    yield from (film for film in reach.stage.below if film.role is Role.TARGET)


def _is_battery(facts: PlanFacts, pair: tuple[str, str]) -> bool:
    kinds = [facts.films[film].electrical for film in pair]
    if Electrical.INSULATOR in kinds:
        return False
    # A film whose nature nobody stated may be a metal: only a pair of two semiconductors is harmless.
    return any(kind is not Electrical.SEMICONDUCTOR for kind in kinds)


def _apply(
    record: CoupleFact,
    pair: tuple[str, str],
    kept: set[str],
    result: Coupling,
    plan_caps: list[Remark],
    notes: list[Remark],
) -> None:
    values = {"one": pair[0], "other": pair[1], "words": record.words, "source": record.source}
    if record.effect is CoupleEffect.NONE:
        return
    affected = (record.affects,) if record.affects else pair
    for film in affected:
        if film not in kept:
            notes.append(Remark(NoteCode.COUPLE_TARGET, values))
        elif record.effect is CoupleEffect.ATTACKS:
            result.lost[film] = Remark(LostCode.COUPLE, values)
        else:
            result.caps.setdefault(film, []).append(Remark(CapCode.COUPLE_UNDERCUT, values))
    if not any(film in kept for film in affected):
        cap = Remark(CapCode.COUPLE_UNDERCUT, values)
        touched = [film for film in pair if film in kept]
        for film in touched:
            result.caps.setdefault(film, []).append(cap)
        plan_caps += [] if touched else [cap]
