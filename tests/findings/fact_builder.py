"""Facts of a plan built by hand: a few films, one etchant, one recipe, numbers easy to work on paper."""

from __future__ import annotations

from collections.abc import Mapping, Sequence

from builder.engine import Allowance, PublishedKind, Rank
from builder.findings.plan.evidence import Asked, Etching
from builder.findings.plan.facts import (
    FORMAT,
    CoupleFact,
    Defaults,
    EtchantFacts,
    EtchFacts,
    FilmFacts,
    LevelBand,
    MaskFact,
    OwnFact,
    PlanFacts,
    PublishedFact,
    SaidFact,
    Span,
)
from builder.findings.plan.option import plan_option
from builder.findings.plan.result import FilmRow, Option
from builder.findings.plan.sample import PlanFilm, PlanSample, stages_of
from builder.records.terms import (
    Barrier,
    CoupleEffect,
    Edge,
    Effect,
    Electrical,
    FilmFamily,
    Method,
    Role,
    State,
    Status,
)

LEVELS = (0.80, 0.90, 0.95, 0.99)
MINUTE_S = 60.0
ROOM = Span(low=293.15, high=293.15)

DEFAULTS = Defaults(
    confidence=0.90, tolerance=0.02, phi_immersion=0.03, phi_bubbles=0.10, phi_vapour=0.10, phi_plasma=0.05,
    phi_cyclic=0.10, reaction_wet_s=15.0, reaction_plasma_s=3.0,
    allowance=Allowance(
        under_fraction=0.05, under_nm=10.0, other_fraction=0.02, other_nm=5.0, other_least_nm=1.0,
        reserve_resist_plasma_fraction=0.20, reserve_resist_plasma_nm=200.0, reserve_fraction=0.10,
        reserve_nm=20.0, none_below_nm=20.0,
    ),
)  # fmt: skip
"""The lab's defaults of DESIGN 4.12, written out here once more."""


def film(
    id: str,
    family: FilmFamily = FilmFamily.OXIDE,
    electrical: Electrical | None = Electrical.INSULATOR,
    **more: object,
) -> FilmFacts:
    """A film: a dense insulator unless told otherwise."""
    values: dict[str, object] = {"barrier": Barrier.DENSE, **more}
    return FilmFacts(id=id, name=id, family=family, electrical=electrical, **values)  # type: ignore[arg-type]


FILMS = {
    one.id: one
    for one in (
        film("oxide"),
        film("nitride", FilmFamily.NITRIDE),
        film("glass"),
        film("silicon", FilmFamily.SEMICONDUCTOR, Electrical.SEMICONDUCTOR),
        film("resist", FilmFamily.RESIST),
        film("open-resist", FilmFamily.RESIST, barrier=Barrier.UNKNOWN),
        film("gold", FilmFamily.METAL, Electrical.METAL, noble=True, adhesion=("titanium", "chromium")),
        film("platinum", FilmFamily.METAL, Electrical.METAL, noble=True, barrier=Barrier.COLUMNAR),
        film("titanium", FilmFamily.METAL, Electrical.METAL),
        film("chromium", FilmFamily.METAL, Electrical.METAL),
        film("nickel", FilmFamily.METAL, Electrical.METAL),
        film("pinholed-oxide", barrier=Barrier.PINHOLED),
        film("some-oxide", is_family=True, members=("oxide", "glass")),
    )
}


def own(
    low: float,
    mid: float | None,
    high: float,
    *,
    widen: float = 1.0,
    limit_s: float | None = None,
    runs: int = 4,
) -> OwnFact:
    """
    Own runs with this interval at 0.90, in nm/min; other confidences are narrower or wider by `widen`.

    With `limit_s` every run was a limit, tested so long.
    """
    steps = {0.80: -1, 0.90: 0, 0.95: 1, 0.99: 2}
    bands = tuple(
        LevelBand(
            confidence=level,
            low=low / MINUTE_S / widen**step,
            mid=None if mid is None else mid / MINUTE_S,
            high=high / MINUTE_S * widen**step,
        )
        for level, step in steps.items()
    )
    limits = 0 if limit_s is None else runs
    return OwnFact(
        levels=bands, runs=runs - limits, limits=limits, times=Span(low=60.0, high=600.0), limit_s=limit_s
    )


