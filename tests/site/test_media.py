"""Forced colours, black-and-white print, little motion: the shapes alone must do."""

from __future__ import annotations

import io
import re
from itertools import combinations
from pathlib import Path
from typing import Any

import numpy as np
import pytest
from PIL import Image
from playwright.sync_api import Page

from tests.browser import Open
from tests.site.page_kinds import PAGES, recipe_pages

_VERDICTS = ("holds", "borderline", "lost", "unmeasured")
_FILLS = ("semiconductor", "oxide", "nitride", "metal", "polymer", "resist", "other")
# Share of a drawing's pixels by which two must differ to be told apart; common practice, no source.
_LEAST_DIFFERENCE = 0.04
_A4_PX = {"width": 718, "height": 1000}
"""A4 less margins of 10 mm, at 96 px an inch."""
_SVG = """<div id="drawn" style="{place}">
<svg class="{css}" width="{width}" height="{height}" style="zoom:6">{inner}</svg></div>"""
_PLACE = "position:fixed;left:0;top:0;z-index:99;background:Canvas;width:150px;height:100px"


def _drawn(page: Page, css: str, size: tuple[int, int], inner: str) -> np.ndarray:
    html = _SVG.format(place=_PLACE, css=css, width=size[0], height=size[1], inner=inner)
    page.evaluate("(html) => document.body.insertAdjacentHTML('beforeend', html)", html)
    shot = page.locator("#drawn").screenshot()
    page.evaluate("document.getElementById('drawn').remove()")
    return np.asarray(Image.open(io.BytesIO(shot)).convert("L"), dtype=float)


def _alike(drawings: dict[str, np.ndarray]) -> list[tuple[str, str]]:
    return [
        pair
        for pair in combinations(drawings, 2)
        if float(np.mean(np.abs(drawings[pair[0]] - drawings[pair[1]]) > 60)) < _LEAST_DIFFERENCE
    ]


@pytest.mark.parametrize(
    "options",
    [{}, {"color_scheme": "dark"}, {"forced_colors": "active"}, {"media": "print"}],
    ids=["light", "dark", "forced colours", "print"],
)
def test_marks_and_fills_are_told_apart_by_shape(
    open_page: Open, http_root: str, options: dict[str, Any]
) -> None:
    """Seen in grey, any two verdict marks and any two film families differ."""
    given = dict(options)
    media = given.pop("media", None)
    page = open_page(http_root + PAGES["recipe"], **given).page
    if media:
        page.emulate_media(media=media)
    marks = {
        verdict: _drawn(page, "ew-mark", (18, 12), f'<use href="#mark-{verdict}"/>') for verdict in _VERDICTS
    }
    fills = {
        family: _drawn(
            page,
            "ew-swatch",
            (22, 14),
            f'<rect class="ew-tone-0" width="22" height="14"/>'
            f'<rect class="ew-fill-{family}" width="22" height="14"/>',
        )
        for family in _FILLS
    }
    assert _alike(marks) == []
    assert _alike(fills) == []


def test_forced_colours_leave_no_colour_of_ours(open_page: Open, http_root: str) -> None:
    """In forced colours, text and links have the colours that the reader's system chose."""
    page = open_page(http_root + PAGES["recipe"], forced_colors="active").page
    assert page.evaluate("matchMedia('(forced-colors: active)').matches")
    same = """([selector, system]) => {
      const probe = document.body.appendChild(document.createElement('i'));
      probe.style.color = system;
      const wanted = getComputedStyle(probe).color;
      probe.remove();
      return getComputedStyle(document.querySelector(selector)).color === wanted;
    }"""
    pairs = [(".ew-lead", "CanvasText"), (".ew-crumbs", "CanvasText"), (".ew-lead a", "LinkText")]
    assert [pair for pair in pairs if not page.evaluate(same, list(pair))] == []


