"""Published facts about a film in an etchant: rates, statements, hints, couples."""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from dataclasses import dataclass
from typing import TypeVar

from builder.records.conversion import Data, PublishedValue, Rate, Temperature, Time, from_data
from builder.records.record import SourcedEntry, SourcedRecord
from builder.records.terms import (
    Confidence,
    CoupleEffect,
    Effect,
    Origin,
    PublishedRank,
    RateKind,
)

T = TypeVar("T")


@dataclass(frozen=True, slots=True, kw_only=True)
class PublishedRate(SourcedEntry):
    """
    One published rate, nm/s or nm per cycle in canonical units.

    `temperature` is a value or a range in K; None is not stated, which matches only when none is
    asked for. `none_seen` counts as a limit only with `detection_limit` and `tested_time`.
    """

    etchant: str
    film: str
    kind: RateKind
    rate: PublishedValue
    rank: PublishedRank
    confidence: Confidence
    detection_limit: Rate | None = None
    tested_time: Time | None = None
    temperature: Temperature | None = None
    composition: str | None = None
    film_as_printed: str | None = None


@dataclass(frozen=True, slots=True, kw_only=True)
class Statement(SourcedEntry):
    """A statement without a number about one film in one etchant, in our own words."""

    etchant: str
    film: str
    effect: Effect
    words: str
    conditions: str | None = None
    temperature: Temperature | None = None


@dataclass(frozen=True, slots=True, kw_only=True)
class Hint(SourcedEntry):
    """A statement about a class; it is shown and decides nothing."""

    etchant: str
    about: str
    words: str
    why_hint: str


@dataclass(frozen=True, slots=True, kw_only=True)
class Couple(SourcedRecord):
    """Two films in contact in listed etchants, and which of them suffers (None if neither)."""

    films: tuple[str, ...]
    etchants: tuple[str, ...]
    effect: CoupleEffect
    words: str
    affects: str | None = None


def rates_from(data: Data, file: str, origin: Origin) -> tuple[PublishedRate, ...]:
    """Return the rates of one rates file that has passed its schema."""
    return tuple(_entries(PublishedRate, data, "rates", file, origin))


def statements_from(data: Data, file: str, origin: Origin) -> tuple[Statement, ...]:
    """Return the statements of one compatibility file that has passed its schema."""
    return tuple(_entries(Statement, data, "statements", file, origin))


def hints_from(data: Data, file: str, origin: Origin) -> tuple[Hint, ...]:
    """Return the hints of one compatibility file that has passed its schema."""
    return tuple(_entries(Hint, data, "hints", file, origin))


def _entries(cls: type[T], data: Data, key: str, file: str, origin: Origin) -> Iterator[T]:
    rows = data.get(key, [])
    assert isinstance(rows, Sequence)
    for index, row in enumerate(rows):
        yield from_data(
            cls, row, etchant=data["etchant"], file=file, origin=origin, pointer=f"/{key}/{index}"
        )
