"""The desk: one project as it is being edited, what it comes to, and the way back and forth.

No toolkit here, and nothing is computed twice: a change gives a new document, the document a project, the project its
account; the hold time follows from a process of its own.
"""

from __future__ import annotations

import os
import tomllib
from collections.abc import Sequence
from typing import Any

from coldbox.account.entry import Load
from coldbox.account.load import load
from coldbox.errors import BadProject, ColdboxError, Problem
from coldbox.project import codec, journal, lock, shop, store
from coldbox.project.linemap import refuse_deep_keys
from coldbox.project.model import Project
from coldbox.project.raw import Entered
from coldbox.project.resolve import resolve
from coldbox.project.revise import revised
from coldbox.record import Record
from coldbox.tui import document as documents
from coldbox.tui.document import Document, Refused, System
from coldbox.tui.hold import Hold
from coldbox.tui.least import called
from coldbox.tui.sheet import choices, library_value
from coldbox.tui.steps import stepped
from coldbox.tui.understood import understood


class Understood(Record):
    """What was made of a text, in the units of the screen; `path`, where it now stands: a thing may be called anew."""

    text: str
    path: str = ""


class Refusal(Record):
    """Why a text will not do, and what would."""

    text: str


def _document_of(text: str, path: str) -> Document:
    """The TOML data of a file. Raises BadProject with what is wrong where it is none."""
    try:
        refuse_deep_keys(text)
        return tomllib.loads(text.removeprefix("\ufeff"))
    except (ValueError, RecursionError):
        _, problems = codec.read(text, path)
        raise BadProject(problems) from None


def _after(hours: float) -> str:
    return f"{max(hours, 0.0):.4g} h"


class _Trial(Record):
    """A value that is being typed, and what it would come to; beside it what held before."""

    path: str
    text: str
    document: Document
    project: Project
    load: Load
    before: tuple[Project | None, Load | None]


