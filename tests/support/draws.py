"""Projects whose every number is an array of draws, as the spread of an answer asks for."""

from __future__ import annotations

from collections.abc import Mapping
from typing import Any

import numpy as np

from coldbox.record import Record


def drawn(thing: Any, count: int, share: float = 0.0, seed: int = 1) -> Any:
    """The same record with every float below it an array (count, 1), each varied evenly by +- `share` of itself.

    Records, tuples and mappings are walked; whole numbers, texts, schedules and rates stay as they are.
    """
    rng = np.random.default_rng(seed)

    def walk(one: Any) -> Any:
        if isinstance(one, float):
            return one * (1.0 + share * rng.uniform(-1.0, 1.0, (count, 1)))
        if isinstance(one, Record):
            return type(one)(**{name: value if name in _STEADY else walk(value) for name, value in one})
        if isinstance(one, Mapping):
            return {key: walk(value) for key, value in one.items()}
        if type(one) is tuple:
            return tuple(walk(value) for value in one)
        return one

    return walk(thing)


# What the model declares as plain floats: clock times, the wall clock itself.
_STEADY = {"clock", "at", "starts", "arrival_time", "defrost_at", "allowed_s", "origins", "spreads"}
