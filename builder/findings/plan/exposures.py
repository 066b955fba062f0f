"""Which films of a sample an etch reaches, and for how long, by the timer and by looking."""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from dataclasses import dataclass, replace

from builder.engine import (
    Cut,
    Exposure,
    RateBand,
    Schedule,
    below,
    open_by_look,
    open_by_timer,
    under_by_look,
    under_by_timer,
)
from builder.engine.plan_rules import TWO_FACES
from builder.findings.plan.evidence import Asked, Etching, Evidence, evidence
from builder.findings.plan.facts import FilmFacts, PlanFacts
from builder.findings.plan.result import CapCode, Remark
from builder.findings.plan.sample import PlanFilm, Stage
from builder.records.terms import Barrier, Edge, Electrical, FilmFamily, Method, Role, State
from builder.records.terms import Exposure as Reach

ORGANIC = frozenset({FilmFamily.RESIST, FilmFamily.POLYMER})
"""Families that heat harms and that developers and strippers are made for."""

IMPLIED_ADHESION_NM = 10.0
"""Thickness taken for an adhesion layer that nobody named. Common practice, no source."""


@dataclass(frozen=True, slots=True)
class Timing:
    """The times of one etch of one target, with what fixes them."""

    band: RateBand | None
    cut: Cut
    schedule: Schedule


@dataclass(frozen=True, slots=True)
class Case:
    """
    One film that the etch reaches, before it is judged.

    Exposures None: the time is unknown. `next_to_target`: the film right under the target, which has
    an allowance of its own. `lies_on` is the film below it, None if nobody said.
    """

    film: PlanFilm
    role: Role
    by_timer: Exposure | None
    by_look: Exposure | None
    faces: float = 1.0
    next_to_target: bool = False
    lies_on: str | None = None
    caps: tuple[Remark, ...] = ()


@dataclass(frozen=True, slots=True)
class Reaching:
    """What decides where an etch gets: facts, the etch, what is asked, the stage and its times."""

    facts: PlanFacts
    etching: Etching
    asked: Asked
    stage: Stage
    timing: Timing

    @property
    def method(self) -> Method:
        """Method of the etch."""
        recipe = self.etching.recipe
        return self.etching.etchant.method if recipe is None else recipe.method

    @property
    def is_wet(self) -> bool:
        """Does a liquid reach every side of the sample?"""
        return self.etching.etchant.state is State.LIQUID

    @property
    def passes_pores(self) -> bool:
        """Does what etches get through a film that is not dense?"""
        return self.is_wet or self.etching.etchant.hf_vapour

    @property
    def reaches_back(self) -> bool:
        """Are the back and an open edge exposed from the start?"""
        return self.etching.etchant.state in (State.LIQUID, State.VAPOUR)

    def film(self, film: str) -> FilmFacts:
        """Facts of a film."""
        return self.facts.films[film]

    def evidence(self, film: str) -> Evidence:
        """Evidence for a film in this etch."""
        return evidence(self.facts, self.etching, film, self.asked)

    def is_porous(self, film: str) -> bool:
        """Does the etch pass this film before it is gone?"""
        return self.passes_pores and self.film(film).barrier is not Barrier.DENSE

    @property
    def from_start(self) -> tuple[Exposure | None, Exposure | None]:
        """Exposure of what is open from the start, by timer and by look, with the time in transfer."""
        recipe = self.etching.recipe
        transfer_s = 0.0 if recipe is None else recipe.transfer_s
        return (
            _longer(open_by_timer(self.timing.schedule), transfer_s),
            _longer(open_by_look(self.timing.schedule, self.timing.cut), transfer_s),
        )


def cases(reach: Reaching) -> list[Case]:
    """Return every film that should stay and that the etch reaches, or may reach."""
    found = (*_around(reach), *_under(reach))
    return [case for case in found if case.role is not Role.TARGET and _is_reached(case)]


def later_targets(reach: Reaching) -> list[Case]:
    """Return the targets of later stages that the etch reaches, or may reach, in its overetch."""
    return [case for case in _under(reach) if case.role is Role.TARGET and _is_reached(case)]


