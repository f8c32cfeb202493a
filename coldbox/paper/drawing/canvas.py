"""A sheet of character cells, each with the name of a style; what lies outside is not drawn."""

from __future__ import annotations

import unicodedata
from typing import Final, NamedTuple

from coldbox.record import Record

_ASCII: Final = str.maketrans({
    "┌": "+", "┐": "+", "└": "+", "┘": "+", "├": "+", "┤": "+", "┬": "+", "┴": "+", "┼": "+", "─": "-", "│": "|",
    "┆": ":", "┄": "-", "░": ".", "▒": ":", "▓": "#", "█": "@", "²": "2", "³": "3", "°": "", "±": "+", "·": ".",
    "…": "~", "▁": "_", "▂": "_", "▃": "-", "▄": "-", "▅": "=", "▆": "=", "▇": "#", "→": ">", "▲": "^",
})  # fmt: skip


class Span(NamedTuple):
    """A stretch of text in one style."""

    text: str
    style: str


class Place(Record):
    """A rectangle of cells."""

    x: int
    y: int
    width: int
    height: int


class Canvas:
    """Cells of `width` by `height`. ascii_only: nothing but ASCII comes out of it."""

    def __init__(self, width: int, height: int, *, ascii_only: bool = False) -> None:
        self.width, self.height, self.ascii_only = max(width, 0), max(height, 0), ascii_only
        self._letters = [[" "] * self.width for _ in range(self.height)]
        self._styles = [["text"] * self.width for _ in range(self.height)]

    def text(self, x: int, y: int, text: str, style: str = "text", room: int | None = None) -> int:
        """Writes a text, cut off where its room ends; gives the column after it."""
        end = self.width if room is None else min(x + max(room, 0), self.width)
        for letter in cells(text, ascii_only=self.ascii_only):
            if x + len(letter) > end:
                break
            if 0 <= y < self.height and x >= 0:
                self._letters[y][x], self._styles[y][x] = letter[0], style
                if len(letter) == 2:  # a wide character: the cell after it stays empty
                    self._letters[y][x + 1], self._styles[y][x + 1] = "", style
            x += len(letter)
        return x

    def fill(self, x: int, y: int, width: int, height: int, character: str, style: str) -> None:
        """One character over a rectangle."""
        for row in range(y, y + height):
            self.text(x, row, character * max(width, 0), style)

    def frame(self, x: int, y: int, width: int, height: int, style: str = "line") -> None:
        """The outline of a rectangle; where outlines meet they join."""
        right, low = x + width - 1, y + height - 1
        for column in range(x + 1, right):
            self._line(column, y, "─", style)
            self._line(column, low, "─", style)
        for row in range(y + 1, low):
            self._line(x, row, "│", style)
            self._line(right, row, "│", style)
        for column, row, corner in ((x, y, "┌"), (right, y, "┐"), (x, low, "└"), (right, low, "┘")):
            self._line(column, row, corner, style)

    def _line(self, x: int, y: int, character: str, style: str) -> None:
        if not (0 <= x < self.width and 0 <= y < self.height):
            return
        there = self._letters[y][x]
        self._letters[y][x] = _BY_ARMS[_ARMS.get(there, 0) | _ARMS[character]]
        self._styles[y][x] = style

    def rows(self) -> list[list[Span]]:
        """Each row as stretches of one style."""
        made = []
        for letters, styles in zip(self._letters, self._styles, strict=True):
            row: list[Span] = []
            for letter, style in zip(letters, styles, strict=True):
                shown = (
                    letter.translate(_ASCII) or "." if self.ascii_only and letter and not letter.isascii() else letter
                )
                if row and row[-1].style == style:
                    row[-1] = Span(row[-1].text + shown, style)
                else:
                    row.append(Span(shown, style))
            made.append(row)
        return made

    def lines(self) -> list[str]:
        """The text alone."""
        return ["".join(span.text for span in row).rstrip() for row in self.rows()]


_UP, _RIGHT, _DOWN, _LEFT = 1, 2, 4, 8
_ARMS: Final = {
    "─": _LEFT | _RIGHT, "│": _UP | _DOWN, "┌": _RIGHT | _DOWN, "┐": _LEFT | _DOWN, "└": _UP | _RIGHT, "┘": _UP | _LEFT,
    "├": _UP | _RIGHT | _DOWN, "┤": _UP | _LEFT | _DOWN, "┬": _LEFT | _RIGHT | _DOWN, "┴": _UP | _LEFT | _RIGHT,
    "┼": _UP | _RIGHT | _DOWN | _LEFT,
}  # fmt: skip
_BY_ARMS: Final = {arms: character for character, arms in _ARMS.items()}


def cells(text: str, *, ascii_only: bool = False) -> list[str]:
    """A text as cells: a string of two for a wide character; what cannot be seen or would act is left out."""
    found: list[str] = []
    for letter in text:
        category = unicodedata.category(letter)
        if category in ("Cc", "Cf", "Cs", "Co", "Cn", "Zl", "Zp", "Mn", "Me"):
            continue
        if ascii_only and not letter.isascii():
            plain = letter.translate(_ASCII)
            if not plain.isascii():
                plain = unicodedata.normalize("NFKD", letter).encode("ascii", "ignore").decode() or "?"
            found += list(plain)
            continue
        found.append(letter * 2 if unicodedata.east_asian_width(letter) in "WF" else letter)
    return found


def width(text: str, *, ascii_only: bool = False) -> int:
    """How many cells a text takes."""
    return sum(len(cell) for cell in cells(text, ascii_only=ascii_only))
