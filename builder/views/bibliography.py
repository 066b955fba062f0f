"""The bibliography: every source, and how it was seen."""

from __future__ import annotations

from dataclasses import dataclass

from builder.records.lab import LabRecords
from builder.records.references import Source
from builder.views.references import short_name
from builder.views.words import TRUST_NAMES


@dataclass(frozen=True)
class SourceRow:
    """One source; `anchor` is its place on the page, `doi` may be empty."""

    anchor: str
    name: str
    title: str
    doi: str
    doi_trust: str
    access: str
    trust: str
    note: str
    uses: int


@dataclass(frozen=True)
class BibliographyPage:
    """All that the bibliography shows."""

    url: str
    title: str
    description: str
    search_text: str
    sources: tuple[SourceRow, ...]


def bibliography_page(records: LabRecords) -> BibliographyPage:
    """Return the view of all sources, by name."""
    uses = _uses(records)
    rows = [_row(source, uses.get(source.id, 0)) for source in records.sources.values()]
    return BibliographyPage(
        url="bibliography.html",
        title="Bibliography",
        description="The sources behind every published number on this site, and how each was seen.",
        search_text=" ".join(row.name for row in rows),
        sources=tuple(sorted(rows, key=lambda row: (row.name.casefold(), row.anchor))),
    )


def _row(source: Source, uses: int) -> SourceRow:
    return SourceRow(
        anchor=source.id,
        name=short_name(source.authors, source.body, source.year, source.title),
        title=source.title,
        doi=source.doi or "",
        doi_trust="" if source.doi_trust is None else TRUST_NAMES[source.doi_trust],
        access=source.access,
        trust=TRUST_NAMES[source.trust],
        note=source.note or "",
        uses=uses,
    )


def _uses(records: LabRecords) -> dict[str, int]:
    """How many rates and statements rest on each source."""
    counts: dict[str, int] = {}
    for group in (*records.rates.values(), *records.statements.values()):
        for fact in group:
            counts[fact.source] = counts.get(fact.source, 0) + 1
    return counts
