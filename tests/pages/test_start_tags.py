"""Start tags found as the standard library's parser finds them."""

from __future__ import annotations

from html.parser import HTMLParser
from pathlib import Path

import pytest

from builder.pages.start_tags import start_tags


class _Standard(HTMLParser):
    def __init__(self) -> None:
        super().__init__(convert_charrefs=True)
        self.found: list[tuple[str, list[tuple[str, str]]]] = []

    def handle_starttag(self, tag: str, attrs: list[tuple[str, str | None]]) -> None:
        valued = [(name, value) for name, value in attrs if value]
        if valued:
            self.found.append((tag, valued))


def _by_standard(text: str) -> list[tuple[str, list[tuple[str, str]]]]:
    parser = _Standard()
    parser.feed(text)
    parser.close()
    return parser.found


def _ours(text: str) -> list[tuple[str, list[tuple[str, str]]]]:
    tags = [(tag.name, [one for one in tag.attributes if one[1]]) for tag in start_tags(text)]
    return [tag for tag in tags if tag[1]]


@pytest.mark.parametrize(
    "text",
    [
        "<a href='x>y' title=\"it's\">z</a>",
        "<A HREF=plain.html>z</A><img src=a.png alt=b/>",
        "<!-- <a href='no'> --><b id='yes'>",
        "<script>if (a<b) x='<a href=no>';</script><i id='yes'></i>",
        "<a href='a&amp;b?c=1&#38;d'>x</a>",
        "<input disabled value='1' hidden>",
        "a < b, 1<2, <p\nid='two'\nclass='lines'>",
        "<style>a > b { content: '<i id=no>' }</style><i id=x>",
    ],
)
def test_tags_are_those_of_the_standard_parser(text: str) -> None:
    """Quotes, capitals, comments, scripts, references and line breaks."""
    assert _ours(text) == _by_standard(text)
    assert _ours(text)


def test_all_pages_of_the_built_site_read_alike(shipped_site: Path) -> None:
    """On real pages, from our templates, the theme and Markdown, nothing is missed and nothing made up."""
    pages = sorted(shipped_site.rglob("*.html"))
    assert len(pages) > 400
    for page in pages[::25]:
        text = page.read_text(encoding="utf-8")
        assert _ours(text) == _by_standard(text), page.name


def test_a_tag_tells_where_it_stands() -> None:
    """The place of a tag is that of its bracket."""
    text = "<p>\n  <a href='x'>y</a>"
    assert [text[tag.offset :] for tag in start_tags(text)] == ["<a href='x'>y</a>"]
