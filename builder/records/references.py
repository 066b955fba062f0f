"""Sources, volatility of etch products, and constants of rate laws."""

from __future__ import annotations

from dataclasses import dataclass

from builder.records.conversion import Temperature
from builder.records.record import Record, SourcedRecord
from builder.records.terms import Trust


@dataclass(frozen=True, slots=True, kw_only=True)
class Source(Record):
    """A publication, handbook, standard or practice that facts are taken from."""

    title: str
    access: str
    trust: Trust
    authors: str | None = None
    body: str | None = None
    year: int | None = None
    doi: str | None = None
    doi_trust: Trust | None = None
    note: str | None = None


@dataclass(frozen=True, slots=True, kw_only=True)
class Product(SourcedRecord):
    """Boiling or sublimation point of an etch product at 1 atm; None is unknown."""

    product: str
    temperature: Temperature | None = None


@dataclass(frozen=True, slots=True, kw_only=True)
class RateConstant(SourcedRecord):
    """A published constant of a rate law, as text; `etchants` and `films` say what it is used for."""

    quantity: str
    etchant_text: str
    film_text: str
    value: str
    conditions: str | None = None
    etchants: tuple[str, ...] = ()
    films: tuple[str, ...] = ()
