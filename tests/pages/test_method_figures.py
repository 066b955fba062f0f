"""Figures and formulas of the hand-written pages."""

from __future__ import annotations

import re
from pathlib import Path
from xml.etree import ElementTree

import pytest

from builder.pages.formulas import with_formulas
from builder.pages.method_drawings import DRAWINGS
from builder.pages.method_figures import UnknownFigureError, with_figures

_DOCS = Path(__file__).resolve().parents[2] / "docs"
_NOTES = sorted((_DOCS / "methods").glob("*.md"))
_MATHML = "{http://www.w3.org/1998/Math/MathML}"


def _call(name: str) -> str:
    return f"<p>before</p><!-- figure {name}: Some\n words. --><p>after</p>"


@pytest.mark.parametrize("name", DRAWINGS)
def test_a_figure_takes_the_colours_of_the_page(name: str) -> None:
    """A figure is whole SVG with a caption that names it, and its only colours are the page's own."""
    html = with_figures(_call(name))
    figure = html.removeprefix("<p>before</p>").removesuffix("<p>after</p>")
    root = ElementTree.fromstring(figure)
    caption = root.find("figcaption")
    assert caption is not None and caption.text == "Some words."
    svg = root.find("{http://www.w3.org/2000/svg}svg")
    assert svg is not None and svg.get("aria-labelledby") == caption.get("id")
    assert set(re.findall(r"#[0-9a-fA-F]{6}\b", figure)) == set()
    assert "var(--ew-ink)" in figure
    assert "metadata" not in figure


def test_figures_of_one_page_share_no_anchor() -> None:
    """Every id stands once, and what a figure refers to is within it."""
    html = with_figures("".join(_call(name) for name in DRAWINGS))
    ids = re.findall(r'\bid="([^"]+)"', html)
    assert len(ids) == len(set(ids)) > len(DRAWINGS)
    used = set(re.findall(r'xlink:href="#([^"]+)"', html)) | set(re.findall(r"url\(#([^)]+)\)", html))
    assert used <= set(ids)
    assert with_figures("".join(_call(name) for name in DRAWINGS)) == html


def test_an_unknown_figure_is_refused() -> None:
    """A misspelt name stops the build; it does not leave a gap in a page."""
    with pytest.raises(UnknownFigureError, match="depth-line"):
        with_figures(_call("no-such"))


def test_every_figure_is_used_and_every_note_has_one() -> None:
    """The method notes show each figure once."""
    called = {
        path.name: re.findall(r"<!-- figure ([a-z-]+):", path.read_text(encoding="utf-8")) for path in _NOTES
    }
    assert sorted(name for names in called.values() for name in names) in (
        sorted(DRAWINGS),
        sorted([*DRAWINGS, "limit"]),
    )
    assert len(called) >= 7


@pytest.mark.parametrize("path", _NOTES, ids=lambda path: path.stem)
def test_every_block_formula_says_where_it_is_valid(path: Path) -> None:
    """After a formula comes, before the next heading, the range in which it is valid, or its source."""
    sections = re.split(r"^## ", path.read_text(encoding="utf-8"), flags=re.MULTILINE)
    silent = [
        section.splitlines()[0]
        for section in sections
        if "$$" in section and not re.search(r"\b(Valid|Source:|common practice, no source)", section)
    ]
    assert silent == []


@pytest.mark.parametrize("path", _NOTES, ids=lambda path: path.stem)
def test_formulas_become_mathml(path: Path) -> None:
    """Every formula of a note turns into well-formed MathML, and no dollar sign is left."""
    text = path.read_text(encoding="utf-8")
    drawn = with_formulas(text)
    assert "$" not in drawn
    written = len(re.findall(r"\$\$.+?\$\$|\$[^$\n]+\$", text, flags=re.DOTALL))
    found = re.findall(r"<math.*?</math>", drawn, flags=re.DOTALL)
    assert len(found) == written
    for formula in found:
        assert ElementTree.fromstring(formula).tag == f"{_MATHML}math"


def test_a_formula_at_the_start_of_a_line_stays_in_its_sentence() -> None:
    """Markdown takes a bare formula element for a block; ours is within a span."""
    assert with_formulas("of a loss\n$u$ and").startswith("of a loss\n<span><math")
