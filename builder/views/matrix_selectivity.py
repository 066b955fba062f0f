"""Selectivities: how much faster a target goes than every other film, etch by etch."""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from dataclasses import dataclass

from builder.findings.computed import Computed
from builder.findings.selectivities import FoundSelectivity, rate_selectivity, recipe_selectivity
from builder.records.films import Film
from builder.records.lab import LabRecords
from builder.views.link import Link
from builder.views.matrix_grid import (
    DATA_FORMAT,
    RECIPE_COLUMN,
    Column,
    GridCell,
    MatrixView,
    Pool,
    film_order,
    filters_of,
    grid_row,
    groups_of,
    heads_of,
    rank_css,
    source_places,
)
from builder.views.number_text import NO_BREAK, NumberText, ratio_text
from builder.views.plan_words import RANK_WORDS
from builder.views.references import FilmRef, film_ref
from builder.views.words import FAMILY_NAMES

INDEX_URL = "matrices/selectivity.html"
_LEGEND = (
    (GridCell("ew-grid-own", "", "25"), "the target goes 25 times as fast; bold: own runs"),
    (GridCell("ew-grid-read", "", "≥ 40"), "at least so: no loss was seen; plain: literature"),
    (
        GridCell("ew-grid-weak", "", "0.5"),
        "below 1 the other film goes faster; italic: literature, unchecked",
    ),
    (None, "unmeasured: one of the two has no number here"),
)


@dataclass(frozen=True)
class TargetEntry:
    """One target in the list of selectivities."""

    film: FilmRef
    link: Link
    etches: int


@dataclass(frozen=True)
class TargetGroup:
    """Targets of one family."""

    name: str
    anchor: str
    targets: tuple[TargetEntry, ...]


@dataclass(frozen=True)
class SelectivityIndex:
    """The page that leads to the selectivities of each target."""

    url: str
    title: str
    description: str
    search_text: str
    groups: tuple[TargetGroup, ...]
    films_matrix: Link


def selectivity_pages(
    records: LabRecords, computed: Computed, columns: Sequence[Column]
) -> tuple[MatrixView, ...]:
    """Return one matrix a film that a recipe removes."""
    targets = {
        film for recipe in computed.facts.etches.values() for film in recipe.targets if film in records.films
    }
    pages = [_page(records, computed, columns, film) for film in film_order(records, targets)]
    return tuple(page for page in pages if page is not None)


def selectivity_index(records: LabRecords, pages: Sequence[MatrixView]) -> SelectivityIndex:
    """Return the page that leads to these selectivities."""
    entries = [(_film_of(records, page), page) for page in pages]
    groups = []
    for family, name in FAMILY_NAMES.items():
        found = [
            TargetEntry(film_ref(records, film.id), Link(film.name, page.url), len(page.heads))
            for film, page in entries
            if film.family is family
        ]
        if found:
            groups.append(TargetGroup(name, str(family), tuple(found)))
    return SelectivityIndex(
        url=INDEX_URL,
        title="Selectivities",
        description="How much faster a target goes than any other film, etch by etch.",
        search_text="selectivity ratio of rates mask target table",
        groups=tuple(groups),
        films_matrix=Link("Films by etches", "matrices/films.html"),
    )


def target_links(pages: Iterable[MatrixView]) -> tuple[Link, ...]:
    """Return links to some matrices of selectivity."""
    return tuple(Link(page.title, page.url) for page in pages)


def target_url(film_id: str) -> str:
    """Return the address of a target's selectivities."""
    return f"matrices/selectivity-{film_id}.html"


def _film_of(records: LabRecords, page: MatrixView) -> Film:
    return records.films[page.url.removeprefix("matrices/selectivity-").removesuffix(".html")]


def _page(
    records: LabRecords, computed: Computed, all_columns: Sequence[Column], target: str
) -> MatrixView | None:
    columns = [
        column
        for column in all_columns
        if (known := column.evidence.get(target)) is not None and known.band is not None
    ]
    pool, data, rows, films = Pool(), [], [], []
    for film in film_order(records, {film for column in columns for film in column.evidence}):
        found = [None if film == target else _found(computed, column, target, film) for column in columns]
        if not any(found):
            continue
        films.append(film)
        rows.append(grid_row(records, film, [_cell(one) for one in found]))
        data.append({
            str(place): _cell_data(records, pool, one, column, target, film)
            for place, (one, column) in enumerate(zip(found, columns, strict=True))
            if one is not None
        })  # fmt: skip
    if not rows:
        return None
    name = records.films[target].name
    return MatrixView(
        url=target_url(target),
        title=f"Selectivity of {name}",
        description=f"How much faster {name} goes than other films, etch by etch.",
        search_text=f"selectivity {target} {' '.join(records.films[target].synonyms)}",
        lead=f"Rate of {name} over rate of the film in the row, for the next run.",
        note="Where wafers carried both films the ratio is taken wafer by wafer, so that what bath or "
        "chamber did to both drops out; else the ends of the two rates are set against each other, worst "
        "against worst. The number shown is the likely one; with no loss seen, the lower end.",
        legend=_LEGEND,
        times=(),
        chosen="",
        heads=heads_of(columns, records),
        groups=groups_of(columns),
        rows=tuple(rows),
        filters=filters_of(records, columns, films),
        kind="",
        others=(Link("Other targets", INDEX_URL),),
        data={"format": DATA_FORMAT, "kind": "selectivity", "texts": pool.texts, "rows": data},
    )


def _found(computed: Computed, column: Column, target: str, film: str) -> FoundSelectivity | None:
    other = column.evidence.get(film)
    if other is None:
        return None
    if column.kind == RECIPE_COLUMN:
        return recipe_selectivity(computed, column.id, target, film)
    return rate_selectivity(column.evidence[target], other)


def _short(text: NumberText) -> str:
    """A selectivity as a cell shows it: the likely value, else the end that is known."""
    value = text.value
    for words, sign in (("at least ", "≥"), ("at most ", "≤")):
        if value.startswith(words):
            return f"{sign}{NO_BREAK}{value.removeprefix(words)}"
    return value


def _cell(found: FoundSelectivity | None) -> GridCell | None:
    return None if found is None else GridCell(rank_css(found.rank), "", _short(_text(found)))


def _text(found: FoundSelectivity) -> NumberText:
    return ratio_text(found.lo, found.mid, found.hi)


def _cell_data(
    records: LabRecords, pool: Pool, found: FoundSelectivity, column: Column, target: str, film: str
) -> list[object]:
    """Short text, ratio with interval, how it was taken, rank, the two rates, sources."""
    one, other = column.evidence[target], column.evidence[film]
    text = _text(found)
    return [
        pool.place(_short(text)),
        pool.place(text.full),
        pool.place(_basis(found)),
        pool.place(RANK_WORDS[found.rank]),
        [pool.place(column.rates[one]) for one in (target, film)],
        source_places(records, pool, dict.fromkeys((*one.sources, *other.sources))),
    ]


def _basis(found: FoundSelectivity) -> str:
    if not found.pairs:
        return "from two separate rates, worst end against worst end"
    return f"from {found.pairs}{NO_BREAK}wafer{'s' if found.pairs > 1 else ''} that carried both films"
