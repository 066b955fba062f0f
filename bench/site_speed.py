"""Records to site, against a plain MkDocs build of the same content written as Markdown outside the nav."""

from __future__ import annotations

import os
import statistics
import subprocess
import sys
import tempfile
import time
from collections.abc import Iterator
from itertools import pairwise
from pathlib import Path

from markdownify import markdownify

from bench.large_lab import write_large_lab
from builder.mkdocs_plugin import build_site
from builder.pages.page import FinishedSite
from builder.pipeline import prepare
from builder.problems import has_errors

RECIPES = 300
REPEATS = 3
_ENVIRONMENT = {**os.environ, "NO_MKDOCS_2_WARNING": "1"}


def rows() -> Iterator[tuple[str, str]]:
    """Yield what was measured and its value, in words."""
    with tempfile.TemporaryDirectory() as name:
        lab, plain = Path(name, "lab"), Path(name, "plain")
        lab.mkdir()
        write_large_lab(lab, RECIPES)
        stages = _Stages()
        problems = build_site(lab, Path(name, "staged"), None, stages.start)
        stages.start("")
        assert not has_errors(problems)
        site = prepare(lab, None, lambda _: None).site
        assert site is not None
        _write_markdown(site, plain)
        ours, theirs = [], []
        # Turn about, so that a busy moment of the machine meets both.
        for _ in range(REPEATS):
            ours.append(_seconds([sys.executable, "-m", "builder", "site", "--lab", str(lab)]))
            config = str(plain / "mkdocs.yml")
            theirs.append(_seconds([sys.executable, "-m", "mkdocs", "build", "-q", "-f", config]))
        mine, other = statistics.median(ours), statistics.median(theirs)
        yield f"records to site, {RECIPES} recipes, {len(site.pages)} pages", f"{mine:.1f} s"
        yield "plain mkdocs build of the same content as Markdown", f"{other:.1f} s"
        yield "ratio (aim: at most 1.0)", f"{mine / other:.2f}"
        yield from ((f"of ours, {stage}", f"{seconds:.1f} s") for stage, seconds in stages.seconds())


class _Stages:
    """How long each stage took, by what the program says of its progress; "computing" holds the views too."""

    def __init__(self) -> None:
        self._starts: list[tuple[str, float]] = []

    def start(self, stage: str) -> None:
        self._starts.append((stage, time.perf_counter()))

    def seconds(self) -> Iterator[tuple[str, float]]:
        for (stage, begin), (_, end) in pairwise(self._starts):
            yield stage, end - begin


def _write_markdown(site: FinishedSite, folder: Path) -> None:
    docs = folder / "docs"
    for page in site.pages:
        path = docs / f"{page.url.removesuffix('.html')}.md"
        path.parent.mkdir(parents=True, exist_ok=True)
        # Our pages leave out end tags that HTML does not need; only this parser knows which.
        body = markdownify(page.html, bs4_options="html5lib")
        path.write_text(f"# {page.title}\n\n{body}", encoding="utf-8")
    (folder / "mkdocs.yml").write_text(
        "site_name: plain\nuse_directory_urls: false\ntheme: {name: material, font: false}\n"
        "plugins: [search]\nnav: [{Home: index.md}]\n",
        encoding="utf-8",
    )


def _seconds(command: list[str]) -> float:
    started = time.perf_counter()
    done = subprocess.run(command, capture_output=True, env=_ENVIRONMENT, check=False)
    if done.returncode != 0:
        raise RuntimeError(done.stderr.decode()[-2000:])
    return time.perf_counter() - started
