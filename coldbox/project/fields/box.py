"""The enclosure: the box, what its walls are made of, its six faces, the panels cut out of them."""

from __future__ import annotations

from coldbox.project.fields.declare import TRADE, Field, Table, library, name, notes
from coldbox.project.model import FACES

TABLES = (
    Table(
        name="box", form="one", help="The cold room or container. The front is the face one stands before to open it."
    ),
    Table(name="box.limits", form="list", help="When the box itself has failed.", limit=20),
    Table(
        name="constructions",
        form="named",
        help="What a wall is made of, by a name of your own: its layers, or its R or U as quoted by the maker.",
    ),
    Table(
        name="constructions.layers", form="list", help="The layers of a construction, from the outside in.", limit=50
    ),
    Table(
        name="faces",
        form="named",
        help="One of the six faces, where it differs from what [box] says for all.",
        limit=6,
        only=FACES,
    ),
    Table(
        name="panels",
        form="list",
        help="A stretch of a face that is different and never opens: a window, a wall to another room.",
    ),
)

COLOURS = ("white", "light", "medium", "dark", "bare metal")
NEIGHBOURS = ("outdoors", "ground", "void", "road", "room")

_BOX = "box"
_NAME = "constructions"
_LAYER = "constructions.layers"
_FACE = "faces"
_PANEL = "panels"
_ATP = "un-atp"
_GROUND = "iso-13370"


def limits(table: str, where: str, reason: str) -> tuple[Field, ...]:
    """A limit: above or below, where, and for how many minutes in sum."""
    return (
        Field(table, "above", "temperature", "not above", "Fails when it gets warmer than this. Either above or below.",
              -200.0, 100.0, default_reason="none"),
        Field(table, "below", "temperature", "not below", "Fails when it gets colder than this. Either above or below.",
              -200.0, 100.0, default_reason="none"),
        Field(table, "where", "word", "where", "Which temperature counts.", default=where, default_reason=reason,
              choices=("surface", "mean", "core", "air"), source=TRADE),
        Field(table, "minutes", "duration", "minutes", "How long it may be crossed, in sum.", 0.0, 30 * 86400.0,
              default="0 min", default_reason="fails at once", source=TRADE),
        notes(table),
    )  # fmt: skip


def construction(table: str, otherwise: str) -> Field:
    """The construction of a part: a name, or a table of its own in place of the name."""
    return Field(table, "construction", "name", "construction", "What it is made of: a name of [constructions.NAME], "
                 "or of the shop library, or its own { layers = [...] } in place.", default_reason=otherwise,
                 refers="constructions")  # fmt: skip


def neighbour(table: str, otherwise: str, default: str | None = None) -> Field:
    """What is behind a part."""
    return Field(table, "neighbour", "name", "neighbour", "What is behind it: outdoors, ground, void, road, room (24 "
                 "°C, 50 %), or a name of [neighbours.NAME].", default=default, default_reason=otherwise,
                 choices=NEIGHBOURS, refers="neighbours")  # fmt: skip


def quoted(table: str, otherwise: str) -> tuple[Field, ...]:
    """R or U with a thickness, standing in a construction or straight in a panel or door."""
    return (
        Field(table, "r_value", "resistance", "R-value", 'Resistance of the layers without films, such as "RSI 4.4" or '
              '"R-25". Needs a thickness.', 0.005, 100.0, default_reason=otherwise),
        Field(table, "u_value", "transmittance", "U-value", "Transmittance with the standard films 0.13 + 0.04 m²K/W. "
              "Needs a thickness.", 0.01, 5.8, default_reason=otherwise, source="iso-6946"),
        Field(table, "thickness", "length", "thickness", "Thickness in all; needed with an R or U.", 0.0005, 5.0,
              default_reason="the sum of the layers" if table == _NAME else otherwise),
    )  # fmt: skip


