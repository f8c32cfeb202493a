"""What a user likes: colours and keys, from a file of their own. A bad setting is told and left out."""

from __future__ import annotations

import os
import tomllib
from collections.abc import Mapping
from pathlib import Path
from typing import Any, Final

from coldbox.errors import ColdboxError
from coldbox.record import Record
from coldbox.tui.keymap import ACTIONS, Keymap

THEMES: Final = ("terminal", "dark", "light", "plain")
MOST_KEYS: Final = 6
WAYS_OUT: Final = {"quit": ("ctrl+c", "ctrl+q"), "close": ("escape", "ctrl+g")}


class Settings(Record):
    """The settings, and what was wrong in their file."""

    theme: str
    keymap: Keymap
    path: str
    problems: tuple[str, ...]


def settings_path() -> Path:
    """Where the settings stand."""
    home = os.environ.get("XDG_CONFIG_HOME") or os.path.join(os.path.expanduser("~"), ".config")
    return Path(home) / "coldbox" / "settings.toml"


def load_settings() -> Settings:
    """The settings of this user; the usual ones where there is no file."""
    from coldbox.project import store

    path = settings_path()
    if not path.exists():
        return _settings({}, path)
    try:
        return _settings(tomllib.loads(store.read_text(path)), path)
    except (ColdboxError, ValueError, RecursionError) as error:
        return _settings({}, path).replace(problems=(f"{path} cannot be read: {str(error).splitlines()[0]}",))


def _settings(given: Mapping[str, Any], path: Path) -> Settings:
    if not given:
        return Settings(theme="terminal", keymap=Keymap(), path=str(path), problems=())
    from coldbox.project.words import clean, nearest

    problems = []
    for word in given:
        if word not in ("theme", "keys"):
            near = nearest(word, ("theme", "keys"))
            hint = f' Nearest: "{near}".' if near else " Known: theme, keys."
            problems.append(f'{path}: "{clean(word)}" is no setting.{hint}')
    theme = given.get("theme", "terminal")
    if theme not in THEMES:
        problems.append(f"{path}: theme is one of {', '.join(THEMES)}.")
        theme = "terminal"
    keys, told = _keys(given.get("keys", {}), path)
    return Settings(theme=theme, keymap=Keymap(keys), path=str(path), problems=(*problems, *told))


def _keys(given: Any, path: Path) -> tuple[dict[str, list[str]], list[str]]:
    from coldbox.project.words import clean, nearest

    if not isinstance(given, dict):
        return {}, [f'{path}: keys is a table, such as keys = {{ save = ["w"] }}.']
    known = {action.id for action in ACTIONS}
    found: dict[str, list[str]] = {}
    problems = []
    for word, value in given.items():
        keys = [value] if isinstance(value, str) else value
        if word not in known:
            near = nearest(word, sorted(known))
            problems.append(f'{path}: "{clean(word)}" is no action.' + (f' Nearest: "{near}".' if near else ""))
        elif (
            not isinstance(keys, list)
            or not 0 < len(keys) <= MOST_KEYS
            or not all(isinstance(key, str) and key.isprintable() and 0 < len(key) < 30 for key in keys)
        ):
            problems.append(f'{path}: keys.{clean(word)} is a list of keys, such as ["w", "ctrl+s"].')
        else:
            found[word] = keys
    for action, ways in WAYS_OUT.items():
        keymap = Keymap(found)
        if not any(keymap.action("everywhere", key) == action for key in ways):
            problems.append(f"{path}: {' or '.join(ways)} must stay a key of {action}: every terminal sends it.")
            found = {word: keys for word, keys in found.items() if word != action and not {*ways} & {*keys}}
    return found, problems
