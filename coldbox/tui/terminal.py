"""What a terminal can do, and the way in and out of the screens: refused in words, restored whatever happens."""

from __future__ import annotations

import gc
import os
import sys
from collections.abc import Mapping
from pathlib import Path

from coldbox.errors import ColdboxError
from coldbox.record import Record


class NoTerminal(ColdboxError):
    """The screens cannot be shown here."""


class Abilities(Record):
    """What is known of the terminal."""

    theme: str  # "" for what the settings say
    ascii_drawing: bool
    ascii_letters: bool


def abilities(environment: Mapping[str, str], encoding: str | None) -> Abilities:
    """What the environment says of the terminal.

    environment  TERM, NO_COLOR, LC_ALL, LC_CTYPE, LANG
    encoding     of the stream that is painted on
    result       "plain" as theme where no colour is wanted; ASCII where letters, or lines, do not arrive
    """
    locale = environment.get("LC_ALL") or environment.get("LC_CTYPE") or environment.get("LANG") or ""
    if not environment.get("LC_ALL") and environment.get("LC_CTYPE") in ("C.UTF-8", "C.utf8", "UTF-8"):
        # Python sets this itself under LANG=C; what the user said is the rest.
        locale = environment.get("LANG") or ""
    utf8 = locale.lower().replace("-", "").endswith("utf8") and "utf" in (encoding or "").lower()
    letters = not utf8
    return Abilities(
        theme="plain" if environment.get("NO_COLOR") else "",
        ascii_drawing=letters or environment.get("TERM", "") == "linux",  # its fonts have no blocks of eighths
        ascii_letters=letters,
    )


def check(environment: Mapping[str, str], *, stdin: bool, stderr: bool) -> None:
    """Raises NoTerminal, in words, where the screens cannot be shown."""
    instead = "Commands work everywhere: coldbox load FILE, coldbox --help."
    if not stdin or not stderr:
        raise NoTerminal(f"coldbox: the screens need a terminal, and this is a pipe or a file. {instead}")
    term = environment.get("TERM", "")
    if term in ("", "dumb", "unknown"):
        named = f'TERM is "{term}"' if term else "TERM is not set"
        raise NoTerminal(f"coldbox: {named}: such a terminal cannot be drawn on. {instead}")


def run(file: str | None, folder: Path) -> int:
    """The screens, until they are left; the exit status.

    file    a project to open; None for the first page
    folder  whose projects the first page lists
    raises  NoTerminal; FileTrouble where the file cannot be read; whatever fault ended the screens, once the terminal
            is restored and the work kept
    """
    check(os.environ, stdin=sys.stdin.isatty(), stderr=sys.stderr.isatty())
    gc.disable()  # until the first picture stands: there is no rubbish yet, only much that is made
    stderr = sys.__stderr__
    found = abilities(os.environ, stderr.encoding if stderr else None)
    # Read once, when the toolkit is imported: its timers run in step with the frames, and its keyboard protocol is not
    # understood everywhere.
    os.environ.setdefault("TEXTUAL_FPS", "240")
    os.environ.setdefault("TEXTUAL_DISABLE_KITTY_KEY", "1")
    os.environ.setdefault("TEXTUAL_ANIMATIONS", "none")
    from coldbox.tui.shell import Shell

    shell = Shell.start(
        file, folder, theme=found.theme, ascii_drawing=found.ascii_drawing, ascii_letters=found.ascii_letters
    )
    from coldbox.tui.app import ColdboxApp

    if found.ascii_letters and stderr is not None:
        stderr.reconfigure(errors="replace")  # the toolkit's own bytes are ASCII; ours are by then
    app = ColdboxApp(shell)
    app.run(mouse=False)
    for line in shell.last_words:
        print(line, file=sys.stderr)
    if app.fault is not None:
        raise app.fault
    return app.return_code or 0
