"""The words and sentences that all safety pages share."""

from __future__ import annotations

from builder.records.terms import ExposureKind, FitnessVerdict, MixingSeverity, Signal

STANDING_SENTENCE = (
    "The safety data sheet, the local rules and licensed practice come first. "
    "This page informs; it authorises nothing."
)
NO_CONTAINER_RECORD = "no record: do not use it for this"
VERIFY = "Recalled, not checked: verify against the SDS."
SIGNAL_WORDS = {
    Signal.DANGER: "Danger",
    Signal.WARNING: "Warning",
    Signal.NONE: "No signal word",
    Signal.PENDING: "Signal word pending",
}
SEVERITY_WORDS = {MixingSeverity.FORBID: "never", MixingSeverity.CAUTION: "care"}
FITNESS_WORDS = {
    FitnessVerdict.USABLE: "holds it",
    FitnessVerdict.LIMITED: "for a limited time",
    FitnessVerdict.NOT_USABLE: "does not hold it",
}
EXPOSURE_WORDS = {
    ExposureKind.TWA: "average over a shift",
    ExposureKind.STEL: "short term, 15 min",
    ExposureKind.C: "ceiling, never above",
    ExposureKind.C10: "ceiling over 10 min",
    ExposureKind.C15: "ceiling over 15 min",
    ExposureKind.IDLH: "immediately dangerous",
}
PICTOGRAM_NAMES = {
    "GHS01": "exploding bomb",
    "GHS02": "flame",
    "GHS03": "flame over circle",
    "GHS04": "gas cylinder",
    "GHS05": "corrosion",
    "GHS06": "skull and crossbones",
    "GHS07": "exclamation mark",
    "GHS08": "health hazard",
    "GHS09": "environment",
}
"""Names of the UN symbols; the drawings are ours."""
PENDING_WORDS = {
    "signal": "signal word",
    "h_codes": "hazard statements",
    "pictograms": "pictograms",
    "boiling_point": "boiling point",
    "exposure_limits": "exposure limits",
    "precaution": "protective equipment and first action",
    "mixture": "order of mixing, heat and gas, pot life",
    "first_action": "first action",
    "waste": "waste stream",
}


def pending_words(names: tuple[str, ...]) -> tuple[str, ...]:
    """Return what is pending in words."""
    return tuple(PENDING_WORDS.get(name, name.replace("_", " ")) for name in names)
