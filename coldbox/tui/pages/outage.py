"""The outage: how long it holds, who fails first, how sure that is, and the temperatures on the way."""

from __future__ import annotations

from typing import Literal

from coldbox.paper import outage as paper
from coldbox.paper.document import Document
from coldbox.timeline.results import Outage
from coldbox.tui.desk import Desk
from coldbox.tui.pages.printed import Printed


class Page(Printed):
    """The outage as the report prints it."""

    title = "Outage"
    topic = "outage"
    nothing = "Nothing is computed yet."

    def result(self, desk: Desk) -> Outage | None:
        return desk.hold.outage

    def document(self, found: Outage, system: Literal["SI", "IP"]) -> Document:
        return paper.document(found, system)
