"""Sentences of a plan, made of its codes: the plain voice of a good colleague."""

from __future__ import annotations

import math
from collections.abc import Sequence

from builder.engine import Ground, Rank, Verdict
from builder.findings.plan.result import (
    CapCode,
    ExcludedCode,
    FilmRow,
    NoteCode,
    Option,
    Remark,
    UnstatedCode,
    Value,
)
from builder.records.terms import Method, Role
from builder.views.number_text import length_text
from builder.views.plan_cap_words import (
    Sentence,
    between,
    cap_words,
    clause,
    lost_words,
    plain_length,
    temperature_of,
    time_of,
)

RANK_WORDS: dict[Rank, str] = {
    Rank.OWN: "own runs",
    Rank.LITERATURE: "literature",
    Rank.UNCHECKED: "literature, unchecked",
    Rank.STATEMENT: "a statement without a number",
    Rank.SIMILAR: "a similar film",
    Rank.NONE: "nothing on record",
}

ROLE_WORDS: dict[Role, str] = {
    Role.MASK: "mask",
    Role.UNDER: "under the target",
    Role.EXPOSED: "exposed",
    Role.BACK: "back",
    Role.TARGET: "target",
}

ALL = "all of it"

_GROUNDS: dict[Ground, str] = {
    Ground.ANY_LOSS_ACCEPTED: "it may vanish",
    Ground.NO_HIGH_END: "only a lowest rate is known; nothing bounds the loss",
    Ground.NO_ALLOWANCE: "no allowed loss is stated, and the film is too thin for a default",
    Ground.UNCHECKED: "the number is recalled, not checked",
    Ground.TARGET_UNCHECKED: "the target's own rate is not checked, so the time is not sure",
    Ground.BEYOND_TESTED_TIME: "no loss was seen, but nobody tested that long",
    Ground.STATEMENT_RESISTS: "said to withstand it; nobody measured how well",
    Ground.STATEMENT_ADVERSE: "said to suffer in it; no rate on record",
    Ground.STATEMENT_ATTACKS: "said to be attacked",
    Ground.NO_EVIDENCE: "nothing on record for this film in this etch",
    Ground.TIME_UNKNOWN: "nobody knows how long the etch takes, so its loss is unknown",
}

_NOTES: dict[str, Sentence] = {
    NoteCode.NOT_A_TARGET: lambda p: f"The recipe is not meant for {p['film']}; its rate is on record.",
    NoteCode.DRAFT: lambda p: "The recipe is a draft: nobody has called it proven.",
    NoteCode.CONFLICT: lambda p: "Own runs and the literature contradict each other; the own runs count.",
    NoteCode.FAR: lambda p: "Own runs were at another temperature and do not count here.",
    NoteCode.STALE: lambda p: (
        f"The newest run of {p['film']} is {p['days']} days old: run a monitor wafer first."
    ),
    NoteCode.ALL_TEMPERATURES: lambda p: "No temperature is asked for: the rates span all on record.",
    NoteCode.TIME_OUTSIDE_RUNS: lambda p: (
        f"The runs lasted {between(time_of(p, 'low_s'), time_of(p, 'high_s'))}; "
        f"up to {time_of(p, 'stop_s')} nobody has shown that the rate stays the same."
    ),
    NoteCode.COUPLE_TARGET: lambda p: f"{p['one']} with {p['other']}: {clause(p['words'])}.",
    NoteCode.UNDERCUT_ASSUMED: lambda p: (
        "An isotropic etch goes sideways at least as far as down (common practice, no source)."
    ),
    NoteCode.GAS: lambda p: str(p["words"]),
    NoteCode.MEETING: lambda p: f"Rinse well between {p['first']} and {p['second']}: {p['words']}",
    NoteCode.HAZARD: lambda p: str(p["words"]),
}

