"""Checked plain data to frozen dataclasses, by the types of their fields; units are converted here, once."""

from __future__ import annotations

import dataclasses
import datetime
import enum
import functools
import types
import typing
from collections.abc import Callable, Iterator, Mapping, Sequence
from dataclasses import dataclass
from typing import Annotated, TypeAlias, TypeVar

from builder.records.quantities import Form, Quantity, parse_number, parse_quantity
from builder.records.unit_table import Dimension

Data: TypeAlias = Mapping[str, object]
"""One object of a file that has passed its schema."""

T = TypeVar("T")
_Convert: TypeAlias = Callable[[object], object]

ROOM_LOW_K = 291.15
ROOM_HIGH_K = 298.15
"""What "room" means as a temperature, 18 to 25 degC. Common practice, no source."""


@dataclass(frozen=True)
class Key:
    """Name of the field in the file, where Python reserves that word."""

    name: str


Length: TypeAlias = Annotated[Quantity, Dimension.LENGTH]
Time: TypeAlias = Annotated[Quantity, Dimension.TIME]
Temperature: TypeAlias = Annotated[Quantity, Dimension.TEMPERATURE]
Percent: TypeAlias = Annotated[Quantity, Dimension.PERCENT]
Density: TypeAlias = Annotated[Quantity, Dimension.DENSITY]
MolarMass: TypeAlias = Annotated[Quantity, Dimension.MOLAR_MASS]
Rate: TypeAlias = Annotated[Quantity, Dimension.RATE]
PublishedValue: TypeAlias = Annotated[Quantity, Dimension.RATE, Dimension.RATE_PER_CYCLE]
SETTING_DIMENSIONS = (
    Dimension.PRESSURE,
    Dimension.FLOW,
    Dimension.POWER,
    Dimension.POWER_DENSITY,
    Dimension.VOLTAGE,
    Dimension.TEMPERATURE,
    Dimension.TIME,
    Dimension.LENGTH,
    Dimension.PERCENT,
    Dimension.FREQUENCY,
    Dimension.ROTATION,
    Dimension.CONCENTRATION,
    Dimension.MASS_FRACTION,
    Dimension.VOLUME_FRACTION,
    Dimension.ATOMIC_FRACTION,
    Dimension.MASS_CONCENTRATION,
    Dimension.DOSE,
    Dimension.AREA,
    Dimension.VOLUME,
    Dimension.MASS,
    Dimension.STRESS,
    Dimension.RATE,
    Dimension.RATE_PER_CYCLE,
)
"""What a setting of a tool may measure; a unit that two of them share means the first."""
Setting: TypeAlias = Annotated[Quantity, SETTING_DIMENSIONS]


LATER = "later"
"""Marks a mapping whose values are made when they are asked for: most are never asked for."""


def from_data(cls: type[T], data: Data, **given: object) -> T:
    """
    Return the dataclass filled from data that has passed its schema; `given` fields are not in the file.

    What the file leaves out is the field's default: None, or empty. A failure here means that a
    schema and a dataclass differ, which the tests exclude.
    """
    fields: dict[str, object] = dict(given)
    for attribute, key, convert in _PLANS(cls):
        value = data.get(key)
        if value is not None and attribute not in fields:
            fields[attribute] = convert(value)
    return cls(**fields)


def field_keys(cls: type[object]) -> dict[str, str]:
    """Return the name in the file of each field of a record class, by attribute."""
    return {attribute: key for attribute, key, _ in _PLANS(cls)}


@functools.lru_cache(maxsize=8192)
def quantity_of(text: str, dimensions: tuple[Dimension, ...]) -> Quantity:
    """
    Return the quantity that a checked text states, in the first dimension that takes it.

    `room` is a temperature from 18 to 25 degC.

    Raises
    ------
    ValueError
        No dimension takes it: the text has not passed its schema.
    """
    if text == "room" and Dimension.TEMPERATURE in dimensions:
        return Quantity(text, Dimension.TEMPERATURE, "°C", Form.RANGE, low=ROOM_LOW_K, high=ROOM_HIGH_K)
    for dimension in dimensions:
        quantity = parse_quantity(text, dimension)
        if isinstance(quantity, Quantity):
            return quantity
    raise ValueError(f'"{text}" is no quantity of {" or ".join(dimensions)}')


