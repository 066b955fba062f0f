"""What an etch does to one film beside its target, by the plan's own rules, without a sample at hand."""

from __future__ import annotations

from dataclasses import dataclass

from builder.engine import UNKNOWN_SCHEDULE, Cut, Rank, Schedule, Span, open_by_look, open_by_timer
from builder.findings.computed import Computed
from builder.findings.plan.evidence import Etching, Evidence
from builder.findings.plan.exposures import Case, Reaching, Timing
from builder.findings.plan.facts import PlanFacts
from builder.findings.plan.judging import PlanCaps, judge
from builder.findings.plan.option import phi_of, reaction_of
from builder.findings.plan.result import FilmRow
from builder.findings.plan.sample import PlanFilm, PlanSample, Stage
from builder.findings.recipe_times import TargetTiming
from builder.records.terms import Role

SIDE_FILM_NM = 1000.0
"""Thickness that pages take for a film that nobody has described."""

_NO_WAY = Span(None, None, None)


@dataclass(frozen=True, slots=True)
class _OneFilm(Reaching):
    """A reach in which only one film is asked for, and its evidence is known already."""

    known: Evidence

    def evidence(self, film: str) -> Evidence:
        """Evidence of the film."""
        return self.known


def row_at_latest_stop(
    computed: Computed, etching: Etching, timing: TargetTiming, film: str, role: Role = Role.EXPOSED
) -> FilmRow:
    """Return what a film loses until the latest stop of the target's usual depth."""
    cut = timing.cut(timing.usual_nm)
    times = Timing(timing.band, cut, timing.times(timing.usual_nm))
    return _row(computed, computed.facts, etching, times, timing.film, film, role, timing.known.rank)


def row_after(computed: Computed, etching: Etching, film: str, time_s: float | None) -> FilmRow:
    """Return what a film loses in a time that is set, from the start; None: nobody knows how long."""
    facts = computed.facts if etching.recipe is not None else computed.reference
    cut = Cut(
        depth_nm=SIDE_FILM_NM, thickness_nm=SIDE_FILM_NM, tolerance=0.0, nonuniformity=phi_of(facts, etching),
        offset_s=0.0, overetch=0.0, reaction_s=reaction_of(facts, etching), through=True,
    )  # fmt: skip
    fixed = UNKNOWN_SCHEDULE
    if time_s is not None:
        fixed = Schedule(time_s, time_s, time_s, None, time_s, None, None, None)
    # The time is set, so no target's rate makes it less sure; but a published number of a chamber counts
    # for this one only where the chamber has own runs of what it is for.
    rank = Rank.OWN if _has_own_target(computed, etching) else Rank.LITERATURE
    return _row(computed, facts, etching, Timing(None, cut, fixed), film, film, Role.EXPOSED, rank)


def _has_own_target(computed: Computed, etching: Etching) -> bool:
    recipe = etching.recipe
    if recipe is None:
        return False
    return any(computed.known(recipe.id, film).rank is Rank.OWN for film in recipe.targets)


def _row(
    computed: Computed,
    facts: PlanFacts,
    etching: Etching,
    timing: Timing,
    target: str,
    film: str,
    role: Role,
    target_rank: Rank,
) -> FilmRow:
    goal = PlanFilm(target, timing.cut.thickness_nm, Role.TARGET, timing.cut.tolerance)
    stage = Stage(PlanSample("", (goal,)), goal, (), ())
    known = computed.evidence(etching, film)
    reach = _OneFilm(facts, etching, computed.asked, stage, timing, known)
    side = PlanFilm(film, SIDE_FILM_NM, role, computed.facts.defaults.tolerance)
    case = Case(
        side, role, open_by_timer(timing.schedule), open_by_look(timing.schedule, timing.cut),
        lies_on=target if role is Role.MASK else None,
    )  # fmt: skip
    return judge(reach, case, PlanCaps(target_rank, (), _NO_WAY, _NO_WAY), (), None)
