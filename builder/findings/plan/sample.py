"""A sample as a plan sees it: films with thickness in nm, in the stage that is being planned."""

from __future__ import annotations

import math
from collections.abc import Iterable
from dataclasses import dataclass, replace

from builder.findings.plan.facts import Defaults, Span, span_of
from builder.records.quantities import Quantity
from builder.records.samples import NOTHING_UNDER, Sample, SampleFilm
from builder.records.terms import Edge, Exposure, Role, Surface

_DIGITS = 12
"""Digits kept of a length, so that 1.2 um and 1200 nm are one number to the last bit."""


@dataclass(frozen=True, slots=True)
class PlanFilm:
    """
    One film of a sample.

    `tolerance` is a fraction; `allowed_nm` None is not stated, infinite means it may vanish. `spent_nm`
    is what earlier steps have taken at worst (None: unknown). `on` "none" means that nothing lies
    under it, None that nobody said. `assumed` marks a film that the sample does not name.
    """

    film: str
    thickness_nm: float
    role: Role
    tolerance: float
    allowed_nm: float | None = None
    on: str | None = None
    is_critical: bool = False
    exposed: Exposure = Exposure.FACE
    spent_nm: float | None = 0.0
    assumed: bool = False

    @property
    def may_vanish(self) -> bool:
        """Is any loss of this film accepted?"""
        return self.allowed_nm is not None and math.isinf(self.allowed_nm)

    @property
    def nothing_under(self) -> bool:
        """Was it said that nothing lies between this film and its substrate?"""
        return self.on == NOTHING_UNDER


@dataclass(frozen=True, slots=True)
class PlanSample:
    """A sample: layers top first, exposed films, back, and what the plan may use."""

    name: str
    layers: tuple[PlanFilm, ...]
    exposed: tuple[PlanFilm, ...] = ()
    back: PlanFilm | None = None
    back_protected: bool = False
    edge: Edge | None = None
    depth_nm: float | None = None
    through_wafer: bool = False
    line_nm: float | None = None
    window_nm: float | None = None
    load_cm2: float | None = None
    methods: tuple[str, ...] = ()
    tools: tuple[str, ...] = ()
    etchants: tuple[str, ...] = ()
    hottest_k: float | None = None
    carrier: str | None = None
    bond: str | None = None
    temperature: Span | None = None


@dataclass(frozen=True, slots=True)
class Stage:
    """One target with what is above and below it, `above` and `below` ordered from the target outwards."""

    sample: PlanSample
    target: PlanFilm
    above: tuple[PlanFilm, ...]
    below: tuple[PlanFilm, ...]

    @property
    def masks(self) -> tuple[PlanFilm, ...]:
        """Films that protect, the one next to the target first."""
        return tuple(film for film in self.above if film.role is Role.MASK)

    @property
    def cut_targets(self) -> tuple[PlanFilm, ...]:
        """Targets of earlier stages: under a mask their edges stand in this etch."""
        return tuple(film for film in self.above if film.role is Role.TARGET) if self.masks else ()


def plan_sample(sample: Sample, defaults: Defaults, temperature_k: Span | None = None) -> PlanSample:
    """Return a checked sample as a plan sees it; `temperature_k` overrides the sample's own."""
    goal, limits = sample.goal, sample.limits
    hottest = span_of(limits.temperature)
    return PlanSample(
        name=sample.sample,
        layers=_films(sample.layers, defaults),
        exposed=_films(sample.also_exposed, defaults),
        back=None if sample.back is None else _film(sample.back, defaults),
        back_protected=sample.is_back_protected,
        edge=sample.edge,
        depth_nm=None if goal.depth is None else rounded(goal.depth.number),
        through_wafer=goal.is_through_wafer,
        line_nm=_number(goal.line),
        window_nm=_number(goal.window),
        load_cm2=goal.load_cm2,
        methods=tuple(str(method) for method in limits.methods),
        tools=limits.tools,
        etchants=limits.etchants,
        hottest_k=None if hottest is None else rounded(hottest.high),
        carrier=sample.mount.carrier,
        bond=sample.mount.bond,
        temperature=temperature_span(temperature_k or span_of(sample.temperature)),
    )


def stages_of(sample: PlanSample) -> tuple[Stage, ...]:
    """Return one stage a target that the depth reaches, in the order in which the layers are reached."""
    return tuple(
        Stage(sample, film, tuple(reversed(sample.layers[:place])), sample.layers[place + 1 :])
        for place, film in enumerate(sample.layers)
        if film.role is Role.TARGET and is_reached(sample, film)
    )


def depth_in(sample: PlanSample, target: PlanFilm) -> float | None:
    """Return how deep to go into a target, nm: the depth asked for less the targets above; None: through."""
    if sample.depth_nm is None:
        return None
    place = next(place for place, film in enumerate(sample.layers) if film is target)
    above = sum(film.thickness_nm for film in sample.layers[:place] if film.role is Role.TARGET)
    return rounded(sample.depth_nm - above)


def is_reached(sample: PlanSample, target: PlanFilm) -> bool:
    """Tell whether the depth asked for goes into a target at all."""
    depth = depth_in(sample, target)
    return depth is None or depth > 0


def worn(film: PlanFilm, loss_nm: float | None) -> PlanFilm:
    """Return a film after a step that took at worst `loss_nm` (None: nobody knows how much)."""
    if loss_nm is None or film.spent_nm is None:
        return replace(film, spent_nm=None)
    return replace(film, spent_nm=film.spent_nm + loss_nm)


def rounded(value: float) -> float:
    """Return a number to 12 digits: the unit it was written in must leave no trace."""
    return float(f"{value:.{_DIGITS}g}")


def temperature_span(span: Span | None) -> Span | None:
    """Return a span of temperatures with no trace of the unit it was written in."""
    return None if span is None else Span(low=rounded(span.low), high=rounded(span.high))


def _films(films: Iterable[SampleFilm], defaults: Defaults) -> tuple[PlanFilm, ...]:
    return tuple(_film(film, defaults) for film in films)


def _film(film: SampleFilm, defaults: Defaults) -> PlanFilm:
    thickness = rounded(film.thickness_nm)
    half = film.tolerance_nm
    allowed = film.allowed_loss_nm
    return PlanFilm(
        film=film.film,
        thickness_nm=thickness,
        role=film.role,
        tolerance=defaults.tolerance if half is None else rounded(rounded(half) / thickness),
        allowed_nm=allowed if allowed is None or math.isinf(allowed) else rounded(allowed),
        on=film.on,
        is_critical=film.surface is Surface.CRITICAL,
        exposed=film.exposed or Exposure.FACE,
    )


def _number(quantity: Quantity | None) -> float | None:
    return None if quantity is None else rounded(quantity.number)
