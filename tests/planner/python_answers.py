"""What the Python engine says to a case, in the form that both languages can give."""

from __future__ import annotations

import math
from collections.abc import Iterator, Mapping, Sequence
from typing import Any

from builder.engine import RateBand, Schedule, Span
from builder.findings.plan.facts import FilmFacts, PlanFacts
from builder.findings.plan.planning import plan
from builder.findings.plan.result import FilmRow, Option, Remark, StagePlan
from builder.findings.plan.sample import plan_sample
from builder.records.samples import Sample
from builder.records.terms import Origin
from builder.views.plan_words import blocker, clearing_words, excluded_words, note_words, reason
from builder.views.test_piece import needs_test_piece, piece_words
from tests.planner.random_samples import Case

# Plain data that a browser can give too.
Answer = Any


def python_answers(facts: PlanFacts, cases: Sequence[Case]) -> list[Answer]:
    """Return what the Python engine says to each case, by these facts."""
    return [_answer(facts, case) for case in cases]


def _answer(facts: PlanFacts, case: Case) -> Answer:
    sample = Sample.from_raw(case.sample, "random.json", Origin.LAB)
    seen = plan_sample(sample, facts.defaults)
    planned = plan(facts, seen, sample.steps, confidence=case.confidence, etchant=case.etchant)
    return [_stage(stage, facts.films) for stage in planned.stages]


def _stage(stage: StagePlan, films: Mapping[str, FilmFacts]) -> Answer:
    return {
        "step": stage.step,
        "target": stage.target,
        "treat": stage.treat,
        "options": [_option(option, films) for option in stage.options],
        "excluded": [[one.recipe, one.etchant, excluded_words(one.reason)] for one in stage.excluded],
    }


def _option(option: Option, films: Mapping[str, FilmFacts]) -> Answer:
    return {
        "recipe": option.recipe,
        "etchant": option.etchant,
        "words": [option.verdict, option.verdict_by_look, option.mode, option.target_rank],
        "flags": [option.proven, option.has_margin],
        "numbers": [
            *_ends(option.target_band),
            *_times(option.schedule),
            *_ends(option.undercut),
            option.phi,
            option.offset_s,
            option.overetch,
        ],
        "rows": [_row(row, films) for row in option.rows],
        "blocker": blocker(option),
        "cleared": clearing_words(option),
        "notes": [note_words(note) for note in option.notes],
        "unstated": _codes(option.unstated),
    }


def _row(row: FilmRow, films: Mapping[str, FilmFacts]) -> Answer:
    allowed = row.allowed_nm
    return {
        "film": [row.film, row.role, row.rank, row.hint, list(row.effects)],
        "words": [row.verdict, row.verdict_by_look, row.ground, row.ground_by_look],
        "caps": _codes(row.caps),
        "lost": None if row.lost is None else row.lost.code,
        "numbers": [
            row.thickness_nm,
            *_ends(row.loss),
            *_ends(row.loss_by_look),
            "any" if allowed is not None and math.isinf(allowed) else allowed,
            _finite(row.spent_nm),
        ],
        "reason": reason(row),
        "test": piece_words(row, films[row.film].family) if needs_test_piece(row) else "",
    }


def _finite(value: float | None) -> float | str | None:
    return "infinite" if value is not None and math.isinf(value) else value


def _codes(remarks: Sequence[Remark]) -> list[str]:
    return [str(remark.code) for remark in remarks]


def _ends(span: Span | RateBand | None) -> Iterator[float | None]:
    yield from (None, None, None) if span is None else (span.low, span.mid, span.high)


def _times(schedule: Schedule) -> Iterator[float | None]:
    yield from (
        schedule.nominal_s,
        schedule.clear_first_s,
        schedule.clear_last_s,
        schedule.first_look_s,
        schedule.latest_stop_s,
    )
