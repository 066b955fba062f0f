"""The style sheet, measured: contrast, colours apart for everyone, every class on its list."""

from __future__ import annotations

import re
from itertools import combinations
from pathlib import Path

import numpy as np
import pytest

_ROOT = Path(__file__).resolve().parents[2]
_SHEETS = {
    name: (_ROOT / "docs" / "assets" / f"{name}.css").read_text(encoding="utf-8")
    for name in ("etchwright", "matrices")
}
_CSS = _SHEETS["etchwright"]
_VERDICTS = ("holds", "borderline", "lost", "unmeasured")
_TEXT = (*_VERDICTS, "ink", "quiet", "accent")

# G. M. Machado, M. M. Oliveira, L. A. F. Fernandes, "A Physiologically-Based Model for Simulation of Color
# Vision Deficiency", IEEE Trans. Vis. Comput. Graph. 15(6), 1291-1298 (2009), severity 1.0; from memory,
# so a test below checks that each matrix keeps white white.
_DEFICIENCIES = {
    "protan": [
        [0.152286, 1.052583, -0.204868],
        [0.114503, 0.786281, 0.099216],
        [-0.003882, -0.048116, 1.051998],
    ],
    "deutan": [
        [0.367322, 0.860646, -0.227968],
        [0.280085, 0.672501, 0.047413],
        [-0.011820, 0.042940, 0.968881],
    ],
    "tritan": [
        [1.255528, -0.076749, -0.178779],
        [-0.078411, 0.930809, 0.147602],
        [0.004733, 0.691367, 0.303900],
    ],
}
# Differences above about 10 in CIE Lab are told apart at a glance; common practice, no source.
_LEAST_DIFFERENCE = 10.0


def _scheme(selector: str) -> dict[str, str]:
    block = re.search(re.escape(selector) + r"\s*\{([^}]*)\}", _CSS)
    assert block is not None
    return dict(re.findall(r"--ew-([a-z0-9-]+):\s*(#[0-9a-f]{6})", block[1]))


_SCHEMES = {"light": _scheme(":root"), "dark": _scheme('[data-md-color-scheme="slate"]')}


def _linear(colour: str) -> np.ndarray:
    """sRGB to linear light (IEC 61966-2-1)."""
    channels = np.array([int(colour[i : i + 2], 16) for i in (1, 3, 5)]) / 255.0
    return np.where(channels <= 0.04045, channels / 12.92, ((channels + 0.055) / 1.055) ** 2.4)


def _contrast(one: str, other: str) -> float:
    """Contrast ratio of WCAG 2.1, section 1.4.3."""
    light, dark = sorted((float(_linear(c) @ [0.2126, 0.7152, 0.0722]) for c in (one, other)), reverse=True)
    return (light + 0.05) / (dark + 0.05)


def _lab(linear: np.ndarray) -> np.ndarray:
    """Linear sRGB to CIE Lab, white D65."""
    matrix = np.array([[0.4124, 0.3576, 0.1805], [0.2126, 0.7152, 0.0722], [0.0193, 0.1192, 0.9505]])
    ratio = np.clip(matrix @ linear / (matrix @ np.ones(3)), 0.0, None)
    f = np.where(ratio > 216 / 24389, np.cbrt(ratio), (24389 / 27 * ratio + 16) / 116)
    return np.array([116 * f[1] - 16, 500 * (f[0] - f[1]), 200 * (f[1] - f[2])])


@pytest.mark.parametrize("scheme", _SCHEMES)
@pytest.mark.parametrize("colour", _TEXT)
@pytest.mark.parametrize("ground", ["paper", "raised"])
def test_text_contrast(scheme: str, colour: str, ground: str) -> None:
    """Every colour that text may have is 4.5 : 1 or better on both grounds."""
    assert _contrast(_SCHEMES[scheme][colour], _SCHEMES[scheme][ground]) >= 4.5


@pytest.mark.parametrize("scheme", _SCHEMES)
def test_hatch_contrast(scheme: str) -> None:
    """The lines of a fill are 3 : 1 or better on both tones, so that families can be told apart."""
    colours = _SCHEMES[scheme]
    assert min(_contrast(colours["hatch"], colours[tone]) for tone in ("tone-0", "tone-1")) >= 3.0


@pytest.mark.parametrize("scheme", _SCHEMES)
@pytest.mark.parametrize("deficiency", [None, *_DEFICIENCIES])
def test_verdict_colours_stay_apart(scheme: str, deficiency: str | None) -> None:
    """Any two verdict colours differ, also in the three common colour vision deficiencies."""
    matrix = np.eye(3) if deficiency is None else np.array(_DEFICIENCIES[deficiency])
    seen = {
        verdict: _lab(np.clip(matrix @ _linear(_SCHEMES[scheme][verdict]), 0, 1)) for verdict in _VERDICTS
    }
    differences = {
        (one, other): float(np.linalg.norm(seen[one] - seen[other]))
        for one, other in combinations(_VERDICTS, 2)
    }
    assert {pair: d for pair, d in differences.items() if d < _LEAST_DIFFERENCE} == {}


@pytest.mark.parametrize("deficiency", _DEFICIENCIES)
def test_simulation_keeps_white_white(deficiency: str) -> None:
    """Each matrix leaves grey alone: a slip of memory in one coefficient would show here."""
    assert np.array(_DEFICIENCIES[deficiency]).sum(axis=1) == pytest.approx(np.ones(3), abs=2e-6)


def _sources() -> str:
    folders = (_ROOT / "builder" / "pages", _ROOT / "builder" / "views", _ROOT / "docs")
    files = [
        path
        for folder in folders
        for path in folder.rglob("*")
        if path.suffix in {".j2", ".html", ".py", ".js", ".md"} and "planner" not in path.parts
    ]
    return "\n".join(path.read_text(encoding="utf-8") for path in sorted(files))


def _expanded(pattern: str, ends: tuple[str, ...]) -> set[str]:
    return {f"{pattern}{end}" for end in ends}


def test_every_class_is_listed_and_has_a_rule() -> None:
    """A class in use is in the list at the head of a style sheet and has a rule; the lists hold no more."""
    heads, rules = zip(*(sheet.split("*/", 1) for sheet in _SHEETS.values()), strict=True)
    listed = set(re.findall(r"\bew-[a-z0-9-]*[a-z0-9]", "\n".join(heads)))
    ruled = set(re.findall(r"\.(ew-[a-z0-9-]*[a-z0-9])", "\n".join(rules)))
    used = set(re.findall(r"(?<![a-z-])ew-[a-z0-9-]*[a-z0-9](?![a-z0-9-])", _sources()))
    built = (
        _expanded("ew-verdict-", _VERDICTS)
        | _expanded("ew-role-", ("mask", "target", "under"))
        | _expanded("ew-label-", ("mask", "target", "under"))
        | _expanded("ew-tone-", ("0", "1"))
        | _expanded("ew-fill-", ("semiconductor", "oxide", "nitride", "metal", "polymer", "resist", "other"))
    )
    ids = {"ew-names", "ew-times", "ew-matrix-data"}
    assert (used | built) - listed - ids == set()
    assert listed - ruled == set()
    assert ruled - listed == set()


def test_nothing_is_asked_from_outside() -> None:
    """The style sheets load nothing."""
    everything = "\n".join(_SHEETS.values())
    assert "@import" not in everything
    assert re.findall(r"url\((?!\"#)", everything) == []
