"""Opening, saving and leaving a project: what was left unsaved before, who holds it, who was there meanwhile."""

from __future__ import annotations

from collections.abc import Callable
from pathlib import Path
from typing import TYPE_CHECKING

from coldbox.errors import ColdboxError
from coldbox.project.store import ChangedUnderneath
from coldbox.tui.desk import Desk
from coldbox.tui.sheets.pick import Asked, Question

if TYPE_CHECKING:
    from coldbox.tui.shell import Shell

Then = Callable[[], None]


def _nothing() -> None:
    """An answer that changes nothing."""


def opened(shell: Shell, path: Path) -> None:
    """A project on the desk; the carton is shown, and over it what has to be asked first."""
    desk = Desk.open(str(path), hold=shell.with_hold)
    if shell.desk is not None:
        shell.desk.close()
    shell.desk = desk
    shell.leave_pages()
    shell.go("carton")
    if desk.left_behind is not None:
        _offer(shell, desk)
    if desk.read_only:
        _held(shell, desk)


def _offer(shell: Shell, desk: Desk) -> None:
    def resume() -> None:
        desk.resume()
        shell.edited()
        shell.say("Back on the desk, not saved yet. Undo shows what the file says.")

    answers: list[tuple[str, str, Then]] = [
        ("g", "go on with it", resume),
        ("f", "take the file as it is, and forget the rest", desk.decline),
    ]
    said = f"A session on {desk.name} ended before its work was saved. That work was kept."
    shell.over(Question(shell, "Unsaved work", said, answers))


def _held(shell: Shell, desk: Desk) -> None:
    def take_over() -> None:
        desk.take_over()
        shell.say("It is yours now. The other session will be told when it saves.", "warn")

    answers: list[tuple[str, str, Then]] = [
        ("r", "open it to read", _nothing),
        ("c", "work on a copy under another name", lambda: save_as(shell, desk)),
        ("t", "take it over", take_over),
    ]
    shell.over(Question(shell, "Somebody has it open", desk.held_by, answers))


def save(shell: Shell, desk: Desk, then: Then = _nothing) -> None:
    """Save and say so; where another was there meanwhile, ask."""
    if desk.read_only:
        save_as(shell, desk, then)
        return
    try:
        desk.save()
    except ChangedUnderneath as other:
        _changed(shell, desk, other, then)
        return
    said = " Its comments could not be kept; the version before is beside it." if desk.comments_went else ""
    shell.say(f"Saved: {desk.path}.{said}", "warn" if said else "good")
    then()


def _changed(shell: Shell, desk: Desk, other: ChangedUnderneath, then: Then) -> None:
    def replace() -> None:
        desk.save(over=other.found)
        shell.say("Saved. The other version stays beside it.", "warn")
        then()

    def reload() -> None:
        desk.reload()
        shell.edited()
        shell.say(f"As the file has it now. {shell.keymap.shown('undo')} brings your work back.")

    answers: list[tuple[str, str, Then]] = [
        ("c", "save mine under another name", lambda: save_as(shell, desk, then)),
        ("l", "look at theirs (undo brings mine back)", reload),
        ("r", "replace theirs by mine", replace),
        ("b", "back to work", _nothing),
    ]
    shell.over(Question(shell, "Changed meanwhile", str(other), answers))


def save_as(shell: Shell, desk: Desk, then: Then = _nothing) -> None:
    """Save under a name that is asked for."""
    folder = Path(desk.path).parent

    def write(name: str) -> str:
        if not name or "/" in name or name.startswith("."):
            return "A plain name is needed, such as quay-freezer."
        path = folder / (name if name.endswith(".toml") else f"{name}.toml")
        try:
            desk.save_as(str(path))
        except ColdboxError as error:
            return str(error)
        shell.say(f"Saved: {path}.", "good")
        then()
        return ""

    shell.over(Asked(shell, "Save as", f"Another name, in {folder}:", "", write))


def ask(shell: Shell, then: Then) -> None:
    """Go on; with unsaved work only once it is said what becomes of it."""
    desk = shell.desk
    if desk is None or not desk.dirty:
        then()
        return
    answers: list[tuple[str, str, Then]] = [
        ("s", "save them, then go", lambda: save(shell, desk, then)),
        ("d", "drop them and go", then),
        ("b", "back to work", _nothing),
    ]
    shell.over(Question(shell, "Not saved", f"{desk.name} has changes that are not saved.", answers))
