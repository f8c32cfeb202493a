"""A list to pick from, which filters as one types."""

from __future__ import annotations

from collections.abc import Callable, Sequence
from typing import NamedTuple

from coldbox.tui.frame import Frame, wrapped
from coldbox.tui.layer import Area, Layer, Rows
from coldbox.tui.shell import Shell
from coldbox.tui.widgets.editor import Editor


class Item(NamedTuple):
    """One line to pick."""

    label: str
    value: str
    detail: str = ""


class PickList(Layer):
    """Lines, a filter, and what becomes of the one picked."""

    where = "list"
    topic = "lists"

    def __init__(
        self,
        shell: Shell,
        heading: str,
        items: Sequence[Item],
        picked: Callable[[str], None],
        *,
        at: str = "",
        free: bool = False,
    ) -> None:
        super().__init__(shell)
        self.heading = heading
        self.items = list(items)
        self.picked = picked
        self.free = free  # whether a text that is none of the lines will do as well
        self.filter = Editor()
        self.rows = Rows()
        self.room = 10
        self.rows.at = next((index for index, item in enumerate(self.items) if item.value == at), 0)

    @property
    def typing(self) -> bool:
        return True

    def found(self) -> list[Item]:
        """The lines that hold every word of the filter; those that begin with it come first."""
        text = self.filter.text.casefold().strip()
        words = text.split()
        held = [item for item in self.items if all(word in f"{item.label} {item.detail}".casefold() for word in words)]
        return sorted(held, key=lambda item: not item.label.casefold().startswith(text)) if text else held

    def draw(self, frame: Frame, area: Area) -> None:
        found = self.found()
        width = min(max(48, area.width * 2 // 3), area.width, 90)
        height = max(min(len(found) + 4, area.height), min(8, area.height))
        x, y = area.x + (area.width - width) // 2, area.y + (area.height - height) // 2
        frame.box(x, y, width, height, self.heading)
        inside = width - 4
        column = frame.text(x + 2, y + 1, "find ", "dim")
        shown, at = self.filter.shown(inside - 5)
        frame.fill(column, y + 1, inside - 5, 1, "field")
        frame.text(column, y + 1, shown, "field", inside - 5)
        frame.cursor = (column + at, y + 1)
        self.room = height - 4
        if not found:
            said = "nothing here is called that" + (", Enter takes the text itself" if self.free else "")
            frame.text(x + 2, y + 2, said, "dim", inside)
        names = min(max((len(item.label) for item in found), default=0) + 2, inside * 2 // 3)
        for line, index in enumerate(self.rows.shown(len(found), self.room)):
            item, here = found[index], index == self.rows.at
            if here:
                frame.fill(x + 1, y + 2 + line, width - 2, 1, "cursor")
            frame.text(x + 2, y + 2 + line, item.label, "cursor" if here else "text", inside)
            frame.text(x + 2 + names, y + 2 + line, item.detail, "cursor" if here else "dim", inside - names)
        count = f"{len(found)} of {len(self.items)}"
        frame.right(x + width - 2, y + height - 2, count, "dim")
        frame.text(x + 2, y + height - 2, "Enter take   Esc back", "dim")

    def act(self, action: str) -> bool:
        found = self.found()
        if action == "accept":
            text = self.filter.text.strip()
            if found and not (self.free and text and not found):
                self.shell.close(self)
                self.picked(found[min(self.rows.at, len(found) - 1)].value)
            elif self.free and text:
                self.shell.close(self)
                self.picked(text)
            return True
        return self.rows.move(action, len(found), self.room)

    def key(self, key: str) -> bool:
        return self.filter.key(key)

    def type(self, text: str) -> bool:
        self.filter.type(text)
        self.rows.at = 0
        return True

    def paste(self, text: str) -> bool:
        self.filter.paste(text)
        self.rows.at = 0
        return True

    def spoken(self) -> str:
        found = self.found()
        if not found:
            return f"{self.heading}: nothing found"
        item = found[min(self.rows.at, len(found) - 1)]
        return f"{self.heading}: {item.label} {item.detail}".rstrip()


class Question(Layer):
    """A question with a few answers, each with its letter."""

    where = "list"
    topic = "questions"

    def __init__(
        self, shell: Shell, heading: str, said: str, answers: Sequence[tuple[str, str, Callable[[], None]]]
    ) -> None:
        super().__init__(shell)
        self.heading, self.said = heading, said
        self.answers = list(answers)  # letter, words, what then
        self.rows = Rows()

    def draw(self, frame: Frame, area: Area) -> None:
        width = min(64, area.width)
        lines = wrapped(self.said, width - 4)
        height = min(len(lines) + len(self.answers) + 3, area.height)
        x, y = area.x + (area.width - width) // 2, area.y + (area.height - height) // 2
        frame.box(x, y, width, height, self.heading)
        room = max(height - 3 - len(self.answers), 0)
        for line, text in enumerate(lines[:room]):
            frame.text(x + 2, y + 1 + line, text, "text", width - 4)
        for line, (letter, words, _) in enumerate(self.answers):
            row, here = y + height - 1 - len(self.answers) + line, line == self.rows.at
            if here:
                frame.fill(x + 1, row, width - 2, 1, "cursor")
                frame.cursor = (x + 2, row)
            frame.text(x + 2, row, letter, "cursor" if here else "key")
            frame.text(x + 5, row, words, "cursor" if here else "text", width - 7)

    def act(self, action: str) -> bool:
        if action == "accept":
            self._answer(self.rows.at)
            return True
        return self.rows.move(action, len(self.answers), len(self.answers))

    def key(self, key: str) -> bool:
        return self.type(key) if len(key) == 1 else False

    def type(self, text: str) -> bool:
        for index, (letter, _, _) in enumerate(self.answers):
            if text.casefold() == letter.casefold():
                self._answer(index)
                return True
        return False

    @property
    def typing(self) -> bool:
        return True

    def _answer(self, index: int) -> None:
        self.shell.close(self)
        self.answers[index][2]()

    def spoken(self) -> str:
        return f"{self.said} {self.answers[self.rows.at][1]}"


class Asked(Layer):
    """One line of text that is asked for, such as a name."""

    where = "list"
    topic = "questions"

    def __init__(self, shell: Shell, heading: str, said: str, text: str, then: Callable[[str], str]) -> None:
        super().__init__(shell)
        self.heading, self.said = heading, said
        self.editor = Editor(text, fresh=bool(text))
        self.then = then  # what is done with the text; what is wrong with it, or nothing
        self.wrong = ""

    @property
    def typing(self) -> bool:
        return True

    def draw(self, frame: Frame, area: Area) -> None:
        width = min(64, area.width)
        lines = wrapped(self.said, width - 4)[: max(area.height - 5, 0)]
        wrong = wrapped(self.wrong, width - 4)[:3] if self.wrong else []
        height = min(len(lines) + len(wrong) + 4, area.height)
        x, y = area.x + (area.width - width) // 2, area.y + (area.height - height) // 2
        frame.box(x, y, width, height, self.heading)
        for line, text in enumerate(lines):
            frame.text(x + 2, y + 1 + line, text, "text", width - 4)
        row = y + 1 + len(lines)
        shown, at = self.editor.shown(width - 4)
        frame.fill(x + 2, row, width - 4, 1, "field")
        frame.text(x + 2, row, shown, "field", width - 4)
        frame.cursor = (x + 2 + at, row)
        for line, text in enumerate(wrong):
            frame.text(x + 2, row + 1 + line, text, "wrong", width - 4)
        frame.text(x + 2, y + height - 2, "Enter take   Esc back", "dim", width - 4)

    def act(self, action: str) -> bool:
        if action != "accept":
            return False
        self.wrong = self.then(self.editor.text.strip())
        if not self.wrong:
            self.shell.close(self)
        return True

    def key(self, key: str) -> bool:
        return self.editor.key(key)

    def type(self, text: str) -> bool:
        self.editor.type(text)
        return True

    def paste(self, text: str) -> bool:
        self.editor.paste(text)
        return True

    def spoken(self) -> str:
        return f"{self.said} {self.editor.text}"
