"""The films-by-etches matrices: heads, cells, and the evidence that a cell opens beside the table."""

from __future__ import annotations

from collections.abc import Iterable, Mapping, Sequence
from dataclasses import dataclass, field

from builder.engine import Rank
from builder.findings.computed import Computed
from builder.findings.plan.evidence import Etching, Evidence
from builder.records.lab import LabRecords
from builder.records.terms import FilmFamily, Method, Status
from builder.views.link import Link, PageKind, page_url
from builder.views.recipe_answers import band_text
from builder.views.references import FilmRef, film_ref, source_link
from builder.views.words import FAMILY_NAMES, METHOD_NAMES

DATA_FORMAT = 1
RECIPE_COLUMN = "recipe"
PUBLISHED_COLUMN = "published"


@dataclass(frozen=True)
class Column:
    """
    One etch: a recipe of the lab, or an etchant by published facts alone (`kind`).

    `evidence` and `rates` (as they are shown; empty without a number) are by film.
    """

    id: str
    kind: str
    head: Link
    method_id: str
    etchant_id: str
    etching: Etching
    evidence: Mapping[str, Evidence]
    rates: Mapping[str, str]


@dataclass(frozen=True)
class Head:
    """What the table shows of a column; `words` is what its filter searches."""

    link: Link
    kind: str
    method_id: str
    etchant_id: str
    words: str


@dataclass(frozen=True)
class HeadGroup:
    """Columns of one method."""

    name: str
    size: int


@dataclass(frozen=True)
class GridCell:
    """What one cell shows at first: its classes, its mark (a verdict, or none) and a short text."""

    css: str
    mark: str
    text: str


@dataclass(frozen=True)
class GridRow:
    """One film; a cell that is None is unmeasured."""

    film: FilmRef
    family_id: str
    words: str
    cells: tuple[GridCell | None, ...]


@dataclass(frozen=True)
class Choice:
    """One choice of a filter."""

    id: str
    text: str


@dataclass(frozen=True)
class Filters:
    """What narrows rows and columns."""

    families: tuple[Choice, ...]
    methods: tuple[Choice, ...]
    etchants: tuple[Choice, ...]
    kinds: tuple[Choice, ...]


@dataclass(frozen=True)
class MatrixView:
    """
    One matrix; `times` is empty where a cell does not depend on a time.

    `kind` is the kind of columns that the page's script leaves in at first, or empty for all.
    """

    url: str
    title: str
    description: str
    search_text: str
    lead: str
    note: str
    legend: tuple[tuple[GridCell | None, str], ...]
    times: tuple[Choice, ...]
    chosen: str
    heads: tuple[Head, ...]
    groups: tuple[HeadGroup, ...]
    rows: tuple[GridRow, ...]
    filters: Filters
    kind: str
    others: tuple[Link, ...]
    data: dict[str, object]


@dataclass
class Pool:
    """Texts of a page's data, each once; cells refer to them by place."""

    texts: list[str] = field(default_factory=list)
    _places: dict[str, int] = field(default_factory=dict)

    def place(self, text: str) -> int:
        """Return the place of a text, adding it if it is new."""
        if text not in self._places:
            self._places[text] = len(self.texts)
            self.texts.append(text)
        return self._places[text]


def columns_of(records: LabRecords, computed: Computed) -> tuple[Column, ...]:
    """Return every etch with anything on record, by method; recipes before published etchants."""
    recipes = [
        Column(
            id=etch.id,
            kind=RECIPE_COLUMN,
            head=Link(etch.name, page_url(PageKind.RECIPE, etch.id)),
            method_id=etch.method,
            etchant_id=etch.etchant,
            etching=computed.etching(etch.id),
            evidence=computed.by_recipe[etch.id],
            rates=_rates(computed.by_recipe[etch.id]),
        )
        for etch in records.etches.values()
        if etch.status is not Status.RETIRED
    ]
    published = [
        Column(
            id=etchant_id,
            kind=PUBLISHED_COLUMN,
            head=Link(records.etchants[etchant_id].name, page_url(PageKind.ETCHANT, etchant_id)),
            method_id=records.etchants[etchant_id].method,
            etchant_id=etchant_id,
            etching=computed.etchant_alone(etchant_id),
            evidence=films,
            rates=_rates(films),
        )
        for etchant_id, films in computed.by_etchant.items()
    ]
    return in_order([*recipes, *published])


