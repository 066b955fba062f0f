"""With JavaScript off every page reads, and shows nothing that then would not work."""

from __future__ import annotations

import pytest

from tests.browser import Open
from tests.site.page_kinds import PAGES


@pytest.mark.parametrize("kind", PAGES)
def test_a_page_reads_without_script(open_page: Open, any_root: str, kind: str) -> None:
    """Title, every row of every table, and the way to other pages are there; dead controls are not."""
    page = open_page(any_root + PAGES[kind], java_script_enabled=False).page
    assert page.locator("article h1").count() == 1
    assert len(page.locator("article").inner_text()) > 200
    rows = page.locator("article tbody > tr")
    assert rows.filter(visible=True).count() == rows.count()
    assert page.locator(".md-tabs a").filter(visible=True).count() >= 5
    for dead in (".md-search", ".ew-filters", ".ew-ask", ".md-header__option"):
        assert page.locator(dead).filter(visible=True).count() == 0, dead


def test_films_are_found_by_list_without_script(open_page: Open, http_root: str) -> None:
    """The home page leads to each film that a recipe removes by a plain link."""
    page = open_page(http_root + PAGES["home"], java_script_enabled=False).page
    page.get_by_role("link", name="Silicon dioxide, thermal, wet grown").click()
    assert page.locator("h1").inner_text().strip() == "Silicon dioxide, thermal, wet grown"
    page.get_by_role("link", name="Thermal oxide in buffered HF 5:1", exact=True).click()
    assert page.url.endswith(PAGES["recipe"])
