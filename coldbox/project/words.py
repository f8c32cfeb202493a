"""Text of a file that is safe to print, the rules of names, and the nearest known word."""

from __future__ import annotations

from collections.abc import Iterable

from coldbox.project.fields import Field

LONGEST_NAME = 60
LONGEST_TEXT = 400
LONGEST_NOTES = 20_000
_QUOTED = 60
_NO_NAME = '/\\[]="'


def clean(text: str, longest: int = _QUOTED) -> str:
    """The text as it may be printed in a sentence: one line, every sign that is not printable written out."""
    shown = text if len(text) <= longest else text[: longest - 1] + "…"
    if shown.isprintable():
        return shown
    return "".join(sign if sign.isprintable() else f"\\u{ord(sign):04x}" for sign in shown)


def nearest(word: str, known: Iterable[str], likeness: float = 0.55) -> str | None:
    """The known word closest to this one, or None when none is close; `likeness` runs from 0 to 1, the same word."""
    from difflib import get_close_matches

    folded = {one.casefold(): one for one in known}
    close = get_close_matches(word[:LONGEST_NAME].casefold(), folded, n=1, cutoff=likeness)
    return folded[close[0]] if close else None


def listed(words: Iterable[str]) -> str:
    """`"a", "b" or "c"`."""
    quoted = [f'"{word}"' for word in words]
    return " or ".join([", ".join(quoted[:-1]), quoted[-1]] if len(quoted) > 1 else quoted)


def fault_of_text(text: str, longest: int = LONGEST_TEXT, *, lines: bool = False) -> str | None:
    """What is wrong with a text that will be printed, as the rest of a sentence; None when nothing is."""
    if len(text) > longest:
        return f"is {len(text)} characters long. Write at most {longest}."
    if text.isprintable():
        return None
    for sign in text:
        if not sign.isprintable() and not (lines and sign in "\n\t"):
            return f"holds a sign that cannot be printed (U+{ord(sign):04X}). Write plain letters."
    return None


def fault_of_name(name: str) -> str | None:
    """What is wrong with a name, as the rest of a sentence; None when nothing is.

    Names stand in key paths, JSON and file names: one line, no slashes, brackets, quotes or equals signs.
    """
    if not name or name != name.strip():
        return "is no name: write letters, with no blanks around them."
    fault = fault_of_text(name, LONGEST_NAME)
    if fault is not None:
        return fault
    if name.startswith(".") or any(sign in name for sign in _NO_NAME):
        return f"is no name: it may not begin with a point or hold any of {' '.join(_NO_NAME)}"
    return None


def fault_of(field: Field, text: str) -> str | None:
    """What is wrong with the text of a "text" or "name" field."""
    if field.kind == "name":
        return fault_of_name(text)
    if field.key == "notes":
        return fault_of_text(text, LONGEST_NOTES, lines=True)
    if not text.strip() and (field.required or field.refers):
        return "is empty. Write a text, or leave the key out."
    return fault_of_text(text)
