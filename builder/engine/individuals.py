"""Control charts of single runs: has the tool moved?"""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np

from builder.engine.constants import CHART_SIGMAS, MOVING_RANGE_D2, MOVING_RANGE_D4
from builder.engine.errors import DomainError


@dataclass(frozen=True, slots=True)
class IndividualsChart:
    """Centre and limits of single values, the mean moving range and its upper limit; unit of the values."""

    centre: float
    lower: float
    upper: float
    mean_moving_range: float
    moving_range_upper: float


@dataclass(frozen=True, slots=True)
class EwmaPoint:
    """An exponentially weighted mean after one more value, and its limits there; unit of the values."""

    value: float
    lower: float
    upper: float

    @property
    def outside(self) -> bool:
        """True when the mean lies beyond its limits."""
        return not self.lower <= self.value <= self.upper


def individuals_chart(values: Sequence[float]) -> IndividualsChart:
    """
    Limits at three standard deviations, the deviation taken from successive differences.

    Raises
    ------
    DomainError
        Fewer than two values.

    Source
    ------
    NIST/SEMATECH e-Handbook 6.3.2.2. Cases: tests/cases/individuals.json.
    """
    if len(values) < 2:
        raise DomainError("values", len(values), "at least 2 values")
    x = np.asarray(values, dtype=np.float64)
    centre, moving = float(x.mean()), float(np.abs(np.diff(x)).mean())
    half = CHART_SIGMAS * moving / MOVING_RANGE_D2
    return IndividualsChart(centre, centre - half, centre + half, moving, MOVING_RANGE_D4 * moving)


def ewma_chart(
    values: Sequence[float], target: float, sigma: float, weight: float, width: float
) -> tuple[EwmaPoint, ...]:
    """
    Exponentially weighted mean after each value, with limits that widen to their steady state.

    `weight` of the newest value, 0 < weight <= 1; `width` of the limits in standard deviations, > 0;
    `sigma` > 0 of a single value.

    Raises
    ------
    DomainError
        weight, width or sigma out of range.

    Source
    ------
    NIST/SEMATECH e-Handbook 6.3.2.4; tests compare with the weighted sum written out.
    """
    if not 0 < weight <= 1:
        raise DomainError("weight", weight, "0 < weight <= 1")
    if not (sigma > 0 and width > 0):
        raise DomainError("sigma, width", (sigma, width), "> 0")
    points: list[EwmaPoint] = []
    mean = target
    for count, value in enumerate(values, start=1):
        mean = weight * value + (1 - weight) * mean
        part = weight / (2 - weight) * (1 - (1 - weight) ** (2 * count))
        half = width * sigma * math.sqrt(part)
        points.append(EwmaPoint(mean, target - half, target + half))
    return tuple(points)
