"""What is stored: lots and packs."""

from __future__ import annotations

from coldbox.project.fields.box import limits
from coldbox.project.fields.declare import TRADE, Field, Table, library, name, notes

TABLES = (
    Table(
        name="lots",
        form="list",
        help="A quantity of one product that arrives each day, is stored, or both.",
        named_after="product",
    ),
    Table(
        name="lots.composition",
        form="one",
        help="What the product is made of, as shares of its mass. Without the fibre they sum to 100 %.",
    ),
    Table(
        name="lots.respiration",
        form="list",
        help="Heat that living produce gives off, at two temperatures or more.",
        limit=50,
    ),
    Table(name="lots.limits", form="list", help="When the lot has failed.", limit=20),
    Table(
        name="packs",
        form="list",
        help="Ice, eutectic plates, dry ice: coolant that needs no power.",
        named_after="kind",
    ),
)

_LOT = "lots"
_PARTS = "lots.composition"
_BREATH = "lots.respiration"
_PACK = "packs"
_FOODS = "ashrae-r-foods"
_PRODUCT = "the product's"
_CURVE = "from the composition"

_LOT_FIELDS = (
    name(_LOT, "What it is called; unique among the lots. Events and stops name it."),
    Field(_LOT, "product", "text", "product", "A product of the table. Or give composition, or quoted properties.",
          default_reason="composition or quoted properties are needed instead", refers="foods"),
    library(_LOT, "The goods"),
    Field(_LOT, "composition", "table", "composition", "What it is made of: { water = \"93 %\", protein = \"1.5 %\" }.",
          default_reason=_PRODUCT, source=_FOODS),
    Field(_LOT, "respiration", "list", "respiration", 'Heat of living produce: [{ at = "0 °C", heat = "50 mW/kg" }, '
          "…].", default_reason=_PRODUCT, source=_FOODS),
    Field(_LOT, "transpiration", "transpiration", "transpiration", "Water given off for each kilogram and pascal of "
          "missing vapour pressure.", 0.0, 1e-5, default_reason=_PRODUCT, source=_FOODS),
    Field(_LOT, "specific_heat_above", "specific_heat", "specific heat above freezing", "Quoted; it wins over the "
          "composition.", 100.0, 10000.0, default_reason=_CURVE, source=_FOODS),
    Field(_LOT, "specific_heat_below", "specific_heat", "specific heat below freezing", "Quoted; it wins over the "
          "composition.", 100.0, 10000.0, default_reason=_CURVE, source=_FOODS),
    Field(_LOT, "latent_heat", "latent_heat", "latent heat", "Heat of freezing, quoted; it wins over the "
          "composition.", 0.0, 500e3, default_reason=_CURVE, source=_FOODS),
    Field(_LOT, "freezing_point", "temperature", "freezing point", "Where it begins to freeze.", -60.0, 30.0,
          default_reason=_PRODUCT, source=_FOODS),
    Field(_LOT, "conductivity", "conductivity", "conductivity", "Quoted; it wins over the composition.", 0.01, 50.0,
          default_reason=_CURVE, source=_FOODS),
    Field(_LOT, "density", "density", "density", "Of the goods as packed.", 10.0, 20000.0, default_reason=_PRODUCT,
          source=_FOODS),
    Field(_LOT, "safe_above", "temperature", "safe above", "Colder than this harms it: chilling or freezing injury.",
          -60.0, 30.0, default_reason=_PRODUCT, source=_FOODS),
    Field(_LOT, "stored", "mass", "stored", "What is in the room on any day. Stored or arrives is required.", 0.0, 1e8,
          default="0 kg", default_reason="nothing stored", source=TRADE),
    Field(_LOT, "arrives", "mass_rate", "arrives", "What comes in each day. Stored or arrives is required.", 0.0,
          1e8 / 86400.0, default="0 kg/day", default_reason="nothing arrives", source=TRADE),
    Field(_LOT, "arrival_time", "clock", "arrival time", "When it comes in.", 0.0, 24.0, default="08:00",
          default_reason="the morning delivery", source=TRADE),
    Field(_LOT, "arrival_temperature", "temperature", "arrival temperature", "How warm it comes in; required when it "
          "arrives.", -200.0, 120.0, default_reason="required with arrives"),
    Field(_LOT, "pulldown", "duration", "pull-down", "How long it may take to reach the room's temperature.", 600.0,
          30 * 86400.0, default="24 h", default_reason="by tomorrow's delivery", source=TRADE),
    Field(_LOT, "chilling_factor", "share", "chilling factor", "Mean cooling over the first hours' peak: 56 to 80 % by "
          "product, 100 % for none.", 0.2, 1.0, default_reason=_PRODUCT, source="ashrae-r-loads"),
    Field(_LOT, "start_temperature", "temperature", "start temperature", "At the start of an outage or trip.", -200.0,
          120.0, default_reason="from the day before"),
    Field(_LOT, "packaging", "word", "packaging", "What it is packed in.", default="none", default_reason="bare goods",
          choices=("none", "cardboard", "wood", "plastic", "glass", "steel"), source=TRADE),
    Field(_LOT, "packaging_mass", "mass", "packaging mass", 'With what arrives, a day ("45 kg/day"); with what is '
          'stored, in all ("45 kg").', 0.0, 1e7, default="0 kg", default_reason="bare goods", other_kind="mass_rate",
          source=TRADE),
    Field(_LOT, "piece", "length", "piece", 'The body that warms as one, length, width and height: ["1.2 m", "0.8 m", '
          '"1.4 m"].', 0.001, 50.0, default="0.4 m, 0.3 m, 0.3 m", default_reason="a carton", many="three",
          source=TRADE),
    Field(_LOT, "pieces", "count", "pieces", "How many such bodies.", 1, 10_000_000,
          default_reason="from the mass and the density"),
    Field(_LOT, "exposed", "word", "exposed", "What of a piece sees air.", default="top, sides",
          default_reason="it stands on something", choices=("top", "sides", "bottom"), many="list", source=TRADE),
    Field(_LOT, "shape", "word", "shape", "Shape to compute it as, with half_thickness.", default_reason="by the piece",
          choices=("slab", "cylinder", "sphere")),
    Field(_LOT, "half_thickness", "length", "half thickness", "From the surface to the core.", 0.0005, 25.0,
          default_reason="volume over the surface that sees air"),
    Field(_LOT, "air_film", "transmittance", "air film", "How well the air takes heat off its surface.", 0.1, 500.0,
          default="6 W/m²K", default_reason="still air in a store", source=TRADE),
    Field(_LOT, "wrap", "resistance", "wrap", "Resistance of wrapping or a blanket around it.", 0.0, 20.0,
          default="0 m²K/W", default_reason="nothing around it", source=TRADE),
    Field(_LOT, "limits", "list", "limits", 'When it has failed: [{ above = "-12 °C", where = "surface" }].',
          default_reason=_PRODUCT),
    notes(_LOT),
)  # fmt: skip

