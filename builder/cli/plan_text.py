"""A plan for the terminal: what decides first, then times, then what remains of each film."""

from __future__ import annotations

import math
import textwrap
from collections.abc import Iterable, Iterator

import click

from builder.engine import Mode, Rank, Verdict
from builder.findings.plan.facts import PlanFacts
from builder.findings.plan.result import Excluded, FilmRow, NoteCode, Option, Plan, StagePlan
from builder.records.terms import Role
from builder.views.number_text import Rounding, length_text, percent_text, rate_text, time_text
from builder.views.plan_cap_words import LIFTS
from builder.views.plan_words import (
    RANK_WORDS,
    blocker,
    clearing_words,
    excluded_words,
    hint_words,
    note_words,
    reason,
    row_name,
    unstated_words,
)
from builder.views.test_piece import needs_test_piece, piece_words

WIDTH = 92
_SHOWN_OPTIONS = 5
_SHOWN_EXCLUDED = 8
_MARKS = {
    Verdict.HOLDS: ("█", "green"),
    Verdict.BORDERLINE: ("▙", "yellow"),
    Verdict.LOST: ("▁", "red"),
    Verdict.UNMEASURED: ("░", "white"),
}
_SAFETY = (
    "Etchwright informs; it never authorises. The safety data sheet, local rules and licensed practice come "
    "first."
)


def plan_lines(plan: Plan, facts: PlanFacts, *, every: bool) -> Iterator[str]:
    """Return the lines of a plan; `every` shows all options and all that is left out."""
    yield _headline(plan)
    yield ""
    for stage in plan.stages:
        if plan.is_sequence:
            yield from _stage_title(stage)
        shown = stage.options if every else stage.options[:_SHOWN_OPTIONS]
        for place, option in enumerate(shown):
            yield from _option(option, facts, in_full=place == 0 or every)
            yield ""
        if len(shown) < len(stage.options):
            yield f"… and {len(stage.options) - len(shown)} more; see them with --all."
            yield ""
        yield from _excluded(stage.excluded, every=every)
    yield from _wrapped(_SAFETY)
    yield f"As of {plan.as_of}; intervals at {percent_text(plan.confidence)} confidence, each for itself."


def _headline(plan: Plan) -> str:
    """What a person came for, in the first line."""
    stages = [stage for stage in plan.stages if stage.counts]
    for stage in stages:
        if stage.treat is not None and stage.etchant is None:
            return (
                f"{plan.sample}: what step {stage.step} ({stage.treat}) is done with is not stated (etchant)."
            )
        if not stage.options:
            aim = stage.target or stage.treat or "more than the depth asked for"
            return f"{plan.sample}: nothing on record removes {aim} on this sample; see why below."
    option = max((stage.options[0] for stage in stages), key=lambda best: best.verdict.order)
    return f"{plan.sample}: {_name(option)} {_word(option.verdict)}. {blocker(option)}"


def _stage_title(stage: StagePlan) -> Iterator[str]:
    aim = f"remove {stage.target}" if stage.target else f"{stage.treat} {stage.etchant or ''}".rstrip()
    yield click.style(f"Step {stage.step}: {aim}", bold=True)


def _option(option: Option, facts: PlanFacts, *, in_full: bool) -> Iterator[str]:
    name = click.style(_name(option), bold=True)
    yield f"{_mark(option.verdict)} {name}  {_word(option.verdict)}{_by_look(option)}"
    yield from _indented(_times(option))
    if not in_full:
        yield from _indented([blocker(option)])
        return
    yield from _indented(_rate(option))
    recipe = facts.etches.get(option.recipe or "")
    if recipe is not None:
        yield from _indented(
            [
                f"Cleared: {recipe.clearing}",
                clearing_words(option),
                f"If it has not cleared: {recipe.if_not_cleared}",
            ]
        )
    for row in option.rows:
        yield from _film(row, facts)
    yield from _undercut(option)
    yield from _remarks(option)


def _name(option: Option) -> str:
    return option.recipe or option.etchant


def _by_look(option: Option) -> str:
    if option.verdict_by_look is option.verdict:
        return ""
    return f" by the timer, {_word(option.verdict_by_look)} by looking"


def _times(option: Option) -> list[str]:
    plan = option.schedule
    if plan.latest_stop_s is None:
        return ["Time: unknown; nothing on record says how long."]
    stop = time_text(plan.latest_stop_s, Rounding.UP)
    if option.target is None:
        return [f"Time: {stop}."]
    look = time_text(plan.first_look_s, Rounding.DOWN)
    if option.mode is Mode.RUN_TO_TIME:
        return [f"Run to time: {stop} (first look possible from {look})."]
    return [f"First look at {look}, latest stop {stop}: look, rinse, finish."]


