"""Whether a lab's own rate and the published one contradict each other."""

from __future__ import annotations

LogInterval = tuple[float | None, float | None]
"""Low and high end of ln(rate); None where that end is not known."""


def intervals_conflict(own: LogInterval, literature: LogInterval) -> bool:
    """
    True when each lies beyond the other's interval: they have no point in common.

    Touching ends agree. An end that is not known cannot contradict anything.
    """
    return _lies_below(own, literature) or _lies_below(literature, own)


def _lies_below(first: LogInterval, second: LogInterval) -> bool:
    high, low = first[1], second[0]
    return high is not None and low is not None and high < low
