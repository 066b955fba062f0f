"""The figures of the method notes, each drawn from the engine's own numbers for a made-up example."""

from __future__ import annotations

import math
from collections.abc import Callable, Mapping, Sequence
from types import MappingProxyType
from typing import TYPE_CHECKING

from builder.engine import (
    Cut,
    PublishedKind,
    PublishedValue,
    RateBand,
    Schedule,
    Span,
    envelope,
    fit_line,
    loss,
    normal,
    prediction_factor,
    run_limit,
    schedule,
    two_sided_t,
    under_by_look,
    under_by_timer,
)
from builder.pages.figure_style import ACCENT, INK, LOST, QUIET, name_axes

if TYPE_CHECKING:
    from matplotlib.axes import Axes

Draw = Callable[["Axes"], None]

_CONFIDENCE = 0.90
_MINUTE = 60.0


def _depth_line(axes: Axes) -> None:
    times, depths = [30.0, 60.0, 120.0, 240.0], [58.0, 108.0, 207.0, 408.0]
    fit = fit_line(times, depths, [3.0] * len(times))
    start = -fit.intercept_nm / fit.slope_nm_per_s
    forced = sum(t * d for t, d in zip(times, depths, strict=True)) / sum(t * t for t in times)
    axes.plot(
        [start, 260.0], [0.0, fit.slope_nm_per_s * (260.0 - start)], color=ACCENT, lw=1.5, label="fitted line"
    )
    axes.plot(
        [0.0, 260.0], [0.0, forced * 260.0], color=LOST, lw=1.2, ls=(0, (4, 3)), label="forced through zero"
    )
    axes.errorbar(times, depths, yerr=3.0, fmt="o", color=INK, ms=4.5)
    axes.axhline(0.0, color=QUIET, lw=0.8)
    axes.annotate(
        "induction time", (start, 0.0), (4, -13), textcoords="offset points", color=ACCENT, fontsize=8.0
    )
    axes.set_xlim(-12.0, 130.0)
    axes.set_ylim(-32.0, 230.0)
    axes.legend(loc="upper left", frameon=False, fontsize=8.0)
    name_axes(axes, "time, s", "depth, nm")


def _next_run(axes: Axes) -> None:
    counts = list(range(2, 13))
    d0 = 4.0
    mean = [two_sided_t(_CONFIDENCE, n - 1) / math.sqrt(n) for n in counts]
    plain = [prediction_factor(n, _CONFIDENCE) for n in counts]
    moderated = [two_sided_t(_CONFIDENCE, d0 + n - 1) * math.sqrt(1 + 1 / n) for n in counts]
    axes.plot(counts, plain, "o-", color=LOST, ms=4.0, lw=1.2, label="next run, from its own runs alone")
    axes.plot(
        counts, moderated, "o-", color=ACCENT, ms=4.0, lw=1.5, label="next run, spread borrowed from the lab"
    )
    axes.plot(counts, mean, "o:", color=QUIET, ms=3.5, lw=1.2, label="the mean (not what you need)")
    axes.set_ylim(0.0, 8.0)
    axes.legend(loc="upper right", frameon=False, fontsize=8.0)
    name_axes(axes, "number of runs", "half-width, in standard deviations of the runs")


def _example() -> tuple[RateBand, Cut, Schedule]:
    band = RateBand(low=80.0 / _MINUTE, mid=100.0 / _MINUTE, high=125.0 / _MINUTE)
    cut = Cut(500.0, 500.0, 0.02, 0.05, 0.0, 0.0, 15.0, True)
    return band, cut, schedule(band, cut)


def _clearing(axes: Axes) -> None:
    _, cut, plan = _example()
    ends = (
        (plan.clear_first_s, 1 - cut.tolerance, LOST, "fast end, thinnest place"),
        (plan.nominal_s, 1.0, INK, "middle"),
        (plan.clear_last_s, 1 + cut.tolerance, ACCENT, "slow end, thickest place"),
    )
    for time_s, part, colour, name in ends:
        assert time_s is not None
        axes.plot([0.0, time_s / _MINUTE], [part * cut.depth_nm, 0.0], color=colour, lw=1.4, label=name)
    for time_s, name, height in (
        (plan.first_look_s, "first look", 0.62),
        (plan.clear_first_s, "may clear", 0.46),
        (plan.latest_stop_s, "latest stop", 0.3),
    ):
        assert time_s is not None
        _mark_time(axes, time_s / _MINUTE, name, height)
    axes.set_xlim(0.0, 8.3)
    axes.set_ylim(0.0, 540.0)
    axes.legend(loc="upper right", frameon=False, fontsize=8.0)
    name_axes(axes, "time, min", "film left, nm")


