"""What changed lately in a lab's tools, and which rates are in doubt: for the home page."""

from __future__ import annotations

from dataclasses import dataclass

from builder.findings.computed import Computed
from builder.records.lab import LabRecords
from builder.records.terms import Status
from builder.views.link import Link
from builder.views.references import recipe_link


@dataclass(frozen=True)
class ChangeRow:
    """A recipe, what is to be known about it, and when (empty where no day belongs to it)."""

    recipe: Link
    words: str
    day: str


def changed_rows(records: LabRecords, computed: Computed) -> tuple[ChangeRow, ...]:
    """Return the newest event of each recipe that started a new series, newest first."""
    found = []
    for etch_id, films in computed.own.items():
        events = [event for own in films.values() for event in own.events]
        if events and records.etches[etch_id].status is not Status.RETIRED:
            found.append((max(events), etch_id))
    return tuple(
        ChangeRow(recipe_link(records, etch_id), words, day.isoformat())
        for (day, words), etch_id in sorted(found, key=lambda one: (-one[0][0].toordinal(), one[1]))
    )


def doubtful_rows(records: LabRecords, computed: Computed) -> tuple[ChangeRow, ...]:
    """Return recipes whose target drifts, or whose runs contradict the literature."""
    rows = []
    for etch in sorted(records.etches.values(), key=lambda one: one.name.casefold()):
        if etch.status is Status.RETIRED:
            continue
        own = [rate for film in etch.targets if (rate := computed.own[etch.id].get(film))]
        words = []
        if any(rate.trend is not None and rate.trend.significant for rate in own):
            words.append("drifts")
        if any(computed.known(etch.id, film).conflict for film in etch.targets):
            words.append("runs contradict the literature")
        if words:
            rows.append(ChangeRow(recipe_link(records, etch.id), ", ".join(words), ""))
    return tuple(rows)
