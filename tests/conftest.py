"""Fixtures that every folder of tests may ask for."""

from __future__ import annotations

from tests.browser import any_root, browser, file_root, http_root, open_page, shipped_site

__all__ = ["any_root", "browser", "file_root", "http_root", "open_page", "shipped_site"]
