"""The bench sheet of a chemical: one page to print and keep where it is poured."""

from __future__ import annotations

from dataclasses import dataclass

from builder.records.chemicals import Chemical
from builder.records.lab import LabRecords
from builder.views.link import Link, PageKind, page_url
from builder.views.references import Fact, known_facts
from builder.views.safety_strip import SafetyStrip, chemical_strip
from builder.views.safety_tables import SafetyTables, chemical_tables


@dataclass(frozen=True)
class BenchSheet:
    """What the sheet shows; `never` and `care` are what must not meet it, in words."""

    url: str
    title: str
    description: str
    search_text: str
    lab: str
    chemical: Link
    facts: tuple[Fact, ...]
    strip: SafetyStrip
    never: tuple[str, ...]
    care: tuple[str, ...]
    holds: tuple[str, ...]
    does_not_hold: tuple[str, ...]
    limits: tuple[str, ...]
    limits_missing: str


def sheet_url(chemical_id: str) -> str:
    """Return the address of a chemical's bench sheet."""
    return f"safety/sheets/{chemical_id}.html"


def bench_sheet(records: LabRecords, chemical: Chemical) -> BenchSheet:
    """Return the bench sheet of a chemical."""
    tables = chemical_tables(records, chemical)
    never, care = _meetings(tables, True), _meetings(tables, False)
    return BenchSheet(
        url=sheet_url(chemical.id),
        title=f"Bench sheet: {chemical.name}",
        description=f"{chemical.name}: hazards, equipment, first action, containers and waste on one page.",
        search_text=" ".join(("bench sheet print", chemical.id, *chemical.synonyms)),
        lab=records.settings.name,
        chemical=Link(chemical.name, page_url(PageKind.CHEMICAL, chemical.id)),
        facts=known_facts(
            ("Formula", chemical.formula),
            ("CAS number", ", ".join(chemical.cas)),
            ("Also called", ", ".join(chemical.synonyms)),
        ),
        strip=chemical_strip(records, chemical),
        never=never,
        care=tuple(words for words in care if words not in never),
        holds=tuple(
            f"{row.material} {row.words}{f' to {row.limit}' if row.limit else ''}"
            for row in tables.containers
            if row.verdict in ("usable", "limited")
        ),
        does_not_hold=tuple(row.material for row in tables.containers if row.verdict == "not-usable"),
        limits=tuple(f"{row.value} {row.code} ({row.body}, {row.as_of})" for row in tables.limits),
        limits_missing="pending: read the SDS" if tables.limits_pending else "none on record: read the SDS",
    )


def _meetings(tables: SafetyTables, forbidden: bool) -> tuple[str, ...]:
    rows = [row for row in tables.meetings if row.is_forbidden is forbidden]
    words = [row.words or ", ".join(link.text for link in row.others) for row in rows]
    return tuple(dict.fromkeys(words))
