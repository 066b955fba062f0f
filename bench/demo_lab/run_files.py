"""Run files of the demonstration lab as bytes, by file name."""

from __future__ import annotations

import csv
import dataclasses
import io

from bench.demo_lab.alkali_and_acid_runs import ALKALI_AND_ACID_RUNS
from bench.demo_lab.chlorine_and_oxygen_runs import CHLORINE_AND_OXYGEN_RUNS
from bench.demo_lab.deep_silicon_and_lift_off_runs import DEEP_SILICON_AND_LIFT_OFF_RUNS
from bench.demo_lab.draw import RunRow, draw_runs
from bench.demo_lab.fluorine_runs import FLUORINE_RUNS
from bench.demo_lab.metal_bath_runs import METAL_BATH_RUNS
from bench.demo_lab.oxide_bath_runs import OXIDE_BATH_RUNS
from bench.demo_lab.plan import RecipeRuns
from bench.demo_lab.vapour_runs import VAPOUR_RUNS

MARK = "# Invented for the demonstration lab; not measured anywhere.\n"

ALL_RUNS: tuple[RecipeRuns, ...] = (
    *OXIDE_BATH_RUNS,
    *ALKALI_AND_ACID_RUNS,
    *METAL_BATH_RUNS,
    *VAPOUR_RUNS,
    *FLUORINE_RUNS,
    *CHLORINE_AND_OXYGEN_RUNS,
    *DEEP_SILICON_AND_LIFT_OFF_RUNS,
)


def run_files() -> dict[str, bytes]:
    """Return file name -> content for all run files; the same bytes at every call."""
    return {f"{recipe.etch}.csv": _content(draw_runs(recipe)) for recipe in ALL_RUNS}


def _content(rows: list[RunRow]) -> bytes:
    text = io.StringIO(newline="")
    text.write(MARK)
    writer = csv.writer(text, lineterminator="\n")
    writer.writerow(field.name for field in dataclasses.fields(RunRow))
    writer.writerows(dataclasses.astuple(row) for row in rows)
    return text.getvalue().encode("utf-8")
