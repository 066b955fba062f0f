"""Which mixing rules speak of two things that meet: a pure look-up, never inside one mixture."""

from __future__ import annotations

from collections.abc import Iterable, Iterator, Mapping
from dataclasses import dataclass, field
from typing import TypeAlias

from builder.records.chemicals import Chemical
from builder.records.etchants import Etchant
from builder.records.film_chemistry import reacting_groups, reacting_words
from builder.records.lab import LabRecords
from builder.records.safety import MixingRule, Side
from builder.records.terms import FilmFamily, MixingSeverity, SideKind, State

Handle: TypeAlias = tuple[SideKind, str]
"""How a rule may name a thing: a kind, and an id or words."""

HF_PRECAUTION = "hf"
"""The precaution that all fluorides share; with an acid beside them they give hydrofluoric acid."""
ACID_GROUP = "acid"
ACIDIC_FLUORIDE_GROUP = "acidic-fluoride"


@dataclass(frozen=True)
class Bearer:
    """What carries a handle: its name in a sentence, and its chemical id if it is one substance."""

    name: str
    chemical: str | None = None


@dataclass(frozen=True)
class Presence:
    """Something that can meet something else: its name, its handles with their bearers, its chemicals."""

    name: str
    bearers: Mapping[Handle, Bearer] = field(default_factory=dict)
    chemicals: frozenset[str] = frozenset()

    def bears(self, *handles: Handle) -> bool:
        """Tell whether it carries any of the handles."""
        return any(handle in self.bearers for handle in handles)


@dataclass(frozen=True)
class Meeting:
    """One mixing rule that two things fulfil, and who fulfils its sides."""

    rule: MixingRule
    one: Bearer
    other: Bearer


def chemical_presence(records: LabRecords, chemical_id: str) -> Presence:
    """Return a chemical, with its groups and with the parts of a stock solution."""
    chemical = records.chemicals[chemical_id]
    bearers = dict(_chemical_bearers(records, chemical, chemical.name))
    for part in chemical.parts:
        inner = records.chemicals[part.chemical]
        for handle, bearer in _chemical_bearers(records, inner, f"{inner.name} (in {chemical.name})"):
            bearers.setdefault(handle, bearer)
    parts = frozenset(part.chemical for part in chemical.parts)
    return Presence(chemical.name, bearers, parts | {chemical_id})


def etchant_presence(records: LabRecords, etchant_id: str) -> Presence:
    """Return an etchant, with its own groups and all that its parts carry."""
    etchant = records.etchants[etchant_id]
    bearers: dict[Handle, Bearer] = {}
    own = Bearer(etchant.name)
    for handle in _own_handles(records, SideKind.ETCHANT, etchant.id, etchant.groups):
        bearers[handle] = own
    chemicals: frozenset[str] = frozenset()
    for part in etchant.parts:
        inner = chemical_presence(records, part.chemical)
        chemicals |= inner.chemicals
        for handle, bearer in inner.bearers.items():
            bearers.setdefault(handle, Bearer(f"{bearer.name} in {etchant.name}", bearer.chemical))
    if holds_hydrofluoric_acid(records, etchant):
        bearers.setdefault((SideKind.GROUP, ACIDIC_FLUORIDE_GROUP), own)
    for words in _plasma_words(etchant):
        bearers[(SideKind.MATERIAL, words)] = own
    return Presence(etchant.name, bearers, chemicals)


def substance_presence(records: LabRecords, substance_id: str) -> Presence:
    """Return what an id names: an etchant if there is one, else a chemical (one id may be both)."""
    if substance_id in records.etchants:
        return etchant_presence(records, substance_id)
    return chemical_presence(records, substance_id)


def film_presence(records: LabRecords, film_id: str) -> Presence:
    """Return a film, with its groups as recorded and as its formula tells."""
    film = records.films[film_id]
    own = Bearer(film.name)
    groups = {*film.groups, *_member_groups(records, film_id), *reacting_groups(film)}
    if film.family is FilmFamily.RESIST:
        groups.add("resist")
    bearers = {(SideKind.FILM_GROUP, group): own for group in groups}
    for words in reacting_words(film):
        bearers[(SideKind.MATERIAL, words)] = own
    return Presence(film.name, bearers)


def container_presence(records: LabRecords, container_id: str) -> Presence:
    """Return a container material."""
    name = records.containers[container_id].name
    return Presence(name, {(SideKind.CONTAINER, container_id): Bearer(name)})


