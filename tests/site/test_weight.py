"""A recipe's page on a first visit, over a bad line in a basement."""

from __future__ import annotations

import gzip
from pathlib import Path
from urllib.parse import urlsplit

from tests.browser import Open
from tests.site.page_kinds import recipe_pages

_MOST_PACKED = 130_000
_MOST_RAW = 420_000


def _packed(content: bytes) -> int:
    return len(gzip.compress(content, 6))


def test_every_recipe_page_is_light(open_page: Open, http_root: str, shipped_site: Path) -> None:
    """All that a first visit loads, without the search's index, stays within its budget on every page."""
    pages = {path: path.read_bytes() for path in recipe_pages(shipped_site)}
    assert len(pages) > 30
    # One page's company is every page's: what else they load differs in nothing.
    longest = max(pages, key=lambda path: len(pages[path]))
    visit = open_page(f"{http_root}recipes/{longest.name}")
    visit.page.wait_for_load_state("networkidle")
    paths = {urlsplit(one).path.lstrip("/") for one in visit.requests if one.startswith(http_root)}
    company = {
        path: (shipped_site / path).read_bytes()
        for path in paths - {f"recipes/{longest.name}"}
        if "search_index" not in path
    }
    assert {"css", "js"} <= {path.rpartition(".")[2] for path in company}
    raw = sum(map(len, company.values()))
    packed = sum(map(_packed, company.values()))
    assert {path.name: raw + len(page) for path, page in pages.items() if raw + len(page) > _MOST_RAW} == {}
    heavy = {path.name: packed + _packed(page) for path, page in pages.items()}
    assert {name: size for name, size in heavy.items() if size > _MOST_PACKED} == {}
