"""Numbers as people write them, and nothing that only might be one."""

from __future__ import annotations

import re

from coldbox.units.refused import Refused

_NUMBER = re.compile(
    r"([+-]?) ?(?:(?:([0-9]{1,6})[ -]+)?([0-9]{1,2})/([0-9]{1,3})(?![0-9.,])"
    r"|([0-9]{1,3}(?:[ _][0-9]{3})+(?![0-9])|[0-9]+)?([.,][0-9]+)?([eE][+-]?[0-9]+)?)"
)
_NOT_A_NUMBER = ("nan", "inf", "infinity")
LARGEST_DENOMINATOR = 128


def read_number(text: str, start: int = 0) -> tuple[float, int]:
    """The number at `start` and the place where it ends.

    Reads 12, 1.5, 1,5, .5, 1e3, 12 000, 12_000, 1/2, 3 1/2, 3-1/2. A comma followed by exactly three digits is refused,
    except behind a lone 0, where it can only be a decimal.

    text: in the spelling of `plain`. start: index. Result: float, index. Errors: Refused. Source: our own grammar.
    Example: read_number("3 1/2 in") is (3.5, 5).
    """
    match = _NUMBER.match(text, start)
    if match is None:  # the pattern also matches nothing, so this is the empty text beyond its end
        raise Refused("holds no number")
    sign, whole, upper, lower, digits, decimals, exponent = match.groups()
    if lower is not None:
        value = _fraction(whole, upper, lower)
    elif digits is None and decimals is None:
        raise Refused(_no_number(text))
    else:
        if decimals is not None and decimals[0] == ",":
            if len(decimals) == 4 and digits != "0":
                one, other = f"{digits or 0}.{decimals[1:]}", f"{digits or ''}{decimals[1:]}"
                raise Refused(f"has a comma that could stand for {one} or for {other} (write the one you mean)")
            decimals = "." + decimals[1:]
        if digits is not None and not digits.isdigit():
            digits = digits.replace(" ", "").replace("_", "")
        value = float(f"{digits or '0'}{decimals or ''}{exponent or ''}")
        if value in (float("inf"), 0.0) and _is_out_of_range(value, digits, decimals):
            raise Refused("is a number too large or too small to be one")
    end = match.end()
    if end < len(text) and text[end] in ".,_" and end + 1 < len(text) and text[end + 1].isdigit():
        raise Refused("has a number with more than one point or comma")
    return (-value if sign == "-" else value), end


def _fraction(whole: str | None, upper: str, lower: str) -> float:
    over, under = int(upper), int(lower)
    if (
        upper[0] == "0"
        or lower[0] == "0"
        or not 1 < under <= LARGEST_DENOMINATOR
        or (whole is not None and over >= under)
    ):
        raise Refused("has a fraction that cannot be read (write a decimal)")
    return (int(whole) if whole else 0) + over / under


def _is_out_of_range(value: float, digits: str | None, decimals: str | None) -> bool:
    return value != 0.0 or any(sign in "123456789" for sign in (digits or "") + (decimals or ""))


def _no_number(text: str) -> str:
    word = text.strip().lower().lstrip("+-")
    if word.startswith(_NOT_A_NUMBER) and not word.startswith(("inc", "ins")):
        return "is not a number that can be computed with"
    return "does not begin with a number" if text.strip() else "is empty"
