"""Something to read: the help of where one is, the keys, how an entry came about."""

from __future__ import annotations

from collections.abc import Callable

from coldbox.tui.frame import Frame, wrapped
from coldbox.tui.layer import Area, Layer, Rows
from coldbox.tui.shell import Shell


class Reading(Layer):
    """Lines of text that one can go through. A line that begins with a tab has a key's name in front of it."""

    where = "reading"
    topic = "reading"

    def __init__(self, shell: Shell, heading: str, made: Callable[[], list[tuple[str, str]]]) -> None:
        super().__init__(shell)
        self.heading = heading
        self.made = made  # the lines, anew for each picture: (style, text)
        self.rows = Rows()
        self.room = 10
        self.count = 1

    def draw(self, frame: Frame, area: Area) -> None:
        width, height = min(area.width, 100), area.height
        x, y = area.x + (area.width - width) // 2, area.y
        frame.box(x, y, width, height, self.heading)
        lines = [(style, line) for style, text in self.made() for line in _broken(text, width - 4)]
        self.room, self.count = max(height - 3, 1), max(len(lines) - (height - 3) + 1, 1)
        self.rows.at = min(self.rows.at, self.count - 1)
        for line, (style, text) in enumerate(lines[self.rows.at : self.rows.at + self.room]):
            if "\t" in text:
                keys, _, rest = text.partition("\t")
                frame.text(x + 2, y + 1 + line, keys, "key", 22)
                frame.text(x + 25, y + 1 + line, rest, style, width - 27)
            else:
                frame.text(x + 2, y + 1 + line, text, style, width - 4)
        more = len(lines) - self.rows.at - self.room
        said = f"{more} more lines, Down" if more > 0 else "the end"
        frame.text(x + 2, y + height - 2, f"Esc back   {said}", "dim", width - 4)
        frame.cursor = (x + 2, y + 1)

    def act(self, action: str) -> bool:
        if action == "accept":
            self.shell.close(self)
            return True
        return self.rows.move(action, self.count, self.room)

    def copied(self) -> str:
        return "\n".join(text.replace("\t", "  ") for _, text in self.made())

    def spoken(self) -> str:
        return self.heading


def _broken(text: str, width: int) -> list[str]:
    if "\t" in text:
        keys, _, rest = text.partition("\t")
        first, *others = wrapped(rest, max(width - 25, 10)) or [""]
        return [f"{keys}\t{first}", *(f"\t{line}" for line in others)]
    indent = len(text) - len(text.lstrip(" "))
    return [" " * indent + line for line in wrapped(text, max(width - indent, 10))]
