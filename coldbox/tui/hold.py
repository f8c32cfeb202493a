"""The hold time while one edits: computed in a process of its own, which drops what it does when asked anew."""

from __future__ import annotations

from contextlib import suppress
from typing import TYPE_CHECKING, Any

from coldbox.errors import ColdboxError, Stopped
from coldbox.tui.aside import Aside

if TYPE_CHECKING:
    from multiprocessing.connection import Connection

    from coldbox.timeline.results import Outage, Trip

DRAWS = 500
_Asked = tuple[int, str, dict[str, Any]]


class Hold:
    """What the process last said of the outage, and of the trip where there is one.

    wanted: whether to compute at all.
    """

    def __init__(self, *, wanted: bool = True) -> None:
        self.wanted = wanted
        self.outage: Outage | None = None
        self.trip: Trip | None = None
        self.trouble = ""
        self.stale = False
        self._number = 0
        self._waiting = False
        self._aside: Aside | None = None
        self._next: _Asked | None = None  # to be sent as soon as the process listens
        self._listens = False
        self._told_to_stop = False

    @property
    def busy(self) -> bool:
        """Whether an answer is still to come."""
        return self._waiting

    def ask(self, path: str, document: dict[str, Any]) -> None:
        """A new state of the project: what is shown is stale until its answer has come."""
        self.tick()
        self._number += 1
        self.stale = self.outage is not None
        if not self.wanted:
            return
        self._next, self._waiting = (self._number, path, document), True
        if self._aside is None or not self._aside.alive:
            self._aside, self._listens, self._told_to_stop = Aside(work), False, False
        self._send()

    def _send(self) -> None:
        """The newest question, once the process listens; else a word that it may stop. No key waits for a full pipe."""
        if self._aside is None or self._next is None:
            return
        try:
            if self._listens:
                self._aside.pipe.send(self._next)
                self._next, self._listens = None, False
            elif not self._told_to_stop:
                self._aside.pipe.send(None)
                self._told_to_stop = True
        except OSError:
            self._ended()

    def _ended(self) -> None:
        if self._aside is not None:
            self._aside.end()
        self._aside, self._waiting, self._next = None, False, None
        self.trouble = "the hold time's process has ended"

    def tick(self) -> bool:
        """Takes in what has come; whether there was anything."""
        news = False
        while self._aside is not None:
            try:
                if not self._aside.pipe.poll():
                    break
                number, what, found = self._aside.pipe.recv()
            except (EOFError, OSError):
                self._ended()
                return True
            if what == "listens":
                self._listens, self._told_to_stop = True, False
                self._send()
                continue
            if number != self._number:
                continue
            news = True
            self._take(what, found)
        return news

    def _take(self, what: str, found: Any) -> None:
        if what == "done":
            self._waiting = False
        elif what == "trouble":
            self.outage, self.trip, self.trouble, self.stale = None, None, found, False
        elif what == "trip":
            self.trip = found
        else:
            self.outage, self.trouble, self.stale = found, "", False

    def words(self) -> str:
        """How long it holds, for one line."""
        from coldbox.paper.sure import duration, eight_in_ten

        if self.trouble:
            return "hold time: not to be computed"
        found = self.outage
        if found is None:
            return "hold time is coming" if self._waiting else "hold time not computed"
        spread = found.spread
        sure = f", {eight_in_ten(spread.hours, found.horizon_h)}" if spread is not None else ", spread is coming"
        before = "was: " if self.stale else ""
        if not found.limits:
            return f"{before}holds: nothing has a limit"
        if found.hold_h is None:
            return f"{before}holds beyond {duration(found.horizon_h)}{sure}"
        return f"{before}holds {duration(found.hold_h)}{sure}"

    def stop(self) -> None:
        """Ends the process at once."""
        if self._aside is not None:
            self._aside.end()
        self._aside, self._waiting, self._next = None, False, None


def work(pipe: Connection) -> None:
    """What the process does: always the newest question, first without draws, then with them."""
    while True:
        pipe.send((0, "listens", None))
        asked = pipe.recv()
        while asked is None:  # told to stop when it had just done so
            asked = pipe.recv()
        with suppress(Stopped):
            _answer(pipe, asked)


def _answer(pipe: Connection, asked: _Asked) -> None:
    from coldbox.project import codec, shop
    from coldbox.project.resolve import resolve
    from coldbox.spread import hold

    number, path, document = asked
    try:
        raw, problems = codec.of_document(document, path)
        project = resolve(raw, problems, shop.library(path))

        def go_on(share: float) -> bool:
            del share
            return not pipe.poll()

        for count in (0, DRAWS):
            pipe.send((number, "outage", hold.run(project, count=count, go_on=go_on)))
            trip = None if project.trip is None else hold.run(project, "trip", count=count, go_on=go_on)
            pipe.send((number, "trip", trip))
    except Stopped:
        raise
    except ColdboxError as error:
        pipe.send((number, "trouble", str(error)))
    pipe.send((number, "done", None))