_INSIDE_LOT = (
    *(
        Field(_PARTS, part, "share", part, text, 0.0, 1.0, default="0 %", default_reason="none of it", source=_FOODS)
        for part, text in (
            ("water", "Share of the mass that is water."),
            ("protein", "Share of the mass that is protein."),
            ("fat", "Share of the mass that is fat."),
            ("carbohydrate", "Share of the mass that is carbohydrate, fibre included."),
            ("fibre", "Share of the mass that is fibre; it is part of the carbohydrate."),
            ("ash", "Share of the mass that is ash (salts)."),
        )
    ),
    notes(_PARTS),
    Field(_BREATH, "at", "temperature", "at", "Temperature of the produce.", -5.0, 60.0, True),
    Field(_BREATH, "heat", "specific_power", "heat", "Heat it gives off there.", 0.0, 10.0, True),
    notes(_BREATH),
    *limits("lots.limits", "mean", "what its heat content says"),
)  # fmt: skip

_PACK_FIELDS = (
    name(_PACK, "What it is called; unique among the packs. Events and stops name it."),
    Field(_PACK, "kind", "word", "kind", "What it is; own takes the figures below.", required=True,
          choices=("ice", "eutectic", "dry ice", "own")),
    library(_PACK, "The pack"),
    Field(_PACK, "mass", "mass", "mass", "Mass of one.", 0.001, 1e5, True),
    Field(_PACK, "count", "count", "how many", "How many equal ones.", 1, 100_000, default="1", default_reason="one",
          source=TRADE),
    Field(_PACK, "frozen", "share", "frozen", "Share that is frozen at the start.", 0.0, 1.0, default="100 %",
          default_reason="frozen through", source=TRADE),
    Field(_PACK, "start_temperature", "temperature", "start temperature", "At the start.", -200.0, 60.0,
          default_reason="the room's"),
    Field(_PACK, "place", "word", "place", "Around the goods, above them, or among them.", default="above",
          default_reason="cold air falls", choices=("around", "above", "among"), source=TRADE),
    Field(_PACK, "area", "area", "area", "Surface of one that sees air.", 1e-5, 1000.0, default_reason="by its mass"),
    Field(_PACK, "air_film", "transmittance", "air film", "How well the air brings heat to it.", 0.1, 500.0,
          default="8 W/m²K", default_reason="still air at a cold, damp surface", source=TRADE),
    *(
        Field(_PACK, key, kind, label, text, low, high, default_reason="the kind's; required for own")
        for key, kind, label, text, low, high in (
            ("melts_from", "temperature", "melts from", "Where it begins to melt.", -120.0, 60.0),
            ("melts_to", "temperature", "melts to", "Where it has melted.", -120.0, 60.0),
            ("latent_heat", "latent_heat", "latent heat", "Heat of melting.", 1e3, 1e6),
            ("specific_heat_frozen", "specific_heat", "specific heat frozen", "While it is frozen.", 100.0, 10000.0),
            ("specific_heat_melted", "specific_heat", "specific heat melted", "Once it has melted.", 100.0, 10000.0),
        )
    ),
    notes(_PACK),
)  # fmt: skip

FIELDS = (*_LOT_FIELDS, *_INSIDE_LOT, *_PACK_FIELDS)
