"""The planner's page in a real browser: built by keyboard, restored by links, safe from what a file says."""

from __future__ import annotations

import base64
import json
import re
from pathlib import Path
from typing import Any

import pytest
from axe_playwright_python.sync_playwright import Axe
from playwright.sync_api import Browser, Page, expect

from builder.records.samples import Sample
from builder.records.terms import Origin
from builder.views.planner_link import planner_link
from tests.browser import DESKTOP, ROOT, Open
from tests.planner.conftest import PlannerLab

_URL = "planner/index.html"
_PHONE = {"width": 360, "height": 740}
_TABLET = {"width": 820, "height": 1100}
_A4_PX = {"width": 794, "height": 1123}
_RULES = ["wcag2a", "wcag2aa", "wcag21a", "wcag21aa", "wcag22aa"]
_WINDOW: dict[str, Any] = {
    "sample": "window",
    "layers": [
        {"film": "resist-positive-a", "thickness": "1.4 um", "role": "mask"},
        {"film": "sio2-thermal-wet", "thickness": "300 nm +/- 6 nm", "role": "target"},
        {"film": "si-100", "thickness": "525 um", "role": "under"},
    ],
    "back": "protected",
    "edge": "protected",
    "goal": {"line": "50 um"},
    "limits": {"methods": ["wet"]},
}
_STACK: dict[str, Any] = {
    "sample": "stack",
    "layers": [
        {"film": "resist-positive-a", "thickness": "1.4 um", "role": "mask"},
        {"film": "sio2-thermal-wet", "thickness": "300 nm", "role": "target"},
        {"film": "sin-lpcvd", "thickness": "150 nm", "role": "under", "allowed_loss": "10 nm"},
        {"film": "si-100", "thickness": "525 um", "role": "under"},
    ],
    "back": {"film": "sio2-thermal-wet", "thickness": "300 nm", "allowed_loss": "any"},
    "edge": "protected",
}
_LONGEST_CARDS = 5


def _link(file: dict[str, Any]) -> str:
    return planner_link(Sample.from_raw(file, "x.json", Origin.LAB))


def _best(page: Page) -> Any:
    return page.locator("#plan-best")


def _said(page: Page) -> Any:
    return page.get_by_role("status")


def test_a_link_opens_a_sample(open_page: Open, any_root: str) -> None:
    """The address brings back the sample and its answer, from a server and from a folder; it is read out."""
    page = open_page(any_root + _URL + _link(_WINDOW)).page
    expect(_best(page)).to_contain_text("holds")
    expect(_best(page)).to_contain_text("Thermal oxide in buffered HF 5:1")
    expect(_said(page)).to_contain_text("Thermal oxide in buffered HF 5:1, holds, run to time")
    expect(page.get_by_label("Thickness").nth(1)).to_have_value("300 nm +/- 6 nm")
    page.get_by_label("Thickness").nth(1).fill("320 nm")
    page.wait_for_function("(old) => location.hash !== old", arg=_link(_WINDOW))
    address = page.url
    page.goto("about:blank")
    page.goto(address)
    expect(page.get_by_label("Thickness").nth(1)).to_have_value("320 nm")


