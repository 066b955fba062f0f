"""A whole plan: one stage a target, or the steps of a sequence, each starting where the last one ended."""

from __future__ import annotations

import math
from collections.abc import Iterable, Sequence
from dataclasses import dataclass, replace

from builder.engine import Verdict
from builder.findings.plan.evidence import Asked
from builder.findings.plan.exposures import ORGANIC
from builder.findings.plan.facts import MeetingFact, PlanFacts, span_of
from builder.findings.plan.offers import etchant_offer, offers
from builder.findings.plan.result import (
    Excluded,
    ExcludedCode,
    NoteCode,
    Option,
    Plan,
    Remark,
    StagePlan,
)
from builder.findings.plan.sample import (
    PlanFilm,
    PlanSample,
    Stage,
    rounded,
    stages_of,
    temperature_span,
    worn,
)
from builder.findings.plan.treatment import treatment_option
from builder.records.samples import ANY_ETCH, SequenceStep
from builder.records.terms import Role, Treatment


@dataclass(frozen=True)
class _State:
    """A sample between steps: its films as they are now, and what it was last wet with."""

    sample: PlanSample
    removed: int
    wet_with: str | None


def plan(
    facts: PlanFacts,
    sample: PlanSample,
    steps: Sequence[SequenceStep] = (),
    *,
    confidence: float,
    etchant: str | None = None,
) -> Plan:
    """
    Return the plan of a sample.

    `confidence` must be one that the facts store. With `etchant`, one option by published facts alone:
    the facts must then hold no record of a lab (`gather.reference_only`).

    Raises
    ------
    KeyError
        The facts hold no intervals at that confidence, or no such etchant.
    """
    asked = Asked(confidence, sample.temperature)
    if steps and etchant is None:
        stages = _sequence(facts, sample, steps, asked)
    else:
        stages = _targets(facts, sample, asked, etchant)
    return Plan(sample.name, facts.as_of, confidence, stages, is_sequence=bool(steps) or len(stages) > 1)


def _targets(
    facts: PlanFacts, sample: PlanSample, asked: Asked, etchant: str | None
) -> tuple[StagePlan, ...]:
    stages: list[StagePlan] = []
    state = _State(sample, 0, None)
    for number in range(len(stages_of(sample))):
        stage = stages_of(state.sample)[number]
        planned = _etch_stage(facts, stage, asked, number + 1, None, etchant, state.wet_with)
        stages.append(planned)
        state = _after_etch(state, planned)
    return tuple(stages)


def _sequence(
    facts: PlanFacts, sample: PlanSample, steps: Sequence[SequenceStep], asked: Asked
) -> tuple[StagePlan, ...]:
    stages: list[StagePlan] = []
    state = _State(sample, 0, None)
    for number, step in enumerate(steps, start=1):
        own = temperature_span(span_of(step.temperature))
        here = asked if own is None else Asked(asked.confidence, own)
        if step.treat is not None:
            planned = _treat_stage(facts, state, step, here, number)
            state = _after_treatment(facts, state, planned, step)
        else:
            only = None if step.etch in (None, ANY_ETCH) else step.etch
            left = stages_of(state.sample)[state.removed :]
            if not left:
                # The depth ends above the target that this step was meant for.
                stages.append(StagePlan(number, None, None, None, (), ()))
                continue
            planned = _etch_stage(facts, left[0], here, number, only, None, state.wet_with)
            state = _after_etch(state, planned)
        stages.append(planned)
    return tuple(stages)


def _etch_stage(
    facts: PlanFacts,
    stage: Stage,
    asked: Asked,
    number: int,
    only: str | None,
    etchant: str | None,
    wet_with: str | None,
) -> StagePlan:
    if etchant is not None:
        options: tuple[Option, ...] = (etchant_offer(facts, stage, asked, etchant),)
        excluded: tuple[Excluded, ...] = ()
    else:
        options, excluded = offers(facts, stage, asked, only)
    options, clashing = _without_clashes(facts, options, wet_with)
    return StagePlan(number, stage.target.film, None, None, options, (*excluded, *clashing))


def _treat_stage(facts: PlanFacts, state: _State, step: SequenceStep, asked: Asked, number: int) -> StagePlan:
    assert step.treat is not None
    if step.etchant is None:
        return StagePlan(number, None, str(step.treat), None, (), ())
    time_s = None if step.time is None else rounded(step.time.number)
    option = treatment_option(facts, state.sample, state.removed, step.treat, step.etchant, time_s, asked)
    options, clashing = _without_clashes(facts, (option,), state.wet_with)
    return StagePlan(number, None, str(step.treat), step.etchant, options, clashing)