def _fields_of(cls: type[object]) -> tuple[tuple[str, str, _Convert], ...]:
    hints = typing.get_type_hints(cls, include_extras=True)
    assert dataclasses.is_dataclass(cls)
    return tuple(
        (field.name, _key(hints[field.name], field.name), _converter(hints[field.name], ()))
        for field in dataclasses.fields(cls)
    )


_PLANS: Callable[[type[object]], tuple[tuple[str, str, _Convert], ...]] = functools.cache(
    _fields_of  # type: ignore[assignment]  # a class can be hashed, which its type does not say
)


def _key(hint: object, name: str) -> str:
    for extra in getattr(hint, "__metadata__", ()):
        if isinstance(extra, Key):
            return extra.name
    return name


def _converter(hint: object, dimensions: tuple[Dimension, ...]) -> _Convert:
    origin = typing.get_origin(hint)
    arguments = typing.get_args(hint)
    if origin is Annotated and LATER in arguments[1:]:
        values = typing.get_args(arguments[0])[1]
        return functools.partial(_Later, _converter(values, ()))
    if origin is Annotated:
        return _converter(arguments[0], dimensions + _dimensions(arguments[1:]))
    if origin in (typing.Union, types.UnionType):
        (inner,) = (argument for argument in arguments if argument is not type(None))
        return _converter(inner, dimensions)
    if origin is tuple:
        return functools.partial(_as_tuple, _converter(arguments[0], dimensions))
    if origin is Mapping:
        return functools.partial(_as_mapping, _converter(arguments[1], dimensions))
    return _plain_converter(hint, dimensions)


def _dimensions(extras: tuple[object, ...]) -> tuple[Dimension, ...]:
    found: tuple[Dimension, ...] = ()
    for extra in extras:
        if isinstance(extra, Dimension):
            found += (extra,)
        elif isinstance(extra, tuple):
            found += extra
    return found


def _plain_converter(hint: object, dimensions: tuple[Dimension, ...]) -> _Convert:
    assert isinstance(hint, type), hint
    if hint is Quantity:
        return lambda value: quantity_of(str(value), dimensions)
    if issubclass(hint, enum.Enum):
        return hint
    if hint is datetime.date:
        return lambda value: datetime.date.fromisoformat(str(value))
    if hint is float:
        return _number
    if dataclasses.is_dataclass(hint):
        return functools.partial(_as_record, hint)
    return lambda value: value


def _number(value: object) -> float:
    if isinstance(value, str):
        number = parse_number(value)
        assert isinstance(number, float), value
        return number
    assert isinstance(value, int | float)
    return float(value)


def _as_record(cls: type[object], value: object) -> object:
    assert isinstance(value, Mapping)
    return from_data(cls, value)


def _as_tuple(convert: _Convert, values: object) -> tuple[object, ...]:
    assert isinstance(values, Sequence)
    return tuple(convert(value) for value in values)


def _as_mapping(convert: _Convert, values: object) -> dict[str, object]:
    assert isinstance(values, Mapping)
    return {str(name): convert(value) for name, value in values.items()}


class _Later(Mapping[str, object]):
    """A mapping of data that makes each value at its first use."""

    def __init__(self, convert: _Convert, values: object) -> None:
        assert isinstance(values, Mapping)
        self._convert, self._values = convert, values
        self._made: dict[str, object] = {}

    def __getitem__(self, key: str) -> object:
        if key not in self._made:
            self._made[key] = self._convert(self._values[key])
        return self._made[key]

    def get(self, key: str, default: object = None) -> object:
        return self[key] if key in self._values else default

    def __iter__(self) -> Iterator[str]:
        return iter(self._values)

    def __len__(self) -> int:
        return len(self._values)

    def __contains__(self, key: object) -> bool:
        return key in self._values