def _rates(evidence: Mapping[str, Evidence]) -> dict[str, str]:
    return {
        film: "" if known.band is None else band_text(known.band).full for film, known in evidence.items()
    }


def in_order(columns: Iterable[Column]) -> tuple[Column, ...]:
    """Return columns by method, recipes first, then by name."""
    methods = [str(method) for method in METHOD_NAMES]

    def key(column: Column) -> tuple[int, bool, str, str]:
        name = column.head.text.casefold()
        return methods.index(column.method_id), column.kind != RECIPE_COLUMN, name, column.id

    return tuple(sorted(columns, key=key))


def heads_of(columns: Sequence[Column], records: LabRecords) -> tuple[Head, ...]:
    """Return what the table shows of its columns."""
    return tuple(
        Head(
            link=column.head,
            kind=column.kind,
            method_id=column.method_id,
            etchant_id=column.etchant_id,
            words=" ".join((column.id, *records.etchants[column.etchant_id].synonyms)),
        )
        for column in columns
    )


def groups_of(columns: Sequence[Column]) -> tuple[HeadGroup, ...]:
    """Return the methods with the number of their columns, in the order of the columns."""
    sizes: dict[str, int] = {}
    for column in columns:
        sizes[column.method_id] = sizes.get(column.method_id, 0) + 1
    return tuple(HeadGroup(METHOD_NAMES[Method(method)], size) for method, size in sizes.items())


def film_order(records: LabRecords, films: Iterable[str]) -> tuple[str, ...]:
    """Return films by family, then by name."""
    families = list(FAMILY_NAMES)
    return tuple(
        sorted(
            films,
            key=lambda film: (
                families.index(records.films[film].family),
                records.films[film].name.casefold(),
                film,
            ),
        )
    )


def grid_row(records: LabRecords, film_id: str, cells: Iterable[GridCell | None]) -> GridRow:
    """Return the row of a film."""
    film = records.films[film_id]
    words = " ".join((film_id, *film.synonyms))
    return GridRow(film_ref(records, film_id), film.family, words, tuple(cells))


def filters_of(records: LabRecords, columns: Sequence[Column], films: Iterable[str]) -> Filters:
    """Return the choices of the filters: only what the table has."""
    families = {records.films[film].family for film in films}
    methods = {column.method_id for column in columns}
    etchants = {column.etchant_id for column in columns}
    named = sorted(
        (Choice(one, records.etchants[one].name) for one in etchants), key=lambda one: one.text.casefold()
    )
    return Filters(
        families=tuple(Choice(one, FAMILY_NAMES[one]) for one in FilmFamily if one in families),
        methods=tuple(Choice(one, name) for one, name in METHOD_NAMES.items() if one in methods),
        etchants=tuple(named),
        kinds=_kinds(columns),
    )


def first_kind(columns: Sequence[Column]) -> str:
    """Return the kind of columns to begin with: recipes, or all (empty) where all are of one kind."""
    return RECIPE_COLUMN if len({column.kind for column in columns}) > 1 else ""


def _kinds(columns: Sequence[Column]) -> tuple[Choice, ...]:
    recipes = sum(column.kind == RECIPE_COLUMN for column in columns)
    published = len(columns) - recipes
    if not recipes or not published:
        return (Choice("", f"all ({len(columns)})"),)
    return (
        Choice(RECIPE_COLUMN, f"this lab's recipes ({recipes})"),
        Choice("", f"published too ({len(columns)})"),
        Choice(PUBLISHED_COLUMN, f"published only ({published})"),
    )


def rank_css(rank: Rank) -> str:
    """Return how a cell shows the rank of its evidence."""
    return {Rank.OWN: "ew-grid-own", Rank.LITERATURE: "ew-grid-read"}.get(rank, "ew-grid-weak")


def source_places(records: LabRecords, pool: Pool, sources: Iterable[str]) -> list[list[int]]:
    """Return sources as places of id and name."""
    return [[pool.place(one), pool.place(source_link(records, one).text)] for one in sources if one]
