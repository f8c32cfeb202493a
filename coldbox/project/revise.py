"""A project's text after its values changed: only what changed is written anew, the rest is the hand's and stays.

Comments, order, blank lines and the way values are typed stay. A line that goes takes the comment behind it along, a
table that goes also the comment directly above it. The outcome is read back; if it is not what it should be, the file
is written anew as a whole, without its comments.
"""

from __future__ import annotations

import re
import tomllib
from collections.abc import Mapping
from typing import Any

from coldbox.project import render
from coldbox.project.inline import rebuilt
from coldbox.project.layout import Layout, Pair, Section
from coldbox.project.linemap import Key
from coldbox.project.matching import matched, same
from coldbox.record import Record

_BESIDE = re.compile(r"( {2,})#")
_PAIR, _BLOCK, _OVER = 0, 1, 2  # what comes first of edits at one place: new lines, new tables, what is replaced


class Revised(Record):
    """The new text, and whether the comments of the old one are still in it."""

    text: str
    kept_comments: bool


def revised(text: str, before: Mapping[str, Any], after: Mapping[str, Any]) -> Revised:
    """The text of a project after some of its values changed.

    text     the file as it stands
    before   what `tomllib` made of it; should the text say something else, that counts
    after    what `tomllib` shall make of the result
    result   the text, and whether comments were kept; they are lost only where the text is no TOML, or in forms that
             no project needs, such as a table spread over dotted keys of several tables
    example  revised('a = 1  # one\\n', {"a": 1}, {"a": 2}) has the text 'a = 2  # one\\n'
    """
    there = before if _reads_as(text, before) else _document(text)
    if there is not None and same(there, after):
        return Revised(text=text, kept_comments=True)
    if there is not None and text.strip():
        attempt = _Revision(text, there, after).text()
        if _reads_as(attempt, after):
            return Revised(text=attempt, kept_comments=True)
    whole = render.document(after)
    if "\r\n" in text:
        whole = whole.replace("\n", "\r\n")
    return Revised(text=whole, kept_comments="#" not in text)


def _document(text: str) -> dict[str, Any] | None:
    try:
        return tomllib.loads(text)
    except (ValueError, RecursionError):
        return None


def _reads_as(text: str, document: Mapping[str, Any]) -> bool:
    found = _document(text)
    return found is not None and same(found, document)


