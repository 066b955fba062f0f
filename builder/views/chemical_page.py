"""The page of a chemical: hazards, limits, what it must not meet, containers, first action."""

from __future__ import annotations

from dataclasses import dataclass

from builder.records.chemicals import Chemical
from builder.records.lab import LabRecords
from builder.records.safety import MixingRule, Precaution, Side
from builder.records.terms import FitnessVerdict, MixingSeverity, SideKind, Signal
from builder.views.link import Link, PageKind, page_url
from builder.views.number_text import as_recorded, as_written
from builder.views.references import (
    Citation,
    Fact,
    chemical_link,
    citations,
    etchant_link,
    known_facts,
    source_link,
)
from builder.views.words import PART_TRUST_NAMES, TRUST_NAMES

SIGNAL_WORDS = {
    Signal.DANGER: "Danger",
    Signal.WARNING: "Warning",
    Signal.NONE: "no signal word",
    Signal.PENDING: "not yet known here",
}
_FITNESS_WORDS = {
    FitnessVerdict.USABLE: "usable",
    FitnessVerdict.LIMITED: "limited",
    FitnessVerdict.NOT_USABLE: "not usable",
}
_SEVERITY_WORDS = {MixingSeverity.FORBID: "never", MixingSeverity.CAUTION: "with care"}


@dataclass(frozen=True)
class LimitRow:
    """One exposure limit, value as printed."""

    body: str
    kind: str
    value: str
    source: Link | None
    trust: str
    note: str


@dataclass(frozen=True)
class MixingRow:
    """Something that must not meet this chemical, and what happens."""

    other: str
    link: Link | None
    severity: str
    hazards: str
    gas: str
    note: str
    citations: tuple[Citation, ...]


@dataclass(frozen=True)
class ContainerRow:
    """A container material and its fitness."""

    material: str
    verdict: str
    limit: str
    note: str
    source: Link
    trust: str


@dataclass(frozen=True)
class ChemicalPage:
    """All that the page of a chemical shows."""

    url: str
    title: str
    description: str
    search_text: str
    signal: str
    is_hazardous: bool
    is_signal_pending: bool
    never_capped: bool
    hazard_words: tuple[str, ...]
    pictograms: tuple[str, ...]
    facts: tuple[Fact, ...]
    precautions: tuple[Fact, ...]
    how_known: tuple[Fact, ...]
    pending: tuple[str, ...]
    note: str | None
    citations: tuple[Citation, ...]
    limits: tuple[LimitRow, ...]
    mixing: tuple[MixingRow, ...]
    containers: tuple[ContainerRow, ...]
    etchants: tuple[Link, ...]


