"""What the safety pages say: nothing blank, nothing called safe, every word with its evidence."""

from __future__ import annotations

import re
from datetime import date
from html import unescape
from pathlib import Path

import pytest

from builder.findings.computed import compute
from builder.pages.page import Page
from builder.pages.render import render_page
from builder.records.terms import MixingSeverity
from builder.views.chemical_page import chemical_page
from builder.views.etchant_page import etchant_page
from builder.views.safety_container_matrix import container_matrix
from builder.views.safety_film_matrix import film_matrix
from builder.views.safety_first_etch import first_etch_page
from builder.views.safety_hf import hydrofluoric_page
from builder.views.safety_matrix import MatrixPage
from builder.views.safety_mixing_matrix import chemical_matrix, group_matrix
from builder.views.safety_overview import overview_page
from builder.views.safety_plasma import plasma_page
from builder.views.safety_sheet import bench_sheet
from builder.views.safety_words import STANDING_SENTENCE, pending_words
from tests.safety.shipped import ROOT, shipped_records

RECORDS = shipped_records()
COMPUTED = compute(RECORDS, date(2026, 11, 15))
HAZARDOUS = sorted(one.id for one in RECORDS.chemicals.values() if one.hazardous)
MATRICES: dict[str, MatrixPage] = {
    view.url: view
    for view in (
        chemical_matrix(RECORDS),
        group_matrix(RECORDS),
        film_matrix(RECORDS),
        container_matrix(RECORDS),
    )
}
_TAG = re.compile(r"<[^>]+>")


def _text(page: Page) -> str:
    return re.sub(r"\s+", " ", unescape(_TAG.sub(" ", page.html)))


def _chemical(name: str) -> str:
    return _text(render_page("chemical", chemical_page(RECORDS, RECORDS.chemicals[name])))


@pytest.mark.parametrize("name", HAZARDOUS)
def test_the_page_of_a_hazardous_chemical_says_all_that_is_known(name: str) -> None:
    """Statements in words, first action, waste, data sheet, local rules, and what is pending in words."""
    chemical = RECORDS.chemicals[name]
    text = _chemical(name)
    assert STANDING_SENTENCE in text
    for code in chemical.h_codes:
        assert RECORDS.codes[code.lower()].meaning in text
    for words in pending_words(chemical.pending):
        assert f"{words} pending" in text.lower(), words
    if chemical.precaution is not None:
        precaution = RECORDS.precautions[chemical.precaution]
        for words in (precaution.ppe, precaution.first_action_skin, precaution.storage_and_waste):
            assert re.sub(r"\s+", " ", words) in text
    for rule in RECORDS.settings.local_rules:
        assert rule in text
    assert "Ask the supplier for the sheet" in text
    assert "Waste stream" in text


@pytest.mark.parametrize("name", sorted(RECORDS.etchants))
def test_the_page_of_an_etchant_inherits_and_leaves_no_blank(name: str) -> None:
    """Every statement of every part is on the page with the part's name; unknown parts are said in words."""
    etchant = RECORDS.etchants[name]
    text = _text(render_page("etchant", etchant_page(RECORDS, COMPUTED, etchant)))
    assert STANDING_SENTENCE in text
    for part in etchant.parts:
        chemical = RECORDS.chemicals[part.chemical]
        for code in chemical.h_codes:
            assert RECORDS.codes[code.lower()].meaning in text
        if "h_codes" in chemical.pending:
            assert f"Hazard statements of {chemical.name} are pending" in text
    if etchant.parts_unknown:
        assert "treat it as the worst they may be" in text
    if etchant.mixture is not None and etchant.mixture.order_of_mixing is not None:
        assert re.sub(r"\s+", " ", etchant.mixture.order_of_mixing) in text


