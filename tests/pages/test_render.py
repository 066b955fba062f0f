"""Text of records stays text, in pages and in scripts."""

from __future__ import annotations

import json
from html.parser import HTMLParser

from hypothesis import given
from hypothesis import strategies as st

from builder.pages.formulas import with_formulas
from builder.pages.render import render_page, script_json
from builder.views.link import Link
from builder.views.record_lists import ListEntry, ListGroup, ListPage

_NASTY = "<script>alert(1)</script>\"' onload=x &amp; javascript:alert(1)"


class _Elements(HTMLParser):
    def __init__(self) -> None:
        super().__init__(convert_charrefs=True)
        self.tags: list[str] = []
        self.attributes: list[str] = []
        self.text = ""

    def handle_starttag(self, tag: str, attrs: list[tuple[str, str | None]]) -> None:
        self.tags.append(tag)
        self.attributes += [name for name, _ in attrs]

    def handle_data(self, data: str) -> None:
        self.text += data


def _list_page(name: str) -> ListPage:
    entry = ListEntry(Link(name, "films/x.html"), name, name, "oxide")
    return ListPage("films/index.html", name, "d", "s", name, (ListGroup("a", name, (entry,)),))


@given(st.text(max_size=40).map(lambda text: text + _NASTY))
def test_record_text_never_becomes_markup(name: str) -> None:
    """Whatever a record says, the page holds it as text and gains no element by it."""
    page = render_page("record_list", _list_page(name))
    elements, harmless = _Elements(), _Elements()
    elements.feed(page.html)
    harmless.feed(render_page("record_list", _list_page("plain")).html)
    assert elements.tags == harmless.tags
    assert elements.attributes == harmless.attributes
    assert _NASTY in elements.text


@given(
    st.recursive(
        st.text() | st.integers() | st.none(),
        lambda inner: st.lists(inner) | st.dictionaries(st.text(), inner),
    )
)
def test_script_data_cannot_end_its_script(value: object) -> None:
    """JSON in a script reads back the same and holds no character with a meaning in HTML."""
    text = str(script_json(value))
    assert json.loads(text) == value
    assert not set(text) & set("<>&\u2028\u2029")


def test_headings_and_links_of_a_page() -> None:
    """A page knows its headings, and its links are relative to it."""
    page = render_page("record_list", _list_page("Gold & more"))
    assert [(heading.anchor, heading.text) for heading in page.headings] == [("a", "Gold & more")]
    assert 'href="x.html"' in page.html


def test_formulas_become_mathml() -> None:
    """Blocks and inline formulas are drawn; text without a formula is left alone."""
    html = with_formulas("with $h_0$:\n\n$$R = \\frac{d}{t}$$\n")
    assert html.count("<math") == 2
    assert "<mfrac>" in html
    assert "$" not in html
    assert with_formulas("| a | b |") == "| a | b |"
