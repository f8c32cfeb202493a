"""The screens without the toolkit: keys in, state and text out. Every key is kept, to be played again elsewhere."""

from __future__ import annotations

from pathlib import Path

from coldbox.tui.desk import Desk
from coldbox.tui.settings import load_settings
from coldbox.tui.sheets.edit import EditSheet
from coldbox.tui.sheets.pick import PickList
from coldbox.tui.shell import Shell

NAMES = {
    " ": "space", "-": "minus", "+": "plus", "?": "question_mark", ":": "colon", ".": "full_stop", "/": "slash",
    "°": "degree_sign", "]": "right_square_bracket", "[": "left_square_bracket", "%": "percent_sign",
    '"': "quotation_mark", "'": "apostrophe", ",": "comma",
}  # fmt: skip


class Driven:
    """A shell, and the keys that were pressed on it."""

    def __init__(self, folder: Path, file: Path | None = None, *, size: tuple[int, int] = (80, 24)) -> None:
        self.shell = Shell(folder, load_settings())
        self.shell.with_hold = False
        self.size = size
        self.keys: list[str] = []
        if file is None:
            self.shell.go("first")
        else:
            self.shell.open(file)

    def press(self, *keys: str) -> Driven:
        """Keys by name, or letters."""
        for key in keys:
            self.keys.append(key)
            self.shell.key(NAMES.get(key, key), key if len(key) == 1 else None)
            self.shell.frame(*self.size)
        return self

    def type(self, text: str) -> Driven:
        """Letters, one by one."""
        return self.press(*text)

    @property
    def desk(self) -> Desk:
        """The project being edited."""
        assert self.shell.desk is not None
        return self.shell.desk

    @property
    def sheet(self) -> EditSheet:
        """The sheet that is open."""
        assert isinstance(self.shell.top, EditSheet), type(self.shell.top).__name__
        return self.shell.top

    def lines(self) -> list[str]:
        """The screen as text."""
        return self.shell.frame(*self.size).lines()

    @property
    def screen(self) -> str:
        """The screen as one text."""
        return "\n".join(self.lines())

    # What a user does without thinking of keys

    def to_thing(self, words: str) -> Driven:
        """Open a thing by its name, through the list of all there is to do."""
        while len(self.shell.sheets):
            self.press("escape")
        self.press(":").type(f"go to {words[:7]}").press("enter")
        assert isinstance(self.shell.top, EditSheet), self.screen
        return self

    def field(self, key: str, text: str) -> Driven:
        """Move to a field of the sheet, type a value, take it."""
        self._move_to(key)
        self.type(text).press("enter")
        assert not self.sheet.refused, self.sheet.refused
        return self

    def pick(self, key: str, text: str) -> Driven:
        """Move to a field, open its list, filter, take."""
        self._move_to(key)
        self.press("enter")
        assert isinstance(self.shell.top, PickList)
        self.type(text).press("enter")
        assert not self.sheet.refused, self.sheet.refused
        return self

    def _move_to(self, key: str) -> None:
        keys = [line.key for line in self.sheet.lines]
        while self.sheet.line.key != key:
            self.press("down" if keys.index(key) > self.sheet.rows.at else "up")

    def add(self, kind: str) -> Driven:
        """Add something where the cursor is."""
        self.press("+").type(kind).press("enter")
        assert isinstance(self.shell.top, EditSheet), self.screen
        return self
