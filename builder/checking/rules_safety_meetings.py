"""What must not meet: an etchant and a film, one wet step and the next, the parts of a mixture."""

from __future__ import annotations

import re
from collections.abc import Iterable, Iterator, Mapping, Sequence
from dataclasses import dataclass
from itertools import combinations

from builder.checking.rules_safety_finding import (
    SafetyFinding,
    caution,
    of_meeting,
    without_repeats,
)
from builder.records.etchants import Etchant
from builder.records.film_chemistry import hydride_of
from builder.records.lab import LabRecords
from builder.records.mixing_match import (
    ACID_GROUP,
    Meeting,
    Presence,
    chemical_presence,
    etchant_presence,
    film_presence,
    gravest,
    meetings,
    substance_presence,
    words_presence,
)
from builder.records.terms import FilmFamily, MixingSeverity, Origin, SideKind, State

THICK_ORGANIC_NM = 3000.0
"""Resist or polymer thicker than this, nm, counts as organic mass. Common practice, no source."""
ORGANIC_MASS = "thick photoresist or organic mass"
"""The words of the rule for organic mass in piranha."""
_ORGANIC_FAMILIES = frozenset({FilmFamily.RESIST, FilmFamily.POLYMER})
BOND_WORDS = re.compile(r"\b(wax|tape|adhesive|glue|grease|resist|thermoplastic)\w*\b", re.IGNORECASE)
WATER = "water"
CARRIED_OVER = ", carried over without a rinse"


@dataclass(frozen=True)
class WetStep:
    """
    One step that wets or dries a sample: an etchant or chemical by id, or None where none is named.

    `clears` tells whether it leaves the sample free of what it was wet with: a water rinse, drying.
    Drying out of a solvent names the solvent: it meets what was there before, and leaves nothing.
    """

    name: str
    substance: str | None = None
    clears: bool = False


def film_gas(
    records: LabRecords,
    etchant_id: str,
    film_ids: str | Iterable[str],
    thickness_nm: Mapping[str, float] | None = None,
) -> tuple[SafetyFinding, ...]:
    """Return what an etchant and the film or films it reaches can do to the person: gas, heat, fire."""
    films = (film_ids,) if isinstance(film_ids, str) else film_ids
    etchant = etchant_presence(records, etchant_id)
    found: list[SafetyFinding] = []
    for film_id in dict.fromkeys(films):
        found += gas_of_film(records, etchant, film_id, (thickness_nm or {}).get(film_id))
    return without_repeats(found)


def gas_of_film(
    records: LabRecords, etchant: Presence, film_id: str, thickness_nm: float | None = None
) -> tuple[SafetyFinding, ...]:
    """Return what an etchant and one film do to a person; resist is organic mass from a thickness on."""
    film = film_presence(records, film_id)
    met = gravest(meetings(records, etchant, film))
    found = [of_meeting("film-meets-etchant", meeting) for meeting in met]
    if not met:
        found += _unknown_hydride(records, etchant, film_id)
    if _is_organic_mass(records, film_id, thickness_nm):
        mass = words_presence(ORGANIC_MASS, f"{film.name}, thicker than {THICK_ORGANIC_NM / 1000:g} µm")
        found += [of_meeting("thick-organic", meeting) for meeting in meetings(records, etchant, mass)]
    return without_repeats(found)


def _is_organic_mass(records: LabRecords, film_id: str, thickness_nm: float | None) -> bool:
    thick = thickness_nm is not None and thickness_nm > THICK_ORGANIC_NM
    return thick and records.films[film_id].family in _ORGANIC_FAMILIES


def _unknown_hydride(records: LabRecords, etchant: Presence, film_id: str) -> Iterator[SafetyFinding]:
    film = records.films[film_id]
    gas = hydride_of(film)
    if gas is not None and etchant.bears((SideKind.GROUP, ACID_GROUP)):
        yield caution(
            "film-gas-unknown",
            f"{film.name} in {etchant.name}: no record says whether {gas} forms in this acid. "
            "Treat it as if it does: exhausted bench, gas monitor.",
        )


