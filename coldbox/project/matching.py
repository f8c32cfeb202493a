"""Which things of a list are the same things in a later version of it, and whether two documents are the same."""

from __future__ import annotations

from collections.abc import Mapping
from difflib import SequenceMatcher
from typing import Any


def same(one: Any, other: Any) -> bool:
    """Whether two pieces of TOML data are written alike: true is not 1, 1 is not 1.0, the order of keys is nothing."""
    if isinstance(one, Mapping) and isinstance(other, Mapping):
        return one.keys() == other.keys() and all(same(one[key], other[key]) for key in one)
    if isinstance(one, list) and isinstance(other, list):
        return len(one) == len(other) and all(map(same, one, other))
    if isinstance(one, str) and isinstance(other, str):  # also of a class of its own
        return str(one) == str(other)
    return type(one) is type(other) and bool(one == other or repr(one) == repr(other) == "nan")


def matched(was: list[Any], now: list[Any]) -> list[tuple[int | None, int | None]]:
    """The items of two lists side by side, in the order of both: by content, else by name, else by place.

    result  pairs of indices; None on the left for what is new, on the right for what went
    """
    rows: list[tuple[int | None, int | None]] = []
    _match(
        list(range(len(was))), list(range(len(now))), (_contents(was), _names(was)), (_contents(now), _names(now)), rows
    )
    return rows


def _contents(items: list[Any]) -> list[str]:
    return [repr(sorted(item.items())) if isinstance(item, dict) else repr(item) for item in items]


def _names(items: list[Any]) -> list[str]:
    return [repr(item.get("name")) if isinstance(item, dict) else "" for item in items]


def _match(
    was: list[int],
    now: list[int],
    was_by: tuple[list[str], ...],
    now_by: tuple[list[str], ...],
    rows: list[tuple[int | None, int | None]],
) -> None:
    """Pair what agrees by the first measure; what lies between goes by the next one, at last by place."""
    if not was_by:
        both = min(len(was), len(now))
        rows += zip(was[:both], now[:both], strict=True)
        rows += [(old, None) for old in was[both:]]
        rows += [(None, new) for new in now[both:]]
        return
    olds, news = [was_by[0][index] for index in was], [now_by[0][index] for index in now]
    head = _common(olds, news)
    tail = _common(olds[head:][::-1], news[head:][::-1])  # nearly all of it, when one thing of many changed
    rows += zip(was[:head], now[:head], strict=True)
    finder = SequenceMatcher(None, olds[head : len(olds) - tail], news[head : len(news) - tail])
    for tag, a, b, c, d in finder.get_opcodes():
        old, new = was[head + a : head + b], now[head + c : head + d]
        if tag == "equal":
            rows += zip(old, new, strict=True)
        else:
            _match(old, new, was_by[1:], now_by[1:], rows)
    rows += zip(was[len(was) - tail :], now[len(now) - tail :], strict=True)


def _common(one: list[str], other: list[str]) -> int:
    """How many items the two begin with alike."""
    for index, (a, b) in enumerate(zip(one, other, strict=False)):
        if a != b:
            return index
    return min(len(one), len(other))
