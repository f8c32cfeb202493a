"""What each style looks like: dark, light, the terminal's own sixteen colours, and no colour at all."""

from __future__ import annotations

from rich.style import Style

_DARK = {
    "text": "color(252) on color(234)",
    "dim": "color(245) on color(234)",
    "line": "color(240) on color(234)",
    "title": "bold color(153) on color(234)",
    "head": "color(252) on color(237)",
    "total": "bold color(231) on color(237)",
    "key": "bold color(215) on color(234)",
    "cursor": "color(16) on color(153)",
    "field": "color(231) on color(239)",
    "typed": "color(231) on color(234)",
    "default": "italic color(246) on color(234)",
    "library": "color(116) on color(234)",
    "fitted": "color(183) on color(234)",
    "good": "color(114) on color(234)",
    "warn": "color(221) on color(234)",
    "wrong": "bold color(210) on color(234)",
    "danger": "bold color(231) on color(124)",
    "stale": "color(245) on color(237)",
    "door": "color(215) on color(234)",
    "limit": "color(210) on color(234)",
    "band": "color(67) on color(234)",
    "curve": "bold color(153) on color(234)",
    "shade0": "color(244) on color(234)",
    "shade1": "color(65) on color(234)",
    "shade2": "color(143) on color(234)",
    "shade3": "color(172) on color(234)",
    "shade4": "color(167) on color(234)",
}
_LIGHT = {
    "text": "color(235) on color(255)",
    "dim": "color(242) on color(255)",
    "line": "color(248) on color(255)",
    "title": "bold color(24) on color(255)",
    "head": "color(235) on color(252)",
    "total": "bold color(16) on color(252)",
    "key": "bold color(130) on color(255)",
    "cursor": "color(231) on color(24)",
    "field": "color(16) on color(252)",
    "typed": "color(16) on color(255)",
    "default": "italic color(241) on color(255)",
    "library": "color(30) on color(255)",
    "fitted": "color(90) on color(255)",
    "good": "color(28) on color(255)",
    "warn": "color(94) on color(255)",
    "wrong": "bold color(124) on color(255)",
    "danger": "bold color(231) on color(124)",
    "stale": "color(242) on color(252)",
    "door": "color(130) on color(255)",
    "limit": "color(124) on color(255)",
    "band": "color(110) on color(255)",
    "curve": "bold color(24) on color(255)",
    "shade0": "color(249) on color(255)",
    "shade1": "color(108) on color(255)",
    "shade2": "color(136) on color(255)",
    "shade3": "color(166) on color(255)",
    "shade4": "color(124) on color(255)",
}
_TERMINAL = {
    "text": "none",
    "dim": "dim",
    "line": "dim",
    "title": "bold",
    "head": "reverse",
    "total": "bold reverse",
    "key": "bold",
    "cursor": "reverse",
    "field": "underline",
    "typed": "none",
    "default": "dim",
    "library": "cyan",
    "fitted": "magenta",
    "good": "green",
    "warn": "yellow",
    "wrong": "bold red",
    "danger": "bold white on red",
    "stale": "dim reverse",
    "door": "bold",
    "limit": "red",
    "band": "cyan",
    "curve": "bold",
    "shade0": "dim",
    "shade1": "green",
    "shade2": "yellow",
    "shade3": "red",
    "shade4": "bold red",
}
_COLOURLESS = {
    **dict.fromkeys(_TERMINAL, "none"),
    "dim": "dim",
    "line": "dim",
    "title": "bold",
    "head": "reverse",
    "total": "bold reverse",
    "key": "bold",
    "cursor": "reverse",
    "field": "underline",
    "default": "dim",
    "wrong": "bold",
    "danger": "bold reverse",
    "stale": "dim reverse",
    "limit": "bold",
    "curve": "bold",
    "shade0": "dim",
    "shade4": "bold",
}
_SPECS = {"dark": _DARK, "light": _LIGHT, "terminal": _TERMINAL, "plain": _COLOURLESS}


class Look:
    """The styles of one theme, made when first used."""

    def __init__(self, theme: str) -> None:
        self.theme = theme
        self._specs = _SPECS[theme]
        self._made: dict[str, Style] = {}

    def style(self, name: str) -> Style:
        """The style of that name; an unknown name is plain text."""
        made = self._made.get(name)
        if made is None:
            made = self._made[name] = Style.parse(self._specs.get(name, self._specs["text"]))
        return made


def known(theme: str) -> frozenset[str]:
    """The names of the styles that a theme has."""
    return frozenset(_SPECS[theme])
