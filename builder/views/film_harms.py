"""What must not meet a film: etches that are known to take or harm it, other than those meant for it."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass

from builder.engine import Verdict
from builder.findings.computed import Computed
from builder.findings.side_films import SIDE_FILM_NM, row_after
from builder.records.lab import LabRecords
from builder.records.terms import Status
from builder.views.link import Link
from builder.views.number_text import time_text
from builder.views.plan_words import RANK_WORDS, reason
from builder.views.recipe_answers import depth_text
from builder.views.references import etchant_link, recipe_link

HARM_TIME_S = 600.0


@dataclass(frozen=True)
class Harm:
    """One etch that takes or harms a film."""

    etch: Link
    rank: str
    why: str


@dataclass(frozen=True)
class Harms:
    """Etches that must not meet a film; `basis` says for which time and thickness the word is."""

    basis: str
    rows: tuple[Harm, ...]


def harms(records: LabRecords, computed: Computed, film: str) -> Harms:
    """Return what is lost to which etch in a set time; recipes first."""
    basis = f"The word is for {depth_text(SIDE_FILM_NM)} of the film, open for {time_text(HARM_TIME_S)}."
    return Harms(basis, (*_recipes(records, computed, film), *_etchants(records, computed, film)))


def _recipes(records: LabRecords, computed: Computed, film: str) -> Iterator[Harm]:
    for etch in sorted(records.etches.values(), key=lambda one: one.name.casefold()):
        if film in etch.targets or etch.status is Status.RETIRED or film not in computed.by_recipe[etch.id]:
            continue
        row = row_after(computed, computed.etching(etch.id), film, HARM_TIME_S)
        if row.verdict is Verdict.LOST:
            yield Harm(recipe_link(records, etch.id), RANK_WORDS[row.rank], reason(row))


def _etchants(records: LabRecords, computed: Computed, film: str) -> Iterator[Harm]:
    meant = {etch.etchant for etch in records.etches.values() if film in etch.targets}
    for etchant in sorted(computed.by_etchant, key=lambda one: records.etchants[one].name.casefold()):
        if etchant in meant or film not in computed.by_etchant[etchant]:
            continue
        row = row_after(computed, computed.etchant_alone(etchant), film, HARM_TIME_S)
        if row.verdict is Verdict.LOST:
            yield Harm(etchant_link(records, etchant), RANK_WORDS[row.rank], reason(row))
