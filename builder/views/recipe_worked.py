"""A recipe's numbers worked out by hand, from one run to the timer, so that a pencil gets the same."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass

from builder.findings.computed import Computed
from builder.findings.own_rates import OwnRate
from builder.findings.recipe_times import TargetTiming
from builder.views.number_text import Rounding, plain_number, share_text, time_text
from builder.views.pencil import Pencil, Value
from builder.views.recipe_answers import depth_text
from builder.views.recipe_numbers import log_of
from builder.views.worked_interval import Ends, WorkedStep, interval_steps, shown

_FEWEST, _MOST = 4, 9
_SECONDS_A_MINUTE = 60.0
_CHECKED_DIGITS = 3
_RECORDED_DIGITS = 6


@dataclass(frozen=True)
class Worked:
    """The steps, and the logarithms of the runs in use that they start from."""

    runs: tuple[tuple[str, str], ...]
    steps: tuple[WorkedStep, ...]


def worked_numbers(computed: Computed, own: OwnRate | None, timing: TargetTiming) -> Worked | None:
    """
    Return the calculation of a target's times, step by step; None where its rate rests on no own run.

    Every step takes the numbers as printed. They are printed to the fewest digits for which the last
    results agree with those of the program.
    """
    if own is None or own.next_run is None or timing.band is None or timing.band.low <= 0:
        return None
    for digits in range(_FEWEST, _MOST):
        pencil = Pencil(digits)
        interval = interval_steps(pencil, computed, own)
        times = list(_time_steps(pencil, timing, interval.ends))
        if _agree(own, timing, interval.ends, times):
            break
    return Worked(_runs(pencil, own), (*interval.steps, *(step for step, _ in times)))


def _runs(pencil: Pencil, own: OwnRate) -> tuple[tuple[str, str], ...]:
    found = [(f"{run.rows[0].wafer}, {run.date.isoformat()}", log_of(run)) for run in own.used]
    return tuple((name, pencil.log(log).text) for name, log in found if log is not None)


def _agree(own: OwnRate, timing: TargetTiming, ends: Ends, times: list[tuple[WorkedStep, Value]]) -> bool:
    """Do the pencil's ends and times, shortened as the page shows them, equal the program's?"""
    assert own.next_run is not None
    plan = timing.times(timing.usual_nm)
    exact = (own.next_run.lo_nm_per_s, own.next_run.mid_nm_per_s, own.next_run.hi_nm_per_s)
    rates = zip((ends.low, ends.mid, ends.high), exact, strict=True)
    clocks = zip(times, ((plan.first_look_s, Rounding.DOWN), (plan.latest_stop_s, Rounding.UP)), strict=True)
    return all(
        value is None
        or plain_number(value.number, _CHECKED_DIGITS)
        == plain_number((rate or 0.0) * _SECONDS_A_MINUTE, _CHECKED_DIGITS)
        for value, rate in rates
    ) and all(
        time_text(max(0.0, value.number), way) == time_text(time, way) for (_, value), (time, way) in clocks
    )


def _time_steps(pencil: Pencil, timing: TargetTiming, ends: Ends) -> Iterator[tuple[WorkedStep, Value]]:
    depth, phi = pencil.given(timing.usual_nm), pencil.given(timing.phi)
    delta, offset = pencil.given(timing.tolerance), _offset(pencil, timing.offset_s)
    words = f"{depth_text(timing.usual_nm)} of film"
    thin = f"{depth.text} × (1 − {delta.text}) ÷ ({ends.high.text} × (1 + {phi.text})) × 60"
    thin += _plus(timing, offset)
    first = pencil.work(f"0.8 × ({thin})" if timing.offset_s else f"0.8 × {thin}")
    yield shown(
        f"First look for {words}: 0.8 of the time in which the thinnest place "
        f"({share_text(timing.tolerance)} thinner) is gone where the etch is fastest "
        f"({share_text(timing.phi)} faster than the high end){_offset_words(timing, offset)}. The timer "
        f"shows {time_text(max(0.0, first.number), Rounding.DOWN)}.",
        first, "s",
    ), first  # fmt: skip
    thick = f"{depth.text} × (1 + {delta.text}) ÷ ({ends.low.text} × (1 − {phi.text})) × 60"
    over = f" × (1 + {pencil.given(timing.overetch).text})" if timing.overetch else ""
    last = pencil.work(f"{thick}{over}{_plus(timing, offset)}")
    extra = f", and the overetch of {share_text(timing.overetch)}" if timing.overetch else ""
    yield shown(
        f"Latest stop for {words}: the thickest place where the etch is slowest{extra}. The timer shows "
        f"{time_text(max(0.0, last.number), Rounding.UP)}.",
        last, "s",
    ), last  # fmt: skip


def _offset(pencil: Pencil, offset_s: float) -> Value:
    """A recorded offset as it stands; one that was fitted has endless digits, and is shortened."""
    given = pencil.given(offset_s)
    return given if len(given.text) <= _RECORDED_DIGITS else pencil.quoted(offset_s)


def _offset_words(timing: TargetTiming, offset: Value) -> str:
    return f", with {offset.text} s for induction and transfer" if timing.offset_s else ""


def _plus(timing: TargetTiming, offset: Value) -> str:
    if not timing.offset_s:
        return ""
    return f" − {offset.text.lstrip(chr(0x2212))}" if timing.offset_s < 0 else f" + {offset.text}"