def cases_of_treatment(reach: Reaching, open_films: Sequence[PlanFilm], *, leaves_masks: bool) -> list[Case]:
    """
    Return every film that a treatment of fixed time reaches: `open_films` lie in the windows, top first.

    Each is reached when the one above is gone. Without `leaves_masks` the treatment is meant to work on
    resist, which is then not judged.
    """
    timer, look = reach.from_start
    found = [
        case
        for case in _around(reach)
        if leaves_masks or case.role is not Role.MASK or reach.film(case.film.film).family not in ORGANIC
    ]
    for place, film in enumerate(open_films):
        lies_on = open_films[place + 1].film if place + 1 < len(open_films) else None
        found.append(Case(replace(film, role=Role.UNDER), Role.UNDER, timer, look, lies_on=lies_on))
        timer, look = _beneath(reach, film, timer, look)
    return [case for case in found if _is_reached(case)]


def _around(reach: Reaching) -> Iterator[Case]:
    yield from _masks(reach)
    yield from _edges_of_earlier_targets(reach)
    yield from _exposed(reach)
    yield from _back(reach)


def _is_reached(case: Case) -> bool:
    # An exposure of nothing in the worst case is no exposure; one that nobody knows may be any.
    return case.by_timer is None or case.by_timer.high_s > 0


def _masks(reach: Reaching) -> Iterator[Case]:
    """Top mask first exposed; a mask below another is reached when that one is gone."""
    timer, look = reach.from_start
    order = [film for film in reversed(reach.stage.above) if film.role is Role.MASK]
    for place, mask in enumerate(order):
        lies_on = order[place + 1].film if place + 1 < len(order) else reach.stage.target.film
        yield Case(mask, Role.MASK, timer, look, lies_on=lies_on)
        timer, look = _beneath(reach, mask, timer, look)
        if place + 1 < len(order) or not reach.film(mask.film).noble:
            continue
        yield from _under_noble(reach, mask, lies_on)


def _edges_of_earlier_targets(reach: Reaching) -> Iterator[Case]:
    timer, look = reach.from_start
    for film in reach.stage.cut_targets:
        yield Case(replace(film, role=Role.EXPOSED, exposed=Reach.SIDEWALL), Role.EXPOSED, timer, look)


def _under(reach: Reaching) -> Iterator[Case]:
    """Films below the target, each reached when the one above is gone, or sideways from an open edge."""
    target, timing = reach.stage.target, reach.timing
    timer = under_by_timer(timing.schedule)
    look = under_by_look(timing.band, timing.schedule, timing.cut)
    start_timer, start_look = reach.from_start
    pores = reach.is_porous(target.film)
    if pores:
        timer, look = _at_once(timer, start_timer), _at_once(look, start_look)
    for place, film in enumerate(reach.stage.below):
        lies_on = reach.stage.below[place + 1].film if place + 1 < len(reach.stage.below) else None
        here = (timer, look)
        edge: tuple[Remark, ...] = ()
        if reach.reaches_back and reach.stage.sample.edge is Edge.OPEN:
            here = (_from_edge(timer, start_timer), _from_edge(look, start_look))
        elif reach.reaches_back and reach.stage.sample.edge is None:
            edge = (Remark(CapCode.EDGE),)
        is_kept = film.role is not Role.TARGET
        role = Role.UNDER if is_kept else Role.TARGET
        yield Case(film, role, *here, next_to_target=place == 0, lies_on=lies_on, caps=edge)
        if is_kept and reach.film(film.film).noble:
            yield from _under_noble(reach, film, lies_on)
        timer, look = _beneath(reach, film, *here)


