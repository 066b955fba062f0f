"""The safety matrices: chemical by chemical, group by group, container by chemical, film by etchant."""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from dataclasses import dataclass

from builder.checking.rules_safety_finding import advice_of
from builder.records.lab import LabRecords
from builder.records.safety import MixingRule, Side
from builder.records.terms import MixingSeverity, SideKind
from builder.views.link import Link, PageKind, page_url
from builder.views.references import Citation, citations
from builder.views.safety_words import SEVERITY_WORDS

UNKNOWN_MARK = "?"


@dataclass(frozen=True)
class Cell:
    """One cell: the word in it, its kind for the look, the evidence it opens, and the words read out."""

    mark: str
    kind: str
    evidence: tuple[str, ...] = ()
    said: str = ""


@dataclass(frozen=True)
class Row:
    """One row with its head."""

    head: Link
    cells: tuple[Cell, ...]


@dataclass(frozen=True)
class Evidence:
    """What stands behind a cell, beside the table; `anchor` is its place on the page."""

    anchor: str
    title: str
    word: str
    kind: str
    lines: tuple[str, ...]
    citations: tuple[Citation, ...]


@dataclass(frozen=True)
class MatrixPage:
    """One matrix with its legend and its evidence."""

    url: str
    title: str
    description: str
    search_text: str
    lead: str
    legend: tuple[tuple[Cell, str], ...]
    row_name: str
    heads: tuple[Link, ...]
    rows: tuple[Row, ...]
    evidence: tuple[Evidence, ...]
    others: tuple[Link, ...]


PAGES = (
    Link("Chemical by chemical", "safety/mixing.html"),
    Link("Group by group", "safety/groups.html"),
    Link("Film by chemical", "safety/film-gas.html"),
    Link("Container by chemical", "safety/containers.html"),
)
UNKNOWN = Cell(UNKNOWN_MARK, "unknown")
SELF = Cell("–", "self")
MIXING_LEGEND = (
    (Cell("never", "never"), "they must never meet"),
    (Cell("care", "care"), "they may meet only on purpose, with the care that the evidence names"),
    (UNKNOWN, "no record: treat as incompatible"),
)


def other_pages(url: str) -> tuple[Link, ...]:
    """Return the other matrices."""
    return tuple(link for link in PAGES if link.target != url)


def mixing_cell(rules: Sequence[MixingRule]) -> Cell:
    """Return the cell of a pair that these rules name, by the gravest."""
    if not rules:
        return UNKNOWN
    ordered = sorted(rules, key=lambda rule: (rule.severity is not MixingSeverity.FORBID, rule.id))
    word = SEVERITY_WORDS[ordered[0].severity]
    return Cell(word, word, tuple(rule_anchor(rule) for rule in ordered))


def rule_anchor(rule: MixingRule) -> str:
    """Return the place of a rule's evidence on a matrix page."""
    return f"rule-{rule.id}"


def rule_evidence(records: LabRecords, rules: Iterable[MixingRule]) -> tuple[Evidence, ...]:
    """Return the evidence of rules, each once, by id."""
    once = {rule.id: rule for rule in rules}
    return tuple(_evidence(records, once[rule_id]) for rule_id in sorted(once))


def _evidence(records: LabRecords, rule: MixingRule) -> Evidence:
    word = SEVERITY_WORDS[rule.severity]
    gas = f"Gas: {rule.gas}." if rule.gas else ""
    lines = (f"Hazard: {', '.join(rule.hazards)}.", gas, advice_of(rule.note))
    return Evidence(
        anchor=rule_anchor(rule),
        title=f"{side_name(records, rule.a)} with {side_name(records, rule.b)}",
        word=word,
        kind=word,
        lines=tuple(line for line in lines if line),
        citations=citations(records, rule.source, rule.trust),
    )


def side_name(records: LabRecords, side: Side) -> str:
    """Return how a side of a rule is named."""
    name = side.id or ""
    kinds = {
        SideKind.CHEMICAL: records.chemicals,
        SideKind.ETCHANT: records.etchants,
        SideKind.GROUP: records.groups,
        SideKind.FILM_GROUP: records.groups,
        SideKind.CONTAINER: records.containers,
    }
    record = kinds[side.kind].get(name) if side.kind in kinds else None
    return getattr(record, "name", None) or side.text or name


def chemical_head(records: LabRecords, chemical_id: str) -> Link:
    """Return the head of a chemical's row or column."""
    return Link(records.chemicals[chemical_id].name, page_url(PageKind.CHEMICAL, chemical_id))
