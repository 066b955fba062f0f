"""The planner's state: an action makes a new state; links and files bring a sample back."""

from __future__ import annotations

import json
from pathlib import Path
from typing import Any

import pytest
from playwright.sync_api import Page

from builder.checking.sample_check import check_sample_data
from builder.reading.raw import Positions, Raw
from builder.records.samples import Sample
from builder.records.terms import Origin
from builder.views.planner_link import planner_link
from tests.planner.conftest import SCRIPTS, TYPEAHEAD, PlannerLab

_LAYER = {"film": "si-100", "thickness": "525 um", "role": "under"}


@pytest.fixture(scope="module")
def stateful(model: Page) -> Page:
    """The model's page with what holds a sample on top of it."""
    model.add_script_tag(path=TYPEAHEAD)
    for name in ("names", "sample-check", "sample-file", "address", "state"):
        model.add_script_tag(path=SCRIPTS / f"{name}.js")
    return model


def _after(page: Page, *actions: dict[str, Any]) -> dict[str, Any]:
    """The state after some actions; fails if one of them changed the state it was given."""
    found: dict[str, Any] = page.evaluate(
        """(actions) => actions.reduce((state, action) => {
          const before = JSON.stringify(state);
          const next = etchwright.state.after(state, action);
          if (JSON.stringify(state) !== before) throw new Error(action.type + " changed the old state");
          return next;
        }, etchwright.state.initial(0.9))""",
        list(actions),
    )
    return found


def _add(film: str, role: str) -> dict[str, Any]:
    return {"type": "add", "list": "layers", "value": {"film": film, "thickness": "1 um", "role": role}}


def test_layers_are_added_moved_and_taken_out(stateful: Page) -> None:
    """Layers keep the order in which they are put; moving beyond an end changes nothing."""
    three = [_add("a", "mask"), _add("b", "target"), _add("c", "under")]
    down = {"type": "move", "list": "layers", "index": 0, "by": 1}
    beyond = {"type": "move", "list": "layers", "index": 2, "by": 1}
    out = {"type": "remove", "list": "layers", "index": 1}
    state = _after(stateful, *three, down, beyond, out)
    assert [layer["film"] for layer in state["file"]["layers"]] == ["b", "c"]
    assert state["revision"] == 6


def test_a_blank_field_is_not_stated(stateful: Page) -> None:
    """Setting a field to nothing takes it out of the sample, with the group it was alone in."""
    line = {"type": "set", "field": "goal/line", "value": "10 um"}
    load = {"type": "set", "field": "goal/load_cm2", "value": 12}
    state = _after(stateful, line, load)
    assert state["file"]["goal"] == {"line": "10 um", "load_cm2": 12}
    state = _after(stateful, line, load, {**line, "value": ""}, {**load, "value": ""})
    assert "goal" not in state["file"]
    state = _after(
        stateful, _add("a", "target"), {"type": "set", "field": "layers/0/allowed_loss", "value": "5 nm"}
    )
    assert state["file"]["layers"][0]["allowed_loss"] == "5 nm"


def test_a_change_of_the_sample_closes_the_run_card(stateful: Page) -> None:
    """A card that was made for another sample must not stay on the screen."""
    card = {"type": "card", "key": "1/oxide-bhf/bhf-5-1"}
    assert _after(stateful, card)["card"] == "1/oxide-bhf/bhf-5-1"
    for change in (
        _add("a", "mask"),
        {"type": "set", "field": "edge", "value": "open"},
        {"type": "toggle", "value": "wet"},
        {"type": "confidence", "value": 0.99},
        {"type": "etchant", "value": "bhf-5-1"},
    ):
        assert _after(stateful, card, change)["card"] is None


def test_methods_options_and_more(stateful: Page) -> None:
    """Methods and options open and close again; more options are drawn twenty at a time."""
    wet = {"type": "toggle", "value": "wet"}
    assert _after(stateful, wet)["file"]["limits"] == {"methods": ["wet"]}
    assert "limits" not in _after(stateful, wet, wet)["file"]
    opened = {"type": "open", "key": "1/x"}
    assert _after(stateful, opened)["open"] == ["1/x"]
    assert _after(stateful, opened, opened)["open"] == []
    assert _after(stateful, {"type": "more"})["drawn"] == 40


def test_an_unknown_action_is_refused(stateful: Page) -> None:
    """A slip in the page's own code shows at once, also where it names what every object has."""
    for name in ("fly", "toString", "__proto__"):
        refused = stateful.evaluate(
            "(type) => { try { etchwright.state.after(etchwright.state.initial(0.9), {type}); return false; }"
            " catch { return true; } }",
            name,
        )
        assert refused, name


