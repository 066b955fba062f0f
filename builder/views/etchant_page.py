"""The page of an etchant: what it is made of, how it is handled, what it does to films."""

from __future__ import annotations

from dataclasses import dataclass

from builder.findings.computed import Computed
from builder.records.etchants import Etchant
from builder.records.lab import LabRecords
from builder.views.link import Link, PageKind, page_url
from builder.views.own_rate_rows import OwnRateRow, own_rate_rows
from builder.views.published_rows import (
    HintRow,
    RateRow,
    StatementRow,
    hint_rows,
    rate_rows,
    statement_rows,
)
from builder.views.recipe_rows import RecipeRow, recipe_rows
from builder.views.references import Citation, Fact, chemical_link, citations, etchant_link, known_facts
from builder.views.safety_strip import SafetyStrip, etchant_strip
from builder.views.safety_tables import SafetyTables, etchant_tables
from builder.views.words import METHOD_NAMES, yes_no_unknown


@dataclass(frozen=True)
class PartRow:
    """One component: how much, and of which chemical."""

    amount: str
    chemical: Link


@dataclass(frozen=True)
class EtchantPage:
    """All that the page of an etchant shows."""

    url: str
    title: str
    description: str
    search_text: str
    synonyms: tuple[str, ...]
    facts: tuple[Fact, ...]
    parts: tuple[PartRow, ...]
    parts_unknown: str | None
    safety: SafetyStrip
    tables: SafetyTables
    pending: tuple[str, ...]
    note: str | None
    citations: tuple[Citation, ...]
    recipes: tuple[RecipeRow, ...]
    own_rates: tuple[OwnRateRow, ...]
    rates: tuple[RateRow, ...]
    statements: tuple[StatementRow, ...]
    hints: tuple[HintRow, ...]


def etchant_page(records: LabRecords, computed: Computed, etchant: Etchant) -> EtchantPage:
    """Return the view of one etchant."""
    mixture = etchant.mixture
    rates = sorted(records.rates.get(etchant.id, ()), key=lambda rate: (rate.film, rate.pointer))
    recipes = [etch for etch in records.etches.values() if etch.etchant == etchant.id]
    sources = etchant.source or (mixture.source if mixture else ())
    return EtchantPage(
        url=page_url(PageKind.ETCHANT, etchant.id),
        title=etchant.name,
        description=f"{etchant.name}: composition, handling, and what it does to films.",
        search_text=" ".join((etchant.id, *etchant.synonyms, etchant.composition or "")),
        synonyms=etchant.synonyms,
        facts=_facts(records, etchant),
        parts=tuple(PartRow(part.amount, chemical_link(records, part.chemical)) for part in etchant.parts),
        parts_unknown=etchant.parts_unknown,
        safety=etchant_strip(records, etchant),
        tables=etchant_tables(records, etchant.id),
        pending=etchant.pending,
        note=etchant.note,
        citations=citations(records, sources, etchant.trust or (mixture.trust if mixture else None)),
        recipes=recipe_rows(records, recipes),
        own_rates=own_rate_rows(records, computed, recipes),
        rates=rate_rows(records, rates),
        statements=statement_rows(records, records.statements.get(etchant.id, ())),
        hints=hint_rows(records, records.hints.get(etchant.id, ())),
    )


def hazard_words(records: LabRecords, etchant: Etchant) -> tuple[str, ...]:
    """Return the hazard statements of all parts of an etchant, each once, by code."""
    parts = [records.chemicals[part.chemical] for part in etchant.parts]
    codes = sorted({code for chemical in parts for code in chemical.h_codes})
    meanings = {code.code: code.meaning for code in records.codes.values()}
    return tuple(f"{code}: {meanings[code]}" if code in meanings else code for code in codes)


def _facts(records: LabRecords, etchant: Etchant) -> tuple[Fact, ...]:
    facts = known_facts(
        ("Method", METHOD_NAMES[etchant.method]),
        ("State", etchant.state.value),
        ("Composition", etchant.composition),
        ("Temperature", etchant.temperature),
        ("Same in all directions", yes_no_unknown(etchant.isotropic)),
        ("Makes gas bubbles", yes_no_unknown(etchant.gas_bubbles)),
        ("HF vapour", "yes" if etchant.hf_vapour else None),
        ("Published conditions", etchant.published_conditions),
    )
    if etchant.variants_of is None:
        return facts
    return (*facts, Fact("A strength of", "", (etchant_link(records, etchant.variants_of),)))
