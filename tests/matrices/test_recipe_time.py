"""The depth field of a recipe page: in Chromium the times of the Python engine, over a table of cases."""

from __future__ import annotations

import json
import re
from pathlib import Path

import pytest
from playwright.sync_api import Browser, Page, expect

from builder.engine import Cut, RateBand, schedule
from builder.views.number_text import Rounding, time_text
from tests.browser import ROOT, Open
from tests.site.page_kinds import PAGES

_SCRIPT = ROOT / "docs" / "assets" / "javascripts" / "recipe-time.js"
# Rate ends (nm/s; None: no high end), tolerance, phi, offset (s), overetch: plain, drawn-out, hasty, odd.
_TARGETS = [
    (1.5735, 1.8013, 0.02, 0.025, 0.0, 0.0),
    (0.04, 0.0454, 0.02, 0.03, 10.0, 0.0),
    (9.76, 11.86, 0.02, 0.1, 6.0, 0.1),
    (18.55, 21.12, 0.02, 0.04, -7.610855346395023, 0.0),
    (51.3, None, 0.02, 0.1, 0.0, 0.5),
    (41.67, 83.33, 0.0, 0.0, -30.0, 0.0),
]
_DEPTHS = [
    ("0.5", 1.0),
    ("300", 1.0),
    ("1.2", 1000.0),
    ("1,2", 1000.0),
    ("525", 1000.0),
    ("80", 0.1),
    ("1e3", 1.0),
]
_FORM = """<form data-ew-depth hidden><input data-ew-depth-value>
<select data-ew-depth-unit><option value="1">nm</option><option value="1000">um</option>
<option value="0.1">A</option></select>
<select data-ew-depth-film>{films}</select><output data-ew-depth-answer></output></form>
<script type="application/json" id="ew-times">{data}</script>"""


@pytest.fixture(scope="module")
def form(browser: Browser) -> Page:
    """A page with nothing but the field, its data and its script."""
    keys = ("low", "high", "tolerance", "phi", "offset_s", "overetch")
    targets = [
        {"film": str(i), "name": str(i), **dict(zip(keys, one, strict=True))}
        for i, one in enumerate(_TARGETS)
    ]
    films = "".join(f'<option value="{i}">{i}</option>' for i in range(len(_TARGETS)))
    page = browser.new_page()
    page.set_content(_FORM.format(films=films, data=json.dumps({"format": 1, "targets": targets})))
    page.add_script_tag(content=Path(_SCRIPT).read_text(encoding="utf-8"))
    return page


def _answer(page: Page, depth: str, unit: float, film: int = 0) -> str:
    page.locator("[data-ew-depth-film]").select_option(str(film))
    page.locator("[data-ew-depth-unit]").select_option(f"{unit:g}")
    page.locator("[data-ew-depth-value]").fill(depth)
    return page.locator("[data-ew-depth-answer]").inner_text().replace("\xa0", " ")


@pytest.mark.parametrize("film", range(len(_TARGETS)))
def test_the_times_are_those_of_the_engine(form: Page, film: int) -> None:
    """First look rounded down and latest stop rounded up, to the step of a timer, for each depth and unit."""
    low, high, tolerance, phi, offset, overetch = _TARGETS[film]
    for typed, unit in _DEPTHS:
        depth = float(typed.replace(",", ".")) * unit
        cut = Cut(depth, depth, tolerance, phi, offset, overetch, 15.0, True)
        plan = schedule(RateBand(low, None, high), cut)
        first = time_text(plan.first_look_s, Rounding.DOWN).replace("\xa0", " ")
        latest = time_text(plan.latest_stop_s, Rounding.UP).replace("\xa0", " ")
        assert _answer(form, typed, unit, film) == f"First look at {first}, latest stop at {latest}.", (
            typed,
            unit,
        )


@pytest.mark.parametrize("typed", ["0", "-5", "abc", "1 2", "1e999", "NaN", "Infinity", "1,2,3", "0x10"])
def test_what_is_no_thickness_gets_no_time(form: Page, typed: str) -> None:
    """Nothing but a number above 0 is answered with a time."""
    assert _answer(form, typed, 1.0) == "Type the thickness as a number above 0."


def test_an_empty_field_says_nothing(form: Page) -> None:
    """Before anything is typed there is neither a time nor a reproach."""
    assert _answer(form, " ", 1.0) == ""


def test_the_field_works_on_the_page(open_page: Open, any_root: str) -> None:
    """On the built page, from a server and a folder, the usual depth gives the answer above the field."""
    page = open_page(any_root + PAGES["recipe"]).page
    page.locator("[data-ew-depth-value]").fill("300")
    told = page.locator("[data-ew-depth-answer]")
    big = page.locator("#time ~ p .ew-big")
    usual = big.all_inner_texts()
    expect(told).to_have_text(f"First look at {usual[0]}, latest stop at {usual[1]}.")
    page.locator("[data-ew-depth-value]").fill("600")
    expect(page.locator("[data-ew-for]")).to_have_text(
        re.compile("^600\xa0nm of Silicon dioxide, thermal, wet")
    )
    other = big.all_inner_texts()
    assert other[0] != usual[0] and other[1] != usual[1]
    expect(told).to_have_text(f"First look at {other[0]}, latest stop at {other[1]}.")
    page.locator("[data-ew-depth-value]").fill("x")
    assert big.all_inner_texts() == usual
