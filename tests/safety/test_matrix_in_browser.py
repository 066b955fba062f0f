"""The safety matrices in a browser: keys, light, evidence beside the table, and all of it without script."""

from __future__ import annotations

import pytest

from tests.browser import Open

URL = "safety/mixing.html"
_IN_VIEW = """(anchor) => {
  const entry = document.getElementById(anchor), box = entry.parentElement.getBoundingClientRect();
  const place = entry.getBoundingClientRect();
  return place.top >= box.top - 1 && place.top < box.bottom && place.top < innerHeight;
}"""
_CELL = "document.activeElement.closest('td')"


def _first_never(page) -> str:
    return (
        page.locator("table[data-safety-matrix] td.ew-pairs-never a").first.get_attribute("href").lstrip("#")
    )


def test_arrow_keys_walk_and_show_the_evidence(open_page: Open, any_root: str) -> None:
    """One stop of the tab key enters the table; the arrows walk; row and column of the cell are lit."""
    page = open_page(any_root + URL).page
    table = page.locator("table[data-safety-matrix]")
    assert table.locator("td[tabindex='0'], td a[tabindex='0']").count() == 1
    table.locator("tbody td").first.focus()
    page.keyboard.press("ArrowDown")
    page.keyboard.press("ArrowRight")
    assert page.evaluate(f"[{_CELL}.parentElement.sectionRowIndex, {_CELL}.cellIndex]") == [1, 2]
    row = page.evaluate(
        f"[...{_CELL}.parentElement.cells].every((c) => c.classList.contains('ew-pairs-lit'))"
    )
    head = table.locator("thead th").nth(2).get_attribute("class") or ""
    assert row and "ew-pairs-lit" in head
    page.keyboard.press("ArrowUp")
    page.keyboard.press("ArrowUp")
    assert page.evaluate(f"{_CELL}.parentElement.sectionRowIndex") == 0


def test_a_cell_brings_its_evidence_into_view(open_page: Open, any_root: str) -> None:
    """All rules of a pair are marked, the gravest stands at the top of the box."""
    page = open_page(any_root + URL).page
    cell = page.locator("td.ew-pairs-never a[data-also]").first
    anchors = [cell.get_attribute("href").lstrip("#"), *cell.get_attribute("data-also").split()]
    cell.click()
    assert page.evaluate(_IN_VIEW, anchors[0])
    opened = page.eval_on_selector_all(".ew-pairs-open", "(all) => all.map((one) => one.id)")
    assert set(opened) == set(anchors)


def test_without_script_a_cell_is_a_link_to_its_evidence(open_page: Open, any_root: str) -> None:
    """The link scrolls the evidence beside the table and marks it."""
    page = open_page(any_root + URL, java_script_enabled=False).page
    anchor = _first_never(page)
    page.locator("td.ew-pairs-never a").first.click()
    page.wait_for_url(f"**#{anchor}")
    box = page.locator(f"#{anchor}").bounding_box()
    assert box is not None and 0 <= box["y"] < 900


@pytest.mark.parametrize("name", ["mixing", "groups", "film-gas", "containers"])
def test_heads_stay_in_sight(open_page: Open, http_root: str, name: str) -> None:
    """Scrolled to its far corner, a matrix still shows the heads of row and column."""
    page = open_page(f"{http_root}safety/{name}.html").page
    box = page.locator(".ew-pairs-box")
    assert box.get_attribute("role") == "region" and box.get_attribute("tabindex") == "0"
    box.evaluate("(e) => { e.scrollTop = e.scrollHeight; e.scrollLeft = e.scrollWidth; }")
    outer = box.bounding_box()
    head = page.locator("table[data-safety-matrix] thead th").last.bounding_box()
    side = page.locator("table[data-safety-matrix] tbody tr").last.locator("th").bounding_box()
    assert outer and head and side
    assert abs(head["y"] - outer["y"]) <= 2
    assert abs(side["x"] - outer["x"]) <= 2


def test_a_diamond_is_drawn(open_page: Open, any_root: str) -> None:
    """The symbols load from the site itself and are as large as drawn."""
    page = open_page(any_root + "chemicals/hf-49.html").page
    images = page.locator(".ew-diamond img")
    assert images.count() == 2
    assert images.evaluate_all("(all) => all.every((one) => one.complete && one.naturalWidth > 0)")
    assert page.locator(".ew-diamond").first.inner_text().startswith("corrosion")


@pytest.mark.parametrize("name", ["hf-49", "tmah-25", "acetone", "h2so4-96"])
def test_a_bench_sheet_prints_on_one_page(open_page: Open, http_root: str, name: str) -> None:
    """A4 with margins of 10 mm: what hangs at a bench is one sheet."""
    page = open_page(f"{http_root}safety/sheets/{name}.html").page
    paper = page.pdf(format="A4", margin=dict.fromkeys(("top", "bottom", "left", "right"), "10mm"))
    assert paper.count(b"/Type /Page\n") == 1


def test_the_checklist_can_be_ticked_and_printed(open_page: Open, http_root: str) -> None:
    """Every line has its own box, and the lines stay when printed."""
    page = open_page(http_root + "safety/before-your-first-wet-etch.html").page
    boxes = page.locator(".ew-checklist input")
    assert boxes.count() >= 23
    page.locator(".ew-checklist label").first.click()
    assert boxes.first.is_checked()
    page.emulate_media(media="print")
    assert page.locator(".ew-checklist li").last.is_visible()
