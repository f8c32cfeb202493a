"""The screens as an application of the toolkit: keys in, frames out. What they mean is the shell's."""

from __future__ import annotations

import asyncio
import gc
import os
import signal

from textual import events
from textual.app import App, ComposeResult
from textual.reactive import Reactive
from textual.screen import Screen
from textual.timer import Timer

from coldbox.tui.looks import Look
from coldbox.tui.shell import Shell
from coldbox.tui.widgets.surface import Surface

LOOK_SECONDS = 0.1  # how often work that runs elsewhere is asked whether it is done
JOURNAL_SECONDS = 1.0  # after the last edit
GRACE_SECONDS = 3.0  # for an orderly end once the process is told to go


class _Bare(Screen[None]):
    """A screen that does not repaint everything when the focus moves: nothing here takes focus."""

    focused = Reactive(None, repaint=False)
    BINDINGS = []  # noqa: RUF012
    AUTO_FOCUS = ""

    def __init__(self, surface: Surface) -> None:
        super().__init__(id="_default")
        self._surface = surface

    def compose(self) -> ComposeResult:
        yield self._surface


class ColdboxApp(App[int]):
    """One surface that fills the terminal."""

    ENABLE_COMMAND_PALETTE = False
    BINDINGS = []  # noqa: RUF012
    CSS = "Screen { background: ansi_default; overflow: hidden; }"

    def __init__(self, shell: Shell) -> None:
        super().__init__(ansi_color=True)
        self.shell = shell
        self.surface = Surface(Look(shell.theme))
        self.fault: BaseException | None = None
        self._paint_asked = False
        self._looking: Timer | None = None
        self._journal: Timer | None = None

    def get_default_screen(self) -> Screen[None]:
        return _Bare(self.surface)

    def on_mount(self) -> None:
        """Be told when the line drops or the process shall end."""
        if self.is_headless:
            return
        loop = asyncio.get_running_loop()
        loop.add_signal_handler(signal.SIGHUP, self._line_dropped)
        loop.add_signal_handler(signal.SIGTERM, self._told_to_go)

    async def on_event(self, event: events.Event) -> None:
        """Keys and pasted text go straight to the shell; all else goes its usual way."""
        if isinstance(event, events.Key):
            self.shell.key(event.key, event.character)
            self._after(letter=event.is_printable and self.shell.top.typing)
        elif isinstance(event, events.Paste):
            self.shell.paste(event.text)
            self._after()
        elif isinstance(event, events.MouseEvent):
            return
        else:
            await super().on_event(event)

    def on_resize(self, event: events.Resize) -> None:
        """Draw for the new size."""
        self._paint(event.size.width, event.size.height)

    def _paint(self, width: int, height: int) -> None:
        if self.shell.theme != self.surface.look.theme:
            self.surface.wear(Look(self.shell.theme))
        frame = self.shell.frame(width, height)
        if frame.cursor is not None:
            self.cursor_position = self.cursor_position.__class__(*frame.cursor)
        self.surface.show(frame)

    def _paint_once(self) -> None:
        self._paint_asked = False
        if self.shell.exit_code is None:
            self._paint(*self.size)

    def _after(self, *, letter: bool = False) -> None:
        """What follows a key: a picture, the clipboard, timers, the end. letter: it went into a text."""
        shell = self.shell
        if shell.exit_code is not None:
            shell.close_down()
            self.exit(return_code=shell.exit_code)
            return
        if not letter:  # the next key may depend on where things were drawn
            self._paint(*self.size)
        elif not self._paint_asked:
            self._paint_asked = True
            self.call_later(self._paint_once)  # after the letters that wait already: a burst of them is one picture
        if shell.clipboard:
            self.copy_to_clipboard(shell.clipboard)
            shell.clipboard = ""
        if shell.busy and self._looking is None:
            self._looking = self.set_interval(LOOK_SECONDS, self._look)
        if shell.unsaved_edit:
            shell.unsaved_edit = False
            if self._journal is not None:
                self._journal.stop()
            self._journal = self.set_timer(JOURNAL_SECONDS, shell.write_journal)

    def _look(self) -> None:
        if self.shell.tick():
            self._paint(*self.size)
        if not self.shell.busy and self._looking is not None:
            self._looking.stop()
            self._looking = None

    def on_ready(self) -> None:
        """The first picture stands."""
        if not self.is_headless:
            self.call_after_refresh(self._first_picture)
        self._after()

    def _first_picture(self) -> None:
        gc.enable()
        gc.freeze()  # what was made until now stays: nobody needs to look through it again and again
        self.shell.begin_hold()
        self._after()

    def _line_dropped(self) -> None:
        """The terminal is gone: nothing can be written to it, so keep the work and leave at once."""
        self.shell.close_down(keep_work=True)
        os._exit(128 + signal.SIGHUP)

    def _told_to_go(self) -> None:
        """Keep the work, give the terminal back, and leave."""
        self.shell.close_down(keep_work=True)
        self.exit(return_code=128 + signal.SIGTERM)
        asyncio.get_running_loop().call_later(GRACE_SECONDS, os._exit, 128 + signal.SIGTERM)

    def _handle_exception(self, error: Exception) -> None:
        """A fault anywhere: keep the work, leave, and let the caller report it once the terminal is restored."""
        if self.fault is None:
            self.fault = error
            try:
                self.shell.close_down(keep_work=True)
            except Exception as second:  # the guard itself must not fall: the terminal is still to be restored
                error.add_note(f"and while its work was kept: {second!r}")
        self._return_code = 3
        if self._exception is None:
            self._exception = error
            self._exception_event.set()
        self._close_messages_no_wait()
