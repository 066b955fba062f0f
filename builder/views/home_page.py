"""The home page: two questions, and where to go from there."""

from __future__ import annotations

from collections import Counter
from collections.abc import Iterator
from dataclasses import asdict, dataclass
from datetime import date

from builder.findings.computed import Computed
from builder.records.films import Film
from builder.records.lab import LabRecords
from builder.records.terms import Status
from builder.views.changes import ChangeRow, changed_rows, doubtful_rows
from builder.views.film_answers import recipes_for
from builder.views.link import PageKind, page_url
from builder.views.number_text import in_words
from builder.views.recipe_rows import NO_RUN, RecipeRow, recipe_rows
from builder.views.references import FilmRef, film_ref
from builder.views.words import FAMILY_NAMES

_LATEST = 6


@dataclass(frozen=True)
class HomeRecipe:
    """A recipe that removes a film, with its times for its usual depth."""

    name: str
    target: str
    words: str


@dataclass(frozen=True)
class NamedPage:
    """An entry of the typeahead: a name, its other names, its page."""

    id: str
    name: str
    also: tuple[str, ...]
    kind: str
    target: str
    recipes: int
    is_family: bool = False
    removed_by: tuple[HomeRecipe, ...] = ()


@dataclass(frozen=True)
class FilmChoices:
    """Films of one family that a recipe removes."""

    name: str
    films: tuple[FilmRef, ...]


@dataclass(frozen=True)
class HomePage:
    """All that the home page shows."""

    url: str
    title: str
    description: str
    search_text: str
    names: tuple[NamedPage, ...]
    removable: tuple[FilmChoices, ...]
    latest: tuple[RecipeRow, ...]
    stale: tuple[RecipeRow, ...]
    changed: tuple[ChangeRow, ...]
    doubtful: tuple[ChangeRow, ...]
    recipe_count: int
    film_count: int
    run_count: int

    @property
    def name_data(self) -> list[dict[str, object]]:
        """The names as plain data for the page's script."""
        return [asdict(name) for name in self.names]


def home_page(records: LabRecords, computed: Computed) -> HomePage:
    """Return the view of the home page; a recipe is stale by the lab's own limit of age."""
    today = computed.today
    rows = recipe_rows(records, records.etches.values())
    ran = sorted((row for row in rows if row.last_run != NO_RUN), key=lambda row: row.last_run, reverse=True)
    oldest = today.toordinal() - records.settings.stale_after_days
    stale = [row for row in reversed(ran) if _is_stale(row, oldest)]
    return HomePage(
        url="index.html",
        title=records.settings.name,
        description=f"How to remove a film at {records.settings.name}, and what survives it.",
        search_text="home start what do you want to remove what must stay",
        names=named_pages(records, computed),
        removable=_removable(records),
        latest=tuple(ran[:_LATEST]),
        stale=tuple(stale[:_LATEST]),
        changed=changed_rows(records, computed)[:_LATEST],
        doubtful=doubtful_rows(records, computed),
        recipe_count=len(rows),
        film_count=len(records.films),
        run_count=sum(row.run_count for row in rows),
    )


def named_pages(records: LabRecords, computed: Computed) -> tuple[NamedPage, ...]:
    """Return every film and etchant with its synonyms, for the typeahead; films with what removes them."""
    counts = Counter(etch.etchant for etch in records.etches.values() if etch.status is not Status.RETIRED)
    films = [_named_film(records, computed, film) for film in records.films.values()]
    etchants = [
        NamedPage(
            one.id,
            in_words(one.name),
            one.synonyms,
            "etchant",
            page_url(PageKind.ETCHANT, one.id),
            counts[one.id],
        )
        for one in records.etchants.values()
    ]
    return tuple(sorted(films + etchants, key=lambda one: (one.name.casefold(), one.kind, one.id)))


def _named_film(records: LabRecords, computed: Computed, film: Film) -> NamedPage:
    films = {film.id, *film.members} if film.is_family else {film.id}
    removed = [
        etch
        for etch in records.etches.values()
        if etch.status is not Status.RETIRED and films & set(etch.targets)
    ]
    return NamedPage(
        film.id,
        in_words(film.name),
        film.synonyms,
        "film",
        page_url(PageKind.FILM, film.id),
        len(removed),
        is_family=film.is_family,
        removed_by=tuple(_removed_by(records, computed, film.id)),
    )


def _removed_by(records: LabRecords, computed: Computed, film: str) -> Iterator[HomeRecipe]:
    for row in recipes_for(records, computed, film):
        if not row.is_retired:
            of = f" of {row.member}" if row.member else ""
            words = (f"{row.times} for {row.depth}{of}", row.rank, row.remark)
            yield HomeRecipe(row.etch.text, row.etch.target, ", ".join(filter(None, words)))


def _is_stale(row: RecipeRow, oldest: float) -> bool:
    return row.status_id == Status.PROVEN and date.fromisoformat(row.last_run).toordinal() < oldest


def _removable(records: LabRecords) -> tuple[FilmChoices, ...]:
    wanted = {
        film for etch in records.etches.values() if etch.status is not Status.RETIRED for film in etch.targets
    }
    groups = []
    for family, name in FAMILY_NAMES.items():
        films = [film_ref(records, film) for film in wanted if records.films[film].family is family]
        if films:
            groups.append(FilmChoices(name, tuple(sorted(films, key=lambda ref: ref.link.text.casefold()))))
    return tuple(groups)
