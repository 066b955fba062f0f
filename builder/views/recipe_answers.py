"""The four answers of a recipe page: rate, time for a depth, mask needed, sideways."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass

from builder.engine import (
    Mode,
    Rank,
    RateBand,
    Span,
    end_mode,
    loss,
    open_by_timer,
)
from builder.engine.plan_rules import ISOTROPIC_UNDERCUT
from builder.findings.computed import Computed
from builder.findings.plan.judging import scaled, without_offset
from builder.findings.recipe_times import TargetTiming, target_timings
from builder.records.lab import LabRecords
from builder.records.terms import Method
from builder.views.number_text import (
    NO_BREAK,
    NumberText,
    Rounding,
    length_text,
    number_text,
    rate_text,
    share_text,
    time_text,
)
from builder.views.plan_words import RANK_WORDS
from builder.views.recipe_masks import MaskAnswer, mask_answers, no_mask_words
from builder.views.recipe_standing import runs_text
from builder.views.references import FilmRef, film_ref

MODE_WORDS = {
    Mode.RUN_TO_TIME: "Run to time.",
    Mode.LOOK_AND_FINISH: "Look and finish: run to the first look, rinse, look or measure, finish.",
    None: "",
}


@dataclass(frozen=True)
class RateAnswer:
    """The rate of one film in the recipe; `rests_on` says on how many runs, or whose numbers."""

    film: FilmRef
    rate: NumberText
    rank: str
    is_own: bool
    rests_on: str


@dataclass(frozen=True)
class DepthRow:
    """The two times for one stated depth."""

    depth: str
    first_look: str
    latest_stop: str


@dataclass(frozen=True)
class TimeAnswer:
    """Times for the usual depth, and for three stated depths; `why` names what was put in."""

    usual: DepthRow
    rows: tuple[DepthRow, ...]
    mode: str
    why: str


@dataclass(frozen=True)
class SidewaysAnswer:
    """The way of one mask edge for the usual depth, and the ratio to the depth."""

    way: NumberText
    ratio: str
    basis: str


@dataclass(frozen=True)
class RecipeAnswers:
    """The four answers for the first target, and the rates of the other targets."""

    depth: str
    rate: RateAnswer
    others: tuple[tuple[RateAnswer, DepthRow], ...]
    time: TimeAnswer
    masks: tuple[MaskAnswer, ...]
    no_mask: str
    sideways: SidewaysAnswer
    data: dict[str, object]


def recipe_answers(records: LabRecords, computed: Computed, etch_id: str) -> RecipeAnswers:
    """Return the four answers of a recipe."""
    timings = target_timings(computed, etch_id)
    first = timings[0]
    masks = tuple(mask_answers(records, computed, etch_id, first))
    return RecipeAnswers(
        depth=depth_text(first.usual_nm),
        rate=_rate(records, computed, etch_id, first),
        others=tuple(
            (_rate(records, computed, etch_id, timing), _depth_row(timing, timing.usual_nm))
            for timing in timings[1:]
        ),
        time=_time(computed, etch_id, first),
        masks=masks,
        no_mask="" if masks else no_mask_words(records, etch_id),
        sideways=_sideways(computed, etch_id, first),
        data=time_data(records, timings),
    )


def depth_text(depth_nm: float) -> str:
    """Return a depth that a page asks for."""
    number = length_text(None, depth_nm, None)
    value = number.value.rstrip("0").rstrip(".") if "." in number.value else number.value
    return f"{value}{NO_BREAK}{number.unit}"


def band_text(band: RateBand | None) -> NumberText:
    """Return a rate with its interval; a low end of 0 is an end nobody knows."""
    if band is None:
        return rate_text(None, None, None)
    return rate_text(band.low if band.low > 0 else None, band.mid, band.high)


def time_data(records: LabRecords, timings: Iterable[TargetTiming]) -> dict[str, object]:
    """Return what the page's script needs to answer for a typed depth: nm, s, fractions."""
    targets = [
        {
            "film": timing.film,
            "name": records.films[timing.film].name,
            "low": timing.band.low,
            "high": timing.band.high,
            "tolerance": timing.tolerance,
            "phi": timing.phi,
            "offset_s": timing.offset_s,
            "overetch": timing.overetch,
            "usual_nm": timing.usual_nm,
        }
        for timing in timings
        if timing.band is not None and timing.band.low > 0
    ]
    return {"format": 1, "targets": targets}


