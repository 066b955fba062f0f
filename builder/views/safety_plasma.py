"""The page on plasma and vapour hazards: where they sit, and what is done about them."""

from __future__ import annotations

from dataclasses import dataclass

from builder.records.lab import LabRecords
from builder.records.safety import PlasmaHazard
from builder.records.terms import HazardKind, State, Trust
from builder.views.link import Link
from builder.views.references import Citation, citations, etchant_link
from builder.views.safety_strip import PrecautionBlock, precaution_block
from builder.views.safety_words import VERIFY

_KIND_NAMES = {
    HazardKind.GAS: "The gas",
    HazardKind.CHAMBER: "The chamber",
    HazardKind.FILM: "The film on the wafer",
    HazardKind.BY_PRODUCT: "What the etch makes",
    HazardKind.PUMP: "The pump",
    HazardKind.RESIDUE: "What is left behind",
}
_CLASSES = (
    "toxic-corrosive-gases",
    "fluorinated-gases",
    "flammable-gases",
    "inert-gases",
    "iii-v-residues",
    "xef2",
)


@dataclass(frozen=True)
class HazardRow:
    """One hazard and its control."""

    subject: str
    hazard: str
    by_products: str
    control: str
    trust: str
    citations: tuple[Citation, ...]


@dataclass(frozen=True)
class HazardGroup:
    """Hazards that sit in one place."""

    anchor: str
    name: str
    rows: tuple[HazardRow, ...]


@dataclass(frozen=True)
class PlasmaPage:
    """All that the page shows."""

    url: str
    title: str
    description: str
    search_text: str
    groups: tuple[HazardGroup, ...]
    precautions: tuple[PrecautionBlock, ...]
    etchants: tuple[Link, ...]


def plasma_page(records: LabRecords) -> PlasmaPage:
    """Return the page on plasma and vapour hazards."""
    rows = {kind: _rows(records, kind) for kind in _KIND_NAMES}
    etchants = [one for one in records.etchants.values() if one.state is not State.LIQUID]
    return PlasmaPage(
        url="safety/plasma.html",
        title="Plasma and vapour hazards",
        description="Toxic gases, wall deposits, pump dust and residues of plasma and vapour etching.",
        search_text="plasma hazards chlorine fluorine pump oil purge by-products corrosion abatement",
        groups=tuple(HazardGroup(kind, _KIND_NAMES[kind], found) for kind, found in rows.items() if found),
        precautions=tuple(
            precaution_block(records, records.precautions[one])
            for one in _CLASSES
            if one in records.precautions
        ),
        etchants=tuple(etchant_link(records, one.id) for one in sorted(etchants, key=lambda one: one.id)),
    )


def _rows(records: LabRecords, kind: HazardKind) -> tuple[HazardRow, ...]:
    found = [one for one in records.hazards.values() if one.kind is kind]
    return tuple(_row(records, one) for one in sorted(found, key=lambda one: one.subject.casefold()))


def _row(records: LabRecords, hazard: PlasmaHazard) -> HazardRow:
    recalled = VERIFY if hazard.trust is Trust.RECALLED else ""
    return HazardRow(
        subject=hazard.subject,
        hazard=hazard.hazard,
        by_products=hazard.by_products or "",
        control=hazard.control,
        trust=hazard.trust_note or recalled,
        citations=citations(records, hazard.source, hazard.trust),
    )
