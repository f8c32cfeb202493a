"""Jump by letters: every place gets a letter, and one keystroke goes there."""

from __future__ import annotations

from collections.abc import Callable, Sequence
from typing import NamedTuple

from coldbox.tui.frame import Frame
from coldbox.tui.layer import Area, Layer
from coldbox.tui.shell import Shell

LETTERS = "asdfghjklqwertyuiopzxcvbnm"


class Target(NamedTuple):
    """A place on the screen, and what going there means."""

    x: int
    y: int
    go: Callable[[], None]


class Jump(Layer):
    """Letters over the layer below."""

    where = "list"
    topic = "lists"

    def __init__(self, shell: Shell, targets: Sequence[Target]) -> None:
        super().__init__(shell)
        pairs = [first + second for first in LETTERS for second in LETTERS]
        names = list(LETTERS) if len(targets) <= len(LETTERS) else pairs
        self.lettered = dict(zip(names, targets, strict=False))
        self.typed = ""

    @property
    def typing(self) -> bool:
        return True

    def draw(self, frame: Frame, area: Area) -> None:
        del area
        for name, target in self.lettered.items():
            if name.startswith(self.typed):
                frame.text(target.x, target.y, name, "danger")

    def type(self, text: str) -> bool:
        typed = self.typed + text.casefold()
        if typed in self.lettered:
            self.shell.close(self)
            self.lettered[typed].go()
        elif any(name.startswith(typed) for name in self.lettered):
            self.typed = typed
        else:
            self.shell.close(self)
            self.shell.say(f'"{text}" is no letter on the screen.')
        return True

    def hint(self) -> str:
        return "type a letter"

    def spoken(self) -> str:
        return "jump: type one of the letters"
