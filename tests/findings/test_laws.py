"""The laws of a plan, on made-up worlds and on random samples in the recipes of the lab in the project."""

from __future__ import annotations

import itertools
import json
import random
from collections.abc import Callable
from dataclasses import replace

import pytest
from hypothesis import assume, given, settings
from hypothesis import strategies as st

from builder.engine import Rank, Verdict
from builder.findings.plan.facts import LevelBand, OwnFact, PlanFacts, PublishedFact
from builder.findings.plan.planning import plan
from builder.findings.plan.result import CapCode, LostCode
from builder.findings.plan.sample import PlanFilm
from builder.records.terms import Effect, Role
from builder.views.plan_json import plan_data
from tests.findings.fact_builder import rate
from tests.findings.worlds import (
    LEVELS,
    Shipped,
    World,
    built_worlds,
    created,
    holding,
    improved,
    kept,
    shipped_worlds,
    words,
)

EXAMPLES = 100
law = settings(max_examples=EXAMPLES, derandomize=True, deadline=None)
"""Examples for built and for shipped worlds each; the same ones on every run."""

Draw = Callable[[st.SearchStrategy[World]], World]


@pytest.fixture(scope="session", params=["built", "shipped"])
def worlds(request: pytest.FixtureRequest) -> st.SearchStrategy[World]:
    """The worlds a law is tried on."""
    if request.param == "built":
        return built_worlds()
    lab: PlanFacts = request.getfixturevalue("lab_facts")
    return shipped_worlds(Shipped(lab))


@law
@given(data=st.data(), more=st.sampled_from((0.05, 0.3, 2.0)))
def test_a_longer_time_improves_nothing(
    worlds: st.SearchStrategy[World], data: st.DataObject, more: float
) -> None:
    """Overetch is time."""
    world = data.draw(worlds)
    assume(world.recipe is not None)
    longer = world.with_recipe(overetch=world.etching.recipe.overetch + more)  # type: ignore[union-attr]
    assert improved(world.option(), longer.option()) == []


@law
@given(data=st.data(), part=st.sampled_from((0.0, 0.1, 0.5, 0.99)))
def test_a_smaller_allowed_loss_improves_nothing(
    worlds: st.SearchStrategy[World], data: st.DataObject, part: float
) -> None:
    """Stated, or below the default."""
    world = data.draw(worlds)
    assume(kept(world.sample))
    number = data.draw(st.integers(0, len(kept(world.sample)) - 1))
    film, before = kept(world.sample)[number], world.option()
    in_force = [row.allowed_nm for row in before.rows if (row.film, row.role) == (film.film, film.role)]
    known = [allowed for allowed in in_force if allowed is not None]
    allowed = film.allowed_nm if film.allowed_nm is not None else min(known, default=None)
    assume(allowed is not None)
    assert allowed is not None
    less = film.thickness_nm * part if allowed == float("inf") else allowed * part
    assert improved(before, world.with_kept(number, allowed_nm=less).option()) == []


@law
@given(data=st.data(), part=st.sampled_from((0.02, 0.3, 0.9)))
def test_a_thinner_kept_film_improves_nothing(
    worlds: st.SearchStrategy[World], data: st.DataObject, part: float
) -> None:
    """Neither for itself nor for what lies below it."""
    world = data.draw(worlds)
    assume(kept(world.sample))
    number = data.draw(st.integers(0, len(kept(world.sample)) - 1))
    film = kept(world.sample)[number]
    thickness = film.thickness_nm * part
    allowed = film.allowed_nm
    if allowed is not None and allowed != float("inf"):
        allowed = min(allowed, thickness)
    thinner = world.with_kept(number, thickness_nm=thickness, allowed_nm=allowed)
    assert improved(world.option(), thinner.option()) == []


@law
@given(data=st.data())
def test_one_more_exposed_film_improves_nothing(
    worlds: st.SearchStrategy[World], data: st.DataObject
) -> None:
    """A film that the plan took for granted under a pad is not one more film: naming it is telling."""
    world = data.draw(worlds)
    name = data.draw(st.sampled_from(sorted(world.facts.films)))
    assume(name not in {film.on for film in world.sample.exposed})
    extra = PlanFilm(name, data.draw(st.sampled_from((10.0, 300.0))), Role.EXPOSED, 0.0, allowed_nm=5.0)
    more = replace(world, sample=replace(world.sample, exposed=(*world.sample.exposed, extra)))
    assert improved(world.option(), more.option()) == []


def _wider(own: OwnFact, confidence: float, factor: float) -> OwnFact:
    def level(band: LevelBand) -> LevelBand:
        if band.confidence != confidence:
            return band
        return replace(band, low=band.low / factor, high=band.high * factor)

    return replace(own, levels=tuple(map(level, own.levels)))


def _wider_row(row: PublishedFact, factor: float) -> PublishedFact:
    return replace(
        row,
        low=None if row.low is None else row.low / factor,
        high=None if row.high is None else row.high * factor,
    )


@law
@given(data=st.data(), factor=st.sampled_from((1.05, 2.0, 20.0)))
def test_a_wider_interval_never_creates_holds(
    worlds: st.SearchStrategy[World], data: st.DataObject, factor: float
) -> None:
    """Of any film, the target among them; a conflict is judged at its own confidence and stays."""
    world = replace(data.draw(worlds), confidence=0.95)
    names = sorted({world.target.film, *(film.film for film in kept(world.sample))})
    name = data.draw(st.sampled_from(names))
    own = world.etching.own(name)
    if own is not None:
        wider = world.with_own(name, _wider(own, 0.95, factor))
    else:
        rows = world.facts.etchants[world.etchant].rows.get(name, ())
        wider = world.with_published(name, [_wider_row(row, factor) for row in rows])
    assert created(world.option(), wider.option()) == []


