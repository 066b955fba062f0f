"""All pages of a lab: which view goes through which template."""

from __future__ import annotations

from collections.abc import Iterator
from datetime import date

from builder.findings.computed import Computed, compute
from builder.pages.page import DataFile, FinishedSite, Page
from builder.pages.render import render_page, script_json
from builder.records.lab import LabRecords
from builder.views.bibliography import bibliography_page
from builder.views.chemical_page import chemical_page
from builder.views.etchant_page import etchant_page
from builder.views.film_page import film_page
from builder.views.home_page import home_page
from builder.views.link import Link
from builder.views.matrix_films import films_matrix
from builder.views.matrix_grid import columns_of
from builder.views.matrix_selectivity import selectivity_index, selectivity_pages
from builder.views.planner_data import planner_data
from builder.views.planner_page import DATA_URL, planner_page
from builder.views.recipe_page import recipe_page
from builder.views.record_lists import chemical_list, etchant_list, film_list, recipe_list, tool_list
from builder.views.safety_container_matrix import container_matrix
from builder.views.safety_film_matrix import film_matrix
from builder.views.safety_first_etch import first_etch_page
from builder.views.safety_hf import hydrofluoric_page
from builder.views.safety_mixing_matrix import chemical_matrix, group_matrix
from builder.views.safety_overview import overview_page
from builder.views.safety_plasma import plasma_page
from builder.views.safety_sheet import bench_sheet
from builder.views.tool_page import tool_page

INVENTED_NOTICE = (
    "Demonstration lab: its recipes, runs and samples are invented and measured nowhere. Do not etch by them."
)


def finished_site(records: LabRecords, today: date) -> FinishedSite:
    """Return all pages of a lab as of a day, in the order of their addresses."""
    computed = compute(records, today)
    pages = sorted(_pages(records, computed), key=lambda page: page.url)
    return FinishedSite(
        lab_name=records.settings.name,
        notice=INVENTED_NOTICE if records.settings.invented else "",
        as_of=today.isoformat(),
        pages=tuple(pages),
        files=(_planner_file(records, computed),),
    )


def _planner_file(records: LabRecords, computed: Computed) -> DataFile:
    """The planner's data as a script: a page opened from a folder may load nothing else."""
    data = script_json(planner_data(records, computed.facts, computed.reference))
    return DataFile(DATA_URL, f"window.etchwrightFacts = {data};\n".encode())


def _pages(records: LabRecords, computed: Computed) -> Iterator[Page]:
    yield render_page("home", home_page(records, computed))
    yield render_page("planner", planner_page(records))
    yield render_page("recipe_list", recipe_list(records))
    for view in (film_list, etchant_list, chemical_list, tool_list):
        yield render_page("record_list", view(records))
    yield render_page("bibliography", bibliography_page(records))
    for etch in records.etches.values():
        yield render_page("recipe", recipe_page(records, computed, etch))
    for film in records.films.values():
        yield render_page("film", film_page(records, computed, film))
    for etchant in records.etchants.values():
        yield render_page("etchant", etchant_page(records, computed, etchant))
    for chemical in records.chemicals.values():
        view_of_chemical = chemical_page(records, chemical)
        yield render_page("chemical", view_of_chemical, view_of_chemical.found_as)
    for tool in records.tools.values():
        yield render_page("tool", tool_page(records, tool))
    yield from _matrices(records, computed)
    yield from _safety_pages(records)


def _matrices(records: LabRecords, computed: Computed) -> Iterator[Page]:
    columns = columns_of(records, computed)
    selectivities = selectivity_pages(records, computed, columns)
    index = selectivity_index(records, selectivities)
    yield render_page("matrix", films_matrix(records, computed, columns, (Link(index.title, index.url),)))
    yield render_page("selectivity_index", index)
    for view in selectivities:
        yield render_page("matrix", view)


def _safety_pages(records: LabRecords) -> Iterator[Page]:
    yield render_page("safety_overview", overview_page(records))
    yield render_page("safety_hf", hydrofluoric_page(records))
    yield render_page("safety_plasma", plasma_page(records))
    yield render_page("safety_first_etch", first_etch_page(records))
    for view in (chemical_matrix, group_matrix, film_matrix, container_matrix):
        yield render_page("safety_matrix", view(records))
    for chemical in records.chemicals.values():
        yield render_page("safety_sheet", bench_sheet(records, chemical))
