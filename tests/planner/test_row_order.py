"""Among films of one word, the one that comes closest to its limit stands first."""

from __future__ import annotations

import math
from itertools import pairwise

from builder.findings.plan.planning import plan
from builder.findings.plan.result import FilmRow
from builder.findings.plan.sample import plan_sample
from builder.records.samples import Sample
from builder.records.terms import Origin
from builder.views.plan_words import blocker
from tests.planner.conftest import PlannerLab
from tests.planner.random_samples import recipe_cases

_CASES = 60
_SEED = 41


def _uses(row: FilmRow) -> tuple[int, float]:
    """Unknown before known before what may vanish; of the known, how much of the allowance goes."""
    if row.allowed_nm is not None and math.isinf(row.allowed_nm):
        return 0, 0.0
    if row.allowed_nm is None or row.allowed_nm == 0:
        return 2, 0.0
    if row.loss.high is None or row.loss_by_look.high is None:
        return 2, 0.0
    return 1, max(row.loss.high / row.allowed_nm, row.loss_by_look.high / row.allowed_nm)


def test_the_closest_film_of_a_word_comes_first(lab: PlannerLab) -> None:
    """In random plans no film stands below another of the same words that uses less of its allowance."""
    compared = 0
    for case in recipe_cases(lab.facts, _CASES, _SEED):
        sample = Sample.from_raw(case.sample, "random.json", Origin.LAB)
        seen = plan_sample(sample, lab.facts.defaults)
        made = plan(lab.facts, seen, sample.steps, confidence=case.confidence, etchant=case.etchant)
        for option in (option for stage in made.stages for option in stage.options):
            for above, below in pairwise(option.rows):
                words = (above.verdict, above.verdict_by_look)
                if words != (below.verdict, below.verdict_by_look):
                    continue
                (known, share), (known_below, share_below) = _uses(above), _uses(below)
                assert known > known_below or (known == known_below and share >= share_below * (1 - 1e-8))
                compared += 1
    assert compared > _CASES


def test_the_sentence_names_the_closest_film(lab: PlannerLab) -> None:
    """Nitride that loses a sixteenth of its allowance is closer than silicon that loses a hundredth."""
    layers = [
        {"film": "resist-positive-a", "thickness": "1.4 um", "role": "mask"},
        {"film": "sio2-thermal-wet", "thickness": "300 nm", "role": "target"},
        {"film": "sin-lpcvd", "thickness": "150 nm", "role": "under", "allowed_loss": "10 nm"},
        {"film": "si-100", "thickness": "525 um", "role": "under"},
    ]
    back = {"film": "sio2-thermal-wet", "thickness": "300 nm", "allowed_loss": "any"}
    raw = {"sample": "stack", "layers": layers, "back": back, "edge": "protected"}
    sample = Sample.from_raw(raw, "stack.json", Origin.LAB)
    seen = plan_sample(sample, lab.facts.defaults)
    option = plan(lab.facts, seen, (), confidence=0.9).stages[0].options[0]
    assert blocker(option).startswith(
        "Every film holds; closest is sin-lpcvd under the target: at worst 0.61"
    )
    assert option.rows[-1].allowed_nm == math.inf