_UNSTATED: dict[str, Sentence] = {
    UnstatedCode.BACK: lambda p: "the film on the back, or that it is protected",
    UnstatedCode.EDGE: lambda p: "whether the edge is open, protected or unused",
    UnstatedCode.UNDER_NOBLE: lambda p: f"what lies under {p['film']} (on: a film, or none)",
    UnstatedCode.ALLOWED: lambda p: f"how much of {p['film']} may go (allowed_loss)",
    UnstatedCode.TEMPERATURE: lambda p: "the temperature of the etch",
    UnstatedCode.LOAD: lambda p: "the open area (goal.load_cm2)",
    UnstatedCode.LINE: lambda p: "the width of the narrowest masked line (goal.line)",
    UnstatedCode.STOP: lambda p: "a carrier, or a film to stop on",
    UnstatedCode.WINDOW: lambda p: "the width of the narrowest opening (goal.window)",
}

_HINTS = {
    "temperature": "a rate is on record at another temperature",
    "conditions": "a rate or a statement is on record under other conditions",
}

_EXCLUDED: dict[str, Sentence] = {
    ExcludedCode.NO_EVIDENCE: lambda p: f"nothing on record for {p['film']} here" + _hintclause(p["hint"]),
    ExcludedCode.DOES_NOT_ETCH: lambda p: f"no etching of {p['film']} was seen",
    ExcludedCode.RETIRED: lambda p: "retired",
    ExcludedCode.TOOL_REFUSES: lambda p: str(p["words"]),
    ExcludedCode.METHOD: lambda p: f"{p['method']} is outside the sample's limits",
    ExcludedCode.TOOL: lambda p: f"{p['tool']} is outside the sample's limits",
    ExcludedCode.ETCHANT: lambda p: f"{p['etchant']} is outside the sample's limits",
    ExcludedCode.TOO_HOT: lambda p: (
        f"runs at {temperature_of(p, 'recipe_k')}, and the sample may see {temperature_of(p, 'limit_k')}"
    ),
    ExcludedCode.OTHER_TEMPERATURE: lambda p: (
        f"runs at {temperature_of(p, 'recipe_k')}, not at {temperature_of(p, 'asked_k')}"
    ),
    ExcludedCode.SAFETY: lambda p: f"not allowed: {p['words']}",
    ExcludedCode.MEETING: lambda p: f"{p['first']} must not be carried into {p['second']}: {p['words']}",
}


def reason(row: FilmRow) -> str:
    """Return why a film has its word: what overrides, the loss against what is allowed, then each cap."""
    if row.lost is not None:
        return lost_words(row.lost)
    if any(cap.code == CapCode.BACK for cap in row.caps):
        return cap_words(next(cap for cap in row.caps if cap.code == CapCode.BACK))
    # What keeps a film from "holds" says nothing where the word is worse anyhow.
    caps = row.caps if row.verdict is Verdict.BORDERLINE else ()
    couples = [cap for cap in caps if cap.code == CapCode.COUPLE]
    others = [cap_words(cap) for cap in caps if cap.code != CapCode.COUPLE]
    return "; ".join([_ground(row), *([couple_words(row.film, couples)] if couples else []), *others])


def couple_words(film: str, couples: Sequence[Remark]) -> str:
    """Return one clause for all couples of a film that have no record."""
    partners = sorted({str(cap.params[side]) for cap in couples for side in ("one", "other")} - {film})
    return f"wet together with {listed(partners)}, and no record of that couple"


def listed(names: Sequence[str]) -> str:
    """Return names as a list in words: a, b and c."""
    return names[0] if len(names) == 1 else f"{', '.join(names[:-1])} and {names[-1]}"


_OF_A_MEMBER: dict[Ground, str] = {
    Ground.MILD_END_EXCEEDS: "even the mild end takes more of one than is allowed",
    Ground.STRADDLES: "one may lose more than is allowed",
    Ground.WITHIN_ALLOWED: "each loses no more than is allowed",
}


