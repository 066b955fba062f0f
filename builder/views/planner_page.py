"""The planner's page: what stands there before its scripts run, and which scripts those are."""

from __future__ import annotations

from dataclasses import dataclass

from builder.records.lab import LabRecords

DATA_URL = "planner/facts.js"
"""The planner's data, a script because a page opened from a folder may load nothing else."""

SCRIPTS = (
    "units",
    "data",
    "model-published",
    "model-evidence",
    "model-times",
    "model-words",
    "model-films",
    "model-couples",
    "model-judging",
    "model-caps",
    "model-option",
    "model-offers",
    "model-plan",
    "model-sample",
    "numbers",
    "strings",
    "section",
    "names",
    "may-lose",
    "sample-check",
    "sample-file",
    "address",
    "state",
    "hooks",
    "dom",
    "view-section",
    "view-fields",
    "view-stack",
    "view-option",
    "view-answers",
    "view-card",
    "view-bar",
    "view",
    "main",
)
"""The scripts in the order in which they need each other."""

MODEL_SCRIPTS = SCRIPTS[: SCRIPTS.index("section")]
"""The scripts that plan and put a plan into words, and know nothing of a page."""


@dataclass(frozen=True)
class PlannerPage:
    """All that the planner's page shows by itself."""

    url: str
    title: str
    description: str
    search_text: str
    data_url: str
    style_url: str
    script_urls: tuple[str, ...]
    sample_count: int


def planner_page(records: LabRecords) -> PlannerPage:
    """Return the view of the planner's page."""
    return PlannerPage(
        url="planner/index.html",
        title="Plan an etch",
        description="Build your sample, and see which etch removes its target and what survives.",
        search_text="planner plan sample stack layers mask will it survive how long run card",
        data_url=DATA_URL,
        style_url="assets/planner/planner.css",
        script_urls=tuple(f"assets/planner/{name}.js" for name in SCRIPTS),
        sample_count=len(records.samples),
    )