def chemical_page(records: LabRecords, chemical: Chemical) -> ChemicalPage:
    """Return the view of one chemical."""
    meanings = {code.code: code.meaning for code in records.codes.values()}
    used_in = [
        one.id for one in records.etchants.values() if any(p.chemical == chemical.id for p in one.parts)
    ]
    return ChemicalPage(
        url=page_url(PageKind.CHEMICAL, chemical.id),
        title=chemical.name,
        description=f"{chemical.name}: hazards, exposure limits, containers, what it must not meet.",
        search_text=" ".join((chemical.id, *chemical.synonyms, chemical.formula or "", *chemical.cas)),
        signal=SIGNAL_WORDS[chemical.signal],
        is_hazardous=chemical.hazardous,
        is_signal_pending=chemical.signal is Signal.PENDING,
        never_capped=chemical.never_capped is True,
        hazard_words=tuple(
            f"{code}: {meanings.get(code, 'meaning not recorded')}" for code in chemical.h_codes
        ),
        pictograms=tuple(
            f"{code}: {meanings.get(code, 'meaning not recorded')}" for code in chemical.pictograms
        ),
        facts=_facts(records, chemical),
        precautions=_precautions(records, chemical),
        how_known=known_facts(
            ("Identity", PART_TRUST_NAMES[chemical.trust.identity]),
            ("Boiling point", PART_TRUST_NAMES[chemical.trust.boiling_point]),
            ("Hazard codes", PART_TRUST_NAMES[chemical.trust.ghs]),
        ),
        pending=chemical.pending,
        note=chemical.note,
        citations=citations(records, chemical.source, None),
        limits=_limits(records, chemical),
        mixing=_mixing(records, chemical),
        containers=_containers(records, chemical),
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
        ("Reacts as", ", ".join(records.groups[group].name for group in chemical.groups)),
        ("Containers", chemical.containers_note),
        ("Waste", chemical.waste),
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


def _precautions(records: LabRecords, chemical: Chemical) -> tuple[Fact, ...]:
    if chemical.precaution is None:
        return known_facts(("First action", chemical.first_action))
    precaution: Precaution = records.precautions[chemical.precaution]
    return known_facts(
        ("First action", chemical.first_action),
        ("Protective equipment", precaution.ppe),
        ("Controls", precaution.controls),
        ("On skin", precaution.first_action_skin),
        ("In the eye", precaution.first_action_eye),
        ("If breathed in", precaution.first_action_inhalation),
        ("Monitoring", precaution.monitoring),
        ("Storage and waste", precaution.storage_and_waste),
        ("Besides", precaution.extra),
        ("Who decides", precaution.defer_to),
        ("How this is known", precaution.trust_note or TRUST_NAMES[precaution.trust]),
    )


def _limits(records: LabRecords, chemical: Chemical) -> tuple[LimitRow, ...]:
    return tuple(
        LimitRow(
            body=limit.body,
            kind=limit.kind.value,
            value=f"{as_recorded(limit.value)} {limit.unit}",
            source=None if limit.source is None else source_link(records, limit.source),
            trust=TRUST_NAMES[limit.trust],
            note=limit.note or "",
        )
        for limit in chemical.exposure_limits
    )


def _mixing(records: LabRecords, chemical: Chemical) -> tuple[MixingRow, ...]:
    rows = []
    for rule in records.mixing.values():
        if _names(rule.a, chemical):
            rows.append(_mixing_row(records, rule, rule.b))
        elif _names(rule.b, chemical):
            rows.append(_mixing_row(records, rule, rule.a))
    return tuple(sorted(rows, key=lambda row: (row.severity != "never", row.other.casefold())))


def _names(side: Side, chemical: Chemical) -> bool:
    if side.kind is SideKind.CHEMICAL:
        return side.id == chemical.id
    return side.kind is SideKind.GROUP and side.id in chemical.groups


def _mixing_row(records: LabRecords, rule: MixingRule, other: Side) -> MixingRow:
    link = _side_link(records, other)
    return MixingRow(
        other=link.text if link else _side_name(records, other),
        link=link,
        severity=_SEVERITY_WORDS[rule.severity],
        hazards=", ".join(rule.hazards),
        gas=rule.gas or "",
        note=rule.note or "",
        citations=citations(records, rule.source, rule.trust),
    )


def _side_link(records: LabRecords, side: Side) -> Link | None:
    if side.id is None:
        return None
    if side.kind is SideKind.CHEMICAL and side.id in records.chemicals:
        return chemical_link(records, side.id)
    if side.kind is SideKind.ETCHANT and side.id in records.etchants:
        return etchant_link(records, side.id)
    return None


def _side_name(records: LabRecords, side: Side) -> str:
    if side.id is None:
        return side.text or "not stated"
    if side.id in records.groups:
        return records.groups[side.id].name
    if side.id in records.containers:
        return records.containers[side.id].name
    return side.text or side.id


def _containers(records: LabRecords, chemical: Chemical) -> tuple[ContainerRow, ...]:
    return tuple(
        ContainerRow(
            material=material.name,
            verdict=_FITNESS_WORDS[fitness.verdict],
            limit=as_written(fitness.limit.text) if fitness.limit else "",
            note=fitness.note or "",
            source=source_link(records, fitness.source),
            trust=TRUST_NAMES[fitness.trust],
        )
        for material in sorted(records.containers.values(), key=lambda one: one.name.casefold())
        for fitness in material.fitness
        if fitness.chemical == chemical.id
    )
