"""Fourteen dangerous recipes, sequences and mixtures: the check of records and the plan both catch each."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass, replace
from pathlib import Path

import pytest

from builder.checking.rules_safety_meetings import WetStep, mixture_findings
from builder.findings.safety import PlanSafety, plan_safety, sample_safety, sequence_findings
from builder.records.etches import AfterStep
from builder.records.lab import LabRecords
from builder.records.record import Part
from builder.records.samples import Sample
from builder.records.terms import AfterStepKind, Method, Origin
from tests.checking.example_lab import Example, problems_with
from tests.safety.shipped import shipped_records

RECORDS = shipped_records()
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


def _sample(**more: object) -> Sample:
    layers = [
        {
            "film": more.pop("mask", "resist-positive-a"),
            "thickness": more.pop("thick", "1.4 um"),
            "role": "mask",
        },
        {"film": more.pop("target", "sio2-thermal-wet"), "thickness": "500 nm", "role": "target"},
        {"film": more.pop("under", "si-100"), "thickness": "525 um", "role": "under"},
    ]
    return Sample.from_raw({"layers": layers, **more}, "sample.yaml", Origin.LAB)


def _plan(etchant: str, **sample: object) -> PlanSafety:
    return sample_safety(RECORDS, etchant, RECORDS.etchants[etchant].method, _sample(**sample))


def _with_etch(etch_id: str, **changes: object) -> LabRecords:
    return replace(RECORDS, etches={**RECORDS.etches, etch_id: replace(RECORDS.etches[etch_id], **changes)})


def _glass_bench() -> PlanSafety:
    tool = replace(RECORDS.tools["hf-bench"], container="glass")
    records = replace(RECORDS, tools={**RECORDS.tools, "hf-bench": tool})
    return plan_safety(records, "bhf-5-1", Method.WET, ["sio2-thermal-wet"], tool_id="hf-bench")


def _warm_polypropylene() -> PlanSafety:
    tool = replace(RECORDS.tools["hf-bench"], container="pp")
    records = replace(RECORDS, tools={**RECORDS.tools, "hf-bench": tool})
    hot = RECORDS.etches["silicon-koh"].temperature
    return plan_safety(
        records, "hf-10-1", Method.WET, ["sio2-thermal-wet"], tool_id="hf-bench", temperature=hot
    )


def _ordinary_first_aid() -> PlanSafety:
    acid = replace(RECORDS.chemicals["hf-49"], precaution="mineral-acids")
    bath = replace(RECORDS.etchants["hf-10-1"], precaution=None)
    records = replace(
        RECORDS,
        chemicals={**RECORDS.chemicals, "hf-49": acid},
        etchants={**RECORDS.etchants, "hf-10-1": bath},
    )
    return plan_safety(records, "hf-10-1", Method.WET, ["sio2-thermal-wet"])


def _bare_aluminium() -> PlanSafety:
    name = next(
        one.id for one in RECORDS.etches.values() if one.etchant == "plasma-cl2-bcl3-lab" and one.after_steps
    )
    only_rinse = (AfterStep(what="Rinse", kind=AfterStepKind.RINSE),)
    records = _with_etch(name, after_steps=only_rinse)
    return plan_safety(records, "plasma-cl2-bcl3-lab", Method.PLASMA, ["al-si"], etch_id=name)


def _ceric_then_solvent() -> PlanSafety:
    steps = (AfterStep(what="Dry from isopropanol", kind=AfterStepKind.DRY, chemical="ipa"),)
    records = _with_etch("chromium-can", after_steps=steps)
    etchant = records.etches["chromium-can"].etchant
    return plan_safety(records, etchant, Method.WET, ["cr"], etch_id="chromium-can")


def _own_mixture() -> PlanSafety:
    parts = (Part(chemical="hno3-70", amount="1 part"), Part(chemical="ipa", amount="1 part"))
    mixture = replace(RECORDS.etchants["cu-hno3"], id="own", origin=Origin.LAB, parts=parts)
    records = replace(RECORDS, etchants={**RECORDS.etchants, "own": mixture})
    return plan_safety(records, "own", Method.WET, ["cu"])


@dataclass(frozen=True)
class Danger:
    """One danger: the files that a lab would write, the rule that names it, and the plan that meets it."""

    name: str
    files: dict[str, str]
    rule: str
    plan: Callable[[], PlanSafety]
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


_PIRANHA = "  - {treat: clean, etchant: piranha, time: 10 min}\n"
DANGERS = [
    Danger(
        "acetone-wet into piranha",
        {"samples/a.yaml": _sample_file(steps="  - {treat: strip, etchant: acetone}\n" + _PIRANHA)},
        "steps-must-not-meet",
        lambda: _plan("piranha", steps=[{"treat": "strip", "etchant": "acetone"}, {"etch": "any"}]),
    ),
    Danger(
        "ten micrometres of resist into piranha",
        {"samples/b.yaml": _sample_file(thick="10 um", steps=_PIRANHA)},
        "thick-organic",
        lambda: _plan("piranha", thick="10 um"),
    ),
    Danger(
        "wax-mounted sample into piranha",
        {"samples/c.yaml": _sample_file(mount="mount: {bond: mounting wax}\n", steps=_PIRANHA)},
        "bond-in-oxidiser",
        lambda: _plan("piranha", mount={"bond": "mounting wax"}),
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
        lambda: _plan("koh-30", steps=[{"treat": "clean", "etchant": "bhf-5-1"}, {"etch": "any"}]),
    ),
    Danger(
        "HF in a glass tank",
        {
            "tools/glass-bench.yaml": _HEAD + _TOOL.format(container="glass"),
            "etches/e.yaml": _etch("bhf-5-1", "sio2-thermal-wet", _RINSE + _WASTE, "glass-bench"),
        },
        "container-attacked",
        _glass_bench,
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
        _warm_polypropylene,
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
        _ordinary_first_aid,
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
        _bare_aluminium,
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
        lambda: _plan("hcl-8m", under="inp"),
    ),
    Danger(
        "nitric acid mixed with isopropanol",
        {
            "etchants/j.yaml": _HEAD
            + "name: Mixture\nmethod: wet\nstate: liquid\nparts:\n  - {chemical: hno3-70, amount: 1 part}\n"
            "  - {chemical: ipa, amount: 3 parts}\ntrust: recalled\nsource: [common-practice]\n"
        },
        "forbidden-mixture",
        _own_mixture,
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
        _ceric_then_solvent,
    ),
    Danger(
        "wet with isopropanol into the oxygen plasma",
        {
            "samples/l.yaml": _sample_file(
                steps="  - {treat: clean, etchant: isopropanol}\n  - {treat: strip, etchant: plasma-o2-ash}\n"
            )
        },
        "steps-must-not-meet",
        lambda: _plan("plasma-o2-ash", steps=[{"treat": "clean", "etchant": "isopropanol"}, {"etch": "any"}]),
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
        lambda: _plan("bhf-5-1", mask="au"),
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
    """The same danger refuses the etchant in a plan, or is its caution."""
    found = danger.plan()
    assert bool(found.forbidden) is not danger.is_caution, found
    codes = {finding.code for finding in found.findings}
    expected = {
        "steps-must-not-meet": "unrinsed-steps",
        "film-gives-gas": "film-meets-etchant",
    }.get(danger.rule, danger.rule)
    assert expected in codes, codes


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


def test_the_mixtures_of_the_lab_are_found_by_the_same_rule() -> None:
    """`plan` and `check` ask one function."""
    assert mixture_findings(RECORDS, RECORDS.etchants["hcl-ito-lab"]) == ()
