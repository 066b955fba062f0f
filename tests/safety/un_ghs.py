"""Pictograms and signal words as the UN GHS derives them from hazard statements; kept apart from the program.

Source: UN GHS (ST/SG/AC.10/30, "purple book"), Annex 1 (allocation of label elements), Annex 3 section 1
(codes of hazard statements), section 1.4.10.5.3 (precedence); from memory, as the records are.
"""

from __future__ import annotations

from collections.abc import Iterable

_DANGER = "danger"
_WARNING = "warning"
_TABLE: dict[str, tuple[str, str | None]] = {
    "H220": (_DANGER, "GHS02"),
    "H221": (_WARNING, None),
    "H224": (_DANGER, "GHS02"),
    "H225": (_DANGER, "GHS02"),
    "H226": (_WARNING, "GHS02"),
    "H270": (_DANGER, "GHS03"),
    "H271": (_DANGER, "GHS03"),
    "H272": (_WARNING, "GHS03"),
    "H280": (_WARNING, "GHS04"),
    "H290": (_WARNING, "GHS05"),
    "H300": (_DANGER, "GHS06"),
    "H301": (_DANGER, "GHS06"),
    "H302": (_WARNING, "GHS07"),
    "H304": (_DANGER, "GHS08"),
    "H310": (_DANGER, "GHS06"),
    "H311": (_DANGER, "GHS06"),
    "H312": (_WARNING, "GHS07"),
    "H314": (_DANGER, "GHS05"),
    "H315": (_WARNING, "GHS07"),
    "H317": (_WARNING, "GHS07"),
    "H318": (_DANGER, "GHS05"),
    "H319": (_WARNING, "GHS07"),
    "H330": (_DANGER, "GHS06"),
    "H331": (_DANGER, "GHS06"),
    "H332": (_WARNING, "GHS07"),
    "H334": (_DANGER, "GHS08"),
    "H335": (_WARNING, "GHS07"),
    "H336": (_WARNING, "GHS07"),
    "H341": (_WARNING, "GHS08"),
    "H350": (_DANGER, "GHS08"),
    "H360": (_DANGER, "GHS08"),
    "H361": (_WARNING, "GHS08"),
    "H370": (_DANGER, "GHS08"),
    "H371": (_WARNING, "GHS08"),
    "H372": (_DANGER, "GHS08"),
    "H373": (_WARNING, "GHS08"),
    "H400": (_WARNING, "GHS09"),
    "H410": (_WARNING, "GHS09"),
    "H411": ("none", "GHS09"),
}
"""H272 is Danger in category 2 and Warning in category 3: the milder is taken, to invent no word."""
_IRRITATION = {"H315", "H319"}
_SKIN_SENSITISATION = {"H317"}
_ORDER = ("none", _WARNING, _DANGER)


def base_code(code: str) -> str:
    """Return the code without the letters that some regions append (H360D)."""
    return code[:4] if code.startswith("H") else code


def derived_pictograms(codes: Iterable[str]) -> set[str]:
    """Return the pictograms that follow from the statements, after the rules of precedence."""
    statements = {base_code(code) for code in codes if not code.startswith("EUH")}
    calling = {code: _TABLE[code][1] for code in statements}
    found = {pictogram for pictogram in calling.values() if pictogram is not None}
    exclaiming = {code for code, pictogram in calling.items() if pictogram == "GHS07"}
    if "GHS06" in found:
        exclaiming = set()
    if statements & {"H314", "H318"}:
        exclaiming -= _IRRITATION
    if "H334" in statements:
        exclaiming -= _IRRITATION | _SKIN_SENSITISATION
    return found if exclaiming else found - {"GHS07"}


def derived_signal(codes: Iterable[str]) -> str:
    """Return the graver signal word of the statements."""
    words = [_TABLE[base_code(code)][0] for code in codes if not code.startswith("EUH")]
    return max(words, key=_ORDER.index, default="none")
