"""All records of a lab and of the shipped reference, by kind and id."""

from __future__ import annotations

import functools
from collections.abc import Iterable, Mapping, Sequence
from dataclasses import dataclass, field
from typing import TypeVar

from builder.records.chemicals import Chemical
from builder.records.conversion import Data
from builder.records.etchants import Etchant
from builder.records.etches import Etch
from builder.records.film_names import FilmNames
from builder.records.films import Film
from builder.records.published import (
    Couple,
    Hint,
    PublishedRate,
    Statement,
    hints_from,
    rates_from,
    statements_from,
)
from builder.records.record import Record
from builder.records.references import Product, RateConstant, Source
from builder.records.runs import Run, runs_from
from builder.records.safety import Container, GhsCode, Group, MixingRule, PlasmaHazard, Precaution
from builder.records.samples import Sample
from builder.records.settings import LabSettings, SpreadRecord, settings_over
from builder.records.terms import Origin, SideKind
from builder.records.tools import Tool

R = TypeVar("R", bound=Record)
E = TypeVar("E")


@dataclass(frozen=True)
class CheckedFile:
    """One file of records whose data has passed its schema; `kind` is the folder's name."""

    kind: str
    id: str
    origin: Origin
    file: str
    data: object


@dataclass(frozen=True)
class LabRecords:
    """
    Every record by id, both the shipped ones and the lab's.

    `rates`, `statements` and `hints` are by etchant, `runs` by recipe; an id that is missing there
    has none. `spread` is None if no fit is stored.
    """

    settings: LabSettings
    spread: SpreadRecord | None = None
    sources: Mapping[str, Source] = field(default_factory=dict)
    films: Mapping[str, Film] = field(default_factory=dict)
    chemicals: Mapping[str, Chemical] = field(default_factory=dict)
    etchants: Mapping[str, Etchant] = field(default_factory=dict)
    rates: Mapping[str, tuple[PublishedRate, ...]] = field(default_factory=dict)
    statements: Mapping[str, tuple[Statement, ...]] = field(default_factory=dict)
    hints: Mapping[str, tuple[Hint, ...]] = field(default_factory=dict)
    couples: Mapping[str, Couple] = field(default_factory=dict)
    mixing: Mapping[str, MixingRule] = field(default_factory=dict)
    groups: Mapping[str, Group] = field(default_factory=dict)
    containers: Mapping[str, Container] = field(default_factory=dict)
    codes: Mapping[str, GhsCode] = field(default_factory=dict)
    precautions: Mapping[str, Precaution] = field(default_factory=dict)
    hazards: Mapping[str, PlasmaHazard] = field(default_factory=dict)
    products: Mapping[str, Product] = field(default_factory=dict)
    constants: Mapping[str, RateConstant] = field(default_factory=dict)
    tools: Mapping[str, Tool] = field(default_factory=dict)
    etches: Mapping[str, Etch] = field(default_factory=dict)
    runs: Mapping[str, tuple[Run, ...]] = field(default_factory=dict)
    samples: Mapping[str, Sample] = field(default_factory=dict)
    film_names: FilmNames = field(default_factory=lambda: FilmNames.of(()))

    @property
    def size(self) -> int:
        """How many records there are: files of one record, and entries of lists."""
        single = (
            self.sources, self.films, self.chemicals, self.etchants, self.couples, self.mixing, self.groups,
            self.containers, self.codes, self.precautions, self.hazards, self.products, self.constants,
            self.tools, self.etches, self.samples,
        )  # fmt: skip
        listed = (self.rates, self.statements, self.hints, self.runs)
        return sum(map(len, single)) + sum(len(entries) for kind in listed for entries in kind.values())

    @functools.cached_property
    def mixing_by_side(self) -> Mapping[tuple[SideKind, str], tuple[MixingRule, ...]]:
        """Every mixing rule by what either of its sides names."""
        by_side: dict[tuple[SideKind, str], list[MixingRule]] = {}
        for rule in self.mixing.values():
            for handle in {rule.a.handle, rule.b.handle}:
                by_side.setdefault(handle, []).append(rule)
        return {handle: tuple(rules) for handle, rules in by_side.items()}


def build_lab(files: Iterable[CheckedFile]) -> LabRecords:
    """
    Return the records of files that have passed their schemas.

    Of two records with one id (a fault that the rules report) the lab's own is kept. List files of
    the reference and the lab about one etchant are joined, the reference first.

    Raises
    ------
    ValueError
        The shipped settings are missing.
    """
    by_kind: dict[str, list[CheckedFile]] = {}
    for file in sorted(files, key=lambda file: (file.kind, file.id, file.origin != Origin.REFERENCE)):
        by_kind.setdefault(file.kind, []).append(file)

    def of(kind: str, cls: type[R]) -> dict[str, R]:
        return {
            file.id: cls.from_raw(_mapping(file.data), file.file, file.origin)
            for file in by_kind.get(kind, [])
        }

    films = of("films", Film)
    spreads = of("spread", SpreadRecord)
    return LabRecords(
        settings=_settings(by_kind.get("lab", [])),
        spread=spreads.get("spread"),
        sources=of("sources", Source),
        films=films,
        chemicals=of("chemicals", Chemical),
        etchants=of("etchants", Etchant),
        rates=_joined([rates_from(*_parts(file)) for file in by_kind.get("rates", [])]),
        statements=_joined([statements_from(*_parts(file)) for file in by_kind.get("compatibility", [])]),
        hints=_joined([hints_from(*_parts(file)) for file in by_kind.get("compatibility", [])]),
        couples=of("couples", Couple),
        mixing=of("mixing", MixingRule),
        groups=of("groups", Group),
        containers=of("containers", Container),
        codes=of("codes", GhsCode),
        precautions=of("precautions", Precaution),
        hazards=of("hazards", PlasmaHazard),
        products=of("products", Product),
        constants=of("constants", RateConstant),
        tools=of("tools", Tool),
        etches=of("etches", Etch),
        runs={file.id: runs_from(file.data, file.file, file.origin) for file in by_kind.get("runs", [])},
        samples=of("samples", Sample),
        film_names=FilmNames.of(films.values()),
    )


def _settings(files: Sequence[CheckedFile]) -> LabSettings:
    shipped = next((file for file in files if file.origin is Origin.REFERENCE), None)
    own = next((file for file in files if file.origin is Origin.LAB), None)
    if shipped is None:
        raise ValueError("the shipped settings are missing; install the program again")
    own_data = None if own is None else _mapping(own.data)
    return settings_over(_mapping(shipped.data), own_data, (own or shipped).file)


def _joined(groups: Iterable[tuple[E, ...]]) -> dict[str, tuple[E, ...]]:
    joined: dict[str, tuple[E, ...]] = {}
    for entries in groups:
        for entry in entries:
            etchant = str(getattr(entry, "etchant"))  # noqa: B009  every list entry carries its etchant
            joined[etchant] = (*joined.get(etchant, ()), entry)
    return joined


def _parts(file: CheckedFile) -> tuple[Data, str, Origin]:
    return _mapping(file.data), file.file, file.origin


def _mapping(data: object) -> Data:
    assert isinstance(data, Mapping)
    return data
