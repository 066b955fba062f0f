"""The matrices in Chromium: walked by keys, narrowed, timed, without script, on paper and on a phone."""

from __future__ import annotations

import io
import re
from itertools import combinations
from typing import Any

import numpy as np
import pytest
from axe_playwright_python.sync_playwright import Axe
from PIL import Image
from playwright.sync_api import Page, expect

from tests.browser import Open
from tests.site.page_kinds import PAGES

_LOSSES = PAGES["matrix of losses"]
_RATIOS = PAGES["selectivity of a film"]
_PHONE = {"width": 360, "height": 780}
_RULES = ["wcag2a", "wcag2aa", "wcag21a", "wcag21aa", "wcag22aa"]
_MARKS = {
    "holds": "ew-verdict-holds ew-grid-own",
    "borderline": "ew-verdict-borderline ew-grid-own",
    "lost": "ew-verdict-lost ew-grid-own",
    "unmeasured": "",
}
# Share of the pixels by which two marks must differ to be told apart; common practice, no source.
_LEAST_DIFFERENCE = 0.04
_ROWS_KEPT = (
    "document.querySelectorAll('table[data-ew-matrix] tbody tr:nth-child(n+7)').forEach((r) => r.remove())"
)
_PLACE = """() => { const cell = document.activeElement;
  return [cell.parentElement.sectionRowIndex, cell.cellIndex]; }"""


def _place(page: Page) -> list[int]:
    found = page.evaluate(_PLACE)
    assert isinstance(found, list)
    return found


def _evidence(page: Page) -> str:
    return page.locator("[data-ew-evidence]").inner_text()


@pytest.mark.parametrize("url", [_LOSSES, _RATIOS])
def test_arrow_keys_walk_and_light_row_and_column(open_page: Open, http_root: str, url: str) -> None:
    """One stop for the Tab key; arrows, Home and End move on; row and column of the cell are lit."""
    page = open_page(http_root + url).page
    assert page.locator("table[data-ew-matrix] td[tabindex='0']").count() == 1
    page.locator("table[data-ew-matrix] td[tabindex='0']").focus()
    for key, place in (
        ("ArrowRight", [0, 2]), ("ArrowDown", [1, 2]), ("ArrowLeft", [1, 1]), ("ArrowLeft", [1, 1]),
        ("ArrowUp", [0, 1]), ("ArrowUp", [0, 1]),
    ):  # fmt: skip
        page.keyboard.press(key)
        assert _place(page) == place, key
    page.keyboard.press("End")
    last = _place(page)[1]
    assert last == page.locator("table[data-ew-matrix] thead tr:last-child th").count() - 1
    page.keyboard.press("Home")
    assert _place(page) == [0, 1]
    lit = page.locator("table[data-ew-matrix] tbody .ew-grid-lit")
    rows = page.locator("table[data-ew-matrix] tbody tr").count()
    assert lit.count() == rows + 1
    assert page.locator("table[data-ew-matrix] td[tabindex='0']").count() == 1


def test_a_cell_opens_its_evidence_with_the_way_to_its_records(open_page: Open, any_root: str) -> None:
    """Word, loss, reason, rate and rank beside the table; film and recipe one click away."""
    page = open_page(any_root + _LOSSES).page
    page.locator("table[data-ew-matrix] td.ew-grid-own").first.click()
    text = _evidence(page)
    for term in ("Loss", "Why", "Rate", "Rank", "own runs"):
        assert term in text
    targets = page.locator(".ew-matrix-title a").evaluate_all(
        "(all) => all.map((a) => a.getAttribute('href'))"
    )
    assert re.match(r"\.\./films/.+\.html$", targets[0]) and re.match(r"\.\./recipes/.+\.html$", targets[1])
    page.locator(".ew-matrix-title a").nth(1).click()
    page.wait_for_url("**/recipes/*")


def test_a_literature_cell_names_its_sources(open_page: Open, http_root: str) -> None:
    """A published number leads to its entry in the bibliography."""
    page = open_page(http_root + _LOSSES).page
    page.locator("table[data-ew-matrix] td.ew-grid-read").first.click()
    link = page.locator("[data-ew-evidence] a[href*='bibliography.html#']").first
    link.click()
    page.wait_for_url("**/bibliography.html#*")
    expect(page.locator(":target")).to_have_count(1)


