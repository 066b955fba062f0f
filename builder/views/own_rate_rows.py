"""The computed rates of recipes by their own runs, film by film."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass

from builder.engine import Rank
from builder.findings.computed import Computed
from builder.records.etches import Etch
from builder.records.lab import LabRecords
from builder.records.terms import Status
from builder.views.link import Link
from builder.views.number_text import NumberText
from builder.views.recipe_answers import band_text
from builder.views.recipe_standing import runs_text
from builder.views.references import FilmRef, film_ref, recipe_link


@dataclass(frozen=True)
class OwnRateRow:
    """What the runs of one recipe say of one film."""

    film: FilmRef
    recipe: Link
    rate: NumberText
    rests_on: str


def own_rate_rows(records: LabRecords, computed: Computed, etches: Iterable[Etch]) -> tuple[OwnRateRow, ...]:
    """Return what the runs of some recipes say, the targets of each first; retired recipes say nothing."""
    rows = []
    for etch in etches:
        if etch.status is Status.RETIRED:
            continue
        for film, own in computed.own[etch.id].items():
            known = computed.known(etch.id, film)
            if known.rank is not Rank.OWN:
                continue
            seen = "" if any(run.rate.log_rate is not None for run in own.used) else ", no loss seen"
            rows.append(
                OwnRateRow(
                    film=film_ref(records, film),
                    recipe=recipe_link(records, etch.id),
                    rate=band_text(known.band),
                    rests_on=f"{runs_text(len(own.used))}{seen}",
                )
            )
    return tuple(rows)