_BOX_FIELDS = (
    Field(_BOX, "length", "length", "length", "From front to back. Needed unless volume, floor_area and perimeter "
          "are given.", 0.02, 500.0, default_reason="required for a plain box"),
    Field(_BOX, "width", "length", "width", "Along the front. Needed like length.", 0.02, 500.0,
          default_reason="required for a plain box"),
    Field(_BOX, "height", "length", "height", "From floor to ceiling. Needed like length.", 0.02, 60.0,
          default_reason="required for a plain box"),
    Field(_BOX, "measured", "word", "measured", "Whether the sizes are inside or outside ones.", default="inside",
          default_reason="as rooms are sold", choices=("inside", "outside"), source=TRADE),
    Field(_BOX, "notch_length", "length", "notch length", "Front to back, of the corner that an L-shaped room lacks.",
          0.02, 500.0, default_reason="no notch"),
    Field(_BOX, "notch_width", "length", "notch width", "Along the front, of the corner that an L-shaped room lacks.",
          0.02, 500.0, default_reason="no notch"),
    Field(_BOX, "notch_corner", "word", "notch corner", "Which corner an L-shaped room lacks, seen from outside "
          "before the front.", default_reason="no notch",
          choices=("front left", "front right", "back left", "back right")),
    Field(_BOX, "volume", "volume", "volume", "Air volume; only for shapes that are no box and no L.", 1e-5, 1e6,
          default_reason="from the sizes"),
    Field(_BOX, "floor_area", "area", "floor area", "Only for shapes that are no box and no L.", 1e-4, 1e5,
          default_reason="from the sizes"),
    Field(_BOX, "perimeter", "length", "perimeter", "Outline of the floor; only for shapes that are no box and no L.",
          0.04, 5000.0, default_reason="from the sizes"),
    Field(_BOX, "bearing", "bearing", "bearing", 'Which way the front faces, degrees clockwise from north or "SSW".',
          0.0, 360.0, default_reason="the worst of 16 where the sun counts"),
    Field(_BOX, "temperature", "temperature", "room temperature", "Held inside; of a box without power, the wanted "
          "one.", -100.0, 60.0, True),
    Field(_BOX, "humidity", "share", "room humidity", "Relative humidity inside.", 0.01, 1.0,
          default_reason="usual at that temperature", source=TRADE),
    Field(_BOX, "powered", "yes_no", "powered", "false for a box that nothing cools: an insulated box, a parcel, a "
          "tub.", default="true", default_reason="most rooms have a machine", source=TRADE),
    construction(_BOX, "required without k_value"),
    neighbour(_BOX, "on the safe side: rooms are milder than a summer day", "outdoors"),
    Field(_BOX, "colour", "word", "colour", "Colour outside; it counts in the sun.", default="white",
          default_reason="as most panels are sold", choices=COLOURS, source=TRADE),
    Field(_BOX, "k_value", "transmittance", "K of the body", "Whole body's K (ATP) instead of constructions; "
          "replaces all six faces. Needs a thickness.", 0.01, 10.0, default_reason="from the constructions",
          source=_ATP),
    Field(_BOX, "thickness", "length", "wall thickness", "Thickness of the walls of a body with a k_value.", 0.001, 2.0,
          default_reason="from the constructions"),
    Field(_BOX, "allowance", "share", "allowance for joints", "Added to what passes through walls, for joints and "
          "fixings.", 0.0, 2.0, default="0 %", default_reason="only what is given counts", source=TRADE),
    Field(_BOX, "sun", "word", "sun", "hourly: the sun hour by hour. allowance: the handbook's added degrees by "
          "colour and face.", default="hourly", default_reason="the closer method", choices=("hourly", "allowance"),
          source="ashrae-r-loads"),
    Field(_BOX, "air", "word", "air change by", "doors: traffic and leakage. table: the handbook's air changes by "
          "volume alone. rate: air_change alone.", default="doors", default_reason="the closer method",
          choices=("doors", "table", "rate"), source="ashrae-r-loads"),
    Field(_BOX, "use", "word", "use", 'How much the doors are used, for air = "table".', default="average",
          default_reason="neither light nor heavy", choices=("light", "average", "heavy"), source="ashrae-r-loads"),
    Field(_BOX, "films", "word", "films inside", "standard: fixed films. natural: computed from the temperatures.",
          default="standard", default_reason="as U-values are quoted", choices=("standard", "natural"),
          source="iso-6946"),
    Field(_BOX, "leakage", "rate", "leakage", "Air changes of the shut box.", 0.0, 100.0 / 3600.0, default="0.1/h",
          default_reason="a sound panel room", source=TRADE),
    Field(_BOX, "air_change", "rate", "air change", 'Air changes in all, for air = "rate".', 0.0, 500.0 / 3600.0,
          default_reason='none: needed with air = "rate"'),
    Field(_BOX, "fittings", "mass", "steel fittings", "Steel racks and the like, which warm up with the room.", 0.0,
          1e6, default="0 kg", default_reason="none", source=TRADE),
    Field(_BOX, "credit_cold", "yes_no", "credit cold", "true to let a colder neighbour lower the capacity.",
          default="false", default_reason="the neighbour may be switched off", source=TRADE),
    Field(_BOX, "rules", "word", "rules", "Public rules to check the box against.", default_reason="none",
          many="list", choices=("us-walk-in", "atp-a", "atp-b", "atp-c", "atp-d", "atp-e", "atp-f", "vaccine"),
          source="cfr-431-306"),
    Field(_BOX, "limits", "list", "limits", 'When the box has failed: [{ above = "8 °C", where = "air" }].',
          default_reason="none"),
    notes(_BOX),
    *limits("box.limits", "air", "what a thermometer in the box shows"),
)  # fmt: skip

