"""Everything works without a mouse: questions, filters, tables."""

from __future__ import annotations

import re

from playwright.sync_api import expect

from tests.browser import Open
from tests.site.page_kinds import PAGES


def test_first_tab_skips_to_the_content(open_page: Open, http_root: str) -> None:
    """The first stop of the Tab key leads past the header."""
    page = open_page(http_root + PAGES["recipe"]).page
    page.keyboard.press("Tab")
    focused = page.locator(":focus")
    expect(focused).to_have_class(re.compile("md-skip"))
    page.keyboard.press("Enter")
    page.wait_for_url("**#*")


def test_the_question_takes_another_name(open_page: Open, any_root: str) -> None:
    """Type a synonym, choose by arrow and Enter: the answer names the film and links to it."""
    page = open_page(any_root + PAGES["home"]).page
    field = page.get_by_label("What do you want to remove?")
    expect(field).to_have_role("combobox")
    field.focus()
    page.keyboard.type("wet thermal ox")
    expect(field).to_have_attribute("aria-expanded", "true")
    active = field.get_attribute("aria-activedescendant")
    assert active is not None
    expect(page.locator(f"#{active}")).to_have_attribute("aria-selected", "true")
    expect(page.locator(f"#{active}")).to_contain_text("thermal, wet grown")
    page.keyboard.press("Enter")
    expect(field).to_have_attribute("aria-expanded", "false")
    answer = page.locator("[data-ew-answer]")
    expect(answer.get_by_role("link").first).to_have_attribute("href", "films/sio2-thermal-wet.html")
    expect(answer).to_contain_text("recipes remove")
    first = answer.get_by_role("listitem").first
    expect(first.get_by_role("link")).to_have_attribute("href", re.compile(r"^recipes/.+\.html$"))
    expect(first).to_contain_text(re.compile(r"\d\s(s|min)\W+\d.*\s(s|min) for \d"))


def test_a_name_of_several_films_has_their_recipes(open_page: Open, http_root: str) -> None:
    """Who does not know which nitride it is sees what removes one or the other, each named."""
    page = open_page(http_root + PAGES["home"]).page
    page.get_by_label("What do you want to remove?").fill("silicon nitride, form not stated")
    page.keyboard.press("Enter")
    answer = page.locator("[data-ew-answer]")
    expect(answer).to_contain_text(re.compile(r"[1-9]\d* recipes remove a film that goes by the name"))
    expect(answer.get_by_role("listitem").first).to_contain_text("Silicon nitride, LPCVD")
    answer.get_by_role("link").first.click()
    rows = page.locator("table[class] tbody tr").filter(has_text="LPCVD")
    expect(rows.first.get_by_role("link").first).to_have_attribute("href", re.compile(r"\.\./recipes/"))


def test_what_must_stay_can_be_taken_back(open_page: Open, http_root: str) -> None:
    """Films that must stay are listed; each can be left out again by its button; Escape closes a list."""
    page = open_page(http_root + PAGES["home"]).page
    keep = page.get_by_label("What must stay?")
    keep.focus()
    for words in ("positive resist a", "silicon nitride lpcvd"):
        page.keyboard.type(words)
        page.keyboard.press("ArrowDown")
        page.keyboard.press("ArrowUp")
        page.keyboard.press("Enter")
    buttons = page.locator("[data-ew-answer] button")
    expect(buttons).to_have_count(2)
    buttons.first.focus()
    page.keyboard.press("Enter")
    expect(buttons).to_have_count(1)
    keep.focus()
    page.keyboard.type("gold")
    expect(keep).to_have_attribute("aria-expanded", "true")
    page.keyboard.press("Escape")
    expect(keep).to_have_attribute("aria-expanded", "false")


def test_a_film_is_found_however_it_is_typed(open_page: Open, http_root: str) -> None:
    """Small letters, blanks, hyphens and low digits make no difference."""
    page = open_page(http_root + PAGES["home"]).page
    field = page.get_by_label("What do you want to remove?")
    for typed in ("SiO2", "sio\u2082", "si o2", "SIO-2"):
        field.fill(typed)
        expect(page.locator("#ask-remove-suggestions li").first).to_contain_text("Silicon dioxide")
    field.fill("zzz")
    expect(field).to_have_attribute("aria-expanded", "false")


def test_filters_narrow_the_list_and_live_in_the_address(open_page: Open, any_root: str) -> None:
    """Words and choices leave the rows that fit; the address brings the same list back."""
    page = open_page(any_root + PAGES["recipe list"]).page
    rows = page.locator("[data-ew-rows] > tr")
    all_rows = rows.count()
    assert all_rows >= 30
    page.get_by_label("Words").focus()
    page.keyboard.type("boe")
    left = rows.filter(visible=True)
    texts = left.all_inner_texts()
    assert 1 <= len(texts) < all_rows
    assert all("uffered HF" in text for text in texts)
    expect(page.locator("[data-ew-count]")).to_have_text(f"{len(texts)} of {all_rows}")
    page.get_by_label("Standing").select_option("proven")
    proven = left.count()
    assert all("proven" in text for text in left.all_inner_texts())
    address = page.url
    page.goto("about:blank")
    page.goto(address)
    expect(left).to_have_count(proven)
    page.get_by_role("button", name="Show all").focus()
    page.keyboard.press("Enter")
    expect(left).to_have_count(all_rows)


def test_wide_tables_scroll_by_keyboard(open_page: Open, http_root: str) -> None:
    """A table that is wider than its box can be focused, has a name, and scrolls by the arrow keys."""
    page = open_page(http_root + PAGES["recipe"], viewport={"width": 360, "height": 780}).page
    box = page.get_by_role("region", name="Monitor wafers")
    box.focus()
    page.keyboard.press("ArrowRight")
    page.wait_for_function(
        "document.activeElement.scrollLeft > 0 && document.activeElement.classList.contains('ew-rows')"
    )
    assert page.evaluate("document.documentElement.scrollLeft") == 0


def test_focus_can_be_seen(open_page: Open, http_root: str) -> None:
    """Whatever the Tab key reaches in the content shows an outline."""
    page = open_page(http_root + PAGES["recipe list"]).page
    page.get_by_label("Words").focus()
    outlines = set()
    for _ in range(12):
        page.keyboard.press("Tab")
        outlines.add(page.evaluate("getComputedStyle(document.activeElement).outlineStyle"))
    assert outlines <= {"solid", "auto"}
