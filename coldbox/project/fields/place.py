"""The file itself, the site, and the rooms behind the walls."""

from __future__ import annotations

from coldbox.project.fields.declare import TRADE, Field, Table, library, notes

TABLES = (
    Table(name="", form="one", help="The first lines of the file, above every table."),
    Table(
        name="site",
        form="one",
        help="The place and its design day. Needed as soon as a wall, door or panel touches outdoors, ground or road.",
    ),
    Table(
        name="neighbours",
        form="named",
        help="A room behind a wall, by a name of your own. Walls and doors name it as their neighbour.",
    ),
)

_TOP = ""
_SITE = "site"
_ROOM = "neighbours"
_CLEAR_SKY = "ashrae-f-clear-sky"

FIELDS = (
    Field(_TOP, "format", "count", "format", "The version of the file format. Always 1.", 1, 1, True),
    Field(_TOP, "name", "text", "title", "The title of the project.", default_reason="the name of the file"),
    Field(_TOP, "units", "word", "units", "Which units results are shown in. What you type may be in either.",
          default="SI", default_reason="as most of the world", choices=("SI", "IP")),
    Field(_TOP, "customer", "text", "customer", "For whom, printed on the paper.", default_reason="none"),
    Field(_TOP, "by", "text", "by", "Who made it, printed on the paper.", default_reason="none"),
    notes(_TOP),
    Field(_SITE, "place", "text", "place", "A place of the weather table; it fills in the keys below that you leave "
          "out.", default_reason="none", refers="weather"),
    library(_SITE, "The place"),
    Field(_SITE, "latitude", "latitude", "latitude", 'Degrees north of the equator, such as "55.1° N". Needed '
          "without a place.", -90.0, 90.0, default_reason="the place's"),
    Field(_SITE, "longitude", "longitude", "longitude", 'Degrees east of Greenwich, such as "14.7° E". Needed '
          "without a place.", -180.0, 180.0, default_reason="the place's"),
    Field(_SITE, "altitude", "length", "altitude", "Height above the sea; it sets the air pressure.", -430.0, 6000.0,
          default="0 m", default_reason="the place's, or sea level", source=TRADE),
    Field(_SITE, "clock", "utc_offset", "clock", "What the wall clock shows on the design day against UTC, summer time "
          "included. It rules every time in the file.", -12.0, 14.0,
          default_reason="the place's, or by longitude: one hour for 15 degrees"),
    Field(_SITE, "month", "month", "month", "Month of the design day.", 1, 12,
          default_reason="the hottest month of the place, or July north and January south of the equator"),
    Field(_SITE, "day", "count", "day", "Day of the month of the design day.", 1, 31,
          default="21", default_reason="the day of the month the sun tables are made for", source=_CLEAR_SKY),
    Field(_SITE, "weather", "name", "weather file", "A CSV file of hourly weather in the same folder.",
          default_reason="none: the design day is computed"),
    Field(_SITE, "dry_bulb", "temperature", "outdoor temperature", "The day's highest, reached at 15:00 by the sun. "
          "Needed without a place.", -60.0, 60.0, default_reason="the place's design temperature"),
    Field(_SITE, "daily_range", "difference", "daily range", "The day's highest temperature less its lowest.", 0.0,
          40.0, default="10 K", default_reason="the place's, or a usual summer day", source=TRADE),
    Field(_SITE, "humidity", "share", "outdoor humidity", "Relative humidity at the day's highest temperature; the dew "
          "point then holds all day. Or give wet_bulb.", 0.0, 1.0,
          default="50 %", default_reason="the place's, or a usual summer afternoon", source=TRADE),
    Field(_SITE, "wet_bulb", "temperature", "wet bulb", "Wet-bulb temperature at the day's highest, instead of "
          "humidity.", -60.0, 45.0, default_reason="from the humidity"),
    Field(_SITE, "wind", "speed", "wind", "Wind along the walls; it sets the outside film.", 0.0, 50.0,
          default="3 m/s", default_reason="usual for summer design", source=TRADE),
    Field(_SITE, "ground_temperature", "temperature", "ground temperature", "Mean of the outdoor air over the year, "
          "which is that of the deep ground.", -30.0, 40.0, default_reason="the place's mean of the year"),
    Field(_SITE, "yearly_swing", "difference", "yearly swing", "Half of the warmest month's mean less the coldest "
          "month's.", 0.0, 40.0, default_reason="the place's", source="iso-13370"),
    Field(_SITE, "sky", "word", "sky", "Clear: sun and a cold night sky. Overcast: little of both. None: neither.",
          default="clear", default_reason="the hottest days are clear", choices=("clear", "overcast", "none"),
          source=TRADE),
    Field(_SITE, "tau_beam", "number", "beam depth", "How thick the air is for direct sun (clear-sky model).", 0.1, 1.5,
          default_reason="the place's, or a usual summer value", source=_CLEAR_SKY),
    Field(_SITE, "tau_diffuse", "number", "diffuse depth", "How thick the air is for scattered sun (clear-sky model).",
          1.0, 4.0, default_reason="the place's, or a usual summer value", source=_CLEAR_SKY),
    Field(_SITE, "ground_reflects", "share", "ground reflects", "Share of the sun that the ground throws back.", 0.0,
          1.0, default="20 %", default_reason="grass, soil, asphalt", source=_CLEAR_SKY),
    notes(_SITE),
    Field(_ROOM, "temperature", "temperature", "temperature", "Air temperature of that room.", -100.0, 100.0, True),
    Field(_ROOM, "humidity", "share", "humidity", "Relative humidity of that room.", 0.0, 1.0,
          default="50 %", default_reason="a usual room", source=TRADE),
    Field(_ROOM, "project", "name", "project", "The project of that room, when it is a cold room itself. Nothing is "
          "read from it: the temperature and humidity here hold.", default_reason="none"),
    Field(_ROOM, "volume", "volume", "volume", "Air volume of that room or cab; only for carbon dioxide from dry ice.",
          0.01, 1e7, default_reason="unknown"),
    Field(_ROOM, "air_change", "rate", "air change", "Fresh air of that room; only for carbon dioxide from dry ice.",
          0.0, 500.0 / 3600.0, default_reason="unknown"),
    notes(_ROOM),
)  # fmt: skip
