"""The host: hands finished pages to MkDocs. The only module that knows MkDocs and its events."""

from __future__ import annotations

import logging
import os
from collections.abc import Callable, Mapping
from datetime import date
from pathlib import Path
from typing import Any, Literal

from mkdocs.commands.build import build
from mkdocs.commands.serve import serve as serve_with_mkdocs
from mkdocs.config import config_options, load_config
from mkdocs.config.base import Config
from mkdocs.config.defaults import MkDocsConfig
from mkdocs.exceptions import PluginError
from mkdocs.plugins import BasePlugin, event_priority
from mkdocs.structure.files import File, Files, InclusionLevel
from mkdocs.structure.pages import Page as HostPage
from mkdocs.structure.toc import AnchorLink, TableOfContents

from builder import pipeline
from builder.pages.exchange import MARKER
from builder.pages.formulas import with_formulas
from builder.pages.lean_text import lean_css, lean_html
from builder.pages.method_figures import with_figures
from builder.pages.page import FinishedSite, Page
from builder.pages.shipped_files import find_docs, find_mkdocs_file, find_theme
from builder.problems import Problem, format_text

_log = logging.getLogger("mkdocs.plugins.etchwright")
_SECONDS_A_DAY = 86_400
_KINDS = {
    "recipes": "recipe", "films": "film", "etchants": "etchant", "chemicals": "chemical", "tools": "tool",
    "safety/sheets": "bench sheet",
}  # fmt: skip
_STYLE_SHEETS = ("assets/etchwright.css", "assets/matrices.css", "assets/planner/planner.css")
_EPOCH_DAY = date(1970, 1, 1)


class PluginConfig(Config):  # type: ignore[no-untyped-call]  # MkDocs leaves a hook untyped
    """Options of the plugin in `mkdocs.yml`."""

    lab = config_options.Type(str, default=".")


class EtchwrightPlugin(BasePlugin[PluginConfig]):  # type: ignore[no-untyped-call]
    """Pages from records, as generated files; see docs/decisions for why they bypass Markdown."""

    def __init__(self) -> None:
        super().__init__()
        self.site: FinishedSite | None = None
        self.given = False
        self.is_serving = False
        self._pages: Mapping[str, Page] = {}

    # MkDocs keeps a plugin from one reload to the next only if it has this event.
    def on_startup(self, *, command: Literal["build", "gh-deploy", "serve"], dirty: bool) -> None:
        """Remember whether this is `serve`, where a fault must not end the program."""
        self.is_serving = command == "serve"

    def on_config(self, config: MkDocsConfig) -> MkDocsConfig:
        """Read, check and compute everything, before MkDocs cleans the old site."""
        lab = Path(config.config_file_path).parent / self.config.lab
        config.watch.append(str(lab / "recipes"))
        if not self.given:
            self._prepare(lab)
        assert self.site is not None
        self._pages = {_source(page.url): page for page in self.site.pages}
        config.theme.dirs.insert(0, str(find_theme()))
        # Its absolute links work on one server only, and its search on none.
        config.theme.static_templates.discard("404.html")
        config.extra["etchwright"] = {"notice": self.site.notice, "as_of": self.site.as_of}
        return config

    def _prepare(self, lab: Path) -> None:
        prepared = pipeline.prepare(lab, pipeline.day_from_environment(os.environ), _silent)
        for problem in prepared.problems:
            _log.info(format_text(problem))
        if prepared.site is not None:
            self.site = prepared.site
        elif self.site is None or not self.is_serving:
            raise PluginError("\n".join(format_text(problem) for problem in prepared.problems))
        else:
            _log.error("the records have errors; the last good pages are kept")

    def on_files(self, files: Files, *, config: MkDocsConfig) -> Files:
        """Add our pages, and the shipped documents and assets that the lab does not have itself."""
        for source in self._pages:
            files.append(File.generated(config, source, content="", inclusion=InclusionLevel.NOT_IN_NAV))
        docs = find_docs()
        for path in sorted(docs.rglob("*")):
            name = path.relative_to(docs).as_posix()
            if path.is_file() and files.get_file_from_path(name) is None:
                files.append(File.generated(config, name, abs_src_path=str(path)))
        return files

    def on_page_markdown(self, markdown: str, *, page: HostPage, config: MkDocsConfig, files: Files) -> str:
        """Draw the formulas of a hand-written page."""
        return with_formulas(markdown)

    def on_page_content(self, html: str, *, page: HostPage, config: MkDocsConfig, files: Files) -> str:
        """Put in our finished HTML."""
        ours = self._pages.get(page.file.src_uri)
        if ours is None:
            return with_figures(html)
        # Only the meta title: the page's own one names its tab in the navigation.
        page.meta.update(
            {
                "title": ours.title,
                "description": ours.description,
                "search": {"exclude": True},
                "hide": ["navigation", "toc"],
            }
        )
        page.toc = TableOfContents([AnchorLink(h.text, h.anchor, h.level - 1) for h in ours.headings])
        page.present_anchor_ids = {heading.anchor for heading in ours.headings}
        return ours.html

    def on_post_page(self, output: str, *, page: HostPage, config: MkDocsConfig) -> str:
        """Take out the indents of the theme, on pages that hold no preformatted text."""
        return lean_html(output) if page.file.src_uri in self._pages else output

    def on_env(self, env: Any, *, config: MkDocsConfig, files: Files) -> None:
        """Add our own search entries; the theme's parser would take longer than the pages themselves."""
        search: Any = config.plugins.get("material/search") or config.plugins.get("search")
        if search is not None:
            search.search_index.entries += [
                {"location": page.url, "title": _found_as(page), "text": page.search_text}
                for page in self._pages.values()
            ]

    @event_priority(-50)
    def on_post_build(self, *, config: MkDocsConfig) -> None:
        """Write the data files, and the mark by which the site is known as ours."""
        assert self.site is not None
        for file in self.site.files:
            path = Path(config.site_dir) / file.url
            path.parent.mkdir(parents=True, exist_ok=True)
            path.write_bytes(file.content)
        for name in _STYLE_SHEETS:
            path = Path(config.site_dir) / name
            path.write_text(lean_css(path.read_text(encoding="utf-8")), encoding="utf-8")
        (Path(config.site_dir) / MARKER).touch()