class Desk:
    """A project on the desk. `document` is never changed in place; whoever keeps one keeps that state."""

    def __init__(self, path: str, text: str, stamp: store.Stamp | None, *, hold: bool = True) -> None:
        self.path = path
        self.read_only = False
        self.held_by = ""  # who holds the file, where that is somebody else
        self.comments_went = False  # the last save could not keep the hand's comments
        self._text, self._stamp = text, stamp
        self._lock: lock.Lock | None = None
        self._done: list[tuple[str, Document]] = []
        self._undone: list[tuple[str, Document]] = []
        self.document: Document = _document_of(text, path)
        self._saved = self.document
        self._offered: journal.Journal | None = None
        self.problems: Sequence[Problem] = ()
        self.project: Project | None = None
        self.load: Load | None = None
        self.accounts = 0  # how often an account was made: tests bound the work of a key
        self.system: System = "IP" if self.document.get("units") == "IP" else "SI"
        self.library = shop.library(path)
        self.shelf = shop.library(path)  # to pick from: what is wrong in a row that is not used is no problem
        self._known: dict[codec.Known, Entered] = {}
        self.hold = Hold(wanted=hold)
        self._trial: _Trial | None = None
        self._compute()

    # Opening and closing

    @classmethod
    def open(cls, path: str, *, hold: bool = True) -> Desk:
        """A project file on the desk; to read only where somebody else holds it. hold: with its hold time.

        Raises ColdboxError.
        """
        text, stamp = store.read(path)
        desk = cls(path, text, stamp, hold=hold)
        taken = lock.take(path)
        if isinstance(taken, lock.Lock):
            desk._lock = taken
        else:
            desk.read_only, desk.held_by = True, str(taken)
        desk._offered = journal.find(path)
        return desk

    def close(self, *, keep_journal: bool = False) -> None:
        """Put it away: what runs is stopped, the lock given back, the journal dropped unless it is to be kept."""
        self.hold.stop()
        if not keep_journal and not self.read_only:
            journal.drop(self.path)
        if self._lock is not None:
            self._lock.release()
            self._lock = None

    def take_over(self) -> None:
        """Edit although somebody else holds the file: both are told. Raises FileTrouble."""
        self._lock = lock.take_over(self.path)
        self.read_only, self.held_by = False, ""

    @property
    def name(self) -> str:
        """What the project is called."""
        return str(self.document.get("name") or os.path.splitext(os.path.basename(self.path))[0])

    @property
    def dirty(self) -> bool:
        """Whether there is work that the file does not have."""
        return self.document is not self._saved and self.document != self._saved

    # Work that an earlier session left

    @property
    def left_behind(self) -> journal.Journal | None:
        """Unsaved work of a session that ended without saving."""
        return self._offered

    def resume(self) -> None:
        """Go on with what was left behind."""
        if self._offered is not None:
            self._change("what was left unsaved", self._offered.document)

    def decline(self) -> None:
        """Forget what was left behind."""
        journal.drop(self.path, self._offered)
        self._offered = None

    def write_journal(self) -> None:
        """Keep unsaved work outside the shared folder."""
        if not self.read_only:
            journal.write(self.path, self.document, self._stamp, self._offered)

    # Saving

    def save(self, *, over: store.Stamp | None = None) -> None:
        """Write the file, whole or not at all; comments stay. Raises ChangedUnderneath when another was there first.

        over: the other version that was seen, and that this one shall replace (it stays beside the file).
        """
        if self.read_only:
            raise ColdboxError(f"{self.path} is open to read only: {self.held_by or 'somebody else holds it'}.")
        made = revised(self._text, self._saved, self.document)
        self._stamp = store.save(self.path, made.text, self._stamp if over is None else over)
        self._text, self._saved = made.text, self.document
        self.comments_went = not made.kept_comments
        journal.drop(self.path, self._offered)
        self._offered = None

    def save_as(self, path: str) -> None:
        """Write a new file and go on with that. Raises FileTrouble where one is there already."""
        made = revised(self._text, self._saved, self.document)
        stamp = store.save(path, made.text, None)
        self.close()
        taken = lock.take(path)
        self._lock = taken if isinstance(taken, lock.Lock) else None
        self.path, self.read_only, self.held_by = path, False, ""
        self._text, self._saved, self._stamp = made.text, self.document, stamp
        self._ask_hold()

    def lost(self) -> str:
        """Who has taken the file over, "" when nobody has; it is then open to read only. To be asked now and then."""
        by = None if self._lock is None else self._lock.lost()
        if by is None:
            return ""
        self.read_only, self.held_by, self._lock = True, f"taken over by {by}", None
        return self.held_by

    def moved_on(self) -> bool:
        """Whether the file is another than the one that was opened or saved last."""
        return store.moved_on(self.path, self._stamp)

    def reload(self) -> None:
        """Take what the file says now; what was on the desk can be had back by undo. Raises ColdboxError."""
        text, stamp = store.read(self.path)
        document = _document_of(text, self.path)
        self._text, self._stamp = text, stamp
        self._change("what the file said", document)
        self._saved = self.document

    # Changing

    def try_out(self, path: str, text: str) -> Understood | Refusal:
        """What a text would come to while it is typed: project and account follow, the document does not yet.

        `set` with the same text takes it; anything else, or `drop_trial`, lets it fall.
        """
        self.drop_trial()
        try:
            changed = documents.with_value(self.document, path, text, self.system)
        except Refused as refused:
            return Refusal(text=str(refused))
        made = self._made(changed)
        if not isinstance(made, Project):
            return Refusal(text=made[0].text if made else "")
        try:
            account = load(made)
        except ColdboxError as error:
            return Refusal(text=str(error))
        self.accounts += 1
        self._trial = _Trial(
            path=path, text=text, document=changed, project=made, load=account, before=(self.project, self.load)
        )
        self.project, self.load = made, account
        self.hold.stale = self.hold.outage is not None
        return self._understood(path, text, self.document, changed)

    def drop_trial(self) -> None:
        """What held before somebody began to type holds again."""
        if self._trial is not None:
            self.project, self.load = self._trial.before
            self.hold.stale = self.hold.busy and self.hold.outage is not None
            self._trial = None

    def set(self, path: str, text: str) -> Understood | Refusal:
        """A value as somebody typed it; a Refusal changes nothing."""
        trial = self._trial
        self.drop_trial()
        if trial is not None and (trial.path, trial.text) == (path, text):
            self._done.append((f"{path} = {text.strip()}", self.document))
            self._undone.clear()
            self.document = trial.document
            self.problems, self.project, self.load = (), trial.project, trial.load
            self._ask_hold()
            return self._understood(path, text, self._done[-1][1], self.document)
        try:
            changed = documents.with_value(self.document, path, text, self.system)
        except Refused as refused:
            return Refusal(text=str(refused))
        made = self._made(changed)
        mine = [] if isinstance(made, Project) else [one.text for one in made if one.path == path]
        if mine:
            return Refusal(text=mine[0])
        before = self.document
        self._change(f"{path} = {text.strip()}", changed, made)
        return self._understood(path, text, before, changed)

    def _understood(self, path: str, text: str, before: Document, after: Document) -> Understood:
        """What was made of a text under a path; of a name, where its thing stands from now on."""
        moved = documents.moved(before, after, path)
        said = understood(moved, documents.value_at(after, moved), self.system)
        return Understood(text=said or text.strip(), path=moved)

    def raised(self, path: str, steps: int) -> Understood | Refusal:
        """A value some steps up (or down), in the unit it is typed in."""
        try:
            field = documents.field_at(self.document, path)
            text = stepped(field, self.shown(path), steps, self.system, choices(self, field))
        except Refused as refused:
            return Refusal(text=str(refused))
        return self.set(path, text)

    def shown(self, path: str) -> str:
        """A value as it is typed, or the default that holds instead."""
        value = documents.value_at(self.document, path)
        if value is not None:
            return documents.shown(value)
        origin = None if self.project is None else self.project.origins.get(path)
        return "" if origin is None or origin.kind in ("typed", "option") else origin.text

    def back(self, path: str) -> str:
        """A value back to what the shop library has, or to its default; what holds then. Raises Refused."""
        theirs = library_value(self, path)
        if theirs is not None and theirs != documents.value_at(self.document, path):
            self._change(f"{path} as the shop library has it", documents.with_data(self.document, path, theirs))
        elif theirs is None:
            self.remove(path)
        return self.shown(path)

    def add(self, table: str, face: str = "") -> str:
        """A new thing with the least that computes; its key path. Raises Refused.

        table: a list ("doors"), a table of names ("constructions"), or a list in a thing ("lots.cod.limits").
        face: the one it stands on, where it can stand on one.
        """
        changed, path = documents.with_new(self.document, table, face)
        made = self._made(changed)
        if face and not isinstance(made, Project) and not self.problems:  # a door in a floor on the ground, for one
            changed, path = documents.with_new(self.document, table)
            made = self._made(changed)
        self._change(f"new {path}", changed, made)
        return path

    def open_door(self, hours: float) -> str:
        """A door that stands open for ten minutes, so many hours into the outage; which one. Raises Refused."""
        name = next(iter(called(self.document, "doors")), "")
        if not name:
            raise Refused("There is no door with a name to open.")
        event = {"at": _after(hours), "what": "door open", "door": name, "lasts": "10 min"}
        self._change(f"{name} open at {_after(hours)}", documents.with_event(self.document, event))
        return name

    def bring_ice(self, hours: float) -> str:
        """Five kilograms of ice that come so many hours into the outage; what the pack is called."""
        changed, path = documents.with_new(self.document, "packs")
        name = path.partition(".")[2]
        event = {"at": _after(hours), "what": "pack in", "pack": name}
        self._change(f"{name} in at {_after(hours)}", documents.with_event(changed, event))
        return name

    def duplicate(self, path: str) -> str:
        """The same thing once more; its key path. Raises Refused."""
        changed, made = documents.with_copy(self.document, path)
        self._change(f"copy of {path}", changed)
        return made

    def remove(self, path: str) -> None:
        """Takes out a thing, or lets a value fall back to its default. Raises Refused."""
        self._change(f"without {path}", documents.without(self.document, path))

    def undo(self) -> str:
        """One change back; what it was, "" where there is none."""
        return self._step(self._done, self._undone)

    def redo(self) -> str:
        """One change forth again; what it was, "" where there is none."""
        return self._step(self._undone, self._done)

    def _step(self, here: list[tuple[str, Document]], there: list[tuple[str, Document]]) -> str:
        self.drop_trial()
        if not here:
            return ""
        what, before = here.pop()
        there.append((what, self.document))
        self.document = before
        self._compute()
        return what

    def _change(self, what: str, changed: Document, made: Project | Sequence[Problem] | None = None) -> None:
        self.drop_trial()
        if changed is self.document:
            return
        self._done.append((what, self.document))
        self._undone.clear()
        self.document = changed
        self._compute(made)

    # What it comes to

    def _made(self, document: Document) -> Project | Sequence[Problem]:
        """The project of a document, or what is wrong in it."""
        try:
            raw, problems = codec.of_document(document, self.path, self._known)
            return resolve(raw, problems, self.library)
        except BadProject as bad:
            return bad.problems

    def _compute(self, made: Project | Sequence[Problem] | None = None) -> None:
        """Project and account of the document; where it has problems, the last good ones stay."""
        made = self._made(self.document) if made is None else made
        if not isinstance(made, Project):
            self.problems = made
            return
        try:
            account = load(made)
        except ColdboxError as error:
            self.problems = (Problem(str(error), file=self.path),)
            return
        self.problems, self.project, self.load = (), made, account
        self.accounts += 1
        self._ask_hold()

    def begin_hold(self) -> None:
        """Computes the hold time from now on, where it was opened without."""
        if not self.hold.wanted:
            self.hold.wanted = True
            self._ask_hold()

    def _ask_hold(self) -> None:
        if self.project is not None:
            self.hold.ask(self.path, self.document)

    def changes(self) -> Any:
        """How far undo and redo reach, for those who look on."""
        return len(self._done), len(self._undone)

    # The hold time

    @property
    def busy(self) -> bool:
        """Whether the hold time is being computed."""
        return self.hold.busy

    @property
    def hold_stale(self) -> bool:
        """Whether the hold time that is shown belongs to an earlier state."""
        return self.hold.stale

    def hold_words(self) -> str:
        """How long it holds, in words for one line."""
        return self.hold.words()

    def tick(self) -> bool:
        """Asks whether the hold time has news."""
        return self.hold.tick()
