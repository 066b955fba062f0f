"""The lists: recipes, films by family, etchants by method, chemicals, tools by kind."""

from __future__ import annotations

from collections.abc import Callable, Iterable, Sequence
from dataclasses import dataclass
from typing import TypeVar

from builder.records.lab import LabRecords
from builder.views.link import Link, PageKind, page_url
from builder.views.recipe_rows import NO_RUN, RecipeRow, recipe_rows
from builder.views.references import film_ref
from builder.views.words import FAMILY_NAMES, METHOD_NAMES, STATUS_NAMES, TOOL_KIND_NAMES

T = TypeVar("T")


@dataclass(frozen=True)
class Choice:
    """One choice of a filter."""

    id: str
    text: str


@dataclass(frozen=True)
class RecipeListPage:
    """The list of all recipes with the choices of its filters."""

    url: str
    title: str
    description: str
    search_text: str
    rows: tuple[RecipeRow, ...]
    films: tuple[Choice, ...]
    masks: tuple[Choice, ...]
    methods: tuple[Choice, ...]
    tools: tuple[Choice, ...]
    statuses: tuple[Choice, ...]
    years: tuple[Choice, ...]


@dataclass(frozen=True)
class ListEntry:
    """One entry of a list; `family` names a film's fill, or is empty."""

    link: Link
    also: str
    detail: str
    family: str


@dataclass(frozen=True)
class ListGroup:
    """Entries under a heading; `anchor` is its place on the page."""

    anchor: str
    name: str
    entries: tuple[ListEntry, ...]


@dataclass(frozen=True)
class ListPage:
    """A page that lists the records of one kind, in groups."""

    url: str
    title: str
    description: str
    search_text: str
    lead: str
    groups: tuple[ListGroup, ...]


def recipe_list(records: LabRecords) -> RecipeListPage:
    """Return the list of all recipes."""
    rows = recipe_rows(records, records.etches.values())
    days = sorted({row.last_run[:4] for row in rows if row.last_run != NO_RUN}, reverse=True)
    return RecipeListPage(
        url="recipes/index.html",
        title="Recipes",
        description="Every recipe of the lab, by film, mask, method, tool, standing and age.",
        search_text="recipes list filter",
        rows=rows,
        films=_choices((ref.id, ref.link.text) for row in rows for ref in row.targets),
        masks=_choices((ref.id, ref.link.text) for row in rows for ref in row.masks),
        methods=_choices((row.method_id, row.method) for row in rows),
        tools=_choices((row.tool_id, row.tool.text) for row in rows),
        statuses=tuple(Choice(status, name) for status, name in STATUS_NAMES.items()),
        years=tuple(Choice(year, f"run in {year}") for year in days),
    )


def film_list(records: LabRecords) -> ListPage:
    """Return the list of films by family."""
    removable = {film for etch in records.etches.values() for film in etch.targets}
    groups = []
    for family, name in FAMILY_NAMES.items():
        films = [film for film in records.films.values() if film.family is family]
        entries = [
            ListEntry(
                film_ref(records, film.id).link,
                ", ".join(film.synonyms),
                "a recipe removes it" if film.id in removable else "",
                film_ref(records, film.id).family,
            )
            for film in films
        ]
        groups.append(ListGroup(family, name, _sorted(entries)))
    return _page(
        "films", "Films", "Films as deposited: two depositions of one material are two films.", groups
    )


def etchant_list(records: LabRecords) -> ListPage:
    """Return the list of etchants by method."""
    groups = [
        ListGroup(
            method,
            name,
            _sorted(
                ListEntry(Link(one.name, page_url(PageKind.ETCHANT, one.id)), ", ".join(one.synonyms), "", "")
                for one in records.etchants.values()
                if one.method is method
            ),
        )
        for method, name in METHOD_NAMES.items()
    ]
    return _page(
        "etchants",
        "Etchants",
        "What touches the film: a mixture at a strength, or a gas in a reactor.",
        groups,
    )


def chemical_list(records: LabRecords) -> ListPage:
    """Return the list of chemicals by initial letter."""
    by_letter = _grouped(records.chemicals.values(), lambda one: _initial(one.name))
    groups = [
        ListGroup(
            f"letter-{letter.lower()}",
            letter,
            _sorted(
                ListEntry(
                    Link(one.name, page_url(PageKind.CHEMICAL, one.id)),
                    one.formula or "",
                    one.signal.value,
                    "",
                )
                for one in chemicals
            ),
        )
        for letter, chemicals in by_letter
    ]
    return _page(
        "chemicals", "Chemicals", "Substances and stock solutions. The safety data sheet decides.", groups
    )


def tool_list(records: LabRecords) -> ListPage:
    """Return the list of tools by kind."""
    groups = [
        ListGroup(
            kind,
            name,
            _sorted(
                ListEntry(Link(one.name, page_url(PageKind.TOOL, one.id)), one.owner_role, "", "")
                for one in records.tools.values()
                if one.kind is kind
            ),
        )
        for kind, name in TOOL_KIND_NAMES.items()
    ]
    return _page("tools", "Tools", "Benches and chambers, what may enter them and what they can do.", groups)


def _page(folder: str, title: str, lead: str, groups: Iterable[ListGroup]) -> ListPage:
    filled = tuple(group for group in groups if group.entries)
    names = " ".join(group.name for group in filled)
    return ListPage(f"{folder}/index.html", title, lead, names, lead, filled)


def _sorted(entries: Iterable[ListEntry]) -> tuple[ListEntry, ...]:
    return tuple(sorted(entries, key=lambda entry: (entry.link.text.casefold(), entry.link.target)))


def _choices(pairs: Iterable[tuple[str, str]]) -> tuple[Choice, ...]:
    return tuple(Choice(*pair) for pair in sorted(set(pairs), key=lambda pair: (pair[1].casefold(), pair[0])))


def _grouped(items: Iterable[T], key: Callable[[T], str]) -> Sequence[tuple[str, list[T]]]:
    groups: dict[str, list[T]] = {}
    for item in items:
        groups.setdefault(key(item), []).append(item)
    return sorted(groups.items())


def _initial(name: str) -> str:
    letter = next((letter for letter in name if letter.isalpha()), "Z").upper()
    return letter if letter.isascii() else "Z"
