"""Rules for tools: limits that can be met, and no film both allowed and forbidden."""

from __future__ import annotations

from collections.abc import Iterator

from builder.checking.rule import Checked, Fault, Rule


def _limits(checked: Checked) -> Iterator[Fault]:
    for tool in checked.records.tools.values():
        for name, limit in tool.limits.items():
            low, high = limit.min, limit.max
            if low is None or high is None or low.value is None or high.value is None:
                continue
            if low.dimension is high.dimension and low.value > high.value:
                words = f'the lowest "{low.text}" is above the highest "{high.text}"'
                yield Fault(tool.file, f"/limits/{name}", words)


def _mixed_limits(checked: Checked) -> Iterator[Fault]:
    for tool in checked.records.tools.values():
        for name, limit in tool.limits.items():
            if limit.min and limit.max and limit.min.dimension is not limit.max.dimension:
                words = f'"{limit.min.text}" and "{limit.max.text}" do not measure the same'
                yield Fault(tool.file, f"/limits/{name}", words)


def _allowed_and_forbidden(checked: Checked) -> Iterator[Fault]:
    for tool in checked.records.tools.values():
        for index, name in enumerate(tool.films_allowed):
            if name in tool.films_forbidden:
                yield Fault(tool.file, f"/films_allowed/{index}", f'"{name}" is allowed and forbidden')


RULES: tuple[Rule, ...] = (
    Rule("limits-reversed", _limits),
    Rule("limits-of-two-kinds", _mixed_limits),
    Rule("allowed-and-forbidden", _allowed_and_forbidden),
)
