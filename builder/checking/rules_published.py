"""Rules for published rates: number and kind agree, zero is never a rate, what is recalled is unchecked."""

from __future__ import annotations

from collections.abc import Iterator

from builder.checking.rule import Checked, Fault, Rule
from builder.records.published import PublishedRate
from builder.records.quantities import Form
from builder.records.terms import PublishedRank, RateKind, Trust

_FORMS = {
    RateKind.RATE: Form.VALUE,
    RateKind.RANGE: Form.RANGE,
    RateKind.UPPER_LIMIT: Form.BELOW,
    RateKind.LOWER_LIMIT: Form.ABOVE,
    RateKind.NONE_SEEN: Form.VALUE,
}
_EXAMPLES = {
    RateKind.RATE: "120 nm/min",
    RateKind.RANGE: "100 - 140 nm/min",
    RateKind.UPPER_LIMIT: "< 5 nm/min",
    RateKind.LOWER_LIMIT: "> 5 nm/min",
    RateKind.NONE_SEEN: "0 nm/min",
}


def _rates(checked: Checked) -> Iterator[PublishedRate]:
    for rates in checked.records.rates.values():
        yield from rates


def _kinds(checked: Checked) -> Iterator[Fault]:
    for rate in _rates(checked):
        is_zero = rate.rate.value == 0
        if rate.rate.form is not _FORMS[rate.kind] or (rate.kind is RateKind.NONE_SEEN and not is_zero):
            words = f'"{rate.rate.text}" is no number of the kind {rate.kind}'
            yield Fault(rate.file, f"{rate.pointer}/rate", words, f'for example "{_EXAMPLES[rate.kind]}"')


def _zeros(checked: Checked) -> Iterator[Fault]:
    """A zero that counted as a rate would call a film safe for ever."""
    for rate in _rates(checked):
        if rate.kind is not RateKind.NONE_SEEN and 0 in (rate.rate.value, rate.rate.low):
            words = f'"{rate.rate.text}": a rate of zero means only that none was seen'
            hint = 'use the kind "none_seen", or "upper_limit" with the largest rate it may have'
            yield Fault(rate.file, f"{rate.pointer}/rate", words, hint)


def _recalled(checked: Checked) -> Iterator[Fault]:
    for rate in _rates(checked):
        if rate.rank is PublishedRank.LITERATURE and rate.trust is Trust.RECALLED:
            words = "a recalled rate cannot have the rank literature"
            yield Fault(rate.file, f"{rate.pointer}/rank", words, 'set "rank: unchecked"')


RULES: tuple[Rule, ...] = (
    Rule("rate-of-other-kind", _kinds),
    Rule("zero-rate", _zeros),
    Rule("recalled-as-literature", _recalled),
)
