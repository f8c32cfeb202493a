"""What happens over time: an outage, a trip."""

from __future__ import annotations

from coldbox.project.fields.declare import TRADE, Field, Table, name, notes

TABLES = (
    Table(name="outage", form="one", help="When the power goes, and what is asked."),
    Table(name="outage.events", form="list", help="What happens meanwhile."),
    Table(name="trip", form="one", help="A trip of a truck or a box: legs and stops."),
    Table(name="trip.legs", form="list", help="A stretch driven."),
    Table(
        name="trip.stops",
        form="list",
        help="A stop: the door opens, goods leave. Stop n follows leg n unless it names one.",
    ),
    Table(name="trip.stops.deliver", form="list", help="What leaves the box at a stop."),
)

_OUT = "outage"
_EVENT = "outage.events"
_TRIP = "trip"
_LEG = "trip.legs"
_STOP = "trip.stops"
_LEAVES = "trip.stops.deliver"
_DAY = 86400.0
_HORIZON = 60 * _DAY

FIELDS = (
    Field(_OUT, "at", "clock", "power goes at", "When the power goes.", 0.0, 24.0, default="14:00",
          default_reason="the worst hour of a summer day, nearly", source=TRADE),
    Field(_OUT, "lasts", "duration", "lasts", "How long until the power is back.", 0.0, _HORIZON,
          default_reason="to the horizon"),
    Field(_OUT, "asked", "duration", "asked", "How long it should hold.", 0.0, _HORIZON, default="24 h",
          default_reason="a day", source=TRADE),
    Field(_OUT, "horizon", "duration", "horizon", "How far to look.", 3600.0, _HORIZON, default="72 h",
          default_reason="three days", source=TRADE),
    Field(_OUT, "going_on", "word", "going on", "What goes on without power.", default_reason="none: all of it stops",
          choices=("doors", "people", "trucks", "deliveries"), many="list"),
    Field(_OUT, "dry_bulb", "temperature", "outdoor temperature", "The day's highest during the outage.", -60.0, 60.0,
          default_reason="the site's"),
    Field(_OUT, "events", "list", "events", 'What happens: [{ at = "16:00", what = "door open", door = "main", '
          'lasts = "10 min" }].', default_reason="none"),
    notes(_OUT),
    name(_EVENT),
    Field(_EVENT, "at", "clock", "at", 'A clock time ("16:00", "day 2 06:00"), or hours after the power goes ("6 '
          'h").', 0.0, 1464.0, True, other_kind="duration"),
    Field(_EVENT, "what", "word", "what", "What happens.", required=True,
          choices=("door open", "goods in", "goods out", "pack in", "pack out", "power on", "power off", "moved")),
    Field(_EVENT, "lasts", "duration", "lasts", "How long a door stays open.", 0.0, _HORIZON,
          default_reason="needed by door open"),
    Field(_EVENT, "door", "name", "door", "Which door.", default_reason="the only one", refers="doors"),
    Field(_EVENT, "lot", "name", "lot", "Which lot.", default_reason="the only one", refers="lots"),
    Field(_EVENT, "pack", "name", "pack", "Which pack.", default_reason="the only one", refers="packs"),
    Field(_EVENT, "mass", "mass", "mass", "How much of it.", 0.0, 1e8, default_reason="all of it"),
    Field(_EVENT, "temperature", "temperature", "temperature", "How warm it comes in.", -200.0, 120.0,
          default_reason="its arrival temperature"),
    Field(_EVENT, "neighbour", "name", "neighbour", "Where the box is moved to.", default_reason="needed by moved",
          choices=("outdoors", "room"), refers="neighbours"),
    Field(_EVENT, "heading", "bearing", "bearing", "Which way the front then faces.", 0.0, 360.0,
          default_reason="as before"),
    Field(_EVENT, "shade", "share", "shade", "Share of the sun kept off it from then on.", 0.0, 1.0,
          default_reason="as before"),
    notes(_EVENT),
    Field(_TRIP, "starts", "clock", "starts", "When the trip starts.", 0.0, 24.0, default="08:00",
          default_reason="a working day", source=TRADE),
    Field(_TRIP, "dry_bulb", "temperature", "outdoor temperature", "The day's highest on the trip.", -60.0, 60.0,
          default_reason="the site's"),
    Field(_TRIP, "legs", "list", "legs", 'What is driven: [{ name = "to the bakery", lasts = "50 min" }].',
          default_reason="none"),
    Field(_TRIP, "stops", "list", "stops", 'Where it stops: [{ lasts = "15 min", open = "rear", open_for = "6 min" }].',
          default_reason="none"),
    notes(_TRIP),
    name(_LEG),
    Field(_LEG, "lasts", "duration", "lasts", "How long it is driven.", 1.0, 30 * _DAY, True),
    Field(_LEG, "heading", "bearing", "heading", "Which way it travels; the front faces backwards.", 0.0, 360.0,
          default_reason="the worst"),
    Field(_LEG, "speed", "speed", "speed", "How fast.", 0.0, 70.0, default="50 km/h", default_reason="roads and towns",
          source=TRADE),
    Field(_LEG, "dry_bulb", "temperature", "outdoor temperature", "The day's highest on this leg.", -60.0, 60.0,
          default_reason="the trip's"),
    Field(_LEG, "shade", "share", "shade", "Share of the sun kept off it.", 0.0, 1.0, default="0 %",
          default_reason="on the open road", source=TRADE),
    Field(_LEG, "power", "yes_no", "power", "Whether the vehicle's unit runs.", default="true",
          default_reason="the engine runs", source=TRADE),
    notes(_LEG),
    name(_STOP),
    Field(_STOP, "after", "name", "after", "The leg it follows.", default_reason="stop n follows leg n",
          refers="trip.legs"),
    Field(_STOP, "lasts", "duration", "lasts", "How long it stands.", 0.0, 30 * _DAY, True),
    Field(_STOP, "open", "name", "open", "The door that opens.", default_reason="none opens", refers="doors"),
    Field(_STOP, "open_for", "duration", "open for", "How long it stands open in all.", 0.0, 30 * _DAY, default="0 min",
          default_reason="shut", source=TRADE),
    Field(_STOP, "deliver", "list", "deliver", 'What leaves: [{ lot = "milk", mass = "200 kg" }].',
          default_reason="nothing"),
    Field(_STOP, "pack", "name", "pack", "A pack put in at this stop.", default_reason="none", refers="packs"),
    Field(_STOP, "heading", "bearing", "heading", "Which way the vehicle stands.", 0.0, 360.0,
          default_reason="as on the leg before"),
    Field(_STOP, "shade", "share", "shade", "Share of the sun kept off it.", 0.0, 1.0, default="0 %",
          default_reason="in the open", source=TRADE),
    Field(_STOP, "power", "yes_no", "power", "Whether the unit runs while it stands.", default="false",
          default_reason="the engine is off", source=TRADE),
    notes(_STOP),
    Field(_LEAVES, "lot", "name", "lot", "Which lot.", required=True, refers="lots"),
    Field(_LEAVES, "mass", "mass", "mass", "How much of it.", 0.0, 1e8, True),
    notes(_LEAVES),
)  # fmt: skip
