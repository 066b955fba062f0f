"""`python -m bench [PART …]`: speed and coverage, as ratios within one run; nothing here passes or fails."""

from __future__ import annotations

import importlib
import sys

from bench import check_values, coverage

_SPEED = {"site": "bench.site_speed", "plan": "bench.plan_speed", "planner": "bench.planner_speed"}
_PARTS = (*_SPEED, "coverage", "checks")


def main(names: list[str]) -> None:
    """Run the parts named, or all."""
    unknown = [name for name in names if name not in _PARTS]
    if unknown:
        raise SystemExit(f"there is no part {unknown[0]}; take of {', '.join(_PARTS)}")
    for name in names or _PARTS:
        print(f"\n{name}\n{'-' * len(name)}")
        if name == "coverage":
            coverage.report(full=True)
        elif name == "checks":
            check_values.report()
        else:
            for what, value in importlib.import_module(_SPEED[name]).rows():
                print(f"{what:75} {value}", flush=True)


if __name__ == "__main__":
    main(sys.argv[1:])
