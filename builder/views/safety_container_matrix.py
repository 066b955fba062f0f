"""The matrix of container materials: what holds which chemical or etchant, up to which temperature."""

from __future__ import annotations

from builder.checking.rules_safety_containers import container_fit
from builder.records.lab import LabRecords
from builder.records.mixing_match import container_presence, meetings, substance_presence
from builder.records.safety import Container, Fitness
from builder.records.terms import FitnessVerdict, State
from builder.views.link import Link, PageKind, page_url
from builder.views.number_text import as_written
from builder.views.references import Citation, source_link
from builder.views.safety_matrix import UNKNOWN, Cell, Evidence, MatrixPage, Row, other_pages
from builder.views.safety_words import FITNESS_WORDS
from builder.views.words import TRUST_NAMES

_URL = "safety/containers.html"
_MARKS = {
    FitnessVerdict.USABLE: "yes",
    FitnessVerdict.LIMITED: "short",
    FitnessVerdict.NOT_USABLE: "no",
}
_LEGEND = (
    (Cell("yes", "yes"), "holds it, up to the temperature beside the word"),
    (Cell("short", "short"), "for a limited time, up to the temperature beside the word"),
    (Cell("no", "no"), "does not hold it"),
    (UNKNOWN, "no record: do not use it for this"),
)


def container_matrix(records: LabRecords) -> MatrixPage:
    """Return the matrix of liquids by container material."""
    materials = sorted(records.containers.values(), key=lambda one: one.name.casefold())
    substances = _substances(records, materials)
    rows, evidence = [], []
    for head, substance in substances:
        cells = []
        for material in materials:
            cell, behind = _cell(records, material, substance)
            cells.append(cell)
            evidence += [] if behind is None else [behind]
        rows.append(Row(head, tuple(cells)))
    return MatrixPage(
        url=_URL,
        title="What holds it: container by chemical",
        description="Container materials for chemicals and etchants, with temperature limits.",
        search_text="container beaker bottle material temperature PTFE PFA PP HDPE quartz glass",
        lead="A beaker that softens or dissolves spills everything at once. The temperature is the limit for "
        "this chemical in this material, not the limit of the material alone.",
        legend=_LEGEND,
        row_name="Chemical or etchant",
        heads=tuple(Link(one.name, f"{_URL}#material-{one.id}") for one in materials),
        rows=tuple(rows),
        evidence=(*(_material(one) for one in materials), *evidence),
        others=other_pages(_URL),
    )


def _substances(records: LabRecords, materials: list[Container]) -> list[tuple[Link, str]]:
    """Return every chemical with a record, and every liquid etchant, with or without one."""
    named = {row.chemical for material in materials for row in material.fitness}
    chemicals = [
        one for one in records.chemicals.values() if one.id in named and one.id not in records.etchants
    ]
    etchants = [one for one in records.etchants.values() if one.state is State.LIQUID]
    rows = [(Link(one.name, page_url(PageKind.CHEMICAL, one.id)), one.id) for one in chemicals]
    rows += [(Link(one.name, page_url(PageKind.ETCHANT, one.id)), one.id) for one in etchants]
    return sorted(rows, key=lambda row: (row[0].text.casefold(), row[1]))


def _cell(records: LabRecords, material: Container, substance: str) -> tuple[Cell, Evidence | None]:
    anchor = f"fit-{material.id}-{substance}"
    name = getattr(records.etchants.get(substance) or records.chemicals.get(substance), "name", substance)
    fit = container_fit(records, material.id, substance)
    if fit.fitness is not None:
        by = f"By its part {fit.by_part}." if fit.by_part else ""
        behind = _fitness(records, anchor, f"{name} in {material.name}", fit.fitness, by)
        limit = f" {as_written(fit.fitness.limit.text)}" if fit.fitness.limit else ""
        kind = _MARKS[fit.fitness.verdict]
        return Cell(f"{kind}{limit}", kind, (anchor,)), behind
    met = meetings(records, container_presence(records, material.id), substance_presence(records, substance))
    if not met:
        return UNKNOWN, None
    rule = met[0].rule
    where = Citation(source_link(records, rule.source[0]), "", TRUST_NAMES[rule.trust])
    lines = (f"Hazard: {', '.join(rule.hazards)}.", "By the rule for acidic fluorides.")
    behind = Evidence(anchor, f"{name} in {material.name}", "no", "no", lines, (where,))
    return Cell("no", "no", (anchor,)), behind


def _fitness(records: LabRecords, anchor: str, title: str, fitness: Fitness, by: str) -> Evidence:
    words = FITNESS_WORDS[fitness.verdict]
    limit = f"{words}, up to {as_written(fitness.limit.text)}." if fitness.limit else f"{words}."
    lines = (f"{limit[0].upper()}{limit[1:]}", by, f"{fitness.note}." if fitness.note else "")
    where = Citation(source_link(records, fitness.source), "", TRUST_NAMES[fitness.trust])
    kind = _MARKS[fitness.verdict]
    return Evidence(anchor, title, kind, kind, tuple(line for line in lines if line), (where,))


def _material(material: Container) -> Evidence:
    limit = f"The material alone: {material.service_limit}." if material.service_limit else ""
    lines = tuple(line for line in (limit, material.note or "") if line)
    return Evidence(f"material-{material.id}", material.name, "", "self", lines, ())
