"""A whole lab: settings, what a broken file does to others, and never a traceback."""

from __future__ import annotations

import copy
import datetime
import random
from collections.abc import Iterator
from pathlib import Path

import pytest
from hypothesis import HealthCheck, given, settings
from hypothesis import strategies as st

from builder.checking.lab_check import check_lab, check_records, shape
from builder.checking.schema_files import Schemas
from builder.problems import Problem, Severity
from builder.reading.lab_tree import RawFile, Shipped, find_shipped, read_lab
from builder.reading.raw import Raw
from tests.checking.example_lab import AS_OF, EXAMPLES

FILM = "name: Film\nfamily: oxide\nclass: film\nbarrier: dense\n"
SOURCE = "title: T\naccess: seen\ntrust: recalled\n"


@pytest.fixture
def shipped(tmp_path: Path) -> Shipped:
    """Return a reference with nothing but settings, a source and two films."""
    reference = tmp_path / "reference"
    settings_text = (find_shipped().reference / "lab.yaml").read_text(encoding="utf-8")
    files = {"lab.yaml": settings_text, "sources/s.yaml": SOURCE, "films/a.yaml": FILM, "films/b.yaml": FILM}
    for name, text in files.items():
        (reference / name).parent.mkdir(parents=True, exist_ok=True)
        (reference / name).write_text(text, encoding="utf-8")
    return Shipped(reference, find_shipped().schemas)


def check(tmp_path: Path, shipped: Shipped, files: dict[str, str]) -> tuple[bool, list[Problem]]:
    """Return whether there are records, and the problems, of a lab with these files."""
    (tmp_path / "lab" / "recipes").mkdir(parents=True)
    for name, text in files.items():
        path = tmp_path / "lab" / "recipes" / name
        path.parent.mkdir(parents=True, exist_ok=True)
        path.write_text(text, encoding="utf-8")
    records, problems = check_lab(tmp_path / "lab", AS_OF, shipped)
    return records is not None, list(problems)


def test_a_lab_without_settings_works_with_the_shipped_ones(tmp_path: Path, shipped: Shipped) -> None:
    """`lab.yaml` may be missing."""
    assert check(tmp_path, shipped, {}) == (True, [])


def test_an_incomplete_installation_is_a_problem(tmp_path: Path, shipped: Shipped) -> None:
    """No default is made up where the shipped settings are gone."""
    (shipped.reference / "lab.yaml").unlink()
    has_records, problems = check(tmp_path, shipped, {"lab.yaml": "name: L\n"})
    assert not has_records
    assert [problem.rule for problem in problems] == ["no-reference"]
    assert "install" in problems[0].hint


def test_an_error_leaves_no_records(tmp_path: Path, shipped: Shipped) -> None:
    """A plan without the broken fact might call something safe."""
    has_records, problems = check(tmp_path, shipped, {"films/c.yaml": FILM + "similar: [d]\n"})
    assert not has_records
    assert [(problem.rule, problem.file, problem.line) for problem in problems] == [
        ("unknown-id", "recipes/films/c.yaml", 5)
    ]


def test_a_notice_leaves_the_records(tmp_path: Path, shipped: Shipped) -> None:
    """Age is no error."""
    spread = "as_of: 2027-01-01\nmethods: {}\n"
    has_records, problems = check(tmp_path, shipped, {"spread.yaml": spread})
    assert has_records
    assert [(problem.rule, problem.severity) for problem in problems] == [("future-date", Severity.NOTICE)]


@pytest.mark.parametrize("broken", [FILM + "colour: red\n", FILM + "noble: .nan\n", "", "a: [\n"])
def test_a_broken_file_does_not_make_references_to_it_unknown(
    tmp_path: Path, shipped: Shipped, broken: str
) -> None:
    """One mistake, one problem."""
    files = {"films/c.yaml": broken, "films/d.yaml": FILM + "similar: [c]\n"}
    has_records, problems = check(tmp_path, shipped, files)
    assert not has_records
    assert {problem.file for problem in problems} == {"recipes/films/c.yaml"}


