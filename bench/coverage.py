"""
How often the next run falls in its 90 % interval, by number of runs: `python -m bench.coverage [--full]`.

With --full every bin of the first table holds at least 20,000 next runs and takes about twenty minutes;
without, about 2,500. The seed is fixed: the same table each time.
"""

from __future__ import annotations

import argparse
import math
from dataclasses import dataclass

import numpy as np

from bench.lab_simulation import MOST_RUNS, Counts, Errors, Scenario, Spreads, Tally, simulate

SEED = 20260101
FACTOR = 1.5
"""How far, as a factor, the lab's prior may be from the truth."""

LARGE_BAND = (0.88, 0.92)
SMALL_BAND = (0.85, 0.95)
HALF_WIDTH_AT_TWO = 0.5
RUN_COUNTS = range(1, MOST_RUNS + 1)


@dataclass(frozen=True)
class Row:
    """
    Measured coverage of one kind of lab.

    `shares`: hits over next runs by run count, 1 to 12. `least_tried`: next runs in the emptiest bin.
    `band`: what the shares have to keep; None where nothing is promised.
    """

    table: str
    name: str
    shares: tuple[float, ...]
    least_tried: int
    band: tuple[float, float] | None

    @property
    def held(self) -> bool:
        """Does every bin keep the band (True where nothing is promised)?"""
        return self.band is None or all(self.band[0] <= share <= self.band[1] for share in self.shares)


@dataclass(frozen=True)
class Table:
    """Kinds of labs under one promise, with the next runs wanted in each bin and drawn for each interval."""

    title: str
    scenarios: tuple[Scenario, ...]
    band: tuple[float, float] | None
    per_bin: int
    draws: int


def large_labs() -> tuple[Scenario, ...]:
    """Labs of 20 and more recipes: the promise is 88 to 92 % in every bin."""
    grid = [
        Scenario(f"20 recipes, d0 {d0:g}, prior x{ratio:.2f}", 20, d0, ratio)
        for d0 in (4.0, 6.0, 10.0)
        for ratio in (1 / FACTOR, 1.0, FACTOR)
    ]
    return (
        *grid,
        Scenario("20 recipes, all spread alike", 20, math.inf),
        Scenario("40 recipes, d0 6, prior x1.00", 40),
    )


def small_labs() -> tuple[Scenario, ...]:
    """Labs of 4 to 19 recipes with a prior within a factor of 1.5: the promise is 85 to 95 %."""
    return tuple(
        Scenario(f"{n} recipes, d0 {d0:g}, prior x{ratio:.2f}", n, d0, ratio)
        for n in (4, 6, 9, 10, 14, 19)
        for d0 in (4.0, 10.0)
        for ratio in (1 / FACTOR, FACTOR)
    )


def no_promise() -> tuple[Scenario, ...]:
    """What the model does not promise; measured so that nobody has to guess."""
    ratios = (1 / FACTOR, 1.0, FACTOR)
    few = [
        Scenario(f"mostly 2 to 4 runs, prior x{ratio:.2f}", prior_ratio=ratio, counts=Counts.FEW)
        for ratio in ratios
    ]
    alone = [Scenario(f"3 recipes: prior alone, x{ratio:.2f}", 3, prior_ratio=ratio) for ratio in ratios]
    return (
        *few,
        *alone,
        Scenario("heavy tails (t3) of the runs", errors=Errors.HEAVY),
        Scenario("heavy tail of the true spreads", spreads=Spreads.HEAVY),
        Scenario("bimodal true spreads", spreads=Spreads.BIMODAL),
        Scenario("no drift, trend looked for", series=True),
        Scenario("drift 0.3 s0 a run, ignored", drift=0.3),
        Scenario("drift 0.3 s0 a run, trend taken in", drift=0.3, series=True),
        Scenario("drift 1 s0 a run, ignored", drift=1.0),
        Scenario("drift 1 s0 a run, trend taken in", drift=1.0, series=True),
        Scenario("measurement 0.5 s0, equal", u_range=(0.5, 0.5)),
        Scenario("measurement 0.2 to 1.5 s0, unequal", u_range=(0.2, 1.5)),
    )


def tables(*, full: bool) -> tuple[Table, ...]:
    """The three tables, at the full size or a tenth of it."""
    large, small, draws = (20_000, 4_000, 1) if full else (500, 250, 5)
    return (
        Table("Labs of 20 and more recipes; promised 88 to 92 %", large_labs(), LARGE_BAND, large, draws),
        Table("Labs of 4 to 19 recipes; promised 85 to 95 %", small_labs(), SMALL_BAND, small, 5),
        Table("No promise (20 recipes, d0 6)", no_promise(), None, small, 5),
    )


def labs_for(scenario: Scenario, per_bin: int) -> int:
    """Labs needed for about `per_bin` intervals in each bin of evenly spread run counts."""
    return int(1.1 * per_bin * (MOST_RUNS - 1) / scenario.recipes) + 1


def rows(table: Table) -> list[Row]:
    """Measure one table."""
    return [_row(table, scenario) for scenario in table.scenarios]


def widths(per_bin: int) -> Tally:
    """Intervals of labs with 20 recipes, d0 6 and a true prior, to compare with the plain t interval."""
    scenario = Scenario("widths")
    return simulate(scenario, labs_for(scenario, per_bin), np.random.default_rng(SEED))


def _row(table: Table, scenario: Scenario) -> Row:
    rng = np.random.default_rng(SEED)
    tally = simulate(scenario, labs_for(scenario, table.per_bin), rng, table.draws)
    shares = tuple(tally.coverage(k) if tally.tried[k] else math.nan for k in RUN_COUNTS)
    return Row(table.title, scenario.name, shares, min(tally.tried.values()), table.band)


def print_rows(measured: list[Row]) -> None:
    """Print the measured rows of one table, in percent."""
    print(f"\nShare of next runs in the 90 % interval, %, by number of runs. {measured[0].table}")
    print(f"{'':38s}" + "".join(f"{k:>6d}" for k in RUN_COUNTS) + "   least n")
    for row in measured:
        shares = "".join(f"{100 * share:6.1f}" for share in row.shares)
        print(f"{row.name:38s}{shares}{row.least_tried:10d}{'' if row.held else '  OUTSIDE'}", flush=True)


def print_widths(tally: Tally) -> None:
    """Print the width relative to the plain t interval, by run count."""
    print("\nWidth over that of the plain t interval (20 recipes, d0 6, true prior)")
    ks = RUN_COUNTS[1:]
    print(f"{'runs':12s}" + "".join(f"{k:>6d}" for k in ks))
    print(f"{'median':12s}" + "".join(f"{tally.relative_width(k):6.2f}" for k in ks))
    print(f"{'mean':12s}" + "".join(f"{tally.relative_mean_width(k):6.2f}" for k in ks))


def report(*, full: bool) -> bool:
    """Measure and print everything; True when every promise is kept."""
    kept = True
    for table in tables(full=full):
        measured = rows(table)
        print_rows(measured)
        kept &= all(row.held for row in measured)
    tally = widths(4_000 if full else 500)
    print_widths(tally)
    return kept and tally.relative_width(2) <= HALF_WIDTH_AT_TWO


def main() -> int:
    """Print all tables; 1 if a promise is missed."""
    parser = argparse.ArgumentParser(description=__doc__)
    parser.add_argument("--full", action="store_true", help="at least 20,000 next runs a bin")
    return 0 if report(full=parser.parse_args().full) else 1


if __name__ == "__main__":
    raise SystemExit(main())
