"""A finding: what there is to say about a box beside its numbers."""

from __future__ import annotations

from typing import Literal

from coldbox.record import Record
from coldbox.units import show


class Figure(Record):
    """A number in a sentence, in SI until somebody reads it; `kind` is a kind of `units`."""

    value: float
    kind: str
    digits: int | None = None
    both: bool = False  # in SI its IP figure follows in brackets: rules that are known by that one


Text = str | tuple[str | Figure, ...]  # a sentence, or its pieces with the figures among them


class Finding(Record):
    """Something a careful colleague would say. `path` is the key path it is about; `standing` cautions never set the
    exit status."""

    level: Literal["note", "caution", "danger"]
    id: str
    text: Text
    rule: str
    path: str = ""
    standing: bool = False

    def words(self, system: Literal["SI", "IP"] = "SI") -> str:
        """The sentence with its figures in SI or IP."""
        if isinstance(self.text, str):
            return self.text
        return "".join(piece if isinstance(piece, str) else _shown(piece, system) for piece in self.text)


def _shown(figure: Figure, system: Literal["SI", "IP"]) -> str:
    text = show(figure.value, figure.kind, system, figure.digits)
    return (
        f"{text} ({show(figure.value, figure.kind, 'IP', figure.digits)})" if figure.both and system == "SI" else text
    )
