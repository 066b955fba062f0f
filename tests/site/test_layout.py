"""Pages fit narrow windows and large letters; nothing but a table's own box scrolls sideways."""

from __future__ import annotations

import pytest
from playwright.sync_api import expect

from tests.browser import Open
from tests.site.page_kinds import PAGES

# Window in CSS pixels: a phone; 1280 px at 200 %; 1280 px at 400 % (WCAG 2.2, 1.4.10 Reflow); a tablet.
_WINDOWS = {"phone": (360, 780), "zoom 200 %": (640, 450), "zoom 400 %": (320, 256), "tablet": (820, 1180)}
_TOO_WIDE = """() => {
  const wide = document.documentElement.clientWidth;
  const scrolls = (element) => /auto|scroll/.test(getComputedStyle(element).overflowX);
  const inBox = (element) => {
    for (let box = element.parentElement; box && box.tagName !== 'ARTICLE'; box = box.parentElement)
      if (scrolls(box)) return true;
    return false;
  };
  const unseen = (element) => !element.getClientRects().length
    || element.closest('svg, .ew-said, .headerlink');
  return [document.documentElement.scrollWidth > wide, ...[...document.querySelectorAll('article *')]
    .filter((element) => !inBox(element) && !unseen(element)
      && element.getBoundingClientRect().right > wide + 1)
    .slice(0, 3).map((element) => element.outerHTML.slice(0, 120))];
}"""


@pytest.mark.parametrize("kind", PAGES)
def test_nothing_is_wider_than_the_window(open_page: Open, http_root: str, kind: str) -> None:
    """At every window the page itself never scrolls sideways, and no text leaves it."""
    page = open_page(http_root + PAGES[kind]).page
    found = {}
    for name, (width, height) in _WINDOWS.items():
        page.set_viewport_size({"width": width, "height": height})
        found[name] = page.evaluate(_TOO_WIDE)
    assert found == {name: [False] for name in _WINDOWS}


@pytest.mark.parametrize("kind", ["recipe", "film list", "method note"])
def test_a_phone_has_the_way_to_every_part(open_page: Open, http_root: str, kind: str) -> None:
    """The drawer of a narrow window leads on, also from pages that show no navigation beside them."""
    page = open_page(http_root + PAGES[kind], viewport={"width": 360, "height": 780}).page
    page.locator("label.md-header__button[for='__drawer']").click()
    drawer = page.locator(".md-sidebar--primary")
    expect(drawer.get_by_role("link").filter(visible=True).first).to_be_in_viewport()
    if kind != "method note":  # there the drawer opens at the part that one is in
        drawer.get_by_role("link", name="Chemicals").click()
        page.wait_for_url("**/chemicals/index.html")


def test_tabs_come_back_at_the_top(open_page: Open, http_root: str) -> None:
    """Scrolled away and back, the tabs lead on as before."""
    page = open_page(http_root + PAGES["recipe"]).page
    tabs = page.locator(".md-tabs")
    page.evaluate("window.scrollTo(0, 3000)")
    expect(tabs).to_have_attribute("hidden", "")
    page.evaluate("window.scrollTo(0, 0)")
    expect(tabs).not_to_have_attribute("hidden", "")
    page.locator(".md-tabs a", has_text="Films").click()
    page.wait_for_url("**/films/index.html")


def test_large_letters_are_not_cut(open_page: Open, http_root: str) -> None:
    """With letters of double size (text only) the first paragraph and the safety strip stay whole."""
    page = open_page(http_root + PAGES["recipe"]).page
    before = page.locator(".ew-lead").bounding_box()
    page.add_style_tag(content="html { font-size: 250% !important; }")
    after = page.locator(".ew-lead").bounding_box()
    assert before is not None and after is not None and after["height"] > 1.5 * before["height"]
    assert page.evaluate(_TOO_WIDE) == [False]
    cut = "(e) => e.scrollHeight > e.clientHeight + 1 || e.scrollWidth > e.clientWidth + 1"
    assert not page.locator(".ew-caution").evaluate(cut)
