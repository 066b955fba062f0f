"""The page on hydrofluoric acid: why it is different, what must be there first, what to do at once."""

from __future__ import annotations

from dataclasses import dataclass

from builder.records.lab import LabRecords
from builder.records.mixing_match import HF_PRECAUTION, holds_hydrofluoric_acid
from builder.records.published import Statement
from builder.records.terms import Effect, FilmFamily
from builder.views.link import Link
from builder.views.references import Citation, Fact, chemical_link, citation, etchant_link, film_link
from builder.views.safety_sheet import sheet_url
from builder.views.safety_strip import PrecautionBlock, contacts, precaution_block

_HARMING = frozenset({Effect.PEELS, Effect.SWELLS, Effect.CRACKS, Effect.ATTACKS})


@dataclass(frozen=True)
class ResistRow:
    """What a strength of the acid is said to do to a resist."""

    etchant: Link
    film: Link
    words: str
    citation: Citation


@dataclass(frozen=True)
class HydrofluoricPage:
    """All that the page shows; `precaution` is None where the record is missing, which the page says."""

    url: str
    title: str
    description: str
    search_text: str
    precaution: PrecautionBlock | None
    contacts: tuple[Fact, ...]
    local_rules: tuple[str, ...]
    etchants: tuple[Link, ...]
    chemicals: tuple[Link, ...]
    sheets: tuple[Link, ...]
    resists: tuple[ResistRow, ...]


def hydrofluoric_page(records: LabRecords) -> HydrofluoricPage:
    """Return the page on hydrofluoric acid."""
    precaution = records.precautions.get(HF_PRECAUTION)
    chemicals = [one.id for one in records.chemicals.values() if _gives_hf(records, one.id)]
    etchants = [one for one in records.etchants.values() if holds_hydrofluoric_acid(records, one)]
    return HydrofluoricPage(
        url="safety/hydrofluoric-acid.html",
        title="Hydrofluoric acid",
        description="Why hydrofluoric acid is different, what must be at hand, and what to do first.",
        search_text="HF BHF BOE hydrofluoric acid calcium gluconate gel first aid burn",
        precaution=None if precaution is None else precaution_block(records, precaution),
        contacts=contacts(records),
        local_rules=tuple(rule for rule in records.settings.local_rules if _speaks_of_hf(rule)),
        etchants=tuple(etchant_link(records, one.id) for one in sorted(etchants, key=lambda one: one.id)),
        chemicals=tuple(chemical_link(records, one) for one in chemicals),
        sheets=tuple(Link(records.chemicals[one].name, sheet_url(one)) for one in chemicals),
        resists=tuple(
            _resist(records, statement)
            for one in sorted(etchants, key=lambda one: one.id)
            for statement in records.statements.get(one.id, ())
            if statement.effect in _HARMING and records.films[statement.film].family is FilmFamily.RESIST
        ),
    )


def _gives_hf(records: LabRecords, chemical_id: str) -> bool:
    chemical = records.chemicals[chemical_id]
    return chemical.precaution == HF_PRECAUTION or chemical.formula == "HF"


def _speaks_of_hf(rule: str) -> bool:
    return any(word in rule.casefold() for word in ("hf", "fluor", "gluconate"))


def _resist(records: LabRecords, statement: Statement) -> ResistRow:
    return ResistRow(
        etchant=etchant_link(records, statement.etchant),
        film=film_link(records, statement.film),
        words=statement.words,
        citation=citation(records, statement),
    )
