"""A finding: what account and timeline have to say about a box beside its numbers."""

from __future__ import annotations

from typing import Literal

from coldbox.record import Record


class Finding(Record):
    """Something a careful colleague would say. `path` is the key path it is about; `standing` cautions never set the
    exit status."""

    level: Literal["note", "caution", "danger"]
    id: str
    text: str
    rule: str
    path: str = ""
    standing: bool = False
