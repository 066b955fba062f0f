"""The samples of the demonstration lab ask the questions that practitioners bring."""

from __future__ import annotations

from builder.records.lab import LabRecords
from builder.records.samples import Sample
from builder.records.terms import Role, Treatment


def _sample(records: LabRecords, name: str) -> Sample:
    return records.samples[name]


def test_the_samples_of_practitioners(records: LabRecords) -> None:
    """Each asks the question it is there for."""
    gold = _sample(records, "gold-pads-in-bhf").also_exposed[0]
    assert gold.film == "au" and gold.on is None
    assert _sample(records, "oxide-over-thin-tin").layers[2].film == "tin"
    lines = _sample(records, "fine-lines-in-thick-oxide")
    assert lines.goal.line is not None and lines.goal.line.number < 2 * lines.targets[0].thickness_nm
    assert _sample(records, "boron-membrane-in-koh").layers[2].film == "si-p-plus-plus"
    assert _sample(records, "gold-on-nickel").layers[2].film == "ni"
    assert {film.film for film in _sample(records, "platinum-near-hf-dip").also_exposed} == {"pt", "ti"}
    developer = _sample(records, "aluminium-pads-through-developer")
    treatments = [step.treat for step in developer.steps if step.treat is not Treatment.RINSE]
    assert treatments == [Treatment.DEVELOP, Treatment.REWORK, Treatment.DEVELOP, None]
    assert _sample(records, "aluminium-without-strip").steps[0].etch == "aluminium-rie"
    assert _sample(records, "oxide-on-polyimide").layers[2].film == "polyimide"
    assert _sample(records, "chip-on-silicon-carrier").mount.carrier == "si-100"
    assert [film.film for film in _sample(records, "gold-on-chromium").targets] == ["au", "cr"]
    nitride = _sample(records, "nitride-on-oxide")
    assert [layer.role for layer in nitride.layers[:3]] == [Role.MASK, Role.TARGET, Role.UNDER]
