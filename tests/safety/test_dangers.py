"""Thirteen dangerous recipes, sequences and mixtures: the check of records and the plan both catch each."""

from __future__ import annotations

import datetime
import functools
from dataclasses import dataclass, replace
from pathlib import Path

import pytest

from builder.checking.rules_safety_meetings import WetStep
from builder.findings.plan.facts import PlanFacts
from builder.findings.plan.gather import gather
from builder.findings.plan.planning import plan
from builder.findings.plan.result import ExcludedCode, NoteCode, StagePlan
from builder.findings.plan.sample import plan_sample
from builder.findings.safety import forbidden_pairs, plan_safety, sequence_findings
from builder.records.etches import AfterStep
from builder.records.lab import LabRecords
from builder.records.record import Part
from builder.records.samples import Sample
from builder.records.terms import AfterStepKind, Method, Origin
from tests.checking.example_lab import Example, problems_with
from tests.safety.shipped import shipped_records

RECORDS = shipped_records()
DAY = datetime.date(2026, 11, 15)
_HEAD = "# Invented for the tests; not measured anywhere.\n"
_ETCH = """name: Dangerous etch
method: {method}
tool: {tool}
etchant: {etchant}
status: draft
owner_role: wet owner
targets: [{target}]
settings:
  - step: Etch
    values: {{{values}}}
clearing: Water runs off
if_not_cleared: Dip again
{more}"""
_RINSE = "after_steps:\n  - {what: Rinse in water, kind: rinse, chemical: water}\n"
_WASTE = "waste: Its own can\n"
_TOOL = """name: Dangerous bench
kind: bench
methods: [wet, lift-off]
limits:
  temperature: {{min: 18 degC, max: 150 degC}}
  lift_interval: {{max: 10 min}}
container: {container}
training: Acid course
owner_role: wet owner
"""


def _etch(etchant: str, target: str, more: str, tool: str = "example-bench", **other: str) -> str:
    given = {"method": "wet", "values": "lift_interval: 60 s", **other}
    bath = "bath: thermostated\n" if given["method"] == "wet" else "published_conditions: different\n"
    return _HEAD + _ETCH.format(etchant=etchant, target=target, tool=tool, more=bath + more, **given)


Layers = list[dict[str, str]]
_BED = {"film": "si-100", "thickness": "525 um", "role": "under"}


def _layers(mask: str, target: str, bed: dict[str, str] = _BED, thick: str = "1.4 um") -> Layers:
    return [
        {"film": mask, "thickness": thick, "role": "mask"},
        {"film": target, "thickness": "500 nm", "role": "target"},
        bed,
    ]


def _resist(thick: str) -> Layers:
    return [{"film": "resist-positive-a", "thickness": thick, "role": "target"}, _BED]


def _dangerous_lab() -> LabRecords:
    """The demonstration lab, spoiled: glass under HF, a hot plastic tank, steps left out, wrong first aid."""
    rinse = AfterStep(what="Rinse", kind=AfterStepKind.RINSE)
    solvent = AfterStep(what="Dry from isopropanol", kind=AfterStepKind.DRY, chemical="ipa")
    koh = RECORDS.etches["silicon-koh"]
    own = replace(
        RECORDS.etchants["cu-hno3"],
        id="own",
        origin=Origin.LAB,
        parts=(Part(chemical="hno3-70", amount="1 part"), Part(chemical="ipa", amount="1 part")),
    )
    etches = {
        "oxide-bhf": {"tool": "glass-bench"},
        "oxide-hf-10-1": {"tool": "pp-bench", "temperature": koh.temperature},
        "aluminium-rie": {"after_steps": (rinse,)},
        "chromium-can": {"after_steps": (solvent,)},
        "copper-ferric": {"etchant": "own"},
    }
    benches = {
        "glass-bench": replace(RECORDS.tools["hf-bench"], container="glass"),
        "pp-bench": replace(RECORDS.tools["hf-bench"], container="pp"),
    }
    acid = replace(RECORDS.chemicals["hf-49"], id="hf-40", precaution="mineral-acids")
    titanium = RECORDS.etchants["hf-h2o2-ti"]
    parts = tuple(replace(one, chemical=one.chemical.replace("hf-49", "hf-40")) for one in titanium.parts)
    return replace(
        RECORDS,
        chemicals={**RECORDS.chemicals, "hf-40": acid},
        etchants={
            **RECORDS.etchants,
            "own": own,
            "hf-h2o2-ti": replace(titanium, parts=parts, precaution="oxidising-mixtures"),
        },
        tools={**RECORDS.tools, **benches},
        etches=RECORDS.etches | {one: replace(RECORDS.etches[one], **new) for one, new in etches.items()},
    )


