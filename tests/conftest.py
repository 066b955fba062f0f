"""Fixtures that every folder of tests may ask for, and how property tests are timed."""

from __future__ import annotations

from hypothesis import settings

from tests.browser import any_root, browser, file_root, http_root, open_page, shipped_site, windows

__all__ = [
    "any_root", "browser", "file_root", "http_root", "open_page", "shipped_site", "windows",
]  # fmt: skip

# A first call may import a library or a template; a deadline would fail on a busy machine only. The same
# examples on every run: a change is judged by what it changes, not by luck.
settings.register_profile("etchwright", deadline=None, derandomize=True)
settings.load_profile("etchwright")
