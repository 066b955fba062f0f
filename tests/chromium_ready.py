"""Finds the browser that the browser tests drive; run as `python -m tests.chromium_ready` to be told."""

from __future__ import annotations

import shutil
import sys
from pathlib import Path

from playwright.sync_api import sync_playwright

HOW_TO_GET_ONE = (
    "no Chromium for the browser tests; on Debian `apt-get install -y chromium`, "
    "anywhere `.venv/bin/python -m playwright install chromium`"
)


def chromium_on_path() -> str | None:
    """Return the Chromium of the system, or None."""
    return shutil.which("chromium") or shutil.which("chromium-browser")


def chromium_of(downloaded: str) -> str | None:
    """Return the Chromium to drive: the system's, else the one at `downloaded` if it is there, else None."""
    return chromium_on_path() or (downloaded if Path(downloaded).is_file() else None)


def main() -> int:
    """Print the browser's path and return 0, or say how to get one and return 1."""
    with sync_playwright() as playwright:
        found = chromium_of(playwright.chromium.executable_path)
    if found is None:
        print(HOW_TO_GET_ONE, file=sys.stderr)
        return 1
    print(f"browser tests use {found}")
    return 0


if __name__ == "__main__":
    sys.exit(main())
