"""What a file holds, as plain JSON-like data with the place of each value."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field
from typing import TypeAlias

from builder.problems import Problem, Severity

JsonValue: TypeAlias = bool | int | float | str | list["JsonValue"] | dict[str, "JsonValue"] | None
Place: TypeAlias = tuple[int, int]
"""Line and column, both from 1."""

_START: Place = (1, 1)


@dataclass(frozen=True)
class Positions:
    """Where each value and each key of a file stands, by JSON pointer."""

    values: Mapping[str, Place] = field(default_factory=dict)
    keys: Mapping[str, Place] = field(default_factory=dict)

    def value(self, pointer: str) -> Place:
        """Return the place of the value, or of the nearest value around it if it does not exist."""
        return self._nearest(self.values, pointer)

    def key(self, pointer: str) -> Place:
        """Return the place of the key that leads to the value, or of the value if it has no key."""
        place = self.keys.get(pointer)
        return self.value(pointer) if place is None else place

    @staticmethod
    def _nearest(places: Mapping[str, Place], pointer: str) -> Place:
        while pointer and pointer not in places:
            pointer = pointer.rpartition("/")[0]
        return places.get(pointer, _START)


@dataclass(frozen=True)
class Raw:
    """
    The data of one file before any check of its meaning.

    `unreadable` holds the pointers whose value could not be read and stands as null; each has its
    problem already, so later checks pass over them. `comments` are the lines above a CSV header.
    """

    data: JsonValue
    positions: Positions
    file: str
    unreadable: frozenset[str] = frozenset()
    comments: tuple[str, ...] = ()

    def problem(
        self,
        pointer: str,
        rule: str,
        message: str,
        *,
        hint: str = "",
        at_key: bool = False,
        severity: Severity = Severity.ERROR,
    ) -> Problem:
        """Return a problem placed at the value of `pointer`, or at its key."""
        line, column = self.positions.key(pointer) if at_key else self.positions.value(pointer)
        return Problem(self.file, line, column, pointer, severity, rule, message, hint)

    def is_unreadable(self, pointer: str) -> bool:
        """Tell whether the value at `pointer`, or a value around it, could not be read."""
        if not self.unreadable:
            return False
        while pointer not in self.unreadable:
            if not pointer:
                return False
            pointer = pointer.rpartition("/")[0]
        return True


def join_pointer(parent: str, key: str | int) -> str:
    """Return the JSON pointer (RFC 6901) of `key` within `parent`."""
    if isinstance(key, int):
        return f"{parent}/{key}"
    if "~" in key or "/" in key:
        key = key.replace("~", "~0").replace("/", "~1")
    return f"{parent}/{key}"
