"""The trip: its legs and stops as a strip under the temperatures, and whether everything keeps its limits."""

from __future__ import annotations

from typing import Literal, cast

from coldbox.paper import trip as paper
from coldbox.paper.document import Document
from coldbox.timeline.results import Outage, Trip
from coldbox.tui.desk import Desk
from coldbox.tui.pages.along import Along


class Page(Along):
    """The same curve on the trip's clock."""

    where = "trip"
    title = "Trip"
    topic = "trip"
    nothing = (
        "This project has no trip. A trip is legs and stops: write [trip] with [[trip.legs]] into the file; coldbox"
        " sources --fields trip.legs says what a leg may hold."
    )

    def result(self, desk: Desk) -> Outage | None:
        return desk.hold.trip if desk.project is not None and desk.project.trip is not None else None

    def document(self, found: Outage, system: Literal["SI", "IP"]) -> Document:
        return paper.document(cast(Trip, found), system)

    def _never(self, desk: Desk) -> bool:
        return desk.project is not None and desk.project.trip is None
