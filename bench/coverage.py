"""
How often the next run falls in its 90 % interval, by run count: `python -m bench.coverage [--full]`.

With --full every bin of the first table holds at least 20,000 next runs (about ten minutes); without, about
2,500. The seed is fixed: the same table each time.
"""

from __future__ import annotations

import argparse
import sys
from pathlib import Path

import numpy as np

if __package__ in (None, ""):
    sys.path.insert(0, str(Path(__file__).resolve().parent.parent))

from bench.lab_simulation import MOST_RUNS, Counts, Errors, Scenario, Spreads, Tally, simulate

SEED = 20260101
FACTOR = 1.5
LARGE_BAND = (0.88, 0.92)
SMALL_BAND = (0.85, 0.95)


def large_labs() -> list[Scenario]:
    """Labs of 20 and more recipes: the target is 88 to 92 % in every bin."""
    grid = [
        Scenario(f"20 recipes, d0 {d0:g}, prior x{ratio:.2f}", 20, d0, ratio)
        for d0 in (4.0, 6.0, 10.0)
        for ratio in (1 / FACTOR, 1.0, FACTOR)
    ]
    return [*grid, Scenario("40 recipes, d0 6, prior x1.00", 40)]


def small_labs() -> list[Scenario]:
    """Labs of 4 to 19 recipes with a prior within a factor of 1.5: the target is 85 to 95 %."""
    return [
        Scenario(f"{n} recipes, d0 {d0:g}, prior x{ratio:.2f}", n, d0, ratio)
        for n in (4, 6, 9, 10, 14, 19)
        for d0 in (4.0, 10.0)
        for ratio in (1 / FACTOR, FACTOR)
    ]


def untargeted() -> list[Scenario]:
    """What the model does not promise; shown so that nobody has to guess."""
    few = [
        Scenario(f"mostly 2 to 4 runs, prior x{ratio:.2f}", prior_ratio=ratio, counts=Counts.FEW)
        for ratio in (1 / FACTOR, 1.0, FACTOR)
    ]
    alone = [
        Scenario(f"3 recipes: prior alone, x{ratio:.2f}", 3, prior_ratio=ratio)
        for ratio in (1 / FACTOR, 1.0, FACTOR)
    ]
    return [
        *few,
        *alone,
        Scenario("heavy tails (t3) of the runs", errors=Errors.HEAVY),
        Scenario("bimodal spreads", spreads=Spreads.BIMODAL),
        Scenario("no drift, trend looked for", series=True),
        Scenario("drift 0.3 s0 a run, ignored", drift=0.3),
        Scenario("drift 0.3 s0 a run, trend taken in", drift=0.3, series=True),
        Scenario("drift 1 s0 a run, trend taken in", drift=1.0, series=True),
        Scenario("measurement 0.2 to 1.5 s0, unequal", u_range=(0.2, 1.5)),
    ]


def labs_for(scenario: Scenario, per_bin: int) -> int:
    """Labs needed for about `per_bin` intervals in each bin of evenly spread run counts."""
    return int(1.1 * per_bin * (MOST_RUNS - 1) / scenario.recipes) + 1


def print_table(
    title: str, scenarios: list[Scenario], per_bin: int, draws: int, band: tuple[float, float] | None
) -> bool:
    """Print one table; returns whether every bin lies in the band (True without one)."""
    print(f"\n{title}")
    print(f"{'':38s}" + "".join(f"{k:>6d}" for k in range(1, MOST_RUNS + 1)) + "   least n   s")
    all_in = True
    for scenario in scenarios:
        tally = simulate(scenario, labs_for(scenario, per_bin), np.random.default_rng(SEED), draws)
        shares = [tally.coverage(k) if tally.tried[k] else float("nan") for k in range(1, MOST_RUNS + 1)]
        inside = band is None or all(band[0] <= share <= band[1] for share in shares)
        all_in &= inside
        mark = "" if inside else "  OUTSIDE"
        print(
            f"{scenario.name:38s}"
            + "".join(f"{100 * s:6.1f}" for s in shares)
            + f"{min(tally.tried.values()):10d}{mark}"
        )
    return all_in


def print_widths(tally: Tally) -> None:
    """Print the width relative to the plain t interval, by run count."""
    print("\nWidth over that of the plain t interval (20 recipes, d0 6, true prior)")
    ks = range(2, MOST_RUNS + 1)
    print(f"{'runs':12s}" + "".join(f"{k:>6d}" for k in ks))
    print(f"{'median':12s}" + "".join(f"{tally.relative_width(k):6.2f}" for k in ks))
    print(f"{'mean':12s}" + "".join(f"{tally.relative_mean_width(k):6.2f}" for k in ks))


def main() -> int:
    """Print all tables; 1 if a target is missed."""
    parser = argparse.ArgumentParser(description=__doc__)
    parser.add_argument("--full", action="store_true", help="at least 20,000 next runs a bin")
    full = parser.parse_args().full
    large, small = (20_000, 4_000) if full else (500, 250)
    draws = 1 if full else 5
    held = print_table("Share of next runs in the 90 % interval, %, by run count; target 88 to 92",
                       large_labs(), large, draws, LARGE_BAND)  # fmt: skip
    held &= print_table("Small labs; target 85 to 95", small_labs(), small, 5, SMALL_BAND)
    print_table("No target (20 recipes, d0 6)", untargeted(), small, 5, None)
    print_widths(simulate(Scenario("widths"), labs_for(Scenario(""), small), np.random.default_rng(SEED)))
    return 0 if held else 1


if __name__ == "__main__":
    raise SystemExit(main())