def test_a_stack_is_built_by_keyboard(open_page: Open, http_root: str) -> None:
    """Names by synonym and formula, thickness with units, role, order: all without a mouse."""
    page = open_page(http_root + _URL).page
    keys = page.keyboard
    expect(_best(page)).to_contain_text("Add the layers of your sample")

    def add(film: str, thickness: str) -> None:
        page.locator("#plan-layers-add").focus()
        keys.press("Enter")
        keys.type(film)
        keys.press("Enter")
        keys.press("Tab")
        keys.type(thickness)

    add("positive resist a", "1.4 um")
    add("wet thermal ox", "5000 A")
    add("si-100", "525 um")
    roles = [page.locator(f"#plan-layers-{index}-role") for index in range(3)]
    assert [role.input_value() for role in roles] == ["mask", "target", "under"]
    films = [page.locator(f"#plan-layers-{index}-film").input_value() for index in range(3)]
    assert films[1].startswith("Silicon dioxide, thermal, wet")
    expect(page.locator("#plan-layers-0-thickness")).to_have_value("1.4 um")
    for field, value in (("plan-back", "protected"), ("plan-edge", "protected")):
        page.locator(f"#{field}").focus()
        page.locator(f"#{field}").select_option(value)
    expect(_best(page)).to_contain_text("buffered HF")
    expect(_said(page)).to_contain_text("holds, run to time")
    page.locator("#plan-layers-2-up").focus()
    keys.press("Enter")
    expect(page.locator("#plan-layers-1-up")).to_be_focused()
    expect(page.locator("#plan-layers-2-role")).to_have_value("target")
    expect(page.get_by_role("heading", name="Say this first")).to_be_visible()
    page.locator("#plan-layers-1-out").focus()
    keys.press("Enter")
    expect(page.locator("#plan-layers-add")).to_be_focused()
    expect(page.locator(".plan-row")).to_have_count(2)


def test_an_option_opens_by_keyboard_and_keeps_the_focus(open_page: Open, http_root: str) -> None:
    """Enter opens an option: section, every film with both losses, reasons, links to the evidence."""
    page = open_page(http_root + _URL + _link(_WINDOW)).page
    head = page.locator(".plan-head").first
    head.focus()
    page.keyboard.press("Enter")
    expect(head).to_have_attribute("aria-expanded", "true")
    expect(head).to_be_focused()
    detail = page.locator(".plan-detail").first
    expect(detail.get_by_role("img", name=re.compile("^Section before and after"))).to_be_visible()
    expect(detail.locator("tbody tr")).to_have_count(2)
    expect(detail.get_by_role("img", name=re.compile("^loses .*may lose")).first).to_be_attached()
    expect(detail.locator('a[href="../recipes/oxide-bhf.html"]')).to_be_visible()
    expect(detail.locator('a[href="../films/si-100.html"]')).to_be_visible()
    expect(detail.locator('a[href="../etchants/bhf-5-1.html"]')).to_be_visible()
    page.keyboard.press("Enter")
    expect(detail).to_be_hidden()
    page.get_by_role("button", name=re.compile("left out, and why")).click()
    expect(page.locator(".plan-excluded li").first).to_contain_text(": ")


def test_what_is_not_stated_is_asked_for(open_page: Open, http_root: str) -> None:
    """Gold asks what lies under it; the question leads to its field, and answering takes it away."""
    file = {key: value for key, value in _WINDOW.items() if key not in ("back", "edge")}
    file["also_exposed"] = [{"film": "au", "thickness": "200 nm"}]
    page = open_page(http_root + _URL + _link(file)).page
    asked = page.locator(".plan-asked")
    expect(asked.get_by_role("button", name="The film on the back, or that it is protected")).to_be_visible()
    asked.get_by_role("button", name=re.compile("^What lies under Gold")).click()
    expect(page.locator("#plan-also_exposed-0-on")).to_be_focused()
    page.keyboard.type("nothing")
    expect(asked.get_by_role("button", name=re.compile("^What lies under"))).to_have_count(0)
    asked.get_by_role("button", name="The film on the back, or that it is protected").click()
    expect(page.locator("#plan-back")).to_be_focused()


def test_a_fault_is_told_at_its_field(open_page: Open, http_root: str) -> None:
    """A length without a unit is marked, explained, and nothing is planned until it is mended."""
    page = open_page(http_root + _URL + _link(_WINDOW)).page
    field = page.locator("#plan-layers-1-thickness")
    field.fill("300")
    expect(field).to_have_attribute("aria-invalid", "true")
    expect(page.locator("#plan-layers-1-thickness-fault")).to_contain_text("needs a unit")
    expect(page.locator(".plan-option")).to_have_count(0)
    field.fill("0.3 um")
    expect(field).not_to_have_attribute("aria-invalid", "true")
    expect(_best(page)).to_contain_text("holds")