@functools.cache
def _facts(spoiled: bool) -> PlanFacts:
    return gather(_dangerous_lab() if spoiled else RECORDS, DAY)


@dataclass(frozen=True)
class Meets:
    """A recipe of the lab on a sample, in the demonstration lab or in the spoiled one."""

    recipe: str
    layers: Layers
    steps: tuple[dict[str, str], ...] = ()
    bond: str | None = None
    spoiled: bool = False

    def stage(self) -> StagePlan:
        """Plan it, and return the last stage."""
        data: dict[str, object] = {"layers": self.layers, "steps": list(self.steps)}
        if self.bond:
            data["mount"] = {"bond": self.bond}
        sample = Sample.from_raw(data, "sample.yaml", Origin.LAB)
        facts = _facts(self.spoiled)
        return plan(facts, plan_sample(sample, facts.defaults), sample.steps, confidence=0.9).stages[-1]


@dataclass(frozen=True)
class Danger:
    """One danger: the files that a lab would write, the rule that names it, and the plan that meets it."""

    name: str
    files: dict[str, str]
    rule: str
    plan: Meets
    is_caution: bool = False


def _steps(*steps: str) -> str:
    return "after_steps:\n" + "".join(f"  - {{{step}}}\n" for step in steps)


def _sample_file(**more: str) -> str:
    text = (
        "layers:\n"
        f"  - {{film: resist-positive-a, thickness: {more.get('thick', '1.4 um')}, role: mask}}\n"
        "  - {film: sio2-thermal-wet, thickness: 500 nm, role: target}\n"
        "  - {film: si-100, thickness: 525 um, role: under}\n"
    )
    return _HEAD + text + more.get("mount", "") + "steps:\n" + more["steps"]


def _then(treat: str, etchant: str) -> tuple[dict[str, str], ...]:
    return ({"treat": treat, "etchant": etchant}, {"etch": "any"})


