"""Doors and fresh air."""

from __future__ import annotations

from coldbox.project.fields.box import COLOURS, construction, neighbour, quoted
from coldbox.project.fields.declare import TRADE, Field, Table, library, name, notes
from coldbox.project.model import FACES

TABLES = (
    Table(name="doors", form="list", help="What opens. Doors are cut out of their face."),
    Table(name="ventilation", form="list", help="Fresh air brought in on purpose."),
)

_DOOR = "doors"
_AIR = "ventilation"
_FLOW = "gosney-olama-1975"
_LOADS = "ashrae-r-loads"

FIELDS = (
    name(_DOOR),
    library(_DOOR, "The door"),
    Field(_DOOR, "face", "word", "face", "The face it is cut out of.", default="front",
          default_reason="the front is where one opens the box", choices=FACES),
    Field(_DOOR, "width", "length", "width", "Clear width of one.", 0.01, 50.0, True),
    Field(_DOOR, "height", "length", "height", "Clear height of one.", 0.01, 30.0, True),
    Field(_DOOR, "count", "count", "how many", "Equal doors side by side; the figures are those of one.", 1, 1000,
          default="1", default_reason="one", source=TRADE),
    construction(_DOOR, "the face's"),
    *quoted(_DOOR, "the construction's"),
    neighbour(_DOOR, "the face's"),
    Field(_DOOR, "colour", "word", "colour", "Colour outside; it counts in the sun.", default_reason="the face's",
          choices=COLOURS),
    Field(_DOOR, "shade", "share", "shade", "Share of the sun kept off it.", 0.0, 1.0, default_reason="the face's"),
    Field(_DOOR, "solar_gain", "share", "solar gain", "Of a glass door: the share of the sun that it lets in.", 0.0,
          1.0, default="0 %", default_reason="not glass", source=TRADE),
    Field(_DOOR, "passages", "rate", "passages", "How often it is opened, within its hours: per hour, or per day.", 0.0,
          7200.0 / 3600.0, default="0/h", default_reason="only what is given counts", source=_FLOW),
    Field(_DOOR, "open_each", "duration", "open each time", "How long it stands open at each passage.", 0.0, 3600.0,
          default="15 s", default_reason="through by hand or truck", source=_LOADS),
    Field(_DOOR, "stood_open", "daily_duration", "stood open", "Minutes a day it is left open besides, within its "
          "hours.", 0.0, 1.0, default="0 min/day", default_reason="only what is given counts", source=_LOADS),
    Field(_DOOR, "hours", "hours", "hours", "When there is traffic.", default="07:00-17:00",
          default_reason="a working day", source=TRADE),
    Field(_DOOR, "protection", "word", "protection", "What holds the air back; one, or a list.", default="none",
          default_reason="an open doorway", choices=("none", "strip curtain", "air curtain", "vestibule", "fast door"),
          many="list", source=_LOADS),
    Field(_DOOR, "effectiveness", "share", "effectiveness", "Share of the air that the protection holds back.", 0.0,
          1.0, default_reason="usual for that protection", source=_LOADS),
    Field(_DOOR, "protection_power", "power", "protection's power", "What an air curtain's motor draws while it runs.",
          0.0, 1e5, default_reason="usual for that protection", source=TRADE),
    Field(_DOOR, "flow_factor", "share", "flow factor", "Share of the fully open flow that comes about in short "
          "openings.", 0.0, 1.0, default="80 %", default_reason="usual for openings of less than a minute",
          source=_LOADS),
    Field(_DOOR, "gasket_leakage", "gasket_flow", "gasket leakage", "Air past the gasket of the shut door, for each "
          "metre of its outline.", 0.0, 100.0 / 3600.0, default="0 m³/h per m",
          default_reason="counted in the leakage", source=TRADE),
    Field(_DOOR, "heater", "power", "heater", "Frame or glass heater of one door, always on.", 0.0, 1e5, default="0 W",
          default_reason="none", source=TRADE),
    Field(_DOOR, "heater_to_room", "share", "heater to room", "Share of the door heater that ends up inside.", 0.0, 1.0,
          default="50 %", default_reason="half goes each way", source=TRADE),
    notes(_DOOR),
    name(_AIR),
    Field(_AIR, "flow", "flow", "flow", "Fresh air brought in while it runs.", 0.0, 1000.0, True),
    Field(_AIR, "hours", "hours", "hours", "When it runs.", default="always", default_reason="produce breathes all day",
          source=TRADE),
    Field(_AIR, "recovery", "share", "recovery", "Share of the difference that a heat exchanger takes back.", 0.0, 1.0,
          default="0 %", default_reason="no heat exchanger", source=TRADE),
    Field(_AIR, "dried_to", "temperature", "dried to", "Dew point that the fresh air is dried to.", -80.0, 30.0,
          default_reason="not dried"),
    neighbour(_AIR, "where the air comes from: the box's neighbour"),
    notes(_AIR),
)  # fmt: skip
