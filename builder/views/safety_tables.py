"""The safety tables of a substance: exposure limits, what must not meet it, containers, gas from films."""

from __future__ import annotations

from collections.abc import Iterable, Iterator
from dataclasses import dataclass

from builder.checking.rules_safety_containers import container_fit
from builder.checking.rules_safety_finding import advice_of
from builder.records.chemicals import Chemical, ExposureLimit
from builder.records.lab import LabRecords
from builder.records.mixing_match import (
    Meeting,
    Presence,
    chemical_presence,
    container_presence,
    etchant_presence,
    film_presence,
    handle_of,
    meetings,
)
from builder.records.safety import MixingRule, Side
from builder.records.terms import MixingSeverity, SideKind
from builder.views.link import Link
from builder.views.number_text import as_recorded, as_written
from builder.views.references import (
    Citation,
    chemical_link,
    citations,
    etchant_link,
    film_link,
    source_link,
)
from builder.views.safety_words import EXPOSURE_WORDS, FITNESS_WORDS, NO_CONTAINER_RECORD, SEVERITY_WORDS
from builder.views.words import TRUST_NAMES


@dataclass(frozen=True)
class ExposureRow:
    """One exposure limit, value as printed: whose, of which kind, as of when."""

    body: str
    code: str
    kind: str
    value: str
    as_of: str
    source: Link | None
    trust: str
    note: str


@dataclass(frozen=True)
class MeetingRow:
    """Something that must not meet this substance, and what happens."""

    others: tuple[Link, ...]
    words: str
    severity: str
    is_forbidden: bool
    hazards: str
    gas: str
    advice: str
    citations: tuple[Citation, ...]


@dataclass(frozen=True)
class HoldingRow:
    """A container material and whether it holds the substance; `verdict` is for the mark, "" for unknown."""

    material: str
    verdict: str
    words: str
    limit: str
    note: str
    source: Link | None
    trust: str


@dataclass(frozen=True)
class SafetyTables:
    """The tables of one substance."""

    limits: tuple[ExposureRow, ...]
    limits_pending: bool
    meetings: tuple[MeetingRow, ...]
    films: tuple[MeetingRow, ...]
    containers: tuple[HoldingRow, ...]

    @property
    def never_meets(self) -> tuple[str, ...]:
        """What it must never meet, groups by their name: the first thing to know about it."""
        rows = [row for row in self.meetings if row.is_forbidden]
        names = (row.words or ", ".join(link.text for link in row.others) for row in rows)
        return tuple({name.casefold(): name for name in names}.values())


def chemical_tables(records: LabRecords, chemical: Chemical) -> SafetyTables:
    """Return the tables of a chemical."""
    presence = chemical_presence(records, chemical.id)
    return _tables(records, presence, chemical.id, [chemical])


def etchant_tables(records: LabRecords, etchant_id: str) -> SafetyTables:
    """Return the tables of an etchant; the exposure limits are those of its parts."""
    presence = etchant_presence(records, etchant_id)
    parts = [records.chemicals[part.chemical] for part in records.etchants[etchant_id].parts]
    return _tables(records, presence, etchant_id, parts)


def _tables(records: LabRecords, presence: Presence, substance: str, parts: list[Chemical]) -> SafetyTables:
    several = len(parts) > 1
    return SafetyTables(
        limits=tuple(
            _limit(records, limit, part.name if several else "")
            for part in parts
            for limit in part.exposure_limits
        ),
        limits_pending=any("exposure_limits" in part.pending for part in parts) or not parts,
        meetings=_meetings(records, presence),
        films=_films(records, presence),
        containers=tuple(_holding(records, presence, one, substance) for one in records.containers),
    )


def _limit(records: LabRecords, limit: ExposureLimit, part: str) -> ExposureRow:
    source = None if limit.source is None else records.sources[limit.source]
    return ExposureRow(
        body=f"{part}: {limit.body}" if part else limit.body,
        code=limit.kind.value,
        kind=f"{limit.kind.value}, {EXPOSURE_WORDS[limit.kind]}",
        value=f"{as_recorded(limit.value)} {limit.unit}",
        as_of=str(source.year) if source is not None and source.year is not None else "year not stated",
        source=None if limit.source is None else source_link(records, limit.source),
        trust=TRUST_NAMES[limit.trust],
        note=limit.note or "",
    )


