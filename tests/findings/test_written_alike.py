"""The same sample, written in any unit and any order, as YAML or JSON, gives the same bytes."""

from __future__ import annotations

import json
import random
from collections.abc import Callable
from decimal import Decimal
from pathlib import Path

import pytest
import yaml
from hypothesis import given, settings
from hypothesis import strategies as st

from builder.checking.sample_check import check_sample
from builder.findings.plan.facts import PlanFacts
from builder.findings.plan.planning import plan
from builder.findings.plan.sample import plan_sample
from builder.findings.plan.store import names_of
from builder.views.plan_json import plan_data

EXAMPLES = 200
_LENGTH_NM = {"nm": 1, "um": 1000, "µm": 1000, "A": Decimal("0.1"), "mm": 1_000_000, "mil": 25_400}
"""Nanometres a unit; SI Brochure, 9th edition (2019), and 1 mil = 25.4 um (NIST SP 811, appendix B)."""
_TIME_S = {"s": 1, "min": 60, "h": 3600}

_whole_nm = st.integers(1, 4000)
_LAYERS = ("si-100", "sin-lpcvd", "al-si", "poly-si-n", "tin", "sio2-thermal-wet")
_EXPOSED = ("al-si", "al-cu", "au", "ti", "si-100", "sin-lpcvd", "tin", "sio2-thermal-dry")


class Writer:
    """Writes quantities in units that a seed chooses; the same seed writes the same."""

    def __init__(self, seed: int) -> None:
        self._choice = random.Random(seed)

    def length(self, nm: int, half_nm: int | None = None) -> str:
        """A length, with its tolerance in a unit of its own."""
        text = self._in(nm, _LENGTH_NM)
        return text if half_nm is None else f"{text} +/- {self._in(half_nm, _LENGTH_NM)}"

    def time(self, seconds: int) -> str:
        """A time."""
        return self._in(seconds, _TIME_S)

    def temperature(self, degc: int) -> str:
        """A temperature."""
        return self._choice.choice((f"{degc} degC", f"{Decimal(degc) + Decimal('273.15')} K"))

    def mixed(self, items: list[dict[str, object]]) -> list[dict[str, object]]:
        """The items in another order, each with its fields in another order."""
        return [self._fields(item) for item in self._choice.sample(items, len(items))]

    def _fields(self, item: dict[str, object]) -> dict[str, object]:
        return dict(self._choice.sample(list(item.items()), len(item)))

    def _in(self, value: int, units: dict[str, int | Decimal]) -> str:
        unit = self._choice.choice(sorted(units))
        # Twenty-eight digits: a length in mil has no end, and what is cut off is no part of a sample.
        return f"{Decimal(value) / Decimal(units[unit]):f} {unit}"


@st.composite
def _plain(draw: st.DrawFn) -> dict[str, object]:
    """A sample in whole nanometres, seconds and degrees."""
    below = draw(st.lists(st.sampled_from(_LAYERS), min_size=1, max_size=2, unique=True))
    return {
        "mask": draw(_whole_nm),
        "target": (draw(st.integers(50, 2000)), draw(st.integers(1, 40))),
        "below": [(film, draw(_whole_nm), draw(st.integers(1, 30))) for film in below],
        "exposed": [
            (film, draw(_whole_nm))
            for film in draw(st.lists(st.sampled_from(_EXPOSED), max_size=4, unique=True))
        ],
        "back": draw(st.none() | _whole_nm),
        "line": draw(st.none() | st.integers(200, 9000)),
        "depth": draw(st.none() | st.integers(10, 50)),
        "hottest": draw(st.none() | st.integers(20, 120)),
        "temperature": draw(st.none() | st.integers(18, 25)),
        "dip": draw(st.none() | st.integers(1, 600)),
    }


def _written(plain: dict[str, object], seed: int) -> dict[str, object]:
    write = Writer(seed)
    target, half = plain["target"]  # type: ignore[misc]
    layers: list[dict[str, object]] = [
        {"film": "resist-positive-a", "thickness": write.length(plain["mask"]), "role": "mask"},  # type: ignore[arg-type]
        {"film": "sio2-thermal-wet", "thickness": write.length(target, half), "role": "target"},
    ]
    for film, nm, allowed in plain["below"]:  # type: ignore[attr-defined]
        loss = write.length(min(nm, allowed))
        layers.append({"film": film, "thickness": write.length(nm), "role": "under", "allowed_loss": loss})
    exposed = [
        {"film": film, "thickness": write.length(nm), "exposed": "face"}
        for film, nm in plain["exposed"]  # type: ignore[attr-defined]
    ]
    data: dict[str, object] = {"sample": "s", "layers": layers, "also_exposed": write.mixed(exposed)}
    if plain["back"] is not None:
        data["back"] = {"film": "sio2-thermal-wet", "thickness": write.length(plain["back"])}  # type: ignore[arg-type]
    goal = {key: write.length(plain[key]) for key in ("line", "depth") if plain[key] is not None}  # type: ignore[arg-type]
    data["goal"] = goal
    if plain["hottest"] is not None:
        data["limits"] = {"temperature": write.temperature(plain["hottest"])}  # type: ignore[arg-type]
    if plain["temperature"] is not None:
        data["temperature"] = write.temperature(plain["temperature"])  # type: ignore[arg-type]
    if plain["dip"] is not None:
        dip = {"treat": "clean", "etchant": "hf-50-1", "time": write.time(plain["dip"])}  # type: ignore[arg-type]
        data["steps"] = [dip, {"etch": "any"}]
    return data


Answer = Callable[[Path], str]


@pytest.fixture(scope="module")
def answer(lab_facts: PlanFacts) -> Answer:
    """Return the plan of a sample file as text."""

    def made(path: Path) -> str:
        sample, problems = check_sample(path, names_of(lab_facts))
        assert sample is not None, problems
        seen = plan_sample(sample, lab_facts.defaults)
        return json.dumps(plan_data(plan(lab_facts, seen, sample.steps, confidence=0.90)))

    return made


@pytest.fixture(scope="module")
def folder(tmp_path_factory: pytest.TempPathFactory) -> Path:
    """A folder for samples."""
    return tmp_path_factory.mktemp("samples")


@settings(max_examples=EXAMPLES, derandomize=True, deadline=None)
@given(plain=_plain(), seed=st.integers(1, 10**6))
def test_units_and_order_leave_no_trace(
    folder: Path, answer: Answer, plain: dict[str, object], seed: int
) -> None:
    """Lengths in nm, um, mm, mil and angstroms; times in s, min, h; degC and K; YAML and JSON."""
    first, second = folder / "a.yaml", folder / "b.json"
    first.write_text(yaml.safe_dump(_written(plain, 0), allow_unicode=True), encoding="utf-8")
    second.write_text(json.dumps(_written(plain, seed)), encoding="utf-8")
    assert answer(first) == answer(second)


def test_the_writer_does_change_the_text() -> None:
    """Else the test above could not fail."""
    texts = {Writer(seed).length(1500, 40) for seed in range(60)}
    assert {"1500 nm +/- 40 nm", "1.5 um +/- 0.00004 mm"} <= texts
