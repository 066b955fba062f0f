"""Published rates and statements as rows, for the pages of films and of etchants."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass

from builder.records.lab import LabRecords
from builder.records.published import Hint, PublishedRate, Statement
from builder.records.quantities import Quantity
from builder.records.terms import RateKind
from builder.views.link import Link
from builder.views.number_text import as_written
from builder.views.references import Citation, FilmRef, citation, etchant_link, film_ref
from builder.views.words import EFFECT_NAMES, RANK_NAMES, RATE_KIND_NAMES

_NO_TEMPERATURE = "not stated"


@dataclass(frozen=True)
class RateRow:
    """One published rate, as it was written."""

    etchant: Link
    film: FilmRef
    rate: str
    kind: str
    temperature: str
    rank: str
    citation: Citation
    notes: tuple[str, ...]


@dataclass(frozen=True)
class StatementRow:
    """One statement without a number."""

    etchant: Link
    film: FilmRef
    effect: str
    words: str
    conditions: str
    citation: Citation


@dataclass(frozen=True)
class HintRow:
    """A statement about a class, which decides nothing."""

    etchant: Link
    about: str
    words: str
    why: str
    citation: Citation


def rate_rows(records: LabRecords, rates: Iterable[PublishedRate]) -> tuple[RateRow, ...]:
    """Return the rows of some published rates, in the order given."""
    return tuple(_rate_row(records, rate) for rate in rates)


def statement_rows(records: LabRecords, statements: Iterable[Statement]) -> tuple[StatementRow, ...]:
    """Return the rows of some statements, in the order given."""
    return tuple(
        StatementRow(
            etchant=etchant_link(records, one.etchant),
            film=film_ref(records, one.film),
            effect=EFFECT_NAMES[one.effect],
            words=one.words,
            conditions=", ".join(part for part in (_at(one.temperature), one.conditions) if part),
            citation=citation(records, one),
        )
        for one in statements
    )


def hint_rows(records: LabRecords, hints: Iterable[Hint]) -> tuple[HintRow, ...]:
    """Return the rows of some hints, in the order given."""
    return tuple(
        HintRow(
            etchant_link(records, one.etchant), one.about, one.words, one.why_hint, citation(records, one)
        )
        for one in hints
    )


def _rate_row(records: LabRecords, rate: PublishedRate) -> RateRow:
    notes = (_limit_note(rate), rate.composition, rate.film_as_printed, rate.note)
    return RateRow(
        etchant=etchant_link(records, rate.etchant),
        film=film_ref(records, rate.film),
        rate=_rate(rate),
        kind=RATE_KIND_NAMES[rate.kind],
        temperature=_at(rate.temperature) or _NO_TEMPERATURE,
        rank=RANK_NAMES[rate.rank],  # the ready-made rank of the row: never averaged, never raised
        citation=citation(records, rate),
        notes=tuple(note for note in notes if note),
    )


def _rate(rate: PublishedRate) -> str:
    """The text as printed; a printed zero is no number, it says that nothing was seen."""
    return "none seen" if rate.kind is RateKind.NONE_SEEN else as_written(rate.rate.text)


def _limit_note(rate: PublishedRate) -> str | None:
    if rate.kind is not RateKind.NONE_SEEN:
        return None
    if rate.detection_limit is None or rate.tested_time is None:
        return "no detection limit and time given: a statement, no limit"
    return f"below {as_written(rate.detection_limit.text)} in {as_written(rate.tested_time.text)}"


def _at(temperature: Quantity | None) -> str:
    return "" if temperature is None else as_written(temperature.text)
