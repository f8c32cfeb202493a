"""The day as 24 bars stacked by group of the account, with the hours beneath and the peak marked."""

from __future__ import annotations

from typing import Final, Literal

import numpy as np

from coldbox.account.entry import Load
from coldbox.paper.drawing.canvas import Canvas
from coldbox.units import show

HOURS: Final = 24
# Letter and style of each group: told by the letter where there is no colour.
GROUPS: Final = (
    ("transmission", "█", "shade2"), ("sun", "▓", "shade3"), ("infiltration", "▒", "shade1"),
    ("product", "░", "shade4"),
    ("internal", "+", "door"), ("equipment", "=", "band"),
)  # fmt: skip


def day_bars(
    load: Load, width: int, height: int, *, system: Literal["SI", "IP"] = "SI", ascii_only: bool = False
) -> Canvas:
    """Bars of the positive heat of each hour, the groups stacked in the order of GROUPS; a legend where it fits."""
    canvas = Canvas(width, height, ascii_only=ascii_only)
    stacked = np.array(
        [
            np.maximum(sum((entry.hours_w for entry in load.entries if entry.group == group), np.zeros(HOURS)), 0.0)
            for group, _, _ in GROUPS
        ]
    )
    highest = float(stacked.sum(axis=0).max()) or 1.0
    label = show(highest, "power", system, 3)
    left = min(len(label) + 1, max(width - HOURS, 0))
    each = max((width - left) // HOURS, 1)
    rows = max(height - 3, 1)
    canvas.text(0, 0, label, "dim", left)
    edges = np.cumsum(stacked, axis=0) / highest * rows
    for hour in range(HOURS):
        x = left + hour * each
        for row in range(rows):
            level = rows - row - 0.5
            at = int(np.searchsorted(edges[:, hour], level))
            if at < len(GROUPS):
                _, character, style = GROUPS[at]
                canvas.text(x, row, character * max(each - 1, 1), style, width - x)
    canvas.text(left + load.peak_hour * each, rows, "▲", "key")
    for hour in range(0, HOURS, 6 if each < 3 else 3):
        canvas.text(left + hour * each, rows + 1 if height > rows + 1 else rows, str(hour), "dim")
    canvas.text(0, rows, "peak" if left >= 5 else "", "dim")
    x = left
    for (group, character, style), share in zip(GROUPS, stacked.sum(axis=1), strict=True):
        if share > 0.0 and height >= 6 and x + len(group) + 3 < width:
            canvas.text(x, height - 1, character, style)
            x = canvas.text(x + 2, height - 1, group, "dim") + 2
    return canvas
