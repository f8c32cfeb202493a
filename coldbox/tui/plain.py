"""Text as cells of a terminal: no control characters, wide ones two cells wide, in ASCII where it must be."""

from __future__ import annotations

import unicodedata
from collections.abc import Sequence
from functools import lru_cache

_LINES = {
    **dict.fromkeys("─━┄┅┈┉╌╍═╴╶╸╺", "-"),
    **dict.fromkeys("│┃┆┇┊┋╎╏║╵╷╹╻", "|"),
    **dict.fromkeys("┌┐└┘├┤┬┴┼╭╮╯╰┏┓┗┛┝┥┯┷┿╔╗╚╝╠╣╦╩╬┣┫┳┻╋", "+"),
    **dict(zip("▁▂▃▄▅▆▇█", "_..:-=+#", strict=True)),
    **dict(zip("░▒▓", ".:%", strict=True)),
    **dict.fromkeys("▏▎▍▌▋▊▉▐▀", "#"),
    **dict(zip("←→↑↓▲▼▶◀►◄•●○◆·…✓✗▸▾", "<>^v^v><><*oo*.~vx>v", strict=True)),
}
_LETTERS = {
    "°": "",
    "²": "2",
    "³": "3",
    "·": ".",
    "×": "x",
    "±": "+-",
    "–": "-",
    "—": "-",
    "−": "-",
    "\N{NO-BREAK SPACE}": " ",
    "\N{NARROW NO-BREAK SPACE}": " ",
    "\N{THIN SPACE}": " ",
    "“": '"',
    "”": '"',
    "„": '"',
    "‘": "'",
    "’": "'",
    "α": "alpha",
    "µ": "u",
    "μ": "u",
    "λ": "lambda",
    "ψ": "psi",
    "Ψ": "psi",
    "ε": "eps",
    "ρ": "rho",
    "Δ": "d",
    "ß": "ss",
    "ø": "o",
    "Ø": "O",
    "æ": "ae",
    "ł": "l",
}
_BRAILLE = (0x2800, 0x28FF)


def cells(text: str, *, ascii_drawing: bool = False, ascii_letters: bool = False) -> Sequence[str]:
    """One string a cell; after a wide character an empty one; marks that combine stay with their letter."""
    return text if text.isascii() and text.isprintable() else _cells(text, ascii_drawing, ascii_letters)


@lru_cache(4096)
def _cells(text: str, ascii_drawing: bool, ascii_letters: bool) -> tuple[str, ...]:
    made: list[str] = []
    for character in text:
        if character.isascii() and character.isprintable():
            made.append(character)
            continue
        shown = _shown(character, ascii_drawing, ascii_letters)
        if shown == "" and unicodedata.combining(character):
            if made and not ascii_letters:
                made[-1] += character
            continue
        made.extend(shown)
        if len(shown) == 1 and unicodedata.east_asian_width(shown) in "WF":
            made.append("")
    return tuple(made)


@lru_cache(1024)
def _shown(character: str, ascii_drawing: bool, ascii_letters: bool) -> str:
    if unicodedata.combining(character):
        return ""
    if unicodedata.category(character) in ("Cc", "Cf", "Cs", "Co", "Cn", "Zl", "Zp", "Mn", "Me"):
        return "?" if ascii_letters else "\N{REPLACEMENT CHARACTER}"
    if ascii_drawing:
        if character in _LINES:
            return _LINES[character]
        if _BRAILLE[0] <= ord(character) <= _BRAILLE[1]:
            return " " if ord(character) == _BRAILLE[0] else "*"
    if not ascii_letters:
        return character
    if character in _LETTERS:
        return _LETTERS[character]
    plain = unicodedata.normalize("NFKD", character).encode("ascii", "ignore").decode()
    return plain or ("??" if unicodedata.east_asian_width(character) in "WF" else "?")


def width(text: str) -> int:
    """How many cells a text takes."""
    return len(text) if text.isascii() else len(cells(text))
