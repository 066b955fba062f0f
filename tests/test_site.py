"""A whole build: all or nothing, and the same bytes twice."""

from __future__ import annotations

import datetime
import hashlib
import shutil
from pathlib import Path

from builder import pipeline
from builder.mkdocs_plugin import build_site
from builder.pages.page import FinishedSite
from builder.problems import Problem, has_errors

_ROOT = Path(__file__).resolve().parents[1]
_DAY = datetime.date(2026, 1, 2)


def _hashes(folder: Path) -> dict[str, str]:
    return {
        path.relative_to(folder).as_posix(): hashlib.sha256(path.read_bytes()).hexdigest()
        for path in sorted(folder.rglob("*"))
        if path.is_file()
    }


def _errors(problems: list[Problem]) -> list[Problem]:
    return [problem for problem in problems if has_errors([problem])]


def _copied_lab(folder: Path) -> Path:
    lab = folder / "lab"
    shutil.copytree(_ROOT / "recipes", lab / "recipes", ignore=shutil.ignore_patterns("reference"))
    shutil.copytree(_ROOT / "docs", lab / "docs")
    shutil.copy(_ROOT / "mkdocs.yml", lab / "mkdocs.yml")
    return lab


def test_two_builds_are_alike_and_a_broken_record_changes_nothing(tmp_path: Path, shipped_site: Path) -> None:
    """Same records, same bytes, wherever they stand; with an error in one the old site stays as it was."""
    lab, first = _copied_lab(tmp_path), tmp_path / "first"
    assert _errors(build_site(lab, first)) == []
    before = _hashes(first)
    assert before == _hashes(shipped_site)
    record = next(iter(sorted((lab / "recipes" / "films").glob("*.yaml"))))
    record.write_text(record.read_text(encoding="utf-8") + "\nno_such_field: 1\n", encoding="utf-8")
    problems = _errors(build_site(lab, first))
    assert {problem.file for problem in problems} == {f"recipes/films/{record.name}"}
    assert _hashes(first) == before
    assert sorted(path.name for path in tmp_path.iterdir() if path.is_dir()) == ["first", "lab"]


def test_a_dead_link_stops_the_exchange(tmp_path: Path) -> None:
    """A page that links nowhere keeps the old site in its place."""
    lab, out = _copied_lab(tmp_path), tmp_path / "out"

    def host(site: FinishedSite, lab_dir: Path, folder: Path) -> None:
        (folder / "start.html").write_text('<h1>Start</h1><a href="gone.html">x</a>', encoding="utf-8")

    problems = _errors(pipeline.build_site(lab, out, _DAY, lambda _: None, host))
    assert [problem.rule for problem in problems] == ["dead-link"]
    assert not out.exists()