def test_piranha_shows_its_order_gas_life_and_cap() -> None:
    """The four things that hurt people with piranha."""
    text = _text(render_page("etchant", etchant_page(RECORDS, COMPUTED, RECORDS.etchants["piranha"])))
    for words in ("Peroxide slowly into the acid", "Make fresh, do not store", "Never in a closed bottle"):
        assert words in text
    assert "Flammable solvents" in text or "Organic solvents" in text


@pytest.mark.parametrize("view", MATRICES.values(), ids=list(MATRICES))
def test_a_matrix_has_no_blank_and_no_loose_end(view: MatrixPage) -> None:
    """Each cell holds a word, each word that is no question mark has its evidence on the page."""
    anchors = [one.anchor for one in view.evidence]
    assert len(anchors) == len(set(anchors))
    for row in view.rows:
        assert len(row.cells) == len(view.heads)
        for cell in row.cells:
            assert cell.mark.strip()
            assert set(cell.evidence) <= set(anchors)
            if cell.mark not in ("?", "–", "gas?"):
                assert cell.evidence, cell
    text = _text(render_page("safety_matrix", view))
    assert "no record:" in text
    assert STANDING_SENTENCE in text


@pytest.mark.parametrize("url", ["safety/mixing.html", "safety/groups.html"])
def test_a_mixing_matrix_reads_the_same_both_ways(url: str) -> None:
    """Row and column of a pair hold the same word."""
    view = MATRICES[url]
    words = [[cell.mark for cell in row.cells] for row in view.rows]
    assert words == [list(column) for column in zip(*words, strict=True)]


def test_the_gravest_rule_names_the_cell() -> None:
    """A pair that one rule forbids and another cautions is forbidden."""
    for row in MATRICES["safety/mixing.html"].rows:
        for cell in row.cells:
            rules = [RECORDS.mixing[anchor.removeprefix("rule-")] for anchor in cell.evidence]
            if any(rule.severity is MixingSeverity.FORBID for rule in rules):
                assert cell.mark == "never"


@pytest.mark.parametrize(
    ("material", "substance", "word"),
    [
        ("Borosilicate glass", "hf-49", "no"),
        ("Fused quartz", "hno3-nh4f-si", "no"),
        ("Polypropylene", "piranha", "no"),
        ("Polypropylene", "koh-30", "yes 80\u00a0°C"),
        ("HDPE", "pan-al", "?"),
    ],
)
def test_the_container_matrix_says_what_is_on_record(material: str, substance: str, word: str) -> None:
    """From the container records by hand; the second by the rule for acidic fluorides."""
    view = MATRICES["safety/containers.html"]
    column = [head.text for head in view.heads].index(material)
    row = next(row for row in view.rows if row.head.target == f"etchants/{substance}.html")
    assert row.cells[column].mark == word


@pytest.mark.parametrize(
    ("film", "chemical", "word"),
    [
        ("gaas", "hcl-37", "never PH3, AsH3"),
        ("inp", "h2so4-96", "gas?"),
        ("al-si", "koh", "care H2"),
        ("si-100", "tmah-25", "care H2"),
    ],
)
def test_the_film_matrix_names_the_gas(film: str, chemical: str, word: str) -> None:
    """Arsine and phosphine in acid, hydrogen in alkali."""
    view = MATRICES["safety/film-gas.html"]
    column = [head.text for head in view.heads].index(chemical)
    row = next(row for row in view.rows if row.head.text == RECORDS.films[film].name)
    assert row.cells[column].mark == word


def test_the_page_on_hydrofluoric_acid_says_what_must_be_there_first() -> None:
    """No lone work, gel in date, first action, physician, resist as a clock, all carriers of HF."""
    view = hydrofluoric_page(RECORDS)
    text = _text(render_page("safety_hf", view))
    for words in (
        "Nobody works alone",
        "Look at its date before each session",
        "calcium gluconate 2.5% gel",
        "The site physician",
        "Above about 10 % HF a novolak resist is a clock, not a mask",
        "common practice, no source",
        STANDING_SENTENCE,
    ):
        assert words in text, words
    linked = {link.target for link in view.etchants}
    assert {"etchants/hno3-nh4f-si.html", "etchants/bhf-5-1.html", "etchants/hf-vapour.html"} <= linked
    assert "etchants/pan-al.html" not in linked
    assert any(row.film.target == "films/resist-positive-a.html" for row in view.resists)


