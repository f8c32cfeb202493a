"""What was made of a typed value: itself in the units of the screen, where it was typed in others."""

from __future__ import annotations

from typing import Any

from coldbox.errors import ColdboxError
from coldbox.project import values
from coldbox.project.fields import Field
from coldbox.project.origins import declaration
from coldbox.units import KINDS, show, show_spread


def understood(path: str, value: Any, system: values.System) -> str:
    """A value in the units of the screen; "" where that says nothing new."""
    field = declaration(path)
    if field is None or not isinstance(value, str) or field.many or field.kind not in KINDS:
        return ""
    return of_field(field, value, system)


def of_field(field: Field, text: str, system: values.System) -> str:
    """The same of a field's text."""
    try:
        entered = values.from_text(field, text, system)
    except values.Wrong:
        return ""
    kind = entered.kind or field.kind
    if kind not in KINDS or kind in ("text", "name", "word"):
        return ""
    try:
        plain = show(entered.value, kind, system)
        if entered.spread is not None:
            plain += f" {show_spread(entered.spread, kind, system)}"
    except (ColdboxError, TypeError, ValueError, KeyError):
        return ""
    return "" if plain == text.strip() else plain
