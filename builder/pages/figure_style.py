"""How figures are drawn and saved with matplotlib: one style, and the same bytes for the same values."""

from __future__ import annotations

import io
from collections.abc import Iterator
from contextlib import contextmanager
from typing import TYPE_CHECKING

if TYPE_CHECKING:
    from matplotlib.axes import Axes
    from matplotlib.figure import Figure

INK = "#1b222b"
QUIET = "#55606e"
HAIRLINE = "#d6d9d3"
ACCENT = "#2a4d9c"
LOST = "#951f05"

_STYLE: dict[str, object] = {
    # The font that comes with matplotlib: another one would give other bytes on another machine.
    "font.family": ["DejaVu Sans"],
    "font.size": 9.0,
    "svg.fonttype": "path",
    "svg.hashsalt": "etchwright",
    "pdf.fonttype": 42,
    "text.color": INK,
    "axes.labelcolor": QUIET,
    "axes.edgecolor": QUIET,
    "axes.linewidth": 0.8,
    "axes.spines.top": False,
    "axes.spines.right": False,
    "axes.grid": True,
    "axes.grid.axis": "y",
    "axes.axisbelow": True,
    "grid.color": HAIRLINE,
    "grid.linewidth": 0.8,
    "xtick.color": QUIET,
    "ytick.color": QUIET,
    "savefig.dpi": 200.0,
}
# No file carries the time of its making or the version of what made it.
_METADATA: dict[str, dict[str, None]] = {
    "svg": {"Date": None, "Creator": None},
    "png": {"Software": None},
    "pdf": {"CreationDate": None, "Creator": None, "Producer": None},
}
FORMATS = tuple(_METADATA)


@contextmanager
def figure_style() -> Iterator[None]:
    """Draw in the style of this program, whatever the settings of the machine are."""
    # Imported here: only figures pay for it.
    from matplotlib import style  # noqa: PLC0415

    with style.context(["default", _STYLE], after_reset=True):
        yield


def empty_figure(width_in: float, height_in: float) -> Figure:
    """Return a figure of a size, in inches; never shown, so that no window system is needed."""
    from matplotlib.figure import Figure  # noqa: PLC0415

    return Figure(figsize=(width_in, height_in))


def saved(figure: Figure, file_format: str) -> bytes:
    """Return a figure as the bytes of a file, in one of `FORMATS`; to be called within `figure_style`."""
    buffer = io.BytesIO()
    figure.savefig(buffer, format=file_format, metadata=_METADATA[file_format])
    return buffer.getvalue()


def name_axes(axes: Axes, x_label: str, y_label: str) -> None:
    """Write an axis' name where it can be read without turning the head."""
    axes.set_xlabel(x_label, loc="right")
    axes.set_title(y_label, loc="left", fontsize=9.0, color=QUIET)
