"""A page whose content is still to come: it says in words what will stand there."""

from __future__ import annotations

from typing import ClassVar

from coldbox.tui.frame import Frame, wrapped
from coldbox.tui.layer import Area, Layer


class Coming(Layer):
    """Words in the middle of the page."""

    where = "page"
    words: ClassVar[tuple[str, ...]] = ()

    def draw(self, frame: Frame, area: Area) -> None:
        width = min(area.width - 4, 72)
        lines = [line for text in self.words for line in (*wrapped(text, width), "")]
        x, y = area.x + (area.width - width) // 2, area.y + max((area.height - len(lines)) // 3, 0)
        frame.text(x, y, self.title, "title", width)
        for row, line in enumerate(lines[: max(area.height - 2, 0)]):
            frame.text(x, y + 2 + row, line, "text", width)

    def spoken(self) -> str:
        return f"{self.title}: {self.words[0]}"
