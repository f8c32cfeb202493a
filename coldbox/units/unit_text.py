"""Unit texts such as "W/m²·K", "Btu/h-ft2-°F", "kg per day", put together from the whitelist.

The rule: a product is written with ·, *, ., -, a space, or nothing; everything after a / is in the denominator, also
behind a later · or /. A bracket stands alone between the strokes, so that nobody has to guess what it governs.
"""

from __future__ import annotations

import re
from collections.abc import Iterator, Mapping
from functools import lru_cache

from coldbox.units.atoms import AMBIGUOUS, ATOMS, CASE_MATTERS, INCH, NONE, POUND, SIDE_BY_SIDE, Dims
from coldbox.units.refused import Refused

LONGEST_UNIT = 48
LONGEST_RUN = 12

# Whole texts whose parts mean something only together.
_WHOLE: dict[str, tuple[float, Dims]] = {
    "gr/lb": (1 / 7000, NONE),
    "gr/lbm": (1 / 7000, NONE),
    "in wg": ATOMS["inH2O"],
    "in H2O": ATOMS["inH2O"],
    "in Hg": ATOMS["inHg"],
    "in WC": ATOMS["inH2O"],
    "mm Hg": ATOMS["mmHg"],
    "lb/in^2": (POUND * 9.80665 / INCH**2, ATOMS["psi"][1]),
}
_FACTOR = re.compile(r"([A-Za-z°'\"$£¥€%]+)(?:\^(-?[1-9])|([1-9]))?")
_WORDS = (
    (r"(?i)\bsquare |\bsq\.? ?(?=ft|feet|foot|in|m\b|met|cm|yd|yard)", "²"),
    (r"(?i)\bcubic |\bcu\.? ?(?=ft|feet|foot|in|m\b|met|cm|yd|yard)", "³"),
)
_PER = r"(?i) ?\bper\b ?| an? (?=day|week|hour|minute|second|m\b|ft\b)"
_SCALE = r"(?i)(?:\bdeg(?:rees?|s)?\.? ?|° ?)(?=[CFK]\b)"
_TONS = r"(?i)\b(short|long|metric|US|imp) (ton|gal)(?:ne|lon)?s?\b"
_REFRIGERATION = r"(?i)\btons?(?: of)? refrigeration\b|\brefrigeration tons?\b"
_PHRASES = ("short ton", "long ton", "metric ton", "US gal", "imp gal", "ton of refrigeration")


@lru_cache(maxsize=1024)
def unit(text: str) -> tuple[float, Dims]:
    """Factor to SI and dimension of a unit text.

    text: in the spelling of `plain`, without its number, at most 48 signs. Result: float, exponents of m, kg, s, K.
    Errors: Refused, with the part that is not known. Source: our own grammar; the factors are those of `atoms`.
    Example: unit("W/m^2*K") is (1.0, (0, 1, -3, -1)).
    """
    known = ATOMS.get(text) or _WHOLE.get(text)
    if known is not None:
        return known
    if len(text) > LONGEST_UNIT:
        raise Refused("has a unit too long to be one")
    if text in AMBIGUOUS:
        raise Refused(AMBIGUOUS[text])
    written = _in_signs(text)
    factor, dims = 1.0, NONE
    for upper, brackets, part in _strokes(written):
        if brackets and part[0] == "(" and part[-1] == ")" and "(" not in part[1:] and ")" not in part[:-1]:
            inner = part[1:-1]
            if not inner.strip():
                raise Refused("has an empty bracket in its unit")
            size, of = unit(inner) if "/" in inner else _product(inner)
        elif brackets:
            raise Refused("has a bracket in its unit that can be read two ways (put a / before and after it)")
        else:
            size, of = _product(part)
        factor = factor * size if upper else factor / size
        way = 1 if upper else -1
        dims = (dims[0] + way * of[0], dims[1] + way * of[1], dims[2] + way * of[2], dims[3] + way * of[3])
    return factor, dims


def _in_signs(text: str) -> str:
    """Words such as "per", "sq ft" and "deg F" in signs."""
    small = text.lower()
    if " " in text or "." in text or small[:2] in ("sq", "cu", "de"):
        # A pattern costs half a millisecond when it is first used, so each waits for a letter of its own.
        if "sq" in small or "cu" in small:
            for pattern, sign in _WORDS:
                text = re.sub(pattern, sign, text)
        if "per" in small or " a" in small:
            text = re.sub(_PER, "/", text)
        if "ton" in small or "gal" in small:
            text = re.sub(_REFRIGERATION, "ton of refrigeration", text)
            text = re.sub(_TONS, lambda found: _phrase(found.group(1), found.group(2)), text)
    return re.sub(_SCALE, "°", text) if "°" in text or "deg" in small else text


