"""
The closed table of units a record may use, as plain data shared with the browser.

Value in the canonical unit = number x factor / divisor + offset. Factor and divisor are kept apart
and chosen whole where possible, so that Python and the browser get the same bits and 120 nm/min is
exactly 2 nm/s.

Source of the factors: SI Brochure, 9th ed. (BIPM 2019), for the prefixes, minute, hour, day, litre,
electronvolt and the elementary charge, Avogadro and Boltzmann constants; NIST SP 811 (2008) for mil,
inch, torr, standard atmosphere and the thermochemical calorie. The tests hold them against pint.
"""

from __future__ import annotations

import enum
import json
import re
import unicodedata
from collections.abc import Mapping
from dataclasses import dataclass


class Dimension(enum.StrEnum):
    """What a quantity measures; the comment names the canonical unit its value is in."""

    LENGTH = "length"  # nm
    TIME = "time"  # s
    PRESSURE = "pressure"  # Pa
    FLOW = "flow"  # sccm
    TEMPERATURE = "temperature"  # K, absolute
    TEMPERATURE_DIFFERENCE = "temperature_difference"  # K
    PERCENT = "percent"  # fraction
    MASS_FRACTION = "mass_fraction"  # fraction by mass
    VOLUME_FRACTION = "volume_fraction"  # fraction by volume
    ATOMIC_FRACTION = "atomic_fraction"  # fraction by number of atoms
    CONCENTRATION = "concentration"  # mol/L
    MASS_CONCENTRATION = "mass_concentration"  # g/L
    RATE = "rate"  # nm/s
    RATE_PER_CYCLE = "rate_per_cycle"  # nm/cycle
    AREA = "area"  # cm2
    VOLUME = "volume"  # mL
    MASS = "mass"  # g
    POWER = "power"  # W
    POWER_DENSITY = "power_density"  # W/cm2
    VOLTAGE = "voltage"  # V
    FREQUENCY = "frequency"  # Hz
    ROTATION = "rotation"  # rpm
    DENSITY = "density"  # g/cm3
    MOLAR_MASS = "molar_mass"  # g/mol
    ENERGY = "energy"  # eV per particle
    DOSE = "dose"  # mJ/cm2
    STRESS = "stress"  # MPa


@dataclass(frozen=True)
class Unit:
    """
    One unit of one dimension.

    `symbol` is how pages print it; `spellings` are the ways it may be written, after
    `normal_spelling`. Value in the canonical unit = number x factor / divisor + offset.
    """

    symbol: str
    dimension: Dimension
    spellings: tuple[str, ...]
    factor: float = 1.0
    divisor: float = 1.0
    offset: float = 0.0

    def to_canonical(self, number: float) -> float:
        """Return the number, given in this unit, in the canonical unit."""
        return number * self.factor / self.divisor + self.offset

    def from_canonical(self, value: float) -> float:
        """Return the value, given in the canonical unit, in this unit."""
        return (value - self.offset) * self.divisor / self.factor


SIGNED = frozenset({Dimension.TEMPERATURE_DIFFERENCE, Dimension.VOLTAGE, Dimension.STRESS, Dimension.ENERGY})
"""Dimensions whose values may lie below zero (bias, compressive stress); no other may."""

_KJ_PER_MOL_PER_EV = 96.48533212331
"""Elementary charge x Avogadro constant / 1000; both are exact since 2019 (SI Brochure, 9th ed.)."""

