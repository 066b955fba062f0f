"""The planner's data: the facts of a plan, the rules they are judged by, run cards and example samples."""

from __future__ import annotations

import json

from builder.engine import normal, plan_rules
from builder.findings.plan.facts import PlanFacts
from builder.findings.plan.gather import LEVELS
from builder.findings.plan.stored import plain
from builder.records.lab import LabRecords
from builder.records.terms import Origin
from builder.records.unit_table import unit_table_json
from builder.views.run_card import COLUMN_WORDS, run_cards

FORMAT = 1
"""Version of the planner's data; a script of another version refuses it."""

RULE_NAMES = (
    "FIRST_LOOK_FRACTION",
    "TIMED_RATIO",
    "UNTESTED_LIMIT_S",
    "GOOD_MARGIN",
    "RUN_SPAN",
    "TEMPERATURE_MATCH_K",
    "ROOM_TEMPERATURE_K",
    "ISOTROPIC_UNDERCUT",
    "REFERENCE_CONFIDENCE",
    "TWO_FACES",
)


def planner_data(records: LabRecords, facts: PlanFacts, reference: PlanFacts) -> dict[str, object]:
    """
    Return all that the planner in the browser knows, as JSON-like data.

    `reference` are the facts with nothing of the lab's own, for an etchant alone; of its etchants only
    those that differ are stored.
    """
    return {
        "format": FORMAT,
        "facts": plain(facts),
        "reference": _reference(records, facts, reference),
        "rules": {name.lower(): plain(getattr(plan_rules, name)) for name in RULE_NAMES},
        "quantiles": quantiles(facts),
        "units": json.loads(unit_table_json()),
        "cards": {id: plain(card) for id, card in run_cards(records, facts).items()},
        "legend": COLUMN_WORDS,
        "samples": [json.loads(sample.json_text) for _, sample in sorted(records.samples.items())],
        "sources": {id: source.title for id, source in sorted(records.sources.items())},
        "tools": {id: tool.name for id, tool in sorted(records.tools.items())},
        "lab": records.settings.name,
    }


def quantiles(facts: PlanFacts) -> list[dict[str, float]]:
    """Return the one-sided normal quantile of each confidence at which intervals are stored."""
    levels = {*LEVELS, facts.defaults.confidence, plan_rules.REFERENCE_CONFIDENCE}
    return [{"confidence": level, "quantile": normal((1 + level) / 2)} for level in sorted(levels)]


def _reference(records: LabRecords, facts: PlanFacts, reference: PlanFacts) -> dict[str, object]:
    couples = zip(sorted(records.couples.items()), facts.couples, strict=True)
    return {
        "etchants": {
            id: plain(etchant)
            for id, etchant in reference.etchants.items()
            if etchant != facts.etchants.get(id)
        },
        "etches": {},
        "refused": {},
        "couples": [plain(fact) for (_, couple), fact in couples if couple.origin is Origin.REFERENCE],
    }
