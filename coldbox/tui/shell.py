"""What holds for all pages: which page, what stands over it, what a key means, the lines that are always in sight.

Nothing here knows the toolkit that paints. A key comes in, a frame is asked for.
"""

from __future__ import annotations

from collections.abc import Callable
from pathlib import Path
from typing import TYPE_CHECKING

from coldbox.errors import ColdboxError
from coldbox.tui import status
from coldbox.tui.frame import Frame, wrapped
from coldbox.tui.keymap import PAGES
from coldbox.tui.layer import Area, Layer
from coldbox.tui.settings import THEMES, Settings, load_settings

if TYPE_CHECKING:  # what computes is imported when there is a project: the first page needs none of it
    from coldbox.tui.desk import Desk
    from coldbox.tui.sheets.pick import Item
    from coldbox.tui.things import Thing

BEGIN_NO_VALUE = ("help", "palette")  # their usual keys, ? and :, begin no value
NEEDED = (40, 12)  # columns and lines below which only the answer is shown


KINDS = {
    "": "project", "faces": "face", "people": "people", "ventilation": "fresh air", "lots": "goods", "packs": "pack",
    "site": "place and weather", "quoted": "quoted figure",
}  # fmt: skip
ABOUT = {
    "doors": "an opening: leaf, curtain, traffic", "panels": "a stretch of a face that is built otherwise",
    "lots": "a product that arrives, is stored, or both", "packs": "ice, gel or dry ice",
    "people": "who works inside, and when", "lights": "lamps", "motors": "fans of machines, conveyors",
    "constructions": "what a wall is made of", "neighbours": "a room behind a face",
    "trucks": "fork lifts, pallet trucks", "heaters": "floor, drain, pressure port", "ventilation": "on purpose",
}  # fmt: skip