def _meetings(records: LabRecords, presence: Presence) -> tuple[MeetingRow, ...]:
    rows = []
    for rule in sorted(records.mixing.values(), key=lambda one: one.id):
        for mine, other in ((rule.a, rule.b), (rule.b, rule.a)):
            is_film = other.kind in (SideKind.FILM_GROUP, SideKind.CONTAINER)
            if presence.bears(handle_of(mine)) and not is_film and not _is_own(presence, other):
                rows.append(
                    _meeting_row(records, rule, _side_links(records, other), _side_words(records, other))
                )
                break
    return _ordered(rows)


def _films(records: LabRecords, presence: Presence) -> tuple[MeetingRow, ...]:
    by_rule: dict[str, tuple[Meeting, list[str]]] = {}
    for film_id, film in records.films.items():
        if film.is_family:
            continue
        for meeting in meetings(records, presence, film_presence(records, film_id)):
            by_rule.setdefault(meeting.rule.id, (meeting, []))[1].append(film_id)
    rows = []
    for meeting, films in by_rule.values():
        links = tuple(film_link(records, film) for film in films)
        rows.append(_meeting_row(records, meeting.rule, links, ""))
    return _ordered(rows)


def _is_own(presence: Presence, other: Side) -> bool:
    return other.kind is SideKind.CHEMICAL and other.id in presence.chemicals


def _meeting_row(records: LabRecords, rule: MixingRule, links: tuple[Link, ...], words: str) -> MeetingRow:
    return MeetingRow(
        others=links,
        words=words,
        severity=SEVERITY_WORDS[rule.severity],
        is_forbidden=rule.severity is MixingSeverity.FORBID,
        hazards=", ".join(rule.hazards),
        gas=rule.gas or "",
        advice=advice_of(rule.note),
        citations=citations(records, rule.source, rule.trust),
    )


def _ordered(rows: Iterable[MeetingRow]) -> tuple[MeetingRow, ...]:
    return tuple(sorted(rows, key=lambda row: not row.is_forbidden))


def _side_links(records: LabRecords, side: Side) -> tuple[Link, ...]:
    name = side.id or ""
    if side.kind is SideKind.CHEMICAL and name in records.chemicals:
        return (chemical_link(records, name),)
    if side.kind is SideKind.ETCHANT and name in records.etchants:
        return (etchant_link(records, name),)
    if side.kind is SideKind.GROUP and name in records.groups:
        return tuple(_members(records, name))
    return ()


def _members(records: LabRecords, group_id: str) -> Iterator[Link]:
    """Yield links to the members, those that name the group themselves included."""
    named = {one.id for one in records.chemicals.values() if group_id in one.groups}
    named |= {one.id for one in records.etchants.values() if group_id in one.groups}
    for member in sorted(named.union(records.groups[group_id].members)):
        if member in records.chemicals:
            yield chemical_link(records, member)
        elif member in records.etchants:
            yield etchant_link(records, member)


def _side_words(records: LabRecords, side: Side) -> str:
    group = records.groups.get(side.id or "") if side.kind is SideKind.GROUP else None
    return group.name if group is not None else side.text or ""


def _holding(records: LabRecords, presence: Presence, container_id: str, substance: str) -> HoldingRow:
    material = records.containers[container_id]
    fit = container_fit(records, container_id, substance)
    attacked = meetings(records, container_presence(records, container_id), presence)
    if fit.fitness is None:
        if not attacked:
            return HoldingRow(material.name, "", NO_CONTAINER_RECORD, "", "", None, "")
        rule = attacked[0].rule
        source = source_link(records, rule.source[0])
        words = "does not hold it"
        return HoldingRow(
            material.name, "not-usable", words, "", advice_of(rule.note), source, TRUST_NAMES[rule.trust]
        )
    by = f"By its part {fit.by_part}. " if fit.by_part else ""
    return HoldingRow(
        material=material.name,
        verdict=fit.fitness.verdict.value,
        words=FITNESS_WORDS[fit.fitness.verdict],
        limit=as_written(fit.fitness.limit.text) if fit.fitness.limit else "",
        note=by + (fit.fitness.note or ""),
        source=source_link(records, fit.fitness.source),
        trust=TRUST_NAMES[fit.fitness.trust],
    )
