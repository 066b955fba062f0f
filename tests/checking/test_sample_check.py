"""A sample outside the records: every fault in one run, with films suggested by the names people use."""

from __future__ import annotations

import json
from pathlib import Path

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from builder.checking.lab_check import check_lab
from builder.checking.sample_check import check_sample, check_sample_data
from builder.problems import Problem
from builder.reading.raw import Positions, Raw
from builder.records.lab import LabRecords
from builder.records.samples import Sample
from tests.checking.example_lab import AS_OF, EXAMPLES

GOOD = """
sample: membrane
layers:
  - {film: resist-positive-a, thickness: 1.4 um, role: mask}
  - {film: sio2-thermal-wet, thickness: 500 nm, role: target}
  - {film: si-100, thickness: 525 um, role: under}
"""


def example_records() -> LabRecords:
    """Return the records of the example lab."""
    records, _ = check_lab(EXAMPLES / "lab", AS_OF)
    assert records is not None
    return records


RECORDS = example_records()


def checked(tmp_path: Path, text: str, name: str = "s.yaml") -> tuple[Sample | None, list[Problem]]:
    """Return the sample and the problems of a file with this text."""
    path = tmp_path / name
    path.write_text(text, encoding="utf-8")
    sample, problems = check_sample(path, RECORDS, name)
    return sample, list(problems)


def test_a_good_sample_is_returned(tmp_path: Path) -> None:
    """With its films in order."""
    sample, problems = checked(tmp_path, GOOD)
    assert problems == []
    assert sample is not None
    assert [layer.film for layer in sample.layers] == ["resist-positive-a", "sio2-thermal-wet", "si-100"]


def test_json_is_taken_too(tmp_path: Path) -> None:
    """As another program writes it."""
    data = {"layers": [{"film": "sio2-thermal-wet", "thickness": "500 nm", "role": "target"}]}
    sample, problems = checked(tmp_path, json.dumps(data, indent=1), "s.json")
    assert problems == []
    assert sample is not None
    assert sample.sample == "s"


def test_all_mistakes_are_found_in_one_run(tmp_path: Path) -> None:
    """Unknown film, missing unit, a stack upside down, a misspelt field: each placed."""
    text = """
sample: membrane
layers:
  - {film: SiO2, thickness: 500 nm, role: target}
  - {film: resist-positive-a, thickness: 1400, role: mask}
  - {film: si-10, thicknes: 525 um, role: under}
back: {film: si-1000, thickness: 0 nm}
"""
    sample, problems = checked(tmp_path, text)
    assert sample is None
    assert [(problem.line, problem.rule, problem.pointer) for problem in problems] == [
        (4, "unknown-id", "/layers/0/film"),
        (5, "unit-missing", "/layers/1/thickness"),
        (5, "upside-down", "/layers/1/role"),
        (6, "missing-field", "/layers/2"),
        (6, "unknown-id", "/layers/2/film"),
        (6, "unknown-field", "/layers/2/thicknes"),
        (7, "unknown-id", "/back/film"),
        (7, "not-positive", "/back/thickness"),
    ]


@pytest.mark.parametrize(
    ("word", "expected"),
    [
        ("SiO2", "sio2-thermal-wet"),
        ("thermal oxide", "sio2-thermal"),
        ("Si3N4", "sin-"),
        ("gold", '"au"'),
        ("si100", '"si-100"'),
        ("silicon", "si-100"),
    ],
)
def test_an_unknown_film_is_looked_up_by_name_synonym_and_formula(
    tmp_path: Path, word: str, expected: str
) -> None:
    """People write what they call it."""
    _, problems = checked(tmp_path, GOOD.replace("sio2-thermal-wet", word))
    (problem,) = problems
    assert problem.rule == "unknown-id"
    assert expected in problem.hint


def test_numbers_are_judged_although_a_name_is_wrong(tmp_path: Path) -> None:
    """One run, not two."""
    text = GOOD.replace("si-100", "si-1000").replace("500 nm", "500 nm +/- 600 nm")
    _, problems = checked(tmp_path, text)
    assert [problem.rule for problem in problems] == ["tolerance-too-large", "unknown-id"]


@pytest.mark.parametrize("text", ["", "- a\n", "layers:\n", "layers: 3\n", "a: [\n", "layers: [1, 2]\n"])
def test_what_is_no_sample_is_a_problem(tmp_path: Path, text: str) -> None:
    """And no traceback."""
    sample, problems = checked(tmp_path, text)
    assert sample is None
    assert problems


def test_a_missing_file_is_a_problem(tmp_path: Path) -> None:
    """With the name it was given."""
    sample, (problem,) = check_sample(tmp_path / "none.yaml", RECORDS, "none.yaml")
    assert sample is None
    assert (problem.file, problem.rule) == ("none.yaml", "unreadable-file")


JSON = st.recursive(
    st.none()
    | st.booleans()
    | st.integers()
    | st.sampled_from(["au", "5 nm", "-1 nm", "mask", "target", "under", "any", "none", "protected", "x"]),
    lambda inner: (
        st.lists(inner, max_size=3)
        | st.dictionaries(
            st.sampled_from(
                [
                    "layers",
                    "film",
                    "thickness",
                    "role",
                    "on",
                    "back",
                    "goal",
                    "depth",
                    "limits",
                    "tools",
                    "steps",
                    "etch",
                ]
            ),
            inner,
            max_size=5,
        )
    ),
    max_leaves=25,
)


@given(JSON)
@settings(deadline=None, max_examples=150)
def test_no_data_end_in_a_traceback(data: object) -> None:
    """There is a sample or a problem."""
    sample, problems = check_sample_data(Raw(data, Positions(), "s.yaml"), RECORDS)  # type: ignore[arg-type]
    assert (sample is None) == bool(problems)