_LENGTHS = (
    Unit("Å", Dimension.LENGTH, ("Å", "A", "angstrom", "angstroms", "Ang"), 1, 10),
    Unit("nm", Dimension.LENGTH, ("nm",)),
    Unit("µm", Dimension.LENGTH, ("um", "micron", "microns"), 1e3),
    Unit("mm", Dimension.LENGTH, ("mm",), 1e6),
    Unit("cm", Dimension.LENGTH, ("cm",), 1e7),
    Unit("m", Dimension.LENGTH, ("m",), 1e9),
    Unit("mil", Dimension.LENGTH, ("mil", "mils"), 25400),
    Unit("in", Dimension.LENGTH, ("in", "inch", "inches"), 2.54e7),
)
_TIMES = (
    Unit("s", Dimension.TIME, ("s", "sec", "second", "seconds")),
    Unit("min", Dimension.TIME, ("min", "minute", "minutes"), 60),
    Unit("h", Dimension.TIME, ("h", "hr", "hour", "hours"), 3600),
    Unit("d", Dimension.TIME, ("d", "day", "days"), 86400),
)
_OTHERS = (
    Unit("ms", Dimension.TIME, ("ms",), 1, 1000),
    Unit("Pa", Dimension.PRESSURE, ("Pa",)),
    Unit("hPa", Dimension.PRESSURE, ("hPa",), 100),
    Unit("kPa", Dimension.PRESSURE, ("kPa",), 1000),
    Unit("mTorr", Dimension.PRESSURE, ("mTorr", "mtorr"), 101325, 760_000),
    Unit("Torr", Dimension.PRESSURE, ("Torr", "torr"), 101325, 760),
    Unit("µbar", Dimension.PRESSURE, ("ubar",), 1, 10),
    Unit("mbar", Dimension.PRESSURE, ("mbar",), 100),
    Unit("bar", Dimension.PRESSURE, ("bar",), 1e5),
    Unit("atm", Dimension.PRESSURE, ("atm",), 101325),
    Unit("sccm", Dimension.FLOW, ("sccm",)),
    Unit("slm", Dimension.FLOW, ("slm", "slpm"), 1000),
    Unit("°C", Dimension.TEMPERATURE, ("degC", "°C", "C", "deg C"), offset=273.15),
    Unit("K", Dimension.TEMPERATURE, ("K",)),
    Unit("K", Dimension.TEMPERATURE_DIFFERENCE, ("K", "degC", "°C", "C", "deg C")),
    Unit("%", Dimension.PERCENT, ("%", "percent"), 1, 100),
    Unit("wt%", Dimension.MASS_FRACTION, ("wt%", "wt.%", "mass%"), 1, 100),
    Unit("vol%", Dimension.VOLUME_FRACTION, ("vol%", "vol.%"), 1, 100),
    Unit("ppm", Dimension.VOLUME_FRACTION, ("ppm",), 1, 1e6),
    Unit("at%", Dimension.ATOMIC_FRACTION, ("at%", "at.%"), 1, 100),
    Unit("mol/L", Dimension.CONCENTRATION, ("mol/L", "mol/l", "M")),
    Unit("mmol/L", Dimension.CONCENTRATION, ("mmol/L", "mmol/l", "mM"), 1, 1000),
    Unit("g/L", Dimension.MASS_CONCENTRATION, ("g/L", "g/l")),
    Unit("mg/L", Dimension.MASS_CONCENTRATION, ("mg/L", "mg/l"), 1, 1000),
    Unit("mg/m³", Dimension.MASS_CONCENTRATION, ("mg/m3",), 1, 1e6),
    Unit("mm²", Dimension.AREA, ("mm2",), 1, 100),
    Unit("cm²", Dimension.AREA, ("cm2",)),
    Unit("m²", Dimension.AREA, ("m2",), 1e4),
    Unit("mL", Dimension.VOLUME, ("mL", "ml")),
    Unit("L", Dimension.VOLUME, ("L", "l"), 1000),
    Unit("mg", Dimension.MASS, ("mg",), 1, 1000),
    Unit("g", Dimension.MASS, ("g",)),
    Unit("kg", Dimension.MASS, ("kg",), 1000),
    Unit("W", Dimension.POWER, ("W",)),
    Unit("kW", Dimension.POWER, ("kW",), 1000),
    Unit("mW/cm²", Dimension.POWER_DENSITY, ("mW/cm2",), 1, 1000),
    Unit("W/cm²", Dimension.POWER_DENSITY, ("W/cm2",)),
    Unit("mV", Dimension.VOLTAGE, ("mV",), 1, 1000),
    Unit("V", Dimension.VOLTAGE, ("V",)),
    Unit("kV", Dimension.VOLTAGE, ("kV",), 1000),
    Unit("Hz", Dimension.FREQUENCY, ("Hz",)),
    Unit("kHz", Dimension.FREQUENCY, ("kHz",), 1e3),
    Unit("MHz", Dimension.FREQUENCY, ("MHz",), 1e6),
    Unit("GHz", Dimension.FREQUENCY, ("GHz",), 1e9),
    Unit("rpm", Dimension.ROTATION, ("rpm",)),
    Unit("g/cm³", Dimension.DENSITY, ("g/cm3", "g/mL", "g/ml", "kg/L", "kg/l")),
    Unit("kg/m³", Dimension.DENSITY, ("kg/m3",), 1, 1000),
    Unit("g/mol", Dimension.MOLAR_MASS, ("g/mol",)),
    Unit("kg/mol", Dimension.MOLAR_MASS, ("kg/mol",), 1000),
    Unit("eV", Dimension.ENERGY, ("eV",)),
    Unit("meV", Dimension.ENERGY, ("meV",), 1, 1000),
    Unit("kJ/mol", Dimension.ENERGY, ("kJ/mol",), 1, _KJ_PER_MOL_PER_EV),
    Unit("kcal/mol", Dimension.ENERGY, ("kcal/mol",), 4.184, _KJ_PER_MOL_PER_EV),
    Unit("mJ/cm²", Dimension.DOSE, ("mJ/cm2",)),
    Unit("J/cm²", Dimension.DOSE, ("J/cm2",), 1000),
    Unit("MPa", Dimension.STRESS, ("MPa",)),
    Unit("GPa", Dimension.STRESS, ("GPa",), 1000),
)


