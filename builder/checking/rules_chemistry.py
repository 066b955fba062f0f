"""Rules for chemicals and etchants: parts that are stated and add up."""

from __future__ import annotations

from collections.abc import Iterator

from builder.checking.rule import Checked, Fault, Rule
from builder.records.chemicals import Chemical
from builder.records.etchants import Etchant
from builder.records.quantities import Dimension, Quantity, parse_quantity
from builder.records.record import Part

_SHARES = (
    Dimension.MASS_FRACTION,
    Dimension.VOLUME_FRACTION,
    Dimension.ATOMIC_FRACTION,
    Dimension.PERCENT,
)
_ROUNDING = 0.005
"""Parts given to a tenth of a percent may miss 100 % by this."""


def _mixtures(checked: Checked) -> Iterator[Chemical | Etchant]:
    yield from checked.records.chemicals.values()
    yield from checked.records.etchants.values()


def _parts_sum(checked: Checked) -> Iterator[Fault]:
    for record in _mixtures(checked):
        shares = [_share(part) for part in record.parts]
        known = [share for share in shares if share is not None]
        if not known:
            continue
        low = sum(lowest for lowest, _ in known)
        high = sum(highest for _, highest in known)
        is_whole = len(known) == len(shares)
        if low > 1 + _ROUNDING or (is_whole and high < 1 - _ROUNDING):
            words = f"the parts add up to {_percent(low, high)}, not to 100 %"
            hint = "" if low > 1 else 'write "rest" for the part that fills up'
            yield Fault(record.file, "/parts", words, hint)


def _share(part: Part) -> tuple[float, float] | None:
    """Return lowest and highest share of a part stated as a percentage, else None."""
    for dimension in _SHARES:
        quantity = parse_quantity(part.amount, dimension)
        if isinstance(quantity, Quantity):
            value = quantity.value
            low = quantity.low if value is None else value
            high = quantity.high if value is None else value
            return (0.0 if low is None else low), (1.0 if high is None else high)
    return None


def _percent(low: float, high: float) -> str:
    ends = (f"{100 * low:.4g}", f"{100 * high:.4g}")
    return f"{ends[0]} %" if ends[0] == ends[1] else f"{ends[0]} to {ends[1]} %"


def _no_parts(checked: Checked) -> Iterator[Fault]:
    for etchant in checked.records.etchants.values():
        if not etchant.parts and etchant.parts_unknown is None and "parts" not in etchant.pending:
            hint = 'name the parts, or write what the source prints into "parts_unknown"'
            yield Fault(etchant.file, "", "nothing is said of what it is made of", hint)


def _own_parts(checked: Checked) -> Iterator[Fault]:
    chemicals = checked.records.chemicals
    for chemical in chemicals.values():
        for index, part in enumerate(chemical.parts):
            if part.chemical == chemical.id:
                words = "a solution cannot be a part of itself"
                yield Fault(chemical.file, f"/parts/{index}/chemical", words)


RULES: tuple[Rule, ...] = (
    Rule("parts-sum", _parts_sum),
    Rule("no-parts", _no_parts),
    Rule("part-of-itself", _own_parts),
)
