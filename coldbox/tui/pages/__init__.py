"""The pages: what fills the screen between its first line and its last three."""

from __future__ import annotations

from importlib import import_module
from typing import TYPE_CHECKING

if TYPE_CHECKING:
    from coldbox.tui.layer import Layer
    from coldbox.tui.shell import Shell


def made(name: str, shell: Shell) -> Layer:
    """The page of that name, its module imported when first shown."""
    page: Layer = import_module(f"coldbox.tui.pages.{name}").Page(shell)
    return page