def test_print_shows_the_page_and_not_the_site(open_page: Open, http_root: str) -> None:
    """On paper the header is gone, the notice and the safety strip stand, no table is cut."""
    page = open_page(http_root + PAGES["recipe"], viewport=_A4_PX, color_scheme="dark").page
    page.emulate_media(media="print")
    assert not page.locator(".md-header").is_visible()
    assert page.locator(".ew-notice").is_visible()
    assert page.locator(".ew-caution").is_visible()
    wide = (
        "(all) => all.filter((b) => b.scrollWidth > b.clientWidth + 1).map((b) => b.innerText.slice(0, 60))"
    )
    assert page.locator(".ew-rows").evaluate_all(wide) == []
    assert page.evaluate("getComputedStyle(document.querySelector('.ew-lead')).color") == "rgb(0, 0, 0)"


_ON_PAPER = re.compile(r'<div class="ew-screen-only">\n<h2.*', re.DOTALL)
_LONGEST_ON_PAPER = 4


def test_a_recipe_prints_on_one_sheet(open_page: Open, http_root: str, shipped_site: Path) -> None:
    """The recipes with most to say on paper still fit on one sheet of A4."""
    said = {
        path.name: len(_ON_PAPER.sub("", path.read_text(encoding="utf-8")))
        for path in recipe_pages(shipped_site)
    }
    longest = sorted(said, key=lambda name: -said[name])[:_LONGEST_ON_PAPER]
    sheets = {}
    for name in longest:
        pdf = open_page(f"{http_root}recipes/{name}").page.pdf(format="A4", prefer_css_page_size=True)
        sheets[name] = pdf.count(b"/Type /Page\n") or pdf.count(b"/Type /Page ")
    assert sheets == dict.fromkeys(longest, 1)


def test_paper_leaves_out_evidence_and_says_so(open_page: Open, http_root: str) -> None:
    """Runs and charts stay on the screen; first action, equipment and the word of every film are printed."""
    page = open_page(http_root + PAGES["recipe"], viewport=_A4_PX).page
    paper = page.locator(".ew-paper-only")
    assert not paper.is_visible()
    page.emulate_media(media="print")
    assert paper.is_visible() and "stand on the page itself" in paper.inner_text()
    assert not page.get_by_role("region", name="Monitor wafers").is_visible()
    for words in (
        "first action", "Protective equipment", "Controls", "Besides", "Order of mixing", "Local rules",
        "Waste stream", "If it has not cleared", "lost", "Verify against the SDS",
    ):  # fmt: skip
        assert page.locator("article").get_by_text(words).filter(visible=True).count(), words
    page.goto(http_root + PAGES["etchant"])
    for words in ("Alarms and checks", "Storage and waste", "Source:"):
        assert page.locator(".ew-caution").get_by_text(words).filter(visible=True).count(), words


@pytest.mark.parametrize("kind", ["chemical", "method note"])
def test_print_makes_few_sheets(open_page: Open, http_root: str, kind: str) -> None:
    """A page prints as A4 sheets, and no sheet comes out empty."""
    page = open_page(http_root + PAGES[kind]).page
    pdf = page.pdf(format="A4", margin={side: "10mm" for side in ("top", "right", "bottom", "left")})
    sheets = pdf.count(b"/Type /Page\n") or pdf.count(b"/Type /Page ")
    height = page.evaluate("document.querySelector('article').scrollHeight")
    assert pdf.startswith(b"%PDF-")
    assert 1 <= sheets <= 2 + height / 500


def test_little_motion_is_respected(open_page: Open, http_root: str) -> None:
    """Who asks for little motion gets none."""
    page = open_page(http_root + PAGES["recipe"], reduced_motion="reduce").page
    moving = """() => [...document.querySelectorAll('*')].filter((e) => {
      const style = getComputedStyle(e);
      const seconds = (style.transitionDuration + ',' + style.animationDuration).split(',').map(parseFloat);
      return style.transitionProperty !== 'none' && Math.max(...seconds) > 0;
    }).map((e) => e.className)"""
    assert page.evaluate(moving) == []
