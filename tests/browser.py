"""One Chromium a test process, and the site of the shipped records, served and as a folder."""

from __future__ import annotations

import fcntl
import threading
from collections.abc import Callable, Iterator
from contextlib import contextmanager
from dataclasses import dataclass, field
from functools import partial
from http.server import SimpleHTTPRequestHandler, ThreadingHTTPServer
from pathlib import Path
from typing import Any

import pytest
from playwright.sync_api import Browser, ConsoleMessage, Page, sync_playwright

from builder.mkdocs_plugin import build_site
from builder.problems import format_text, has_errors
from tests.chromium_ready import HOW_TO_GET_ONE, chromium_of

ROOT = Path(__file__).resolve().parents[1]
DESKTOP = {"width": 1280, "height": 900}
_BROWSER_ARGS = (
    "--no-sandbox",
    "--disable-gpu",
    "--disable-dev-shm-usage",
    "--disable-quic",
    "--no-first-run",
    "--disable-background-networking",
    "--disable-component-update",
    "--disable-sync",
)
_TIMEOUT_MS = 15_000


@dataclass
class Visit:
    """A window with its page; `requests` and `faults` fill as things happen to it."""

    page: Page
    requests: list[str] = field(default_factory=list)
    faults: list[str] = field(default_factory=list)


Open = Callable[..., Visit]
"""Opens an address; keywords go to the browser's context (`color_scheme="dark"`, `viewport=…`)."""

Windows = dict[str, Visit]
"""Windows that stay open from test to test, by what they were opened with."""


class _QuietServer(ThreadingHTTPServer):
    # A browser that leaves a page breaks its connections; that is no fault of a test.
    def handle_error(self, request: object, client_address: object) -> None:
        pass


class _QuietHandler(SimpleHTTPRequestHandler):
    def log_message(self, format: str, *args: object) -> None:
        pass


@contextmanager
def served(folder: Path) -> Iterator[str]:
    """Serve a folder on a free local port; yield the address of its root, with the slash at the end."""
    server = _QuietServer(("127.0.0.1", 0), partial(_QuietHandler, directory=str(folder)))
    thread = threading.Thread(target=server.serve_forever, kwargs={"poll_interval": 0.05}, daemon=True)
    thread.start()
    try:
        yield f"http://127.0.0.1:{server.server_address[1]}/"
    finally:
        server.shutdown()
        server.server_close()
        thread.join()


@pytest.fixture(scope="session")
def shipped_site(tmp_path_factory: pytest.TempPathFactory, worker_id: str) -> Path:
    """The built site of the shipped records; built once, however many processes test it."""
    base = tmp_path_factory.getbasetemp()
    shared = base if worker_id == "master" else base.parent
    folder = shared / "shipped-site"
    with (shared / "shipped-site-lock").open("a") as lock:
        fcntl.flock(lock, fcntl.LOCK_EX)
        if not folder.exists():
            problems = build_site(ROOT, folder)
            assert not has_errors(problems), "\n".join(format_text(one) for one in problems)
    return folder


@pytest.fixture(scope="session")
def http_root(shipped_site: Path) -> Iterator[str]:
    """The address of the shipped site on a local server."""
    with served(shipped_site) as root:
        yield root


@pytest.fixture(scope="session")
def file_root(shipped_site: Path) -> str:
    """The address of the shipped site as a folder, as when somebody unpacks it from a stick."""
    return f"{shipped_site.as_uri()}/"


@pytest.fixture(params=["http", "file"])
def any_root(request: pytest.FixtureRequest) -> str:
    """The shipped site, once from a server and once from a folder."""
    return str(request.getfixturevalue(f"{request.param}_root"))


@pytest.fixture(scope="session")
def browser() -> Iterator[Browser]:
    """One Chromium for all tests of a process."""
    with sync_playwright() as playwright:
        found = chromium_of(playwright.chromium.executable_path)
        assert found is not None, HOW_TO_GET_ONE
        chromium = playwright.chromium.launch(executable_path=found, args=list(_BROWSER_ARGS))
        yield chromium
        chromium.close()


@pytest.fixture(scope="session")
def windows(browser: Browser) -> Iterator[Windows]:
    """Windows that stay open from test to test: what pages share is loaded once."""
    kept: Windows = {}
    yield kept
    for visit in kept.values():
        visit.page.context.close()


@pytest.fixture
def open_page(browser: Browser, windows: Windows) -> Iterator[Open]:
    """Opens pages, each in a window of its own; an error a page's script throws fails the test at its end."""
    used: list[Visit] = []

    def open_(url: str, **options: Any) -> Visit:
        key = repr((sorted(options.items()), len(used)))
        if key not in windows:
            windows[key] = _window(browser, options)
        visit = windows[key]
        _clear(visit, options)
        used.append(visit)
        visit.page.goto(url)
        return visit

    yield open_
    assert [fault for visit in used for fault in visit.faults] == []


def _clear(visit: Visit, options: dict[str, Any]) -> None:
    """Leave nothing of the last test in a window: neither its page nor what it set or chose."""
    page = visit.page
    page.unroute_all()
    page.context.clear_cookies()
    if page.url.startswith("http"):
        page.evaluate("() => { localStorage.clear(); sessionStorage.clear(); }")
    page.goto("about:blank")
    page.set_viewport_size(options.get("viewport", DESKTOP))
    page.emulate_media(
        media="null",
        color_scheme=options.get("color_scheme", "light"),
        forced_colors=options.get("forced_colors", "none"),
        reduced_motion=options.get("reduced_motion", "no-preference"),
    )
    visit.requests.clear()
    visit.faults.clear()


def _window(browser: Browser, options: dict[str, Any]) -> Visit:
    context = browser.new_context(**{"viewport": DESKTOP, **options})
    context.set_default_timeout(_TIMEOUT_MS)
    visit = Visit(context.new_page())
    context.on("request", lambda request: visit.requests.append(request.url))
    visit.page.on("pageerror", lambda error: visit.faults.append(str(error)))
    visit.page.on("console", lambda message: _note(visit, message))
    return visit


def _note(visit: Visit, message: ConsoleMessage) -> None:
    if message.type == "error":
        visit.faults.append(message.text)
