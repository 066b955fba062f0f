"""A copy of the lab in the project for commands to work on, and the program itself."""

from __future__ import annotations

import shutil
from pathlib import Path

import pytest

from tests.cli.program import LAB, Program


@pytest.fixture
def program(capsys: pytest.CaptureFixture[str], monkeypatch: pytest.MonkeyPatch) -> Program:
    """The program, without a day from the environment."""
    monkeypatch.delenv("SOURCE_DATE_EPOCH", raising=False)
    return Program(capsys)


@pytest.fixture(scope="module")
def lab(tmp_path_factory: pytest.TempPathFactory) -> Path:
    """A copy of the lab's own records; published facts come with the program."""
    folder = tmp_path_factory.mktemp("lab")
    shutil.copytree(LAB / "recipes", folder / "recipes", ignore=shutil.ignore_patterns("reference"))
    return folder
