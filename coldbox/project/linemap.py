"""Where each key of a TOML text stands. `tomllib` reads the values and tells no places; this tells places only.

It is made for texts that `tomllib` accepts, and stops quietly at the first thing it does not understand. Keys are
paths as in the parsed document: ("doors", 1, "width"), ("outage", "events", 0, "at"), indices from 0.
"""

from __future__ import annotations

from bisect import bisect_right

Key = tuple[str | int, ...]
Spot = tuple[int, int, int]
"""Offsets into the text: of the key (of a list item: of the item), of its value, and of the value's end. Of a table the
value is its header."""

_BLANK = " \t\r"
_ESCAPES = {"b": "\b", "t": "\t", "n": "\n", "f": "\f", "r": "\r", "e": "\x1b", '"': '"', "\\": "\\"}
_HEX = {"x": 2, "u": 4, "U": 8}


DOTS = 40  # in one key; the format needs three


def refuse_deep_keys(text: str) -> None:
    """Raise RecursionError for a key of more than `DOTS` parts: `tomllib` takes their number squared, and hours."""
    for row in text.split("\n"):
        if row.count(".") <= DOTS:
            continue
        run = 0
        for part in row.split("."):
            word = part.strip(" \t[]{\"'").replace("-", "_")
            run = run + 1 if word and word.replace("_", "a").isalnum() else 0
            if run > DOTS:
                raise RecursionError


class LineMap:
    """The places of one text, found on the first question.

    text    a TOML document
    valid   any text; of a broken one, what stands before the break
    """

    __slots__ = ("_spots", "_starts", "text")

    def __init__(self, text: str) -> None:
        self.text = text
        self._spots: dict[Key, Spot] | None = None
        self._starts: list[int] = []

    @property
    def spots(self) -> dict[Key, Spot]:
        """Every key with its spot, in the order of the text."""
        if self._spots is None:
            scan = _Scan(self.text)
            scan.document()
            self._spots = scan.spots
        return self._spots

    def line(self, key: Key) -> int | None:
        """The line, from 1, where the key stands; of a key that is not there, of the nearest table around it."""
        spot = self._around(key)
        return None if spot is None else self.line_at(spot[0])

    def line_at(self, offset: int) -> int:
        """The line, from 1, that an offset into the text lies in."""
        if not self._starts:
            start = 0
            for row in self.text.split("\n"):
                self._starts.append(start)
                start += len(row) + 1
        return bisect_right(self._starts, offset)

    def source(self, key: Key) -> str | None:
        """The value as it is typed, quotes and all; None for a key that is not there."""
        spot = self.spots.get(key)
        return None if spot is None else self.text[spot[1] : spot[2]]

    def _around(self, key: Key) -> Spot | None:
        while key:
            spot = self.spots.get(key)
            if spot is not None:
                return spot
            key = key[:-1]
        return None


class _Broken(Exception):
    """The text is no TOML from here on."""