def test_an_unmeasured_cell_says_that_nobody_knows(open_page: Open, http_root: str) -> None:
    """An outline, and words: nothing on record is no sign that a film holds."""
    page = open_page(http_root + _LOSSES).page
    page.locator("table[data-ew-matrix] tbody td:not([class])").first.click()
    cell = page.locator("table[data-ew-matrix] td[tabindex='0']")
    assert "unmeasured" in _evidence(page) and "no sign that it holds" in _evidence(page)
    assert (cell.get_attribute("aria-label") or "").endswith(": unmeasured")
    assert "gradient" in cell.evaluate("(e) => getComputedStyle(e).backgroundImage")


def test_a_longer_time_changes_words_and_numbers(open_page: Open, http_root: str) -> None:
    """The chosen time rewrites the cells, and the open evidence with them."""
    page = open_page(http_root + _LOSSES).page
    cell = page.locator("table[data-ew-matrix] td.ew-grid-own.ew-verdict-holds").first
    handle = cell.element_handle()
    assert handle is not None
    handle.click()
    before = handle.inner_text(), _evidence(page)
    page.locator("[data-ew-time]").select_option("2")
    after = handle.inner_text(), _evidence(page)
    assert before[0] != after[0] and before[1] != after[1]
    assert "60" in after[1]


def test_filters_narrow_rows_and_columns(open_page: Open, http_root: str) -> None:
    """Family, words, method and kind; what is left is counted, and the arrows skip what is hidden."""
    page = open_page(http_root + _LOSSES).page
    heads = page.locator("table[data-ew-matrix] thead tr:last-child th[data-kind]")
    rows = page.locator("table[data-ew-matrix] tbody tr")
    everything = heads.filter(visible=True).count(), rows.filter(visible=True).count()
    page.locator("[data-ew-narrow='method']").select_option("vapour")
    page.locator("[data-ew-narrow='kind']").select_option("recipe")
    page.locator("[data-ew-narrow='family']").select_option("oxide")
    shown = heads.filter(visible=True)
    assert 0 < shown.count() < everything[0] and 0 < rows.filter(visible=True).count() < everything[1]
    assert set(shown.evaluate_all("(all) => all.map((h) => h.dataset.method + h.dataset.kind)")) == {
        "vapourrecipe"
    }
    count = page.locator("[data-ew-matrix-count]").inner_text()
    assert count.startswith(f"{rows.filter(visible=True).count()} of {everything[1]} films")
    page.locator("table[data-ew-matrix] td[tabindex='0']").focus()
    start = _place(page)
    page.keyboard.press("ArrowRight")
    assert _place(page)[1] > start[1] and page.locator("td:focus").is_visible()
    page.locator("[data-ew-narrow='film']").fill("thermal wet")
    assert rows.filter(visible=True).count() == 1
    page.locator("[data-ew-matrix-filters] [type='reset']").click()
    expect(heads.filter(visible=True)).to_have_count(everything[0])
    expect(rows.filter(visible=True)).to_have_count(everything[1])


@pytest.mark.parametrize("scheme", ["light", "dark"])
@pytest.mark.parametrize("url", [_LOSSES, _RATIOS])
def test_axe_finds_nothing_with_a_cell_open(open_page: Open, http_root: str, url: str, scheme: str) -> None:
    """Neither the walked table nor the opened evidence breaks a rule of WCAG 2.2 AA."""
    page = open_page(http_root + url, color_scheme=scheme).page
    page.locator("table[data-ew-matrix] td.ew-grid-own").first.click()
    page.evaluate(_ROWS_KEPT)
    options = {"runOnly": {"type": "tag", "values": _RULES}, "resultTypes": ["violations"]}
    result = Axe().run(page, options=options).response
    found = [
        (one["id"], node["target"], node["failureSummary"])
        for one in result["violations"]
        for node in one["nodes"][:3]
    ]
    assert found == []
    assert len(result["passes"]) > 10


