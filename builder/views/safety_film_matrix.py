"""The matrix of films against chemicals: what gas, heat or fire comes when an etchant reaches a film."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import replace

from builder.records.film_chemistry import hydride_of
from builder.records.lab import LabRecords
from builder.records.mixing_match import (
    ACID_GROUP,
    Presence,
    chemical_presence,
    etchant_presence,
    film_presence,
    meetings,
)
from builder.records.safety import MixingRule
from builder.records.terms import SideKind, State
from builder.views.link import Link, PageKind, page_url
from builder.views.references import film_link
from builder.views.safety_matrix import (
    MIXING_LEGEND,
    UNKNOWN,
    Cell,
    MatrixPage,
    Row,
    mixing_cell,
    other_pages,
    rule_evidence,
)

_URL = "safety/film-gas.html"
_BY_FORMULA = Cell("gas?", "care")


def film_matrix(records: LabRecords) -> MatrixPage:
    """Return the matrix of films by the chemicals and etchants that some rule of films names."""
    columns = _columns(records)
    rows, rules = [], []
    for film_id, film in sorted(records.films.items(), key=lambda item: item[1].name.casefold()):
        presence = film_presence(records, film_id)
        cells = []
        for _, column in columns:
            met = [meeting.rule for meeting in meetings(records, column, presence)]
            rules += met
            cells.append(_with_gas(met) if met else _no_rule(records, film_id, column))
        if not film.is_family and any(cell is not UNKNOWN for cell in cells):
            rows.append(Row(film_link(records, film_id), tuple(cells)))
    return MatrixPage(
        url=_URL,
        title="Gas from films: film by chemical",
        description="Films that give toxic or flammable gas in a chemical: arsine, phosphine, hydrogen.",
        search_text="arsine phosphine hydrogen sulfide gas film acid alkali lid",
        lead="What a film gives off when a chemical reaches it. Hydrogen from aluminium, zinc or silicon in "
        "alkali collects under a lid; arsenides, phosphides and sulfides give poisonous gas in acids. Films "
        "without any rule are left out: nothing is on record for them, which is no permission.",
        legend=(
            *MIXING_LEGEND[:2],
            (_BY_FORMULA, "no record, but the formula can give a toxic gas in an acid: take it that it does"),
            (UNKNOWN, "no record: treat as incompatible"),
        ),
        row_name="Film",
        heads=tuple(head for head, _ in columns),
        rows=tuple(rows),
        evidence=rule_evidence(records, rules),
        others=other_pages(_URL),
    )


def _columns(records: LabRecords) -> list[tuple[Link, Presence]]:
    """Return the substances that rules of films name, and the acids: in those, hydrides may form."""
    rules = [rule for rule in records.mixing.values() if _is_of_films(rule)]
    columns = []
    for chemical_id in records.chemicals:
        presence = chemical_presence(records, chemical_id)
        is_acid = presence.bears((SideKind.GROUP, ACID_GROUP))
        if is_acid or any(presence.bears(_other(rule)) for rule in rules):
            columns.append((Link(chemical_id, page_url(PageKind.CHEMICAL, chemical_id)), presence))
    for etchant in records.etchants.values():
        own = {(SideKind.GROUP, group) for group in etchant.groups}
        if etchant.state is State.LIQUID and any(_other(rule) in own for rule in rules):
            head = Link(etchant.id, page_url(PageKind.ETCHANT, etchant.id))
            columns.append((head, etchant_presence(records, etchant.id)))
    return columns


def _is_of_films(rule: MixingRule) -> bool:
    return SideKind.FILM_GROUP in (rule.a.kind, rule.b.kind)


def _other(rule: MixingRule) -> tuple[SideKind, str]:
    side = rule.b if rule.a.kind is SideKind.FILM_GROUP else rule.a
    return side.kind, side.id or side.text or ""


def _with_gas(rules: Sequence[MixingRule]) -> Cell:
    cell = mixing_cell(rules)
    gases = dict.fromkeys(gas for rule in rules for gas in (rule.gas or "").split(", ") if gas)
    return replace(cell, mark=f"{cell.mark} {', '.join(gases)}".strip())


def _no_rule(records: LabRecords, film_id: str, column: Presence) -> Cell:
    gas = hydride_of(records.films[film_id])
    return _BY_FORMULA if gas and column.bears((SideKind.GROUP, ACID_GROUP)) else UNKNOWN
