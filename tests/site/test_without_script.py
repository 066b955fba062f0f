"""With JavaScript off every page reads, and shows nothing that then would not work."""

from __future__ import annotations

import pytest
from playwright.sync_api import expect

from tests.browser import Open
from tests.site.page_kinds import PAGES

_ROWS_UNSEEN = """() => [...document.querySelectorAll('article tbody > tr')]
  .filter((row) => !row.getClientRects().length || getComputedStyle(row).visibility !== 'visible').length"""


@pytest.mark.parametrize("kind", PAGES)
def test_a_page_reads_without_script(open_page: Open, file_root: str, kind: str) -> None:
    """Title, every row of every table, and the way to other pages are there; dead controls are not."""
    page = open_page(file_root + PAGES[kind], java_script_enabled=False).page
    assert page.locator("article h1").count() == 1
    assert len(page.locator("article").inner_text()) > 200
    assert page.evaluate(_ROWS_UNSEEN) == 0
    assert page.locator(".md-tabs a").filter(visible=True).count() >= 5
    for dead in (".md-search", ".ew-filters", ".ew-ask", ".md-header__option"):
        assert page.locator(dead).filter(visible=True).count() == 0, dead


def test_films_are_found_by_list_without_script(open_page: Open, http_root: str) -> None:
    """The home page leads to each film that a recipe removes by a plain link."""
    page = open_page(http_root + PAGES["home"], java_script_enabled=False).page
    page.get_by_role("link", name="Silicon dioxide, thermal, wet grown").click()
    expect(page.locator("h1")).to_have_text("Silicon dioxide, thermal, wet grown")
    page.get_by_role("link", name="Thermal oxide in buffered HF 5:1", exact=True).click()
    page.wait_for_url(f"**/{PAGES['recipe']}")
