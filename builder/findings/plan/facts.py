"""
What a plan needs to know, free of records: lengths in nm, times in s, rates in nm/s, temperatures in K.

The same facts are stored for the next plan, and read by the planner in the browser.
"""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field
from typing import Annotated

from builder.engine import Allowance, PublishedKind, Rank
from builder.records.conversion import LATER
from builder.records.quantities import Quantity
from builder.records.terms import (
    Barrier,
    CoupleEffect,
    Effect,
    Electrical,
    FilmFamily,
    Method,
    State,
    Status,
)

FORMAT = 1
"""Version of the stored facts; a reader of another version makes them anew."""


@dataclass(frozen=True, slots=True, kw_only=True)
class Span:
    """Lowest and highest value of something, both inclusive."""

    low: float
    high: float


def span_of(quantity: Quantity | None) -> Span | None:
    """Return the lowest and highest value of a quantity; None if it is not stated or has an open end."""
    if quantity is None:
        return None
    low = quantity.low if quantity.value is None else quantity.value
    high = quantity.high if quantity.value is None else quantity.value
    return None if low is None or high is None else Span(low=low, high=high)


@dataclass(frozen=True, slots=True, kw_only=True)
class PublishedFact:
    """
    One published rate of a film in an etchant.

    `low` and `high` in nm/s, or nm per cycle with `per_cycle`; None where the row gives no such end.
    `temperature` None is not stated. `sigma` is the standard uncertainty of ln(rate) on another bench.
    """

    kind: PublishedKind
    low: float | None = None
    high: float | None = None
    sigma: float
    rank: Rank
    source: str
    tested_s: float | None = None
    temperature: Span | None = None
    per_cycle: bool = False


@dataclass(frozen=True, slots=True, kw_only=True)
class SaidFact:
    """One statement without a number about a film in an etchant."""

    effect: Effect
    words: str
    source: str
    temperature: Span | None = None


@dataclass(frozen=True, slots=True, kw_only=True)
class LevelBand:
    """The next-run interval at one two-sided confidence; `low` 0 where nothing bounds the rate from below."""

    confidence: float
    low: float
    mid: float | None = None
    high: float


@dataclass(frozen=True, slots=True, kw_only=True)
class OwnFact:
    """
    What a recipe's own runs say of a film.

    `limit_s` is the longest tested time where every run shows no loss above its uncertainty. The spans
    cover the runs in use; None where no run states the condition. `stale_days` is the age of the newest
    run where the lab calls it too old.
    """

    levels: tuple[LevelBand, ...]
    runs: int
    limits: int
    times: Span
    limit_s: float | None = None
    temperature: Span | None = None
    load_cm2: Span | None = None
    window_nm: Span | None = None
    induction_s: float | None = None
    stale_days: int | None = None


@dataclass(frozen=True, slots=True, kw_only=True)
class GasFact:
    """What an etchant and something it reaches do to a person; a film counts from `from_nm` on."""

    forbidden: bool
    words: str
    from_nm: float = 0.0


@dataclass(frozen=True, slots=True, kw_only=True)
class EtchantFacts:
    """One etchant, with all that is published of films in it; `alone` counts where no recipe is named."""

    id: str
    name: str
    method: Method
    state: State
    isotropic: bool = False
    gas_bubbles: bool = False
    hf_vapour: bool = False
    temperature: Span | None = None
    hazard: int = 0
    cautions: tuple[str, ...] = ()
    rows: Annotated[Mapping[str, tuple[PublishedFact, ...]], LATER] = field(default_factory=dict)
    said: Annotated[Mapping[str, tuple[SaidFact, ...]], LATER] = field(default_factory=dict)
    gas: Annotated[Mapping[str, tuple[GasFact, ...]], LATER] = field(default_factory=dict)
    alone: Annotated[Mapping[str, tuple[GasFact, ...]], LATER] = field(default_factory=dict)
    bond: tuple[GasFact, ...] = ()


@dataclass(frozen=True, slots=True, kw_only=True)
class MaskFact:
    """A mask that was seen to stay on the films `on` for so long."""

    film: str
    on: tuple[str, ...]
    longest_s: float


@dataclass(frozen=True, slots=True, kw_only=True)
class RatioFact:
    """Sideways etch over depth."""

    low: float
    mid: float
    high: float
    basis: str


@dataclass(frozen=True, slots=True, kw_only=True)
class EtchFacts:
    """
    One recipe.

    `inherits`: published numbers of its etchant count for it. `temperature` None is not stated.
    `offset_s` is the wait before etching starts less `transfer_s`, in which it goes on after the clock.
    """

    id: str
    name: str
    etchant: str
    method: Method
    tool: str
    status: Status
    inherits: bool
    targets: tuple[str, ...]
    phi: float
    offset_s: float
    transfer_s: float = 0.0
    overetch: float
    endpoint: bool
    cooled: bool
    isotropic: bool
    temperature: Span | None = None
    cycle_s: float | None = None
    ratio: RatioFact | None = None
    masks: tuple[MaskFact, ...] = ()
    own: Annotated[Mapping[str, OwnFact], LATER] = field(default_factory=dict)
    gas: Annotated[Mapping[str, tuple[GasFact, ...]], LATER] = field(default_factory=dict)
    forbidden: tuple[str, ...] = ()
    cautions: tuple[str, ...] = ()
    clearing: str = ""
    if_not_cleared: str = ""


@dataclass(frozen=True, slots=True, kw_only=True)
class FilmFacts:
    """One film, or a family of films with its members."""

    id: str
    name: str
    family: FilmFamily
    is_family: bool = False
    members: tuple[str, ...] = ()
    barrier: Barrier = Barrier.UNKNOWN
    electrical: Electrical | None = None
    noble: bool = False
    similar: tuple[str, ...] = ()
    adhesion: tuple[str, ...] = ()
    names: tuple[str, ...] = ()
    formula: str = ""


@dataclass(frozen=True, slots=True, kw_only=True)
class CoupleFact:
    """Two films in contact in some etchants."""

    films: tuple[str, ...]
    etchants: tuple[str, ...]
    effect: CoupleEffect
    words: str
    source: str
    affects: str | None = None


@dataclass(frozen=True, slots=True, kw_only=True)
class MeetingFact:
    """
    One rule on etchants that must not follow each other without a rinse between.

    `pairs` are (first, second) etchants; `words` say what happens when they meet.
    """

    rule: str
    forbidden: bool
    words: str
    pairs: tuple[tuple[str, ...], ...]


@dataclass(frozen=True, slots=True, kw_only=True)
class Defaults:
    """Numbers in force where neither a record nor the sample states one; fractions, nm and s."""

    confidence: float
    tolerance: float
    phi_immersion: float
    phi_bubbles: float
    phi_vapour: float
    phi_plasma: float
    phi_cyclic: float
    reaction_wet_s: float
    reaction_plasma_s: float
    allowance: Allowance


@dataclass(frozen=True, slots=True, kw_only=True)
class PlanFacts:
    """
    Everything a plan needs; by id, except couples and meetings.

    `refused` tells, by tool and film, why the tool does not take the film. `bond_words` is a pattern.
    """

    format: int
    as_of: str
    defaults: Defaults
    films: Annotated[Mapping[str, FilmFacts], LATER]
    etchants: Annotated[Mapping[str, EtchantFacts], LATER]
    etches: Annotated[Mapping[str, EtchFacts], LATER]
    refused: Mapping[str, Mapping[str, str]] = field(default_factory=dict)
    couples: tuple[CoupleFact, ...] = ()
    meetings: tuple[MeetingFact, ...] = ()
    bond_words: str = ""
