"""The page of a recipe, in the order in which it is needed at the bench."""

from __future__ import annotations

from dataclasses import dataclass

from builder.records.etches import Etch
from builder.records.lab import LabRecords
from builder.records.runs import Run
from builder.views.link import PageKind, page_url
from builder.views.number_text import as_recorded
from builder.views.recipe_record import RecipeRecord, recipe_record
from builder.views.recipe_rows import RecipeRow, recipe_rows
from builder.views.references import FilmRef, film_ref


@dataclass(frozen=True)
class RunRow:
    """One row of the run table, as recorded."""

    date: str
    wafer: str
    film: FilmRef
    time: str
    before: str
    after: str
    uncertainty: str
    temperature: str
    event: str
    note: str


@dataclass(frozen=True)
class RecipePage:
    """All that the page of a recipe shows."""

    url: str
    title: str
    description: str
    search_text: str
    row: RecipeRow
    retired_reason: str | None
    record: RecipeRecord
    runs: tuple[RunRow, ...]


def recipe_page(records: LabRecords, etch: Etch) -> RecipePage:
    """Return the view of one recipe."""
    row = recipe_rows(records, [etch])[0]
    films = ", ".join(ref.link.text for ref in row.targets)
    return RecipePage(
        url=page_url(PageKind.RECIPE, etch.id),
        title=etch.name,
        description=f"{etch.name}: removes {films} on {row.tool.text}.",
        search_text=f"{films} {row.etchant.text} {row.tool.text} {row.search_text}",
        row=row,
        retired_reason=etch.retired_reason,
        record=recipe_record(records, etch),
        runs=tuple(_run(records, run) for run in records.runs.get(etch.id, ())),
    )


def _run(records: LabRecords, run: Run) -> RunRow:
    return RunRow(
        date=run.date.isoformat(),
        wafer=run.wafer,
        film=film_ref(records, run.film),
        time=as_recorded(run.time_s),
        before=as_recorded(run.before_nm),
        after=as_recorded(run.after_nm),
        uncertainty=as_recorded(run.u_nm),
        temperature="" if run.temperature_degc is None else as_recorded(run.temperature_degc),
        event=run.event or "",
        note=run.note or "",
    )