def test_examples_files_and_an_etchant_alone(open_page: Open, any_root: str, tmp_path: Path) -> None:
    """An example is one choice away; what is saved loads; published facts answer for an etchant."""
    page = open_page(any_root + _URL).page
    page.get_by_label(re.compile("^Start from one of")).select_option(label="first oxide window")
    expect(_best(page)).to_contain_text("holds")
    with page.expect_download() as saved:
        page.get_by_role("button", name="Save as a file").click()
    path = tmp_path / saved.value.suggested_filename
    saved.value.save_as(path)
    assert json.loads(path.read_text(encoding="utf-8"))["sample"] == "first oxide window"
    page.get_by_role("button", name="Start anew").click()
    expect(page.locator(".plan-row")).to_have_count(0)
    page.get_by_label("Load a sample file (JSON)").set_input_files(path)
    expect(_best(page)).to_contain_text("holds")
    page.get_by_label("Etched by").select_option("bhf-5-1")
    expect(page.locator(".plan-option")).to_have_count(1)
    expect(page.locator(".plan-option")).to_contain_text("alone")


_HOSTILE = '<img src=x onerror="window.hacked=1"><script>window.hacked=1</script>'


@pytest.mark.parametrize("way", ["link", "file"])
def test_hostile_text_stays_text(open_page: Open, http_root: str, tmp_path: Path, way: str) -> None:
    """Markup in any text of a sample is shown letter by letter and never runs."""
    film = {"film": _HOSTILE, "thickness": _HOSTILE, "on": _HOSTILE, "allowed_loss": _HOSTILE}
    file = {
        "sample": _HOSTILE,
        "layers": [{**film, "role": "target"}, {"film": "__proto__", "thickness": "1 um", "role": "under"}],
        "also_exposed": [film, {"film": "constructor", "thickness": "1 um"}],
        "limits": {"tools": [_HOSTILE], "etchants": [_HOSTILE]},
        "mount": {"carrier": _HOSTILE, "bond": _HOSTILE},
        "steps": [{"treat": "clean", "etchant": _HOSTILE, "time": _HOSTILE}, {"etch": _HOSTILE}],
    }
    if way == "link":
        page = open_page(f"{http_root}{_URL}{_raw_link(file)}").page
    else:
        page = open_page(http_root + _URL).page
        path = tmp_path / "wild.json"
        path.write_text(json.dumps(file), encoding="utf-8")
        page.get_by_label("Load a sample file (JSON)").set_input_files(path)
    expect(page.locator(".plan-asked")).to_contain_text('there is no film "<img src=x')
    expect(page.locator(".plan-asked")).to_contain_text('there is no film "constructor"')
    expect(page.locator(".plan-drawing")).to_contain_text("__proto__")
    assert page.locator(".plan img, .plan [onerror]").count() == 0
    assert page.evaluate("window.hacked") is None
    assert page.get_by_label("Name of the sample").input_value() == _HOSTILE


def _raw_link(file: dict[str, Any]) -> str:
    text = json.dumps(file)
    return "#s1=" + base64.urlsafe_b64encode(text.encode()).decode().rstrip("=")


def test_hostile_names_are_text_on_the_answers_too(open_page: Open, http_root: str) -> None:
    """Markup in the name and words of a sample that can be planned is text there and on its card."""
    file = {**_WINDOW, "sample": _HOSTILE, "mount": {"carrier": _HOSTILE, "bond": _HOSTILE}, "note": _HOSTILE}
    page = open_page(http_root + _URL + _link(file)).page
    expect(_best(page)).to_contain_text("holds")
    page.locator(".plan-head").first.click()
    page.get_by_role("button", name="Run card").click()
    expect(page.locator(".plan-card")).to_contain_text("<img src=x onerror=")
    assert page.locator(".plan img").count() == 0
    assert page.evaluate("window.hacked") is None


def test_an_unknown_link_explains_itself(open_page: Open, any_root: str) -> None:
    """A link of another version says what it could not restore, and the page works on."""
    page = open_page(any_root + _URL + "#s9=abc").page
    expect(page.locator(".plan-notices")).to_contain_text("form s9")
    page.locator("#plan-layers-add").click()
    expect(page.locator("#plan-layers-0-film")).to_be_focused()


