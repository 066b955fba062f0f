"""The list of pages that the browser tests look at leaves no kind of page out."""

from __future__ import annotations

from pathlib import Path

from tests.site.page_kinds import PAGES, kind_of, kinds_of_site


def test_every_kind_of_page_is_looked_at(shipped_site: Path) -> None:
    """A new kind of page has to join the list, or nobody looks at it."""
    assert kinds_of_site(shipped_site) == {kind_of(url) for url in PAGES.values()}
