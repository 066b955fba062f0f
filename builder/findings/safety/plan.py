"""Safety of one etchant on one sample, as reasons to refuse it and cautions to show."""

from __future__ import annotations

from collections.abc import Iterable, Mapping, Sequence
from dataclasses import dataclass

from builder.checking.rules_safety_finding import SafetyFinding
from builder.checking.rules_safety_meetings import WetStep
from builder.checking.rules_safety_plan import EtchSituation, recipe_sequence, situation_findings
from builder.findings.safety.hazards import cautions_of
from builder.records.conversion import quantity_of
from builder.records.etches import Etch
from builder.records.lab import LabRecords
from builder.records.quantities import Quantity
from builder.records.terms import Method
from builder.records.unit_table import Dimension

_PLASMA_CAUTION = "Toxic gas may remain in the chamber: pump and purge before it is opened."


@dataclass(frozen=True)
class PlanSafety:
    """Why an etchant must not be used here (empty: no rule forbids it), and what to take care of."""

    forbidden: tuple[str, ...]
    cautions: tuple[str, ...]
    findings: tuple[SafetyFinding, ...] = ()


def plan_safety(  # noqa: PLR0913  each keyword is one thing that may be known
    records: LabRecords,
    etchant_id: str,
    method: Method,
    film_ids: Iterable[str],
    *,
    etch_id: str | None = None,
    tool_id: str | None = None,
    temperature: Quantity | None = None,
    thickness_nm: Mapping[str, float] | None = None,
    bond: str | None = None,
    before: Sequence[WetStep] = (),
) -> PlanSafety:
    """
    Return what forbids an etchant on these films and what it asks for.

    `film_ids` are all films the etchant may reach: targets, masks, what lies under, exposed films
    and the back. `etch_id` names a recipe of the lab, whose tool, temperature and later steps then
    count; without it nothing is known of them. `thickness_nm` is by film, the thickest if it stands
    twice. No rule that forbids is no permission.
    """
    etch = None if etch_id is None else records.etches[etch_id]
    situation = EtchSituation(
        etchant=etchant_id,
        films=tuple(dict.fromkeys(film_ids)),
        thickness_nm=thickness_nm or {},
        tool=tool_id or (etch.tool if etch else None),
        temperature=temperature or _temperature(records, etchant_id, etch),
        bond=bond,
        before=tuple(before),
        after=etch.after_steps if etch else None,
    )
    findings = situation_findings(records, situation)
    if etch is not None:
        findings += tuple(one for one in recipe_sequence(records, etch) if one not in findings)
    return _plan_safety(records, etchant_id, method, findings)


def _temperature(records: LabRecords, etchant_id: str, etch: Etch | None) -> Quantity | None:
    """Return the temperature of a recipe, else the one that belongs to the etchant itself."""
    if etch is not None and etch.temperature is not None:
        return etch.temperature
    text = records.etchants[etchant_id].temperature
    return None if text is None else quantity_of(text, (Dimension.TEMPERATURE,))


def _plan_safety(
    records: LabRecords, etchant_id: str, method: Method, findings: tuple[SafetyFinding, ...]
) -> PlanSafety:
    forbidden = tuple(finding.message for finding in findings if finding.forbidden)
    cautions = tuple(finding.message for finding in findings if not finding.forbidden)
    general = cautions_of(records, etchant_id)
    plasma = (_PLASMA_CAUTION,) if method in (Method.PLASMA, Method.CYCLIC, Method.VAPOUR) else ()
    return PlanSafety(forbidden, tuple(dict.fromkeys((*cautions, *general, *plasma))), findings)
