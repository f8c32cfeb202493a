"""Keys and what they do: actions with ids that stay, keys that arrive over SSH and tmux, remappable in the settings."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from typing import Final, NamedTuple

PAGES: Final = ("carton", "load", "outage", "trip", "machine", "paper")


class Action(NamedTuple):
    """Something a key does."""

    id: str
    where: str  # "everywhere", "sheet", "first"
    words: str  # what it does, for the page of keys and the palette
    keys: tuple[str, ...]


_EVERYWHERE: Final = (
    ("help", "help for where you are", "question_mark", "f1"),
    ("keys", "all keys", "f2"),
    ("palette", "what to do, by name", "colon", "ctrl+p"),
    ("quit", "leave", "ctrl+q", "ctrl+c"),
    ("save", "save", "ctrl+s", "w"),
    ("undo", "undo", "u", "ctrl+z"),
    ("redo", "redo", "r", "ctrl+y"),
    ("units", "SI or IP", "U", "ctrl+u"),
    ("theme", "other colours", "T"),
    ("copy", "copy what is under the cursor", "y"),
    ("write", "write what is under the cursor to a file", "Y"),
    ("close", "back", "escape", "ctrl+g"),
    *((f"page.{page}", f"{page} page", str(number)) for number, page in enumerate(PAGES, 1)),
    ("next_page", "next page", "tab"),
    ("previous_page", "previous page", "shift+tab"),
    ("jump", "jump by letters", "g"),
    ("up", "up", "up", "k"),
    ("down", "down", "down", "j"),
    ("left", "left", "left", "h"),
    ("right", "right", "right", "l"),
    ("first", "to the first", "home"),
    ("last", "to the last", "end"),
    ("page_up", "a page up", "pageup"),
    ("page_down", "a page down", "pagedown"),
    ("accept", "open, take", "enter"),
    ("add", "add something here", "plus", "a"),
    ("duplicate", "duplicate", "d"),
    ("remove", "remove", "minus", "delete"),
)
_ELSEWHERE: Final = (
    Action("raise", "sheet", "a step up", ("right_square_bracket",)),
    Action("lower", "sheet", "a step down", ("left_square_bracket",)),
    Action("default", "sheet", "back to the default", ("backspace",)),
    Action("earlier", "outage", "power off an hour earlier", ("less_than_sign", "comma")),
    Action("later", "outage", "power off an hour later", ("greater_than_sign", "full_stop")),
    Action("door", "outage", "open a door for 10 minutes at the cursor", ("o",)),
    Action("ice", "outage", "bring 5 kg of ice at the cursor", ("i",)),
    Action("new", "first", "a new project", ("ctrl+n",)),
    Action("duplicate_project", "first", "a copy of this project", ("ctrl+d",)),
)
ACTIONS: Final = (*(Action(id, "everywhere", words, keys) for id, words, *keys_ in _EVERYWHERE
                    for keys in (tuple(keys_),)), *_ELSEWHERE)  # fmt: skip
_SHOWN: Final = {
    "question_mark": "?", "colon": ":", "plus": "+", "minus": "-", "escape": "Esc", "enter": "Enter", "tab": "Tab",
    "less_than_sign": "<", "greater_than_sign": ">", "comma": ",", "full_stop": ".", "right_square_bracket": "]",
    "left_square_bracket": "[", "backspace": "Backspace", "delete": "Del", "shift+tab": "Shift-Tab", "pageup": "PgUp",
    "pagedown": "PgDn", "home": "Home", "end": "End",
}  # fmt: skip


class Keymap:
    """Which key does what where. `changed`: keys by action id that take the place of the usual ones."""

    def __init__(self, changed: Mapping[str, Sequence[str]] = {}) -> None:  # noqa: B006  only read
        self.actions = tuple(
            action._replace(keys=tuple(changed[action.id])) if action.id in changed else action for action in ACTIONS
        )
        own_last = sorted(self.actions, key=lambda action: action.id in changed)
        self._by_key = {(action.where, key): action.id for action in own_last for key in action.keys}

    def action(self, where: str, key: str) -> str | None:
        """What a key does at a place: its own meaning there, else the one that holds everywhere."""
        return self._by_key.get((where, key), self._by_key.get(("everywhere", key)))

    def shown(self, action: str) -> str:
        """The keys of an action as one would say them: "?", "Enter", "u or Ctrl-Z"."""
        keys = next((one.keys for one in self.actions if one.id == action), ())
        return " or ".join(spoken(key) for key in keys[:2])


def spoken(key: str) -> str:
    """A key as people write it."""
    if key in _SHOWN:
        return _SHOWN[key]
    if key.startswith("ctrl+"):
        return f"Ctrl-{key[5:].upper()}"
    return key.upper() if key[:1] == "f" and key[1:].isdigit() else key
