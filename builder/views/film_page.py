"""The page of a film: what it is, what removes it, what is published about it."""

from __future__ import annotations

from dataclasses import dataclass

from builder.findings.computed import Computed
from builder.records.films import Film
from builder.records.lab import LabRecords
from builder.views.film_answers import EtchedBy, etched_by
from builder.views.film_harms import Harms, harms
from builder.views.link import Link, PageKind, page_url
from builder.views.matrix_selectivity import target_url
from builder.views.number_text import as_recorded, as_written
from builder.views.published_rows import RateRow, StatementRow, rate_rows, statement_rows
from builder.views.references import Citation, Fact, FilmRef, citations, film_link, film_ref
from builder.views.words import BARRIER_WORDS, FAMILY_NAMES


@dataclass(frozen=True)
class FilmPage:
    """All that the page of a film shows."""

    url: str
    title: str
    description: str
    search_text: str
    film: FilmRef
    synonyms: tuple[str, ...]
    is_family: bool
    members: tuple[Link, ...]
    facts: tuple[Fact, ...]
    pending: tuple[str, ...]
    note: str | None
    citations: tuple[Citation, ...]
    etched_by: tuple[EtchedBy, ...]
    harms: Harms
    selectivity: Link | None
    mask_in: tuple[Link, ...]
    rates: tuple[RateRow, ...]
    statements: tuple[StatementRow, ...]


def film_page(records: LabRecords, computed: Computed, film: Film) -> FilmPage:
    """Return the view of one film."""
    rates = [rate for group in records.rates.values() for rate in group if rate.film == film.id]
    statements = [one for group in records.statements.values() for one in group if one.film == film.id]
    return FilmPage(
        url=page_url(PageKind.FILM, film.id),
        title=film.name,
        description=f"{film.name}: recipes that remove it, and published rates.",
        search_text=" ".join((film.id, *film.synonyms, film.formula or "", film.deposition or "")),
        film=film_ref(records, film.id),
        synonyms=film.synonyms,
        is_family=film.is_family,
        members=tuple(film_link(records, member) for member in film.members),
        facts=_facts(records, film),
        pending=film.pending,
        note=film.note,
        citations=citations(records, (film.source,) if film.source else (), film.trust),
        etched_by=etched_by(records, computed, film.id),
        harms=harms(records, computed, film.id),
        selectivity=_selectivity(records, film),
        mask_in=_mask_in(records, film),
        rates=rate_rows(records, sorted(rates, key=lambda rate: (rate.etchant, rate.pointer))),
        statements=statement_rows(records, sorted(statements, key=lambda one: (one.etchant, one.pointer))),
    )


def _selectivity(records: LabRecords, film: Film) -> Link | None:
    """A film that a recipe removes has a page of selectivities."""
    if not any(film.id in etch.targets for etch in records.etches.values()):
        return None
    return Link("Its selectivity to every other film", target_url(film.id))


def _facts(records: LabRecords, film: Film) -> tuple[Fact, ...]:
    texts = (
        ("Formula", film.formula),
        ("Family", FAMILY_NAMES[film.family]),
        ("Deposition", film.deposition),
        ("As a barrier", None if film.is_family else BARRIER_WORDS[film.barrier]),
        ("Electrically", film.electrical.value if film.electrical else None),
        ("Density", as_written(film.density.text) if film.density else None),
        ("Molar mass", as_written(film.molar_mass.text) if film.molar_mass else None),
        ("Refractive index", as_recorded(film.refractive_index) if film.refractive_index else None),
        ("Reacts as", ", ".join(records.groups[group].name for group in film.groups)),
    )
    facts = tuple(Fact(term, text) for term, text in texts if text)
    linked = (("Usually under it", film.adhesion_layer_usual), ("Similar films", film.similar))
    return facts + tuple(
        Fact(term, "", tuple(film_link(records, one) for one in ids)) for term, ids in linked if ids
    )


def _mask_in(records: LabRecords, film: Film) -> tuple[Link, ...]:
    return tuple(
        Link(etch.name, page_url(PageKind.RECIPE, etch.id))
        for etch in records.etches.values()
        if any(mask.film == film.id for mask in etch.masks)
    )