def test_the_other_pages_carry_the_standing_sentence() -> None:
    """Overview, plasma, first etch and every bench sheet defer to data sheet, rules and practice."""
    pages = [
        render_page("safety_overview", overview_page(RECORDS)),
        render_page("safety_plasma", plasma_page(RECORDS)),
        render_page("safety_first_etch", first_etch_page(RECORDS)),
        *(render_page("safety_sheet", bench_sheet(RECORDS, one)) for one in RECORDS.chemicals.values()),
    ]
    assert [page.url for page in pages if STANDING_SENTENCE not in _text(page)] == []


def test_every_plasma_hazard_is_on_the_plasma_page() -> None:
    """None of the 28 is lost, and each has its control."""
    rows = [row for group in plasma_page(RECORDS).groups for row in group.rows]
    assert len(rows) == len(RECORDS.hazards)
    assert all(row.control for row in rows)


def test_the_overview_lists_what_is_pending() -> None:
    """Whoever can supply a fact finds there which are missing."""
    listed = {row.what: len(row.where) for row in overview_page(RECORDS).pending}
    missing = [one.id for one in RECORDS.chemicals.values() if "h_codes" in one.pending]
    assert listed["hazard statements"] == len(missing)


def test_no_page_calls_anything_safe() -> None:
    """The word "safe" stands only in "safety" and in sentences that deny it."""
    for name in HAZARDOUS:
        assert not re.search(r"\b(is|are) safe\b", _chemical(name)), name


@pytest.mark.parametrize("code", sorted({p for one in RECORDS.chemicals.values() for p in one.pictograms}))
def test_every_pictogram_has_our_drawing(code: str) -> None:
    """A diamond of red line with the code in its title; drawn here, no picture from elsewhere in it."""
    text = Path(ROOT / "docs" / "assets" / "ghs" / f"{code.lower()}.svg").read_text(encoding="utf-8")
    assert f"<title>{code}: " in text
    assert 'd="M60 4 116 60 60 116 4 60Z"' in text
    assert "<image" not in text
    assert "href" not in text


@pytest.mark.parametrize("page", ["etchants/piranha", "chemicals/h2o2-30", "chemicals/hno3-70"])
def test_what_must_never_meet_it_stands_first(shipped_site: Path, page: str) -> None:
    """Before anything else the page names what its table says never to mix with it, groups by name."""
    html = (shipped_site / f"{page}.html").read_text(encoding="utf-8")
    first = html.partition("Must never meet:")[2].partition("</p>")[0]
    table = html.partition('<h2 id="must-not-meet">')[2].partition("</table>")[0]
    rows = [row for row in table.split("<tr>") if 'class="ew-never"' in row]
    assert rows and html.index("Must never meet:") < html.index('class="ew-caution"')
    for row in rows:
        head = re.sub(r"<[^>]*>", "", row.partition("</th>")[0])
        assert head.partition(":")[0].casefold() in first.casefold(), head


def test_no_page_of_a_substance_begins_with_a_blank(shipped_site: Path) -> None:
    """Where no forbidden pair is on record the page says so, and that it is no permission."""
    pages = [*(shipped_site / "chemicals").glob("*.html"), *(shipped_site / "etchants").glob("*.html")]
    said = {True: 0, False: 0}
    for path in pages:
        if path.name == "index.html":
            continue
        head = path.read_text(encoding="utf-8").partition('class="ew-caution"')[0]
        assert ("Must never meet:" in head) != ("No forbidden pair is on record." in head), path
        said["Must never meet:" in head] += 1
    assert min(said.values()) > 5
