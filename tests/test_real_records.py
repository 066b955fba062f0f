"""The records that ship, and the demonstration lab, have no error; checking them stays quick."""

from __future__ import annotations

import datetime
import re
from pathlib import Path

from builder.checking.lab_check import check_lab
from builder.checking.schema_files import Schemas
from builder.problems import Severity, format_text
from builder.reading.lab_tree import Kind, find_shipped, read_lab

LAB = Path(__file__).resolve().parents[1]


def test_the_shipped_records_and_the_demonstration_lab_have_no_error() -> None:
    """Whoever clones the project starts from a clean check."""
    records, problems = check_lab(LAB)
    assert [format_text(problem) for problem in problems if problem.severity is Severity.ERROR] == []
    assert records is not None


def test_the_shipped_records_alone_have_no_problem(tmp_path: Path) -> None:
    """A new lab has nothing to mend, not even a notice, and the shipped settings."""
    (tmp_path / "recipes").mkdir()
    records, problems = check_lab(tmp_path, datetime.date(2026, 6, 1))
    assert [format_text(problem) for problem in problems] == []
    assert records is not None
    assert records.settings.file == "recipes/reference/lab.yaml"


def test_the_shipped_settings_are_those_of_the_design() -> None:
    """Numbers that decide verdicts do not change by accident."""
    (lab,) = [file for file in read_lab(LAB).of_kind(Kind.LAB) if file.origin == "reference"]
    assert isinstance(lab.raw.data, dict)
    data = lab.raw.data
    assert data["confidence"] == 0.9
    assert data["defaults"] == {
        "sigma_literature": {
            "wet_close": 0.25,
            "wet_other": 0.6,
            "plasma": 0.7,
            "cyclic": 0.7,
            "vapour": 0.9,
        },
        "spread": {
            "wet_thermostated": {"s0": 0.06, "d0": 4},
            "wet_open": {"s0": 0.15, "d0": 4},
            "plasma": {"s0": 0.12, "d0": 4},
            "cyclic": {"s0": 0.12, "d0": 4},
            "vapour": {"s0": 0.15, "d0": 4},
        },
        "nonuniformity": {
            "immersion": "3 %",
            "gas_bubbles": "10 %",
            "vapour": "10 %",
            "plasma": "5 %",
            "deep_silicon": "10 %",
        },
        "thickness_tolerance": "2 %",
        "reaction_time": {"wet": "15 s", "plasma": "3 s"},
        "allowed_loss": {
            "under": {"share": "5 %", "length": "10 nm"},
            "other": {"share": "2 %", "length": "5 nm", "at_least": "1 nm"},
            "none_below": "20 nm",
        },
        "mask_reserve": {
            "resist_plasma": {"share": "20 %", "length": "200 nm"},
            "other": {"share": "10 %", "length": "20 nm"},
        },
    }


def test_every_yaml_record_names_its_schema_in_the_first_line() -> None:
    """An editor then helps while typing."""
    line = re.compile(r"# yaml-language-server: \$schema=(\S+)")
    columns = Schemas(find_shipped().schemas).run_columns()
    for file in read_lab(LAB, columns=columns).files:
        if file.kind is Kind.RUNS:
            continue
        path = LAB / file.raw.file
        match = line.fullmatch(path.read_text(encoding="utf-8").splitlines()[0])
        assert match, file.raw.file
        assert (path.parent / match[1]).resolve() == LAB / "schemas" / f"{file.kind}.schema.json"
