"""
How fast the planner answers in Chromium, with a thousand recipes and a sample of eight films.

Run by `python -m bench planner`. The recipes are those of the lab in the current folder, under new names as
often as it takes. The goals are 16 ms for one plan and 50 ms from a keystroke to the painted answer.
"""

from __future__ import annotations

import datetime
import shutil
import statistics
import tempfile
from collections.abc import Iterator, Mapping
from dataclasses import replace
from itertools import cycle, islice
from pathlib import Path

from playwright.sync_api import Page, sync_playwright

from builder.checking.lab_check import check_lab
from builder.findings.plan.facts import EtchFacts
from builder.findings.plan.gather import gather, reference_only
from builder.findings.plan.stored import plain
from builder.pages.render import render_page, script_json
from builder.pages.shipped_files import find_docs
from builder.views.planner_data import planner_data
from builder.views.planner_page import planner_page
from tests.chromium_ready import HOW_TO_GET_ONE, chromium_of

RECIPES = 1000
_ROUNDS = 60
_WARM = 5
_ARGS = ["--no-sandbox", "--disable-gpu", "--disable-dev-shm-usage", "--no-first-run"]

SAMPLE = {
    "sample": "bench",
    "layers": [
        {"film": "resist-positive-a", "thickness": "1.4 um", "role": "mask"},
        {"film": "sio2-thermal-wet", "thickness": "500 nm +/- 10 nm", "role": "target"},
        {"film": "sin-lpcvd", "thickness": "100 nm", "role": "under"},
        {"film": "poly-si-undoped", "thickness": "300 nm", "role": "under"},
        {"film": "si-100", "thickness": "525 um", "role": "under"},
    ],
    "also_exposed": [
        {"film": "al-si", "thickness": "300 nm", "allowed_loss": "10 nm"},
        {"film": "au", "thickness": "100 nm"},
        {"film": "cr", "thickness": "50 nm"},
    ],
    "back": "protected",
    "edge": "protected",
    "goal": {"line": "10 um"},
}

_PLAN = """([sample, rounds]) => {
  const ew = etchwright, data = ew.data.read(window.etchwrightFacts), times = [];
  let options = 0;
  for (let round = 0; round < rounds; round += 1) {
    sample.layers[1].thickness = (400 + round) + " nm";
    const start = performance.now();
    const seen = ew.sample.planSample(data.facts, sample);
    options = ew.planning.plan(data.facts, seen, [], 0.9, null).stages[0].options.length;
    times.push(performance.now() - start);
  }
  return {times, options};
}"""
_TYPE = """async (rounds) => {
  const times = [];
  for (let round = 0; round < rounds; round += 1) {
    const field = document.getElementById("plan-layers-1-thickness");
    const start = performance.now();
    field.value = (400 + round) + " nm";
    field.dispatchEvent(new Event("input", {bubbles: true}));
    await new Promise((done) => requestAnimationFrame(() => {
      const channel = new MessageChannel();
      channel.port1.onmessage = done;
      channel.port2.postMessage(null);
    }));
    times.push(performance.now() - start);
  }
  return times;
}"""


def rows() -> Iterator[tuple[str, str]]:
    """Measure, and yield what was measured with its value."""
    with tempfile.TemporaryDirectory() as folder, sync_playwright() as playwright:
        address = _written(Path(folder))
        found = chromium_of(playwright.chromium.executable_path)
        assert found is not None, HOW_TO_GET_ONE
        browser = playwright.chromium.launch(executable_path=found, args=_ARGS)
        page = browser.new_page(viewport={"width": 1280, "height": 900})
        page.goto(address)
        yield from _measured(page)
        browser.close()


def _measured(page: Page) -> Iterator[tuple[str, str]]:
    planned = page.evaluate(_PLAN, [SAMPLE, _ROUNDS])
    films = len(SAMPLE["layers"]) + len(SAMPLE["also_exposed"])
    what = f"one plan, {RECIPES} recipes, {films} films, {planned['options']} options"
    yield from _stated(what, planned["times"])
    yield f"{what}: the first", f"{planned['times'][0]:.1f} ms"
    link = page.evaluate("(sample) => etchwright.address.encode(sample, null, null)", SAMPLE)
    page.evaluate("(link) => { location.hash = link; }", link)
    page.wait_for_selector("#plan-layers-1-thickness")
    yield from _stated("from a keystroke to the painted answer", page.evaluate(_TYPE, _ROUNDS))


def _stated(what: str, times: list[float]) -> Iterator[tuple[str, str]]:
    warm = sorted(times[_WARM:])
    yield f"{what}: median", f"{statistics.median(warm):.1f} ms"
    yield f"{what}: fastest and nine of ten", f"{warm[0]:.1f} and {warm[int(len(warm) * 0.9)]:.1f} ms"


def _written(folder: Path) -> str:
    """The planner's page without the theme, with many recipes; return its address."""
    lab = Path()
    records, _ = check_lab(lab)
    assert records is not None
    today = datetime.date.today()
    facts = gather(records, today)
    etches = dict(islice(_renamed(facts.etches), RECIPES))
    data = planner_data(records, facts, gather(reference_only(records), today))
    data["facts"] = plain(replace(facts, etches=etches))
    shutil.copytree(find_docs() / "assets", folder / "assets")
    (folder / "planner").mkdir()
    (folder / "planner" / "facts.js").write_text(
        f"window.etchwrightFacts = {script_json(data)};", encoding="utf-8"
    )
    page = folder / "planner" / "index.html"
    styles = '<link rel="stylesheet" href="../assets/etchwright.css">'
    html = render_page("planner", planner_page(records)).html
    page.write_text(
        f"<!doctype html><html lang=en><meta charset=utf-8>{styles}<body class=md-typeset>{html}",
        encoding="utf-8",
    )
    return page.resolve().as_uri()


def _renamed(etches: Mapping[str, EtchFacts]) -> Iterator[tuple[str, EtchFacts]]:
    for number, etch in enumerate(cycle(etches.values())):
        name = f"recipe-{number}"
        yield name, replace(etch, id=name)
