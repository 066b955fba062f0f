"""What is known of one film in one etch at a temperature and a confidence: the best rank alone decides."""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from dataclasses import dataclass, field, replace

from builder.engine import (
    PublishedValue,
    Rank,
    RateBand,
    envelope,
    intervals_conflict,
    normal,
    widest,
)
from builder.engine.plan_rules import REFERENCE_CONFIDENCE, TEMPERATURE_MATCH_K
from builder.findings.plan.facts import (
    EtchantFacts,
    EtchFacts,
    FilmFacts,
    LevelBand,
    OwnFact,
    PlanFacts,
    PublishedFact,
    SaidFact,
    Span,
)
from builder.records.terms import Effect, Method

_ADVERSE = frozenset(
    {Effect.PEELS, Effect.SWELLS, Effect.ROUGHENS, Effect.CRACKS, Effect.OXIDISES, Effect.RESIDUE}
)


@dataclass(frozen=True, slots=True)
class Asked:
    """What a plan asks of evidence: two-sided confidence, and the temperature (None: none asked)."""

    confidence: float
    temperature_k: Span | None


@dataclass(frozen=True, slots=True)
class Evidence:
    """
    Grounds for one film in one etch.

    `band` None: no number. `attacked` and `adverse` come from statements. `conflict` tells that own
    runs and published numbers have no point in common; `single` that there is one own run. `far` tells
    that own runs were at another temperature. `hint` names a similar film or a row that does not count.
    """

    rank: Rank
    band: RateBand | None = None
    limit_s: float | None = None
    attacked: bool = False
    adverse: tuple[Effect, ...] = ()
    conflict: bool = False
    single: bool = False
    far: bool = False
    all_temperatures: bool = False
    hint: str | None = None
    sources: tuple[str, ...] = ()
    words: tuple[str, ...] = ()


NOTHING = Evidence(Rank.NONE)


@dataclass(frozen=True, slots=True)
class Etching:
    """One etch to be judged: an etchant, and the recipe if it is one; `found` keeps what was looked up."""

    etchant: EtchantFacts
    recipe: EtchFacts | None
    found: dict[tuple[str, Asked], Evidence] = field(default_factory=dict, compare=False, repr=False)

    def own(self, film: str) -> OwnFact | None:
        """The recipe's own runs of a film."""
        return None if self.recipe is None else self.recipe.own.get(film)

    @property
    def temperature_of_rows(self) -> Span | None:
        """Temperature that published rows must match; "the same conditions" of a plasma include theirs."""
        is_same = self.recipe is not None and self.recipe.method in (Method.PLASMA, Method.CYCLIC)
        return None if is_same and self.recipe is not None and self.recipe.inherits else self.temperature

    @property
    def temperature(self) -> Span | None:
        """Temperature of the recipe; None where none is stated."""
        return None if self.recipe is None else self.recipe.temperature


def evidence(facts: PlanFacts, etching: Etching, film_id: str, asked: Asked) -> Evidence:
    """Return the evidence for a film, or the worst of its members' for a family; all of the same facts."""
    if (film_id, asked) not in etching.found:
        etching.found[film_id, asked] = _looked_up(facts, etching, film_id, asked)
    return etching.found[film_id, asked]


def _looked_up(facts: PlanFacts, etching: Etching, film_id: str, asked: Asked) -> Evidence:
    film = facts.films[film_id]
    if not film.is_family:
        return _of_film(facts, etching, film, asked)
    members = [_of_film(facts, etching, facts.films[member], asked) for member in film.members]
    # What is said of the family itself is a hint for a member, but here the family is asked for.
    said = _said(etching, film_id, asked.temperature_k)
    if any(fact.effect is Effect.ATTACKS for fact in said):
        members.append(_from_statements(said))
    return _family(members)


def family_members(facts: PlanFacts, etching: Etching, film: FilmFacts, asked: Asked) -> list[Evidence]:
    """Return the evidence of each film that may be meant: one, or the members of a family."""
    if not film.is_family:
        return [_of_film(facts, etching, film, asked)]
    return [_of_film(facts, etching, facts.films[member], asked) for member in film.members]


def matches(stated: Span | None, asked: Span | None) -> bool:
    """
    Tell whether a published row counts at the temperature asked for.

    Within 3 K, or overlapping. A row without a temperature counts only when none is asked for, and
    when none is asked for every row counts.
    """
    if asked is None:
        return True
    if stated is None:
        return False
    return stated.low <= asked.high + TEMPERATURE_MATCH_K and stated.high >= asked.low - TEMPERATURE_MATCH_K


def at_level(own: OwnFact, confidence: float) -> LevelBand:
    """
    Return the stored interval at a confidence.

    Raises
    ------
    KeyError
        No interval is stored at that confidence.
    """
    for level in own.levels:
        if level.confidence == confidence:
            return level
    raise KeyError(f"no interval at {confidence}")


def _family(members: Sequence[Evidence]) -> Evidence:
    if not members:
        return NOTHING
    rank = max((member.rank for member in members), key=lambda rank: rank.order)
    bands = [member.band for member in members if member.band is not None]
    complete = len(bands) == len(members)
    limits = [member.limit_s for member in members if member.limit_s is not None]
    return Evidence(
        rank=rank,
        band=widest(bands) if complete and bands else None,
        limit_s=min(limits) if limits else None,
        attacked=any(member.attacked for member in members),
        adverse=tuple(dict.fromkeys(effect for member in members for effect in member.adverse)),
        sources=tuple(dict.fromkeys(source for member in members for source in member.sources)),
    )