class _Revision:
    """The edits of one text: (from, to, what comes first, new text), put in at the end."""

    __slots__ = ("edits", "headless", "layout")

    def __init__(self, text: str, before: Mapping[str, Any], after: Mapping[str, Any]) -> None:
        self.layout = Layout(text)
        self.edits: list[tuple[int, int, int, str]] = []
        self.headless: dict[Key, str] = {}  # new pairs of tables that have no header yet
        self.table((), before, after)
        for path, pairs in self.headless.items():
            sections = self.layout.below(path)
            at = sections[0].lead if sections else len(text)
            self.add(at, _BLOCK, f"[{render.header(path)}]\n{pairs}")

    def text(self) -> str:
        """The text with all edits in it."""
        layout, old, done, new = self.layout, self.layout.text, 0, ""
        newline = layout.newline
        airy = len(layout.sections) < 3 or any(self.blank_above(one) for one in layout.sections[1:])
        for start, end, rank, put in sorted(self.edits, key=lambda edit: (edit[0], edit[2])):
            new += old[done:start]
            done = max(done, end)
            if rank == _OVER:
                new += put
                continue
            if new and not new.endswith("\n"):
                new += newline
            if rank == _BLOCK and airy and new and not new.endswith(newline * 2):
                new += newline
            new += put.replace("\n", newline)
            rest = old[done:].lstrip(" \t")
            if rank == _BLOCK and airy and rest and not rest.startswith(("\n", "\r")):
                new += newline
        if done == len(old) and new.endswith(newline * 2):
            new = new.rstrip("\r\n") + newline  # the last table went
        return new + old[done:]

    def blank_above(self, section: Section) -> bool:
        above = self.layout.text[self.layout.line_start(section.lead - 1) : section.lead] if section.lead else ""
        return bool(above) and not above.strip()

    def add(self, at: int, rank: int, put: str) -> None:
        self.edits.append((at, at, rank, put))

    # What changed

    def table(self, path: Key, was: Mapping[str, Any], now: Mapping[str, Any]) -> None:
        """A table that stands on lines of its own."""
        for key in was:
            if key not in now:
                self.cut((*path, key))
        for key in was:
            if key in now and not same(was[key], now[key]):
                self.change((*path, key), was[key], now[key])
        for key in render.in_order(path, (key for key in now if key not in was)):
            self.put_in(path, key, now[key])
        if path and was and not now and self.layout.section(path) is None:
            self.headless[path] = ""

    def change(self, path: Key, was: Any, now: Any) -> None:
        pair = next((pair for pair in self.layout.pairs(path) if pair.path == path), None)
        if pair is not None:
            self.replace(pair, rebuilt(self.layout, path, was, now))
        elif isinstance(was, dict) and isinstance(now, dict):
            self.table(path, was, now)
        elif isinstance(was, list) and isinstance(now, list) and now and all(isinstance(item, dict) for item in now):
            self.things(path, was, now)
        else:
            self.cut(path)
            self.put_in(path[:-1], str(path[-1]), now)

    def things(self, path: Key, was: list[Any], now: list[Any]) -> None:
        """A list of tables, each under a header of its own."""
        rows = matched(was, now)
        for old, new in rows:
            if new is None and old is not None:
                self.cut((*path, old))
        left = [old for old, new in rows if new is None]
        at = self.layout.below((*path, 0))[0].lead
        for old, new in rows:
            if new is None:
                continue
            if old is not None:
                self.table((*path, old), was[old], now[new])
                at = max(section.body for section in self.layout.below((*path, old)))
                continue
            moved = next((one for one in left if one is not None and same(was[one], now[new])), None)
            if moved is None:
                for block in render.blocks(path, [now[new]]):
                    self.add(at, _BLOCK, block)
            else:  # it was only put elsewhere, and goes with all that is written in it
                left.remove(moved)
                for section in self.layout.below((*path, moved)):
                    self.add(at, _BLOCK, self.layout.text[section.lead : section.body].replace("\r\n", "\n"))

    # How it is written

    def cut(self, path: Key) -> None:
        """Take away every line that says something of a path."""
        for pair in self.layout.pairs(path):
            self.edits.append((pair.line, pair.after, _OVER, ""))
        for section in self.layout.below(path):
            self.edits.append((section.lead, self.layout.blank_until(section.body), _OVER, ""))

    def replace(self, pair: Pair, put: str) -> None:
        """Another value; a comment behind it stays in its column where there is room."""
        old = self.layout.text[pair.start : pair.end]
        put = put.replace("\r\n", "\n").replace("\n", self.layout.newline)
        beside = _BESIDE.match(self.layout.text, pair.end)
        end = pair.end
        if beside and "\n" not in old and "\n" not in put:
            end = beside.end(1)
            put += " " * max(1, len(old) + end - pair.end - len(put))
        self.edits.append((pair.start, end, _OVER, put))

    def put_in(self, parent: Key, key: str, value: Any) -> None:
        """A key that was not there."""
        path = (*parent, key)
        home = self.layout.section(parent)
        in_line = bool(parent) and isinstance(value, dict) and home is not None and self.lists_in_line(home)
        dotted = [pair for pair in self.layout.pairs(parent) if len(self.layout.owner(pair).path) < len(parent)]
        if home is None and dotted:
            last = dotted[-1]
            words = path[len(self.layout.owner(last).path) :]
            self.add(last.after, _PAIR, f"{render.header(words)} = {render.literal(value)}\n")
        elif not in_line and render.stands_alone(path, value):
            at = self.place_for_blocks(parent, key)
            for block in render.blocks(path, value):
                self.add(at, _BLOCK, block)
        elif home is None:
            pairs = self.headless.get(parent, "")
            self.headless[parent] = f"{pairs}{render.word(key)} = {render.literal(value)}\n"
        else:
            self.put_pair(home, parent, key, value)

    def lists_in_line(self, home: Section) -> bool:
        """Whether the tables in a table stand as `front = { … }`."""
        return any(self.layout.text.startswith("{", pair.start) for pair in home.pairs)

    def put_pair(self, home: Section, parent: Key, key: str, value: Any) -> None:
        rank = render.ranks(parent)
        own = rank.get(key, len(rank))
        before = [pair for pair in home.pairs if rank.get(str(pair.path[len(parent)]), len(rank)) <= own]
        if before:
            at, beside = before[-1].after, before[-1]
        elif home.pairs:
            at, beside = home.pairs[0].line, home.pairs[0]
        else:
            sections = self.layout.sections
            at = home.after if parent else sections[1].lead if len(sections) > 1 else len(self.layout.text)
            beside = None
        indent = "" if beside is None else self.layout.text[beside.line : beside.begin]
        self.add(at, _PAIR, f"{indent}{render.word(key)} = {render.literal(value)}\n")

    def place_for_blocks(self, parent: Key, key: str) -> int:
        """After the tables that come before it in the order of the key list."""
        if parent:
            sections = self.layout.below(parent)
            return max(section.body for section in sections) if sections else len(self.layout.text)
        rank = render.ranks(())
        own = rank.get(key, len(rank))
        known = [(rank.get(str(one.path[0]), len(rank)), one) for one in self.layout.sections[1:]]
        before = [(at, one) for at, one in known if at <= own]
        if before:
            nearest = max(at for at, _ in before)
            return max(one.body for at, one in before if at == nearest)
        return known[0][1].lead if known else len(self.layout.text)