def test_the_link_of_the_command_restores_the_sample(
    stateful: Page, lab: PlannerLab, data: dict[str, Any]
) -> None:
    """What `etchwright plan --link` prints opens the same sample, for every example of the lab."""
    stateful.evaluate("(given) => { window.data = etchwright.data.read(given); }", data)
    assert len(lab.records.samples) >= 10
    for sample in lab.records.samples.values():
        found = stateful.evaluate(
            "(link) => etchwright.address.decode(link, data.facts)", planner_link(sample)
        )
        assert found["notices"] == []
        assert found["file"] == json.loads(sample.json_text)


def test_a_link_keeps_what_is_asked(stateful: Page) -> None:
    """Any text survives the address, with confidence and etchant, and the command writes the same one."""
    file = {"sample": "Größe µ 晶片 & <b>#1</b>", "layers": [{**_LAYER, "role": "target"}]}
    link = stateful.evaluate("(file) => etchwright.address.encode(file, 0.95, 'bhf-5-1')", file)
    found = stateful.evaluate("(link) => etchwright.address.decode(link, data.facts)", link)
    assert found == {"file": file, "confidence": 0.95, "etchant": "bhf-5-1", "notices": []}
    sample = Sample.from_raw(file, "x.json", Origin.LAB)
    assert link == planner_link(sample) + "&confidence=0.95&etchant=bhf-5-1"


@pytest.mark.parametrize(
    "fragment",
    [
        "#s9=abc",
        "#s1=%%%",
        "#s1=eyJ",
        "#s1=W10",
        "#s1=eyJsYXllcnMiOjF9",
        "#confidence=0.123",
        "#etchant=constructor",
    ],
)
def test_a_link_that_cannot_be_read_says_so(stateful: Page, fragment: str) -> None:
    """An unknown version, a cut or a damaged link explains itself and restores nothing wrong."""
    found = stateful.evaluate("(link) => etchwright.address.decode(link, data.facts)", fragment)
    assert found["file"] is None
    assert found["etchant"] is None
    assert found["confidence"] is None
    assert len(found["notices"]) == 1


def test_the_question_of_the_home_page(stateful: Page) -> None:
    """Films to remove and to keep become a sample; what is not on record is named."""
    link = "#remove=sio2-thermal-wet&keep=si-100%2Cnothing-such"
    found = stateful.evaluate("(link) => etchwright.address.decode(link, data.facts)", link)
    assert found["file"]["layers"] == [{"film": "sio2-thermal-wet", "thickness": "100 nm", "role": "target"}]
    assert [one["film"] for one in found["file"]["also_exposed"]] == ["si-100"]
    assert "nothing-such" in found["notices"][0]


def test_a_saved_file_is_a_sample(stateful: Page, lab: PlannerLab, tmp_path: Path) -> None:
    """What the page saves passes the checks of `etchwright plan`, and the page reads it back."""
    for sample in lab.records.samples.values():
        file = json.loads(sample.json_text)
        text = stateful.evaluate(
            "(file) => etchwright.sampleFile.toText({...file, edge: file.edge || ''})", file
        )
        raw = Raw(json.loads(text), Positions({"": (0, 0)}), "saved.json")
        checked, problems = check_sample_data(raw, lab.records)
        assert checked is not None, problems
        assert stateful.evaluate("(text) => etchwright.sampleFile.fromText(text)", text)["file"] == file


def test_what_no_sample_has_is_left_out(stateful: Page) -> None:
    """Unknown fields, wrong kinds and endless lists go no further, and are named."""
    wild = {
        "layers": [{**_LAYER, "onclick": "alert(1)"}] * 70 + [5],
        "__proto__x": 1,
        "goal": [],
        "also_exposed": "no",
        "edge": "sharp",
        "limits": {"methods": ["wet", "magic"]},
    }
    found = stateful.evaluate("(text) => etchwright.sampleFile.fromText(text)", json.dumps(wild))
    assert len(found["file"]["layers"]) == 60
    assert found["file"]["layers"][0] == _LAYER
    assert set(found["file"]) == {"layers", "limits"}
    assert found["file"]["limits"] == {"methods": ["wet"]}
    assert {"goal", "also_exposed", "edge", "layers/0/onclick", "limits/methods/1"} <= set(found["dropped"])


@pytest.mark.parametrize(
    "text", ["", "[", "layers: []", "5", "null", '{"layers": {}}', "[" * 5000, '"' + "x" * 300_000 + '"']
)
def test_a_file_that_is_no_sample_is_refused(stateful: Page, text: str) -> None:
    """Whatever a file holds, the page says what is wrong with it and carries on."""
    found = stateful.evaluate("(text) => etchwright.sampleFile.fromText(text)", text)
    assert found["file"] is None
    assert found["fault"].endswith(".")