def _phrase(first: str, second: str) -> str:
    wanted = f"{first} {second}".lower()
    return next((phrase for phrase in _PHRASES if phrase.lower() == wanted), wanted)


def _strokes(text: str) -> Iterator[tuple[bool, bool, str]]:
    """The parts between the strokes outside brackets: whether above, whether with a bracket, the part."""
    depth, start, upper, brackets = 0, 0, True, False
    for place, sign in enumerate(text + "/"):
        if sign == "(":
            depth, brackets = depth + 1, True
        elif sign == ")":
            depth, brackets = depth - 1, True
        if depth < 0 or (place == len(text) and depth):
            raise Refused("has a bracket in its unit without its other half")
        if sign == "/" and not depth:
            part = text[start:place].strip()
            if part:
                if not (upper and part == "1"):
                    yield upper, brackets, part
            elif not (upper and start == 0 and place < len(text)):
                raise Refused("has a / in its unit with nothing beside it" if text else "has no unit")
            start, upper, brackets = place + 1, False, False


def _product(text: str) -> tuple[float, Dims]:
    """Factor and dimension of factors side by side."""
    factor, dims, place, first = 1.0, NONE, 0, True
    while place < len(text):
        if not first:
            gap = place
            while place < len(text) and text[place] in " *.-":
                place += 1
            if place == len(text):
                if text[gap:].strip() in ("", "."):
                    break
                raise Refused("has a unit that stops in the middle")
            if text[gap:place].replace(" ", "") not in ("", "*", ".", "-"):
                raise Refused("has a unit with too many signs in it")
        size, of, power, place = _one(text, place)
        factor *= size**power
        dims = (dims[0] + power * of[0], dims[1] + power * of[1], dims[2] + power * of[2], dims[3] + power * of[3])
        first = False
    return factor, dims


def _one(text: str, place: int) -> tuple[float, Dims, int, int]:
    """One factor with its power: its size, dimension, power, and where it ends."""
    raised = {"²": 2, "³": 3}.get(text[place], 1)
    if raised != 1:
        place += 1
    for phrase in _PHRASES:
        if text.startswith(phrase, place):
            size, dims = ATOMS[phrase]
            return size, dims, 1, place + len(phrase)
    match = _FACTOR.match(text, place)
    if match is None:
        raise Refused(f'has "{text[place:].strip()}" where a unit should stand')
    run, power, digit = match.groups()
    power = int(power or digit or 1) * raised
    pieces = _pieces(run)
    size, of = pieces[-1]
    factor = size**power
    dims = (power * of[0], power * of[1], power * of[2], power * of[3])
    for size, of in pieces[:-1]:
        factor *= size
        dims = (dims[0] + of[0], dims[1] + of[1], dims[2] + of[2], dims[3] + of[3])
    return factor, dims, 1, match.end()


def _pieces(run: str) -> list[tuple[float, Dims]]:
    """The units in a run of letters: one, or short symbols side by side."""
    known = ATOMS.get(run)
    if known is not None:
        return [known]
    if run in AMBIGUOUS:
        raise Refused(AMBIGUOUS[run])
    known = _other_case().get(run.casefold())
    if known is not None:
        return [known]
    symbols = (_split(run, _SYMBOLS) or _split(run.casefold(), _small_symbols())) if len(run) <= LONGEST_RUN else None
    if symbols is None:
        raise Refused(f'has a unit that is not known here, "{run}"')
    return [ATOMS[symbol] for symbol in symbols]


def _split(run: str, symbols: Mapping[str, str]) -> list[str] | None:
    """The way to cut a run into two to four short symbols, the longer ones first."""
    for length in range(min(3, len(run) - 1), 0, -1):
        head, tail = symbols.get(run[:length]), run[length:]
        if head is None:
            continue
        last = symbols.get(tail)
        if last is not None:
            return [head, last]
        rest = _split(tail, symbols) if len(tail) > 1 else None
        if rest is not None and len(rest) < 4:
            return [head, *rest]
    return None


_SYMBOLS = {symbol: symbol for symbol in SIDE_BY_SIDE}


@lru_cache(maxsize=1)
def _small_symbols() -> dict[str, str]:
    return {symbol.casefold(): symbol for symbol in SIDE_BY_SIDE}


@lru_cache(maxsize=1)
def _other_case() -> dict[str, tuple[float, Dims]]:
    """Units by their small letters, where that leaves no doubt."""
    found: dict[str, tuple[float, Dims]] = {}
    doubtful = {name.casefold() for name in CASE_MATTERS}
    for name, known in ATOMS.items():
        small = name.casefold()
        if small in doubtful or name in CASE_MATTERS:
            continue
        if found.setdefault(small, known) != known:
            doubtful.add(small)
    return {small: known for small, known in found.items() if small not in doubtful}
