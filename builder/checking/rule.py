"""What a rule is: a name, and a function that finds every place where the records break it."""

from __future__ import annotations

import datetime
from collections.abc import Callable, Iterator, Mapping
from dataclasses import dataclass
from typing import TYPE_CHECKING

from builder.problems import Problem, Severity
from builder.reading.raw import Positions, Raw

if TYPE_CHECKING:
    # A plan checks its sample by these rules, and needs no record of a lab to be loaded for that.
    from builder.records.lab import LabRecords


@dataclass(frozen=True)
class Fault:
    """One place where a rule is broken: a file, the JSON pointer of the value, and words."""

    file: str
    pointer: str
    message: str
    hint: str = ""


@dataclass(frozen=True)
class Checked:
    """
    All records whose files have the right shape, and where their values stand.

    `raws` and `kinds` are by file, those of the wrong shape included. `broken` holds kind and id of
    files that have a fault of shape: references to them resolve, but nothing is known of them.
    `today` is the day that dates are compared with.
    """

    records: LabRecords
    raws: Mapping[str, Raw]
    kinds: Mapping[str, str]
    broken: frozenset[tuple[str, str]]
    today: datetime.date

    def of_kind(self, kind: str) -> Iterator[Raw]:
        """Yield the data of every file of a kind, whatever its shape."""
        for file, raw in self.raws.items():
            if self.kinds[file] == kind:
                yield raw

    def is_broken(self, kind: str, name: str) -> bool:
        """Tell whether the file of this id is there, but cannot be used."""
        return (kind, name) in self.broken


@dataclass(frozen=True)
class Rule:
    """A rule across records; `find` yields every fault, `name` is the stable name people see."""

    name: str
    find: Callable[[Checked], Iterator[Fault]]
    severity: Severity = Severity.ERROR

    def problems(self, checked: Checked) -> Iterator[Problem]:
        """Yield the faults as problems with line and column."""
        for fault in self.find(checked):
            raw = checked.raws.get(fault.file, Raw(None, Positions(), fault.file))
            yield raw.problem(
                fault.pointer, self.name, fault.message, hint=fault.hint, severity=self.severity
            )
