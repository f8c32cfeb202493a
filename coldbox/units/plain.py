"""One spelling for what keyboards and web pages write in many: signs, spaces, superscripts, fractions."""

from __future__ import annotations

_SAME = {
    " ": "\u00a0\u2002\u2003\u2004\u2005\u2006\u2007\u2008\u2009\u200a\u202f\u205f\u3000\t\n\r\v\f",
    "-": "\u2212\u2010\u2011\u2012\u2013\u2014",
    "*": "·⋅•∙×",
    "°": "º˚",
    "'": "′’‘",
    '"': "″”“",
    "%": "％",
    "": "\u200b\ufeff",
    "^1": "¹",
    "^2": "²",
    "^3": "³",
    "^-": "⁻",
    "°C": "℃",
    "°F": "℉",
    "/": "∕⁄",
    " 1/2": "½",
    " 1/4": "¼",
    " 3/4": "¾",
    " 1/8": "⅛",
    " 3/8": "⅜",
    " 5/8": "⅝",
    " 7/8": "⅞",
    " 1/3": "⅓",
    " 2/3": "⅔",
}
_TABLE = {ord(sign): plain for plain, signs in _SAME.items() for sign in signs}


def plain(text: str) -> str:
    """The text in the spelling the grammar reads.

    Superscripts become `^2`, so that "5²" can never be taken for 52. Joined minus signs of a range stay visible.

    text: what was typed. Result: the same in ASCII apart from ° and ± and letters. Errors: none. Source: our own
    grammar. Example: plain("0.022 W/m²·K") is "0.022 W/m^2*K".
    """
    if not text.isascii():
        text = text.translate(_TABLE)
        if "^" in text:
            text = text.replace("^-^", "^-")
    elif "\n" in text or "\t" in text or "\r" in text:
        text = text.translate(_TABLE)
    if "+" in text or "''" in text or "**" in text:
        text = text.replace("+/-", "±").replace("+-", "±").replace("''", '"').replace("**", "^")
    return text.strip()
