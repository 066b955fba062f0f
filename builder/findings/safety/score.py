"""How grave an etchant is, as one number by which plans with the same verdict are ordered."""

from __future__ import annotations

from builder.records.etchants import Etchant
from builder.records.lab import LabRecords

GRAVEST = 5
"""Level of what kills by a splash or a breath, and of every part whose codes nobody has supplied."""
_LEVELS = (
    (5, "H300 H310 H330 EUH032 H200 H201 H203 H205 H240 H241 H250 H260 H271"),
    (4, "H301 H311 H331 H340 H350 H360 H370 EUH029 EUH031 H202 H230 H231 H242 H251"),
    (3, "H314 H318 H220 H224 H225 H261 H270 H304 H334 H341 H351 H361 H371 H372 EUH014 EUH071 H232"),
    (2, "H221 H222 H226 H228 H252 H272 H302 H312 H317 H332 H362 H373 H400 H410 H411 EUH070"),
    (1, "H204 H223 H227 H229 H280 H281 H290 H303 H305 H313 H315 H316 H319 H320 H333 H335 H336"),
    (1, "H401 H402 H412 H413 H420 EUH018 EUH019 EUH044 EUH066"),
)
_LEVEL_OF = {code: level for level, codes in _LEVELS for code in codes.split()}
_WEIGHT = 1000
_CAP = _WEIGHT - 1


def hazard_score(records: LabRecords, etchant_id: str) -> int:
    """
    Return how grave an etchant is; larger is graver, 0 is water.

    The score is 1000 times the level (0 to 5) of its gravest hazard statement, plus the sum of the
    levels of all its distinct statements. Statements are those of the parts at stock strength: a
    weak mixture never counts for less than the bottle it is made from. A part without known
    statements, a statement not in the table, and unknown parts count as level 5. The levels are
    ours and only order plans; they classify nothing.
    """
    levels = _levels(records, records.etchants[etchant_id])
    return _WEIGHT * max(levels, default=0) + min(sum(levels), _CAP)


def code_level(code: str) -> int:
    """Return the level of a hazard statement; endings such as the D of H360D make no difference."""
    return _LEVEL_OF.get(code, _LEVEL_OF.get(_stem(code), GRAVEST))


def _stem(code: str) -> str:
    return code.rstrip("ABCDFdfi")


def _levels(records: LabRecords, etchant: Etchant) -> list[int]:
    if not etchant.parts:
        return [GRAVEST]
    chemicals = [records.chemicals[part.chemical] for part in etchant.parts]
    codes = {code for chemical in chemicals for code in chemical.h_codes}
    unknown = [GRAVEST for chemical in chemicals if chemical.hazardous and "h_codes" in chemical.pending]
    return [code_level(code) for code in sorted(codes)] + unknown
