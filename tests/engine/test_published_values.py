"""Every number of the case files, each with its published source, its hand calculation or "from memory"."""

from __future__ import annotations

import dataclasses

import pytest

import builder.engine
from bench.check_values import CASES, ROUTES, Case, cases, checks_of

ALL = list(cases())


@pytest.mark.parametrize("case", ALL, ids=lambda case: f"{case.file}: {case.name}")
def test_engine_gives_the_expected_values(case: Case) -> None:
    """The engine reproduces the case within its tolerance."""
    checks = checks_of(case)
    assert checks
    wrong = [(c.quantity, c.expected, c.got, c.allowed) for c in checks if not c.passed]
    assert not wrong, f"{case.source}: {wrong}"


@pytest.mark.parametrize("case", ALL, ids=lambda case: f"{case.file}: {case.name}")
def test_every_case_says_where_it_comes_from(case: Case) -> None:
    """A case names its source and how far it is trusted; what is recalled says so."""
    assert len(case.source) > len("by hand")
    assert case.trust in {"read", "memory", "computed"}
    if case.trust == "memory":
        assert "memory" in case.source or "pi^2" in case.source


def test_every_case_file_is_run() -> None:
    """No case file is left out, and none is empty; quantities are read by tests/planner/test_units.py."""
    files = {path.stem for path in CASES.glob("*.json")} - {"quantities"}
    assert files == set(ROUTES) == {case.file for case in ALL}


def test_names_of_cases_are_unique() -> None:
    """Two cases never hide behind one name."""
    names = [(case.file, case.name) for case in ALL]
    assert len(names) == len(set(names))


@pytest.mark.parametrize("case", ALL, ids=lambda case: f"{case.file}: {case.name}")
def test_a_wrong_value_would_be_noticed(case: Case) -> None:
    """Each expected number, moved by a tenth (or from "none" to a number), fails its check."""
    for quantity, expected in case.expected.items():
        moved = [_moved(value) for value in expected] if isinstance(expected, list) else _moved(expected)
        altered = dataclasses.replace(case, expected={quantity: moved})
        assert not any(check.passed for check in checks_of(altered)), quantity


def test_public_names_exist_once() -> None:
    """Everything the engine offers exists, and is listed once."""
    names = builder.engine.__all__
    assert len(names) == len(set(names))
    assert all(hasattr(builder.engine, name) for name in names)


def _moved(value: float | None) -> float:
    if value is None:
        return 1.0
    return value * 1.1 + (1 if value == 0 else 0)