def test_on_a_phone_the_table_has_its_own_box(open_page: Open, http_root: str) -> None:
    """The page itself does not scroll sideways; the evidence of a tapped cell comes into view."""
    page = open_page(http_root + _LOSSES, viewport=_PHONE).page
    assert page.evaluate("document.documentElement.scrollWidth <= document.documentElement.clientWidth")
    box = page.locator(".ew-matrix-box")
    assert box.evaluate("(e) => e.scrollWidth > e.clientWidth && getComputedStyle(e).overflowX === 'auto'")
    page.locator("table[data-ew-matrix] td.ew-grid-own").first.click()
    seen = page.locator("[data-ew-evidence]").bounding_box()
    assert seen is not None and 0 <= seen["y"] < _PHONE["height"] - 60


def test_heads_stay_while_the_box_scrolls(open_page: Open, http_root: str) -> None:
    """Film names and etch names stand still in their box, so that a cell far off can still be read."""
    page = open_page(http_root + _LOSSES).page
    box = page.locator(".ew-matrix-box")
    box.evaluate("(e) => e.scrollTo(900, 900)")
    edge = box.bounding_box()
    assert edge is not None
    film = page.locator("table[data-ew-matrix] tbody tr:nth-child(40) th").bounding_box()
    head = page.locator("table[data-ew-matrix] thead tr:last-child th:nth-child(14)").bounding_box()
    assert film is not None and abs(film["x"] - edge["x"]) < 2
    assert head is not None and 0 <= head["y"] - edge["y"] < 60


def test_on_paper_nothing_is_cut_off_by_a_box(open_page: Open, http_root: str) -> None:
    """In print the box lets its table out, heads no longer float, and unmeasured outlines are printed."""
    page = open_page(http_root + _LOSSES).page
    page.emulate_media(media="print")
    box = page.locator(".ew-matrix-box")
    assert box.evaluate("(e) => getComputedStyle(e).overflowY") == "visible"
    head = page.locator("table[data-ew-matrix] thead tr:last-child th").nth(3)
    assert head.evaluate("(e) => getComputedStyle(e).position") == "static"
    blank = page.locator("table[data-ew-matrix] tbody td:not([class])").first
    assert blank.evaluate("(e) => getComputedStyle(e).printColorAdjust") == "exact"
    assert not page.locator("[data-ew-matrix-filters]").is_visible()


def test_on_paper_many_columns_fit_a_sheet_as_marks(open_page: Open, http_root: str) -> None:
    """All recipes of the lab stand on an upright sheet, by their marks; few columns keep their numbers."""
    page = open_page(http_root + _LOSSES, viewport={"width": 718, "height": 1000}).page
    page.emulate_media(media="print")
    table = page.locator("table[data-ew-matrix]")
    cell = page.locator("table[data-ew-matrix] td.ew-grid-own").first
    assert page.locator("table[data-ew-matrix] thead th[data-kind]").count() > 30
    assert table.evaluate("(e) => e.getBoundingClientRect().width") <= 718
    assert cell.evaluate("(e) => getComputedStyle(e).fontSize") == "0px"
    told = page.locator("[data-ew-still]")
    expect(told).to_be_visible()
    expect(told).to_have_text("Shown for 10\xa0min.")
    page.emulate_media(media="screen")
    expect(told).to_be_hidden()
    page.locator("[data-ew-time]").select_option("3")
    expect(told).not_to_have_text("Shown for 10\xa0min.")
    page.locator("[data-ew-narrow='method']").select_option("vapour")
    page.emulate_media(media="print")
    assert cell.evaluate("(e) => parseFloat(getComputedStyle(e).fontSize)") > 4


def test_without_script_the_table_reads(open_page: Open, any_root: str) -> None:
    """Every cell stands for the time that is named; no filter or panel shows that would not answer."""
    page = open_page(any_root + _LOSSES, java_script_enabled=False).page
    assert "10\xa0min" in page.locator("[data-ew-still]").inner_text()
    assert page.locator("table[data-ew-matrix] td.ew-verdict-holds").count() > 30
    assert not page.locator("[data-ew-matrix-filters]").is_visible()
    assert not page.locator("[data-ew-evidence]").is_visible()
    heads = page.locator("table[data-ew-matrix] thead tr:last-child th[data-kind]")
    kinds = set(heads.filter(visible=True).evaluate_all("(all) => all.map((h) => h.dataset.kind)"))
    assert kinds == {"recipe", "published"}


