"""People's mistakes: each is told in words and placed, all in one run, and never with a traceback."""

from __future__ import annotations

import re
import shutil
from pathlib import Path

import pytest

from tests.cli.program import LAB, Program

FIRST = LAB / "recipes" / "samples" / "first-oxide-window.yaml"
PLACED = re.compile(r"(?m)^(\S+):(\d+):(\d+): error ([a-z-]+): (.*)$")

BROKEN = {
    "etches/oxide-bhf.yaml": ("etchant: bhf-5-1", "etchant: bhf-51"),
    "etches/nitride-rie.yaml": ("method: plasma", "method: plsama"),
    "etches/silicon-koh.yaml": ("temperature: 80 degC", "temperature: 80"),
    "films/sio2-pecvd-lab.yaml": ("family: oxide", "familly: oxide"),
    "tools/rie-chlorine.yaml": ("kind: plasma", "kind: [plasma"),
    "couples/au-ti-in-ki-i2.yaml": ("films: [au, ti]", "films: [au, titan]"),
    "samples/gold-on-nickel.yaml": ("thickness: 150 nm", "thickness: -150 nm"),
    "samples/aluminium-lines.yaml": ("role: target", "role: mask"),
    "runs/oxide-bhf.csv": (",180,522.5,", ",-180,522.5,"),
    "lab.yaml": ("confidence: 0.90", "confidence: 90"),
}
"""Ten records, each with one mistake."""


@pytest.fixture
def broken(lab: Path, tmp_path: Path) -> Path:
    """A lab with ten broken records."""
    folder = tmp_path / "lab"
    shutil.copytree(lab / "recipes", folder / "recipes")
    for name, (good, bad) in BROKEN.items():
        path = folder / "recipes" / name
        text = path.read_text("utf-8")
        assert text.count(good) >= 1, name
        path.write_text(text.replace(good, bad, 1), "utf-8")
    return folder


def test_ten_broken_records_in_one_run(program: Program, broken: Path) -> None:
    """Every file is named with line and column, and the last line counts."""
    ended = program("check", "--lab", broken)
    files = {found[0] for found in PLACED.findall(ended.out)}
    assert ended.status == 1
    assert files >= {f"recipes/{name}" for name in BROKEN}
    assert re.search(r"^\d+ errors, \d+ notices?$", ended.out.splitlines()[-1])
    assert "Traceback" not in ended.out + ended.err


def test_no_plan_is_made_of_broken_records(program: Program, broken: Path) -> None:
    """And nothing is printed where an answer would stand."""
    ended = program("plan", FIRST, "--lab", broken)
    assert (ended.status, ended.out) == (1, "")
    assert ended.err.splitlines()[-1].endswith(
        "errors; no plan can be made of these records; mend them first"
    )


MISTAKES = """sample: mistakes
layers:
  - {film: si-100, thickness: 525 um, role: under}
  - {film: thermal oxide, thickness: 500, role: target}
  - {film: AZ resist, thickness: -1.4 um, role: mask}
also_exposed:
  - {film: SiO2, thickness: 300 nm}
  - {film: goldd, thickness: 20 nm, on: titanium}
goal: {depth: through, line: 3}
limits: {methods: [wett], etchants: [bhf]}
"""


def test_all_mistakes_of_a_sample_in_one_run(program: Program, lab: Path, tmp_path: Path) -> None:
    """Synonyms and formulas are looked up, units asked for, the stack is read; each at its place."""
    path = tmp_path / "s.yaml"
    path.write_text(MISTAKES, "utf-8")
    ended = program("plan", path, "--lab", lab)
    found = {(int(line), rule): words for _, line, _, rule, words in PLACED.findall(ended.err)}
    assert (ended.status, ended.out) == (1, "")
    assert set(found) >= {
        (4, "unknown-id"), (4, "unit-missing"), (4, "target-covered"), (5, "unknown-id"), (5, "negative"),
        (5, "upside-down"), (7, "unknown-id"), (8, "unknown-id"), (9, "unit-missing"), (10, "unknown-word"),
        (10, "unknown-id"),
    }  # fmt: skip
    assert 'did you mean "sio2-thermal-wet"' in found[4, "unknown-id"]
    assert "sio2-thermal-wet" in found[7, "unknown-id"]
    assert 'did you mean "wet"?' in found[10, "unknown-word"]
    assert "layers are listed top first" in found[5, "upside-down"]
    assert ended.err.splitlines()[-1] == f"{len(PLACED.findall(ended.err))} errors; no plan made"
    assert '"goldd"; did you mean "au"?' in ended.err
    assert '"titanium"; did you mean "ti"?' in ended.err


