"""Everything that can be done or gone to, by name."""

from __future__ import annotations

from coldbox.tui.sheets.pick import Item, PickList
from coldbox.tui.shell import Shell


def palette(shell: Shell) -> PickList:
    """A list of all actions, and of the things of the project."""
    below = shell.top
    places = {below.where, shell.page.where, "everywhere", "page"}
    items = [
        Item(action.words, action.id, shell.keymap.shown(action.id))
        for action in shell.keymap.actions
        if action.where in places and action.id not in MOVES
    ]
    items += [Item(f"go to {thing.label}", f"{GO}{thing.path}", thing.path) for thing in shell.things()]

    def picked(value: str) -> None:
        if value.startswith(GO):
            shell.go_to(value[len(GO) :])
        else:
            shell.act(value)

    return PickList(shell, "What to do", items, picked)


GO = "go:"
MOVES = ("up", "down", "left", "right", "accept", "page_up", "page_down", "first", "last", "close")
