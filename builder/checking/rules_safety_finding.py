"""What can hurt somebody, as a value: a forbidden act, or one that needs care."""

from __future__ import annotations

from dataclasses import dataclass

from builder.records.mixing_match import Meeting
from builder.records.terms import MixingSeverity

_ORIGIN_NOTE = "Listed as:"
"""From here on a rule's note tells how its source words the pair."""


@dataclass(frozen=True)
class SafetyFinding:
    """
    One finding; `code` is the stable name of its kind.

    `rule` is the id of the mixing rule behind it, or None where practice or another record speaks.
    `step` is the place in a sequence where it happens, from 0.
    """

    code: str
    severity: MixingSeverity
    message: str
    rule: str | None = None
    source: tuple[str, ...] = ()
    step: int | None = None

    @property
    def forbidden(self) -> bool:
        """Tell whether a plan with it is refused."""
        return self.severity is MixingSeverity.FORBID


def forbid(code: str, message: str, source: tuple[str, ...] = ("common-practice",)) -> SafetyFinding:
    """Return a finding that refuses the plan."""
    return SafetyFinding(code, MixingSeverity.FORBID, message, None, source)


def caution(code: str, message: str, source: tuple[str, ...] = ("common-practice",)) -> SafetyFinding:
    """Return a finding that asks for care."""
    return SafetyFinding(code, MixingSeverity.CAUTION, message, None, source)


def of_meeting(code: str, meeting: Meeting, after: str = "", step: int | None = None) -> SafetyFinding:
    """Return the finding of two things that meet; `after` says how they come to meet."""
    rule = meeting.rule
    verb = "must not meet" if rule.severity is MixingSeverity.FORBID else "needs care with"
    gas = f" ({rule.gas})" if rule.gas else ""
    words = f"{meeting.one.name} {verb} {meeting.other.name}{after}: {', '.join(rule.hazards)}{gas}."
    advice = advice_of(rule.note)
    return SafetyFinding(code, rule.severity, f"{words} {advice}".strip(), rule.id, rule.source, step)


def advice_of(note: str | None) -> str:
    """Return what a rule's note advises, without how its source words the pair."""
    return (note or "").partition(_ORIGIN_NOTE)[0].strip()


def without_repeats(findings: list[SafetyFinding]) -> tuple[SafetyFinding, ...]:
    """Return the findings, forbidden ones first, each rule or message once."""
    ordered = sorted(findings, key=lambda one: (not one.forbidden, one.code, one.rule or "", one.message))
    kept: dict[tuple[str, str, int | None], SafetyFinding] = {}
    for finding in ordered:
        kept.setdefault((finding.code, finding.rule or finding.message, finding.step), finding)
    return tuple(kept.values())
