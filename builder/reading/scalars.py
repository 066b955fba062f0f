"""What an unquoted YAML word means: a JSON scalar, or text. Nothing else."""

from __future__ import annotations

import math
import re
from dataclasses import dataclass
from typing import TypeAlias

Scalar: TypeAlias = bool | int | float | str | None

_WORDS: dict[str, Scalar] = {"": None, "~": None, "null": None, "true": True, "false": False}
_NUMBER = re.compile(r"-?(?:0|[1-9][0-9]*)(\.[0-9]+)?([eE][+-]?[0-9]+)?")
_LEADING_ZERO = re.compile(r"[-+]?0[0-9]+(?:\.[0-9]*)?(?:[eE][+-]?[0-9]+)?")
_NOT_FINITE = re.compile(r"[-+]?\.(?:inf|nan)", re.IGNORECASE)
_LARGEST_EXACT = 2**53
"""Above it a whole number is no longer exact in the browser."""
_MOST_DIGITS = 17
"""Digits a whole number may have before it is not even compared with `_LARGEST_EXACT`."""


@dataclass(frozen=True)
class ScalarFault:
    """Why an unquoted word is refused."""

    rule: str
    message: str
    hint: str


def plain_scalar(word: str) -> Scalar | ScalarFault:
    """
    Return what an unquoted word means.

    `true`, `false`, `null`, `~` and nothing at all are what they say; JSON numbers are numbers
    (`1e-3` too); all else is text: `NO` (a gas), `12:30`, `2026-01-02`, `0x10`, `1_000`. Refused:
    `010` (eight or ten?), `.nan` and `.inf`, numbers too large to be exact.
    """
    if word in _WORDS:
        return _WORDS[word]
    # Most words start with a letter: they are settled here without a regular expression.
    if word[0] not in "-+.0123456789":
        return word
    if match := _NUMBER.fullmatch(word):
        is_whole = match[1] is None and match[2] is None
        return _whole_number(word) if is_whole else _real_number(word)
    if _LEADING_ZERO.fullmatch(word):
        hint = f'write "{word}" in quotes for text, or drop the zero'
        return ScalarFault("leading-zero", f"{word} starts with a zero", hint)
    if _NOT_FINITE.fullmatch(word):
        return ScalarFault("not-finite", f"{word} is not a finite number", "leave the field out if unknown")
    return word


def _whole_number(word: str) -> Scalar | ScalarFault:
    if len(word) <= _MOST_DIGITS:
        value = int(word)
        if abs(value) <= _LARGEST_EXACT:
            return value
    message = f"the number {word[:20]} is too large to be kept exactly"
    return ScalarFault("too-large", message, "quote it if it is text")


def _real_number(word: str) -> Scalar | ScalarFault:
    value = float(word)
    if math.isfinite(value):
        return value
    return ScalarFault("not-finite", f"{word} is too large for a number", "")
