"""The lab's run-to-run spread fitted anew from its runs, and how far the stored fit has fallen behind."""

from __future__ import annotations

import datetime
import math
from collections.abc import Iterator
from dataclasses import dataclass

from builder.engine import Spread, fit_spread, leave_one_out, sample_variance, two_sided_t
from builder.findings.own_rates import own_rate
from builder.findings.spread_groups import GROUPS, prior_of, spread_group
from builder.problems import Problem, Severity
from builder.records.etches import Etch
from builder.records.lab import LabRecords
from builder.records.settings import FittedSpread
from builder.records.terms import Status

LEAVE_OUT_BELOW = 10
"""In a group of fewer recipes each takes the fit without itself."""
_MOVED = 0.05
"""A refit that would move an interval by more than this share is worth a notice."""
_LEAST_RUNS = 2
_COMPARED_RUNS = (1, 2, 5, 12)
"""Numbers of runs at which stored and new fit are compared."""


@dataclass(frozen=True, slots=True)
class Scatter:
    """The variance of ln(rate) of one recipe's target in its current series, with its degrees of freedom."""

    recipe: str
    variance: float
    df: float
    runs: int


@dataclass(frozen=True, slots=True)
class GroupFit:
    """The fit of one group; `without` is by recipe, and empty in a large group."""

    group: str
    spread: Spread
    runs: int
    without: tuple[tuple[str, Spread], ...]


def fit_groups(records: LabRecords) -> tuple[GroupFit, ...]:
    """Return the fit of every group, in the order of the settings."""
    return tuple(_fit(records, group) for group in GROUPS)


def scatters(records: LabRecords, group: str) -> tuple[Scatter, ...]:
    """Return the scatter of each recipe of a group that has at least two measured runs and is not retired."""
    found = (
        _scatter(records, etch)
        for _, etch in sorted(records.etches.items())
        if spread_group(etch) == group and etch.status is not Status.RETIRED
    )
    return tuple(scatter for scatter in found if scatter is not None)


def spread_yaml(fits: tuple[GroupFit, ...], day: datetime.date, *, invented: bool) -> str:
    """Return the text of recipes/spread.yaml."""
    lines = ["# yaml-language-server: $schema=../schemas/spread.schema.json"]
    if invented:
        lines.append("# Invented for the demonstration lab; not measured anywhere.")
    lines += [f"as_of: {day.isoformat()}", "methods:"]
    for fit in fits:
        lines += [f"  {fit.group}:", *(f"    {line}" for line in _group_lines(fit))]
    return "\n".join(lines) + "\n"


def spread_notices(records: LabRecords) -> Iterator[Problem]:
    """Yield a notice for each group whose stored fit would move an interval by more than 5 % if made anew."""
    if records.spread is None:
        return
    for fit in fit_groups(records):
        stored: FittedSpread | None = getattr(records.spread.methods, fit.group)
        moved = _moved(stored, fit.spread, records.settings.confidence)
        if moved > _MOVED:
            message = f"a new fit of {fit.group} would move intervals by up to {moved:.0%}"
            yield Problem(
                records.spread.file,
                0,
                0,
                f"/methods/{fit.group}",
                Severity.NOTICE,
                "spread-behind",
                message,
                "run etchwright spread",
            )


def _fit(records: LabRecords, group: str) -> GroupFit:
    prior = prior_of(records, group)
    found = scatters(records, group)
    variances, dfs = [one.variance for one in found], [one.df for one in found]
    spread = fit_spread(variances, dfs, prior)
    without: tuple[tuple[str, Spread], ...] = ()
    if not spread.from_prior and len(found) < LEAVE_OUT_BELOW:
        left_out = leave_one_out(variances, dfs, prior)
        without = tuple((one.recipe, fit) for one, fit in zip(found, left_out, strict=True))
    return GroupFit(group, spread, sum(one.runs for one in found), without)


def _scatter(records: LabRecords, etch: Etch) -> Scatter | None:
    """The first target that has measured runs; under a trend the scatter about its line."""
    for film in etch.targets:
        own = own_rate(records, etch, film)
        if own is None:
            continue
        logs = [run.rate.log_rate for run in own.used if run.rate.log_rate is not None]
        if len(logs) < _LEAST_RUNS:
            return None
        if own.trend is not None and own.trend.significant:
            return Scatter(etch.id, own.trend.s_residual**2, len(logs) - 2, len(logs))
        variance = sample_variance(logs)
        assert variance is not None
        return Scatter(etch.id, variance, len(logs) - 1, len(logs))
    return None


def _group_lines(fit: GroupFit) -> Iterator[str]:
    yield f"s0: {fit.spread.s0:.4f}"
    yield f"d0: {fit.spread.d0:.2f}"
    yield f"recipes: {fit.spread.recipes}"
    yield f"runs: {fit.runs}"
    yield f"from_prior: {str(fit.spread.from_prior).lower()}"
    if fit.without:
        yield "without:"
        for recipe, spread in fit.without:
            yield f"  - {{recipe: {recipe}, s0: {spread.s0:.4f}, d0: {spread.d0:.2f}}}"


def _moved(stored: FittedSpread | None, new: Spread, confidence: float) -> float:
    """Greatest relative change of an interval's half-width, for recipes that scatter as the group does."""
    if stored is None:
        return 0.0 if new.from_prior else math.inf
    ratios = (
        _half_width(new.s0, new.d0, runs, confidence) / _half_width(stored.s0, stored.d0, runs, confidence)
        for runs in _COMPARED_RUNS
    )
    return max(abs(ratio - 1) for ratio in ratios)


def _half_width(s0: float, d0: float, runs: int, confidence: float) -> float:
    return two_sided_t(confidence, d0 + runs - 1) * s0 * math.sqrt(1 + 1 / runs)
