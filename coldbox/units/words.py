"""Words, lists of words, yes and no, whole numbers and the shares of a food, from text."""

from __future__ import annotations

import re

from coldbox.units.numbers import read_number
from coldbox.units.refused import Refused

SHARES = ("water", "protein", "fat", "carbohydrate", "fibre", "ash")
_YES = frozenset({"yes", "y", "true", "on"})
_NO = frozenset({"no", "n", "false", "off"})
_COUNT = r"(?a)\+?[0-9]{1,9}"
_SPOKEN_SHARE = r"(?i)([a-z]+) ?[:=]? ?(.+)"
_OTHER_NAMES = {"fiber": "fibre", "carbohydrates": "carbohydrate", "carbs": "carbohydrate", "minerals": "ash"}
LONGEST_WORD = 80


def read_text(text: str, longest: int) -> str:
    """A note as it stands; line ends and tabs are kept, other control characters refused."""
    if len(text) > longest:
        raise Refused(f"… is too long ({len(text)} signs; {longest} are enough)")
    if not text.isprintable() and not all(sign.isprintable() or sign in "\n\r\t" for sign in text):
        raise Refused("has a control character in it")
    return text


def read_word(text: str) -> str:
    """One name or word, with single spaces."""
    if not text.isprintable():
        raise Refused("has a control character in it")
    if len(text) > LONGEST_WORD:
        raise Refused(f"is longer than a name of {LONGEST_WORD} signs")
    return " ".join(text.split())


def read_words(text: str) -> tuple[str, ...]:
    """Words with commas or "and" between them."""
    found = tuple(read_word(part) for part in re.split(r",|\band\b", text))
    if not all(found):
        raise Refused("has a comma with no word beside it")
    return found


def read_yes_no(text: str) -> bool:
    """Yes or no."""
    word = text.lower()
    if word in _YES:
        return True
    if word in _NO:
        return False
    raise Refused("is neither yes nor no")


def read_count(text: str) -> int:
    """A whole number, not below zero."""
    if not re.fullmatch(_COUNT, text):
        raise Refused("is not a whole number")
    return int(text)


def read_composition(text: str) -> tuple[tuple[str, float], ...]:
    """Shares by name, in the order of SHARES: "water 88 %, protein 3 %"."""
    found: dict[str, float] = {}
    for part in text.split(","):
        match = re.fullmatch(_SPOKEN_SHARE, part.strip())
        name = _OTHER_NAMES.get(match.group(1).lower(), match.group(1).lower()) if match else ""
        if match is None or name not in SHARES:
            raise Refused(f'has "{part.strip()}" where one of {", ".join(SHARES)} should stand with its share')
        if name in found:
            raise Refused(f"names {name} twice")
        value, end = read_number(match.group(2))
        if match.group(2)[end:].strip() != "%" or not 0.0 <= value <= 100.0:
            raise Refused(f"has a share of {name} that is not between 0 % and 100 %")
        found[name] = value / 100.0
    return tuple((name, found[name]) for name in SHARES if name in found)
