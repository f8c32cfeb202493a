"""A picture of the whole screen as cells: characters, and the name of the style each is shown in."""

from __future__ import annotations

import unicodedata
from collections.abc import Iterable, Sequence
from typing import NamedTuple, Protocol

from coldbox.tui import plain


class Span(Protocol):
    """A stretch of text in one style, as the drawings give it."""

    @property
    def text(self) -> str: ...
    @property
    def style(self) -> str: ...


class Run(NamedTuple):
    """A stretch of cells in one style."""

    text: str
    style: str


class Frame:
    """Cells of the screen. What does not fit is not drawn; nothing raises for being outside."""

    def __init__(self, width: int, height: int, *, ascii_drawing: bool = False, ascii_letters: bool = False) -> None:
        self.width = max(width, 1)
        self.height = max(height, 1)
        self.ascii_drawing = ascii_drawing or ascii_letters
        self.ascii_letters = ascii_letters
        self.cursor: tuple[int, int] | None = None  # where the terminal's own cursor stands, for those who follow it
        self._characters = [[" "] * self.width for _ in range(self.height)]
        self._styles = [["text"] * self.width for _ in range(self.height)]

    def text(self, x: int, y: int, text: str, style: str = "text", width: int | None = None) -> int:
        """Write a text into one line, cut off with a mark where it is longer than `width`; the next free column."""
        if not 0 <= y < self.height:
            return x
        end = self.width if width is None else min(x + width, self.width)
        characters, styles = self._characters[y], self._styles[y]
        shown = plain.cells(text, ascii_drawing=self.ascii_drawing, ascii_letters=self.ascii_letters)
        if len(shown) > max(end - x, 0) and end - x > 1:
            mark = "~" if self.ascii_drawing else "…"
            shown = [*shown[: end - x - 1], mark]
            if len(shown) > 1 and unicodedata.east_asian_width(shown[-2][:1] or "a") in "WF":
                shown[-2] = " "
        skip = max(-x, 0)  # what lies left of the screen
        shown = shown[skip : max(end - x, 0)]
        x += skip
        if shown:
            shown = shown if shown[0] else (" ", *shown[1:])  # half of a wide character
            characters[x : x + len(shown)] = shown
            styles[x : x + len(shown)] = [style] * len(shown)
        return x + len(shown)

    def right(self, x: int, y: int, text: str, style: str = "text") -> int:
        """Write a text so that it ends before column x; the column it begins in."""
        begin = x - len(plain.cells(text, ascii_drawing=self.ascii_drawing, ascii_letters=self.ascii_letters))
        self.text(begin, y, text, style)
        return begin

    def fill(self, x: int, y: int, width: int, height: int, style: str, character: str = " ") -> None:
        """One character and style over a rectangle."""
        cell = plain.cells(character, ascii_drawing=self.ascii_drawing, ascii_letters=self.ascii_letters)[0]
        left, right = max(x, 0), min(x + width, self.width)
        if right <= left:
            return
        for row in range(max(y, 0), min(y + height, self.height)):
            self._characters[row][left:right] = [cell] * (right - left)
            self._styles[row][left:right] = [style] * (right - left)

    def restyle(self, x: int, y: int, width: int, style: str) -> None:
        """Another style for a stretch of cells; their text stays."""
        left, right = max(x, 0), min(x + width, self.width)
        if 0 <= y < self.height and right > left:
            self._styles[y][left:right] = [style] * (right - left)

    def spans(self, x: int, y: int, spans: Iterable[Span], width: int | None = None) -> int:
        """Write stretches one after another into a line; the next free column."""
        end = self.width if width is None else min(x + width, self.width)
        for span in spans:
            if x >= end:
                break
            x = self.text(x, y, span.text, span.style, end - x)
        return x

    def paste(self, x: int, y: int, rows: Sequence[Sequence[Span]], width: int, height: int) -> None:
        """Lay a drawing down with its upper left corner at (x, y)."""
        for at, row in enumerate(rows[:height]):
            self.spans(x, y + at, row, width)

    def box(self, x: int, y: int, width: int, height: int, title: str = "", style: str = "line") -> None:
        """An empty rectangle with a line around it and a title in the line."""
        if width < 2 or height < 2:
            return
        self.fill(x, y, width, height, "text")
        self.text(x, y, "┌" + "─" * (width - 2) + "┐", style)
        for row in range(y + 1, y + height - 1):
            self.text(x, row, "│", style)
            self.text(x + width - 1, row, "│", style)
        self.text(x, y + height - 1, "└" + "─" * (width - 2) + "┘", style)
        if title:
            self.text(x + 2, y, f" {title} ", "title", width - 4)

    def rows(self) -> list[tuple[Run, ...]]:
        """Each line as stretches of one style; a row is equal to another when it looks the same."""
        return [_runs(characters, styles) for characters, styles in zip(self._characters, self._styles, strict=True)]

    def lines(self) -> list[str]:
        """The text alone, line by line, without blanks at the ends."""
        return ["".join(row).rstrip() for row in self._characters]


def _runs(characters: list[str], styles: list[str]) -> tuple[Run, ...]:
    runs = []
    begin = 0
    for at in range(1, len(styles) + 1):
        if at == len(styles) or styles[at] != styles[begin]:
            runs.append(Run("".join(characters[begin:at]), styles[begin]))
            begin = at
    return tuple(runs)


def wrapped(text: str, width: int) -> list[str]:
    """A text as lines of at most `width` cells, broken at blanks where there are any."""
    lines: list[str] = []
    for paragraph in text.split("\n"):
        line = ""
        for whole in paragraph.split():
            word = whole
            while plain.width(word) > width > 0:
                room = width - len(line) - 1 if line else width
                if room < 8 and line:
                    lines.append(line)
                    line = ""
                    continue
                lines.append(f"{line} {word[:room]}" if line else word[:room])
                line, word = "", word[room:]
            if not line:
                line = word
            elif plain.width(line) + 1 + plain.width(word) <= width:
                line = f"{line} {word}"
            else:
                lines.append(line)
                line = word
        lines.append(line)
    return lines
