"""A recipe's page on a first visit, over a bad line in a basement."""

from __future__ import annotations

import gzip
from pathlib import Path
from urllib.parse import urlsplit

from tests.browser import Open
from tests.site.page_kinds import PAGES

_MOST_PACKED = 130_000
_MOST_RAW = 420_000


def test_a_recipe_page_is_light(open_page: Open, http_root: str, shipped_site: Path) -> None:
    """All that a first visit loads before anybody searches stays within its budget."""
    visit = open_page(http_root + PAGES["recipe, many runs"])
    visit.page.wait_for_timeout(500)
    paths = {urlsplit(url).path.lstrip("/") for url in visit.requests if url.startswith(http_root)}
    loaded = {path: (shipped_site / path).read_bytes() for path in paths if "search_index" not in path}
    assert {"html", "css", "js"} <= {path.rpartition(".")[2] for path in loaded}
    raw = {path: len(content) for path, content in loaded.items()}
    packed = {path: len(gzip.compress(content, 6)) for path, content in loaded.items()}
    assert sum(raw.values()) <= _MOST_RAW, raw
    assert sum(packed.values()) <= _MOST_PACKED, packed