def _rate(records: LabRecords, computed: Computed, etch_id: str, timing: TargetTiming) -> RateAnswer:
    own = computed.own[etch_id].get(timing.film)
    count = 0 if own is None else len(own.used)
    is_own = timing.known.rank is Rank.OWN
    return RateAnswer(
        film=film_ref(records, timing.film),
        rate=band_text(timing.band),
        rank=RANK_WORDS[timing.known.rank],
        is_own=is_own,
        rests_on=runs_text(count) if is_own else "published numbers, widened",
    )


def _time(computed: Computed, etch_id: str, timing: TargetTiming) -> TimeAnswer:
    plan = timing.times(timing.usual_nm)
    recipe = computed.facts.etches[etch_id]
    return TimeAnswer(
        usual=_depth_row(timing, timing.usual_nm),
        rows=tuple(_depth_row(timing, depth) for depth in timing.stated_depths_nm),
        mode=MODE_WORDS[end_mode(plan, holds_by_timer=False, endpoint=recipe.endpoint)],
        why=_why(timing),
    )


def _depth_row(timing: TargetTiming, depth_nm: float) -> DepthRow:
    plan = timing.times(depth_nm)
    return DepthRow(
        depth=depth_text(depth_nm),
        first_look=time_text(plan.first_look_s, Rounding.DOWN),
        latest_stop=time_text(plan.latest_stop_s, Rounding.UP),
    )


def _why(timing: TargetTiming) -> str:
    parts = [
        f"thickness within {share_text(timing.tolerance)}",
        f"unevenness {share_text(timing.phi)}",
    ]
    if timing.offset_s:
        parts.append(f"induction and transfer {_seconds(timing.offset_s)}")
    if timing.overetch:
        parts.append(f"overetch {share_text(timing.overetch)}")
    return f"With {', '.join(parts)}."


def _seconds(time_s: float) -> str:
    sign = "\u2212" if time_s < 0 else ""
    return f"{sign}{time_text(abs(time_s))}"


def _sideways(computed: Computed, etch_id: str, timing: TargetTiming) -> SidewaysAnswer:
    recipe = computed.facts.etches[etch_id]
    if recipe.method is Method.LIFT_OFF:
        return SidewaysAnswer(length_text(None, None, None), "", "Lift-off has no undercut of its own.")
    if recipe.ratio is not None:
        ratio = Span(recipe.ratio.low, recipe.ratio.mid, recipe.ratio.high)
        shown = number_text(ratio.low, ratio.mid, ratio.high, "")
        interval = f" ({shown.interval})" if shown.interval else ""
        words = f"{shown.value} × the depth{interval}"
        return SidewaysAnswer(_way(ratio, timing), words, recipe.ratio.basis)
    if recipe.isotropic:
        ratio = Span(ISOTROPIC_UNDERCUT, None, None)
        return SidewaysAnswer(
            _way(ratio, timing),
            f"at least {ISOTROPIC_UNDERCUT} × the depth",
            "Etches alike in all directions, and no ratio is on record (common practice, no source).",
        )
    return SidewaysAnswer(length_text(None, None, None), "", "No undercut is on record.")


def _way(ratio: Span, timing: TargetTiming) -> NumberText:
    """The way of one edge up to the latest stop."""
    exposure = without_offset(open_by_timer(timing.times(timing.usual_nm)), timing.offset_s)
    way = loss(scaled(timing.band, ratio), exposure, timing.phi)
    return length_text(way.low, way.mid, way.high)