def _without_clashes(
    facts: PlanFacts, options: Iterable[Option], wet_with: str | None
) -> tuple[tuple[Option, ...], tuple[Excluded, ...]]:
    """Take out what must not meet the liquid that the sample comes from, and caution against the rest."""
    kept: list[Option] = []
    excluded: list[Excluded] = []
    for option in options:
        met = _met(facts, wet_with, option.etchant)
        params = [{"first": wet_with, "second": option.etchant, "words": fact.words} for fact in met]
        forbidden = [values for fact, values in zip(met, params, strict=True) if fact.forbidden]
        if forbidden:
            reason = Remark(ExcludedCode.MEETING, forbidden[0])
            excluded.append(Excluded(option.recipe, option.etchant, reason))
        else:
            notes = [Remark(NoteCode.MEETING, values) for values in params]
            kept.append(replace(option, notes=(*option.notes, *notes)))
    return tuple(kept), tuple(excluded)


def _met(facts: PlanFacts, first: str | None, second: str) -> list[MeetingFact]:
    """Rules on an etchant that meets what is left of another; the same one twice is no meeting."""
    if first is None or first == second:
        return []
    return [fact for fact in facts.meetings if (first, second) in fact.pairs]


def _after_etch(state: _State, stage: StagePlan) -> _State:
    """The films as the best option leaves them: each with its worst loss."""
    option = stage.options[0] if stage.options else None
    after = _cut(_worn_sample(state.sample, option), state.removed)
    # An etch ends with its own rinse; what it was etched with is no longer on the sample.
    return _State(after, state.removed + 1, None)


def _cut(sample: PlanSample, removed: int) -> PlanSample:
    """What is left of a target has fresh edges: what its open face had lost went with it."""
    target = stages_of(sample)[removed].target
    return replace(
        sample,
        layers=tuple(replace(film, spent_nm=0.0) if film is target else film for film in sample.layers),
    )


def _after_treatment(facts: PlanFacts, state: _State, stage: StagePlan, step: SequenceStep) -> _State:
    is_rinse = step.treat is Treatment.RINSE
    wet_with = None if is_rinse else step.etchant or state.wet_with
    if stage.etchant is None:
        return replace(state, wet_with=wet_with)
    option = stage.options[0] if stage.options else None
    after = _worn_sample(state.sample, option)
    if step.treat is Treatment.STRIP:
        after = _stripped(facts, after, state.removed)
    return _State(after, state.removed, wet_with)


def _stripped(facts: PlanFacts, sample: PlanSample, removed: int) -> PlanSample:
    """A strip leaves no resist; what is left of the targets under it then lies open."""
    layers = tuple(
        film
        for film in sample.layers
        if film.role is not Role.MASK or facts.films[film.film].family not in ORGANIC
    )
    if len(layers) == len(sample.layers) or any(film.role is Role.MASK for film in layers):
        return replace(sample, layers=layers)
    bared = [replace(stage.target, role=Role.EXPOSED) for stage in stages_of(sample)[:removed]]
    return replace(sample, layers=layers, exposed=(*sample.exposed, *bared))


def _worn_sample(sample: PlanSample, option: Option | None) -> PlanSample:
    def after(film: PlanFilm) -> PlanFilm:
        if option is None:
            return worn(film, None)
        losses = _losses(option, film, is_bottom=film is sample.layers[-1])
        if not losses:
            return film
        if film.may_vanish and None in losses:
            return worn(film, math.inf)
        return worn(film, None if None in losses else max(loss for loss in losses if loss is not None))

    return replace(
        sample,
        layers=tuple(map(after, sample.layers)),
        exposed=tuple(map(after, sample.exposed)),
        back=None if sample.back is None else after(sample.back),
    )


def _losses(option: Option, film: PlanFilm, *, is_bottom: bool) -> list[float | None]:
    """
    Return every worst loss on record of a film: the bottom layer loses at the back too.

    A target that is not yet removed is eaten in the windows, by a treatment or another target's overetch;
    afterwards at the edges that it was cut to.
    """
    roles = {Role.UNDER, Role.EXPOSED} if film.role is Role.TARGET else {film.role}
    roles |= {Role.BACK} if is_bottom else set()
    losses = [
        row.loss.high
        for row in option.rows
        if (row.film, row.thickness_nm) == (film.film, film.thickness_nm)
        and row.role in roles
        and not (row.assumed and row.role is Role.BACK)
    ]
    later = [
        one.loss_nm
        for one in option.later
        if film.role is Role.TARGET and (one.film, one.thickness_nm) == (film.film, film.thickness_nm)
    ]
    return [*losses, *later]


def verdict_of(planned: Plan) -> Verdict:
    """Return the worst word among the best options of all stages; unmeasured where a stage has none."""
    words = [
        stage.options[0].verdict if stage.options else Verdict.UNMEASURED
        for stage in planned.stages
        if stage.counts
    ]
    return max(words, key=lambda word: word.order, default=Verdict.UNMEASURED)
