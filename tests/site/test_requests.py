"""No page asks anything of the world outside, from a server or from a folder."""

from __future__ import annotations

import re
from pathlib import Path

import pytest

from tests.browser import Open
from tests.site.page_kinds import PAGES

# Long enough for whatever a page starts after it has loaded.
_LATE_MS = 200
_INSIDE = ("data:", "blob:", "about:")


@pytest.mark.parametrize("kind", PAGES)
def test_no_request_leaves_the_site(open_page: Open, any_root: str, kind: str) -> None:
    """Whatever a page loads comes from beside it; and it loads with nothing failing."""
    visit = open_page(any_root + PAGES[kind])
    visit.page.wait_for_timeout(_LATE_MS)
    assert len(visit.requests) >= 3
    assert [url for url in visit.requests if not url.startswith((any_root, *_INSIDE))] == []
    assert visit.page.locator("h1").count() == 1


def test_no_script_or_style_names_a_host(shipped_site: Path) -> None:
    """Our own scripts and styles hold no address at all, so none can be asked later either."""
    ours = [
        shipped_site / "assets" / "etchwright.css",
        *(shipped_site / "assets" / "javascripts").glob("*.js"),
    ]
    named = {
        path.name: re.findall(r"(?:https?:)?//[a-z0-9-]+\.[a-z]{2,}", path.read_text(encoding="utf-8"))
        for path in ours
        if not path.name.startswith("bundle.")
    }
    assert len(named) >= 4
    assert {name: found for name, found in named.items() if found} == {}
