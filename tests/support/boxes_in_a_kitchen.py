"""A small box in a kitchen, as a project file, and how long it holds."""

from __future__ import annotations

from pathlib import Path
from typing import Any

import coldbox
from coldbox.spread import hold
from coldbox.timeline.results import Kind, Outage

USUAL: dict[str, Any] = {
    "length": "1.2 m", "width": "1.0 m", "height": "1.1 m", "temperature": "-18 °C", "around": "24 °C", "wall": "80 mm",
    "leakage": "0.3/h", "fittings": "0 kg", "product": "beef, lean", "stored": "150 kg", "pieces": 20,
    "start": "-18 °C", "limit": "-12 °C", "where": "mean", "minutes": "0 min", "ice": "0 kg", "horizon": "72 h",
    "at": "14:00", "piece": ["0.3 m", "0.2 m", "0.15 m"], "powered": "true",
}  # fmt: skip


def box(**changes: Any) -> str:
    given = {**USUAL, **changes}
    ice = (
        ""
        if given["ice"] == "0 kg"
        else f"""
[[packs]]
name = "ice"
kind = "ice"
mass = "{given["ice"]}"
start_temperature = "0 °C"
frozen = "100 %"
place = "around"
"""
    )
    return f"""format = 1
[box]
length = "{given["length"]}"
width = "{given["width"]}"
height = "{given["height"]}"
temperature = "{given["temperature"]}"
construction = "wall"
neighbour = "kitchen"
leakage = "{given["leakage"]}"
fittings = "{given["fittings"]}"
powered = {given["powered"]}
[neighbours.kitchen]
temperature = "{given["around"]}"
[constructions.wall]
layers = [
  {{ material = "steel sheet", thickness = "0.6 mm" }},
  {{ material = "PUR foam", thickness = "{given["wall"]}", conductivity = "0.024 W/mK" }},
  {{ material = "polyethylene", thickness = "1 mm" }},
]
[[lots]]
name = "food"
product = "{given["product"]}"
stored = "{given["stored"]}"
start_temperature = "{given["start"]}"
piece = {_listed(given["piece"])}
pieces = {given["pieces"]}
exposed = ["top", "sides", "bottom"]
limits = [{{ above = "{given["limit"]}", where = "{given["where"]}", minutes = "{given["minutes"]}" }}]
{ice}
[outage]
at = "{given["at"]}"
horizon = "{given["horizon"]}"
"""


def _listed(words: list[str]) -> str:
    return "[" + ", ".join(f'"{word}"' for word in words) + "]"


def outage(folder: Path, *, more: str = "", kind: Kind = "outage", **changes: Any) -> Outage:
    """An outage of such a box, or a run of another kind; `more` is appended to its file."""
    file = folder / "box.toml"
    file.write_text(box(**changes) + more, encoding="utf-8")
    found = hold.run(coldbox.open(file), kind, count=0)
    assert found.heat_balance_error < 1e-6
    return found


def holds(folder: Path, **changes: Any) -> float:
    """Hours until the limit; the horizon where it is not reached."""
    found = outage(folder, **changes)
    return found.horizon_h if found.hold_h is None else found.hold_h
