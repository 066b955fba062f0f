"""Before your first wet etch: what to know and to check, as a list that prints."""

from __future__ import annotations

from dataclasses import dataclass

from builder.records.lab import LabRecords
from builder.records.terms import Method
from builder.views.link import Link
from builder.views.references import Fact, tool_link
from builder.views.safety_strip import contacts


@dataclass(frozen=True)
class CheckGroup:
    """A part of the list: a heading and its lines."""

    anchor: str
    name: str
    lines: tuple[str, ...]


@dataclass(frozen=True)
class FirstEtchPage:
    """All that the page shows."""

    url: str
    title: str
    description: str
    search_text: str
    lab: str
    groups: tuple[CheckGroup, ...]
    local_rules: tuple[str, ...]
    contacts: tuple[Fact, ...]
    benches: tuple[tuple[Link, str], ...]


_GROUPS = (
    CheckGroup(
        "before-the-day",
        "Before the day",
        (
            "I have the training for this bench, and somebody has shown it to me once.",
            "I have read the safety data sheet of every chemical on my list, in its current edition.",
            "I have read the page of the etchant here: what it is made of, what must never meet it, "
            "its container, its pot life, where its waste goes.",
            "I have planned the sample: every film on it, the back and the edge, what holds it, "
            "and how long the mask lasts.",
            "No film of mine is forbidden at this bench, and none gives off gas that the bench cannot take.",
            "I know whom to call, and I am not alone in the bay.",
        ),
    ),
    CheckGroup(
        "at-the-bench",
        "At the bench, before anything is poured",
        (
            "The exhaust runs, the sash is where it belongs, eyewash and shower are free and within reach.",
            "For hydrofluoric acid or any fluoride: calcium gluconate gel is at hand and in date.",
            "Goggles and face shield, apron, sleeves, closed shoes; gloves for this chemical, "
            "without holes, over a second pair.",
            "The bench is dry and holds nothing that must not meet what I pour.",
            "The beaker is of the right material for this chemical at this temperature, clean, dry, and "
            "labelled: name, date, contents, hazard.",
            "A rinse is ready, full and close; tweezers of the right material lie beside it.",
            "The waste bottle is the right one, has room and a label, and a vented cap where gas comes.",
        ),
    ),
    CheckGroup(
        "while-it-runs",
        "While it runs",
        (
            "Acid into water. Peroxide slowly into the acid for piranha. Never the other way round.",
            "Nothing goes from one liquid into the next without a rinse.",
            "The sample goes in dry, or wet with water only: no solvent into an oxidiser.",
            "I stay. If I must go, somebody who knows the bench takes over.",
            "At an unexpected colour, heat, gas or smell: sash down, step back, call.",
        ),
    ),
    CheckGroup(
        "afterwards",
        "Afterwards",
        (
            "Sample rinsed and dried; gloves rinsed before they come off; hands washed.",
            "What makes gas stays open or under a vented cap, with its label, until it is quiet.",
            "Waste in its own stream. I never add to a bottle whose contents I do not know.",
            "Bench rinsed and dry, and left as I would want to find it.",
            "Every splash on skin is reported; hydrofluoric acid at once, for pain may come hours later.",
        ),
    ),
)
"""Common practice, no source; the local rules come first."""


def first_etch_page(records: LabRecords) -> FirstEtchPage:
    """Return the page to read and print before a first wet etch."""
    benches = [tool for tool in records.tools.values() if Method.WET in tool.methods]
    return FirstEtchPage(
        url="safety/before-your-first-wet-etch.html",
        title="Before your first wet etch",
        description="What to know and to check before a first wet etch, as a list that prints.",
        search_text="first wet etch checklist beginner newcomer print",
        lab=records.settings.name,
        groups=_GROUPS,
        local_rules=records.settings.local_rules,
        contacts=contacts(records),
        benches=tuple((tool_link(records, tool.id), tool.training) for tool in benches),
    )
