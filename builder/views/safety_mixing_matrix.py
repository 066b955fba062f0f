"""Two matrices of what must not meet: by substance, and by reactive group."""

from __future__ import annotations

from functools import partial

from builder.records.chemicals import Chemical
from builder.records.etchants import Etchant
from builder.records.lab import LabRecords
from builder.records.mixing_match import handle_of, pairs_of_chemicals
from builder.records.safety import MixingRule
from builder.records.terms import SideKind
from builder.views.link import Link
from builder.views.safety_matrix import (
    MIXING_LEGEND,
    SELF,
    Evidence,
    MatrixPage,
    Row,
    chemical_head,
    mixing_cell,
    other_pages,
    rule_evidence,
)
from builder.views.words import TRUST_NAMES

_ORDER = (
    "acidic-fluoride",
    "ammonium-fluoride",
    "acid",
    "oxidiser",
    "base",
    "organic-solvent",
    "cyanide-azide",
    "iodine",
    "amine",
)
"""Reading order: what is kept together on a bench stands together. Gases come last."""
_LEAD = (
    "What happens where two things meet: in a beaker, in a waste bottle, on a wet wafer. "
    "A pair without a record is not a pair that is safe: treat it as incompatible."
)


def chemical_matrix(records: LabRecords) -> MatrixPage:
    """Return the matrix of every chemical against every other."""
    pairs = pairs_of_chemicals(records)
    ids = [one.id for one in sorted(records.chemicals.values(), key=_reading_order)]
    url = "safety/mixing.html"
    return MatrixPage(
        url=url,
        title="What must not meet: chemical by chemical",
        description="Chemicals that must not meet, with hazard, gas and source.",
        search_text="incompatible chemicals mixing matrix must not meet forbidden pairs",
        lead=_LEAD,
        legend=MIXING_LEGEND,
        row_name="Chemical",
        heads=tuple(chemical_head(records, one) for one in ids),
        rows=tuple(
            Row(
                chemical_head(records, one),
                tuple(SELF if one == other else mixing_cell(pairs.get((one, other), ())) for other in ids),
            )
            for one in ids
        ),
        evidence=rule_evidence(records, (rule for rules in pairs.values() for rule in rules)),
        others=other_pages(url),
    )


def group_matrix(records: LabRecords) -> MatrixPage:
    """Return the matrix of reactive groups, from the rules that name groups on both sides or a member."""
    rules = _rules_by_groups(records)
    groups = sorted({name for pair in rules for name in pair}, key=lambda name: records.groups[name].name)
    url = "safety/groups.html"
    heads = tuple(Link(records.groups[name].name, f"safety/groups.html#group-{name}") for name in groups)
    return MatrixPage(
        url=url,
        title="What must not meet: group by group",
        description="Reactive groups that must not meet, with hazard, gas and source.",
        search_text="reactive groups incompatible mixing matrix",
        lead=f"{_LEAD} A group is named where a rule speaks of the whole group.",
        legend=MIXING_LEGEND,
        row_name="Group",
        heads=heads,
        rows=tuple(
            Row(head, tuple(mixing_cell(rules.get((name, other), ())) for other in groups))
            for name, head in zip(groups, heads, strict=True)
        ),
        evidence=(
            *(_group(records, name) for name in groups),
            *rule_evidence(records, (rule for found in rules.values() for rule in found)),
        ),
        others=other_pages(url),
    )


def _group(records: LabRecords, name: str) -> Evidence:
    group = records.groups[name]
    members = [one.name for one in map(partial(_member, records), group.members) if one is not None]
    named = f"Members: {', '.join(members)}." if members else "No member on record."
    trust = "" if group.trust is None else f"Who belongs to it: {TRUST_NAMES[group.trust]}."
    lines = (group.description, named, trust)
    return Evidence(f"group-{name}", group.name, "", "self", tuple(line for line in lines if line), ())


def _member(records: LabRecords, name: str) -> Chemical | Etchant | None:
    return records.chemicals.get(name) or records.etchants.get(name)


def _rules_by_groups(records: LabRecords) -> dict[tuple[str, str], tuple[MixingRule, ...]]:
    found: dict[tuple[str, str], tuple[MixingRule, ...]] = {}
    for rule in records.mixing.values():
        (kind_a, a), (kind_b, b) = handle_of(rule.a), handle_of(rule.b)
        if kind_a is SideKind.GROUP and kind_b is SideKind.GROUP:
            for pair in {(a, b), (b, a)}:
                found[pair] = (*found.get(pair, ()), rule)
    return found


def _reading_order(chemical: Chemical) -> tuple[int, bool, str]:
    place = next((place for place, group in enumerate(_ORDER) if group in chemical.groups), len(_ORDER))
    is_gas = "H280" in chemical.h_codes
    return (len(_ORDER) + 1 if is_gas else place), is_gas, chemical.id
