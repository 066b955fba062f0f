"""The store beside a lab: a copy that may be lost or spoilt at any time and changes no answer."""

from __future__ import annotations

import hashlib
import os
import shutil
import stat
import subprocess
import sys
from pathlib import Path

import pytest

from builder.findings.plan.store import load
from tests.cli.program import LAB, Program

FIRST = LAB / "recipes" / "samples" / "first-oxide-window.yaml"
STORE = ".etchwright"


@pytest.fixture
def own_lab(lab: Path, tmp_path: Path) -> Path:
    """A lab that a test may change."""
    folder = tmp_path / "lab"
    shutil.copytree(lab / "recipes", folder / "recipes")
    return folder


def _stored(folder: Path) -> Path:
    (path,) = (folder / STORE).glob("plan-*.json")
    return path


def test_cold_warm_and_spoilt_stores_give_the_same_bytes(program: Program, own_lab: Path) -> None:
    """Cut off in the middle, it is made anew and is then as it was."""
    asked = ("plan", FIRST, "--lab", own_lab, "--json")
    cold = program(*asked)
    path = _stored(own_lab)
    good = path.read_bytes()
    assert program(*asked) == cold
    path.write_bytes(good[: len(good) // 2])
    assert program(*asked) == cold
    assert _stored(own_lab).read_bytes() == good


def test_no_spoilt_store_is_taken_for_facts(program: Program, own_lab: Path) -> None:
    """Empty, no text, of another key, or with one number another: it is no store."""
    program("plan", FIRST, "--lab", own_lab)
    path = _stored(own_lab)
    good = path.read_bytes()
    stamp, _, text = good.partition(b"\n")
    key = stamp.split()[0].decode()
    assert load(own_lab, key) is not None
    assert load(own_lab, key[:-1] + "x") is None
    other = text.replace(b'"confidence": 0.9,', b'"confidence": 0.8,', 1)
    assert other != text
    nested = b"[" * 100_000
    digest = hashlib.sha256(nested).hexdigest()
    spoilt = (
        b"", b"{}", b"\xff\xfe", text, stamp, stamp + b"\n", stamp + b"\n{}", stamp + b"\n" + other,
        good + b" ", f"{key} {digest}\n".encode() + nested,
        f"{key} {hashlib.sha256(b'[5]').hexdigest()}\n".encode() + b"[5]",
    )  # fmt: skip
    for bytes_of in spoilt:
        path.write_bytes(bytes_of)
        assert load(own_lab, key) is None, bytes_of[:60]


def test_a_changed_record_is_seen_at_once(program: Program, own_lab: Path) -> None:
    """A retired recipe is gone from the next plan, and back when it is back."""
    asked = ("plan", FIRST, "--lab", own_lab, "--json")
    before = program(*asked)
    path = own_lab / "recipes" / "etches" / "oxide-bhf.yaml"
    text = path.read_text("utf-8")
    path.write_text(
        text.replace("status: proven", "status: retired\nretired_reason: The tank is gone."), "utf-8"
    )
    after = program(*asked)
    recipes = [option["recipe"] for option in after.data["options"]]  # type: ignore[attr-defined]
    assert before.data["options"][0]["recipe"] == "oxide-bhf"  # type: ignore[index]
    assert "oxide-bhf" not in recipes
    path.write_text(text, "utf-8")
    assert program(*asked) == before


def test_a_new_and_a_removed_record_are_seen(program: Program, own_lab: Path) -> None:
    """Not only changed ones."""
    asked = ("plan", FIRST, "--lab", own_lab, "--json")
    before = program(*asked)
    run_file = own_lab / "recipes" / "runs" / "oxide-bhf.csv"
    text = run_file.read_text("utf-8")
    run_file.unlink()
    without = program(*asked)
    assert without.out != before.out
    run_file.write_text(text, "utf-8")
    assert program(*asked) == before


def test_a_folder_that_cannot_be_written_is_no_hindrance(program: Program, own_lab: Path) -> None:
    """Read-only, or with a file where the store would stand."""
    asked = ("plan", FIRST, "--lab", own_lab, "--json")
    (own_lab / STORE).write_text("in the way", "utf-8")
    blocked = program(*asked)
    (own_lab / STORE).unlink()
    mode = own_lab.stat().st_mode
    own_lab.chmod(stat.S_IRUSR | stat.S_IXUSR)
    try:
        closed = program(*asked)
    finally:
        own_lab.chmod(mode)
    shutil.rmtree(own_lab / STORE, ignore_errors=True)
    assert blocked == closed == program(*asked)
    assert blocked.status == 0


def test_the_way_of_a_plan_loads_nothing_heavy(own_lab: Path, program: Program) -> None:
    """Pandas, fits, drawing and the host are for other commands; a plan must answer at once."""
    program("plan", FIRST, "--lab", own_lab)
    heavy = ("scipy.stats", "pandas", "pint", "matplotlib", "mkdocs", "jinja2")
    code = (
        "import sys\n"
        f"sys.argv = ['etchwright', 'plan', {str(FIRST)!r}, '--lab', {str(own_lab)!r}]\n"
        "from builder.cli import main\n"
        "try:\n    main()\n"
        "except SystemExit as ended:\n    status = ended.code\n"
        f"print(status, [name for name in {heavy!r} if name in sys.modules], file=sys.stderr)\n"
    )
    done = subprocess.run(
        [sys.executable, "-c", code], capture_output=True, text=True, check=True, cwd=LAB, env=os.environ
    )
    assert done.stderr.splitlines()[-1] == "0 []"
