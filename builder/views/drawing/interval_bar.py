"""An interval drawn as a bar on a scale, with the middle marked and, if there is one, a limit."""

from __future__ import annotations

from dataclasses import dataclass

from builder.views.drawing.shape import rounded

WIDTH = 160.0
HEIGHT = 18.0
_PAD = 4.0


@dataclass(frozen=True)
class IntervalBar:
    """Positions in SVG units; `limit` and `middle` may be absent, an open end runs to the edge."""

    width: float
    height: float
    start: float
    length: float
    middle: float | None
    limit: float | None
    is_open: bool
    title: str


def interval_bar(
    low: float | None, mid: float | None, high: float | None, *, limit: float | None, title: str
) -> IntervalBar | None:
    """
    Return the bar of an interval on a scale from zero, or None if neither end is known.

    An unknown upper end runs to the edge of the drawing, an unknown lower end starts at zero: both
    are `is_open`. `title` says in words what the bar shows.
    """
    if low is None and high is None:
        return None
    known = [value for value in (low, mid, high, limit) if value is not None]
    top = max(known) * (1.0 if high is not None else 1.6) or 1.0
    room = WIDTH - 2 * _PAD

    def at(value: float) -> float:
        return rounded(_PAD + room * min(max(value / top, 0.0), 1.0))

    start = at(low or 0.0)
    end = at(high) if high is not None else rounded(WIDTH)
    return IntervalBar(
        width=WIDTH,
        height=HEIGHT,
        start=start,
        length=rounded(max(end - start, 2.0)),
        middle=None if mid is None else at(mid),
        limit=None if limit is None else at(limit),
        is_open=low is None or high is None,
        title=title,
    )
