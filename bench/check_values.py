"""
What the engine gives beside the expected value, for each case of `tests/cases`.

Run by `python -m bench.check_values`.

A case file holds inputs, expected values, a tolerance and the source of each case; `trust` says whether the
value was read in a text that quotes the source, recalled from memory, or computed by another route.
"""

from __future__ import annotations

import json
import math
from collections.abc import Callable, Iterator, Mapping
from dataclasses import dataclass
from pathlib import Path
from typing import Any

from bench import check_routes

CASES = Path(__file__).resolve().parent.parent / "tests" / "cases"

# Case files are JSON: what a case holds is known only to the route that reads it.
Values = Mapping[str, Any]

ROUTES: dict[str, Callable[[Values], Values]] = {
    "individuals": check_routes.individuals,
    "limits": check_routes.limits,
    "line_fit": check_routes.line_fit,
    "next_run": check_routes.next_run,
    "pooling": check_routes.pooling,
    "quantiles": check_routes.quantiles,
    "run_rate": check_routes.run_rate,
    "selectivity": check_routes.selectivity,
    "series": check_routes.series,
    "tolerance": check_routes.tolerance,
    "trigamma": check_routes.trigamma,
}


@dataclass(frozen=True)
class Case:
    """One case of a case file."""

    file: str
    name: str
    source: str
    trust: str
    inputs: Values
    expected: Values
    tolerance: Values


@dataclass(frozen=True)
class Check:
    """One number of a case, as expected and as the engine gives it; None is "no value"."""

    case: Case
    quantity: str
    expected: float | None
    got: float | None
    allowed: float

    @property
    def passed(self) -> bool:
        """Is the value within its tolerance (and missing only where it should be)?"""
        if self.expected is None or self.got is None:
            return self.expected is self.got
        return abs(self.got - self.expected) <= self.allowed


def cases(folder: Path = CASES) -> Iterator[Case]:
    """All cases, file by file."""
    for name in sorted(ROUTES):
        for item in json.loads((folder / f"{name}.json").read_text(encoding="utf-8"))["cases"]:
            yield Case(name, **item)


def checks_of(case: Case) -> list[Check]:
    """Every number of one case."""
    got = ROUTES[case.file](case.inputs)
    found: list[Check] = []
    for quantity, expected in case.expected.items():
        pairs = zip(expected, got[quantity], strict=True) if isinstance(expected, list) else None
        for want, have in pairs or [(expected, got[quantity])]:
            found.append(Check(case, quantity, want, have, _allowed(case.tolerance, quantity, want)))
    return found


def _allowed(tolerance: Values, quantity: str, expected: float | None) -> float:
    if "abs" in tolerance:
        return float(tolerance["abs"])
    if "abs_by_key" in tolerance:
        return float(tolerance["abs_by_key"][quantity])
    return float(tolerance["rel"]) * abs(expected or 0.0)


def report() -> bool:
    """Print the table and the counts; True when every check passes."""
    found = [check for case in cases() for check in checks_of(case)]
    for check in found:
        expected, got = (_text(value) for value in (check.expected, check.got))
        mark = "ok" if check.passed else "WRONG"
        title = f"{mark:6s}{check.case.file + ': ' + check.case.name:58s}{check.quantity:22s}"
        print(f"{title}{expected:>20s}{got:>20s}")
        print(f"      {check.case.trust}: {check.case.source}")
    wrong = sum(not check.passed for check in found)
    count = len({(check.case.file, check.case.name) for check in found})
    print(f"\n{count} cases, {len(found)} numbers, {wrong} wrong")
    return wrong == 0 and count > 0


def _text(value: float | None) -> str:
    return "none" if value is None else f"{value:.10g}" if math.isfinite(value) else str(value)


def main() -> int:
    """Print the table; 1 if a value is wrong."""
    return 0 if report() else 1


if __name__ == "__main__":
    raise SystemExit(main())
