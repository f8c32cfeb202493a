"""The editor of one line: text, the place of the cursor, and the keys that change them. It paints nothing itself."""

from __future__ import annotations

LONGEST = 2000


class Editor:
    """One line being typed."""

    def __init__(self, text: str = "", *, fresh: bool = False) -> None:
        self.text = text
        self.at = len(text)
        self.fresh = fresh  # the first letter typed takes the place of all that stands there
        self.offset = 0  # first letter shown, where the line is longer than its field

    def type(self, text: str) -> None:
        """Letters from the keyboard."""
        if self.fresh:
            self.text, self.at, self.fresh = "", 0, False
        text = text[: max(LONGEST - len(self.text), 0)]
        self.text = self.text[: self.at] + text + self.text[self.at :]
        self.at += len(text)

    def paste(self, text: str) -> int:
        """What was pasted: of several lines the first that is not empty; how many lines were left out."""
        lines = [line for line in (one.strip() for one in text.splitlines()) if line]
        if lines:
            self.type("".join(character if character.isprintable() else " " for character in lines[0]))
        return max(len(lines) - 1, 0)

    def key(self, key: str) -> bool:
        """A key that moves or erases; whether it was one."""
        before, after = self.text[: self.at], self.text[self.at :]
        match key:
            case "left" | "ctrl+b":
                self.at = max(self.at - 1, 0)
            case "right" | "ctrl+f":
                self.at = min(self.at + 1, len(self.text))
            case "home" | "ctrl+a":
                self.at = 0
            case "end" | "ctrl+e":
                self.at = len(self.text)
            case "backspace" | "ctrl+h":
                self.text, self.at = before[:-1] + after, max(self.at - 1, 0)
            case "delete":
                self.text = before + after[1:]
            case "ctrl+u":
                self.text, self.at = after, 0
            case "ctrl+k":
                self.text = before
            case "ctrl+w":
                kept = before.rstrip().rpartition(" ")
                self.text, self.at = kept[0] + kept[1] + after, len(kept[0] + kept[1])
            case _:
                return False
        self.fresh = False
        return True

    def shown(self, width: int) -> tuple[str, int]:
        """The part that fits, and the column of the cursor in it."""
        room = max(width - 1, 1)
        if self.at < self.offset:
            self.offset = self.at
        elif self.at > self.offset + room:
            self.offset = self.at - room
        return self.text[self.offset : self.offset + width], self.at - self.offset