def test_the_home_page_leads_here(open_page: Open, any_root: str) -> None:
    """The two questions of the home page become a sample."""
    page = open_page(any_root + "index.html").page
    page.get_by_label("What do you want to remove?").fill("wet thermal ox")
    page.keyboard.press("Enter")
    page.get_by_label("What must stay?").fill("positive resist a")
    page.keyboard.press("Enter")
    page.get_by_role("link", name="Plan it on your sample").click()
    expect(page.locator("#plan-layers-0-film")).to_have_value(re.compile("Silicon dioxide, thermal, wet"))
    expect(page.locator("#plan-also_exposed-0-film")).to_have_value(re.compile("Positive resist A"))
    expect(page.locator(".plan-notices")).to_contain_text("placeholders")
    expect(page.locator(".plan-option").first).to_be_visible()


@pytest.mark.parametrize("view", [_PHONE, _TABLET, DESKTOP], ids=["phone", "tablet", "desktop"])
@pytest.mark.parametrize("scheme", ["light", "dark"])
def test_axe_finds_nothing(open_page: Open, http_root: str, view: dict[str, int], scheme: str) -> None:
    """Form, open option and run card pass WCAG 2.2 AA as far as a program can tell; nothing sticks out."""
    page = open_page(http_root + _URL + _link(_WINDOW), viewport=view, color_scheme=scheme).page
    page.locator(".plan-head").first.click()
    page.get_by_role("button", name="Run card").click()
    expect(page.locator(".plan-card")).to_be_visible()
    options = {"runOnly": {"type": "tag", "values": _RULES}, "resultTypes": ["violations"]}
    result = Axe().run(page, options=options).response
    found = [
        (one["id"], one["nodes"][0]["target"], one["nodes"][0]["failureSummary"])
        for one in result["violations"]
    ]
    assert found == []
    assert len(result["passes"]) > 10
    assert page.evaluate("document.documentElement.scrollWidth") <= view["width"]
    small = """(all) => all.filter((e) => { const box = e.getBoundingClientRect();
      return box.width > 0 && (box.height < 24 || box.width < 24); }).map((e) => e.id || e.textContent)"""
    assert page.locator(".plan button, .plan select, .plan input[type=text]").evaluate_all(small) == []


def test_the_best_answer_stays_in_view_on_a_phone(open_page: Open, http_root: str) -> None:
    """Wherever one types on a phone, the best answer is on the screen, and no field hides behind it."""
    page = open_page(http_root + _URL + _link(_WINDOW), viewport=_PHONE).page
    for field in ("plan-layers-0-film", "plan-goal-line", "plan-temperature"):
        page.locator(f"#{field}").focus()
        best, box = _best(page).bounding_box(), page.locator(f"#{field}").bounding_box()
        assert best is not None and box is not None
        assert best["y"] >= 0 and best["y"] + best["height"] <= _PHONE["height"] + 1
        assert box["y"] + box["height"] <= best["y"] + 1
    stack = page.locator(".plan-stack").bounding_box()
    answers = page.locator(".plan-answers").bounding_box()
    assert stack is not None and answers is not None
    assert stack["y"] + stack["height"] <= answers["y"] + 1


def test_twenty_options_are_drawn_and_more_on_demand(browser: Browser, http_root: str) -> None:
    """With many recipes the best twenty are drawn; a button draws the next."""
    page = browser.new_page()
    many = """(() => { const facts = window.etchwrightFacts.facts, base = facts.etches["oxide-bhf"];
      for (let i = 10; i < 60; i += 1) facts.etches["copy-" + i] = {...base, id: "copy-" + i}; })();"""
    page.route("**/planner/facts.js", lambda route: route.fulfill(body=route.fetch().text() + many))
    page.goto(http_root + _URL + _link(_WINDOW))
    options = page.locator(".plan-option")
    expect(options).to_have_count(20)
    page.get_by_role("button", name=re.compile("^Show 20 more of")).click()
    expect(options).to_have_count(40)
    page.close()


