"""The program as a person calls it, within this process: what it prints, and how it ends."""

from __future__ import annotations

import json
import sys
from collections.abc import Iterator
from contextlib import contextmanager
from dataclasses import dataclass
from pathlib import Path

import pytest

from builder.cli import main

LAB = Path(__file__).resolve().parents[2]


@dataclass(frozen=True)
class Ended:
    """How a call ended."""

    status: int
    out: str
    err: str

    @property
    def data(self) -> dict[str, object]:
        """What was printed, as JSON."""
        found = json.loads(self.out)
        assert isinstance(found, dict)
        return found


class Program:
    """Calls the program with arguments; errors that are no answer come out as they are."""

    def __init__(self, capsys: pytest.CaptureFixture[str]) -> None:
        self._capsys = capsys

    def __call__(self, *arguments: object) -> Ended:
        self._capsys.readouterr()
        with _arguments([str(argument) for argument in arguments]), pytest.raises(SystemExit) as ended:
            main()
        printed = self._capsys.readouterr()
        status = ended.value.code
        return Ended(status if isinstance(status, int) else 0, printed.out, printed.err)


@contextmanager
def _arguments(arguments: list[str]) -> Iterator[None]:
    old, sys.argv = sys.argv, ["etchwright", *arguments]
    try:
        yield
    finally:
        sys.argv = old
