"""
Random samples in an etch, for laws that hold whatever the numbers are.

A world is an etch with what is known of films in it, and a sample put into it: "built" worlds are made
up from the films of the fact builder, "shipped" ones are samples in a recipe of the lab in the project.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass, replace

from hypothesis import strategies as st

from builder.engine import PublishedKind, Rank
from builder.findings.plan.evidence import Asked, Etching
from builder.findings.plan.facts import (
    CoupleFact,
    EtchFacts,
    OwnFact,
    PlanFacts,
    PublishedFact,
    RatioFact,
    SaidFact,
)
from builder.findings.plan.option import plan_option
from builder.findings.plan.result import Option
from builder.findings.plan.sample import PlanFilm, PlanSample, stages_of
from builder.records.terms import CoupleEffect, Edge, Effect, Exposure, Method, Role, State
from tests.findings.fact_builder import FILMS, couple, etchant, facts, own, rate, recipe, said

LEVELS = (0.80, 0.90, 0.95, 0.99)
_THICKNESS = (5.0, 19.0, 20.0, 30.0, 100.0, 500.0, 1400.0, 8000.0, 525_000.0)
_PARTS = (0.05, 0.3, 0.7, 0.95)


@dataclass(frozen=True)
class World:
    """An etch by its recipe (None: its etchant alone), and a sample in it."""

    facts: PlanFacts
    etchant: str
    recipe: str | None
    sample: PlanSample
    confidence: float = 0.90

    @property
    def etching(self) -> Etching:
        """The etch."""
        chosen = None if self.recipe is None else self.facts.etches[self.recipe]
        return Etching(self.facts.etchants[self.etchant], chosen)

    @property
    def target(self) -> PlanFilm:
        """The film to be removed."""
        return stages_of(self.sample)[0].target

    def option(self) -> Option:
        """What the etch does to the sample."""
        asked = Asked(self.confidence, self.sample.temperature)
        return plan_option(self.facts, self.etching, stages_of(self.sample)[0], asked)

    def with_recipe(self, **changes: object) -> World:
        """The world with another value in its recipe."""
        assert self.recipe is not None
        changed: EtchFacts = replace(self.facts.etches[self.recipe], **changes)  # type: ignore[arg-type]
        return replace(self, facts=replace(self.facts, etches={**self.facts.etches, self.recipe: changed}))

    def with_published(
        self, film: str, rows: Sequence[PublishedFact], statements: Sequence[SaidFact] | None = None
    ) -> World:
        """The world with other published facts of one film."""
        old = self.facts.etchants[self.etchant]
        of_said = old.said if statements is None else {**old.said, film: tuple(statements)}
        new = replace(old, rows={**old.rows, film: tuple(rows)}, said=of_said)
        return replace(self, facts=replace(self.facts, etchants={**self.facts.etchants, old.id: new}))

    def with_own(self, film: str, fact: OwnFact | None) -> World:
        """The world with other own runs of one film."""
        if self.recipe is None:
            return self
        rest = {id: one for id, one in self.facts.etches[self.recipe].own.items() if id != film}
        return self.with_recipe(own=rest if fact is None else {**rest, film: fact})

    def with_kept(self, number: int, **changes: object) -> World:
        """The world with another value in one kept film, counted as in `kept`."""
        place, index = kept_places(self.sample)[number]
        if place == "back":
            assert self.sample.back is not None
            return replace(self, sample=replace(self.sample, back=replace(self.sample.back, **changes)))  # type: ignore[arg-type]
        films = list(getattr(self.sample, place))
        films[index] = replace(films[index], **changes)
        return replace(self, sample=replace(self.sample, **{place: tuple(films)}))  # type: ignore[arg-type]


def kept_places(sample: PlanSample) -> list[tuple[str, int]]:
    """Return where the films stand that should stay."""
    layers = [("layers", i) for i, film in enumerate(sample.layers) if film.role is not Role.TARGET]
    exposed = [("exposed", i) for i in range(len(sample.exposed))]
    return [*layers, *exposed, *([("back", 0)] if sample.back is not None else [])]


def kept(sample: PlanSample) -> list[PlanFilm]:
    """Return the films that should stay."""
    back = [] if sample.back is None else [sample.back]
    return [*(film for film in sample.layers if film.role is not Role.TARGET), *sample.exposed, *back]


def words(option: Option) -> dict[tuple[str, Role], tuple[int, int]]:
    """Return the worst word of each film in each role, by timer and by look; 0 is the best."""
    found: dict[tuple[str, Role], tuple[int, int]] = {}
    for row in option.rows:
        old = found.get((row.film, row.role), (0, 0))
        new = (max(old[0], row.verdict.order), max(old[1], row.verdict_by_look.order))
        found[row.film, row.role] = new
    return found


def improved(before: Option, after: Option) -> list[object]:
    """Return everything that has a better word after than before."""
    old, new = words(before), words(after)
    better: list[object] = [
        (key, old[key], new.get(key))
        for key in old
        if key not in new or new[key][0] < old[key][0] or new[key][1] < old[key][1]
    ]
    pairs = ((before.verdict, after.verdict), (before.verdict_by_look, after.verdict_by_look))
    return better + [pair for pair in pairs if pair[1].order < pair[0].order]


def holding(option: Option) -> set[object]:
    """Return every film in its role, and the plan itself, that holds by timer or by look."""
    found: set[object] = set()
    for key, (timer, look) in words(option).items():
        found |= {(key, "timer")} if timer == 0 else set()
        found |= {(key, "look")} if look == 0 else set()
    found |= {"timer"} if option.verdict.order == 0 else set()
    return found | ({"look"} if option.verdict_by_look.order == 0 else set())


def created(before: Option, after: Option) -> list[object]:
    """Return everything that holds after and did not before; a film that was not reached did hold."""
    old, new = words(before), words(after)
    found: list[object] = [
        (key, way)
        for key in old
        for way in (0, 1)
        if key in new and new[key][way] == 0 and old[key][way] != 0
    ]
    pairs = ((before.verdict, after.verdict), (before.verdict_by_look, after.verdict_by_look))
    return found + [pair for pair in pairs if pair[1].order == 0 != pair[0].order]


_rates = st.sampled_from((0.0, 0.0003, 0.003, 0.03, 0.3, 1.0, 3.0, 30.0))
_ratios = st.sampled_from((1.0, 1.1, 1.6, 4.0))


@st.composite
def _own_facts(draw: st.DrawFn, *, target: bool = False) -> OwnFact:
    mid = draw(st.sampled_from((30.0, 100.0, 300.0))) if target else draw(_rates) + 0.001
    ratio = draw(_ratios)
    runs = draw(st.sampled_from((1, 4)))
    if not target and draw(st.integers(0, 4)) == 0:
        return own(0.0, None, mid * ratio, widen=1.2, limit_s=draw(st.sampled_from((60.0, 1e5))), runs=runs)
    return own(mid / ratio, mid, mid * ratio, widen=draw(st.sampled_from((1.0, 1.3))), runs=runs)


@st.composite
def _published(draw: st.DrawFn) -> PublishedFact:
    value = draw(_rates) + 0.001
    kind = draw(st.sampled_from((PublishedKind.VALUE, PublishedKind.VALUE, *PublishedKind)))
    rank = draw(st.sampled_from((Rank.LITERATURE, Rank.LITERATURE, Rank.UNCHECKED)))
    low = None if kind is PublishedKind.UPPER else value
    high = None if kind is PublishedKind.LOWER else value * draw(_ratios)
    tested = draw(st.sampled_from((None, 100.0, 1e5))) if kind is PublishedKind.UPPER else None
    return rate(low, high, rank, kind, sigma=draw(st.sampled_from((0.25, 0.6))), tested_s=tested)


_statements = st.lists(st.builds(said, st.sampled_from(Effect)), max_size=2)


@st.composite
def _recipes(draw: st.DrawFn, target: str) -> EtchFacts:
    names = sorted(set(FILMS) - {"some-oxide", target})
    known = draw(st.sets(st.sampled_from(names), min_size=3, max_size=8))
    rates = {id: draw(_own_facts()) for id in sorted(known)}
    if draw(st.integers(0, 5)):
        rates[target] = draw(_own_facts(target=True))
    transfer = draw(st.sampled_from((0.0, 8.0)))
    ratio = draw(st.sampled_from((None, RatioFact(low=0.8, mid=1.0, high=1.4, basis="seen"))))
    return recipe(
        rates, phi=draw(st.sampled_from((0.0, 0.03, 0.10))), overetch=draw(st.sampled_from((0.0, 0.1))),
        transfer_s=transfer, offset_s=draw(st.sampled_from((0.0, 10.0))) - transfer, ratio=ratio,
        targets=(target,), cooled=draw(st.booleans()), isotropic=draw(st.booleans()),
    )  # fmt: skip


_WAYS = ((State.LIQUID, Method.WET), (State.VAPOUR, Method.VAPOUR), (State.PLASMA, Method.PLASMA))


@st.composite
def built_worlds(draw: st.DrawFn) -> World:
    """A made-up etch of a made-up sample."""
    target = draw(st.sampled_from(("oxide", "nitride", "gold", "pinholed-oxide")))
    names = sorted(FILMS)
    published = {id: draw(st.lists(_published(), max_size=2)) for id in draw(_subset(names))}
    statements = {id: draw(_statements) for id in draw(_subset(names))}
    state, method = draw(st.sampled_from((*_WAYS, _WAYS[0], _WAYS[0])))
    bath = etchant(published, statements, state=state, method=method, isotropic=draw(st.booleans()))
    made = replace(draw(_recipes(target)), method=method) if draw(st.integers(0, 4)) else None
    if made is None and not published.get(target) and draw(st.booleans()):
        bath = replace(bath, rows={**bath.rows, target: (rate(100.0),)})
    known = facts(bath, made, draw(_couples()))
    on_record = [*(made.own if made is not None else ()), *(id for id, rows in published.items() if rows)]
    # Most films are on record, or hardly any would hold and a law on "holds" would say little.
    sample = draw(samples([*on_record * 4, *names], target))
    return World(known, "bath", None if made is None else "dip", sample)


def _subset(names: Sequence[str]) -> st.SearchStrategy[list[str]]:
    return st.lists(st.sampled_from(names), max_size=6, unique=True)


def _couples() -> st.SearchStrategy[list[CoupleFact]]:
    metals = ("gold", "titanium", "chromium", "nickel", "silicon", "platinum")
    pairs = st.lists(st.sampled_from(metals), min_size=2, max_size=2, unique=True)
    return st.lists(
        st.builds(lambda pair, effect: couple(*pair, effect), pairs, st.sampled_from(CoupleEffect)),
        max_size=8,
    )


@dataclass(frozen=True, repr=False)
class Shipped:
    """The facts of the lab in the project; a failed example must not print them all."""

    facts: PlanFacts


@st.composite
def shipped_worlds(draw: st.DrawFn, shipped: Shipped) -> World:
    """A random sample in a recipe of the lab, or in its etchant alone; most films are on record there."""
    lab = shipped.facts
    chosen = lab.etches[draw(st.sampled_from(sorted(lab.etches)))]
    bath = lab.etchants[chosen.etchant]
    on_record = sorted({*chosen.own, *bath.rows, *bath.said} & set(lab.films))
    targets = sorted({*chosen.targets, *chosen.own} & set(lab.films)) or on_record
    names = [
        *on_record,
        *on_record,
        *draw(st.lists(st.sampled_from(sorted(lab.films)), min_size=2, max_size=4)),
    ]
    sample = draw(samples(names, draw(st.sampled_from(targets))))
    return World(lab, bath.id, chosen.id if draw(st.integers(0, 4)) else None, sample)


@st.composite
def _films(draw: st.DrawFn, names: Sequence[str], role: Role) -> PlanFilm:
    thickness = draw(st.sampled_from(_THICKNESS))
    part = draw(st.sampled_from((None, None, *_PARTS)))
    vanish = role is not Role.MASK and draw(st.integers(0, 9)) == 0
    allowed = None if part is None else thickness * part
    return PlanFilm(
        draw(st.sampled_from(names)), thickness, role, draw(st.sampled_from((0.0, 0.02, 0.1))),
        allowed_nm=float("inf") if vanish else allowed,
        on=draw(st.sampled_from((None, None, "none", draw(st.sampled_from(names)))))
        if role is Role.EXPOSED else None,
        is_critical=draw(st.booleans()),
        exposed=draw(st.sampled_from(Exposure)) if role is Role.EXPOSED else Exposure.FACE,
    )  # fmt: skip


@st.composite
def samples(draw: st.DrawFn, names: Sequence[str], target: str) -> PlanSample:
    """A sample with this target and other films by these names."""
    masks = draw(st.lists(_films(names, Role.MASK), max_size=2))
    under = draw(st.lists(_films(names, Role.UNDER), min_size=1, max_size=3))
    exposed = draw(st.lists(_films(names, Role.EXPOSED), max_size=3))
    back = draw(st.none() | st.none() | _films(names, Role.BACK))
    thickness = draw(st.sampled_from(_THICKNESS[3:6]))
    removed = PlanFilm(target, thickness, Role.TARGET, draw(st.sampled_from((0.0, 0.02))))
    return PlanSample(
        "random", (*masks, removed, *under), tuple(exposed), back,
        back is None and draw(st.integers(0, 4)) > 0,
        edge=draw(st.sampled_from((None, *Edge, Edge.PROTECTED, Edge.PROTECTED))),
        depth_nm=draw(st.sampled_from((None, None, thickness * 0.5))),
        line_nm=draw(st.sampled_from((None, None, 500.0, 5000.0))),
        load_cm2=draw(st.sampled_from((None, 10.0, 78.5))),
    )  # fmt: skip
