"""The outage: how long it holds, who fails first, how sure that is, and the temperatures on the way."""

from __future__ import annotations

from typing import Literal

from coldbox.paper import outage as paper
from coldbox.paper.document import Document
from coldbox.timeline.results import Outage
from coldbox.tui.desk import Desk, Refusal
from coldbox.tui.pages.along import Along
from coldbox.units import show


class Page(Along):
    """Keys move the hour the power goes, open a door, bring ice; the answer follows."""

    where = "outage"
    title = "Outage"
    topic = "outage"
    nothing = "Nothing is computed yet."

    def result(self, desk: Desk) -> Outage | None:
        return desk.hold.outage

    def document(self, found: Outage, system: Literal["SI", "IP"]) -> Document:
        return paper.document(found, system)

    def act(self, action: str) -> bool:
        desk = self.shell.desk
        if desk is None or action not in ("earlier", "later", "door", "ice"):
            return super().act(action)
        if desk.read_only:
            self.shell.say(f"Open to read only. {desk.held_by}", "warn")
            return True
        if action in ("earlier", "later"):
            start = 14.0 if desk.project is None else float(desk.project.outage.at)
            clock = show((start + (1.0 if action == "later" else -1.0)) % 24.0, "clock")
            told = desk.set("outage.at", clock)
            said = told.text if isinstance(told, Refusal) else f"Power off at {clock}"
        elif action == "door":
            said = f"{desk.open_door(self.at_h)} open for 10 min, {self.at_h:g} h after the power goes"
        else:
            said = f"{desk.bring_ice(self.at_h)}, 5 kg, {self.at_h:g} h after the power goes"
        self.shell.say(said, "good")
        self.shell.edited()
        return True

    def hint(self) -> str:
        keys = self.shell.keymap.shown
        return f"{keys('door')} door  {keys('ice')} ice  < > hour"