def _rate(option: Option) -> list[str]:
    band = option.target_band
    if option.target is None:
        return []
    grounds = RANK_WORDS[option.target_rank]
    if band is None:
        return [f"Rate of {option.target}: unknown ({grounds})."]
    shown = rate_text(band.low, band.mid, band.high)
    whose = ", next run" if option.target_rank is Rank.OWN else ""
    interval = f" ({shown.interval_with_unit}{whose})" if shown.interval else ""
    return [f"Rate of {option.target}: {shown.with_unit}{interval}, from {grounds}."]


def _film(row: FilmRow, facts: PlanFacts) -> Iterator[str]:
    allowed = "any loss allowed" if row.allowed_nm is not None and math.isinf(row.allowed_nm) else ""
    head = f"{_mark(row.verdict)} {row_name(row)}: {_word(row.verdict)}"
    if row.verdict_by_look is not row.verdict:
        head += f" by the timer, {_word(row.verdict_by_look)} by looking"
    yield f"    {head}"
    yield from _indented([f"{_capital(reason(row))}."], 8)
    if remaining := _remaining(row):
        yield from _indented([remaining + (f" ({allowed})" if allowed else "")], 8)
    if hint := hint_words(row.hint):
        yield from _indented([f"Hint, decides nothing: {hint}."], 8)
    if row.verdict in (Verdict.BORDERLINE, Verdict.UNMEASURED):
        piece = [piece_words(row, facts.films[row.film].family)] if needs_test_piece(row) else []
        steps = [*dict.fromkeys(LIFTS[cap.code] for cap in row.caps), *piece]
        if steps:
            yield from _indented([f"To settle it: {'; '.join(steps)}."], 8)


def _remaining(row: FilmRow) -> str:
    """What is left of a film in the worst case; a film that loses more than it has is gone."""
    if row.loss.high is None or row.assumed:
        return ""
    left = row.thickness_nm - (row.spent_nm or 0.0) - row.loss.high
    whole = length_text(None, row.thickness_nm, None).with_unit
    if left <= 0:
        return f"At worst nothing is left of {whole}"
    return f"At worst {length_text(left, None, None).with_unit.removeprefix('at least ')} is left of {whole}"


def _undercut(option: Option) -> Iterator[str]:
    span = option.undercut
    if span.high is None or not any(row.role is Role.MASK for row in option.rows):
        return
    shown = length_text(span.low, span.mid, span.high)
    interval = f" ({shown.interval_with_unit})" if shown.interval else ""
    yield from _indented([f"Sideways under each mask edge: {shown.with_unit}{interval}, at the latest stop."])


def _remarks(option: Option) -> Iterator[str]:
    for note in option.notes:
        mark = "! " if note.code in (NoteCode.GAS, NoteCode.HAZARD, NoteCode.MEETING) else "· "
        yield from _indented([mark + note_words(note)])
    if option.unstated:
        items = "; ".join(unstated_words(item) for item in option.unstated)
        yield from _indented([f"Not stated, and would sharpen the answer: {items}."])


def _excluded(items: Iterable[Excluded], *, every: bool) -> Iterator[str]:
    listed = list(items)
    if not listed:
        return
    # What has no evidence is the long tail; a reason of any other kind comes first.
    listed.sort(key=lambda item: (item.reason.code in ("no-evidence", "does-not-etch"), item.recipe or ""))
    shown = listed if every else listed[:_SHOWN_EXCLUDED]
    yield "Left out:"
    for item in shown:
        yield from _indented([f"{item.recipe or item.etchant}: {excluded_words(item.reason)}"], 2)
    if len(shown) < len(listed):
        yield f"  … and {len(listed) - len(shown)} more; see them with --all."
    yield ""


def _mark(verdict: Verdict) -> str:
    sign, colour = _MARKS[verdict]
    return click.style(sign, fg=colour)


def _word(verdict: Verdict) -> str:
    return click.style(str(verdict), fg=_MARKS[verdict][1], bold=True)


def _capital(text: str) -> str:
    return text[:1].upper() + text[1:]


def _indented(texts: Iterable[str], by: int = 4) -> Iterator[str]:
    for text in texts:
        yield from _wrapped(text, by)


def _wrapped(text: str, by: int = 0) -> list[str]:
    # A width that wraps on blanks only keeps "5 min 40 s" on one line: its blanks are no-break ones.
    lines = textwrap.wrap(
        text,
        WIDTH,
        initial_indent=" " * by,
        subsequent_indent=" " * (by + 2),
        break_on_hyphens=False,
    )
    return lines or [""]