_OXIDE = {"film": "sio2-thermal-wet", "thickness": "1 um", "role": "under"}
_PHOSPHIDE = {"film": "inp", "thickness": "350 um", "role": "under"}
_PIRANHA = "  - {treat: clean, etchant: piranha, time: 10 min}\n"
DANGERS = [
    Danger(
        "acetone-wet into piranha",
        {"samples/a.yaml": _sample_file(steps="  - {treat: strip, etchant: acetone}\n" + _PIRANHA)},
        "steps-must-not-meet",
        Meets("resist-strip-piranha", _resist("1.4 um"), _then("strip", "acetone")),
    ),
    Danger(
        "ten micrometres of resist into piranha",
        {"samples/b.yaml": _sample_file(thick="10 um", steps=_PIRANHA)},
        "thick-organic",
        Meets("resist-strip-piranha", _resist("10 um")),
    ),
    Danger(
        "wax-mounted sample into piranha",
        {"samples/c.yaml": _sample_file(mount="mount: {bond: mounting wax}\n", steps=_PIRANHA)},
        "bond-in-oxidiser",
        Meets("resist-strip-piranha", _resist("1.4 um"), bond="mounting wax"),
    ),
    Danger(
        "buffered HF into sodium hydroxide without a rinse",
        {
            "etches/d.yaml": _etch(
                "bhf-5-1",
                "sio2-thermal-wet",
                _steps("what: Neutralise, kind: other, chemical: naoh") + _WASTE,
            )
        },
        "steps-must-not-meet",
        Meets("silicon-koh", _layers("sin-lpcvd", "si-100", _OXIDE), _then("clean", "bhf-5-1")),
    ),
    Danger(
        "HF in a glass tank",
        {
            "tools/glass-bench.yaml": _HEAD + _TOOL.format(container="glass"),
            "etches/e.yaml": _etch("bhf-5-1", "sio2-thermal-wet", _RINSE + _WASTE, "glass-bench"),
        },
        "container-attacked",
        Meets("oxide-bhf", _layers("resist-positive-a", "sio2-thermal-wet"), spoiled=True),
    ),
    Danger(
        "HF at 80 degC in polypropylene",
        {
            "tools/pp-bench.yaml": _HEAD + _TOOL.format(container="pp"),
            "etches/f.yaml": _etch(
                "hf-10-1", "sio2-thermal-wet", "temperature: 80 degC\n" + _RINSE + _WASTE, "pp-bench"
            ),
        },
        "bath-over-limit",
        Meets("oxide-hf-10-1", _layers("resist-positive-a", "sio2-thermal-wet"), spoiled=True),
    ),
    Danger(
        "HF with the first aid of ordinary acids",
        {
            "chemicals/hf-40.yaml": _HEAD
            + "name: HF 40 %\nformula: HF\ncas: [7664-39-3]\ngroups: [acid]\nsignal: danger\n"
            "h_codes: [H310, H314]\npictograms: [GHS05, GHS06]\nhazardous: true\nprecaution: mineral-acids\n"
            "trust: {identity: recalled, boiling_point: gap, ghs: recalled}\nsource: [common-practice]\n",
            "etchants/hf-40-dip.yaml": _HEAD
            + "name: Dip\nmethod: wet\nstate: liquid\nparts:\n  - {chemical: hf-40, amount: 100 wt%}\n"
            "trust: recalled\nsource: [common-practice]\n",
        },
        "hf-without-first-aid",
        Meets("titanium-hf-peroxide", _layers("resist-positive-a", "ti"), spoiled=True),
    ),
    Danger(
        "aluminium out of chlorine without passivation",
        {
            "etches/h.yaml": _etch(
                "plasma-cl2-bcl3-al",
                "al-si",
                _RINSE,
                "example-chamber",
                method="plasma",
                values="pressure: 20 mTorr, power: 100 W",
            )
        },
        "chlorine-on-aluminium",
        Meets("aluminium-rie", _layers("resist-positive-a", "al-cu"), spoiled=True),
    ),
    Danger(
        "indium phosphide in hydrochloric acid",
        {
            "tools/open-bench.yaml": _HEAD
            + _TOOL.format(container="glass").replace("container: glass\n", ""),
            "etches/i.yaml": _etch(
                "hcl-8m",
                "ito",
                _RINSE
                + "masks:\n  - {film: sio2-pecvd, on: [inp], preparation: opened, longest_time_held: 5 min}\n"
                + _WASTE,
                "open-bench",
            ),
        },
        "film-gives-gas",
        Meets("ito-hydrochloric", _layers("resist-positive-a", "ito", _PHOSPHIDE)),
    ),
    Danger(
        "nitric acid mixed with isopropanol",
        {
            "etchants/j.yaml": _HEAD
            + "name: Mixture\nmethod: wet\nstate: liquid\nparts:\n  - {chemical: hno3-70, amount: 1 part}\n"
            "  - {chemical: ipa, amount: 3 parts}\ntrust: recalled\nsource: [common-practice]\n"
        },
        "forbidden-mixture",
        Meets("copper-ferric", _layers("resist-positive-a", "cu"), spoiled=True),
    ),
    Danger(
        "ceric nitrate, then dried from isopropanol",
        {
            "etches/k.yaml": _etch(
                "cr-can-perchloric",
                "cr",
                _steps("what: Dry from isopropanol, kind: dry, chemical: ipa") + _WASTE,
            )
        },
        "steps-must-not-meet",
        Meets("chromium-can", _layers("resist-positive-a", "cr"), spoiled=True),
    ),
    Danger(
        "wet with isopropanol into the oxygen plasma",
        {
            "samples/l.yaml": _sample_file(
                steps="  - {treat: clean, etchant: isopropanol}\n  - {treat: strip, etchant: plasma-o2-ash}\n"
            )
        },
        "steps-must-not-meet",
        Meets("resist-ash", _resist("1.4 um"), _then("clean", "isopropanol")),
    ),
    Danger(
        "gold into a shared HF bath",
        {
            "etches/m.yaml": _etch(
                "bhf-5-1",
                "sio2-thermal-wet",
                _RINSE
                + "masks:\n  - {film: au, on: [sio2-thermal-wet], preparation: -, longest_time_held: 5 min}\n"
                + _WASTE,
            )
        },
        "plating-metal-in-hf",
        Meets("oxide-bhf-slow", _layers("au", "sio2-thermal-wet")),
        is_caution=True,
    ),
]


def _written(danger: Danger, folder: Path) -> Example:
    for name, text in danger.files.items():
        path = folder / "recipes" / name
        path.parent.mkdir(parents=True, exist_ok=True)
        path.write_text(text, encoding="utf-8")
    return Example(folder)


