"""
What can hurt you in a plan: forbidden acts, cautions, and how grave an etchant is.

`plan_safety` gives the reasons to exclude an etchant and the cautions to show; `hazard_score`
orders plans by the lesser hazard.
"""

from builder.checking.rules_safety_finding import SafetyFinding
from builder.checking.rules_safety_meetings import WetStep, film_gas, forbidden_pairs, sequence_findings
from builder.findings.safety.hazards import EtchantHazards, cautions_of, etchant_hazards
from builder.findings.safety.plan import PlanSafety, plan_safety
from builder.findings.safety.score import hazard_score

__all__ = [
    "EtchantHazards",
    "PlanSafety",
    "SafetyFinding",
    "WetStep",
    "cautions_of",
    "etchant_hazards",
    "film_gas",
    "forbidden_pairs",
    "hazard_score",
    "plan_safety",
    "sequence_findings",
]
