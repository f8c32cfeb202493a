"""The first page: the projects of the folder, with what they come to or what is wrong with them."""

from __future__ import annotations

from functools import partial

from coldbox.tui.folder import Entry, Folder
from coldbox.tui.frame import Frame, wrapped
from coldbox.tui.layer import Area, Layer, Rows
from coldbox.tui.sheets.jump import Target
from coldbox.tui.shell import Shell
from coldbox.tui.widgets.editor import Editor


class Page(Layer):
    """A list that filters as one types."""

    where = "first"
    title = "Projects"
    topic = "first"

    def __init__(self, shell: Shell) -> None:
        super().__init__(shell)
        self.rows = Rows()
        self.filter = Editor()
        self.room = 10
        self.folder = Folder(shell.folder)
        self._places: list[tuple[int, int, int]] = []

    @property
    def takes_letters(self) -> bool:
        return True

    def found(self) -> list[Entry]:
        """The projects whose names hold what was typed."""
        words = self.filter.text.casefold().split()
        return [entry for entry in self.folder.entries if all(word in entry.name.casefold() for word in words)]

    def draw(self, frame: Frame, area: Area) -> None:
        found, x = self.found(), area.x + 1
        column = frame.text(x, area.y, "find ", "dim")
        shown, at = self.filter.shown(min(30, area.width - 8))
        frame.fill(column, area.y, min(30, area.width - 8), 1, "field")
        frame.text(column, area.y, shown, "field")
        frame.cursor = (column + at, area.y)
        right = area.x + min(area.width, 110) - 1
        frame.right(right - 22, area.y + 1, "needs", "dim")
        frame.right(right - 12, area.y + 1, "holds", "dim")
        frame.right(right, area.y + 1, "findings", "dim")
        self.room, self._places = max(area.height - 3, 1), []
        if not found:
            self._empty(frame, area)
            return
        for row, index in enumerate(self.rows.shown(len(found), self.room)):
            self._entry(frame, found[index], x, area.y + 2 + row, right, index == self.rows.at)
            self._places.append((area.x, area.y + 2 + row, index))

    def _entry(self, frame: Frame, entry: Entry, x: int, y: int, right: int, here: bool) -> None:
        style = "cursor" if here else "text"
        if here:
            frame.fill(x - 1, y, right - x + 2, 1, "cursor")
        names = max(right - x - 36, 12)
        frame.text(x, y, entry.name, style, names)
        if entry.broken:
            frame.text(x + names + 1, y, entry.broken, style if here else "wrong", right - x - names - 1)
            return
        frame.right(right - 22, y, entry.capacity or "…", style)
        frame.right(right - 12, y, entry.hold or "…", style)
        frame.right(right, y, entry.findings or "…", style)

    def _empty(self, frame: Frame, area: Area) -> None:
        keys = self.shell.key_name
        said = (
            f"No project here is called that. {keys('new')} starts a new one."
            if self.filter.text
            else f"There is no project in this folder yet. {keys('new')} starts one: from an example, or from the least"
            " that computes."
        )
        for row, line in enumerate(wrapped(said, min(area.width - 4, 72))):
            frame.text(area.x + 2, area.y + 3 + row, line, "text")

    def act(self, action: str) -> bool:
        found = self.found()
        match action:
            case "accept":
                if found:
                    self.shell.open(self._here(found).path)
            case "new":
                from coldbox.tui.sheets.new import ask_for_new

                ask_for_new(self.shell)
            case "duplicate_project":
                from coldbox.tui.sheets.new import ask_for_copy

                if found:
                    ask_for_copy(self.shell, str(self._here(found).path))
            case _:
                return self.rows.move(action, len(found), self.room)
        return True

    def _here(self, found: list[Entry]) -> Entry:
        return found[min(self.rows.at, len(found) - 1)]

    def key(self, key: str) -> bool:
        self.rows.at = 0
        return self.filter.key(key)

    def type(self, text: str) -> bool:
        self.rows.at = 0
        self.filter.type(text)
        return True

    def paste(self, text: str) -> bool:
        self.filter.paste(text)
        return True

    @property
    def busy(self) -> bool:
        return self.folder.busy

    def tick(self) -> bool:
        return self.folder.tick()

    def leave(self) -> None:
        self.folder.stop()

    def to_row(self, index: int) -> None:
        """Put the cursor on a row."""
        self.rows.at = index

    def targets(self) -> list[Target]:
        return [Target(x, y, partial(self.to_row, index)) for x, y, index in self._places]

    def spoken(self) -> str:
        found = self.found()
        if not found:
            return "no project"
        entry = self._here(found)
        if entry.broken:
            return f"{entry.name}: {entry.broken}"
        said = (f"needs {entry.capacity}", entry.hold and f"holds {entry.hold}", f"findings: {entry.findings}")
        return f"{entry.name}: {', '.join(part for part in said if part) if entry.capacity else 'not known yet'}"

    def hint(self) -> str:
        keys = self.shell.key_name
        return f"{keys('accept')} open  {keys('new')} new  {keys('duplicate_project')} copy  {keys('quit')} leave"
