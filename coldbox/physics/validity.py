"""One question asked everywhere: does a value lie where the method was published for?"""

from __future__ import annotations

from coldbox.errors import OutOfValidity
from coldbox.physics.number import Number


def within(value: Number, low: float, high: float, *, quantity: str, unit: str, method: str) -> None:
    """Refuse a value outside low..high, or nan.

    low <= value <= high

    value: any shape; unit: the one it, `low` and `high` are in, as shown. quantity, method: words for the message.
    Result: none. Raises OutOfValidity with the worst value.
    Source: none, this is no formula.
    """
    if isinstance(value, float | int):
        lowest = highest = value
    else:
        # The array's own methods: on small arrays the functions of numpy take three times as long.
        lowest, highest = float(value.min()), float(value.max())
    if not (lowest >= low and highest <= high):
        raise OutOfValidity(quantity, highest if lowest >= low else lowest, low, high, unit, method)