def _rate(length: Unit, time: Unit) -> Unit:
    spellings = tuple(f"{over}/{under}" for over in length.spellings for under in time.spellings)
    divisor = length.divisor * time.factor
    return Unit(f"{length.symbol}/{time.symbol}", Dimension.RATE, spellings, length.factor, divisor)


def _rate_per_cycle(length: Unit) -> Unit:
    spellings = tuple(f"{over}/{under}" for over in length.spellings for under in ("cycle", "cycles"))
    dimension = Dimension.RATE_PER_CYCLE
    return Unit(f"{length.symbol}/cycle", dimension, spellings, length.factor, length.divisor)


_RATE_LENGTHS = tuple(length for length in _LENGTHS if length.symbol in {"Å", "nm", "µm", "mm", "mil"})

UNITS: tuple[Unit, ...] = (
    *_LENGTHS,
    *_TIMES,
    *_OTHERS,
    *(_rate(length, time) for length in _RATE_LENGTHS for time in _TIMES),
    *(_rate_per_cycle(length) for length in _RATE_LENGTHS[:3]),
)
"""Every unit; within a dimension no spelling stands for two."""

_BY_SPELLING: Mapping[Dimension, Mapping[str, Unit]] = {
    dimension: {
        spelling: unit for unit in UNITS if unit.dimension is dimension for spelling in unit.spellings
    }
    for dimension in Dimension
}

CANONICAL: Mapping[Dimension, Unit] = {
    unit.dimension: unit for unit in UNITS if unit.factor == unit.divisor and unit.offset == 0
}
"""The unit values are kept in; fractions are plain numbers and have none."""


def normal_spelling(text: str) -> str:
    """Return a unit as the table spells it: one micro sign, plain digits, single blanks, none around `/`."""
    # The ordinal sign is a common stand-in for the degree sign, and NFKC would make a letter of it.
    letters = unicodedata.normalize("NFKC", text.replace("º", "°"))
    letters = letters.replace("μ", "u").replace("^", "")
    letters = re.sub(r"\s*([/%])\s*", r"\1", letters.strip())
    return re.sub(r"\s+", " ", letters).replace("° C", "°C")


def find_unit(spelling: str, dimension: Dimension) -> Unit | None:
    """Return the unit of the dimension that is written so, or None."""
    units = _BY_SPELLING[dimension]
    return units.get(spelling) or units.get(normal_spelling(spelling))


def dimensions_of(spelling: str) -> list[Dimension]:
    """Return the dimensions in which a unit is written so, in the order of `Dimension`."""
    form = normal_spelling(spelling)
    return [dimension for dimension, units in _BY_SPELLING.items() if form in units]


def spellings_of(dimension: Dimension) -> list[str]:
    """Return every spelling of every unit of the dimension."""
    return list(_BY_SPELLING[dimension])


def unit_table_json() -> str:
    """
    Return the table as JSON for the browser, without characters special in HTML.

    `{"format": 1, "dimensions": {"length": {"canonical": "nm", "signed": false, "units":
    [{"symbol", "spellings", "factor", "divisor", "offset"}]}}}`; `canonical` is "" for fractions.
    """
    dimensions = {
        str(dimension): {
            "canonical": CANONICAL[dimension].symbol if dimension in CANONICAL else "",
            "signed": dimension in SIGNED,
            "units": [_unit_data(unit) for unit in UNITS if unit.dimension is dimension],
        }
        for dimension in Dimension
    }
    return json.dumps({"format": 1, "dimensions": dimensions}, ensure_ascii=True, separators=(",", ":"))


def _unit_data(unit: Unit) -> dict[str, str | float | list[str]]:
    return {
        "symbol": unit.symbol,
        "spellings": list(unit.spellings),
        "factor": unit.factor,
        "divisor": unit.divisor,
        "offset": unit.offset,
    }
