"""The safety strip of a chemical or etchant: signal, diamonds, statements, equipment, first action, waste."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass, replace

from builder.checking.rules_safety_plan import recipe_films
from builder.findings.safety import etchant_hazards, plan_safety
from builder.records.chemicals import Chemical
from builder.records.etchants import Etchant
from builder.records.etches import Etch
from builder.records.lab import LabRecords
from builder.records.mixing_match import HF_PRECAUTION
from builder.records.safety import Precaution
from builder.records.terms import SideKind, Signal, Trust
from builder.views.link import Link
from builder.views.references import Citation, Fact, citations, known_facts
from builder.views.safety_words import PICTOGRAM_NAMES, SIGNAL_WORDS, VERIFY, pending_words

HF_SENTENCE = (
    "Hydrofluoric acid, or gives it: never alone, calcium gluconate gel at hand and in date, "
    "trained people only."
)
MIXTURE_SENTENCE = "These are the hazards of its parts, each at stock strength. The mixture may be worse."
HF_PAGE = Link("Read the hydrofluoric acid page before you touch it.", "safety/hydrofluoric-acid.html")
PLASMA_PAGE = Link("Plasma hazards: gas, chamber, pump, residue.", "safety/plasma.html")
FIRST_ETCH_PAGE = Link("Before your first wet etch.", "safety/before-your-first-wet-etch.html")


@dataclass(frozen=True)
class Diamond:
    """One UN GHS pictogram: code, name, and the address of our drawing."""

    code: str
    name: str
    drawing: str


@dataclass(frozen=True)
class HazardStatement:
    """One hazard statement in words; `bearers` names the parts it comes from, or is empty."""

    code: str
    words: str
    bearers: str


@dataclass(frozen=True)
class PrecautionBlock:
    """What to do first, what must be at the bench, and the rest of one class, and how that is known."""

    name: str
    first: tuple[Fact, ...]
    at_the_bench: tuple[Fact, ...]
    facts: tuple[Fact, ...]
    overrides: str
    trust: str
    citations: tuple[Citation, ...]


@dataclass(frozen=True)
class SafetyStrip:
    """
    What stands at the top of a page that names a hazardous substance.

    `sentences` are the rules that must not be overlooked, `unknown` what nobody has supplied.
    """

    signal: str
    is_signal_pending: bool
    diamonds: tuple[Diamond, ...]
    statements: tuple[HazardStatement, ...]
    no_statement: str
    of_parts: str
    sentences: tuple[str, ...]
    unknown: tuple[str, ...]
    handling: tuple[Fact, ...]
    precautions: tuple[PrecautionBlock, ...]
    overrides: tuple[str, ...]
    waste: str
    data_sheet: str
    local_rules: tuple[str, ...]
    contacts: tuple[Fact, ...]
    links: tuple[Link, ...]


def chemical_strip(records: LabRecords, chemical: Chemical) -> SafetyStrip:
    """Return the strip of a chemical."""
    precautions = _blocks(records, [chemical.precaution] if chemical.precaution else [])
    is_hf = chemical.precaution == HF_PRECAUTION or chemical.formula == "HF"
    return SafetyStrip(
        signal=SIGNAL_WORDS[chemical.signal],
        is_signal_pending=chemical.signal is Signal.PENDING,
        diamonds=tuple(_diamond(code) for code in chemical.pictograms),
        statements=tuple(_statement(records, code, ()) for code in chemical.h_codes),
        no_statement=_no_statement(chemical),
        of_parts="",
        sentences=tuple(_sentences(is_hf, chemical.never_capped is True)),
        unknown=tuple(f"{words[0].upper()}{words[1:]} pending." for words in _pending(chemical)),
        handling=known_facts(
            ("Reacts as", _groups(records, SideKind.CHEMICAL, chemical.id)),
            ("First action", chemical.first_action),
        ),
        precautions=precautions,
        overrides=tuple(dict.fromkeys(block.overrides for block in precautions)),
        waste=chemical.waste or _waste(precautions),
        data_sheet=_data_sheet(chemical),
        local_rules=records.settings.local_rules,
        contacts=contacts(records),
        links=((HF_PAGE,) if is_hf else ()) + ((FIRST_ETCH_PAGE,) if chemical.hazardous else ()),
    )


def etchant_strip(records: LabRecords, etchant: Etchant) -> SafetyStrip:
    """Return the strip of an etchant: the hazards of its parts, and its own handling."""
    hazards = etchant_hazards(records, etchant.id)
    precautions = _blocks(records, hazards.precautions)
    is_gas = etchant.state.value != "liquid"
    links = ((HF_PAGE,) if hazards.holds_hf else ()) + ((PLASMA_PAGE,) if is_gas else (FIRST_ETCH_PAGE,))
    return SafetyStrip(
        signal=SIGNAL_WORDS[hazards.signal],
        is_signal_pending=hazards.signal is Signal.PENDING,
        diamonds=tuple(_diamond(code) for code in hazards.pictograms),
        statements=tuple(_statement(records, code, bearers) for code, bearers in hazards.codes),
        no_statement="No hazard statement of its parts is on record. That does not make it harmless.",
        of_parts=MIXTURE_SENTENCE if len(etchant.parts) > 1 else "",
        sentences=tuple(_sentences(hazards.holds_hf, hazards.is_never_capped)),
        unknown=(*hazards.unknown, *_etchant_pending(etchant)),
        handling=_handling(records, etchant),
        precautions=precautions,
        overrides=tuple(dict.fromkeys(block.overrides for block in precautions)),
        waste=_waste(precautions),
        data_sheet="The data sheets of its parts; a mixture made at the bench has none of its own.",
        local_rules=records.settings.local_rules,
        contacts=contacts(records),
        links=links,
    )


def recipe_strip(records: LabRecords, etch: Etch) -> SafetyStrip:
    """Return the strip of a recipe: that of its etchant, what its films and steps add, its own waste."""
    strip = etchant_strip(records, records.etchants[etch.etchant])
    found = plan_safety(records, etch.etchant, etch.method, recipe_films(etch), etch_id=etch.id)
    own = tuple(finding.message for finding in found.findings)
    return replace(strip, sentences=(*strip.sentences, *own), waste=etch.waste or strip.waste)


def contacts(records: LabRecords) -> tuple[Fact, ...]:
    """Return whom to reach in this lab, by role."""
    return tuple(Fact(contact.role, contact.reach) for contact in records.settings.contacts)


def precaution_block(records: LabRecords, precaution: Precaution) -> PrecautionBlock:
    """Return equipment and first action of one class."""
    return PrecautionBlock(
        name=precaution.name,
        first=known_facts(
            ("On skin", precaution.first_action_skin),
            ("In the eye", precaution.first_action_eye),
            ("Breathed in", precaution.first_action_inhalation),
        ),
        at_the_bench=known_facts(
            ("Protective equipment", precaution.ppe),
            ("Controls", precaution.controls),
            ("Besides", precaution.extra),
        ),
        facts=known_facts(
            ("Alarms and checks", precaution.monitoring),
            ("Storage and waste", precaution.storage_and_waste),
        ),
        overrides=precaution.defer_to,
        trust=_trust_words(precaution),
        citations=citations(records, precaution.source, precaution.trust),
    )


def _trust_words(precaution: Precaution) -> str:
    if precaution.trust is Trust.READ:
        return precaution.trust_note or ""
    return f"{precaution.trust_note}. {VERIFY}" if precaution.trust_note else VERIFY


def _blocks(records: LabRecords, ids: Iterable[str]) -> tuple[PrecautionBlock, ...]:
    return tuple(precaution_block(records, records.precautions[one]) for one in ids)


def _waste(precautions: tuple[PrecautionBlock, ...]) -> str:
    rows = [fact.text for block in precautions for fact in block.facts if fact.term == "Storage and waste"]
    if not rows:
        return "Waste stream pending: ask the safety office before you mix anything."
    return " ".join((*(f"{row}." for row in rows), "The local waste list names the container and its label."))


def _diamond(code: str) -> Diamond:
    return Diamond(code, PICTOGRAM_NAMES[code], f"assets/ghs/{code.lower()}.svg")


def _statement(records: LabRecords, code: str, bearers: tuple[str, ...]) -> HazardStatement:
    known = records.codes.get(code.lower())
    words = known.meaning if known else "its words are not on record; read the SDS"
    return HazardStatement(code, words, ", ".join(bearers))


def _no_statement(chemical: Chemical) -> str:
    if "h_codes" in chemical.pending:
        return "Hazard statements are pending: treat it as hazardous until the data sheet says otherwise."
    if chemical.hazardous:
        return "It has no hazard statement in the sources here. That does not make it harmless."
    return "Not classified as hazardous."


def _sentences(holds_hf: bool, never_capped: bool) -> Iterable[str]:
    if holds_hf:
        yield HF_SENTENCE
    if never_capped:
        yield "Never in a closed bottle: it makes gas. Vented caps only."


def _pending(chemical: Chemical) -> tuple[str, ...]:
    return pending_words(chemical.pending)


def _etchant_pending(etchant: Etchant) -> Iterable[str]:
    if etchant.state.value == "liquid" and etchant.mixture is None and "mixture" not in etchant.pending:
        yield "Order of mixing, heat and gas, pot life: not on record."
    for words in pending_words(etchant.pending):
        yield f"{words[0].upper()}{words[1:]} pending."


def _groups(records: LabRecords, kind: SideKind, record_id: str) -> str:
    """Return the names of the groups that a substance itself belongs to."""
    own = records.etchants[record_id] if kind is SideKind.ETCHANT else records.chemicals[record_id]
    names = {group.name for group in records.groups.values() if record_id in group.members}
    names |= {records.groups[group].name for group in own.groups if group in records.groups}
    return "; ".join(sorted(names))


def _data_sheet(chemical: Chemical) -> str:
    by = f", CAS {', '.join(chemical.cas)}" if chemical.cas else ""
    product = f"{chemical.name}{by}"
    return f"Ask the supplier for the sheet of this product ({product}); keep the current one at the bench."


def _handling(records: LabRecords, etchant: Etchant) -> tuple[Fact, ...]:
    reacts = ("Reacts as", _groups(records, SideKind.ETCHANT, etchant.id))
    mixture = etchant.mixture
    if mixture is None:
        return known_facts(reacts)
    return known_facts(
        reacts,
        ("Used for", mixture.use),
        ("Order of mixing", mixture.order_of_mixing),
        ("Heat, gas, hazards", mixture.hazards),
        ("Pot life", mixture.pot_life),
        ("Container", mixture.container),
        ("How this is known", mixture.trust_note or (VERIFY if mixture.trust is Trust.RECALLED else None)),
    )
