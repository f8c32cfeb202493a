"""A run through time as a page: the answer above, the curve under it, and a cursor that reads it off."""

from __future__ import annotations

from typing import ClassVar, Literal

from coldbox.paper import text
from coldbox.paper.document import Document, Heading, Paragraph
from coldbox.paper.drawing.course import Course, course
from coldbox.timeline.results import Outage
from coldbox.tui.desk import Desk
from coldbox.tui.frame import Frame, wrapped
from coldbox.tui.layer import Area, Layer
from coldbox.tui.shell import Shell

ANSWER = 4  # lines of it at most
COMING = "how sure: not looked into"  # what the report says of a run without draws
STEPS = 72  # of the cursor from one end to the other
QUARTER_H = 0.25


class Along(Layer):
    """The answer, the curve, and what holds at the cursor. Enter reads the whole report."""

    nothing: ClassVar[str] = ""  # what to say where there is no result, and none is coming

    def __init__(self, shell: Shell) -> None:
        super().__init__(shell)
        self.at_h = 0.0
        self._drawn: Course | None = None

    def result(self, desk: Desk) -> Outage | None:
        """What the hold time's process has found."""
        raise NotImplementedError

    def document(self, found: Outage, system: Literal["SI", "IP"]) -> Document:
        """How the reports print it."""
        raise NotImplementedError

    @property
    def found(self) -> Outage | None:
        """The run that is shown."""
        return None if self.shell.desk is None else self.result(self.shell.desk)

    def draw(self, frame: Frame, area: Area) -> None:
        found, desk = self.found, self.shell.desk
        if found is None or desk is None:
            self._absent(frame, area)
            return
        style = "dim" if desk.hold_stale else "text"
        lines = self._answer(found, desk.system, area.width - 2)
        for row, line in enumerate(lines):
            frame.text(area.x + 1, area.y + row, line, "title" if row == 0 and not desk.hold_stale else style)
        top = area.y + len(lines)
        height = area.height - len(lines) - 1
        self.at_h = min(self.at_h, found.horizon_h)
        self._drawn = course(
            found, area.width - 2, height, at_h=self.at_h, system=desk.system, ascii_only=frame.ascii_drawing
        )
        if self._drawn is None:
            frame.text(
                area.x + 1, top, f"More room shows the curve; {self.shell.keymap.shown('accept')} reads it.", "dim"
            )
            return
        frame.paste(area.x + 1, top, self._drawn.canvas.rows(), area.width - 2, height)
        if desk.hold_stale:
            frame.text(area.x + 1, top, "from before the last change; the new one is coming", "warn")
        frame.text(area.x + 1, area.y + area.height - 1, self._drawn.reads, "key", area.width - 2)
        frame.cursor = (area.x + 1, area.y + area.height - 1)

    def _answer(self, found: Outage, system: Literal["SI", "IP"], width: int) -> list[str]:
        """The first lines of the report."""
        blocks = self.document(found, system).blocks
        first = [block for block in blocks[:ANSWER] if isinstance(block, Heading | Paragraph)]
        head = Document(title="", blocks=tuple(first))
        lines = [
            line for line in text.render(head, width=width, ascii_only=self.shell.ascii_drawing).splitlines() if line
        ]
        return ["  how sure: is being computed" if COMING in line else line for line in lines[:ANSWER]]

    def _absent(self, frame: Frame, area: Area) -> None:
        desk = self.shell.desk
        if desk is not None and desk.hold.trouble:
            said = desk.hold.trouble
        elif desk is not None and desk.busy and not self._never(desk):
            said = "It is being computed; the result will stand here in a moment."
        else:
            said = self.nothing
        frame.text(area.x + 2, area.y + 1, self.title, "title")
        for row, line in enumerate(wrapped(said, min(area.width - 4, 72))):
            frame.text(area.x + 2, area.y + 3 + row, line)

    def _never(self, desk: Desk) -> bool:
        """Whether no result will ever come for this project."""
        del desk
        return False

    def act(self, action: str) -> bool:
        found = self.found
        if found is None:
            return False
        step = max(round(found.horizon_h / STEPS / QUARTER_H), 1) * QUARTER_H
        moves = {"left": -step, "right": step, "page_up": -6.0 * step, "page_down": 6.0 * step,
                 "first": -found.horizon_h, "last": found.horizon_h, "up": -QUARTER_H, "down": QUARTER_H}  # fmt: skip
        if action in moves:
            self.at_h = min(max(self.at_h + moves[action], 0.0), found.horizon_h)
            return True
        if action == "accept":
            self._report()
            return True
        return False

    def _report(self) -> None:
        from coldbox.tui.sheets.reading import Reading

        def lines() -> list[tuple[str, str]]:
            return [("text", line) for line in self.copied().splitlines()]

        self.shell.over(Reading(self.shell, self.title, lines))

    def copied(self) -> str:
        found, desk = self.found, self.shell.desk
        if found is None or desk is None:
            return ""
        return text.render(self.document(found, desk.system), width=76, ascii_only=self.shell.ascii_drawing)

    def spoken(self) -> str:
        return self._drawn.reads if self._drawn is not None else self.title

    def hint(self) -> str:
        keys = self.shell.keymap.shown
        return f"{keys('accept')} report"
