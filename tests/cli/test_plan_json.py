"""What `plan --json` and `remove --json` print: the form of schemas/plan.json, and how they end."""

from __future__ import annotations

import functools
import json
import shutil
from pathlib import Path

import pytest
from jsonschema import Draft202012Validator, FormatChecker
from referencing import Registry, Resource

from builder.checking.sample_check import check_sample
from builder.cli.lab_facts import lab_facts
from builder.findings.plan.facts import PlanFacts
from builder.findings.plan.planning import plan
from builder.findings.plan.sample import plan_sample
from builder.findings.plan.store import names_of
from builder.records.samples import Sample
from builder.views.plan_json import plan_data
from tests.cli.program import LAB, Program

SAMPLES = sorted(path.stem for path in (LAB / "recipes" / "samples").glob("*.yaml"))
FIRST = LAB / "recipes" / "samples" / "first-oxide-window.yaml"


@functools.cache
def validator() -> Draft202012Validator:
    """A validator made of the schema files alone."""
    files = {path.name: json.loads(path.read_text("utf-8")) for path in (LAB / "schemas").glob("*.json")}
    registry: Registry[object] = Registry().with_resources(
        [(name, Resource.from_contents(content)) for name, content in files.items()]
    )
    return Draft202012Validator(files["plan.json"], registry=registry, format_checker=FormatChecker())


def faults(data: object) -> list[str]:
    """Return what the schema says against data as they are printed."""
    printed = json.loads(json.dumps(data))
    return [f"{error.json_path}: {error.message[:200]}" for error in validator().iter_errors(printed)]


def the_sample(name: str, known: PlanFacts) -> Sample:
    """Return a sample of the lab; its recipes and tools are not looked up."""
    path = LAB / "recipes" / "samples" / f"{name}.yaml"
    sample, problems = check_sample(path, names_of(known), unjudged=frozenset({"etches", "tools"}))
    assert sample is not None, problems
    return sample


@pytest.fixture(scope="module")
def of_lab(lab: Path) -> PlanFacts:
    """The facts of the copied lab."""
    return lab_facts(lab, None, None, reference_only=False)


@pytest.fixture(scope="module")
def of_literature(lab: Path) -> PlanFacts:
    """Published facts alone."""
    return lab_facts(lab, None, None, reference_only=True)


@pytest.mark.parametrize("name", SAMPLES)
def test_the_plan_of_a_sample_has_the_form(name: str, of_lab: PlanFacts) -> None:
    """With its stages, and treatments that have no target."""
    sample = the_sample(name, of_lab)
    made = plan(of_lab, plan_sample(sample, of_lab.defaults), sample.steps, confidence=0.90)
    data = plan_data(made)
    assert faults(data) == []
    if made.is_sequence:
        assert data["stages"][0]["options"] == data["options"]  # type: ignore[index]


@pytest.mark.parametrize("name", ["first-oxide-window", "aluminium-without-strip", "gold-on-chromium"])
def test_an_etchant_alone_has_the_form(name: str, of_literature: PlanFacts) -> None:
    """For every etchant, also one that nobody has tried on the target."""
    sample = the_sample(name, of_literature)
    seen = plan_sample(sample, of_literature.defaults)
    assert len(of_literature.etchants) >= 130
    for etchant in of_literature.etchants:
        data = plan_data(plan(of_literature, seen, sample.steps, confidence=0.90, etchant=etchant))
        assert faults(data) == []
        assert [option["recipe"] for option in data["options"]] == [None]  # type: ignore[attr-defined]


def test_the_schema_is_strict() -> None:
    """Else the tests above could not fail."""
    good = {
        "format": 1, "sample": "s", "as_of": "2026-06-01", "confidence": 0.9, "options": [], "excluded": [],
    }  # fmt: skip
    assert faults(good) == []
    assert faults({**good, "confidence": 1.0})
    assert faults({**good, "more": 1})
    assert faults({**good, "as_of": "soon"})


