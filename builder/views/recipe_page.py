"""The page of a recipe, in the order in which it is needed at the bench."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass

from builder.findings.computed import Computed
from builder.findings.recipe_times import TargetTiming, target_timings
from builder.records.etches import Etch
from builder.records.lab import LabRecords
from builder.records.runs import Run
from builder.views.drawing.charts import Chart
from builder.views.link import Link, PageKind, page_url
from builder.views.number_text import as_recorded
from builder.views.recipe_answers import RecipeAnswers, recipe_answers
from builder.views.recipe_evidence import depth_charts, rate_chart
from builder.views.recipe_films import SideFilms, side_films
from builder.views.recipe_numbers import Numbers, recipe_numbers
from builder.views.recipe_record import RecipeRecord, recipe_record
from builder.views.recipe_rows import RecipeRow, recipe_rows
from builder.views.recipe_section import RecipeSection, recipe_section
from builder.views.recipe_standing import Standing, standing
from builder.views.recipe_worked import Worked, worked_numbers
from builder.views.references import FilmRef, film_ref, source_link
from builder.views.safety_strip import SafetyStrip, recipe_strip


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
    """All that the page of a recipe shows; what rests on own runs is None where there are none."""

    url: str
    title: str
    description: str
    search_text: str
    row: RecipeRow
    standing: Standing
    section: RecipeSection | None
    answers: RecipeAnswers
    safety: SafetyStrip
    record: RecipeRecord
    rate_chart: Chart | None
    depth_charts: tuple[Chart, ...]
    films: SideFilms
    numbers: Numbers | None
    worked: Worked | None
    runs: tuple[RunRow, ...]
    sources: tuple[Link, ...]


def recipe_page(records: LabRecords, computed: Computed, etch: Etch) -> RecipePage:
    """Return the view of one recipe."""
    row = recipe_rows(records, [etch])[0]
    films = ", ".join(ref.link.text for ref in row.targets)
    timing = target_timings(computed, etch.id)[0]
    own = computed.own[etch.id].get(timing.film)
    return RecipePage(
        url=page_url(PageKind.RECIPE, etch.id),
        title=etch.name,
        description=f"{etch.name}: removes {films} on {row.tool.text}.",
        search_text=f"{films} {row.etchant.text} {row.tool.text} {row.search_text}",
        row=row,
        standing=standing(records, computed, etch, timing),
        section=recipe_section(records, computed, etch.id, timing),
        answers=recipe_answers(records, computed, etch.id),
        safety=recipe_strip(records, etch),
        record=recipe_record(records, etch),
        rate_chart=rate_chart(own),
        depth_charts=depth_charts(own),
        films=side_films(records, computed, etch, timing),
        numbers=recipe_numbers(computed, own),
        worked=worked_numbers(computed, own, timing),
        runs=tuple(_run(records, run) for run in records.runs.get(etch.id, ())),
        sources=_sources(records, computed, etch, timing),
    )


def _sources(records: LabRecords, computed: Computed, etch: Etch, timing: TargetTiming) -> tuple[Link, ...]:
    """What the published numbers and statements on the page rest on, each once."""
    known: Iterable[str] = (
        source
        for evidence in (timing.known, *computed.by_recipe[etch.id].values())
        for source in evidence.sources
        if source
    )
    return tuple(source_link(records, source) for source in dict.fromkeys(known))


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
