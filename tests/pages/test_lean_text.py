"""What is taken out of pages and style sheets changes nothing that a browser shows."""

from __future__ import annotations

import re
from pathlib import Path

import pytest

from builder.pages.lean_text import lean_css, lean_html

_ASSETS = Path(__file__).resolve().parents[2] / "docs" / "assets"


def test_indents_go_and_words_stay_apart() -> None:
    """A line break is left where a browser sees a blank."""
    assert lean_html("<p>one\n\n    two</p>\n  <p>three</p>") == "<p>one\ntwo</p>\n<p>three</p>"


@pytest.mark.parametrize("sheet", ["etchwright.css", "matrices.css", "planner/planner.css"])
def test_a_style_sheet_loses_its_comments_only(sheet: str) -> None:
    """Every rule is left as it was, and nothing that the pattern would cut stands in a quoted text."""
    text = (_ASSETS / sheet).read_text(encoding="utf-8")
    lean = lean_css(text)
    assert "/*" not in lean and len(lean) < len(text)
    assert not re.search(r"""["'][^"'\n]*/\*""", text)
    for part in "{};":
        assert lean.count(part) == re.sub(r"/\*.*?\*/", "", text, flags=re.DOTALL).count(part)