def test_published_columns_are_left_out_at_first_and_said_so(open_page: Open, http_root: str) -> None:
    """Recipes come first; what is left out is counted in words, on paper too, and one choice away."""
    page = open_page(http_root + _LOSSES).page
    heads = page.locator("table[data-ew-matrix] thead tr:last-child th[data-kind]")
    cells = page.locator("table[data-ew-matrix] tbody tr:first-child td")
    assert set(heads.evaluate_all("(all) => all.map((h) => h.dataset.kind)")) == {"recipe"}
    recipes = heads.count()
    told = page.locator("[data-ew-left-out]")
    left = int((re.findall(r"(\d+) etches known from published facts alone", told.inner_text()) or ["0"])[0])
    page.emulate_media(media="print")
    assert told.is_visible()
    page.emulate_media(media="screen")
    page.locator("[data-ew-narrow='kind']").select_option("")
    assert left > 80 and heads.count() == cells.count() == recipes + left
    assert not told.is_visible()
    page.locator("[data-ew-narrow='kind']").select_option("published")
    assert heads.count() == left and f"{recipes} recipes of this lab" in told.inner_text()
    cell = page.locator("table[data-ew-matrix] td.ew-grid-read").first
    cell.click()
    place = _place(page)[1]
    assert page.locator(".ew-matrix-title a").nth(1).inner_text() == heads.nth(place - 1).inner_text()
    page.locator("[data-ew-narrow='family']").select_option("oxide")
    assert re.search(r"\d+ films", told.inner_text())


def test_a_script_that_never_comes_leaves_the_table(open_page: Open, http_root: str) -> None:
    """The table waits for its script for a few seconds only; then all its columns show."""
    page = open_page("about:blank").page
    page.route(
        "**/javascripts/matrix.js", lambda route: route.fulfill(body="", content_type="text/javascript")
    )
    page.goto(http_root + _LOSSES)
    expect(page.locator("table[data-ew-matrix] th[data-kind='published']").first).to_be_visible(timeout=9000)


def test_no_number_is_wider_than_its_cell(open_page: Open, http_root: str) -> None:
    """Columns have one width; every text fits in it at the shortest and the longest time, also on paper."""
    page = open_page(http_root + _LOSSES).page
    page.locator("[data-ew-narrow='kind']").select_option("")
    wide = "(all) => all.filter((c) => c.scrollWidth > c.clientWidth).map((c) => c.textContent)"
    cells = page.locator("table[data-ew-matrix] tbody td[class]")
    for time in ("0", "3"):
        page.locator("[data-ew-time]").select_option(time)
        for media in ("screen", "print"):
            page.emulate_media(media=media)  # type: ignore[arg-type]
            assert cells.evaluate_all(wide) == [], (time, media)
        page.emulate_media(media="screen")


@pytest.mark.parametrize(
    "options",
    [{}, {"color_scheme": "dark"}, {"forced_colors": "active"}, {"media": "print"}],
    ids=["light", "dark", "forced colours", "print"],
)
def test_marks_of_cells_are_told_apart_by_shape(
    open_page: Open, http_root: str, options: dict[str, Any]
) -> None:
    """Seen in grey and without their text, cells of any two verdicts differ, and none is blank."""
    given = dict(options)
    media = given.pop("media", None)
    page = open_page(http_root + _RATIOS, device_scale_factor=4, **given).page
    if media:
        page.emulate_media(media=media)
    drawn = {name: _mark(page, css) for name, css in _MARKS.items()}
    drawn["blank"] = np.full_like(drawn["holds"], drawn["holds"][0, 0])
    alike = [
        pair
        for pair in combinations(drawn, 2)
        if float(np.mean(np.abs(drawn[pair[0]] - drawn[pair[1]]) > 60)) < _LEAST_DIFFERENCE
    ]
    assert alike == []


def _mark(page: Page, css: str) -> np.ndarray:
    cell = page.locator("table[data-ew-matrix] tbody tr:first-child td:nth-child(2)")
    cell.evaluate("(c, css) => { c.removeAttribute('class'); if (css) c.className = css; }", css)
    cell.scroll_into_view_if_needed()
    box = cell.bounding_box()
    assert box is not None
    clip = {"x": box["x"] + 3, "y": box["y"] + box["height"] / 2 - 7, "width": 16, "height": 13}
    shot = page.screenshot(clip=clip)  # type: ignore[arg-type]
    return np.asarray(Image.open(io.BytesIO(shot)).convert("L"), dtype=float)