_CONSTRUCTION_FIELDS = (
    Field(_NAME, "layers", "list", "layers", "Its layers, from the outside in. Layers, or an r_value or u_value.",
          default_reason="layers, r_value or u_value: one of them is required"),
    *quoted(_NAME, "from the layers"),
    library(_NAME, "The construction"),
    Field(_NAME, "edge_loss", "line_transmittance", "edge loss", "Extra loss along the outline of each panel, at its "
          "joints.", 0.0, 10.0, default="0 W/mK", default_reason="only what is given counts", source=TRADE),
    Field(_NAME, "point_loss", "point_transmittance", "point loss", "Extra loss of each bolt or bracket through it.",
          0.0, 50.0, default="0 W/K", default_reason="only what is given counts", source=TRADE),
    Field(_NAME, "points", "count", "points", "How many bolts or brackets go through it.", 0, 100000, default="0",
          default_reason="none", source=TRADE),
    notes(_NAME),
    Field(_LAYER, "material", "text", "material", 'A material of the table, or any name with its own conductivity; an '
          '"air space" needs none.', required=True, refers="materials"),
    Field(_LAYER, "thickness", "length", "thickness", "Thickness of the layer.", 1e-6, 5.0, True),
    Field(_LAYER, "conductivity", "conductivity", "conductivity", "As declared; holds at every temperature.", 0.0005,
          500.0, default_reason="the material's, at its mean temperature"),
    Field(_LAYER, "temperature_factor", "number", "temperature factor", "How the conductivity grows with "
          "temperature, as a share per kelvin: 0.004 is 0.4 % per K.", -0.02, 0.05,
          default_reason="the material's; none for a typed conductivity", source="iso-10456"),
    Field(_LAYER, "density", "density", "density", "Delays the day's heat.", 0.1, 25000.0,
          default_reason="the material's"),
    Field(_LAYER, "specific_heat", "specific_heat", "specific heat", "Delays the day's heat.", 50.0, 15000.0,
          default_reason="the material's"),
    Field(_LAYER, "ageing", "share", "ageing", "Added to the conductivity, for foam that lost its gas.", 0.0, 5.0,
          default="0 %", default_reason="as declared", source=TRADE),
    Field(_LAYER, "moisture", "share", "moisture", "Added to the conductivity, for insulation that took up water.", 0.0,
          20.0, default="0 %", default_reason="dry", source=TRADE),
    Field(_LAYER, "emissivity", "share", "emissivity", "Of the faces of an air space, both together; a foil has 5 %.",
          0.01, 1.0, default_reason="82 % for plain faces", source="iso-6946"),
    notes(_LAYER),
)  # fmt: skip

_FACE_FIELDS = (
    construction(_FACE, "the box's"),
    neighbour(_FACE, "the box's"),
    Field(_FACE, "colour", "word", "colour", "Colour outside; it counts in the sun.", default_reason="the box's",
          choices=COLOURS),
    Field(_FACE, "weathered", "yes_no", "weathered", "true for an old, dirty surface, which takes more sun.",
          default="false", default_reason="new and clean", source=TRADE),
    Field(_FACE, "emissivity", "share", "emissivity", "How well the outside radiates heat; paint 90 %, bare metal 25 "
          "%.", 0.01, 1.0, default="90 %", default_reason="painted or plastic", source=TRADE),
    Field(_FACE, "shade", "share", "shade", "Share of the sun kept off it.", 0.0, 1.0, default="0 %",
          default_reason="in full sun", source=TRADE),
    Field(_FACE, "soil", "word", "soil", "Under a floor on the ground.", default="clay",
          default_reason="the standard's first category, and the usual choice when unknown",
          choices=("clay", "sand", "rock"), source=_GROUND),
    Field(_FACE, "exposed_edge", "length", "exposed edge", "Length of a ground floor's outline that borders the "
          "outdoors; 0 m inside a building.", 0.0, 5000.0, default_reason="the floor's whole outline",
          source=_GROUND),
    Field(_FACE, "edge_wall", "length", "edge wall", "Thickness of the wall that stands on a ground floor's edge.",
          0.0, 3.0, default="0.3 m", default_reason="a usual wall", source=_GROUND),
    notes(_FACE),
)  # fmt: skip

_PANEL_FIELDS = (
    name(_PANEL),
    Field(_PANEL, "face", "word", "face", "The face it is cut out of.", required=True, choices=FACES),
    Field(_PANEL, "width", "length", "width", "Along the face. Width (and height), or area.", 0.01, 500.0,
          default_reason="required without area"),
    Field(_PANEL, "height", "length", "height", "Upwards; of a ceiling or floor, front to back.", 0.01, 500.0,
          default_reason="the face's"),
    Field(_PANEL, "area", "area", "area", "Instead of width and height.", 1e-4, 1e5,
          default_reason="width times height"),
    construction(_PANEL, "the face's"),
    *quoted(_PANEL, "the construction's"),
    neighbour(_PANEL, "the face's"),
    Field(_PANEL, "colour", "word", "colour", "Colour outside; it counts in the sun.", default_reason="the face's",
          choices=COLOURS),
    Field(_PANEL, "shade", "share", "shade", "Share of the sun kept off it.", 0.0, 1.0, default_reason="the face's"),
    Field(_PANEL, "solar_gain", "share", "solar gain", "Of glass: the share of the sun that it lets in.", 0.0, 1.0,
          default="0 %", default_reason="not glass", source=TRADE),
    notes(_PANEL),
)  # fmt: skip

FIELDS = (*_BOX_FIELDS, *_CONSTRUCTION_FIELDS, *_FACE_FIELDS, *_PANEL_FIELDS)