@pytest.mark.parametrize("danger", DANGERS, ids=lambda one: one.name)
def test_the_check_of_records_catches_it(danger: Danger, tmp_path: Path) -> None:
    """A lab that writes it down is told so, with the rule and the place."""
    problems = problems_with(_written(danger, tmp_path))
    assert danger.rule in {problem.rule for problem in problems}, problems
    assert all(problem.line > 0 for problem in problems if problem.rule == danger.rule)


@pytest.mark.parametrize("danger", DANGERS, ids=lambda one: one.name)
def test_the_plan_catches_it(danger: Danger) -> None:
    """The same danger leaves the recipe out of the plan for safety, or stands among its cautions."""
    stage = danger.plan.stage()
    if danger.is_caution:
        option = next(one for one in stage.options if one.recipe == danger.plan.recipe)
        assert NoteCode.GAS in {note.code for note in option.notes}
        return
    reasons = {one.recipe: one.reason.code for one in stage.excluded}
    assert reasons.get(danger.plan.recipe) in (ExcludedCode.SAFETY, ExcludedCode.MEETING), reasons


@pytest.mark.parametrize(
    ("recipe", "layers"),
    [
        ("resist-strip-piranha", _resist("1.4 um")),
        ("silicon-koh", _layers("sin-lpcvd", "si-100", _OXIDE)),
        ("oxide-bhf", _layers("resist-positive-a", "sio2-thermal-wet")),
        ("oxide-hf-10-1", _layers("resist-positive-a", "sio2-thermal-wet")),
        ("aluminium-rie", _layers("resist-positive-a", "al-cu")),
        ("titanium-hf-peroxide", _layers("resist-positive-a", "ti")),
        ("chromium-can", _layers("resist-positive-a", "cr")),
        ("resist-ash", _resist("1.4 um")),
    ],
)
def test_without_the_danger_the_recipe_is_offered(recipe: str, layers: Layers) -> None:
    """The tests above would also pass if everything were refused: the unspoiled case is an option."""
    assert recipe in {option.recipe for option in Meets(recipe, layers).stage().options}


@pytest.mark.parametrize("etchant", ["piranha", "koh-30"])
def test_a_rinse_in_between_lifts_it(etchant: str) -> None:
    """The same steps with a rinse in water are no finding: the rule is about what is carried over."""
    before = "acetone" if etchant == "piranha" else "bhf-5-1"
    wet = [WetStep(before, before), WetStep(etchant, etchant)]
    rinsed = [wet[0], WetStep("rinse", None, clears=True), wet[1]]
    assert sequence_findings(RECORDS, wet)
    assert sequence_findings(RECORDS, rinsed) == ()


def test_a_rinse_in_solvent_is_no_rinse() -> None:
    """Isopropanol after piranha is the accident, not the cure."""
    steps = [WetStep("piranha", "piranha"), WetStep("rinse", "ipa")]
    assert any(finding.forbidden for finding in sequence_findings(RECORDS, steps))


@pytest.mark.parametrize("etchant", ["pan-al", "hna-1-3-8", "rc2", "aqua-regia", "piranha"])
def test_a_legitimate_mixture_is_planned_without_a_refusal(etchant: str) -> None:
    """Its parts meet by intent; on gold and oxide nothing forbids it."""
    assert plan_safety(RECORDS, etchant, Method.WET, ["au", "sio2-thermal-wet"]).forbidden == ()


def test_a_plan_without_findings_still_carries_the_cautions_of_its_etchant() -> None:
    """No rule that forbids is no permission: the etchant's own cautions stand."""
    assert plan_safety(RECORDS, "hf-10-1", Method.WET, ["sio2-thermal-wet"]).cautions


def test_an_arsenide_in_an_acid_without_a_rule_is_a_caution_not_silence() -> None:
    """No record says that sulfuric acid and peroxide give no arsine; so the caution says that it may."""
    found = plan_safety(RECORDS, "gaas-h2so4", Method.WET, ["gaas"])
    assert "film-gas-unknown" in {finding.code for finding in found.findings}


def test_liquids_and_films_are_looked_at_in_one_question() -> None:
    """Two liquids in this order and the films between: pairs that must not meet come first."""
    found = forbidden_pairs(RECORDS, ["acetone", "piranha"], ["resist-positive-a"])
    assert [one.forbidden for one in found] == sorted((one.forbidden for one in found), reverse=True)
    assert {"unrinsed-steps", "film-meets-etchant"} == {one.code for one in found}
    assert forbidden_pairs(RECORDS, ["acetone"], ["sio2-thermal-wet"]) == ()
