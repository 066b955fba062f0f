"""A lab of many recipes for measurements: the demonstration lab's, repeated under new ids."""

from __future__ import annotations

import re
import shutil
from pathlib import Path

_ROOT = Path(__file__).resolve().parent.parent
_PLAIN_KINDS = ("compatibility", "couples", "etchants", "films", "sources", "tools")


def write_large_lab(folder: Path, recipes: int) -> None:
    """Write a lab of so many recipes, each with the runs of the one it repeats, into an empty folder."""
    source, target = _ROOT / "recipes", folder / "recipes"
    for kind in _PLAIN_KINDS:
        shutil.copytree(source / kind, target / kind)
    shutil.copy(source / "lab.yaml", target / "lab.yaml")
    (folder / "docs").mkdir()
    shutil.copy(_ROOT / "mkdocs.yml", folder / "mkdocs.yml")
    for kind in ("etches", "runs", "samples"):
        (target / kind).mkdir()
    shutil.copy(source / "samples" / "first-oxide-window.yaml", target / "samples")
    originals = sorted((source / "etches").glob("*.yaml"))
    for number in range(recipes):
        _copy(originals[number % len(originals)], number // len(originals), source, target)


def _copy(etch: Path, copy: int, source: Path, target: Path) -> None:
    name = etch.stem if copy == 0 else f"{etch.stem}-copy-{copy}"
    text = etch.read_text(encoding="utf-8")
    title = re.sub(r"(?m)^name: (.*)$", lambda match: f"name: {match[1]}{f' {copy}' if copy else ''}", text)
    (target / "etches" / f"{name}.yaml").write_text(title, encoding="utf-8")
    runs = source / "runs" / f"{etch.stem}.csv"
    if runs.exists():
        shutil.copy(runs, target / "runs" / f"{name}.csv")