def test_a_sample_without_a_target(program: Program, lab: Path, tmp_path: Path) -> None:
    """It is told which word is missing."""
    path = tmp_path / "s.yaml"
    path.write_text("layers:\n  - {film: si-100, thickness: 525 um, role: under}\n", "utf-8")
    ended = program("plan", path, "--lab", lab)
    assert ended.status == 1
    assert (
        f'{path}:2:3: error no-target: no layer is the target; give the film to be removed "role: target"'
        in (ended.err)
    )


def test_what_is_no_sample_at_all(program: Program, lab: Path, tmp_path: Path) -> None:
    """A missing file, a folder, bytes that are no text, an empty file, another record."""
    binary, empty = tmp_path / "b.yaml", tmp_path / "e.yaml"
    binary.write_bytes(bytes(range(256)))
    empty.write_text("", "utf-8")
    paths = (tmp_path / "none.yaml", tmp_path, binary, empty, lab / "recipes" / "lab.yaml")
    for path in paths:
        ended = program("plan", path, "--lab", lab)
        assert (ended.status, ended.out) == (1, ""), path
        assert str(path) in ended.err
        assert re.search(r"error [a-z0-9-]+: .+", ended.err)


@pytest.mark.parametrize(
    ("arguments", "words"),
    [
        (("plam", FIRST), 'There is no command "plam". Did you mean "plan"?'),
        (("plan",), "Missing argument 'SAMPLE'"),
        (("plan", FIRST, "--lab", "/no/such/lab"), "name the lab's folder with --lab"),
        (("plan", FIRST, "--etchant", "bhf-51"), 'There is no etchant "bhf-51"; did you mean "bhf-5-1"?'),
        (("plan", FIRST, "--temperature", "80"), '"80" needs a unit of temperature'),
        (("plan", FIRST, "--as-of", "tomorrow"), '"tomorrow" is no day; write it as 2026-11-15'),
        (("plan", FIRST, "--confidence", "sure"), '"sure" is no confidence; write it as 0.95'),
        (("plan", FIRST, "--jason"), "--jason"),
    ],
)
def test_a_mistyped_command(program: Program, arguments: tuple[object, ...], words: str) -> None:
    """Bad input ends with 1: 2 is an answer of a plan."""
    ended = program(*arguments, *(() if "--lab" in arguments or arguments[0] != "plan" else ("--lab", LAB)))
    assert (ended.status, ended.out) == (1, "")
    assert words in ended.err


def test_check_of_no_lab(program: Program) -> None:
    """It says so, and does not call an empty place free of errors."""
    ended = program("check", "--lab", "/no/such/lab")
    assert ended.status == 1
    assert "no-recipes" in ended.out


def test_a_new_lab_passes_its_check_and_plans_its_sample(program: Program, tmp_path: Path) -> None:
    """The first thing a newcomer does; a folder that is in use is left alone."""
    folder = tmp_path / "my-lab"
    assert program("new", folder).status == 0
    checked = program("check", "--lab", folder)
    assert (checked.status, " no errors" in checked.out) == (0, True)
    (sample,) = (folder / "recipes" / "samples").glob("*.yaml")
    assert program("plan", sample, "--lab", folder).status in (0, 2)
    again = program("new", folder)
    assert again.status == 1
    assert "is not empty; name a new folder" in again.err