def rate(
    low: float | None,
    high: float | None = None,
    rank: Rank = Rank.LITERATURE,
    kind: PublishedKind = PublishedKind.VALUE,
    *,
    sigma: float = 0.25,
    tested_s: float | None = None,
) -> PublishedFact:
    """A published rate in nm/min at 20 degC: one value, or a range."""
    high = low if high is None and kind is PublishedKind.VALUE else high
    return PublishedFact(
        kind=kind, low=None if low is None else low / MINUTE_S,
        high=None if high is None else high / MINUTE_S,
        sigma=sigma, rank=rank, source="book", tested_s=tested_s, temperature=ROOM,
    )  # fmt: skip


def said(effect: Effect, words: str = "as printed") -> SaidFact:
    """A statement without a number."""
    return SaidFact(effect=effect, words=words, source="book")


def etchant(
    rows: Mapping[str, Sequence[PublishedFact]] | None = None,
    statements: Mapping[str, Sequence[SaidFact]] | None = None,
    *,
    state: State = State.LIQUID,
    method: Method = Method.WET,
    **more: object,
) -> EtchantFacts:
    """An etchant with what is published of films in it."""
    return EtchantFacts(
        id="bath", name="Bath", method=method, state=state,
        rows={id: tuple(facts) for id, facts in (rows or {}).items()},
        said={id: tuple(facts) for id, facts in (statements or {}).items()},
        **more,  # type: ignore[arg-type]
    )  # fmt: skip


def recipe(own_rates: Mapping[str, OwnFact] | None = None, **more: object) -> EtchFacts:
    """A recipe at 20 degC whose masks resist and nitride were seen to stay on everything for ten hours."""
    masks = tuple(
        MaskFact(film=mask, on=tuple(FILMS), longest_s=36_000.0) for mask in ("resist", "nitride", "glass")
    )
    values: dict[str, object] = {
        "id": "dip", "name": "Dip", "etchant": "bath", "method": Method.WET, "tool": "bench",
        "status": Status.PROVEN, "inherits": True, "targets": ("oxide",), "phi": 0.0, "offset_s": 0.0,
        "overetch": 0.0, "endpoint": False, "cooled": True, "isotropic": False,
        "temperature": ROOM, "masks": masks, "own": dict(own_rates or {}), **more,
    }  # fmt: skip
    return EtchFacts(**values)  # type: ignore[arg-type]


def couple(one: str, other: str, effect: CoupleEffect, affects: str | None = None) -> CoupleFact:
    """A record of two films in contact in the bath."""
    return CoupleFact(
        films=(one, other),
        etchants=("bath",),
        effect=effect,
        words="as printed",
        source="book",
        affects=affects,
    )


def facts(
    etchant_facts: EtchantFacts, recipe_facts: EtchFacts | None = None, couples: Sequence[CoupleFact] = ()
) -> PlanFacts:
    """The facts of a lab of one etchant and at most one recipe."""
    recipes = {} if recipe_facts is None else {recipe_facts.id: recipe_facts}
    return PlanFacts(
        format=FORMAT, as_of="2026-06-01", defaults=DEFAULTS, films=FILMS,
        etchants={etchant_facts.id: etchant_facts}, etches=recipes, refused={"bench": {}},
        couples=tuple(couples),
    )  # fmt: skip


def layer(id: str, thickness_nm: float, role: Role, **more: object) -> PlanFilm:
    """A film of a sample, its thickness known exactly unless a tolerance is given."""
    values: dict[str, object] = {"tolerance": 0.0, **more}
    return PlanFilm(id, thickness_nm, role, **values)  # type: ignore[arg-type]


def sample(*layers: PlanFilm, **more: object) -> PlanSample:
    """A sample with back and edge protected unless told otherwise."""
    values: dict[str, object] = {"back_protected": True, "edge": Edge.PROTECTED, **more}
    return PlanSample("sample", layers, **values)  # type: ignore[arg-type]


def option_of(known: PlanFacts, asked_sample: PlanSample, confidence: float = 0.90, stage: int = 0) -> Option:
    """What the one recipe, or the one etchant where there is no recipe, does to a sample."""
    etching = Etching(known.etchants["bath"], known.etches.get("dip"))
    asked = Asked(confidence, asked_sample.temperature)
    return plan_option(known, etching, stages_of(asked_sample)[stage], asked)


def row_of(option: Option, film_id: str, role: Role | None = None) -> FilmRow:
    """The one row of a film."""
    (row,) = [row for row in option.rows if row.film == film_id and role in (None, row.role)]
    return row