def _ground(row: FilmRow) -> str:
    if row.ground is Ground.NO_ALLOWANCE and row.spent_nm is None:
        return "how much of it may still go is not known"
    if row.ground in _GROUNDS:
        return _GROUNDS[row.ground]
    if row.loss.low is None:
        # A family with a member that nobody measured has no loss as a whole, but a member's word stands.
        return f"of the films it may be, {_OF_A_MEMBER[row.ground]}"
    stated = None if row.allowed_nm is None or math.isinf(row.allowed_nm) else plain_length(row.allowed_nm)
    limit = "" if stated is None else f"; allowed is {stated}"
    if row.ground is Ground.MILD_END_EXCEEDS:
        goes = min(row.loss.low, _left(row))
        least = length_text(goes, None, None).with_unit.removeprefix("at least ")
        return f"even the mild end takes {least}{f' ({ALL})' if takes_all(row, row.loss.low) else ''}{limit}"
    if row.loss.high is None:
        return "at worst an unknown amount" + ("" if stated is None else f" of {stated} allowed")
    if takes_all(row, row.loss.high):
        return f"at worst {ALL}{limit}"
    high = length_text(None, None, row.loss.high).with_unit.removeprefix("at most ")
    return f"at worst {high}" + ("" if stated is None else f" of {stated} allowed")


def takes_all(row: FilmRow, loss_nm: float) -> bool:
    """Tell whether a loss reaches what earlier steps have left of a film."""
    return loss_nm >= _left(row)


def _left(row: FilmRow) -> float:
    return max(0.0, row.thickness_nm - (row.spent_nm or 0.0))


def note_words(note: Remark) -> str:
    """Return a note on an option, as a sentence."""
    return _NOTES[note.code](note.params)


def unstated_words(item: Remark) -> str:
    """Return what a sample does not state."""
    return _UNSTATED[item.code](item.params)


def excluded_words(item: Remark) -> str:
    """Return why an etch is left out."""
    return _EXCLUDED[item.code](item.params)


def hint_words(hint: str | None) -> str | None:
    """Return what a hint says, or None without one; it decides nothing."""
    if hint is None:
        return None
    if hint.startswith("similar:"):
        return f"a similar film is on record: {hint.removeprefix('similar:')}"
    return _HINTS[hint]


def blocker(option: Option) -> str:
    """Return the one sentence that stands first: what decides the plan."""
    if not option.rows:
        return _without_films(option)
    row = option.rows[0]
    if option.verdict is Verdict.HOLDS:
        return f"Every film holds; closest is {row_name(row)}: {reason(row)}."
    verb = {Verdict.LOST: "is lost", Verdict.BORDERLINE: "may not last", Verdict.UNMEASURED: "is unmeasured"}
    if option.verdict is not row.verdict:
        return _without_films(option)
    return f"{_capital(row_name(row))} {verb[row.verdict]}: {reason(row)}."


def clearing_words(option: Option) -> str:
    """Return whose look the recipe's words on clearing describe, and what shows on this sample instead."""
    seen = "As seen on this recipe's own wafers."
    if option.bares is None:
        return seen
    return f"{seen} Under your target lies {option.bares}: expect its look, not that of another film."


def _without_films(option: Option) -> str:
    if option.schedule.latest_stop_s is None:
        return "How long the etch takes is not on record."
    if option.verdict is Verdict.HOLDS:
        return "No other film is reached."
    if option.caps:
        return f"{_capital(cap_words(option.caps[0]))}."
    return f"The target's rate rests on {RANK_WORDS[option.target_rank]}."


def row_name(row: FilmRow) -> str:
    """Return a film with its place: the mask resist-positive-a."""
    place = {
        Role.MASK: f"the mask {row.film}",
        Role.UNDER: f"{row.film} under the target",
        Role.BACK: f"{row.film} on the back",
        Role.EXPOSED: f"exposed {row.film}",
    }
    return place.get(row.role, row.film)


def method_words(method: Method) -> str:
    """Return a method as people say it."""
    return str(method)


def _capital(text: str) -> str:
    return text[:1].upper() + text[1:]


def _hintclause(hint: Value) -> str:
    return f" ({hint_words(str(hint))})" if hint is not None else ""
