"""The front page of safety: hazards by class, the pages and matrices, what is still pending."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass

from builder.findings.safety import etchant_hazards
from builder.records.lab import LabRecords
from builder.records.safety import Precaution
from builder.views.link import Link
from builder.views.references import Fact, chemical_link, etchant_link
from builder.views.safety_matrix import PAGES
from builder.views.safety_sheet import sheet_url
from builder.views.safety_strip import PrecautionBlock, contacts, precaution_block
from builder.views.safety_words import PENDING_WORDS


@dataclass(frozen=True)
class ClassBlock:
    """One class of hazard: its precaution, and every chemical and etchant it covers."""

    anchor: str
    block: PrecautionBlock
    chemicals: tuple[Link, ...]
    etchants: tuple[Link, ...]


@dataclass(frozen=True)
class PendingRow:
    """One kind of fact that is missing, and for which records."""

    what: str
    where: tuple[Link, ...]


@dataclass(frozen=True)
class OverviewPage:
    """All that the front page of safety shows."""

    url: str
    title: str
    description: str
    search_text: str
    contacts: tuple[Fact, ...]
    local_rules: tuple[str, ...]
    matrices: tuple[Link, ...]
    classes: tuple[ClassBlock, ...]
    sheets: tuple[Link, ...]
    pending: tuple[PendingRow, ...]


def overview_page(records: LabRecords) -> OverviewPage:
    """Return the front page of safety."""
    hazardous = [one for one in records.chemicals.values() if one.hazardous]
    by_name = sorted(hazardous, key=lambda one: one.name.casefold())
    return OverviewPage(
        url="safety/index.html",
        title="Safety",
        description="Every hazard by class, what must not meet, containers, first action, bench sheets.",
        search_text="safety hazards protective equipment first aid waste SDS bench sheets",
        contacts=contacts(records),
        local_rules=records.settings.local_rules,
        matrices=PAGES,
        classes=tuple(_class(records, one) for one in sorted(records.precautions.values(), key=_by_name)),
        sheets=tuple(Link(one.name, sheet_url(one.id)) for one in by_name),
        pending=tuple(_pending(records)),
    )


def _by_name(precaution: Precaution) -> str:
    return precaution.name.casefold()


def _class(records: LabRecords, precaution: Precaution) -> ClassBlock:
    chemicals = [one.id for one in records.chemicals.values() if one.precaution == precaution.id]
    etchants = [
        one.id
        for one in records.etchants.values()
        if one.precaution == precaution.id or precaution.id in etchant_hazards(records, one.id).precautions
    ]
    return ClassBlock(
        anchor=f"class-{precaution.id}",
        block=precaution_block(records, precaution),
        chemicals=tuple(chemical_link(records, one) for one in sorted(chemicals)),
        etchants=tuple(etchant_link(records, one) for one in sorted(etchants)),
    )


def _pending(records: LabRecords) -> Iterator[PendingRow]:
    for name, words in PENDING_WORDS.items():
        links = [chemical_link(records, one.id) for one in records.chemicals.values() if name in one.pending]
        links += [etchant_link(records, one.id) for one in records.etchants.values() if name in one.pending]
        if links:
            yield PendingRow(words, tuple(sorted(links, key=lambda link: link.text.casefold())))