def _exposed(reach: Reaching) -> Iterator[Case]:
    """Films anywhere else in reach, with what lies under them where the etch gets there."""
    timer, look = reach.from_start
    sample = reach.stage.sample
    named = {film.film for film in (*sample.layers, *sample.exposed)}
    in_stack = {film.film for film in sample.layers}
    for film in sample.exposed:
        faces = TWO_FACES if film.exposed is Reach.BOTH_FACES else 1.0
        yield Case(film, Role.EXPOSED, timer, look, faces, lies_on=film.on)
        if film.on is not None and not film.nothing_under and film.on not in named:
            # The film that a pad stands on: its edge is open all round the pad.
            yield _thin_case(reach, film.on, ())
        elif film.on in in_stack and film.on is not None:
            yield _thin_case(reach, film.on, (), None if reach.is_porous(film.film) else film)
        if reach.film(film.film).noble:
            yield from _under_noble(reach, film, film.on)


def _thin_case(reach: Reaching, film: str, caps: tuple[Remark, ...], pad: PlanFilm | None = None) -> Case:
    """What lies under a film: wet from the edge at once, or, in a stack, when the `pad` on it is gone."""
    timer, look = reach.from_start
    if pad is not None:
        timer, look = _beneath(reach, pad, timer, look)
    thin = PlanFilm(film, IMPLIED_ADHESION_NM, Role.EXPOSED, 0.0, exposed=Reach.SIDEWALL, assumed=True)
    return Case(thin, Role.EXPOSED, timer, look, caps=caps)


def _under_noble(reach: Reaching, film: PlanFilm, lies_on: str | None) -> Iterator[Case]:
    """The usual adhesion layers of a noble metal, where nobody said what is under it."""
    usual = reach.film(film.film).adhesion
    if not reach.passes_pores or not usual or film.nothing_under or film.on is not None:
        return
    if lies_on is not None and (lies_on in usual or reach.film(lies_on).electrical is Electrical.METAL):
        return
    for layer in usual:
        if layer in reach.facts.films:
            yield _thin_case(
                reach, layer, (Remark(CapCode.UNDER_NOBLE, {"film": film.film, "layer": layer}),)
            )


def _back(reach: Reaching) -> Iterator[Case]:
    sample = reach.stage.sample
    if not reach.reaches_back or sample.back_protected:
        return
    timer, look = reach.from_start
    bottom = sample.layers[-1]
    if sample.back is None:
        unknown = replace(bottom, role=Role.BACK, allowed_nm=None, assumed=True, exposed=Reach.FACE)
        yield Case(unknown, Role.BACK, timer, look, caps=(Remark(CapCode.BACK, {"film": bottom.film}),))
        return
    yield Case(sample.back, Role.BACK, timer, look, lies_on=bottom.film)
    if bottom.role is not Role.TARGET and bottom.film != sample.back.film:
        beneath = _beneath(reach, sample.back, timer, look)
        yield Case(replace(bottom, role=Role.BACK), Role.BACK, *beneath)


def _beneath(
    reach: Reaching, film: PlanFilm, timer: Exposure | None, look: Exposure | None
) -> tuple[Exposure | None, Exposure | None]:
    """Exposure of what lies below a film that is itself exposed so long."""
    band, porous = reach.evidence(film.film).band, reach.is_porous(film.film)
    cut = replace(reach.timing.cut, tolerance=film.tolerance)
    left = film.thickness_nm - (film.spent_nm or 0.0)
    thickness = max(0.0, left) if film.spent_nm is not None else 0.0
    return (
        None if timer is None else below(timer, band, thickness, cut, porous=porous),
        None if look is None else below(look, band, thickness, cut, porous=porous),
    )


def _longer(exposure: Exposure | None, by_s: float) -> Exposure | None:
    if exposure is None:
        return None
    mid = None if exposure.mid_s is None else exposure.mid_s + by_s
    return Exposure(exposure.low_s + by_s, mid, exposure.high_s + by_s)


def _at_once(exposure: Exposure | None, start: Exposure | None) -> Exposure | None:
    """Exposure through a film that may let the etchant pass: in the worst case from the start."""
    if exposure is None or start is None:
        return None
    return Exposure(exposure.low_s, exposure.mid_s, max(exposure.high_s, start.high_s))


def _from_edge(exposure: Exposure | None, start: Exposure | None) -> Exposure | None:
    """At an open edge a film is in the etch from the start; its face only later."""
    return None if exposure is None or start is None else start
