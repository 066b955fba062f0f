"""The committed run files are the generator's, byte for byte."""

from __future__ import annotations

import dataclasses
from pathlib import Path

from bench.demo_lab.draw import draw_runs
from bench.demo_lab.run_files import ALL_RUNS, run_files

RUNS = Path(__file__).resolve().parents[2] / "recipes" / "runs"


def test_committed_files_are_the_generators() -> None:
    """Same names, same bytes."""
    committed = {path.name: path.read_bytes() for path in RUNS.iterdir()}
    assert committed == run_files()


def test_the_generator_repeats_itself() -> None:
    """Two calls in one process give the same bytes: no state is kept."""
    assert run_files() == run_files()


def test_another_seed_gives_other_runs() -> None:
    """The runs hang on the seed, not on the table of truths alone."""
    recipe = ALL_RUNS[0]
    assert draw_runs(recipe, "another") != draw_runs(recipe)


def test_more_sessions_leave_the_first_rows() -> None:
    """A longer campaign goes on where the shorter one ended."""
    for recipe in ALL_RUNS:
        rows = draw_runs(recipe)

        longer = draw_runs(dataclasses.replace(recipe, count=recipe.count + 1))
        assert longer[: len(rows)] == rows
