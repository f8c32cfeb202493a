"""The load: the day's bars, every entry by size, and how the one under the cursor came about."""

from __future__ import annotations

from functools import partial

from coldbox.account.entry import Entry, Load
from coldbox.paper.drawing.day import day_bars
from coldbox.paper.load import figure, source_words
from coldbox.tui.frame import Frame, wrapped
from coldbox.tui.layer import Area, Layer, Rows
from coldbox.tui.sheets.jump import Target
from coldbox.tui.shell import Shell


def ranked(load: Load) -> list[Entry]:
    """The entries, the largest at the peak hour first, as the account prints them."""
    return sorted(load.entries, key=lambda entry: -abs(float(entry.hours_w[load.peak_hour])))


class Page(Layer):
    """Bars above, entries below, what stands behind an entry beside or under them."""

    where = "load"
    title = "Load"
    topic = "load"

    def __init__(self, shell: Shell) -> None:
        super().__init__(shell)
        self.rows = Rows()
        self.room = 5
        self._places: list[tuple[int, int, int]] = []

    @property
    def load(self) -> Load | None:
        """The account as it stands."""
        return self.shell.desk.load if self.shell.desk is not None else None

    @property
    def entry(self) -> Entry | None:
        """The entry under the cursor."""
        if self.load is None:
            return None
        entries = ranked(self.load)
        return entries[min(self.rows.at, len(entries) - 1)] if entries else None

    def draw(self, frame: Frame, area: Area) -> None:
        self._places = []
        load, desk = self.load, self.shell.desk
        if load is None or desk is None:
            frame.text(area.x + 2, area.y + 1, "No account yet: mend what is named below first.", "text")
            return
        wide = area.width >= 110
        left = area.width * 3 // 5 if wide else area.width
        bars = max(min(area.height // 3, 16), 5)
        drawing = day_bars(load, left - 2, bars, system=desk.system, ascii_only=frame.ascii_drawing)
        frame.paste(area.x + 1, area.y, drawing.rows(), left - 2, bars)
        if wide:
            self._list(frame, Area(area.x, area.y + bars, left, area.height - bars), load)
            self._how(frame, Area(area.x + left, area.y, area.width - left, area.height))
        else:
            told = max(area.height - bars - 4, 3) // 2 + 1
            self._list(frame, Area(area.x, area.y + bars, left, area.height - bars - told), load)
            self._how(frame, Area(area.x, area.y + area.height - told, area.width, told))

    def _list(self, frame: Frame, area: Area, load: Load) -> None:
        desk = self.shell.desk
        assert desk is not None
        entries, hour = ranked(load), load.peak_hour
        total = max(sum(abs(float(entry.hours_w.sum())) for entry in entries), 1e-9)
        right = area.x + min(area.width, 78)
        frame.text(area.x + 1, area.y, "entry", "dim")
        frame.right(right - 20, area.y, f"at {hour}-{hour + 1}", "dim")
        frame.right(right - 8, area.y, "a day", "dim")
        frame.right(right - 2, area.y, "share", "dim")
        self.room = max(area.height - 1, 1)
        for row, index in enumerate(self.rows.shown(len(entries), self.room)):
            entry, y, here = entries[index], area.y + 1 + row, index == self.rows.at
            style = "cursor" if here else "text"
            if here:
                frame.fill(area.x, y, right - area.x, 1, "cursor")
                frame.cursor = (area.x + 1, y)
            frame.text(area.x + 1, y, entry.label, style, right - area.x - 34)
            frame.right(right - 20, y, figure(entry.hours_w[hour], "power", desk.system, 3), style)
            frame.right(right - 8, y, figure(entry.daily_j, "energy", desk.system, 3), style)
            share = f"{float(entry.hours_w.sum()) / total:.0%}".replace("%", " %")
            frame.right(right - 2, y, share, style)
            self._places.append((area.x, y, index))

    def _how(self, frame: Frame, area: Area) -> None:
        frame.text(area.x, area.y, "─" * area.width, "line")
        lines = self._told(area.width - 3)
        for row, (style, text) in enumerate(lines[: area.height - 1]):
            frame.text(area.x + 1, area.y + 1 + row, text, style, area.width - 2)
        if len(lines) > area.height - 1:
            said = f" all of it: {self.shell.key_name('accept')} "
            frame.right(area.x + area.width - 1, area.y, said, "dim")

    def _told(self, width: int) -> list[tuple[str, str]]:
        """How the entry under the cursor came about, the numbers of this project in it."""
        entry, desk = self.entry, self.shell.desk
        if entry is None or desk is None:
            return []
        numbers = ", ".join(f"{item.label} {figure(item.value, item.kind, desk.system)}" for item in entry.inputs)
        parts = [
            ("title", f"{entry.label}: {entry.method}"),
            ("text", entry.formula),
            ("text", numbers),
            ("dim", entry.remark),
            ("dim", source_words(entry.source)),
        ]
        return [(style, line) for style, text in parts if text for line in wrapped(text, width)]

    def act(self, action: str) -> bool:
        if action == "accept":
            from coldbox.tui.sheets.reading import Reading

            self.shell.over(Reading(self.shell, "How it came about", lambda: self._told(90)))
            return True
        count = len(ranked(self.load)) if self.load is not None else 0
        return self.rows.move(action, count, self.room)

    def to_row(self, index: int) -> None:
        """Put the cursor on a row."""
        self.rows.at = index

    def targets(self) -> list[Target]:
        return [Target(x, y, partial(self.to_row, index)) for x, y, index in self._places]

    def copied(self) -> str:
        return "\n".join(text for _, text in self._told(76))

    def spoken(self) -> str:
        entry, load, desk = self.entry, self.load, self.shell.desk
        if entry is None or load is None or desk is None:
            return "no account yet"
        return f"{entry.label}: {figure(entry.hours_w[load.peak_hour], 'power', desk.system, 3)} at the peak hour"

    def hint(self) -> str:
        return "Enter how"
