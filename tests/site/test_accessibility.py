"""axe finds nothing on any kind of page, light or dark."""

from __future__ import annotations

import re
from itertools import pairwise
from pathlib import Path
from typing import Any

import pytest
from axe_playwright_python.sync_playwright import Axe
from playwright.sync_api import Page, expect

from tests.browser import Open
from tests.site.page_kinds import PAGES

# WCAG 2.0 to 2.2, levels A and AA, by axe-core's own tags.
_RULES = {"type": "tag", "values": ["wcag2a", "wcag2aa", "wcag21a", "wcag21aa", "wcag22aa"]}
# The two schemes differ in nothing but colours.
_COLOURS = {"type": "rule", "values": ["color-contrast"]}
# Rows, columns and entries of one list come from one template: the first half dozen tell what all would.
_SHORTEN = """document.querySelectorAll('article :is(tbody, tr, ul, ol, dl, .ew-pairs-evidence)')
  .forEach((list) => [...list.children].slice(6).forEach((one) => one.remove()))"""
# All colours come from a dozen variables, whose contrast a test of the style sheet computes for both schemes:
# pages that use each of them in its place.
_IN_THE_DARK = (
    "home", "recipe list", "recipe, many runs", "film", "etchant", "matrix of losses", "planner", "safety",
    "matrix of chemicals", "bench sheet", "glossary", "method note",
)  # fmt: skip
_HEADING = re.compile(r"<h([1-6])[ >]")


def _violations(page: Page, rules: dict[str, Any], least_passes: int) -> list[tuple[object, ...]]:
    result = Axe().run(page, options={"runOnly": rules, "resultTypes": ["violations"]}).response
    assert len(result["passes"]) >= least_passes
    return [
        (violation["id"], node["target"], node["failureSummary"])
        for violation in result["violations"]
        for node in violation["nodes"][:3]
    ]


@pytest.mark.parametrize("kind", PAGES)
def test_axe_finds_nothing(open_page: Open, http_root: str, kind: str) -> None:
    """No violation of WCAG 2.2 AA that a program can find."""
    page = open_page(http_root + PAGES[kind], color_scheme="light").page
    page.evaluate(_SHORTEN)
    assert _violations(page, _RULES, 10) == []


@pytest.mark.parametrize("kind", _IN_THE_DARK)
def test_axe_finds_nothing_in_the_dark(open_page: Open, http_root: str, kind: str) -> None:
    """Nothing but colours differs there, so the rule on colours is the one to try."""
    page = open_page(http_root + PAGES[kind], color_scheme="dark").page
    expect(page.locator("body")).to_have_attribute("data-md-color-scheme", "slate")
    page.evaluate(_SHORTEN)
    assert _violations(page, _COLOURS, 1) == []


@pytest.mark.parametrize("scheme", ["light", "dark"])
def test_the_page_takes_the_scheme_of_the_system(open_page: Open, http_root: str, scheme: str) -> None:
    """Without a choice of the reader, paper is dark where the system is dark."""
    page = open_page(http_root + PAGES["recipe"], color_scheme=scheme).page
    red, green, blue = page.evaluate(
        "getComputedStyle(document.body).backgroundColor.match(/[0-9]+/g).slice(0, 3).map(Number)"
    )
    assert (red + green + blue > 3 * 200) == (scheme == "light")


def test_headings_go_down_one_level_at_a_time(shipped_site: Path) -> None:
    """Somebody who walks the headings never misses a level, on any page."""
    jumps, pages = {}, sorted(shipped_site.rglob("*.html"))
    for path in pages:
        article = path.read_text(encoding="utf-8").partition("<article")[2].partition("</article>")[0]
        levels = [int(level) for level in _HEADING.findall(article)]
        assert levels[0] == 1 and levels.count(1) == 1, path
        jumps[path] = [pair for pair in pairwise(levels) if pair[1] > pair[0] + 1]
    assert len(pages) > 400
    assert {path: found for path, found in jumps.items() if found} == {}
