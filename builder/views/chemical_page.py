"""The page of a chemical: hazards, limits, what it must not meet, containers, first action."""

from __future__ import annotations

from dataclasses import dataclass

from builder.records.chemicals import Chemical
from builder.records.lab import LabRecords
from builder.views.link import Link, PageKind, page_url
from builder.views.number_text import as_written
from builder.views.references import Citation, Fact, citations, etchant_link, known_facts
from builder.views.safety_sheet import sheet_url
from builder.views.safety_strip import SafetyStrip, chemical_strip
from builder.views.safety_tables import SafetyTables, chemical_tables
from builder.views.words import PART_TRUST_NAMES


@dataclass(frozen=True)
class ChemicalPage:
    """All that the page of a chemical shows."""

    url: str
    title: str
    description: str
    search_text: str
    found_as: str
    safety: SafetyStrip
    tables: SafetyTables
    sheet: Link
    facts: tuple[Fact, ...]
    how_known: tuple[Fact, ...]
    pending: tuple[str, ...]
    note: str | None
    citations: tuple[Citation, ...]
    etchants: tuple[Link, ...]


def chemical_page(records: LabRecords, chemical: Chemical) -> ChemicalPage:
    """Return the view of one chemical."""
    used_in = [
        one.id for one in records.etchants.values() if any(p.chemical == chemical.id for p in one.parts)
    ]
    return ChemicalPage(
        url=page_url(PageKind.CHEMICAL, chemical.id),
        title=chemical.name,
        description=f"{chemical.name}: hazards, exposure limits, containers, what it must not meet.",
        search_text=" ".join((chemical.id, *chemical.synonyms, chemical.formula or "", *chemical.cas)),
        found_as=" ".join((chemical.name, *chemical.cas)),
        safety=chemical_strip(records, chemical),
        tables=chemical_tables(records, chemical),
        sheet=Link("Bench sheet to print", sheet_url(chemical.id)),
        facts=_facts(records, chemical),
        how_known=known_facts(
            ("Identity", PART_TRUST_NAMES[chemical.trust.identity]),
            ("Boiling point", PART_TRUST_NAMES[chemical.trust.boiling_point]),
            ("Hazard codes", PART_TRUST_NAMES[chemical.trust.ghs]),
        ),
        pending=chemical.pending,
        note=chemical.note,
        citations=citations(records, chemical.source, None),
        etchants=tuple(etchant_link(records, one) for one in used_in),
    )


def _facts(records: LabRecords, chemical: Chemical) -> tuple[Fact, ...]:
    facts = known_facts(
        ("Formula", chemical.formula),
        ("CAS number", ", ".join(chemical.cas)),
        ("Used as", chemical.role),
        ("Molar mass", as_written(chemical.molar_mass.text) if chemical.molar_mass else None),
        ("Boiling point", as_written(chemical.boiling_point.text) if chemical.boiling_point else None),
        ("Boiling point of the solution", chemical.boiling_point_solution),
        ("Containers", chemical.containers_note),
    )
    if not chemical.parts:
        return facts
    parts = tuple(
        Link(
            f"{part.amount} {records.chemicals[part.chemical].name}",
            page_url(PageKind.CHEMICAL, part.chemical),
        )
        for part in chemical.parts
    )
    return (*facts, Fact("Made of", "", parts))
