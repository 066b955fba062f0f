"""Figures in the hand-written pages: a comment names one, the page gets it as SVG in its own colours."""

from __future__ import annotations

import re
from functools import cache

from markupsafe import Markup

from builder.pages.figure_style import ACCENT, HAIRLINE, INK, LOST, QUIET, empty_figure, figure_style, saved
from builder.pages.method_drawings import DRAWINGS

_CALL = re.compile(r"<!--\s*figure\s+([a-z0-9-]+):\s*(.*?)\s*-->", re.DOTALL)
_SIZE_IN = (4.4, 2.6)
# Names of intervals need room on the left, names of numbers do not.
_NARROW = (0.09, 0.185, 0.885, 0.71)
_WIDE = (0.38, 0.2, 0.58, 0.68)
_WITH_NAMES = frozenset({"by-timer-by-look", "widening", "words"})
_COLOURS = {INK: "ink", QUIET: "quiet", HAIRLINE: "hairline", ACCENT: "accent", LOST: "lost"}
_ID = re.compile(r'(\bid="|xlink:href="#|url\(#)')


class UnknownFigureError(ValueError):
    """A page asks for a figure that there is not."""


def with_figures(html: str) -> str:
    """Return the page with each `<!-- figure NAME: caption -->` replaced by that figure."""
    return _CALL.sub(lambda match: _figure(match[1], " ".join(match[2].split())), html)


def _figure(name: str, caption: str) -> str:
    if name not in DRAWINGS:
        known = ", ".join(sorted(DRAWINGS))
        raise UnknownFigureError(f'there is no figure "{name}"; there are {known}')
    words = f"figure-{name}"
    svg = Markup(
        _svg(name).replace("<svg ", f'<svg class="ew-drawn" role="img" aria-labelledby="{words}" ', 1)
    )
    return Markup(
        '<figure class="ew-figure" tabindex="0">{}<figcaption id="{}">{}</figcaption></figure>'
    ).format(svg, words, Markup(caption))


@cache
def _svg(name: str) -> str:
    with figure_style():
        figure = empty_figure(*_SIZE_IN)
        axes = figure.add_axes(_WIDE if name in _WITH_NAMES else _NARROW)
        DRAWINGS[name](axes)
        figure.patch.set_visible(False)
        axes.patch.set_visible(False)
        svg = saved(figure, "svg").decode("utf-8")
    svg = svg[svg.index("<svg ") :].strip()
    for colour, variable in _COLOURS.items():
        svg = svg.replace(colour, f"var(--ew-{variable})")
    # Several figures may stand on one page, and an id must be there only once.
    return re.sub(r"<metadata>.*?</metadata>\s*", "", _ID.sub(rf"\g<1>{name}-", svg), flags=re.DOTALL)
