"""The application of the toolkit: keys arrive, frames are shown, little is repainted, faults are caught."""

from __future__ import annotations

import asyncio
from collections.abc import Awaitable, Callable
from pathlib import Path

import pytest
from screens import NAMES, Driven
from textual import _wait, events
from textual.pilot import Pilot
from tours import SI, build

from coldbox.tui.app import ColdboxApp
from coldbox.tui.settings import load_settings
from coldbox.tui.shell import Shell

EXAMPLES = Path(__file__).parents[2] / "projects"
Script = Callable[[ColdboxApp, Pilot[int]], Awaitable[None]]


@pytest.fixture(autouse=True)
def _quick(monkeypatch: pytest.MonkeyPatch) -> None:
    """A key of the toolkit's pilot waits 80 ms by its constants; were they renamed, this would fail here."""
    for name, value in (("SLEEP_GRANULARITY", 0.002), ("SLEEP_IDLE", 0.001)):
        assert hasattr(_wait, name)
        monkeypatch.setattr(_wait, name, value)


def shell_of(folder: Path, file: Path | None = None) -> Shell:
    shell = Shell(folder, load_settings())
    shell.with_hold = False
    if file is None:
        shell.go("first")
    else:
        shell.open(file)
    return shell


def run(shell: Shell, script: Script, size: tuple[int, int] = (80, 24)) -> ColdboxApp:
    app = ColdboxApp(shell)

    async def whole() -> None:
        async with app.run_test(size=size) as pilot:
            await script(app, pilot)

    asyncio.run(whole())
    return app


@pytest.fixture
def freezer(tmp_path: Path) -> Shell:
    path = tmp_path / "quay.toml"
    path.write_text((EXAMPLES / "long-quay-freezer.toml").read_text())
    return shell_of(tmp_path, path)


def painted(app: ColdboxApp) -> list[str]:
    """What the toolkit has on its surface."""
    height = app.size.height
    return ["".join(segment.text for segment in app.surface.render_line(y)).rstrip() for y in range(height)]


def test_the_whole_tour_goes_through_the_toolkit_as_it_goes_without(tmp_path: Path) -> None:
    (tmp_path / "plain").mkdir()
    (tmp_path / "app").mkdir()
    driven = Driven(tmp_path / "plain")
    build(driven, SI, system="SI")
    shell = shell_of(tmp_path / "app")

    async def play(app: ColdboxApp, pilot: Pilot[int]) -> None:
        for key in driven.keys:
            await app.on_event(events.Key(NAMES.get(key, key), key if len(key) == 1 else None))
        await pilot.press("1")
        assert painted(app)[-2].lstrip().startswith("needs ")

    run(shell, play)
    assert (tmp_path / "app" / "quay.toml").read_text() == (tmp_path / "plain" / "quay.toml").read_text()


def test_what_is_painted_is_what_the_shell_draws(freezer: Shell) -> None:
    async def play(app: ColdboxApp, pilot: Pilot[int]) -> None:
        for key in (
            "right",
            "2",
            "down",
            "3",
            "1",
            "enter",
            "down",
            "4",
            "escape",
            "question_mark",
            "escape",
            "escape",
        ):
            await pilot.press(key)
            assert painted(app) == app.shell.frame(80, 24).lines()

    run(freezer, play)


def test_a_letter_repaints_few_lines_and_idling_none(freezer: Shell) -> None:
    async def play(app: ColdboxApp, pilot: Pilot[int]) -> None:
        await pilot.press("enter", "down", "down", "x")  # into a field that takes words: nothing computes
        before = app.surface.refreshed
        await pilot.press("y")
        assert app.surface.refreshed - before <= 3
        before = app.surface.refreshed
        await pilot.pause(0.3)
        assert app.surface.refreshed == before

    run(freezer, play)


@pytest.mark.parametrize("size", [(20, 5), (40, 12), (1, 1), (200, 60), (60, 18)])
def test_a_resize_there_and_back_loses_nothing(freezer: Shell, size: tuple[int, int]) -> None:
    async def play(app: ColdboxApp, pilot: Pilot[int]) -> None:
        await pilot.press("enter", "down", "4")
        before = painted(app)
        await pilot.resize_terminal(*size)
        await pilot.pause()
        assert len(painted(app)) == size[1]
        await pilot.resize_terminal(80, 24)
        await pilot.pause()
        assert painted(app) == before
        assert app.shell.top.typing

    run(freezer, play)


def test_too_small_a_terminal_is_told_and_still_answers(freezer: Shell) -> None:
    async def play(app: ColdboxApp, pilot: Pilot[int]) -> None:
        await pilot.pause()
        text = " ".join(painted(app))
        assert "needs" in text and "too small" in text

    run(freezer, play, (20, 8))


def test_a_paste_of_several_lines_keeps_the_first_and_says_so(freezer: Shell) -> None:
    async def play(app: ColdboxApp, pilot: Pilot[int]) -> None:
        await pilot.press("enter")
        await app.on_event(events.Paste("pir100\nsecond\nthird"))
        await pilot.pause()
        assert "pir100" in "\n".join(painted(app))
        assert "Of 3 lines" in app.shell.said

    run(freezer, play)


def test_a_fault_keeps_the_work_and_ends_with_three(freezer: Shell, monkeypatch: pytest.MonkeyPatch) -> None:
    def falls(*_: object, **__: object) -> None:
        raise ZeroDivisionError("a fault of ours")

    app = ColdboxApp(freezer)

    async def whole() -> None:
        async with app.run_test(size=(80, 24)) as pilot:
            await pilot.press("enter", "down", "down", "enter", "enter")  # a colour is picked: unsaved
            assert freezer.desk is not None and freezer.desk.dirty
            monkeypatch.setattr(freezer.page, "draw", falls)
            await pilot.press("escape")

    with pytest.raises(ZeroDivisionError):
        asyncio.run(whole())
    assert isinstance(app.fault, ZeroDivisionError)
    assert app.return_code == 3
    assert any("is kept" in line for line in freezer.last_words)


def test_leaving_with_unsaved_work_asks_and_back_changes_nothing(freezer: Shell) -> None:
    async def play(app: ColdboxApp, pilot: Pilot[int]) -> None:
        await pilot.press("enter", "down", "down", "enter", "enter", "escape", "ctrl+q")
        assert "Not saved" in "\n".join(painted(app))
        await pilot.press("b")
        assert app.shell.exit_code is None
        await pilot.press("ctrl+q", "s")
        assert app.shell.exit_code == 0

    run(freezer, play)
    assert freezer.desk is not None and not freezer.desk.dirty


@pytest.mark.parametrize("theme", ["terminal", "dark", "light", "plain"])
def test_every_style_that_is_drawn_has_a_look(freezer: Shell, theme: str) -> None:
    from coldbox.tui.looks import Look, known

    freezer.theme = theme
    names = set()
    for key in ("1", "2", "3", "4", "5", "6", "1", "enter", "4"):
        freezer.key(key, key if len(key) == 1 else None)
        names |= {run.style for row in freezer.frame(120, 40).rows() for run in row}
    assert names <= known(theme)
    if theme == "plain":
        assert all(Look(theme).style(name).color is None or Look(theme).style(name).color.is_default for name in names)
