"""What is taken out of pages and style sheets changes nothing that a browser shows."""

from __future__ import annotations

import re
from pathlib import Path

import pytest

from builder.pages.lean_text import lean_css, lean_html

_ROOT = Path(__file__).resolve().parents[2]
_ASSETS = _ROOT / "docs" / "assets"
_PAGES = _ROOT / "builder" / "pages"


def test_indents_go_and_words_stay_apart() -> None:
    """A line break is left where a browser sees a blank."""
    assert lean_html("<p>one\n\n    two</p>\n  <p>three</p>") == "<p>one\ntwo</p>\n<p>three</p>"


def test_our_pages_hold_no_preformatted_text() -> None:
    """Or its line breaks would be lost."""
    templates = list((_PAGES / "templates").glob("*.j2")) + list((_PAGES / "theme").rglob("*.html"))
    assert len(templates) > 20
    for path in templates:
        assert not re.search(r"<pre\b|<textarea\b", path.read_text(encoding="utf-8")), path
    for sheet in _ASSETS.glob("*.css"):
        assert not re.search(r"white-space:\s*(pre|break-spaces)", sheet.read_text(encoding="utf-8")), sheet


@pytest.mark.parametrize("sheet", ["etchwright.css", "matrices.css", "planner/planner.css"])
def test_a_style_sheet_loses_its_comments_only(sheet: str) -> None:
    """Every rule is left as it was, and nothing that the pattern would cut stands in a quoted text."""
    text = (_ASSETS / sheet).read_text(encoding="utf-8")
    lean = lean_css(text)
    assert "/*" not in lean and len(lean) < len(text)
    assert not re.search(r"""["'][^"'\n]*/\*""", text)
    for part in "{};":
        assert lean.count(part) == re.sub(r"/\*.*?\*/", "", text, flags=re.DOTALL).count(part)
