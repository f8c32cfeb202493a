"""The carton: the box unfolded, with everything on it and in it, beside it the account by size."""

from __future__ import annotations

from functools import partial

from coldbox.account.entry import Load
from coldbox.paper.drawing.canvas import Span
from coldbox.paper.drawing.carton import Drawing, carton
from coldbox.paper.load import figure
from coldbox.tui.desk import Desk
from coldbox.tui.frame import Frame, wrapped
from coldbox.tui.layer import Area, Layer
from coldbox.tui.pages.load import ranked
from coldbox.tui.sheets.jump import Target
from coldbox.tui.shell import Shell

ACCOUNT = 29  # columns of the account beside the carton


class Page(Layer):
    """Home."""

    where = "carton"
    title = "Carton"
    topic = "carton"

    def __init__(self, shell: Shell) -> None:
        super().__init__(shell)
        self.at = "faces.front"
        self._places: dict[str, tuple[int, int, int, int]] = {}
        self._drawn: Drawing | None = None  # of this load, in this manner
        self._rows: list[list[Span]] = []
        self._of: Load | None = None
        self._how: tuple[object, ...] = ()

    def draw(self, frame: Frame, area: Area) -> None:
        desk = self.shell.desk
        if desk is None or desk.project is None or desk.load is None:
            self._nothing(frame, area)
            return
        beside = ACCOUNT if area.width >= 70 else 0
        beside = min(max(beside, area.width // 4), 44) if beside else 0
        width = area.width - beside - (1 if beside else 0)
        drawing = self._drawing(desk, width, area.height, ascii_only=frame.ascii_drawing)
        frame.paste(area.x, area.y, self._rows, width, area.height)
        self._places = {
            path: (area.x + place.x, area.y + place.y, place.width, place.height)
            for path, place in drawing.places.items()
        }
        if self.at not in self._places:
            self.at = next(iter(self._places), "")
        self._mark(frame)
        if beside:
            self._account(frame, Area(area.x + width + 1, area.y, beside, area.height))

    def _drawing(self, desk: Desk, width: int, height: int, *, ascii_only: bool) -> Drawing:
        """The carton; drawn anew where the load, the room or the units are others than before."""
        assert desk.project is not None and desk.load is not None
        how = (width, height, desk.system, ascii_only)
        if self._drawn is None or desk.load is not self._of or how != self._how:
            self._drawn = carton(desk.project, desk.load, width, height, system=desk.system, ascii_only=ascii_only)
            self._rows, self._of, self._how = self._drawn.canvas.rows(), desk.load, how
        return self._drawn

    def _nothing(self, frame: Frame, area: Area) -> None:
        desk = self.shell.desk
        problems = desk.problems if desk is not None else ()
        frame.text(area.x + 2, area.y + 1, "Nothing computes yet. What is missing or wrong:", "text", area.width - 4)
        y = area.y + 3
        for problem in problems:
            for style, text in (("key", problem.path or problem.file), ("text", problem.text)):
                for line in wrapped(text, area.width - 6):
                    if y < area.y + area.height:
                        frame.text(area.x + 2, y, line, style)
                        y += 1
        frame.cursor = (area.x + 2, area.y + 1)

    def _mark(self, frame: Frame) -> None:
        """The place under the cursor: its uppermost line reversed, which costs the line to the terminal least."""
        if self.at not in self._places:
            return
        x, y, width, _ = self._places[self.at]
        frame.restyle(x, y, width, "cursor")
        frame.cursor = (x, y)

    def _account(self, frame: Frame, area: Area) -> None:
        """Entries by size, with their share of the day; what does not fit in one line."""
        desk = self.shell.desk
        assert desk is not None and desk.load is not None
        load, right = desk.load, area.x + area.width - 1
        entries, hour = ranked(load), load.peak_hour
        frame.text(area.x, area.y, f"peak hour {hour}-{hour + 1}", "dim", area.width)
        frame.right(right, area.y, figure(float(load.hours_w[hour]), "power", desk.system, 3), "title")
        room = area.height - 1
        shown = entries if len(entries) <= room else entries[: room - 1]
        for row, entry in enumerate(shown):
            watts = figure(entry.hours_w[hour], "power", desk.system, 3)
            here = belongs(entry.id, self.at)
            begin = frame.right(right, area.y + 1 + row, watts, "key" if here else "text")
            frame.text(area.x, area.y + 1 + row, entry.label, "key" if here else "text", begin - area.x - 1)
        if len(shown) < len(entries):
            rest = sum(float(entry.hours_w[hour]) for entry in entries[len(shown) :])
            y = area.y + area.height - 1
            frame.text(area.x, y, f"{len(entries) - len(shown)} smaller", "dim")
            frame.right(right, y, figure(rest, "power", desk.system, 3), "dim")

    # Keys

    def act(self, action: str) -> bool:
        if action in ("left", "right", "up", "down"):
            self.at = beside(self._places, self.at, action) or self.at
            return True
        if action in ("first", "last") and self._places:
            self.at = list(self._places)[0 if action == "first" else -1]
            return True
        match action:
            case "accept":
                self.shell.open_sheet(self.at)
            case "add":
                self.shell.add_at(self._face())
            case "duplicate" | "remove":
                self.shell.change_thing(action, self.at)
            case _:
                return False
        return True

    def _face(self) -> str:
        """The face the cursor is on, or what it is on stands on; "" inside."""
        found = next((one for one in self.shell.things() if one.path == self.at), None)
        return "" if found is None else found.face

    def targets(self) -> list[Target]:
        return [Target(x, y, partial(self.stand_on, path)) for path, (x, y, _, _) in self._places.items()]

    def stand_on(self, path: str) -> None:
        self.at = path

    def spoken(self) -> str:
        return self.shell.described(self.at)

    def hint(self) -> str:
        keys = self.shell.key_name
        return f"{keys('accept')} edit  {keys('add')} add"


def belongs(entry: str, path: str) -> bool:
    """Whether an entry of the account comes of a thing: "doors.main.traffic" of "doors.main", "sun.front" of a face."""
    name = path.removeprefix("faces.")
    return entry in (name, f"sun.{name}") or entry.startswith((f"{name}.", f"sun.{name}."))


def beside(places: dict[str, tuple[int, int, int, int]], at: str, way: str) -> str:
    """The nearest place in a direction, those straight ahead before those aside; "" where there is none."""
    if at not in places:
        return next(iter(places), "")
    x, y = _middle(places[at])
    across = way in ("left", "right")
    sign = -1 if way in ("left", "up") else 1
    best, found = float("inf"), ""
    for path, place in places.items():
        there_x, there_y = _middle(place)
        ahead = sign * ((there_x - x) if across else 2 * (there_y - y))
        aside = abs(2 * (there_y - y) if across else there_x - x)
        if path == at or ahead <= 0:
            continue
        cost = ahead + 2 * aside
        if cost < best:
            best, found = cost, path
    return found


def _middle(place: tuple[int, int, int, int]) -> tuple[float, float]:
    x, y, width, height = place
    return x + width / 2, y + height / 2
