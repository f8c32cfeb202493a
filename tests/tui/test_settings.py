"""Settings of a user: keys that lead where they should, and in words what is wrong in the file."""

from __future__ import annotations

import re
import subprocess
import sys
from pathlib import Path

import pytest

from coldbox.tui.keymap import ACTIONS, Keymap, spoken
from coldbox.tui.settings import load_settings

# What tmux, terminals or a line discipline keep for themselves, or send as something else.
NEVER_ARRIVE = re.compile(r"ctrl\+(tab|space|h|i|m|b|shift)|(shift|alt|ctrl)\+enter|alt\+\d|f1[01]|ctrl\+(left|right)")


@pytest.fixture
def file(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> Path:
    monkeypatch.setenv("XDG_CONFIG_HOME", str(tmp_path))
    path = tmp_path / "coldbox" / "settings.toml"
    path.parent.mkdir()
    return path


def test_every_action_has_a_key_that_arrives_everywhere() -> None:
    for action in ACTIONS:
        sure = [key for key in action.keys if not NEVER_ARRIVE.fullmatch(key)]
        assert sure, action
        if action.id in ("save", "quit", "undo", "redo", "help", "close", "palette"):
            assert len(action.keys) > 1, f"{action.id}: one of its keys may be flow control, or taken"
    assert all(action.words for action in ACTIONS)


def test_no_key_means_two_things_at_one_place() -> None:
    seen: dict[tuple[str, str], str] = {}
    for action in ACTIONS:
        for key in action.keys:
            assert seen.setdefault((action.where, key), action.id) == action.id
    assert len({action.id for action in ACTIONS}) == len(ACTIONS), "ids are for good: none twice"


def test_keys_are_said_as_people_say_them() -> None:
    keymap = Keymap()
    assert (keymap.shown("help"), keymap.shown("undo")) == ("? or F1", "u or Ctrl-Z")
    assert all(spoken(key).isprintable() for action in ACTIONS for key in action.keys)


def test_without_a_file_there_is_nothing_wrong(file: Path) -> None:
    assert not load_settings().problems
    assert load_settings().path == str(file)


def test_a_key_of_ones_own_takes_the_place_of_the_usual_ones(file: Path) -> None:
    file.write_text('theme = "dark"\n[keys]\nsave = "f5"\nundo = ["ctrl+z", "x"]\n', encoding="utf-8")
    settings = load_settings()
    assert settings.theme == "dark" and not settings.problems
    assert settings.keymap.action("everywhere", "f5") == "save"
    assert settings.keymap.action("carton", "x") == "undo"
    assert settings.keymap.action("everywhere", "w") is None


def test_a_key_of_ones_own_wins_over_what_it_usually_does(file: Path) -> None:
    file.write_text('[keys]\nsave = "ctrl+q"\n', encoding="utf-8")
    settings = load_settings()
    assert not settings.problems
    assert settings.keymap.action("everywhere", "ctrl+q") == "save"
    assert settings.keymap.action("everywhere", "ctrl+c") == "quit"


@pytest.mark.parametrize(
    ("text", "says"),
    [
        ('them = "dark"', 'Nearest: "theme"'),
        ('theme = "pink"', "theme is one of terminal, dark, light, plain"),
        ("keys = 3", "keys is a table"),
        ('[keys]\nsav = "x"', 'Nearest: "save"'),
        ("[keys]\nsave = 3", "list of keys"),
        ("[keys]\nsave = []", "list of keys"),
        ('[keys]\nsave = ["\\u001b"]', "list of keys"),
        ('[keys]\nsave = ["ctrl+q", "ctrl+c"]', "must stay a key of"),
        ('[keys]\nclose = ["x"]\nsave = ["escape", "ctrl+g"]', "must stay a key of"),
        ('[keys]\nquit = "f12"', "must stay a key of quit"),
        ("theme = ", "cannot be read"),
        ("a" + ".a" * 3000 + " = 1", ""),
        ("x = " + "[" * 3000, "cannot be read"),
    ],
)  # fmt: skip
def test_a_bad_setting_is_told_and_the_rest_holds(text: str, says: str, file: Path) -> None:
    file.write_text(text, encoding="utf-8")
    settings = load_settings()
    assert any(says in problem and str(file) in problem for problem in settings.problems), settings.problems
    keymap = settings.keymap
    assert any(keymap.action("everywhere", key) == "quit" for key in ("ctrl+c", "ctrl+q"))
    assert any(keymap.action("everywhere", key) == "close" for key in ("escape", "ctrl+g"))


def test_the_desk_and_all_it_stands_on_know_no_toolkit() -> None:
    names = ("desk", "document", "places", "least", "things", "sheet", "steps", "understood", "folder", "hold",
             "keymap", "settings")  # fmt: skip
    code = f"import sys\nfor name in {names!r}: __import__('coldbox.tui.' + name)\nprint('textual' in sys.modules)"
    done = subprocess.run([sys.executable, "-c", code], capture_output=True, text=True, check=True)
    assert done.stdout.strip() == "False"
