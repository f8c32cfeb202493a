"""What the screen is made of: a page, and the sheets that stand over it. The topmost gets the keys."""

from __future__ import annotations

from typing import TYPE_CHECKING, ClassVar

from coldbox.tui.frame import Frame

if TYPE_CHECKING:
    from coldbox.tui.sheets.jump import Target
    from coldbox.tui.shell import Shell


class Area:
    """A rectangle of the screen that a layer may draw in."""

    def __init__(self, x: int, y: int, width: int, height: int) -> None:
        self.x, self.y, self.width, self.height = x, y, width, height


class Layer:
    """A page or a sheet."""

    where: ClassVar[str] = "everywhere"  # the keys that hold here, beside those that hold everywhere
    title: ClassVar[str] = ""
    topic: ClassVar[str] = ""  # its part of the help

    def __init__(self, shell: Shell) -> None:
        self.shell = shell

    @property
    def typing(self) -> bool:
        """Whether letters go into a text, and are no commands."""
        return False

    @property
    def takes_letters(self) -> bool:
        """Whether a letter begins a text, unless it is bound to an action of just this layer."""
        return False

    def draw(self, frame: Frame, area: Area) -> None:
        """Draw itself."""

    def act(self, action: str) -> bool:
        """Carry out an action; whether it was one of this layer's."""
        del action
        return False

    def key(self, key: str) -> bool:
        """A key that is bound to nothing, such as an arrow within a text; whether it meant something."""
        del key
        return False

    def type(self, text: str) -> bool:
        """Letters typed; whether they went anywhere."""
        del text
        return False

    def paste(self, text: str) -> bool:
        """A text pasted; whether it went anywhere."""
        del text
        return False

    def spoken(self) -> str:
        """Where one is, as one would read it out: label, value, unit, state."""
        return ""

    def hint(self) -> str:
        """The keys that matter most here, for the last line."""
        return ""

    def stand_on(self, path: str) -> None:
        """Put the cursor on a thing of the project, where there is one for it."""

    def targets(self) -> list[Target]:
        """The places on the screen that can be jumped to, as drawn last."""
        return []

    def copied(self) -> str:
        """What "copy" copies here."""
        return self.spoken()

    @property
    def busy(self) -> bool:
        """Whether something it started still runs."""
        return False

    def enter(self) -> None:
        """The layer has just come to be the topmost."""

    def leave(self) -> None:
        """The layer goes, or another page takes its place: what it started is stopped."""

    def changed(self) -> None:
        """The document is another than when it was drawn last."""

    def tick(self) -> bool:
        """Look whether something that runs elsewhere has come to an end; whether there is something new to show."""
        return False


class Rows:
    """A place in a list that is longer than its room: which row the cursor is on, and which is shown first."""

    def __init__(self) -> None:
        self.at = 0
        self.first = 0

    def move(self, action: str, count: int, page: int) -> bool:
        """Move by an action such as "down"; whether it was one that moves."""
        step = {"up": -1, "down": 1, "page-up": -page, "page-down": page, "first": -count, "last": count}.get(action)
        if step is None:
            return False
        self.at = max(0, min(self.at + step, count - 1))
        return True

    def shown(self, count: int, room: int) -> range:
        """The rows that are shown, the cursor among them."""
        room = max(room, 1)
        self.at = max(0, min(self.at, count - 1))
        if self.at < self.first:
            self.first = self.at
        elif self.at >= self.first + room:
            self.first = self.at - room + 1
        self.first = max(0, min(self.first, count - room))
        return range(self.first, min(self.first + room, count))