def test_without_script_the_page_says_what_to_do(open_page: Open, any_root: str) -> None:
    """With JavaScript off the page names the command that answers the same question."""
    page = open_page(any_root + _URL, java_script_enabled=False).page
    expect(page.locator("article")).to_contain_text("etchwright plan")
    expect(page.get_by_role("heading", level=1)).to_have_text("Plan an etch")


def test_nothing_is_asked_from_outside(open_page: Open, any_root: str) -> None:
    """Planning and printing load nothing from beyond the site."""
    visit = open_page(any_root + _URL + _link(_WINDOW))
    visit.page.locator(".plan-head").first.click()
    visit.page.wait_for_load_state("networkidle")
    assert len(visit.requests) > 20
    assert [url for url in visit.requests if not url.startswith((any_root, "data:", "blob:", "about:"))] == []


def _sheets(page: Page) -> int:
    pdf = page.pdf(format="A4", prefer_css_page_size=True)
    return pdf.count(b"/Type /Page\n") or pdf.count(b"/Type /Page ")


def test_the_run_card_holds_what_the_bench_needs(open_page: Open, http_root: str) -> None:
    """Times, steps, waits, first action, waste, columns to fill in and the version of the records."""
    page = open_page(http_root + _URL + _link(_WINDOW)).page
    page.locator(".plan-head").first.click()
    page.get_by_role("button", name="Run card").click()
    expect(page.get_by_role("button", name="Close the card")).to_be_focused()
    card = page.locator(".plan-card")
    for words in (
        "Run to time:",
        "first after",
        "unevenness 2.5 %",
        "Found from 101 nm/min",
        "bath temperature 20 °C",
        "within 5 s",
        "Bare silicon sheds water",
        "Protective equipment",
        "calcium gluconate",
        "On skin",
        "Fluoride waste",
        "it authorises nothing",
        "Records as of",
    ):
        expect(card).to_contain_text(words)
    expect(card).to_contain_text(re.compile("version [0-9a-f]{12}"))
    header = (ROOT / "recipes" / "runs" / "oxide-bhf.csv").read_text(encoding="utf-8").splitlines()[1]
    lines = [text.split("\n") for text in page.locator(".plan-card-line").all_inner_texts()]
    assert [line[0] for line in lines] == header.split(",")
    assert [line for line in lines if len(line) > 1] == [["film", "sio2-thermal-wet"]]
    page.get_by_role("button", name="Close the card").click()
    expect(card).to_have_count(0)
    expect(page.get_by_role("button", name="Run card")).to_be_focused()


@pytest.mark.parametrize("stack", ["short", "long"])
def test_the_run_card_prints_on_one_sheet(
    open_page: Open, http_root: str, lab: PlannerLab, data: dict[str, Any], stack: str
) -> None:
    """The longest cards there are fit on one sheet of A4, in black on white, with nothing of the site."""
    cards = data["cards"]
    longest = sorted(cards, key=lambda id: len(json.dumps(cards[id])), reverse=True)
    sheets: dict[str, int] = {}
    page = open_page(http_root + _URL, color_scheme="dark", viewport=_A4_PX).page
    for id in longest:
        if len(sheets) == _LONGEST_CARDS:
            break
        target = {"film": lab.facts.etches[id].targets[0], "thickness": "200 nm", "role": "target"}
        mask, _, *below = _STACK["layers"]
        file: dict[str, Any] = {"sample": "card", "layers": [target, below[-1]]}
        if stack == "long":
            file = {**_STACK, "layers": [mask, target, *below]}
        page.evaluate("(hash) => { location.hash = hash; }", _link({**file, "steps": [{"etch": id}]}))
        expect(page.locator("#plan-steps-0-etch")).to_have_value(id)
        if not page.locator(".plan-head").count() or not page.get_by_text("stop by").count():
            continue  # left out on this sample, or nobody knows its time: there is no card to print
        page.locator(".plan-head").first.click()
        page.get_by_role("button", name="Run card").first.click()
        sheets[id] = _sheets(page)
    assert list(sheets.values()) == [1] * _LONGEST_CARDS, sheets
    page.emulate_media(media="print")
    expect(page.locator(".plan-stack")).to_be_hidden()
    expect(page.locator(".plan-card-actions")).to_be_hidden()
    assert page.evaluate("getComputedStyle(document.querySelector('.plan-card p')).color") == "rgb(0, 0, 0)"
    shades = page.evaluate(
        "[...document.querySelectorAll('.plan-card .ew-mark')].map((m) => getComputedStyle(m).color)"
    )
    assert set(shades) == {"rgb(0, 0, 0)"}