class Shell:
    """The screens as a whole."""

    def __init__(
        self,
        folder: Path,
        settings: Settings,
        *,
        theme: str = "",
        ascii_drawing: bool = False,
        ascii_letters: bool = False,
    ) -> None:
        self.folder = folder
        self.settings = settings
        self.keymap = settings.keymap
        self.theme = theme or settings.theme
        self.ascii_drawing, self.ascii_letters = ascii_drawing, ascii_letters
        self.desk: Desk | None = None
        self.pages: dict[str, Layer] = {}
        self.sheets: list[Layer] = []
        self.said, self.said_style = "", "dim"
        self.clipboard = ""
        self.exit_code: int | None = None
        self.unsaved_edit = False
        self.with_hold = True  # whether a project on the desk gets its hold time
        self.last_words: list[str] = []
        self.page: Layer = Layer(self)

    @property
    def top(self) -> Layer:
        """The layer that gets the keys."""
        return self.sheets[-1] if self.sheets else self.page

    @classmethod
    def start(
        cls,
        file: str | None,
        folder: Path,
        *,
        theme: str = "",
        ascii_drawing: bool = False,
        ascii_letters: bool = False,
    ) -> Shell:
        """The screens as they begin: with a project, or with the projects of the folder. Raises FileTrouble."""
        settings = load_settings()
        shell = cls(folder, settings, theme=theme, ascii_drawing=ascii_drawing, ascii_letters=ascii_letters)
        if file is None:
            shell.go("first")
        else:
            shell.with_hold = False
            shell.open(Path(file))
        if settings.problems:
            shell.say(settings.problems[0], "warn")
        return shell

    def begin_hold(self) -> None:
        """The first picture stands: now there is time for what takes longer."""
        self.with_hold = True
        if self.desk is not None:
            self.desk.begin_hold()

    def key_name(self, action: str) -> str:
        """The first key of an action, for a line that has no room for all."""
        return self.keymap.shown(action).split(" or ")[0]

    # Moving about

    def go(self, name: str) -> None:
        """Another page."""
        if name not in self.pages:
            from coldbox.tui.pages import made

            self.pages[name] = made(name, self)
        if self.pages[name] is not self.page:
            self.page.leave()
            self.page = self.pages[name]
            self.page.enter()

    def over(self, sheet: Layer) -> None:
        """A sheet over what is there."""
        self.sheets.append(sheet)
        sheet.enter()

    def close(self, sheet: Layer) -> None:
        """A sheet goes."""
        if sheet in self.sheets:
            self.sheets.remove(sheet)
            sheet.leave()

    def say(self, text: str, style: str = "dim") -> None:
        """A sentence for the line above the answer; it stays until the next key."""
        self.said, self.said_style = text, style

    # Keys

    def key(self, key: str, character: str | None) -> None:
        """A key: letters into the text being typed, all others by the map of keys."""
        self.say("")
        letter = character if character is not None and len(character) == 1 and character.isprintable() else None
        if letter is not None and self.top.typing:
            self.top.type(letter)
            return
        action = self.keymap.action(self.top.where, key)
        if letter is not None and self.top.takes_letters and not self._bound_here(action, key):
            self.top.type(letter)
            return
        if action is not None and self.act(action):
            return
        if self.top.key(key) or (letter is not None and self.top.type(letter)):
            return
        if action is None and letter is not None:
            self.say(f'"{letter}" does nothing here. {self.keymap.shown("help")} says what does.')

    def _bound_here(self, action: str | None, key: str) -> bool:
        """Whether a letter is a command even where letters begin a text: bound to just this place, or help."""
        return action in BEGIN_NO_VALUE or action != self.keymap.action("everywhere", key)

    def paste(self, text: str) -> None:
        """Text from the clipboard."""
        self.say("")
        if not self.top.paste(text):
            self.say("Nothing here takes text. Open a field with Enter first, then paste.")

    def act(self, action: str) -> bool:
        """Carry out an action: the topmost layer's own, else what holds everywhere."""
        try:
            return self.top.act(action) or self._act(action)
        except ColdboxError as error:
            self.say(str(error), "wrong")
            return True

    def _act(self, action: str) -> bool:
        if action.startswith("page.") and action[5:] in PAGES:
            return self._turn(action[5:])
        match action:
            case "close":
                return self._close()
            case "quit":
                self.ask_to_leave(self._end)
            case "help":
                self._read("help", "Help")
            case "keys":
                self._read("keys", "Keys")
            case "palette":
                from coldbox.tui.sheets.palette import palette

                self.over(palette(self))
            case "theme":
                self.theme = THEMES[(THEMES.index(self.theme) + 1) % len(THEMES)]
                self.say(f'Colours: {self.theme}. To keep it: theme = "{self.theme}" in {self.settings.path}')
            case "jump":
                self._jump()
            case "copy":
                self._copy()
            case "write":
                self._write_to_file()
            case "next_page" | "previous_page":
                return self._turn_by(1 if action == "next_page" else -1)
            case _:
                return self.desk is not None and self._act_on(self.desk, action)
        return True

    def _act_on(self, desk: Desk, action: str) -> bool:
        match action:
            case "save":
                from coldbox.tui.sheets.leaving import save

                save(self, desk)
            case "undo" | "redo":
                what = desk.undo() if action == "undo" else desk.redo()
                none = "Nothing left to undo." if action == "undo" else "Nothing to redo."
                self.say(f"{action.capitalize()}: {what}" if what else none)
                self.edited()
            case "units":
                desk.system = "IP" if desk.system == "SI" else "SI"
                self.say(f"Figures in {desk.system}. The file stays as it is written.")
            case _:
                return False
        return True

    def _turn(self, name: str) -> bool:
        if self.desk is None:
            self.say("Open a project first: move to it and press Enter.")
            return True
        for sheet in reversed(self.sheets[:]):
            self.close(sheet)
        self.go(name)
        return True

    def _turn_by(self, step: int) -> bool:
        now = next((name for name in PAGES if self.pages.get(name) is self.page), None)
        return now is not None and self._turn(PAGES[(PAGES.index(now) + step) % len(PAGES)])

    def _close(self) -> bool:
        if self.sheets:
            self.close(self.top)
        elif self.desk is not None:
            self.ask_to_leave(self.show_folder)
        else:
            self.say(f"{self.keymap.shown('quit')} leaves.")
        return True

    def _read(self, which: str, heading: str) -> None:
        from coldbox.tui.sheets import help as told
        from coldbox.tui.sheets.reading import Reading

        if isinstance(self.top, Reading):
            self.close(self.top)
        below = self.top
        lines = (lambda: told.about(self, below)) if which == "help" else (lambda: told.keys(self))
        self.over(Reading(self, heading, lines))

    def _jump(self) -> None:
        from coldbox.tui.sheets.jump import Jump

        targets = self.top.targets()
        if targets:
            self.over(Jump(self, targets))
        else:
            self.say("There is nothing to jump to here.")

    # Things of the project

    def things(self) -> tuple[Thing, ...]:
        """Everything that has fields."""
        from coldbox.tui.things import things

        return () if self.desk is None else things(self.desk.document)

    def _thing(self, path: str) -> Thing | None:
        return next((one for one in self.things() if one.path == path), None)

    def described(self, path: str) -> str:
        """A thing in words: what it is, where it is."""
        found = self._thing(path)
        if found is None:
            return path
        kind = KINDS.get(found.table, found.table.removesuffix("s"))
        words = kind if found.label == kind else f"{kind} {found.label}"
        return f"{words}, on the {found.face}" if found.face and found.table != "faces" else words

    def go_to(self, path: str) -> None:
        """Stand on a thing in the carton, and open it."""
        self._turn("carton")
        self.page.stand_on(path)
        self.open_sheet(path)

    def open_sheet(self, path: str) -> None:
        """The sheet of a thing."""
        from coldbox.tui.sheets.edit import EditSheet

        found = self._thing(path)
        if found is None:
            self.say("There are no fields here.")
        else:
            self.over(EditSheet(self, found))

    def add_at(self, face: str, path: str = "") -> None:
        """Ask what to add, and open it. face: where the cursor is, "" for inside; path: the thing it is on."""
        from coldbox.tui.document import ADDABLE
        from coldbox.tui.sheets.pick import Item, PickList

        tables = (*ADDABLE, "constructions", "neighbours")
        items = [Item(KINDS.get(table, table.removesuffix("s")), table, ABOUT.get(table, "")) for table in tables]
        other = [one for one in ("box", "outage", "trip") if one != path]
        items = [*self._inside(path), *items, *(item for one in other for item in self._inside(one))]
        heading = f"Add, on the {face}" if face else "Add"
        self.over(PickList(self, heading, items, lambda table: self._add(table, face)))

    def _inside(self, path: str) -> list[Item]:
        """What can be added in a thing."""
        from coldbox.tui.sheets.pick import Item
        from coldbox.tui.things import addable, thing

        document = {} if self.desk is None else self.desk.document
        found = thing(document, path) if path else None
        return [] if found is None else [Item(f"{word} of {found.label}", at) for at, word in addable(document, found)]

    def _add(self, table: str, face: str) -> None:
        if self.desk is None or self._reads_only():
            return
        self._then_open(self.desk.add(table, "" if (table, face) == ("doors", "floor") else face))

    def _then_open(self, path: str) -> None:
        self.edited()
        self.page.stand_on(path)
        self.open_sheet(path)

    def change_thing(self, action: str, path: str) -> None:
        """Duplicate or remove a thing."""
        desk = self.desk
        if desk is None or self._reads_only():
            return
        from coldbox.tui.things import doubles, thing

        found = thing(desk.document, path)
        if found is None or not doubles(found):
            self.say(f"The {self.described(path)} stays: only what stands on the box or in it can be doubled or go.")
        elif action == "duplicate":
            self._then_open(desk.duplicate(path))
        else:
            words = self.described(path)
            desk.remove(path)
            self.edited()
            self.say(f"Gone: {words}. {self.keymap.shown('undo')} brings it back.")

    def _reads_only(self) -> bool:
        if self.desk is not None and self.desk.read_only:
            self.say(f"Open to read only. {self.desk.held_by}", "warn")
            return True
        return False

    # The project

    def open(self, path: Path) -> None:
        """A project on the desk, and its carton."""
        from coldbox.tui.sheets.leaving import opened

        opened(self, path)

    def leave_pages(self) -> None:
        """Forget the pages of the project before; what they have running is stopped."""
        for page in self.pages.values():
            page.leave()
        self.pages.clear()

    def show_folder(self) -> None:
        """Put the project away and show the projects of the folder."""
        if self.desk is not None:
            self.desk.close()
            self.desk = None
        self.leave_pages()
        for sheet in reversed(self.sheets[:]):
            self.close(sheet)
        self.go("first")

    def edited(self) -> None:
        """The document is another: a journal is due, and what hangs on it."""
        self.unsaved_edit = True
        for page in self.pages.values():
            page.changed()
        for sheet in self.sheets[:]:
            sheet.changed()

    def ask_to_leave(self, then: Callable[[], None]) -> None:
        """Go on with `then`; where work is not saved, ask first."""
        from coldbox.tui.sheets.leaving import ask

        ask(self, then)

    def _end(self) -> None:
        self.exit_code = 0

    def write_journal(self) -> None:
        """Keep unsaved work outside the shared folder."""
        if self.desk is not None and self.desk.dirty:
            self.desk.write_journal()

    def close_down(self, *, keep_work: bool = False) -> None:
        """The end, orderly or not: unsaved work is kept where asked, what runs is stopped, the lock is given back."""
        for layer in (*self.sheets, *self.pages.values()):
            layer.leave()
        if self.desk is None:
            return
        if keep_work and self.desk.dirty:
            self.desk.write_journal()
            self.last_words.append(
                f"coldbox: unsaved work on {self.desk.path} is kept; it is offered when you open it again."
            )
        self.desk.close(keep_journal=keep_work)

    @property
    def busy(self) -> bool:
        """Whether something runs that will have news."""
        return any(layer.busy for layer in (self.page, *self.sheets)) or (self.desk is not None and self.desk.busy)

    def tick(self) -> bool:
        """Ask what runs for news; whether there is any."""
        news = [layer.tick() for layer in (self.page, *self.sheets)]
        return (self.desk is not None and self.desk.tick()) or any(news)

    # Copy, and the other way to the same

    def _copy(self) -> None:
        text = self.top.copied()
        if not text:
            self.say("There is nothing to copy here.")
            return
        self.clipboard = text
        instead = self.keymap.shown("write")
        self.say(f"Sent to the clipboard of your terminal. If it does not arrive, {instead} writes it to a file.")

    def _write_to_file(self) -> None:
        from coldbox.tui.sheets.pick import Asked

        text = self.top.copied()
        if not text:
            self.say("There is nothing to write here.")
            return
        self.over(Asked(self, "Write to file", "Name of the file for this text:", "coldbox.txt", self._written(text)))

    def _written(self, text: str) -> Callable[[str], str]:
        def write(name: str) -> str:
            from coldbox.project import store

            path = self.folder / name
            if not name or path.exists():
                return f"{path} is already there. Another name will do." if name else "A name is needed."
            try:
                store.write_text(path, text + "\n")
            except ColdboxError as error:
                return str(error)
            self.say(f"Written to {path}", "good")
            return ""

        return write

    # The picture

    def frame(self, width: int, height: int) -> Frame:
        """The whole screen."""
        frame = Frame(width, height, ascii_drawing=self.ascii_drawing, ascii_letters=self.ascii_letters)
        if width < NEEDED[0] or height < NEEDED[1]:
            self._too_small(frame)
            return frame
        status.head(frame, self)
        foot = 3 if self.desk is not None else 2
        area = Area(0, 1, width, height - 1 - foot)
        self.page.draw(frame, area)
        for sheet in self.sheets:
            sheet.draw(frame, area)
        status.foot(frame, self, foot)
        return frame

    def _too_small(self, frame: Frame) -> None:
        said = f"{frame.width} x {frame.height} is too small: {NEEDED[0]} x {NEEDED[1]} will do. Nothing is lost."
        lines = [(line, "text") for line in wrapped(said, frame.width)]
        if self.desk is not None:
            lines = [(status.needs(self.desk), "title"), *lines]
        for y, (line, style) in enumerate(lines[: frame.height]):
            frame.text(0, y, line, style)
