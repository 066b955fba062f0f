"""Sentences for what caps a film's word, what lifts a cap, and what loses a film whatever its number."""

from __future__ import annotations

from collections.abc import Callable, Mapping

from builder.findings.plan.result import CapCode, LostCode, Remark, Value
from builder.views.number_text import length_text, plain_number, temperature_text, time_text

Params = Mapping[str, Value]
Sentence = Callable[[Params], str]

_CAPS: dict[str, Sentence] = {
    CapCode.ADVERSE: lambda p: f"on record: it {p['effect']}",
    CapCode.ADHESION: lambda p: f"no record that this mask stays on {p['on']} in this recipe",
    CapCode.ADHESION_TIME: lambda p: (
        f"the mask was seen to stay on {p['on']} for {time_of(p, 'held_s')} only"
        + ("" if p["stop_s"] is None else f", and the etch may take {time_of(p, 'stop_s')}")
    ),
    CapCode.BACK: lambda p: "what covers the back is not stated, and the back is wet from the start",
    CapCode.BARRIER: lambda p: f"{p['under']} may be reached through it: nobody has shown that it is dense",
    CapCode.CARRIER_LOAD: lambda p: f"the carrier is bare {p['film']} too, and no run had such a load",
    CapCode.CONFLICT: lambda p: "one own run contradicts the literature",
    CapCode.COUPLE: lambda p: f"{p['one']} and {p['other']} are wet together; no record of that couple",
    CapCode.COUPLE_UNDERCUT: lambda p: f"{p['one']} with {p['other']}: {clause(p['words'])}",
    CapCode.EARLIER_LOSS: lambda p: "nobody knows what an earlier step has taken",
    CapCode.EDGE: lambda p: "whether the sample's edge is open is not stated",
    CapCode.FAMILY: lambda p: "the film is not known exactly; the worst of those it may be counts",
    CapCode.HEAT: lambda p: "no record of cooling; the mask may get hot",
    CapCode.HEAT_LIMIT: lambda p: (
        f"the sample may see {temperature_of(p, 'limit_k')}, and "
        + (
            "how hot this etch gets is not on record"
            if p["at_k"] is None
            else f"the etch is asked for at {temperature_of(p, 'at_k')}"
        )
    ),
    CapCode.LINE: lambda p: (
        f"a line of {length_of(p, 'line_nm')} may lose {length_of(p, 'undercut_nm')} from each edge"
    ),
    CapCode.LOAD: lambda p: (
        f"a load of {area_of(p, 'load_cm2')} is far from that of the runs, "
        f"{between(area_of(p, 'low_cm2'), area_of(p, 'high_cm2'))}"
    ),
    CapCode.PUBLISHED_CHAMBER: lambda p: "the number is from another chamber, and this one has no own run",
    CapCode.THROUGH_WAFER: lambda p: "etching through the wafer needs a carrier or a film to stop on",
    CapCode.UNDER_NOBLE: lambda p: f"{p['layer']} is usual under {p['film']}; what lies there is not stated",
    CapCode.UNDERCUT_ASSUMED: lambda p: (
        "the undercut is a rule of thumb here; this recipe has none on record"
    ),
    CapCode.UNDERCUT_UNKNOWN: lambda p: (
        "how far the edge moves is not on record, and a line width is asked for"
    ),
    CapCode.WINDOW: lambda p: (
        f"an opening of {length_of(p, 'window_nm')} is far from that of the runs, "
        f"{between(length_of(p, 'low_nm'), length_of(p, 'high_nm'))}"
    ),
}

LIFTS: dict[str, str] = {
    CapCode.ADVERSE: "look at a test piece under the microscope and record what you see",
    CapCode.ADHESION: "record a mask that stayed on this film, with its preparation and time",
    CapCode.ADHESION_TIME: "run a test piece for longer and record the time the mask held",
    CapCode.BACK: "state the film on the back, or that it is protected",
    CapCode.BARRIER: "record that the film is dense, or that the mask held",
    CapCode.CARRIER_LOAD: "state load_cm2 with the carrier in it, or use a carrier of another film",
    CapCode.CONFLICT: "run a second monitor wafer",
    CapCode.COUPLE: "etch a piece with both films and record the couple",
    CapCode.COUPLE_UNDERCUT: "avoid the contact, or measure the undercut on a test piece",
    CapCode.EARLIER_LOSS: "measure the film after the earlier step",
    CapCode.EDGE: "state edge: open, protected or unused",
    CapCode.FAMILY: "name the film as deposited",
    CapCode.HEAT: "record the recipe's cooling",
    CapCode.HEAT_LIMIT: "record the recipe's temperature, or pick a cooler etch",
    CapCode.LINE: "make the line wider, or pick an etch with less undercut",
    CapCode.LOAD: "run a monitor wafer with this load",
    CapCode.PUBLISHED_CHAMBER: "run one monitor wafer of the target in this chamber",
    CapCode.THROUGH_WAFER: "state mount.carrier, or the film to stop on",
    CapCode.UNDER_NOBLE: "state on: the film under it, or on: none",
    CapCode.UNDERCUT_ASSUMED: "measure the undercut and record the recipe's undercut_ratio",
    CapCode.UNDERCUT_UNKNOWN: "measure the undercut and record the recipe's undercut_ratio",
    CapCode.WINDOW: "run a monitor wafer with this opening",
}

_LOST: dict[str, Sentence] = {
    LostCode.COUPLE: lambda p: f"{p['one']} touching {p['other']}: {clause(p['words'])}",
    LostCode.LINE: lambda p: (
        f"a line of {length_of(p, 'line_nm')} loses at least {length_of(p, 'undercut_nm')} from each edge "
        "and stands on nothing"
    ),
    LostCode.MASK_FAILS: lambda p: f"on record: this mask {p['effect']} here",
    LostCode.ROUGHENED: lambda p: "it roughens, and its surface is critical",
}


def cap_words(cap: Remark) -> str:
    """Return what a cap says."""
    return _CAPS[cap.code](cap.params)


def lost_words(lost: Remark) -> str:
    """Return what loses a film whatever its number."""
    return _LOST[lost.code](lost.params)


def clause(words: Value) -> str:
    """Return recorded words as a clause of a sentence."""
    text = str(words).rstrip(".")
    return text[:1].lower() + text[1:]


def between(low: str, high: str) -> str:
    """Return two ends as a span in words, or one where both read alike."""
    return low if low == high else f"{low} to {high}"


def time_of(params: Params, key: str) -> str:
    """Return a time among the values of a remark, as people set timers."""
    return time_text(_number(params, key))


def length_of(params: Params, key: str) -> str:
    """Return a length among the values of a remark."""
    return plain_length(_number(params, key))


def plain_length(value_nm: float) -> str:
    """Return a length in nm with its unit."""
    return length_text(None, value_nm, None).with_unit


def area_of(params: Params, key: str) -> str:
    """Return an area in cm² among the values of a remark."""
    return f"{plain_number(_number(params, key))}\N{NO-BREAK SPACE}cm²"


def temperature_of(params: Params, key: str) -> str:
    """Return a temperature in K among the values of a remark."""
    return temperature_text(_number(params, key))


def _number(params: Params, key: str) -> float:
    value = params[key]
    assert isinstance(value, (int, float))
    return float(value)