def _of_film(facts: PlanFacts, etching: Etching, film: FilmFacts, asked: Asked) -> Evidence:
    temperature = asked.temperature_k or etching.temperature_of_rows
    rows = _rows(etching, film.id)
    counting = [row for row in rows if matches(row.temperature, temperature)]
    said = _said(etching, film.id, temperature)
    own = etching.own(film.id)
    far = own is not None and not _was_run_at(own, etching.temperature, asked.temperature_k)
    best = _best_published(counting, asked.confidence)
    if own is not None and not far:
        base = _from_own(own, best, counting, asked)
    elif best is not None:
        base = replace(
            best, far=far, all_temperatures=temperature is None and len({r.temperature for r in rows}) > 1
        )
    elif said:
        base = replace(_from_statements(said), far=far)
    else:
        return Evidence(Rank.NONE, far=far, hint=_hint(facts, etching, film, rows))
    adverse = tuple(dict.fromkeys(fact.effect for fact in said if fact.effect in _ADVERSE))
    attacked = any(fact.effect is Effect.ATTACKS for fact in said)
    return replace(base, adverse=adverse, attacked=attacked, words=tuple(fact.words for fact in said))


def _rows(etching: Etching, film: str) -> list[PublishedFact]:
    """Published numbers that count: those of a recipe's etchant only if it runs under their conditions."""
    if etching.recipe is not None and not etching.recipe.inherits:
        return []
    cycle_s = None if etching.recipe is None else etching.recipe.cycle_s
    rows = []
    for row in etching.etchant.rows.get(film, ()):
        if not row.per_cycle:
            rows.append(row)
        elif cycle_s is not None:
            rows.append(
                replace(
                    row,
                    low=None if row.low is None else row.low / cycle_s,
                    high=None if row.high is None else row.high / cycle_s,
                    per_cycle=False,
                )
            )
    return rows


def _said(etching: Etching, film: str, temperature: Span | None) -> list[SaidFact]:
    inherits = etching.recipe is None or etching.recipe.inherits
    facts = [
        fact
        for fact in etching.etchant.said.get(film, ())
        if (fact.temperature is None or matches(fact.temperature, temperature))
        # Under other conditions a harm is still a warning; that a film stood it is no comfort.
        and (inherits or fact.effect is not Effect.RESISTS)
    ]
    cycle_s = None if etching.recipe is None else etching.recipe.cycle_s
    if cycle_s is None and any(row.per_cycle and row.low for row in etching.etchant.rows.get(film, ())):
        # A rate per cycle gives no time, but it says that the film goes.
        facts.append(SaidFact(effect=Effect.ATTACKS, words="etched, at a rate per cycle", source=""))
    return facts


def _was_run_at(own: OwnFact, recipe: Span | None, asked: Span | None) -> bool:
    """Runs without a temperature were made at the recipe's; if it states none, nobody knows at which."""
    if asked is None:
        return own.temperature is None or recipe is None or matches(own.temperature, recipe)
    ran = own.temperature or recipe
    return (
        ran is not None
        and ran.low - TEMPERATURE_MATCH_K <= asked.low
        and asked.high <= ran.high + TEMPERATURE_MATCH_K
    )


def _best_published(rows: Iterable[PublishedFact], confidence: float) -> Evidence | None:
    """Evidence of the best rank among published rows; None without any."""
    all_rows = list(rows)
    for rank in (Rank.LITERATURE, Rank.UNCHECKED):
        of_rank = [row for row in all_rows if row.rank is rank]
        limited = envelope([_value(row) for row in of_rank], normal((1 + confidence) / 2))
        if limited is not None:
            sources = tuple(dict.fromkeys(row.source for row in of_rank))
            return Evidence(rank, limited.band, limited.limit_time_s, sources=sources)
    return None


def _value(row: PublishedFact) -> PublishedValue:
    return PublishedValue(row.kind, row.low, row.high, row.sigma, row.tested_s)


def _from_own(
    own: OwnFact, published: Evidence | None, rows: Sequence[PublishedFact], asked: Asked
) -> Evidence:
    level = at_level(own, asked.confidence)
    return Evidence(
        Rank.OWN,
        RateBand(level.low, level.mid, level.high),
        own.limit_s,
        conflict=published is not None and published.rank is Rank.LITERATURE and _conflict(own, rows),
        single=own.runs + own.limits == 1,
    )


def _conflict(own: OwnFact, rows: Sequence[PublishedFact]) -> bool:
    """Judged at one confidence whatever is asked, so that asking for more never hides a conflict."""
    published = _best_published([row for row in rows if row.rank is Rank.LITERATURE], REFERENCE_CONFIDENCE)
    if published is None or published.band is None:
        return False
    level = at_level(own, REFERENCE_CONFIDENCE)
    band = published.band
    return intervals_conflict((level.low, level.high), (band.low, band.high))


def _from_statements(said: Sequence[SaidFact]) -> Evidence:
    return Evidence(
        Rank.STATEMENT,
        attacked=any(fact.effect is Effect.ATTACKS for fact in said),
        adverse=tuple(dict.fromkeys(fact.effect for fact in said if fact.effect in _ADVERSE)),
        sources=tuple(dict.fromkeys(fact.source for fact in said if fact.source)),
        words=tuple(fact.words for fact in said),
    )


def _hint(facts: PlanFacts, etching: Etching, film: FilmFacts, rows: Sequence[PublishedFact]) -> str | None:
    """Name what is on record nearby; it decides nothing."""
    if rows:
        return "temperature"
    if etching.etchant.rows.get(film.id) or etching.etchant.said.get(film.id):
        return "conditions"
    for similar in film.similar:
        if etching.own(similar) or etching.etchant.rows.get(similar) or etching.etchant.said.get(similar):
            return f"similar:{similar}"
    for other in map(facts.films.__getitem__, etching.etchant.rows):
        if other.is_family and film.id in other.members:
            return f"similar:{other.id}"
    return None
