"""Records of several files as one lab."""

from __future__ import annotations

import pytest

from builder.records.conversion import ROOM_HIGH_K, ROOM_LOW_K, quantity_of
from builder.records.lab import CheckedFile, build_lab
from builder.records.terms import Origin, RateKind
from builder.records.unit_table import Dimension

DEFAULTS = {
    "sigma_literature": {"wet_close": 0.25, "wet_other": 0.6, "plasma": 0.7, "cyclic": 0.7, "vapour": 0.9},
    "spread": {
        name: {"s0": 0.1, "d0": 4} for name in ("wet_thermostated", "wet_open", "plasma", "cyclic", "vapour")
    },
    "nonuniformity": {
        "immersion": "3 %",
        "gas_bubbles": "10 %",
        "vapour": "10 %",
        "plasma": "5 %",
        "deep_silicon": "10 %",
    },
    "thickness_tolerance": "2 %",
    "reaction_time": {"wet": "15 s", "plasma": "3 s"},
    "allowed_loss": {
        "under": {"share": "5 %", "length": "10 nm"},
        "other": {"share": "2 %", "length": "5 nm", "at_least": "1 nm"},
        "none_below": "20 nm",
    },
    "mask_reserve": {
        "resist_plasma": {"share": "20 %", "length": "200 nm"},
        "other": {"share": "10 %", "length": "20 nm"},
    },
}
SHIPPED = CheckedFile(
    "lab",
    "lab",
    Origin.REFERENCE,
    "recipes/reference/lab.yaml",
    {"name": "Unnamed lab", "confidence": 0.9, "stale_after_days": 365, "defaults": DEFAULTS},
)


def rates(origin: Origin, film: str) -> CheckedFile:
    """Return a rates file of one rate."""
    row = {
        "film": film,
        "kind": "rate",
        "rate": "60 nm/min",
        "rank": "unchecked",
        "trust": "recalled",
        "confidence": "low",
        "source": "x",
        "temperature": "room",
    }
    folder = "recipes/reference/rates" if origin is Origin.REFERENCE else "recipes/rates"
    return CheckedFile("rates", "koh", origin, f"{folder}/koh.yaml", {"etchant": "koh", "rates": [row]})


def test_a_lab_without_settings_has_the_shipped_ones() -> None:
    """And says so by its origin."""
    settings = build_lab([SHIPPED]).settings
    assert (settings.origin, settings.confidence) == (Origin.REFERENCE, 0.9)


def test_each_key_of_the_lab_stands_over_the_shipped_one() -> None:
    """Deep within: one number changed leaves the others."""
    own = CheckedFile(
        "lab",
        "lab",
        Origin.LAB,
        "recipes/lab.yaml",
        {"name": "Mine", "defaults": {"spread": {"plasma": {"s0": 0.2, "d0": 6}}}},
    )
    settings = build_lab([own, SHIPPED]).settings
    assert (settings.name, settings.origin, settings.file) == ("Mine", Origin.LAB, "recipes/lab.yaml")
    assert (settings.defaults.spread.plasma.s0, settings.defaults.spread.cyclic.s0) == (0.2, 0.1)
    assert settings.defaults.thickness_tolerance.number == pytest.approx(0.02)


def test_missing_shipped_settings_are_an_incomplete_installation() -> None:
    """No default is made up in the code."""
    with pytest.raises(ValueError, match="install"):
        build_lab([])


def test_list_files_of_reference_and_lab_are_joined() -> None:
    """The reference first, each fact with its own file and place."""
    found = build_lab([SHIPPED, rates(Origin.LAB, "b"), rates(Origin.REFERENCE, "a")]).rates["koh"]
    assert [(rate.film, rate.origin, rate.pointer) for rate in found] == [
        ("a", Origin.REFERENCE, "/rates/0"),
        ("b", Origin.LAB, "/rates/0"),
    ]
    assert found[0].kind is RateKind.RATE
    assert found[0].rate.value == pytest.approx(1.0)


def test_room_is_a_range_of_temperature() -> None:
    """18 to 25 degC."""
    room = quantity_of("room", (Dimension.TEMPERATURE,))
    assert (room.low, room.high, room.value) == (ROOM_LOW_K, ROOM_HIGH_K, None)
    assert [end - 273.15 for end in (ROOM_LOW_K, ROOM_HIGH_K)] == pytest.approx([18, 25])


def test_a_run_keeps_what_is_blank_as_unknown() -> None:
    """Blank is None, never 0; a true minus sign is a minus."""
    row = {
        "date": "2026-03-01",
        "wafer": "w",
        "film": "f",
        "time_s": "60",
        "before_nm": "5e2",
        "after_nm": "400",
        "u_nm": "1",
    }
    cold = {**row, "temperature_degc": "−5"}
    file = CheckedFile("runs", "etch", Origin.LAB, "recipes/runs/etch.csv", [row, cold])
    first, second = build_lab([SHIPPED, file]).runs["etch"]
    assert (first.before_nm, first.temperature_degc, first.bath_hours, first.event) == (
        500.0,
        None,
        None,
        None,
    )
    assert (second.temperature_degc, second.pointer) == (-5.0, "/1")
