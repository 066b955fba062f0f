"""A recipe's page on a first visit, over a bad line in a basement."""

from __future__ import annotations

import gzip
from pathlib import Path
from urllib.parse import urlsplit

from tests.browser import Open
from tests.site.page_kinds import PAGES

_MOST_PACKED = 130_000
_MOST_RAW = 420_000


def _loaded(open_page: Open, http_root: str, site: Path, url: str) -> dict[str, bytes]:
    visit = open_page(http_root + url)
    visit.page.wait_for_timeout(500)
    paths = {urlsplit(one).path.lstrip("/") for one in visit.requests if one.startswith(http_root)}
    loaded = {path: (site / path).read_bytes() for path in paths if "search_index" not in path}
    assert {"html", "css", "js"} <= {path.rpartition(".")[2] for path in loaded}
    return loaded


def test_a_recipe_page_is_light(open_page: Open, http_root: str, shipped_site: Path) -> None:
    """All that a first visit loads, without the search's index, stays within its budget."""
    pages = sorted((shipped_site / "recipes").glob("[!i]*.html"), key=lambda path: path.stat().st_size)
    usual = pages[len(pages) // 2]
    loaded = _loaded(open_page, http_root, shipped_site, f"recipes/{usual.name}")
    raw = {path: len(content) for path, content in loaded.items()}
    packed = {path: len(gzip.compress(content, 6)) for path, content in loaded.items()}
    assert sum(raw.values()) <= _MOST_RAW, raw
    assert sum(packed.values()) <= _MOST_PACKED, packed


def test_the_longest_recipe_page_is_light_on_the_line(
    open_page: Open, http_root: str, shipped_site: Path
) -> None:
    """Many runs make a long page; packed, as a server sends it, it stays within the same budget."""
    loaded = _loaded(open_page, http_root, shipped_site, PAGES["recipe, many runs"])
    packed = {path: len(gzip.compress(content, 6)) for path, content in loaded.items()}
    assert sum(packed.values()) <= _MOST_PACKED, packed
