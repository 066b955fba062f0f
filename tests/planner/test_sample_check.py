"""The page refuses exactly the samples that the command refuses."""

from __future__ import annotations

import copy
import json
from collections.abc import Callable
from typing import Any

import pytest
from playwright.sync_api import Page

from builder.checking.sample_check import check_sample_data
from builder.reading.raw import Positions, Raw
from tests.planner.conftest import SCRIPTS, TYPEAHEAD, PlannerLab

_SOUND: dict[str, Any] = {
    "sample": "sound",
    "layers": [
        {"film": "resist-positive-a", "thickness": "1.4 um", "role": "mask"},
        {"film": "sio2-thermal-wet", "thickness": "500 nm +/- 10 nm", "role": "target"},
        {"film": "si-100", "thickness": "525 um", "role": "under", "allowed_loss": "20 nm"},
    ],
    "also_exposed": [{"film": "au", "thickness": "200 nm", "on": "ti", "exposed": "face"}],
    "back": {"film": "sio2-thermal-wet", "thickness": "500 nm"},
    "goal": {"depth": "through", "line": "10 um", "load_cm2": 12},
    "limits": {"methods": ["wet"], "tools": ["hf-bench"], "etchants": ["bhf-5-1"], "temperature": "120 degC"},
    "steps": [
        {"treat": "clean", "etchant": "acetone", "time": "60 s", "temperature": "21 degC"},
        {"etch": "any"},
    ],
    "temperature": "20 degC",
}
_SET = {
    "unknown film": ("layers/1/film", "sio3"),
    "family": ("layers/1/film", "sio2-any"),
    "what every object has": ("layers/1/film", "constructor"),
    "no unit": ("layers/1/thickness", "500"),
    "unit of time": ("layers/1/thickness", "500 s"),
    "no thickness": ("layers/1/thickness", "0 nm"),
    "range": ("layers/1/thickness", "400 - 500 nm"),
    "limit": ("layers/1/thickness", "< 500 nm"),
    "wide tolerance": ("layers/1/thickness", "500 nm +/- 500 nm"),
    "decimal comma": ("layers/1/thickness", "1,4 um"),
    "allowed more than all": ("layers/2/allowed_loss", "1 mm"),
    "allowed nothing": ("layers/2/allowed_loss", "0 nm"),
    "may vanish": ("layers/2/allowed_loss", "any"),
    "allowed negative": ("layers/2/allowed_loss", "-1 nm"),
    "mask below": ("layers/2/role", "mask"),
    "no target": ("layers/1/role", "under"),
    "two targets": ("layers/0/role", "target"),
    "no role": ("layers/0/role", None),
    "covered target": ("layers/0/role", "under"),
    "unknown under": ("also_exposed/0/on", "unobtainium"),
    "nothing under": ("also_exposed/0/on", "none"),
    "back without film": ("back/film", None),
    "back protected": ("back", "protected"),
    "depth": ("goal/depth", "300 nm"),
    "depth beyond": ("goal/depth", "600 nm"),
    "depth within tolerance": ("goal/depth", "510 nm"),
    "through no wafer": ("goal/depth", "through-wafer"),
    "line of nothing": ("goal/line", "0 um"),
    "load of nothing": ("goal/load_cm2", 0),
    "load negative": ("goal/load_cm2", -3),
    "unknown tool": ("limits/tools", ["my-garage"]),
    "unknown etchant": ("limits/etchants", ["cola"]),
    "below absolute zero": ("limits/temperature", "-300 degC"),
    "temperature without unit": ("temperature", "20"),
    "at room temperature": ("temperature", "room"),
    "treated at room temperature": ("steps/0/temperature", "room"),
    "a limit in words": ("limits/temperature", "room"),
    "unknown recipe": ("steps/1/etch", "magic"),
    "a recipe": ("steps/1/etch", "oxide-bhf"),
    "neither": ("steps/1/etch", None),
    "both": ("steps/0/etch", "any"),
    "etch with a time": ("steps/1/time", "60 s"),
    "unknown liquid": ("steps/0/etchant", "tears"),
    "no time at all": ("steps/0/time", "0 s"),
    "time not stated": ("steps/0/time", None),
    "sound": ("sample", "still sound"),
}
_REFUSED_AT_LEAST = 25


def _changed(place: str, value: object) -> dict[str, Any]:
    file = copy.deepcopy(_SOUND)
    *path, last = place.split("/")
    whole: Any = file
    for name in path:
        whole = whole[int(name)] if isinstance(whole, list) else whole[name]
    if value is None:
        del whole[last]
    else:
        whole[last] = value
    return file


@pytest.fixture(scope="module")
def check(model: Page, data: dict[str, Any]) -> Callable[[dict[str, Any]], list[dict[str, str]]]:
    """What the page says against a sample file."""
    model.add_script_tag(path=TYPEAHEAD)
    for name in ("names", "sample-check", "sample-file"):
        model.add_script_tag(path=SCRIPTS / f"{name}.js")
    model.evaluate("(given) => { window.data = etchwright.data.read(given); }", data)

    def ask(file: dict[str, Any]) -> list[dict[str, str]]:
        found: list[dict[str, str]] = model.evaluate(
            """(text) => { const found = etchwright.sampleFile.fromText(text);
              const left = found.dropped.map((field) => ({field, words: "left out"}));
              return [...left, ...etchwright.sampleCheck.check(data.facts, found.file)]; }""",
            json.dumps(file),
        )
        return found

    return ask


def test_both_refuse_the_same(
    lab: PlannerLab, check: Callable[[dict[str, Any]], list[dict[str, str]]]
) -> None:
    """Each change to a sound sample is taken by both or refused by both, and the page names a field."""
    differing, refused = [], 0
    for name, (place, value) in _SET.items():
        file = _changed(place, value)
        sample, _ = check_sample_data(Raw(file, Positions({"": (0, 0)}), "x.json"), lab.records)
        problems = check(file)
        if (sample is None) != bool(problems):
            differing.append((name, problems))
        refused += sample is None
    assert differing == []
    assert _REFUSED_AT_LEAST <= refused < len(_SET)


def test_every_fault_is_told_at_once(check: Callable[[dict[str, Any]], list[dict[str, str]]]) -> None:
    """Two faults in two fields are both named, each with its field."""
    file = _changed("layers/1/thickness", "500")
    file["temperature"] = "warm"
    assert {one["field"] for one in check(file)} == {"layers/1/thickness", "temperature"}


def test_more_etches_than_targets_are_refused(
    check: Callable[[dict[str, Any]], list[dict[str, str]]],
) -> None:
    """With one target there is nothing left for a second etch to remove."""
    file = copy.deepcopy(_SOUND)
    file["steps"].append({"etch": "any"})
    assert [one["field"] for one in check(file)] == ["steps/2/etch"]
