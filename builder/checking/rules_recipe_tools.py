"""Rules for a recipe on its tool: settings within limits, films and method that the tool takes."""

from __future__ import annotations

from collections.abc import Iterator

from builder.checking.rule import Checked, Fault, Rule
from builder.checking.rules_recipes import recipe_films
from builder.checking.setting_limits import is_of_other_kind, limit_breach
from builder.problems import Severity, did_you_mean
from builder.records.etches import Etch
from builder.records.quantities import Quantity
from builder.records.tools import SettingLimit, Tool


def _pairs(checked: Checked) -> Iterator[tuple[Etch, Tool]]:
    for etch in checked.records.etches.values():
        tool = checked.records.tools.get(etch.tool)
        if tool is not None:
            yield etch, tool


def _settings(etch: Etch) -> Iterator[tuple[str, str, Quantity]]:
    """Yield pointer, name and value of every setting of a recipe."""
    if etch.temperature is not None:
        yield "/temperature", "temperature", etch.temperature
    for index, step in enumerate(etch.settings):
        if step.time is not None:
            yield f"/settings/{index}/time", "time", step.time
        for name, value in step.values.items():
            yield f"/settings/{index}/values/{name}", name, value


def _limited(checked: Checked) -> Iterator[tuple[Etch, str, Quantity, SettingLimit]]:
    for etch, tool in _pairs(checked):
        for pointer, name, value in _settings(etch):
            if name in tool.limits:
                yield etch, pointer, value, tool.limits[name]


def _outside(checked: Checked) -> Iterator[Fault]:
    for etch, pointer, value, limit in _limited(checked):
        if not is_of_other_kind(value, limit) and (words := limit_breach(value, limit)):
            yield Fault(etch.file, pointer, words, f"see recipes/tools/{etch.tool}.yaml")


def _other_kind(checked: Checked) -> Iterator[Fault]:
    for etch, pointer, value, limit in _limited(checked):
        if is_of_other_kind(value, limit):
            end = limit.min or limit.max
            words = f'"{value.text}" cannot be compared with the limit of the tool, {end.text if end else ""}'
            yield Fault(etch.file, pointer, words)


def _misspelt(checked: Checked) -> Iterator[Fault]:
    """A name that no other recipe and no tool uses escapes its limit without a word."""
    used: dict[str, int] = {}
    for etch in checked.records.etches.values():
        for name in {name for _, name, _ in _settings(etch)}:
            used[name] = used.get(name, 0) + 1
    for etch, tool in _pairs(checked):
        for pointer, name, _ in _settings(etch):
            guess = None if name in tool.limits or used[name] > 1 else did_you_mean(name, tool.limits)
            if guess is not None:
                words = f'the tool has no limit for "{name}"'
                yield Fault(etch.file, pointer, words, f'did you mean "{guess}"?')


def _films(checked: Checked) -> Iterator[Fault]:
    for etch, tool in _pairs(checked):
        for pointer, name in recipe_films(etch):
            film = checked.records.films.get(name)
            if film is not None and (words := tool.refusal(film)):
                yield Fault(etch.file, pointer, words, f"see recipes/tools/{etch.tool}.yaml")


def _methods(checked: Checked) -> Iterator[Fault]:
    for etch, tool in _pairs(checked):
        if etch.method not in tool.methods:
            words = f"{tool.name} is not used for {etch.method} etching"
            yield Fault(etch.file, "/method", words, f"see recipes/tools/{etch.tool}.yaml")


def _etchant_methods(checked: Checked) -> Iterator[Fault]:
    for etch in checked.records.etches.values():
        etchant = checked.records.etchants.get(etch.etchant)
        if etchant is not None and etchant.method is not etch.method:
            words = f'a {etch.method} recipe, but "{etchant.id}" is used for {etchant.method} etching'
            yield Fault(etch.file, "/etchant", words)


RULES: tuple[Rule, ...] = (
    Rule("setting-outside-limits", _outside),
    Rule("setting-of-other-kind", _other_kind),
    Rule("setting-without-limit", _misspelt, Severity.NOTICE),
    Rule("film-not-allowed", _films),
    Rule("method-not-of-tool", _methods),
    Rule("method-not-of-etchant", _etchant_methods),
)