def bond_findings(records: LabRecords, etchant_id: str, bond: str | None) -> tuple[SafetyFinding, ...]:
    """Return what the wax, tape or grease that holds a sample does in an etchant; words are all we have."""
    if bond is None or not BOND_WORDS.search(bond):
        return ()
    mass = words_presence(ORGANIC_MASS, f'what holds the sample ("{bond}")')
    met = meetings(records, etchant_presence(records, etchant_id), mass)
    return without_repeats([of_meeting("bond-in-oxidiser", meeting) for meeting in met])


def sequence_findings(records: LabRecords, steps: Sequence[WetStep]) -> tuple[SafetyFinding, ...]:
    """Return what a sample carries from one step into the next that must not meet it."""
    carried: Presence | None = None
    found: list[SafetyFinding] = []
    for place, step in enumerate(steps):
        if step.substance is not None:
            here = substance_presence(records, step.substance)
            met = () if carried is None else gravest(meetings(records, here, carried))
            found += [of_meeting("unrinsed-steps", meeting, CARRIED_OVER, place) for meeting in met]
            carried = here if _is_wet(records, step.substance) else None
        if step.clears:
            carried = None
    return without_repeats(found)


def _is_wet(records: LabRecords, substance_id: str) -> bool:
    """Tell whether a sample comes out wet: out of a chamber it does not."""
    etchant = records.etchants.get(substance_id)
    return etchant is None or etchant.state is State.LIQUID


def forbidden_pairs(
    records: LabRecords, substances: Sequence[str], film_ids: Iterable[str] = ()
) -> tuple[SafetyFinding, ...]:
    """
    Return what must not meet among etchants or chemicals used in this order without a rinse, and the films.

    Steps that are rinsed apart belong in `sequence_findings` with their rinses.
    """
    steps = [WetStep(substance, substance) for substance in substances]
    found = list(sequence_findings(records, steps))
    films = tuple(film_ids)
    for substance in substances:
        if substance in records.etchants:
            found += film_gas(records, substance, films)
    return without_repeats(found)


def mixture_findings(records: LabRecords, etchant: Etchant) -> tuple[SafetyFinding, ...]:
    """
    Return the parts of a lab's own liquid that must never meet.

    A pair that a published mixture holds together is left out: there somebody has done it and said how.
    """
    if etchant.origin is Origin.REFERENCE or etchant.state is not State.LIQUID:
        return ()
    met = _unpublished_meetings(records, [part.chemical for part in etchant.parts])
    return without_repeats([of_meeting("forbidden-mixture", meeting) for meeting in met])


def bench_findings(records: LabRecords, chemicals: Iterable[str]) -> tuple[SafetyFinding, ...]:
    """Return the chemicals of one bench that must never meet there, published mixtures left out."""
    found = [
        caution(
            "bench-shared", f"one bench holds both: {of_meeting('', meeting).message}", meeting.rule.source
        )
        for meeting in _unpublished_meetings(records, chemicals)
    ]
    return without_repeats(found)


def _unpublished_meetings(records: LabRecords, chemicals: Iterable[str]) -> Iterator[Meeting]:
    published = _published_pairs(records)
    for one, other in combinations(sorted(set(chemicals)), 2):
        if frozenset({one, other}) in published:
            continue
        met = meetings(records, chemical_presence(records, one), chemical_presence(records, other))
        for meeting in gravest(met):
            if meeting.rule.severity is MixingSeverity.FORBID:
                yield meeting


def _published_pairs(records: LabRecords) -> frozenset[frozenset[str]]:
    return frozenset(
        frozenset(pair)
        for etchant in records.etchants.values()
        if etchant.origin is Origin.REFERENCE
        for pair in combinations(sorted({part.chemical for part in etchant.parts}), 2)
    )
