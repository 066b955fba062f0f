"""A plan in a lab of a thousand recipes, its facts stored, against the time to load what it stands on."""

from __future__ import annotations

import resource
import statistics
import subprocess
import sys
import tempfile
from collections.abc import Iterator
from pathlib import Path

from bench.large_lab import write_large_lab

RECIPES = 1000
REPEATS = 9
_ROOT = Path(__file__).resolve().parent.parent
_SAMPLE = _ROOT / "recipes" / "samples" / "first-oxide-window.yaml"
_IMPORTS = [sys.executable, "-c", "import numpy, scipy.special, yaml, jsonschema"]


def rows() -> Iterator[tuple[str, str]]:
    """Yield what was measured and its value, in words."""
    with tempfile.TemporaryDirectory() as name:
        lab = Path(name)
        write_large_lab(lab, RECIPES)
        cold = _seconds(_plan(lab))
        yield f"first plan in a lab of {RECIPES} recipes, from the records", f"{cold:.1f} s"
        yield from _against_imports(f"with its facts stored, {RECIPES} recipes", lab)
    _seconds(_plan(_ROOT))
    yield from _against_imports("with its facts stored, demonstration lab", _ROOT)


def _against_imports(what: str, lab: Path) -> Iterator[tuple[str, str]]:
    plans, imports = [], []
    # Turn about, so that a busy moment of the machine meets both.
    for _ in range(REPEATS):
        imports.append(_seconds(_IMPORTS))
        plans.append(_seconds(_plan(lab)))
    mine, other = statistics.median(plans), statistics.median(imports)
    yield f"plan {what}, time of the processor", f"{mine:.2f} s"
    yield "importing numpy, scipy.special, yaml, jsonschema in a fresh interpreter", f"{other:.2f} s"
    yield "ratio (aim: at most 2.0)", f"{mine / other:.2f}"


def _plan(lab: Path) -> list[str]:
    return [sys.executable, "-m", "builder", "plan", str(_SAMPLE), "--lab", str(lab), "--json"]


def _seconds(command: list[str]) -> float:
    """Time of the processor: what else the machine is doing changes it least."""
    before = _spent()
    done = subprocess.run(command, capture_output=True, cwd=_ROOT, check=False)
    taken = _spent() - before
    if done.returncode != 0:
        raise RuntimeError(done.stderr.decode()[-2000:])
    return taken


def _spent() -> float:
    used = resource.getrusage(resource.RUSAGE_CHILDREN)
    return used.ru_utime + used.ru_stime
