"""axe finds nothing on any kind of page, light or dark."""

from __future__ import annotations

from itertools import pairwise

import pytest
from axe_playwright_python.sync_playwright import Axe

from tests.browser import Open
from tests.site.page_kinds import PAGES

# WCAG 2.0 to 2.2, levels A and AA, by axe-core's own tags.
_RULES = ["wcag2a", "wcag2aa", "wcag21a", "wcag21aa", "wcag22aa"]
# Rows and columns of one table come from one template: the first dozen tell what all would.
_SHORTEN = """document.querySelectorAll('article :is(tbody, tr, ul, ol, dl)').forEach((list) =>
  [...list.children].slice(12).forEach((one) => one.remove()))"""


@pytest.mark.parametrize("scheme", ["light", "dark"])
@pytest.mark.parametrize("kind", PAGES)
def test_axe_finds_nothing(open_page: Open, http_root: str, kind: str, scheme: str) -> None:
    """No violation of WCAG 2.2 AA that a program can find."""
    visit = open_page(http_root + PAGES[kind], color_scheme=scheme)
    visit.page.evaluate(_SHORTEN)
    options = {"runOnly": {"type": "tag", "values": _RULES}, "resultTypes": ["violations"]}
    result = Axe().run(visit.page, options=options).response
    found = [
        (violation["id"], node["target"], node["failureSummary"])
        for violation in result["violations"]
        for node in violation["nodes"][:3]
    ]
    assert found == []
    assert len(result["passes"]) > 10


@pytest.mark.parametrize("scheme", ["light", "dark"])
def test_the_page_takes_the_scheme_of_the_system(open_page: Open, http_root: str, scheme: str) -> None:
    """Without a choice of the reader, paper is dark where the system is dark."""
    page = open_page(http_root + PAGES["recipe"], color_scheme=scheme).page
    red, green, blue = page.evaluate(
        "getComputedStyle(document.body).backgroundColor.match(/[0-9]+/g).slice(0, 3).map(Number)"
    )
    assert (red + green + blue > 3 * 200) == (scheme == "light")


def test_headings_go_down_one_level_at_a_time(open_page: Open, http_root: str) -> None:
    """Somebody who walks the headings never misses a level."""
    jumps = {}
    visit = open_page(http_root + PAGES["home"])
    for kind, url in PAGES.items():
        visit.page.goto(http_root + url)
        levels = visit.page.evaluate(
            "[...document.querySelectorAll('article :is(h1, h2, h3, h4)')].map((h) => Number(h.tagName[1]))"
        )
        assert levels[0] == 1
        jumps[kind] = [pair for pair in pairwise(levels) if pair[1] > pair[0] + 1]
    assert {kind: found for kind, found in jumps.items() if found} == {}
