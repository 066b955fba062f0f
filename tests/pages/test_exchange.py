"""The old site is replaced whole or not at all."""

from __future__ import annotations

from pathlib import Path

import pytest

from builder.pages.exchange import MARKER, ExchangeError, exchanged_folder, repair


def _write(folder: Path, text: str) -> None:
    folder.mkdir(exist_ok=True)
    (folder / "index.html").write_text(text, encoding="utf-8")
    (folder / MARKER).touch()


def _text(folder: Path) -> str:
    return (folder / "index.html").read_text(encoding="utf-8")


def _leftovers(folder: Path) -> list[str]:
    return sorted(path.name for path in folder.iterdir() if path.is_dir() and path.name != "site")


@pytest.mark.parametrize("has_old", [False, True])
def test_a_finished_folder_takes_the_place(tmp_path: Path, has_old: bool) -> None:
    """A build that ends well replaces what was there, and leaves nothing beside it."""
    site = tmp_path / "site"
    if has_old:
        _write(site, "old")
        (site / "stale.html").touch()
    with exchanged_folder(site) as folder:
        (folder.path / "index.html").write_text("new", encoding="utf-8")
    assert _text(site) == "new"
    assert not (site / "stale.html").exists()
    assert _leftovers(tmp_path) == []


def test_a_failed_build_leaves_the_old_site(tmp_path: Path) -> None:
    """An exception in the middle, or a refusal at the end, changes nothing."""
    site = tmp_path / "site"
    _write(site, "old")
    with pytest.raises(RuntimeError), exchanged_folder(site) as folder:
        (folder.path / "index.html").write_text("half", encoding="utf-8")
        raise RuntimeError
    with exchanged_folder(site) as folder:
        (folder.path / "index.html").write_text("dead links", encoding="utf-8")
        folder.keep_old()
    assert _text(site) == "old"
    assert _leftovers(tmp_path) == []


def test_an_interrupted_exchange_is_repaired(tmp_path: Path) -> None:
    """Stopped between the two renames, the old site comes back; stopped after them, the new one stays."""
    site = tmp_path / "site"
    _write(tmp_path / "site.previous", "old")
    _write(tmp_path / "site.building", "new")
    repair(site)
    assert _text(site) == "old"
    _write(tmp_path / "site.previous", "older")
    repair(site)
    assert _text(site) == "old"
    assert _leftovers(tmp_path) == []


def test_only_one_build_at_a_time(tmp_path: Path) -> None:
    """A second build of the same folder is refused while the first runs."""
    site = tmp_path / "site"
    with exchanged_folder(site), pytest.raises(ExchangeError) as caught, exchanged_folder(site):
        pass
    assert caught.value.rule == "site-locked"


def test_a_folder_of_somebody_else_is_never_replaced(tmp_path: Path) -> None:
    """A folder with files and without our mark is refused, and keeps its files."""
    site = tmp_path / "site"
    site.mkdir()
    (site / "thesis.tex").write_text("years", encoding="utf-8")
    with pytest.raises(ExchangeError) as caught, exchanged_folder(site):
        pass
    assert caught.value.rule == "not-our-site"
    assert (site / "thesis.tex").read_text(encoding="utf-8") == "years"