def test_the_status_says_whether_an_option_holds(program: Program, lab: Path) -> None:
    """0 where the best holds, 2 where none does; the JSON says the same."""
    held = program("plan", FIRST, "--lab", lab, "--json")
    assert (held.status, held.data["options"][0]["verdict"]) == (0, "holds")  # type: ignore[index]
    trap = program("plan", FIRST.with_name("gold-on-nickel.yaml"), "--lab", lab, "--json")
    assert trap.status == 2
    assert "holds" not in {option["verdict"] for option in trap.data["options"]}  # type: ignore[attr-defined]
    assert faults(held.data) == faults(trap.data) == []


def test_the_sequence_ends_with_two_if_any_stage_does_not_hold(program: Program, lab: Path) -> None:
    """The etch of the first stage holds, the step after it does not."""
    ended = program("plan", FIRST.with_name("aluminium-without-strip.yaml"), "--lab", lab, "--json")
    stages = [stage["options"][0]["verdict"] for stage in ended.data["stages"]]  # type: ignore[attr-defined]
    assert (ended.status, stages[0]) == (2, "holds")
    assert stages[1] != "holds"


def test_an_etchant_alone_by_the_command(program: Program, lab: Path, tmp_path: Path) -> None:
    """In a lab and where no lab is, also for a sample that names the lab's recipes and tools."""
    path = tmp_path / "s.yaml"
    text = FIRST.read_text("utf-8").replace("limits: {methods: [wet]}", "limits: {tools: [rie-chlorine]}")
    path.write_text(text + "steps:\n  - {etch: oxide-bhf}\n", "utf-8")
    here = program("plan", path, "--lab", lab, "--etchant", "bhf-5-1", "--json", "--as-of", "2026-06-01")
    none = tmp_path / "none"
    none.mkdir()
    there = program("plan", path, "--lab", none, "--etchant", "bhf-5-1", "--json", "--as-of", "2026-06-01")
    assert here.status in (0, 2)
    assert faults(here.data) == []
    assert here.out == there.out


def test_runs_of_the_lab_do_not_change_an_etchant_alone(program: Program, tmp_path: Path, lab: Path) -> None:
    """Byte for byte, with the run files emptied of half their rows."""
    copy = tmp_path / "lab"
    shutil.copytree(lab / "recipes", copy / "recipes")
    asked = ("plan", FIRST, "--etchant", "bhf-5-1", "--json")
    before = program(*asked, "--lab", lab)
    for path in (copy / "recipes" / "runs").glob("*.csv"):
        lines = path.read_text("utf-8").splitlines(keepends=True)
        path.write_text("".join(line.replace("-05-", "-06-") for line in lines), "utf-8")
    assert program(*asked, "--lab", copy).out == before.out


def test_remove_has_the_form_and_ends_as_plan(program: Program, lab: Path) -> None:
    """With thicknesses and without, with films to keep and without."""
    alone = program("remove", "sio2-thermal-wet", "--lab", lab, "--json")
    kept = program("remove", "sio2-thermal-wet:500nm", "--keep", "si-100,au:200nm", "--lab", lab, "--json")
    assert faults(alone.data) == faults(kept.data) == []
    for ended in (alone, kept):
        best = ended.data["options"][0]["verdict"]  # type: ignore[index]
        assert ended.status == (0 if best == "holds" else 2)
    assert {row["film"] for row in kept.data["options"][0]["films"]} >= {"au", "si-100"}  # type: ignore[index]
    wrong = program("remove", "sio2", "--keep", "gold:3", "--lab", lab, "--json")
    assert (wrong.status, wrong.out) == (1, "")
    assert 'there is no film "gold"; did you mean "au"?' in wrong.err


def test_the_day_and_the_confidence_are_those_asked_for(program: Program, lab: Path) -> None:
    """As a percentage too; a wrong one is bad input."""
    made = program("plan", FIRST, "--lab", lab, "--json", "--as-of", "2027-01-31", "--confidence", "97%")
    assert (made.data["as_of"], made.data["confidence"]) == ("2027-01-31", 0.97)
    assert program("plan", FIRST, "--lab", lab, "--confidence", "0.2").status == 1