class _Scan:
    """One pass over a text."""

    __slots__ = ("arrays", "base", "pos", "spots", "text")

    def __init__(self, text: str) -> None:
        self.text = text
        self.pos = 0
        self.spots: dict[Key, Spot] = {}
        self.arrays: dict[Key, int] = {}  # by the path of an array of tables, how many blocks it has so far
        self.base: Key = ()

    def document(self) -> None:
        text = self.text
        if text.startswith("\ufeff"):
            self.pos = 1
        try:
            while True:
                self.space()
                if self.pos >= len(text):
                    return
                if text[self.pos] == "[":
                    self.header()
                else:
                    self.pair(self.base)
        except (_Broken, RecursionError):
            return

    def space(self) -> None:
        """Past blanks, line ends and comments."""
        text, pos, size = self.text, self.pos, len(self.text)
        while pos < size:
            char = text[pos]
            if char == "#":
                pos = text.find("\n", pos)
                if pos < 0:
                    pos = size
            elif char == "\n" or char in _BLANK:
                pos += 1
            else:
                break
        self.pos = pos

    def blank(self) -> str:
        """Past blanks in the line; the next character, or "" at the end."""
        text, pos, size = self.text, self.pos, len(self.text)
        while pos < size and text[pos] in _BLANK:
            pos += 1
        self.pos = pos
        return text[pos] if pos < size else ""

    def header(self) -> None:
        """`[a.b]` or `[[a.b]]`: the table that the next keys belong to."""
        begin = self.pos
        brackets = 2 if self.text.startswith("[[", begin) else 1
        self.pos += brackets
        parts = self.key()
        if not self.text.startswith("]" * brackets, self.pos):
            raise _Broken
        self.pos += brackets
        spot = (begin, begin, self.pos)
        path: Key = ()
        for part in parts[:-1]:
            path = (*path, part)
            self.spots.setdefault(path, spot)
            if path in self.arrays:
                path = (*path, self.arrays[path] - 1)
        path = (*path, parts[-1])
        if brackets == 2:
            count = self.arrays.get(path, 0)
            self.arrays[path] = count + 1
            self.spots.setdefault(path, spot)
            path = (*path, count)
        self.spots[path] = spot
        self.base = path

    def pair(self, base: Key) -> None:
        """`a.b = value`."""
        begin, text = self.pos, self.text
        equals = text.find("=", begin)
        word = text[begin:equals].rstrip(_BLANK)
        if equals > 0 and word.isidentifier() and word.isascii():  # nearly every key; the others take the long way
            dotted = [(*base, word)]
        else:
            path = base
            dotted = [path := (*path, part) for part in self.key()]
            equals = self.pos
            if not text.startswith("=", equals):
                raise _Broken
        self.pos = equals + 1
        self.blank()
        start = self.pos
        self.value(dotted[-1])
        spot = (begin, start, self.pos)
        for around in dotted[:-1]:
            self.spots.setdefault(around, spot)
        self.spots[dotted[-1]] = spot

    def key(self) -> list[str]:
        """A dotted key, and the blanks after it."""
        text = self.text
        parts = []
        while True:
            char = self.blank()
            start = self.pos
            if char == '"':
                self.string()
                parts.append(_unescaped(text[start + 1 : self.pos - 1]))
            elif char == "'":
                self.string()
                parts.append(text[start + 1 : self.pos - 1])
            else:
                pos, size = start, len(text)
                while pos < size and (text[pos].isalnum() or text[pos] in "_-"):
                    pos += 1
                if pos == start:
                    raise _Broken
                parts.append(text[start:pos])
                self.pos = pos
            if self.blank() != ".":
                return parts
            self.pos += 1

    def value(self, path: Key) -> None:
        """Past one value; what is inside it is written down with `path` before it."""
        text = self.text
        char = text[self.pos : self.pos + 1]
        if char in ('"', "'"):
            self.string()
        elif char == "[":
            self.pos += 1
            index = 0
            self.space()
            while text[self.pos : self.pos + 1] != "]":
                start = self.pos
                self.value((*path, index))
                self.spots[(*path, index)] = (start, start, self.pos)
                index += 1
                self.comma("]")
            self.pos += 1
        elif char == "{":
            self.pos += 1
            self.space()
            while text[self.pos : self.pos + 1] != "}":
                self.pair(path)
                self.comma("}")
            self.pos += 1
        else:
            self.bare()

    def comma(self, closing: str) -> None:
        """Past the comma between two items, or up to the closing bracket."""
        self.space()
        char = self.text[self.pos : self.pos + 1]
        if char == ",":
            self.pos += 1
            self.space()
        elif char != closing:
            raise _Broken

    def bare(self) -> None:
        """Past a number, date or word: up to what can follow it, less the blanks."""
        text, pos, size = self.text, self.pos, len(self.text)
        start = pos
        while pos < size and text[pos] not in ",]}#\n":
            pos += 1
        while pos > start and text[pos - 1] in _BLANK:
            pos -= 1
        if pos == start:
            raise _Broken
        self.pos = pos

    def string(self) -> None:
        """Past a string of any of the four forms."""
        text, pos = self.text, self.pos
        quote = text[pos]
        found = text.find(quote, pos + 1)
        if found > pos + 1 and text.find("\\", pos, found) < 0:  # nearly every string
            self.pos = found + 1
            return
        many = text.startswith(quote * 3, pos)
        closing = quote * 3 if many else quote
        pos += len(closing)
        while True:
            found = text.find(closing, pos)
            if found < 0:
                raise _Broken
            slash = text.find("\\", pos, found) if quote == '"' else -1
            if slash < 0:
                break
            pos = slash + 2
        self.pos = found + len(closing)
        if many:  # up to two quotes may stand right before the closing three
            for _ in range(2):
                if text.startswith(quote, self.pos):
                    self.pos += 1


def _unescaped(inside: str) -> str:
    """What a basic string of one line means."""
    if "\\" not in inside:
        return inside
    out = []
    pos = 0
    while True:
        slash = inside.find("\\", pos)
        if slash < 0:
            out.append(inside[pos:])
            return "".join(out)
        out.append(inside[pos:slash])
        letter = inside[slash + 1 : slash + 2]
        digits = _HEX.get(letter, 0)
        if digits:
            try:
                out.append(chr(int(inside[slash + 2 : slash + 2 + digits], 16)))
            except (ValueError, OverflowError):
                raise _Broken from None
        elif letter in _ESCAPES:
            out.append(_ESCAPES[letter])
        else:
            raise _Broken
        pos = slash + 2 + digits
