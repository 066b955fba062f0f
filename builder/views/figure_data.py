"""What the figure of a recipe shows: plain values in the units of its axes, without any drawing."""

from __future__ import annotations

import datetime
from dataclasses import dataclass


@dataclass(frozen=True)
class FigureRun:
    """
    The rate of one run, in the figure's unit, with its standard uncertainty (k = 1; None: not known).

    A limit is a run without a loss to be seen: `rate` is then the most it can be.
    """

    day: datetime.date
    rate: float
    std: float | None
    in_series: bool = True
    is_limit: bool = False


@dataclass(frozen=True)
class FigureEvent:
    """What started a new series, and when."""

    day: datetime.date
    text: str


@dataclass(frozen=True)
class FigureBand:
    """Where the next run falls, in the figure's unit; None where unknown. `label` says so in words."""

    low: float | None
    mid: float | None
    high: float | None
    label: str


@dataclass(frozen=True)
class FigureDepth:
    """A depth after a time, with its standard uncertainty (k = 1; None: not known)."""

    time: float
    depth: float
    std: float | None


@dataclass(frozen=True)
class FigureLine:
    """The fitted line through the depths: its slope, and the time at which its depth is zero."""

    slope: float
    induction: float


@dataclass(frozen=True)
class FigureData:
    """
    All that the figure of a recipe shows; needs at least one run or one depth.

    `unit` is that of all rates, `time_unit` and `depth_unit` those of the depths. `foot` stands small
    below: whose data, as of which day, and whether it is invented.
    """

    title: str
    subtitle: str
    foot: str
    unit: str
    runs: tuple[FigureRun, ...] = ()
    events: tuple[FigureEvent, ...] = ()
    band: FigureBand | None = None
    depths: tuple[FigureDepth, ...] = ()
    line: FigureLine | None = None
    time_unit: str = "s"
    depth_unit: str = "nm"
