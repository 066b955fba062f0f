"""What pages show of other records: films with their fill, names with links, citations with their trust."""

from __future__ import annotations

from dataclasses import dataclass

from builder.records.lab import LabRecords
from builder.records.record import SourcedEntry, SourcedRecord
from builder.records.terms import Trust
from builder.views.drawing.shape import family_fill
from builder.views.link import Link, PageKind, page_url, source_url
from builder.views.words import TRUST_NAMES


@dataclass(frozen=True)
class FilmRef:
    """A film as it is named everywhere: its fill, its name, its page."""

    id: str
    family: str
    link: Link


@dataclass(frozen=True)
class Citation:
    """Where a fact comes from: a link to the bibliography, the place, whether it was read."""

    link: Link
    where: str
    trust: str


@dataclass(frozen=True)
class Fact:
    """A term and what is known about it; `links` follow the text."""

    term: str
    text: str
    links: tuple[Link, ...] = ()


def film_ref(records: LabRecords, film_id: str) -> FilmRef:
    """Return the reference to a film."""
    film = records.films[film_id]
    return FilmRef(film_id, family_fill(film.family), Link(film.name, page_url(PageKind.FILM, film_id)))


def film_link(records: LabRecords, film_id: str) -> Link:
    """Return the link to a film's page."""
    return film_ref(records, film_id).link


def etchant_link(records: LabRecords, etchant_id: str) -> Link:
    """Return the link to an etchant's page."""
    return Link(records.etchants[etchant_id].name, page_url(PageKind.ETCHANT, etchant_id))


def chemical_link(records: LabRecords, chemical_id: str) -> Link:
    """Return the link to a chemical's page."""
    return Link(records.chemicals[chemical_id].name, page_url(PageKind.CHEMICAL, chemical_id))


def substance_link(records: LabRecords, substance_id: str) -> Link:
    """Return the link to what an id names: a chemical if there is one, else an etchant."""
    if substance_id in records.chemicals:
        return chemical_link(records, substance_id)
    return etchant_link(records, substance_id)


def tool_link(records: LabRecords, tool_id: str) -> Link:
    """Return the link to a tool's page."""
    return Link(records.tools[tool_id].name, page_url(PageKind.TOOL, tool_id))


def recipe_link(records: LabRecords, etch_id: str) -> Link:
    """Return the link to a recipe's page."""
    return Link(records.etches[etch_id].name, page_url(PageKind.RECIPE, etch_id))


def citation(records: LabRecords, fact: SourcedRecord | SourcedEntry) -> Citation:
    """Return the citation of a published fact."""
    return Citation(source_link(records, fact.source), fact.where or "", TRUST_NAMES[fact.trust])


def citations(records: LabRecords, sources: tuple[str, ...], trust: Trust | None) -> tuple[Citation, ...]:
    """Return the citations of a record that names several sources and one trust."""
    word = "" if trust is None else TRUST_NAMES[trust]
    return tuple(Citation(source_link(records, source), "", word) for source in sources)


def source_link(records: LabRecords, source_id: str) -> Link:
    """Return the link to a source in the bibliography, named briefly."""
    source = records.sources[source_id]
    return Link(short_name(source.authors, source.body, source.year, source.title), source_url(source_id))


def short_name(authors: str | None, body: str | None, year: int | None, title: str) -> str:
    """Return how a source is named in running text: who, and when; its title where nobody is named."""
    who = authors or body or _named_first(title)
    if who is None:
        return title
    return f"{who} {year}" if year is not None else who


def _named_first(title: str) -> str | None:
    """Who a full citation names before its title in quotation marks, if it is written so."""
    before, mark, _ = title.partition(', "')
    return before if mark else None


def known_facts(*facts: tuple[str, str | None]) -> tuple[Fact, ...]:
    """Return the facts that have a text."""
    return tuple(Fact(term, text) for term, text in facts if text)
