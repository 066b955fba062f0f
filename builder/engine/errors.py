"""What the engine raises when it is asked outside its validity."""

from __future__ import annotations


class DomainError(ValueError):
    """
    A value lies outside the range a formula is valid for.

    Carries the variable, the value and what is allowed, so that a page can say why there is no number.
    """

    def __init__(self, variable: str, value: object, allowed: str) -> None:
        super().__init__(f"{variable} = {value!r} is outside {allowed}")
        self.variable = variable
        self.value = value
        self.allowed = allowed