@law
@given(data=st.data())
def test_more_confidence_never_creates_holds(worlds: st.SearchStrategy[World], data: st.DataObject) -> None:
    """From one stored level to the next."""
    world = data.draw(worlds)
    options = [replace(world, confidence=level).option() for level in LEVELS]
    assert [created(less, more) for less, more in itertools.pairwise(options)] == [[]] * 3


@law
@given(data=st.data())
def test_without_numbers_of_a_pair_nothing_of_it_holds(
    worlds: st.SearchStrategy[World], data: st.DataObject
) -> None:
    """Recalled numbers and statements stay; without the target's numbers no film holds at all."""
    world = data.draw(worlds)
    names = sorted({world.target.film, *(film.film for film in kept(world.sample))})
    name = data.draw(st.sampled_from(names))
    rows = world.facts.etchants[world.etchant].rows.get(name, ())
    bare = world.with_own(name, None).with_published(
        name, [row for row in rows if row.rank is not Rank.LITERATURE]
    )
    option = bare.option()
    for (film, _), found in words(option).items():
        if name in (film, world.target.film):
            assert 0 not in found
    if name == world.target.film or any(row.film == name for row in option.rows):
        assert Verdict.HOLDS not in (option.verdict, option.verdict_by_look)


@law
@given(data=st.data())
def test_a_recalled_rate_of_the_target_caps_every_film(
    worlds: st.SearchStrategy[World], data: st.DataObject
) -> None:
    """Whatever is known of the films themselves."""
    world = data.draw(worlds)
    name = world.target.film
    rows = world.facts.etchants[world.etchant].rows.get(name, ()) or (rate(100.0),)
    option = (
        world.with_own(name, None)
        .with_published(name, [replace(row, rank=Rank.UNCHECKED) for row in rows])
        .option()
    )
    assert holding(option) == set()


@law
@given(data=st.data())
def test_a_family_never_holds(worlds: st.SearchStrategy[World], data: st.DataObject) -> None:
    """Neither as a film to keep nor as the one to remove."""
    world = data.draw(worlds)
    families = sorted(film.id for film in world.facts.films.values() if film.is_family)
    family = data.draw(st.sampled_from(families))
    extra = PlanFilm(family, 1000.0, Role.EXPOSED, 0.0, allowed_nm=999.0)
    option = replace(world, sample=replace(world.sample, exposed=(*world.sample.exposed, extra))).option()
    for row in option.rows:
        if world.facts.films[row.film].is_family:
            assert Verdict.HOLDS not in (row.verdict, row.verdict_by_look)
    assert Verdict.HOLDS not in (option.verdict, option.verdict_by_look)


@law
@given(data=st.data())
def test_an_unknown_time_leaves_lost_and_unmeasured(
    worlds: st.SearchStrategy[World], data: st.DataObject
) -> None:
    """Lost where it is attacked, or where a word on record loses it at any time; else unmeasured."""
    world = data.draw(worlds)
    unknown = world.with_own(world.target.film, None).with_published(world.target.film, [])
    option = unknown.option()
    assume(not option.schedule.known)
    assert option.verdict.order >= Verdict.UNMEASURED.order
    said = unknown.facts.etchants[unknown.etchant].said
    for row in option.rows:
        assert row.verdict in (Verdict.LOST, Verdict.UNMEASURED)
        assert row.verdict is row.verdict_by_look
        at_any_time = row.lost is not None and row.lost.code != LostCode.LINE
        untold = any(cap.code == CapCode.BACK for cap in row.caps)
        effects = [fact.effect for fact in said.get(row.film, ()) if fact.temperature is None]
        if Effect.ATTACKS in effects and not untold:
            assert row.verdict is Verdict.LOST
        if row.verdict is Verdict.LOST and not at_any_time:
            assert _is_said_to_go(unknown, row.film)


def _is_said_to_go(world: World, film: str) -> bool:
    bath = world.facts.etchants[world.etchant]
    facts = world.facts.films[film]
    names = [film, *(facts.members if facts.is_family else ())]
    return any(fact.effect is Effect.ATTACKS for name in names for fact in bath.said.get(name, ())) or any(
        row.per_cycle for name in names for row in bath.rows.get(name, ())
    )


@law
@given(data=st.data())
def test_a_plan_has_its_worst_films_word(worlds: st.SearchStrategy[World], data: st.DataObject) -> None:
    """It is never better; and worse only where its own target says so."""
    option = data.draw(worlds).option()
    for verdict, of_row in (
        (option.verdict, lambda row: row.verdict),
        (option.verdict_by_look, lambda row: row.verdict_by_look),
    ):
        worst = max((of_row(row).order for row in option.rows), default=0)
        assert verdict.order >= worst
        if verdict.order > worst:
            is_sure = option.target_rank in (Rank.OWN, Rank.LITERATURE) and option.schedule.known
            assert not option.rows or not is_sure


@law
@given(data=st.data(), seed=st.integers(0, 99))
def test_the_order_of_exposed_films_leaves_no_trace(
    worlds: st.SearchStrategy[World], data: st.DataObject, seed: int
) -> None:
    """Byte for byte, with every recipe of the lab on offer."""
    world = data.draw(worlds)
    mixed = list(world.sample.exposed)
    random.Random(seed).shuffle(mixed)
    texts = [
        json.dumps(plan_data(plan(world.facts, replace(world.sample, exposed=tuple(films)), confidence=0.90)))
        for films in (world.sample.exposed, mixed)
    ]
    assert texts[0] == texts[1]
