"""What every record carries, and where a fact comes from."""

from __future__ import annotations

from dataclasses import dataclass
from pathlib import PurePosixPath
from typing import Self

from builder.records.conversion import Data, from_data
from builder.records.terms import Origin, Trust


@dataclass(frozen=True, slots=True, kw_only=True)
class Record:
    """One record: its id (the file's stem), the file as shown to people, and whose it is."""

    id: str
    file: str
    origin: Origin

    @classmethod
    def from_raw(cls, data: Data, file: str, origin: Origin) -> Self:
        """Return the record of a file whose data has passed its schema."""
        return from_data(cls, data, id=PurePosixPath(file).stem, file=file, origin=origin)


@dataclass(frozen=True, slots=True, kw_only=True)
class Entry:
    """One fact of a list file: `file` as shown, `origin`, and the JSON pointer of the fact in it."""

    file: str
    origin: Origin
    pointer: str


@dataclass(frozen=True, slots=True, kw_only=True)
class SourcedRecord(Record):
    """A record of one fact: the source it comes from, the place in it, and whether it was read."""

    source: str
    trust: Trust
    where: str | None = None
    note: str | None = None


@dataclass(frozen=True, slots=True, kw_only=True)
class SourcedEntry(Entry):
    """One fact of a list file, with its source as in `SourcedRecord`."""

    source: str
    trust: Trust
    where: str | None = None
    note: str | None = None


@dataclass(frozen=True, slots=True, kw_only=True)
class Part:
    """One component of a mixture; `amount` as written ("5 parts", "30 wt%")."""

    chemical: str
    amount: str