def _card_of(page: Page) -> str:
    page.locator(".plan-head").first.click()
    page.get_by_role("button", name="Run card").click()
    return page.locator(".plan-card").inner_text().replace("\N{NO-BREAK SPACE}", " ")


def test_the_card_tells_which_sample_and_what_its_own_numbers_mean(open_page: Open, http_root: str) -> None:
    """The sample as typed, the planned time in its step, the look to expect, boxes to tick; no loose end."""
    card = _card_of(open_page(http_root + _URL + _link(_STACK)).page)
    for words in (
        "Positive resist A (novolak type), 1.4 µm, mask, may lose 1.3 µm (lab's default)",
        "Silicon nitride, LPCVD, stoichiometric, 150 nm, stays, may lose 10 nm\n",
        "Silicon, single crystal (100), 525 µm, stays, reached from the back, may lose 5.0 nm",
        "Back: Silicon dioxide, thermal, wet grown, 300 nm, may vanish. Edge: protected. Each edge moves ",
        "Etch, 3 min 20 s:",
        "Under your target lies Silicon nitride, LPCVD, stoichiometric: expect its look",
        "Never beyond the latest stop, 3 min 20 s in all, without a new plan.",
        "Verify against the SDS; sources on the page of the chemical.",
        "u_nm Standard uncertainty (k = 1) of one thickness reading",
        "Protective equipment read:\n",
        "Run by / date",
    ):
        assert words in card
    assert "by plan" not in card
    assert "sources below" not in card


def test_a_card_for_look_and_finish_has_both_times_and_the_test_to_run(
    open_page: Open, http_root: str
) -> None:
    """Where the timer alone does not do, the step says first look and latest stop; a test piece is named."""
    file = {**_STACK, "steps": [{"etch": "oxide-rie"}]}
    card = _card_of(open_page(http_root + _URL + _link(file)).page)
    assert re.search(r"Etch, first look [\d a-z]+, latest stop [\d a-z]+:", card)
    assert "What would settle it" in card
    assert "Etch a test piece of" in card


@pytest.mark.parametrize("way", ["mouse", "Enter", "Space"])
def test_only_the_print_button_prints(open_page: Open, http_root: str, way: str) -> None:
    """Showing the card opens no dialog; its own button does."""
    page = open_page(http_root + _URL + _link(_WINDOW)).page
    page.evaluate("() => { window.printed = 0; window.print = () => { window.printed += 1; }; }")
    page.locator(".plan-head").first.click()
    button = page.get_by_role("button", name="Run card")
    if way == "mouse":
        button.click()
    else:
        button.focus()
        page.keyboard.press(way)
    expect(page.get_by_role("button", name="Close the card")).to_be_focused()
    assert page.evaluate("window.printed") == 0
    page.get_by_role("button", name="Print the card").click()
    assert page.evaluate("window.printed") == 1


def test_drawing_and_table_say_the_same_loss(open_page: Open, http_root: str) -> None:
    """One film has one worst loss wherever it stands, and none loses more than there is of it."""
    page = open_page(http_root + _URL + _link(_STACK)).page
    page.locator(".plan-head").first.click()
    detail = page.locator(".plan-detail").first
    told = str(detail.get_by_role("img", name=re.compile("^Section before")).get_attribute("aria-label"))
    rows = {row.split("\n")[0]: row for row in detail.locator("tbody tr").all_inner_texts()}
    for film in ("Positive resist A (novolak type)", "Silicon nitride, LPCVD, stoichiometric"):
        drawn = re.search(re.escape(film) + r": at worst ([\d.]+\s\S+) gone", told)
        assert drawn is not None
        row = next(text for name, text in rows.items() if film in name)
        assert f"At worst {drawn[1]} of" in row
    assert "back: Silicon dioxide, thermal, wet grown: at worst all of it gone" in told
    back = next(text for text in rows.values() if "may vanish" in text)
    assert "loses all of it" in back
    assert "336" not in back


