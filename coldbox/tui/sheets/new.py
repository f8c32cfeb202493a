"""A new project: from an example, from another project, from the least that computes."""

from __future__ import annotations

from pathlib import Path
from typing import TYPE_CHECKING

from coldbox.errors import ColdboxError
from coldbox.project import fresh
from coldbox.tui.sheets.pick import Asked, Item, PickList

if TYPE_CHECKING:
    from coldbox.tui.shell import Shell

LEAST = ""


def ask_for_new(shell: Shell) -> None:
    """What to start from, then the name, then its carton."""
    examples = sorted(fresh.examples().glob("*.toml"))
    items = [Item("the least that computes", LEAST, "a box of 3 x 4 x 2.4 m")]
    items += [Item(path.stem, str(path), "example") for path in examples]
    shell.over(PickList(shell, "Start from", items, lambda like: ask_for_copy(shell, like)))


def ask_for_copy(shell: Shell, like: str) -> None:
    """The name of a project that is made like another."""

    def make(name: str) -> str:
        if not name:
            return "A name is needed, such as quay-freezer."
        folder = shell.folder / "projects"
        try:
            path = fresh.create(name, like or None, folder if folder.is_dir() else shell.folder)
        except ColdboxError as error:
            return str(error)
        shell.open(Path(path))
        return ""

    said = f"Name of the new project, like {Path(like).stem}:" if like else "Name of the new project:"
    shell.over(Asked(shell, "New project", said, "", make))
