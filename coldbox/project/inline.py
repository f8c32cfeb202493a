"""Lists and tables written within a value, `[a, b]` and `{ a = 1 }`: item by item, so that what stays is as typed."""

from __future__ import annotations

import re
from typing import Any, NamedTuple

from coldbox.project import render
from coldbox.project.layout import Layout
from coldbox.project.linemap import Key
from coldbox.project.matching import matched, same

_BEHIND = re.compile(r"[ \t]*#[^\n]*")
_BETWEEN = re.compile(r"(?:[ \t\r\n]|#[^\n]*)*")


class _Chunk(NamedTuple):
    """One item with what stands around it: blanks and comments before it, up to its comma, a comment behind that."""

    lead: str
    mid: str
    comma: bool
    behind: str


_Plan = list[tuple[int | None, str]]  # the items that shall be there: index among the old ones, text


def rebuilt(layout: Layout, path: Key, was: Any, now: Any) -> str:
    """The text of a value after a change in it.

    layout  of the text
    path    of the value, which stands there as `key = value` or as an item
    was     what it is
    now     what it shall be
    """
    _, start, end = layout.places.spots[path]
    if same(was, now):
        return layout.text[start:end]
    if isinstance(was, list) and isinstance(now, list) and was and now:
        return _list(layout, path, was, now)
    if isinstance(was, dict) and isinstance(now, dict) and was and now:
        return _table(layout, path, was, now)
    return render.literal(now)


def _list(layout: Layout, path: Key, was: list[Any], now: list[Any]) -> str:
    plan: _Plan = []
    for old, new in matched(was, now):
        if new is not None and old is not None:
            plan.append((old, rebuilt(layout, (*path, old), was[old], now[new])))
        elif new is not None:
            plan.append((None, render.literal(now[new])))
    return _sequence(layout, path, [(*path, index) for index in range(len(was))], plan)


def _table(layout: Layout, path: Key, was: dict[str, Any], now: dict[str, Any]) -> str:
    spots = [layout.places.spots[(*path, key)] for key in was]
    if len(set(spots)) < len(spots) or any(layout.text[spot[0] : spot[1]].count(".") for spot in spots):
        return render.literal(now)  # dotted keys, or quoted ones with dots: rare enough
    plan: _Plan = []
    at: list[str] = []
    for index, key in enumerate(was):
        if key in now:
            begin, start, _ = spots[index]
            at.append(key)
            plan.append((index, layout.text[begin:start] + rebuilt(layout, (*path, key), was[key], now[key])))
    rank = render.ranks(path)
    for key in render.in_order(path, (key for key in now if key not in was)):
        own = rank.get(key, len(rank))
        place = max((n + 1 for n, other in enumerate(at) if rank.get(other, len(rank)) <= own), default=0)
        at.insert(place, key)
        plan.insert(place, (None, f"{render.word(key)} = {render.literal(now[key])}"))
    return _sequence(layout, path, [(*path, key) for key in was], plan)


def _sequence(layout: Layout, path: Key, keys: list[Key], plan: _Plan) -> str:
    """The items of the plan between the brackets of the old text, each with what stood around it."""
    text = layout.text
    _, start, end = layout.places.spots[path]
    chunks, tail = _chunks(layout, start + 1, end - 1, keys)
    spread = next((chunk.lead for chunk in chunks if "\n" in chunk.lead), "")
    apart = "\n" + spread.rpartition("\n")[2] if spread else ""  # a new item's own line, indented as the others are
    out, behind, next_old = "", "", 0
    for number, (old, item) in enumerate(plan):
        kept = ""
        if old is None:
            lead = apart or (chunks[0].lead if number == 0 else " ")
            mid, comma, own_behind = "", chunks[-1].comma, ""
        else:
            kept = "".join(_comments(chunk) for chunk in chunks[next_old:old])
            lead, mid, comma, own_behind = chunks[old]
            next_old = old + 1
            if number == 0 and "\n" not in lead:
                lead = chunks[0].lead if "\n" not in chunks[0].lead else lead
            elif number and old == 0 and not lead:
                lead = " "
        if (behind or kept) and not lead.lstrip(" \t\r").startswith("\n"):
            lead = "\n" + (lead if "\n" not in lead else lead.lstrip(" "))
        last = number == len(plan) - 1
        out += kept + lead + item + mid + ("," if not last or (comma and chunks[-1].comma) else "") + own_behind
        behind = own_behind
    kept = "".join(_comments(chunk) for chunk in chunks[next_old:])
    if (behind or kept) and "\n" not in tail:
        tail = "\n" + tail.lstrip(" ")
    return text[start] + out + kept + tail + text[end - 1]


def _comments(gone: _Chunk) -> str:
    """The comments on lines of their own above an item that goes: they stay."""
    return gone.lead.rpartition("\n")[0].rstrip() if "#" in gone.lead else ""


def _chunks(layout: Layout, start: int, end: int, keys: list[Key]) -> tuple[list[_Chunk], str]:
    """What stands around each item between the brackets, and what is left before the closing one."""
    text, chunks, at = layout.text, [], start
    for key in keys:
        begin, _, stop = layout.places.spots[key]
        found = _BETWEEN.match(text, stop, end)
        after = stop if found is None else found.end()
        comma = after < end and text[after] == ","
        mid, after = (text[stop:after], after + 1) if comma else ("", stop)
        behind = _BEHIND.match(text, after, end)
        chunks.append(_Chunk(text[at:begin], mid, comma, behind[0].rstrip("\r") if behind else ""))
        at = after + len(chunks[-1].behind)
    return chunks, text[at:end]
