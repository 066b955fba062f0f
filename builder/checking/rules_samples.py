"""Rules for samples: known films, a stack that makes sense, thicknesses that can be."""

from __future__ import annotations

from collections.abc import Callable, Iterable, Iterator, Mapping
from dataclasses import dataclass
from typing import Protocol, TypeAlias

from builder.checking.rule import Checked, Fault, Rule
from builder.checking.sample_outline import Name, Outline, outline_of
from builder.problems import suggestion
from builder.records.film_names import FilmNames
from builder.records.samples import ANY_ETCH, NOTHING_UNDER, Sample
from builder.records.terms import Role

_WAFER_NM = 50_000.0
"""Thinnest layer taken for a wafer, 50 um. Common practice, no source."""

SampleFault: TypeAlias = tuple[str, str, str]
"""Pointer, message, hint."""


class SampleNames(Protocol):
    """Everything that a sample may name, by id: the records of a lab, or a store of facts."""

    @property
    def films(self) -> Mapping[str, object]:
        """Films and families of films."""

    @property
    def film_names(self) -> FilmNames:
        """Films by every name."""

    @property
    def tools(self) -> Mapping[str, object]:
        """Tools."""

    @property
    def etchants(self) -> Mapping[str, object]:
        """Etchants."""

    @property
    def etches(self) -> Mapping[str, object]:
        """Recipes."""


@dataclass(frozen=True)
class Known:
    """The records a sample may name; `is_broken` tells whether a file (kind, id) is there, but unusable."""

    records: SampleNames
    is_broken: Callable[[str, str], bool]


@dataclass(frozen=True)
class OutlineRule:
    """A rule for the names and the order of a sample; it runs whatever the shape of the rest."""

    name: str
    find: Callable[[Outline, Known], Iterator[SampleFault]]


@dataclass(frozen=True)
class SampleRule:
    """A rule for the numbers of a sample whose shape is right."""

    name: str
    find: Callable[[Sample], Iterator[SampleFault]]


def _unknown_films(outline: Outline, known: Known) -> Iterator[SampleFault]:
    unders = [name for name in outline.unders if name.text != NOTHING_UNDER]
    for name in (*outline.films, *unders):
        if name.text not in known.records.films and not known.is_broken("films", name.text):
            hint = known.records.film_names.suggestion(name.text)
            yield name.pointer, f'there is no film "{name.text}"', hint


def _unknown_tools(outline: Outline, known: Known) -> Iterator[SampleFault]:
    yield from _unknown(outline.tools, "tools", "tool", known, known.records.tools)


def _unknown_etchants(outline: Outline, known: Known) -> Iterator[SampleFault]:
    yield from _unknown(outline.etchants, "etchants", "etchant", known, known.records.etchants)


def _unknown_recipes(outline: Outline, known: Known) -> Iterator[SampleFault]:
    names = (*known.records.etches, ANY_ETCH)
    yield from _unknown(outline.etches, "etches", "recipe", known, names)


def _unknown(
    names: Iterable[Name], kind: str, word: str, known: Known, ids: Iterable[str]
) -> Iterator[SampleFault]:
    ids = frozenset(ids)
    for name in names:
        if name.text not in ids and not known.is_broken(kind, name.text):
            yield name.pointer, f'there is no {word} "{name.text}"', suggestion(name.text, ids)


def _no_target(outline: Outline, _known: Known) -> Iterator[SampleFault]:
    roles = [layer.role for layer in outline.layers]
    if roles and None not in roles and Role.TARGET not in roles:
        yield "/layers", "no layer is the target", 'give the film to be removed "role: target"'


def _upside_down(outline: Outline, _known: Known) -> Iterator[SampleFault]:
    """Layers stand top first: masks, then targets, then what is kept."""
    above: str | None = None
    for layer in outline.layers:
        if layer.role == Role.MASK and above is not None:
            yield (
                f"{layer.pointer}/role",
                f'the mask "{layer.film}" lies under "{above}", which is no mask',
                'layers are listed top first; a kept film under the target has "role: under"',
            )
        if layer.role in (Role.TARGET, Role.UNDER):
            above = above or layer.film or layer.role


