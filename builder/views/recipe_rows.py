"""Recipes as rows of a list, with what the filters ask for."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass

from builder.records.etches import Etch
from builder.records.lab import LabRecords
from builder.views.link import Link
from builder.views.references import FilmRef, etchant_link, film_ref, recipe_link, tool_link
from builder.views.words import METHOD_NAMES, STATUS_NAMES

NO_RUN = "no run"


@dataclass(frozen=True)
class RecipeRow:
    """One recipe in a list; `last_run` is a date or "no run"."""

    recipe: Link
    targets: tuple[FilmRef, ...]
    masks: tuple[FilmRef, ...]
    method_id: str
    method: str
    etchant: Link
    tool_id: str
    tool: Link
    status_id: str
    status: str
    run_count: int
    last_run: str
    search_text: str


def recipe_rows(records: LabRecords, etches: Iterable[Etch]) -> tuple[RecipeRow, ...]:
    """Return the rows of some recipes: proven ones first, retired ones last, then by name."""
    order = {"proven": 0, "draft": 1, "retired": 2}
    chosen = sorted(etches, key=lambda etch: (order[etch.status], etch.name.casefold(), etch.id))
    return tuple(_row(records, etch) for etch in chosen)


def _row(records: LabRecords, etch: Etch) -> RecipeRow:
    runs = records.runs.get(etch.id, ())
    targets = tuple(film_ref(records, film) for film in etch.targets)
    synonyms = [name for film in etch.targets for name in records.films[film].synonyms]
    etchant = records.etchants[etch.etchant]
    return RecipeRow(
        recipe=recipe_link(records, etch.id),
        targets=targets,
        masks=tuple(film_ref(records, mask.film) for mask in etch.masks),
        method_id=etch.method,
        method=METHOD_NAMES[etch.method],
        etchant=etchant_link(records, etch.etchant),
        tool_id=etch.tool,
        tool=tool_link(records, etch.tool),
        status_id=etch.status,
        status=STATUS_NAMES[etch.status],
        run_count=len({(run.date, run.wafer) for run in runs}),
        last_run=max((run.date.isoformat() for run in runs), default=NO_RUN),
        search_text=" ".join((etch.id, *synonyms, *etchant.synonyms, *etch.labels)),
    )