def test_problems_of_all_files_come_in_one_run_sorted(tmp_path: Path, shipped: Shipped) -> None:
    """Reading, shape and rules together."""
    files = {
        "films/z.yaml": FILM + "similar: [none]\n",
        "films/y.yaml": FILM + "colour: red\n",
        "films/x.yaml": FILM + "noble: 010\n",
        "film/w.yaml": FILM,
    }
    _, problems = check(tmp_path, shipped, files)
    assert [problem.rule for problem in problems] == [
        "unknown-kind",
        "leading-zero",
        "unknown-field",
        "unknown-id",
    ]


def test_the_day_is_the_one_given_else_that_of_the_lab(tmp_path: Path, shipped: Shipped) -> None:
    """A demonstration lab does not grow old."""
    lab = tmp_path / "lab"
    (lab / "recipes").mkdir(parents=True)
    (lab / "recipes" / "lab.yaml").write_text("name: L\nas_of: 2026-06-01\n")
    (lab / "recipes" / "spread.yaml").write_text("as_of: 2026-06-02\nmethods: {}\n")
    assert [problem.rule for problem in check_lab(lab, None, shipped)[1]] == ["future-date"]
    assert check_lab(lab, datetime.date(2026, 6, 2), shipped)[1] == []


def places(data: object, path: tuple[str | int, ...] = ()) -> Iterator[tuple[str | int, ...]]:
    """Yield the path of every value within data."""
    yield path
    items = data.items() if isinstance(data, dict) else enumerate(data) if isinstance(data, list) else ()
    for key, value in items:
        yield from places(value, (*path, key))


def replaced(data: object, path: tuple[str | int, ...], value: object) -> object:
    """Return a copy of the data with another value at the path."""
    if not path:
        return value
    copied = copy.deepcopy(data)
    inner = copied
    for key in path[:-1]:
        inner = inner[key]  # type: ignore[index]
    inner[path[-1]] = value  # type: ignore[index]
    return copied


SCHEMAS = Schemas(find_shipped().schemas)
FILES = tuple(file for file in read_lab(EXAMPLES / "lab").files if file.origin == "lab")
SETTINGS_FILE = next(
    file for file in read_lab(EXAMPLES / "lab").files if file.raw.file.endswith("reference/lab.yaml")
)
ODD = st.one_of(
    st.none(),
    st.booleans(),
    st.integers(-3, 3),
    st.sampled_from(
        ["", "x", "any", "5 nm", "-1 s", "room", "a b", "family:metal", "example-etch", "\u0660"]
    ),
    st.just([]),
    st.just({}),
    st.just(["x", 1, {}]),
    st.just({"film": "x", "id": 3}),
)


@given(st.sampled_from(FILES), st.randoms(use_true_random=False), ODD)
@settings(max_examples=150, deadline=None, suppress_health_check=[HealthCheck.too_slow])
def test_no_record_ends_in_a_traceback(file: RawFile, chance: random.Random, odd: object) -> None:
    """Any value anywhere gives problems, or records; nothing is thrown."""
    path = chance.choice(list(places(file.raw.data)))
    raw = Raw(replaced(file.raw.data, path, odd), file.raw.positions, file.raw.file)  # type: ignore[arg-type]
    others = [shape(other, SCHEMAS) for other in (*FILES, SETTINGS_FILE) if other is not file]
    changed = shape(RawFile(file.kind, file.id, file.origin, raw), SCHEMAS)
    records, problems = check_records([*others, changed], as_of=AS_OF)
    assert records is not None or problems


@pytest.mark.parametrize("name", ["hf-49", "acetone", "h2so4-96", "bcl3"])
def test_a_broken_chemical_is_one_problem_and_no_traceback(name: str) -> None:
    """Rules that follow parts into chemicals do without the records that name it."""
    files = read_lab(EXAMPLES / "lab", columns=SCHEMAS.run_columns()).files
    broken = next(file for file in files if (str(file.kind), file.id) == ("chemicals", name))
    raw = Raw({**broken.raw.data, "h_codes": 3}, broken.raw.positions, broken.raw.file)  # type: ignore[dict-item]
    changed = RawFile(broken.kind, broken.id, broken.origin, raw)
    shaped = [shape(changed if file is broken else file, SCHEMAS) for file in files]
    records, problems = check_records(shaped, as_of=AS_OF)
    assert records is None
    assert [(problem.file, problem.rule) for problem in problems] == [(broken.raw.file, "wrong-type")]
