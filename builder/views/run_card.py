"""What a run card says of a recipe on any sample: settings, steps, handling, first action, versions."""

from __future__ import annotations

import dataclasses
import hashlib
import json
from dataclasses import dataclass

from builder.findings.plan.facts import PlanFacts
from builder.findings.plan.stored import plain
from builder.records.etches import Etch
from builder.records.lab import LabRecords
from builder.views.number_text import in_words
from builder.views.recipe_record import AfterRow, StepRow, recipe_record
from builder.views.references import Fact
from builder.views.safety_strip import PrecautionBlock, SafetyStrip, etchant_strip

_HASH_DIGITS = 12
COLUMNS = (
    "date",
    "wafer",
    "film",
    "film_lot",
    "prior",
    "time_s",
    "before_nm",
    "after_nm",
    "u_nm",
    "temperature_degc",
    "load_cm2",
    "carrier",
    "window_um",
    "bath",
    "bath_hours",
    "wafers_since_clean",
    "event",
    "note",
    "site_spread",
)
"""Columns of a run table, as people write it; a test holds them to the schema."""
COLUMN_WORDS = {
    "prior": "What was done to the film before.",
    "time_s": "Etch time, s.",
    "before_nm": "Thickness before, nm.",
    "after_nm": "Thickness after, nm.",
    "u_nm": "Standard uncertainty (k = 1) of one thickness reading, nm.",
    "temperature_degc": "Temperature of bath or chuck, degC.",
    "load_cm2": "Exposed area of the film in the tool, cm2.",
    "window_um": "Width of the opening, um.",
    "bath_hours": "Hours since the bath was made.",
    "wafers_since_clean": "Wafers etched since the chamber was cleaned.",
    "event": "What begins a new series: clean, new bath, repair, new film lot.",
    "site_spread": "Half-range of the loss over the wafer as a fraction of its mean.",
}
"""What a column holds whose name does not say it, in the schema's words; a test holds them to it."""
_BY_PLAN = "by plan"


@dataclass(frozen=True)
class CardStep:
    """One step as it is set: name, time, settings in one line, remark; `by_plan`: the plan sets the time."""

    name: str
    time: str
    settings: str
    note: str
    by_plan: bool = False


@dataclass(frozen=True)
class CardHazard:
    """Equipment and first action of one class of hazard, each a term and what to do."""

    name: str
    wear: tuple[tuple[str, str], ...]
    first: tuple[tuple[str, str], ...]


@dataclass(frozen=True)
class RunCard:
    """
    The part of a run card that does not depend on the sample.

    `columns` are those of the recipe's run table; `version` is a digest of all that the card and a
    plan take from the records of this recipe and its etchant.
    """

    name: str
    tool: str
    etchant: str
    status: str
    before: tuple[str, ...]
    steps: tuple[CardStep, ...]
    after: tuple[CardStep, ...]
    conditions: tuple[tuple[str, str], ...]
    clearing: str
    if_not_cleared: str
    never: tuple[str, ...]
    not_for: tuple[str, ...]
    signal: str
    hazards: tuple[CardHazard, ...]
    unknown: tuple[str, ...]
    waste: str
    contacts: tuple[str, ...]
    columns: tuple[str, ...]
    version: str


def run_cards(records: LabRecords, facts: PlanFacts) -> dict[str, RunCard]:
    """Return the card of every recipe, by id."""
    return {id: _card(records, facts, etch) for id, etch in sorted(records.etches.items())}


def _card(records: LabRecords, facts: PlanFacts, etch: Etch) -> RunCard:
    record = recipe_record(records, etch)
    etchant = records.etchants[etch.etchant]
    strip = etchant_strip(records, etchant)
    card = RunCard(
        name=in_words(etch.name), tool=records.tools[etch.tool].name, etchant=in_words(etchant.name),
        status=str(etch.status), before=tuple(map(in_words, record.before)),
        steps=tuple(map(_step, record.steps)), after=tuple(map(_after, record.after)),
        conditions=_conditions(etch, record.conditions),
        clearing=in_words(record.clearing), if_not_cleared=in_words(record.if_not_cleared),
        never=tuple(map(in_words, strip.sentences)), not_for=tuple(map(in_words, record.do_not_use_for)),
        signal=strip.signal, hazards=tuple(map(_hazard, strip.precautions)), unknown=strip.unknown,
        waste=_waste(etch, strip),
        contacts=tuple(f"{contact.term}: {contact.text}" for contact in strip.contacts),
        columns=COLUMNS, version="",
    )  # fmt: skip
    return dataclasses.replace(card, version=_version(facts, etch, card))


def _conditions(etch: Etch, facts: tuple[Fact, ...]) -> tuple[tuple[str, str], ...]:
    wanted = ("Temperature held by", "Endpoint", "Transfer to the rinse", "Overetch", "Seasoning", "Cooling")
    return tuple((fact.term, in_words(fact.text)) for fact in facts if fact.term in wanted)


def _step(step: StepRow) -> CardStep:
    settings = ", ".join(f"{fact.term} {fact.text}" for fact in step.settings)
    return CardStep(step.name, step.time or _BY_PLAN, settings, in_words(step.note), by_plan=not step.time)


def _after(step: AfterRow) -> CardStep:
    chemical = "" if step.chemical is None else step.chemical.text
    within = f"within {step.within}" if step.within else ""
    what = in_words(step.what)
    named = chemical and chemical.casefold() not in what.casefold()
    return CardStep(step.kind, within, f"{what} ({chemical})" if named else what, in_words(step.note))


def _hazard(block: PrecautionBlock) -> CardHazard:
    return CardHazard(
        name=block.name,
        wear=tuple((fact.term, fact.text) for fact in block.at_the_bench),
        first=tuple((fact.term, fact.text) for fact in block.first),
    )


def _waste(etch: Etch, strip: SafetyStrip) -> str:
    return strip.waste if etch.waste is None else in_words(etch.waste)


def _version(facts: PlanFacts, etch: Etch, card: RunCard) -> str:
    content = [plain(facts.etches[etch.id]), plain(facts.etchants[etch.etchant]), plain(card)]
    text = json.dumps(content, sort_keys=True, ensure_ascii=False)
    return hashlib.sha256(text.encode()).hexdigest()[:_HASH_DIGITS]
