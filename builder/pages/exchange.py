"""The finished site put in the place of the old one, all or nothing."""

from __future__ import annotations

import fcntl
import shutil
from collections.abc import Iterator
from contextlib import contextmanager
from dataclasses import dataclass
from pathlib import Path

MARKER = ".etchwright-site"
"""A file in every site of ours: only a folder that holds it (or nothing) is ever replaced."""


class ExchangeError(Exception):
    """Why a folder cannot be replaced; `rule` is a stable name."""

    def __init__(self, rule: str, message: str, hint: str = "") -> None:
        super().__init__(message)
        self.rule = rule
        self.hint = hint


@dataclass
class NewFolder:
    """The folder being filled; `keep_old` tells that it must not take the old one's place."""

    path: Path
    is_wanted: bool = True

    def keep_old(self) -> None:
        """Leave the old folder in its place."""
        self.is_wanted = False


@contextmanager
def exchanged_folder(out_dir: Path) -> Iterator[NewFolder]:
    """
    Yield an empty folder beside `out_dir`; it takes the place of `out_dir` if the block ends well.

    One build at a time, by a lock file. If the block raises, the old folder stays as it was. What an
    interrupted exchange left behind is repaired first. Raises ExchangeError if another build holds
    the lock, or `out_dir` holds files that are not a site of ours.
    """
    out_dir.parent.mkdir(parents=True, exist_ok=True)
    with _locked(_beside(out_dir, "lock")):
        repair(out_dir)
        _refuse_foreign(out_dir)
        building = _beside(out_dir, "building")
        building.mkdir()
        try:
            folder = NewFolder(building)
            yield folder
            if folder.is_wanted:
                (building / MARKER).touch()
                _exchange(building, out_dir)
        finally:
            shutil.rmtree(building, ignore_errors=True)


def repair(out_dir: Path) -> None:
    """Undo or finish an exchange that was interrupted; harmless if there was none."""
    previous = _beside(out_dir, "previous")
    if previous.exists() and not out_dir.exists():
        # Stopped between the two renames: whether the new site was whole is not known, the old one was.
        previous.rename(out_dir)
    shutil.rmtree(previous, ignore_errors=True)
    shutil.rmtree(_beside(out_dir, "building"), ignore_errors=True)


def _exchange(building: Path, out_dir: Path) -> None:
    previous = _beside(out_dir, "previous")
    if out_dir.exists():
        out_dir.rename(previous)
    try:
        building.rename(out_dir)
    except OSError:
        if previous.exists():
            previous.rename(out_dir)
        raise
    shutil.rmtree(previous, ignore_errors=True)


def _beside(out_dir: Path, what: str) -> Path:
    return out_dir.with_name(f"{out_dir.name}.{what}")


def _refuse_foreign(out_dir: Path) -> None:
    if out_dir.is_symlink() or (out_dir.exists() and not out_dir.is_dir()):
        raise ExchangeError("not-a-folder", f"{out_dir.name} is no plain folder")
    if out_dir.exists() and not (out_dir / MARKER).exists() and any(out_dir.iterdir()):
        raise ExchangeError(
            "not-our-site",
            f"{out_dir.name} holds files that this program did not write",
            "name another folder, or empty this one",
        )


@contextmanager
def _locked(lock: Path) -> Iterator[None]:
    with lock.open("a") as handle:
        try:
            fcntl.flock(handle, fcntl.LOCK_EX | fcntl.LOCK_NB)
        except BlockingIOError as error:
            raise ExchangeError("site-locked", "another build of this site is running") from error
        # The lock file stays: removing it would let a third process lock a file nobody else sees.
        yield