def write_with_mkdocs(site: FinishedSite, lab_dir: Path, out_dir: Path) -> None:
    """Write a finished site by a MkDocs build into `out_dir`; the host that `pipeline.build_site` takes."""
    os.environ["NO_MKDOCS_2_WARNING"] = "1"
    # MkDocs stamps the site map with today; the day of the data makes two builds alike.
    seconds = (date.fromisoformat(site.as_of) - _EPOCH_DAY).days * _SECONDS_A_DAY
    before = os.environ.get("SOURCE_DATE_EPOCH")
    os.environ["SOURCE_DATE_EPOCH"] = str(seconds)
    try:
        config = load_config(str(find_mkdocs_file(lab_dir)), site_dir=str(out_dir))
        plugin = config.plugins["etchwright"]
        assert isinstance(plugin, EtchwrightPlugin)
        plugin.site, plugin.given = site, True
        build(config)
    finally:
        if before is None:
            del os.environ["SOURCE_DATE_EPOCH"]
        else:
            os.environ["SOURCE_DATE_EPOCH"] = before


def build_site(
    lab_dir: Path, out_dir: Path, as_of: date | None = None, progress: Callable[[str], None] | None = None
) -> list[Problem]:
    """Build the site of a lab with MkDocs as its host; see `pipeline.build_site`."""
    return pipeline.build_site(lab_dir, out_dir, as_of, progress or _silent, write_with_mkdocs)


def serve(lab_dir: Path, address: str) -> None:
    """Show a lab's site at `address` (host:port) and build it anew when a record changes, until stopped."""
    os.environ["NO_MKDOCS_2_WARNING"] = "1"
    serve_with_mkdocs(str(find_mkdocs_file(lab_dir)), dev_addr=address)


def _found_as(page: Page) -> str:
    """How a page is named among hits: a recipe, its etchant and its bench sheet may share their words."""
    name = page.found_as or page.title
    kind = _KINDS.get(page.url.rpartition("/")[0])
    return name if kind is None or page.url.endswith("/index.html") else f"{name} ({kind})"


def _source(url: str) -> str:
    return f"{url.removesuffix('.html')}.md"


def _silent(_: str) -> None:
    pass
