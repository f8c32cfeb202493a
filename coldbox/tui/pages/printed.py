"""What the reports print, as a page to read through: an outage, a trip."""

from __future__ import annotations

from typing import ClassVar, Literal

from coldbox.paper import text
from coldbox.paper.document import Curve, Document, Heading, Paragraph
from coldbox.timeline.results import Outage
from coldbox.tui.desk import Desk
from coldbox.tui.frame import Frame, wrapped
from coldbox.tui.layer import Area, Layer, Rows
from coldbox.tui.shell import Shell

WIDEST = 110


class Printed(Layer):
    """A document of the reports, as wide as the page; the cursor is on a line of it."""

    where = "page"
    nothing: ClassVar[str] = ""  # what to say where there is no result, and none is coming

    def __init__(self, shell: Shell) -> None:
        super().__init__(shell)
        self.rows = Rows()
        self.room = 10
        self._lines: list[str] = []
        self._found: Outage | None = None  # what the lines were made of, and how
        self._how: tuple[object, ...] = ()

    def result(self, desk: Desk) -> Outage | None:
        """What the hold time's process has found."""
        raise NotImplementedError

    def document(self, found: Outage, system: Literal["SI", "IP"]) -> Document:
        """How the reports print it."""
        raise NotImplementedError

    def draw(self, frame: Frame, area: Area) -> None:
        desk = self.shell.desk
        found = None if desk is None else self.result(desk)
        if desk is None or found is None:
            self._absent(frame, area)
            return
        width = min(area.width - 2, WIDEST)
        how = (desk.system, width, frame.ascii_drawing)
        if found is not self._found or how != self._how:
            document = curve_first(self.document(found, desk.system), coming=found.spread is None)
            page = text.render(document, width=width, ascii_only=frame.ascii_drawing)
            self._lines, self._found, self._how = page.splitlines(), found, how
        stale = desk.hold_stale
        self.room = max(area.height - (1 if stale else 0), 1)
        last = max(len(self._lines) - self.room, 0)
        self.rows.at = min(self.rows.at, last)
        for row, line in enumerate(self._lines[self.rows.at : self.rows.at + self.room]):
            frame.text(area.x + 1, area.y + row, line, "dim" if stale else "text", width)
        if stale:
            frame.text(
                area.x + 1, area.y + area.height - 1, "from before the last change; the new one is coming", "warn"
            )
        frame.cursor = (area.x + 1, area.y)

    def _absent(self, frame: Frame, area: Area) -> None:
        desk = self.shell.desk
        if desk is not None and desk.hold.trouble:
            said = desk.hold.trouble
        elif desk is not None and desk.busy:
            said = "It is being computed; the result will stand here in a moment."
        else:
            said = self.nothing
        frame.text(area.x + 2, area.y + 1, self.title, "title")
        for row, line in enumerate(wrapped(said, min(area.width - 4, 72))):
            frame.text(area.x + 2, area.y + 3 + row, line)

    def act(self, action: str) -> bool:
        count = max(len(self._lines) - self.room + 1, 1)
        return self.rows.move(action, count, max(self.room - 1, 1))

    def copied(self) -> str:
        return "\n".join(self._lines)

    def spoken(self) -> str:
        return self._lines[self.rows.at].strip() if self._lines else self.title

    def hint(self) -> str:
        more = len(self._lines) - self.rows.at - self.room
        return f"{more} more lines, Down" if more > 0 else ""


def curve_first(document: Document, *, coming: bool) -> Document:
    """The document as it is read on a screen: the answer, the curve, then all else. coming: its spread is not made yet."""
    blocks = list(document.blocks)
    answer = next(
        (at for at, block in enumerate(blocks) if isinstance(block, Heading) and block.level > 1), len(blocks)
    )
    told = [one for one in blocks[:answer] if not (coming and isinstance(one, Paragraph) and UNSURE in one.text)]
    told += [Paragraph(text="how sure: being computed", indent=1)] if coming else []
    curves = [one for one in blocks[answer:] if isinstance(one, Curve)]
    rest = [one for one in blocks[answer:] if not isinstance(one, Curve)]
    return Document(title=document.title, blocks=(*told, *curves, *rest))


UNSURE = "not looked into"
