"""The lines that are always in sight: whose box it is, what it needs, how long it holds, where one is."""

from __future__ import annotations

from typing import TYPE_CHECKING

from coldbox.tui.frame import Frame

if TYPE_CHECKING:
    from coldbox.tui.desk import Desk
    from coldbox.tui.shell import Shell


def head(frame: Frame, shell: Shell) -> None:
    """The first line: name, temperature, units, whether it is saved."""
    frame.fill(0, 0, frame.width, 1, "head")
    desk = shell.desk
    help_word = f"{shell.key_name('help')} help "
    right = frame.width
    if desk is None:
        frame.text(1, 0, f"Projects of {shell.folder.resolve()}", "head", right - len(help_word) - 3)
        frame.right(right, 0, help_word, "head")
        return
    state = "not saved" if desk.dirty else "saved"
    if desk.read_only:
        state = "read only"
    shown = f"{desk.system}  {state}  {help_word}"
    begin = frame.right(right, 0, shown, "head")
    from coldbox.units import show

    project = desk.project
    name = f" {desk.name}"
    if project is not None:
        name += f"   {show(project.box.temperature, 'temperature', desk.system)}"
    frame.text(0, 0, name, "head", begin - 1)
    if desk.dirty:
        frame.restyle(begin + len(desk.system) + 2, 0, len(state), "total")


def foot(frame: Frame, shell: Shell, lines: int) -> None:
    """The last lines: what was said, the answer, the pages with the keys that matter."""
    y = frame.height - lines
    top = shell.top
    if shell.said:
        frame.text(1, y, shell.said, shell.said_style, frame.width - 2)
    elif shell.desk is not None and shell.desk.problems:
        count = len(shell.desk.problems)
        said = f"{count} {'entry' if count == 1 else 'entries'} to mend first; the answer is from before: "
        frame.text(1, y, said + str(shell.desk.problems[0]), "wrong", frame.width - 2)
    else:
        frame.text(1, y, top.spoken(), "dim", frame.width - 2)
    if shell.desk is not None:
        _answer(frame, shell.desk, y + 1)
    _pages(frame, shell, frame.height - 1)


def _answer(frame: Frame, desk: Desk, y: int) -> None:
    frame.fill(0, y, frame.width, 1, "head")
    x = frame.text(0, y, f" {needs(desk)}", "total") + 1
    said = how(desk)
    hold = holds(desk)
    if x + len(said) + len(hold) + 3 <= frame.width:
        frame.text(x, y, said, "head")
    style = "stale" if desk.hold_stale else "total"
    frame.text(max(frame.width - len(hold) - 1, x), y, hold, style)


def needs(desk: Desk) -> str:
    """Required capacity in words."""
    if desk.load is None:
        return "needs ? (nothing computes yet)"
    from coldbox.units import show

    return f"needs {show(desk.load.required_capacity_w, 'power', desk.system, 3)}"


def how(desk: Desk) -> str:
    """What the capacity comes from."""
    if desk.load is None:
        return ""
    safety = f"+{desk.load.safety:.0%}"
    if desk.load.governs == "peak":
        return f"(peak hour {desk.load.peak_hour}-{desk.load.peak_hour + 1}, {safety})"
    if desk.load.governs == "atp":
        return "(ATP)"
    return f"({desk.load.run_hours:g} h a day, {safety})"


def holds(desk: Desk) -> str:
    """Hold time with its spread in words."""
    return desk.hold_words()


def _pages(frame: Frame, shell: Shell, y: int) -> None:
    from coldbox.tui.keymap import PAGES

    x = 1
    if shell.desk is not None and not shell.sheets:
        for number, name in enumerate(PAGES, 1):
            here = shell.pages.get(name) is shell.page
            x = frame.text(x, y, f"{number} {name.capitalize()}", "title" if here else "dim") + 2
    hint = shell.top.hint()
    frame.text(max(x, frame.width - len(hint) - 1) if x > 1 else x, y, hint, "key", frame.width - x)
