"""Nothing of the demonstration lab can be taken for a measurement."""

from __future__ import annotations

from pathlib import Path

from builder.records.lab import LabRecords

RECIPES = Path(__file__).resolve().parents[2] / "recipes"
MARK = "# Invented for the demonstration lab; not measured anywhere."


def test_every_file_of_the_lab_is_marked() -> None:
    """In its first two lines; the published facts beside it are not."""
    files = [path for path in RECIPES.rglob("*") if path.suffix in (".yaml", ".csv")]
    own = [path for path in files if "reference" not in path.parts]
    unmarked = [path.name for path in own if MARK not in path.read_text(encoding="utf-8").splitlines()[:2]]
    assert len(own) > 100
    assert unmarked == []


def test_the_lab_says_so_itself(records: LabRecords) -> None:
    """The settings carry the mark to every page."""
    assert records.settings.invented


def test_published_facts_are_not_marked() -> None:
    """A mark on a published fact would be as false as a missing one here."""
    marked = [
        path.name for path in (RECIPES / "reference").rglob("*.yaml") if MARK in path.read_text("utf-8")
    ]
    assert marked == []
