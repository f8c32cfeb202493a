"""Opening and leaving a project: what was kept from before, who holds it, what is not saved yet."""

from __future__ import annotations

from collections.abc import Callable
from pathlib import Path
from typing import TYPE_CHECKING

from coldbox.tui.desk import Desk
from coldbox.tui.sheets.pick import Question

if TYPE_CHECKING:
    from coldbox.tui.shell import Shell


def opened(shell: Shell, path: Path) -> None:
    """A project on the desk; the carton is shown."""
    desk = Desk.open(str(path))
    if shell.desk is not None:
        shell.desk.close()
    shell.desk = desk
    shell.pages.clear()
    shell.go("carton")


def save(shell: Shell, desk: Desk) -> None:
    """Save, and say so."""
    desk.save()
    shell.say(f"Saved: {desk.path}", "good")


def ask(shell: Shell, then: Callable[[], None]) -> None:
    """Go on; with unsaved work only once it is said what becomes of it."""
    desk = shell.desk
    if desk is None or not desk.dirty:
        then()
        return

    def save_first() -> None:
        save(shell, desk)
        then()

    shell.over(
        Question(
            shell,
            "Not saved",
            f"{desk.name} has changes that are not saved.",
            [
                ("s", "save them, then go", save_first),
                ("d", "drop them and go", then),
                ("b", "back to work", lambda: None),
            ],
        )
    )
