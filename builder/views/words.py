"""The words that pages use for the closed sets of records, in one place."""

from __future__ import annotations

from builder.records.terms import (
    AfterStepKind,
    Barrier,
    Bath,
    Effect,
    FilmFamily,
    Method,
    PartTrust,
    PublishedRank,
    RateKind,
    Status,
    ToolKind,
    Trust,
)

FAMILY_NAMES = {
    FilmFamily.SEMICONDUCTOR: "Semiconductors",
    FilmFamily.OXIDE: "Oxides and glasses",
    FilmFamily.NITRIDE: "Nitrides",
    FilmFamily.METAL: "Metals",
    FilmFamily.POLYMER: "Polymers",
    FilmFamily.RESIST: "Resists",
    FilmFamily.OTHER: "Other films",
}
METHOD_NAMES = {
    Method.WET: "Wet",
    Method.VAPOUR: "Vapour",
    Method.PLASMA: "Plasma",
    Method.CYCLIC: "Cyclic",
    Method.LIFT_OFF: "Lift-off",
}
TOOL_KIND_NAMES = {
    ToolKind.BENCH: "Wet benches",
    ToolKind.VAPOUR: "Vapour chambers",
    ToolKind.PLASMA: "Plasma chambers",
    ToolKind.DEEP_SILICON: "Deep silicon chambers",
    ToolKind.ASH: "Ashers",
}
RANK_NAMES = {PublishedRank.LITERATURE: "literature", PublishedRank.UNCHECKED: "literature, unchecked"}
TRUST_NAMES = {Trust.READ: "read", Trust.RECALLED: "recalled, not checked"}
PART_TRUST_NAMES = {
    PartTrust.READ: "read",
    PartTrust.RECALLED: "recalled, not checked",
    PartTrust.GAP: "not found",
}
BARRIER_WORDS = {
    Barrier.DENSE: "dense: stops liquid and vapour until it is gone",
    Barrier.COLUMNAR: "columnar: liquid passes between the grains",
    Barrier.PINHOLED: "pinholed: liquid passes through holes",
    Barrier.UNKNOWN: "unknown: taken as letting liquid through",
}
BATH_NAMES = {
    Bath.THERMOSTATED: "thermostated bath",
    Bath.OPEN: "open beaker",
    Bath.SELF_HEATING: "self-heating mixture",
}
EFFECT_NAMES = {
    Effect.ATTACKS: "attacks",
    Effect.RESISTS: "resists",
    Effect.PEELS: "peels",
    Effect.SWELLS: "swells",
    Effect.ROUGHENS: "roughens",
    Effect.CRACKS: "cracks",
    Effect.OXIDISES: "oxidises",
    Effect.RESIDUE: "leaves residue",
}
RATE_KIND_NAMES = {
    RateKind.RATE: "",
    RateKind.RANGE: "",
    RateKind.UPPER_LIMIT: "an upper limit",
    RateKind.LOWER_LIMIT: "a lower limit",
    RateKind.NONE_SEEN: "",
}
STATUS_NAMES = {Status.DRAFT: "draft", Status.PROVEN: "proven", Status.RETIRED: "retired"}
AFTER_STEP_NAMES = {
    AfterStepKind.RINSE: "Rinse",
    AfterStepKind.QUENCH: "Quench",
    AfterStepKind.STRIP: "Strip",
    AfterStepKind.PASSIVATE: "Passivate",
    AfterStepKind.DRY: "Dry",
    AfterStepKind.OTHER: "Then",
}


def yes_no_unknown(value: bool | None) -> str:
    """Return "yes", "no" or "not stated": a blank is no "no"."""
    return {True: "yes", False: "no", None: "not stated"}[value]


def listed(words: tuple[str, ...]) -> str:
    """Return words as a list in a sentence: "a, b and c"."""
    return words[0] if len(words) == 1 else f"{', '.join(words[:-1])} and {words[-1]}" if words else ""