def _mark_time(axes: Axes, time_min: float, name: str, height: float) -> None:
    axes.axvline(time_min, ymax=height, color=QUIET, lw=0.8, ls=(0, (2, 3)))
    axes.text(
        time_min,
        height,
        f" {name}",
        transform=axes.get_xaxis_transform(),
        color=QUIET,
        fontsize=8.0,
        va="top",
    )


def _by_timer_by_look(axes: Axes) -> None:
    band, cut, plan = _example()
    under = RateBand(low=4.0 / _MINUTE, mid=5.0 / _MINUTE, high=6.25 / _MINUTE)
    rows = [
        ("stopped by the timer", loss(under, under_by_timer(plan), cut.nonuniformity)),
        ("stopped by looking", loss(under, under_by_look(band, plan, cut), cut.nonuniformity)),
    ]
    _spans(axes, rows, (ACCENT, ACCENT))
    axes.set_xlim(left=0.0)
    name_axes(axes, "loss of the film below, nm", "")


def _widening(axes: Axes) -> None:
    rows = []
    for name, sigma in (
        ("wet, well-defined film: 0.25", 0.25),
        ("wet, other film: 0.6", 0.6),
        ("plasma, cyclic: 0.7", 0.7),
        ("vapour: 0.9", 0.9),
    ):
        value = PublishedValue(PublishedKind.VALUE, 100.0, 100.0, sigma)
        found = envelope([value], normal((1 + _CONFIDENCE) / 2))
        assert found is not None
        rows.append((name, Span(found.band.low, found.band.mid, found.band.high)))
    _spans(axes, rows, (ACCENT,) * len(rows))
    axes.set_xscale("log")
    axes.set_xticks([20, 50, 100, 200, 500], ["20", "50", "100", "200", "500"])
    axes.minorticks_off()
    name_axes(axes, "rate, nm/min, where 100 was published", "")


def _words(axes: Axes) -> None:
    rows = [
        ("holds", Span(2.0, 3.5, 6.0)),
        ("borderline", Span(6.0, 9.0, 14.0)),
        ("lost", Span(13.0, 18.0, 24.0)),
        ("unmeasured", Span(None, None, None)),
    ]
    _spans(axes, rows, (ACCENT, ACCENT, LOST, QUIET))
    axes.axvline(10.0, color=INK, lw=1.4, ls=(0, (4, 3)))
    axes.text(10.0, 1.0, " allowed loss", transform=axes.get_xaxis_transform(), fontsize=8.0, va="bottom")
    axes.text(10.8, -3.0, "nobody measured it", color=QUIET, fontsize=8.0, va="center")
    axes.set_xlim(0.0, 26.0)
    name_axes(axes, "loss, nm", "")


def _limit(axes: Axes) -> None:
    minutes = [2.0 * 1.1**step for step in range(40)]
    for u_nm, colour in ((2.0, LOST), (0.5, ACCENT)):
        limits = [run_limit(0.0, u_nm, minute * _MINUTE) * _MINUTE for minute in minutes]
        axes.plot(minutes, limits, color=colour, lw=1.5, label=f"loss known to {u_nm:g} nm (k = 1)")
    axes.set_xlim(0.0, 60.0)
    axes.set_ylim(0.0, 1.2)
    axes.legend(loc="upper right", frameon=False, fontsize=8.0)
    name_axes(axes, "time tested, min", "most the rate can be, nm/min")


def _spans(axes: Axes, rows: Sequence[tuple[str, Span]], colours: Sequence[str]) -> None:
    """Intervals one below the other, the first on top, the middle marked."""
    for place, ((_, span), colour) in enumerate(zip(rows, colours, strict=True)):
        y = -float(place)
        if span.low is not None and span.high is not None:
            axes.plot([span.low, span.high], [y, y], color=colour, lw=5.0, alpha=0.45, solid_capstyle="butt")
        if span.mid is not None:
            axes.plot([span.mid], [y], "|", color=colour, ms=12.0, mew=1.8)
    axes.set_yticks([-float(place) for place in range(len(rows))], [name for name, _ in rows])
    axes.set_ylim(-len(rows) + 0.4, 0.6)
    axes.tick_params(axis="y", length=0.0, labelcolor=INK)
    axes.grid(visible=False, axis="y")
    axes.grid(visible=True, axis="x")
    axes.spines["left"].set_visible(False)


DRAWINGS: Mapping[str, Draw] = MappingProxyType(
    {
        "depth-line": _depth_line,
        "next-run": _next_run,
        "clearing": _clearing,
        "by-timer-by-look": _by_timer_by_look,
        "widening": _widening,
        "words": _words,
        "limit": _limit,
    }
)
"""The figures by the name that a page calls them by."""
