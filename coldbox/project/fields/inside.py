"""What gives off heat inside: people, lights, motors, trucks, heaters, the machine's own fans and defrost."""

from __future__ import annotations

from coldbox.project.fields.declare import TRADE, Field, Table, library, name, notes

TABLES = (
    Table(name="people", form="list", help="People at work in the room."),
    Table(name="lights", form="list", help="Lamps in the room."),
    Table(name="motors", form="list", help="Motors other than the evaporator's fans.", named_after="kind"),
    Table(name="trucks", form="list", help="Forklifts and pallet trucks.", named_after="kind"),
    Table(
        name="heaters",
        form="list",
        help="Heaters other than a door's: under the floor, in a drain, in a relief port.",
        named_after="kind",
    ),
    Table(name="machine", form="one", help="The evaporator's fans and defrost, and the chosen unit if there is one."),
    Table(
        name="quoted", form="list", help="A printed figure that stands in for entries of the account, with its source."
    ),
)

_PEOPLE = "people"
_LIGHT = "lights"
_HEATER = "heaters"
_MACHINE = "machine"
_QUOTED = "quoted"
_MOST = 1e7


def _motor(table: str, kinds: str) -> tuple[Field, ...]:
    return (
        name(table),
        Field(table, "kind", "text", "kind", kinds, default_reason="none"),
        Field(table, "power", "power", "power", "Power drawn by one while it runs.", 0.0, _MOST, True),
        Field(table, "count", "count", "how many", "How many equal ones.", 1, 100_000, default="1",
              default_reason="one", source=TRADE),
        Field(table, "hours", "hours", "hours", "When they run.", default="always",
              default_reason="on the safe side when not said", source=TRADE),
        Field(table, "place", "word", "place", "inside: motor and load in the room. load only: the motor is outside. "
              "motor only: the load is outside.", default="inside", default_reason="all of it in the room",
              choices=("inside", "load only", "motor only"), source="ashrae-r-loads"),
        notes(table),
    )  # fmt: skip


FIELDS = (
    name(_PEOPLE),
    Field(_PEOPLE, "count", "count", "how many", "How many people.", 0, 10_000, True),
    Field(_PEOPLE, "hours", "hours", "hours", 'When they are inside, and for what share: "07:00-17:00 25 %".',
          required=True),
    notes(_PEOPLE),
    name(_LIGHT),
    Field(_LIGHT, "power", "power", "power", "Power of one lamp, ballast included.", 0.0, 1e6, True),
    Field(_LIGHT, "count", "count", "how many", "How many equal lamps.", 1, 100_000, default="1", default_reason="one",
          source=TRADE),
    Field(_LIGHT, "hours", "hours", "hours", "When they are on.", default="always",
          default_reason="on the safe side when not said", source=TRADE),
    notes(_LIGHT),
    *_motor("motors", "What it is: a conveyor, a mixer, a circulating fan."),
    *_motor("trucks", "What it is: a forklift, a pallet truck."),
    name(_HEATER),
    Field(_HEATER, "kind", "word", "kind", "Where it is.", required=True,
          choices=("underfloor", "drain", "relief port")),
    Field(_HEATER, "power", "power", "power", "Its power while it runs. Power, or held_at.", 0.0, _MOST,
          default_reason="required without held_at"),
    Field(_HEATER, "held_at", "temperature", "held at", "Of an underfloor heater: it keeps the ground side of the "
          "floor at least this warm; its power is a result.", -5.0, 40.0, default_reason="required without power"),
    Field(_HEATER, "hours", "hours", "hours", "When it runs.", default="always", default_reason="frost knows no hours",
          source=TRADE),
    Field(_HEATER, "to_room", "share", "to room", "Share of its power that ends up inside.", 0.0, 1.0, default="100 %",
          default_reason="on the safe side when not said", source=TRADE),
    notes(_HEATER),
    Field(_MACHINE, "unit", "text", "unit", "The chosen unit of the library.", default_reason="none chosen",
          refers="shop library"),
    library(_MACHINE, "The unit"),
    Field(_MACHINE, "capacity", "power", "capacity", "A flat capacity instead of a unit.", 1.0, _MOST,
          default_reason="what the load asks for"),
    Field(_MACHINE, "band", "difference", "band", "Between off and on of the thermostat.", 0.1, 20.0, default="2 K",
          default_reason="a usual thermostat", source=TRADE),
    Field(_MACHINE, "fans", "count", "fans", "Evaporator fans in the room. They stop while it "
          "defrosts, but not for a defrost by the room's own air.", 0, 10_000,
          default="0", default_reason="fan_share counts until they are known", source=TRADE),
    Field(_MACHINE, "fan_power", "power", "fan power", "Power of one fan; required with fans.", 0.0, 1e6,
          default_reason="required with fans"),
    Field(_MACHINE, "fan_share", "share", "fan share", "Heat of the fans as a share of the rest of the load, until "
          "fans are given.", 0.0, 1.0, default_reason="usual for the kind of room", source=TRADE),
    Field(_MACHINE, "defrost", "word", "defrost", "How the evaporator is defrosted.", default_reason="by the room's "
          "temperature", choices=("none", "air", "electric", "hot gas"), source=TRADE),
    Field(_MACHINE, "defrost_at", "clock", "defrosts at", 'When it defrosts: ["05:00", "17:00"].', 0.0, 24.0,
          many="list", default_reason="evenly through the day"),
    Field(_MACHINE, "defrost_time", "duration", "defrost time", "How long one defrost takes.", 0.0, 6 * 3600.0,
          default="25 min", default_reason="electric or hot gas, ended by temperature", source=TRADE),
    Field(_MACHINE, "defrost_power", "power", "defrost power", "Power of the defrost heaters.", 0.0, 1e6,
          default_reason="by the capacity, with defrost_share"),
    Field(_MACHINE, "defrost_share", "share", "defrost share", "Defrost energy of a day as a share of the rest of "
          "the load, until a power is given.", 0.0, 1.0, default_reason="usual for the kind of defrost",
          source=TRADE),
    Field(_MACHINE, "defrost_to_room", "share", "defrost to room", "Share of the defrost energy that ends up inside.",
          0.0, 1.0, default="50 %", default_reason="the rest leaves with the melted water", source=TRADE),
    notes(_MACHINE),
    name(_QUOTED, "What the line is called in the account."),
    Field(_QUOTED, "group", "word", "group", "Which group of the account it belongs to.", required=True,
          choices=("transmission", "sun", "infiltration", "product", "internal", "equipment")),
    Field(_QUOTED, "power", "power", "power", "The printed figure, while it runs.", -_MOST, _MOST, True),
    Field(_QUOTED, "hours", "hours", "hours", "When it runs.", default="always",
          default_reason="a figure of the whole day", source=TRADE),
    Field(_QUOTED, "latent", "share", "latent", "Share of it that is moisture.", 0.0, 1.0, default="0 %",
          default_reason="all sensible when not said", source=TRADE),
    Field(_QUOTED, "replaces", "text", "replaces", "Entries or groups of the account that it stands in for.",
          default_reason="nothing: it is added", many="list"),
    Field(_QUOTED, "source", "text", "source", "Where the figure is printed.", required=True),
    notes(_QUOTED),
)  # fmt: skip