def words_presence(words: str, name: str) -> Presence:
    """Return something that rules name in words only."""
    return Presence(name, {(SideKind.MATERIAL, words): Bearer(name)})


def meetings(records: LabRecords, one: Presence, other: Presence) -> tuple[Meeting, ...]:
    """
    Return the rules that speak of two things meeting, in the order of their ids.

    A pair of chemicals that one of the two already holds together brings nothing new and is left
    out: piranha is sulfuric acid and peroxide by intent.
    """
    found: dict[str, Meeting] = {}
    for handle, theirs in other.bearers.items():
        for rule in records.mixing_by_side.get(handle, ()):
            for first, second in ((rule.a, rule.b), (rule.b, rule.a)):
                mine = one.bearers.get(handle_of(first))
                if mine is None or handle_of(second) != handle or _is_one_mixture(one, other, mine, theirs):
                    continue
                found.setdefault(rule.id, Meeting(rule, mine, theirs))
    return tuple(found[rule] for rule in sorted(found))


def gravest(found: Iterable[Meeting]) -> tuple[Meeting, ...]:
    """Return one meeting for each pair of bearers: forbidden before cautioned, with a gas before without."""
    kept: dict[tuple[str, str], Meeting] = {}
    for meeting in sorted(found, key=_gravity):
        kept.setdefault((meeting.one.name, meeting.other.name), meeting)
    return tuple(kept.values())


def _gravity(meeting: Meeting) -> tuple[bool, bool, str]:
    rule = meeting.rule
    return rule.severity is not MixingSeverity.FORBID, rule.gas is None, rule.id


def pairs_of_chemicals(records: LabRecords) -> dict[tuple[str, str], tuple[MixingRule, ...]]:
    """Return every pair of chemicals that a rule names, both ways round, with its rules."""
    present = {chemical_id: chemical_presence(records, chemical_id) for chemical_id in records.chemicals}
    pairs: dict[tuple[str, str], tuple[MixingRule, ...]] = {}
    for rule in records.mixing.values():
        firsts = [one for one, presence in present.items() if presence.bears(handle_of(rule.a))]
        seconds = [one for one, presence in present.items() if presence.bears(handle_of(rule.b))]
        for pair in {(a, b) for a in firsts for b in seconds if a != b}:
            for key in (pair, pair[::-1]):
                if rule not in pairs.get(key, ()):
                    pairs[key] = (*pairs.get(key, ()), rule)
    return pairs


def holds_hydrofluoric_acid(records: LabRecords, etchant: Etchant) -> bool:
    """
    Tell whether an etchant holds hydrofluoric acid, as a part or made in place.

    A fluoride beside an acid gives HF: ammonium fluoride in nitric acid does. Where the parts are
    unknown, its precaution decides.
    """
    if not etchant.parts:
        return etchant.precaution == HF_PRECAUTION
    parts = [records.chemicals[part.chemical] for part in etchant.parts]
    fluorides = [part for part in parts if part.precaution == HF_PRECAUTION or part.formula == "HF"]
    acids = [part for part in parts if ACID_GROUP in part.groups]
    return bool(fluorides) and bool(acids)


def _chemical_bearers(records: LabRecords, chemical: Chemical, name: str) -> Iterator[tuple[Handle, Bearer]]:
    for handle in _own_handles(records, SideKind.CHEMICAL, chemical.id, chemical.groups):
        yield handle, Bearer(name, chemical.id)


def _own_handles(
    records: LabRecords, kind: SideKind, record_id: str, groups: Iterable[str]
) -> Iterator[Handle]:
    yield kind, record_id
    for group in sorted({*groups, *_member_groups(records, record_id)}):
        yield SideKind.GROUP, group


def _member_groups(records: LabRecords, record_id: str) -> Iterator[str]:
    return (group.id for group in records.groups.values() if record_id in group.members)


def _plasma_words(etchant: Etchant) -> Iterator[str]:
    if any(part.chemical == "o2" for part in etchant.parts) and etchant.state is State.PLASMA:
        yield "hot surfaces, ozone, oxygen plasma"


def handle_of(side: Side) -> Handle:
    """Return how a rule names one of its sides."""
    return side.handle


def _is_one_mixture(one: Presence, other: Presence, mine: Bearer, theirs: Bearer) -> bool:
    if mine.chemical is None or theirs.chemical is None:
        return False
    return mine.chemical in other.chemicals or theirs.chemical in one.chemicals
