"""How a text is refused inside this package, and how it is quoted when the sentence is made."""

from __future__ import annotations

LONGEST_QUOTE = 48


class Refused(Exception):
    """A text that is not what was wanted: `reason` continues a sentence that begins with the quoted text."""

    def __init__(self, reason: str) -> None:
        self.reason = _printable(reason)
        super().__init__(reason)


def _printable(text: str) -> str:
    return text if text.isprintable() else "".join(sign if sign.isprintable() else " " for sign in text)


def quoted(text: str) -> str:
    """The text as it may stand in a message: on one line, no control characters, not too long."""
    clean = " ".join(_printable(text[: 4 * LONGEST_QUOTE]).split())
    return clean if len(clean) <= LONGEST_QUOTE else clean[: LONGEST_QUOTE - 1] + "…"
