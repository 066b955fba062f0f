"""Figures as files: the same bytes every time and everywhere, showing what they were given."""

from __future__ import annotations

import datetime
import hashlib
import io
import os
import re
import subprocess
import sys
from dataclasses import replace
from pathlib import Path

import numpy as np
import pytest
from PIL import Image

from builder.pages.figure_files import FigureFormatError, figure_bytes, write_figure
from builder.views.figure_data import (
    FigureBand,
    FigureData,
    FigureDepth,
    FigureEvent,
    FigureLine,
    FigureRun,
)

_ROOT = Path(__file__).resolve().parents[2]
_FORMATS = ("svg", "png", "pdf")


def _day(month: int) -> datetime.date:
    return datetime.date(2026, month, 3)


def example() -> FigureData:
    """A recipe with a new bath, a limit, a band and a depth series."""
    return FigureData(
        title="Oxide in $BHF$ & water",
        subtitle="100 nm/min, next run 80 – 125 nm/min",
        foot="Invented.",
        unit="nm/min",
        runs=(
            FigureRun(_day(1), 97.0, 2.0, in_series=False),
            FigureRun(_day(3), 101.0, None),
            FigureRun(_day(4), 5.0, None, is_limit=True),
        ),
        events=(FigureEvent(_day(2), "new bath, $1"),),
        band=FigureBand(80.0, 100.0, 125.0, "next run, 90 %"),
        depths=(FigureDepth(30.0, 60.0, 3.0), FigureDepth(60.0, 110.0, 3.0)),
        line=FigureLine(10.0 / 6.0, -6.0),
    )


_PRINT_HASHES = """
import hashlib
from builder.pages.figure_files import figure_bytes
from tests.pages.test_figure_files import example
for name in ("svg", "png", "pdf"):
    print(hashlib.sha256(figure_bytes(example(), name)).hexdigest())
"""


def test_bytes_are_the_same_in_another_process_with_other_settings(tmp_path: Path) -> None:
    """Neither the hash seed, nor the clock, nor a person's own drawing settings change a byte."""
    (tmp_path / "matplotlibrc").write_text("font.size: 20\nlines.linewidth: 7\nsvg.hashsalt: mine\n")
    settings = {"MATPLOTLIBRC": str(tmp_path), "PYTHONHASHSEED": "7", "SOURCE_DATE_EPOCH": "1000000000"}
    told = subprocess.run(
        [sys.executable, "-c", _PRINT_HASHES],
        cwd=_ROOT, env={**os.environ, **settings}, capture_output=True, text=True, check=True,
    )  # fmt: skip
    here = [hashlib.sha256(figure_bytes(example(), name)).hexdigest() for name in _FORMATS]
    assert told.stdout.split() == here
    assert len(set(here)) == len(_FORMATS)


@pytest.mark.parametrize(("suffix", "start"), [("svg", b"<?xml"), ("PNG", b"\x89PNG"), ("pdf", b"%PDF-")])
def test_the_name_says_the_format(tmp_path: Path, suffix: str, start: bytes) -> None:
    """A file is written in the format that the end of its name tells."""
    path = tmp_path / f"figure.{suffix}"
    write_figure(example(), path)
    assert path.read_bytes().startswith(start)


@pytest.mark.parametrize("name", ["figure", "figure.jpg", "figure.svg.txt"])
def test_another_format_is_refused(tmp_path: Path, name: str) -> None:
    """A format that is not kept reproducible is not written at all."""
    with pytest.raises(FigureFormatError, match=r"\.svg, \.png, \.pdf"):
        write_figure(example(), tmp_path / name)
    assert list(tmp_path.iterdir()) == []


def test_nothing_in_a_file_tells_when_or_by_what_it_was_made() -> None:
    """No date and no version: those would change the bytes from one machine to the next."""
    for name in _FORMATS:
        content = figure_bytes(example(), name).decode("latin-1")
        assert not re.search(r"CreationDate|Creator|Producer|Software|dc:date|Matplotlib v", content), name


def _blue(data: FigureData) -> np.ndarray:
    """Where the picture has the accent colour of points and lines."""
    pixels = np.asarray(Image.open(io.BytesIO(figure_bytes(data, "png"))).convert("RGB"), dtype=int)
    return np.all(np.abs(pixels - np.array([0x2A, 0x4D, 0x9C])) < 12, axis=2)


def test_a_faster_run_stands_higher() -> None:
    """The point of a run moves up with its rate, against the same axis."""
    band = FigureBand(80.0, None, 125.0, "next run")
    plain = replace(example(), depths=(), line=None, events=(), band=band)
    heights = []
    for rate in (20.0, 60.0, 100.0):
        rows, _ = np.nonzero(_blue(replace(plain, runs=(FigureRun(_day(3), rate, None),))))
        heights.append(float(np.median(rows)))
    assert heights[0] > heights[1] > heights[2]
    assert heights[0] - heights[1] == pytest.approx(heights[1] - heights[2], abs=3.0)


def test_a_figure_has_a_chart_for_each_kind_of_evidence() -> None:
    """Runs alone or depths alone make one chart; both make two, one below the other."""
    both = example()
    sizes = [
        Image.open(io.BytesIO(figure_bytes(data, "png"))).height
        for data in (both, replace(both, depths=(), line=None), replace(both, runs=(), events=(), band=None))
    ]
    assert sizes[1] == sizes[2] < sizes[0]
