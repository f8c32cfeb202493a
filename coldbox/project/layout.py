"""How a TOML text is laid out: its tables with the lines that belong to each, and the pairs in them."""

from __future__ import annotations

from typing import NamedTuple

from coldbox.project.linemap import Key, LineMap


class Pair(NamedTuple):
    """`key = value` on lines of its own: offsets of the key, of the value and of its end, and of the lines."""

    path: Key
    begin: int
    start: int
    end: int
    line: int
    after: int


class Section(NamedTuple):
    """A header and what stands below it; the top of the file is one too, with the path ().

    `lead` is where the comment directly above the header begins, `after` the line after the header, `body` the line
    after the last content, comments that follow it without a blank line included.
    """

    path: Key
    lead: int
    after: int
    body: int
    pairs: list[Pair]


class Layout:
    """The sections of one text.

    text    a TOML document that `tomllib` accepts
    """

    __slots__ = ("newline", "places", "sections", "text")

    def __init__(self, text: str) -> None:
        self.text = text
        self.newline = "\r\n" if "\r\n" in text else "\n"
        self.places = LineMap(text)
        self.sections = self._sections()

    def section(self, path: Key) -> Section | None:
        """The section with exactly this header."""
        return next((one for one in self.sections if one.path == path), None)

    def below(self, path: Key) -> list[Section]:
        """The sections whose headers begin with a path, in the order of the text."""
        size = len(path)
        return [one for one in self.sections if one.path[:size] == path and (one.path or not path)]

    def pairs(self, path: Key) -> list[Pair]:
        """The pairs whose keys begin with a path, in the order of the text."""
        size = len(path)
        return [pair for one in self.sections for pair in one.pairs if pair.path[:size] == path]

    def owner(self, pair: Pair) -> Section:
        """The section that a pair stands in."""
        return next(one for one in self.sections if pair in one.pairs)

    def line_start(self, offset: int) -> int:
        return self.text.rfind("\n", 0, offset) + 1

    def line_after(self, offset: int) -> int:
        found = self.text.find("\n", offset)
        return len(self.text) if found < 0 else found + 1

    def blank_until(self, offset: int) -> int:
        """The line after the blank lines that begin at a line."""
        while offset < len(self.text):
            after = self.line_after(offset)
            if self.text[offset:after].strip():
                break
            offset = after
        return offset

    def _sections(self) -> list[Section]:
        sections = [Section((), 0, 0, 0, [])]
        done = 0
        inorder = sorted(self.places.spots.items(), key=lambda item: (item[1][0], -item[1][2], -len(item[0])))
        for path, (begin, start, end) in inorder:
            if begin < done:
                continue  # inside a value, or another name for the same place
            after = self.line_after(end)
            if begin == start:
                lead = self._lead(begin, sections[-1])
                sections[-1] = self._closed(sections[-1], lead)
                sections.append(Section(path, lead, after, after, []))
            else:
                sections[-1].pairs.append(Pair(path, begin, start, end, self.line_start(begin), after))
            done = max(end, begin + 1)
        sections[-1] = self._closed(sections[-1], len(self.text))
        return sections

    def _lead(self, begin: int, before: Section) -> int:
        """Where the comment lines directly above a header begin."""
        floor = before.pairs[-1].after if before.pairs else before.after
        lead = self.line_start(begin)
        while lead > floor:
            above = self.line_start(lead - 1)
            if not self.text[above:lead].lstrip().startswith("#"):
                break
            lead = above
        return lead

    def _closed(self, section: Section, limit: int) -> Section:
        """The section with its `body` found; it ends at `limit` at the latest."""
        body = section.pairs[-1].after if section.pairs else section.after
        while body < limit and self.text[body : self.line_after(body)].lstrip().startswith("#"):
            body = self.line_after(body)
        return section._replace(body=min(body, limit))
