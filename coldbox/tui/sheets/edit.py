"""The side sheet: the fields of one thing, and the editor of the one being typed."""

from __future__ import annotations

from coldbox.tui.desk import Refusal, Understood
from coldbox.tui.frame import Frame, wrapped
from coldbox.tui.layer import Area, Layer, Rows
from coldbox.tui.sheet import Line, lines
from coldbox.tui.sheets.pick import Item, PickList
from coldbox.tui.shell import Shell
from coldbox.tui.things import Thing
from coldbox.tui.widgets.editor import Editor

FIELD_KEYS = {"next_page": "down", "previous_page": "up"}  # Tab goes from field to field here
TOLD = 5  # lines at the foot of the sheet for what was understood, the usual range, the help


class EditSheet(Layer):
    """Fields of a thing: move, type, pick, raise, lower, go back to the default."""

    where = "sheet"
    topic = "sheet"

    def __init__(self, shell: Shell, thing: Thing) -> None:
        super().__init__(shell)
        self.thing = thing
        self.rows = Rows()
        self.room = 10
        self.editor: Editor | None = None
        self.refused = ""
        self.meant = ""  # what is understood so far of what is being typed
        self._lines: list[Line] | None = None
        self._count, self._place = 0, 0  # of the things of its table: how it is known again under another name
        self._keep_place()

    @property
    def lines(self) -> list[Line]:
        """The fields as they stand; made anew after a change."""
        if self._lines is None:
            assert self.shell.desk is not None
            self._lines = lines(self.shell.desk, self.thing)
        return self._lines

    @property
    def line(self) -> Line:
        """The field under the cursor."""
        return self.lines[min(self.rows.at, len(self.lines) - 1)]

    @property
    def typing(self) -> bool:
        return self.editor is not None

    def changed(self) -> None:
        """After a change: the thing may have another name now, or be gone, and then the sheet goes too."""
        self._lines = None
        alike = self._alike()
        if self.thing in alike:
            self._keep_place()
            return
        if len(alike) == self._count and self._place < len(alike):
            self._stand(alike[self._place])
        else:
            self.shell.close(self)

    def _alike(self) -> list[Thing]:
        """The things of the same table, in the order of the file."""
        return [one for one in self.shell.things() if one.table == self.thing.table]

    def _stand(self, thing: Thing) -> None:
        self.thing = thing
        self._keep_place()
        self.shell.page.stand_on(thing.path)

    def _keep_place(self) -> None:
        alike = self._alike()
        if self.thing in alike:
            self._count, self._place = len(alike), alike.index(self.thing)

    # Drawing

    def draw(self, frame: Frame, area: Area) -> None:
        width = area.width if area.width < 60 else min(max(46, area.width * 2 // 5), 64)
        x, height = area.x + area.width - width, area.height
        frame.box(x, area.y, width, height, self.thing.label)
        fields = self.lines
        self.room = max(height - 3 - TOLD, 1)
        labels = min(max((len(line.label) for line in fields), default=0), width * 2 // 5)
        for row, index in enumerate(self.rows.shown(len(fields), self.room)):
            self._field(frame, x + 2, area.y + 1 + row, width - 4, labels, index)
        more = len(fields) - self.rows.first - self.room
        frame.text(x, area.y + height - 2 - TOLD, "├" + "─" * (width - 2) + "┤", "line")
        if more > 0:
            frame.right(x + width - 2, area.y + height - 2 - TOLD, f" {more} more below ", "dim")
        self._told(frame, x + 2, area.y + height - 1 - TOLD, width - 4)

    def _field(self, frame: Frame, x: int, y: int, width: int, labels: int, index: int) -> None:
        line, here = self.lines[index], index == self.rows.at
        frame.text(x, y, line.label, "key" if here else "text", labels)
        column, room = x + labels + 2, width - labels - 2
        if here and self.editor is not None:
            shown, at = self.editor.shown(room)
            frame.fill(column, y, room, 1, "field")
            frame.text(column, y, shown, "field", room)
            frame.cursor = (column + at, y)
            return
        note = "" if line.origin == "typed" else line.origin
        shown, style = (line.shown, line.origin) if line.shown else (line.reason or "nothing", "dim")
        end = frame.text(column, y, shown, style, room - (len(note) + 1 if note else 0))
        frame.right(x + width, y, note, "dim")
        if here:
            frame.restyle(x, y, max(end - x, 1), "cursor")
            frame.cursor = (x, y)

    def _told(self, frame: Frame, x: int, y: int, width: int) -> None:
        line = self.line
        if self.refused:
            told = [("wrong", self.refused)]
        else:
            meant = self.meant if self.editor is not None else line.understood
            told = [("good", f"= {meant}")] if meant else []
            told += [("dim", f"default: {line.reason}")] if line.origin == "default" and line.reason else []
            told += [("text", line.help)] if line.help else []
            told += [("dim", f"usual {line.usual_range}")] if line.usual_range else []
            told += [("dim", f"from {line.source}")] if line.source else []
        rows = [(style, row) for style, text in told for row in wrapped(text, width)]
        for at, (style, row) in enumerate(rows[:TOLD]):
            frame.text(x, y + at, row, style, width)

    def spoken(self) -> str:
        line = self.line
        if self.editor is not None:
            return f"{line.label}: {self.editor.text}, {self.refused or 'being typed'}"
        said = f"{line.label}: {line.shown or line.reason or 'nothing'}"
        return f"{said}, {line.origin}" if line.origin else said

    def hint(self) -> str:
        if self.editor is not None:
            return "Enter take  Esc back"
        keys = self.shell.key_name
        steps = f"{keys('raise')} {keys('lower')} step"
        return f"type a value  {keys('accept')} change it  {steps}  {keys('default')} default  Esc done"

    # Keys

    @property
    def takes_letters(self) -> bool:
        return True

    def act(self, action: str) -> bool:
        if self.editor is not None:
            return self._act_typing(action)
        self.refused = ""
        match action:
            case "accept":
                self._open()
            case "raise" | "lower":
                self._step(1 if action == "raise" else -1)
            case "default":
                self._to_default()
            case "add":
                self.shell.add_at("", self.thing.path)
            case "duplicate" | "remove":
                self.shell.close(self)
                self.shell.change_thing(action, self.thing.path)
            case _:
                return self.rows.move(FIELD_KEYS.get(action, action), len(self.lines), self.room)
        return True

    def _act_typing(self, action: str) -> bool:
        if action == "accept":
            if self._take():
                self.rows.move("down", len(self.lines), self.room)
            return True
        if action == "close":
            self._stop_typing()
            return True
        action = FIELD_KEYS.get(action, action)
        if action in ("up", "down", "page_up", "page_down"):
            return not self._take() or self.rows.move(action, len(self.lines), self.room)
        return action in ("left", "right", "first", "last")

    def _open(self) -> None:
        """Into the field: a list where words are expected, else the editor on what stands there."""
        line = self.line
        if line.choices:
            items = [Item(choice, choice) for choice in line.choices]
            self.shell.over(PickList(self.shell, line.label, items, self._picked, at=line.shown))
        else:
            self.editor = Editor(line.shown if line.origin == "typed" else "")

    def _picked(self, value: str) -> None:
        self.editor = Editor(value)
        self._take()

    def _take(self) -> bool:
        """What was typed goes onto the desk; whether it was understood."""
        assert self.editor is not None and self.shell.desk is not None
        line = self.line
        found = self.shell.desk.set(line.path, self.editor.text.strip())
        if isinstance(found, Refusal):
            self.refused = found.text
            return False
        self._stop_typing()
        self.shell.edited()
        self.shell.say(f"{line.label}: {found.text}", "good")
        return True

    def key(self, key: str) -> bool:
        if self.editor is None or not self.editor.key(key):
            return False
        self._follow()
        return True

    def type(self, text: str) -> bool:
        if self.editor is None:
            self.editor = Editor()
        self.editor.type(text)
        self._follow()
        return True

    def _follow(self) -> None:
        """The answer follows what is typed, as far as it can be understood."""
        assert self.editor is not None and self.shell.desk is not None
        self.refused, text = "", self.editor.text.strip()
        found = self.shell.desk.try_out(self.line.path, text) if text else None
        if found is None:
            self.shell.desk.drop_trial()
        self.meant = found.text if isinstance(found, Understood) and found.text != text else ""

    def _stop_typing(self) -> None:
        self.editor, self.refused, self.meant = None, "", ""
        if self.shell.desk is not None:
            self.shell.desk.drop_trial()

    def leave(self) -> None:
        self._stop_typing()

    def paste(self, text: str) -> bool:
        if self.editor is None:
            self.editor = Editor()
        left = self.editor.paste(text)
        self._follow()
        if left:
            self.shell.say(f"Of {left + 1} lines pasted the first is taken: a field holds one.")
        return True

    def _step(self, steps: int) -> None:
        desk = self.shell.desk
        assert desk is not None
        found = desk.raised(self.line.path, steps)
        if isinstance(found, Refusal):
            self.refused = found.text
        else:
            self.shell.edited()
            self.shell.say(f"{self.line.label}: {found.text}", "good")

    def _to_default(self) -> None:
        desk = self.shell.desk
        assert desk is not None
        if self.line.origin == "typed":
            desk.back(self.line.path)
            self.shell.edited()
