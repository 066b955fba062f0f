"""A plan as plain data, in the form of schemas/plan.json: nm, s, nm/min, null for unknown."""

from __future__ import annotations

import math

from builder.engine import RateBand, Span
from builder.findings.plan.result import Excluded, FilmRow, Option, Plan, StagePlan
from builder.views.plan_cap_words import cap_words
from builder.views.plan_words import excluded_words, hint_words, note_words, reason, unstated_words

FORMAT = 1
_SECONDS_A_MINUTE = 60.0
_DIGITS = 10
"""Digits written: what lies beyond is the noise of floating point, and differs with the unit typed."""


def plan_data(plan: Plan) -> dict[str, object]:
    """Return a plan in the form of schemas/plan.json."""
    first = plan.stages[0]
    data: dict[str, object] = {
        "format": FORMAT,
        "sample": plan.sample,
        "as_of": plan.as_of,
        "confidence": plan.confidence,
        "options": [_option(option) for option in first.options],
        "excluded": [_excluded(item) for item in first.excluded],
    }
    if plan.is_sequence:
        data["stages"] = [_stage(stage) for stage in plan.stages]
    return data


def _stage(stage: StagePlan) -> dict[str, object]:
    treatment = {} if stage.treat is None else {"treat": stage.treat, "etchant": stage.etchant}
    return {
        "step": stage.step,
        "target": stage.target,
        **treatment,
        "options": [_option(option) for option in stage.options],
        "excluded": [_excluded(item) for item in stage.excluded],
    }


def _option(option: Option) -> dict[str, object]:
    times = option.schedule
    return {
        "recipe": option.recipe,
        "etchant": option.etchant,
        "method": str(option.method),
        "verdict": str(option.verdict),
        "verdict_by_look": str(option.verdict_by_look),
        "target": {
            "film": option.target,
            "rank": str(option.target_rank),
            "rate_nm_per_min": _band(option.target_band),
        },
        "time": {
            "nominal_s": _number(times.nominal_s),
            "first_look_s": _number(times.first_look_s),
            "latest_stop_s": _number(times.latest_stop_s),
            "clear_first_s": _number(times.clear_first_s),
            "clear_last_s": _number(times.clear_last_s),
            "mode": None if option.mode is None else str(option.mode),
        },
        "undercut_nm": _span(option.undercut),
        "films": [_film(row) for row in option.rows],
        # Without films there is no reason of a film to say what keeps the plan from "holds".
        "cautions": [
            *(cap_words(cap) for cap in option.caps if not option.rows),
            *(note_words(note) for note in option.notes),
        ],
        "not_stated": [unstated_words(item) for item in option.unstated],
    }


def _film(row: FilmRow) -> dict[str, object]:
    allowed = row.allowed_nm
    return {
        "film": row.film,
        "role": str(row.role),
        "loss_nm": _span(row.loss),
        "allowed_nm": None if allowed is None or math.isinf(allowed) else _number(allowed),
        "verdict": str(row.verdict),
        "verdict_by_look": str(row.verdict_by_look),
        "rank": str(row.rank),
        "reason": reason(row),
        "hint": hint_words(row.hint),
    }


def _excluded(item: Excluded) -> dict[str, object]:
    return {"recipe": item.recipe, "etchant": item.etchant, "reason": excluded_words(item.reason)}


def _band(band: RateBand | None) -> list[float | None]:
    if band is None:
        return [None, None, None]
    ends = (band.low, band.mid, band.high)
    return [_number(None if end is None else end * _SECONDS_A_MINUTE) for end in ends]


def _span(span: Span) -> list[float | None]:
    return [_number(span.low), _number(span.mid), _number(span.high)]


def _number(value: float | None) -> float | None:
    return None if value is None else float(f"{value:.{_DIGITS}g}")