def test_a_field_left_empty_shows_what_counts(open_page: Open, http_root: str) -> None:
    """The lab's default stands in the empty field and follows the thickness; a thin film has none."""
    page = open_page(http_root + _URL + _link(_STACK)).page

    def shown(field: str) -> str:
        text = page.locator(f"#plan-{field}-allowed_loss").get_attribute("placeholder")
        return str(text).replace("\N{NO-BREAK SPACE}", " ")

    assert shown("layers-3") == "5.0 nm (lab's default)"
    assert shown("layers-0") == "1.3 µm, in plasma 1.1 µm (lab's default)"
    assert shown("layers-2") == "7.5 nm (lab's default)"
    page.locator("#plan-layers-2-thickness").fill("400 nm")
    assert shown("layers-2") == "10 nm (lab's default)"
    page.locator("#plan-layers-2-thickness").fill("15 nm")
    assert shown("layers-2") == "no default below 20 nm: say how much"


def test_what_is_wrong_stays_in_view_and_moves_no_box(open_page: Open, http_root: str) -> None:
    """Beside a long form the answers' head says what is missing; a fault leaves its line of boxes alone."""
    page = open_page(http_root + _URL + _link(_STACK)).page
    page.locator("#plan-layers-1-film").fill("termal oxyde")
    page.keyboard.press("Escape")
    fault = page.locator("#plan-layers-1-film-fault")
    expect(fault).to_contain_text('there is no film "termal oxyde"; did you mean Silicon dioxide, thermal')
    tops = [page.locator(f"#plan-layers-1-{name}").bounding_box() for name in ("film", "thickness")]
    assert tops[0] is not None and tops[1] is not None
    assert tops[0]["y"] == pytest.approx(tops[1]["y"], abs=1)
    page.locator("#plan-mount-bond").scroll_into_view_if_needed()
    page.mouse.wheel(0, 10_000)
    expect(_best(page)).to_contain_text("did you mean")
    expect(_best(page)).to_be_in_viewport(ratio=1)


def test_a_phone_leads_from_the_line_to_the_answers(open_page: Open, http_root: str) -> None:
    """The line at the bottom has a way to the answers; each film's reason is read without a sideways step."""
    page = open_page(http_root + _URL + _link(_STACK), viewport=_PHONE).page
    page.get_by_role("button", name="Answers", exact=True).click()
    expect(page.locator("#plan-answers-title")).to_be_in_viewport()
    expect(page.locator("#plan-answers-title")).to_be_focused()
    page.locator(".plan-head").first.click()
    box = page.locator(".plan-films-box").first
    assert box.evaluate("(box) => box.scrollWidth <= box.clientWidth")
    reason = box.locator("td").nth(2).bounding_box()
    assert reason is not None and reason["x"] + reason["width"] <= _PHONE["width"]


def test_words_that_are_no_name_are_asked_about(open_page: Open, http_root: str) -> None:
    """Words in any order suggest the film; left unchosen they name nothing, and the likeliest are offered."""
    page = open_page(http_root + _URL + _link(_STACK)).page
    field = page.locator("#plan-layers-2-film")
    field.fill("stoichiometric LPCVD nitride silicon")
    page.keyboard.press("Escape")
    page.keyboard.press("Tab")
    expect(page.locator("#plan-layers-2-film-fault")).to_contain_text("did you mean Silicon nitride, LPCVD")
    field.fill("stoichiometric LPCVD nitride  silicon")
    page.keyboard.press("Enter")
    expect(field).to_have_value("Silicon nitride, LPCVD, stoichiometric")
    expect(_best(page)).to_contain_text("holds")
