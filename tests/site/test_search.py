"""The theme's search finds a film by any of its names, also from a folder."""

from __future__ import annotations

import pytest
from playwright.sync_api import expect

from tests.browser import Open

_FINDS = {
    "wet oxide": "films/sio2-thermal-wet.html",
    "BOE": "etchants/bhf-5-1.html",
    "7664-39-3": "chemicals/hf-49.html",
    "thermal oxide buffered": "recipes/oxide-bhf.html",
}
# The search worker starts late, so the first answer may take its time.
_PATIENCE_MS = 20_000


@pytest.mark.parametrize("words", _FINDS)
def test_search_finds_a_page_by_another_name(open_page: Open, any_root: str, words: str) -> None:
    """Typing a synonym, a CAS number or some words of a title leads to the page."""
    visit = open_page(any_root + "glossary.html")
    page = visit.page
    page.keyboard.press("/")
    field = page.locator(".md-search__input")
    expect(field).to_be_focused()
    field.press_sequentially(words, delay=5)
    hit = page.locator(f'.md-search-result__link[href*="{_FINDS[words]}"]').first
    expect(hit).to_be_attached(timeout=_PATIENCE_MS)
    hit.click()
    page.wait_for_url(f"**/{_FINDS[words]}*")
    assert [url for url in visit.requests if not url.startswith((any_root, "data:", "blob:", "about:"))] == []