def _covered(outline: Outline, _known: Known) -> Iterator[SampleFault]:
    cover: str | None = None
    for layer in outline.layers:
        if layer.role == Role.UNDER:
            cover = layer.film or layer.role
        elif layer.role == Role.TARGET and cover is not None:
            yield (
                f"{layer.pointer}/role",
                f'the target "{layer.film}" lies under "{cover}", which is kept and not opened',
                f'make "{cover}" a target too, or a mask if it is patterned',
            )


def _tolerances(sample: Sample) -> Iterator[SampleFault]:
    for film in sample.films:
        if film.tolerance_nm is not None and film.tolerance_nm >= film.thickness_nm:
            words = f'"{film.thickness.text}": the tolerance is not smaller than the thickness'
            yield f"{film.pointer}/thickness", words, ""


def _allowed_losses(sample: Sample) -> Iterator[SampleFault]:
    for film in sample.films:
        allowed = film.allowed_loss
        if allowed is not None and allowed.number > film.thickness_nm:
            words = f'"{allowed.text}" is more than the whole film ({film.thickness.text})'
            yield f"{film.pointer}/allowed_loss", words, 'write "any" if the film may vanish'


def _depth(sample: Sample) -> Iterator[SampleFault]:
    depth = sample.goal.depth
    whole = sum(film.thickness_nm + (film.tolerance_nm or 0.0) for film in sample.targets)
    if depth is not None and sample.targets and depth.number > whole:
        words = f'a depth of "{depth.text}" goes beyond the targets'
        yield "/goal/depth", words, "make the films below targets too, or give a smaller depth"


def _no_wafer(sample: Sample) -> Iterator[SampleFault]:
    thick = [film for film in sample.targets if film.thickness_nm >= _WAFER_NM]
    if sample.goal.is_through_wafer and sample.targets and not thick:
        words = "through-wafer is asked for, but no target is as thick as a wafer"
        yield "/goal/depth", words, "list the wafer among the layers, as a target"


def _nothing_left(sample: Sample) -> Iterator[SampleFault]:
    etches = [index for index, step in enumerate(sample.steps) if step.etch is not None]
    for index in etches[len(sample.targets) :]:
        words = "more etches than targets: nothing is left to remove"
        yield f"/steps/{index}", words, "make the film it removes a target, or take the step out"


def _unclear_steps(sample: Sample) -> Iterator[SampleFault]:
    for index, step in enumerate(sample.steps):
        pointer = f"/steps/{index}"
        if (step.treat is None) == (step.etch is None):
            yield pointer, "a step is either a treatment (treat) or an etch (etch)", ""
        elif step.treat is None and (step.etchant or step.time or step.temperature):
            hint = "only a treatment names etchant, time and temperature"
            yield pointer, "an etch takes these from its recipe", hint


OUTLINE_RULES: tuple[OutlineRule, ...] = (
    OutlineRule("unknown-id", _unknown_films),
    OutlineRule("unknown-id", _unknown_tools),
    OutlineRule("unknown-id", _unknown_etchants),
    OutlineRule("unknown-id", _unknown_recipes),
    OutlineRule("no-target", _no_target),
    OutlineRule("upside-down", _upside_down),
    OutlineRule("target-covered", _covered),
)
SAMPLE_RULES: tuple[SampleRule, ...] = (
    SampleRule("tolerance-too-large", _tolerances),
    SampleRule("allowed-loss-too-large", _allowed_losses),
    SampleRule("too-deep-for-target", _depth),
    SampleRule("no-wafer", _no_wafer),
    SampleRule("unclear-step", _unclear_steps),
    SampleRule("nothing-left", _nothing_left),
)


def _over_outlines(rule: OutlineRule) -> Rule:
    def find(checked: Checked) -> Iterator[Fault]:
        known = Known(checked.records, checked.is_broken)
        for raw in checked.of_kind("samples"):
            for pointer, message, hint in rule.find(outline_of(raw.data), known):
                yield Fault(raw.file, pointer, message, hint)

    return Rule(rule.name, find)


def _over_samples(rule: SampleRule) -> Rule:
    def find(checked: Checked) -> Iterator[Fault]:
        for sample in checked.records.samples.values():
            for pointer, message, hint in rule.find(sample):
                yield Fault(sample.file, pointer, message, hint)

    return Rule(rule.name, find)


RULES: tuple[Rule, ...] = (
    *(_over_outlines(rule) for rule in OUTLINE_RULES),
    *(_over_samples(rule) for rule in SAMPLE_RULES),
)
