"""Which recipes share a run-to-run spread, and the spread in force for each."""

from __future__ import annotations

from builder.engine import Spread, SpreadPrior
from builder.records.etches import Etch
from builder.records.lab import LabRecords
from builder.records.settings import FittedSpread, PriorSpread
from builder.records.terms import Bath, Method

GROUPS = ("wet_thermostated", "wet_open", "plasma", "cyclic", "vapour")
"""Names of the groups, as in the lab's settings and in the stored fit."""


def spread_group(etch: Etch) -> str:
    """Return the group whose recipes vary alike from run to run."""
    if etch.method in (Method.WET, Method.LIFT_OFF):
        return "wet_thermostated" if etch.bath is Bath.THERMOSTATED else "wet_open"
    return str(etch.method)


def prior_of(records: LabRecords, group: str) -> SpreadPrior:
    """Return the lab's prior spread of a group."""
    prior: PriorSpread = getattr(records.settings.defaults.spread, group)
    return SpreadPrior(prior.s0, prior.d0)


def spread_in_force(records: LabRecords, group: str, recipe: str) -> Spread:
    """
    Return the stored spread of a group, or the prior where no fit is stored.

    In a small group the stored fit without the recipe itself, so that its scatter does not count twice.
    """
    stored: FittedSpread | None = None
    if records.spread is not None:
        stored = getattr(records.spread.methods, group)
    if stored is None:
        prior = prior_of(records, group)
        return Spread(prior.s0, prior.d0, recipes=0, from_prior=True)
    for left_out in stored.without:
        if left_out.recipe == recipe:
            return Spread(left_out.s0, left_out.d0, stored.recipes - 1, stored.from_prior)
    return Spread(stored.s0, stored.d0, stored.recipes, stored.from_prior)
